"""completion: what a shell completes."""

import shutil
import subprocess

import pytest

SHELLS = ("bash", "zsh", "fish", "tcsh", "powershell")


@pytest.mark.parametrize("shell", SHELLS)
def test_a_script_for_each_shell_knows_commands_and_options(command, shell):
    status, out, err = command("completion", shell)
    assert (status, err) == (0, "")
    for word in ("rank", "explain", "concede", "catalogue", "check", "new", "completion", "catalogue", "orientation"):
        assert word in out


@pytest.mark.skipif(not shutil.which("bash"), reason="needs bash")
@pytest.mark.parametrize(
    ("words", "expected"),
    [
        (["ra"], {"rank"}),
        (["catalogue", ""], {"check", "map", "take"}),
        (["rank", "--ord"], {"--order"}),
        (["rank", "--order", "la"], {"latitude"}),
        (["explain", "cel"], {"cell.toml"}),
        (["rank", "cell.toml", "--catalogue", "par"], {"parts"}),
    ],
)
def test_bash_completes(command, tmp_path, words, expected):
    (tmp_path / "cell.toml").touch()
    (tmp_path / "parts").mkdir()
    (tmp_path / "parts.csv").touch()
    script = tmp_path / "completion.bash"
    script.write_text(command("completion", "bash")[1])
    ask = f"""
        compopt() {{ :; }}
        source {script}
        COMP_WORDS=(visionplan {" ".join(word or "''" for word in words)}); COMP_CWORD={len(words)}
        $(complete -p visionplan | sed 's/.*-F \\([^ ]*\\) .*/\\1/')
        printf '%s\\n' "${{COMPREPLY[@]}}"
    """
    done = subprocess.run(["bash", "-c", ask], cwd=tmp_path, capture_output=True, text=True, check=True)
    assert {word.strip().rstrip("/") for word in done.stdout.splitlines()} == expected
    assert not done.stderr
