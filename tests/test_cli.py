"""The program as the system sees it: exit status, Ctrl-C, pipes, full disks, terminals without Unicode."""

import os
import shlex
import signal
import subprocess
import sys
from pathlib import Path

import pytest

import visionplan
from visionplan.cli import run
from visionplan.demo import demo_folder

ROOT = Path(visionplan.__file__).parents[1]
DEMO = str(demo_folder())
JAR_LIDS = str(demo_folder() / "briefs" / "jar-lids.toml")
PAIR = ("area-3.1-gige-mono", "plain-16")
ANY_TERMINAL = {"PYTHONPATH": str(ROOT), "PYTHONWARNINGS": "error", "PATH": os.environ["PATH"], "LC_ALL": "C.UTF-8"}

posix = pytest.mark.skipif(os.name != "posix", reason="needs POSIX")


def start(*arguments, env=None, path=None, **options):
    """Start the program, as a shell would: with its own handling of Ctrl-C, however the tests were started."""
    before = options.pop("preexec_fn", lambda: None)

    def prepare():
        signal.signal(signal.SIGINT, signal.default_int_handler)
        before()

    settings = ANY_TERMINAL | (env or {})
    if path:
        settings["PYTHONPATH"] = os.pathsep.join((str(path), str(ROOT)))
    pipes = {"stdout": subprocess.PIPE, "stderr": subprocess.PIPE, "stdin": subprocess.DEVNULL} | options
    command = [sys.executable, "-m", "visionplan", *arguments]
    return subprocess.Popen(command, env=settings, preexec_fn=prepare, **pipes)


def ended(process):
    """Exit status, standard output and standard error."""
    out, err = process.communicate(timeout=60)
    return process.returncode, out, err


def test_version(capsys):
    assert run(["--version"]) == 0
    assert capsys.readouterr().out == f"visionplan {visionplan.__version__}\n"


def test_alone_it_prints_its_help(capsys):
    assert run([]) == 0
    alone = capsys.readouterr().out
    assert run(["--help"]) == 0
    assert capsys.readouterr().out == alone


@posix
@pytest.mark.parametrize("command", [("rank",), ("concede",), ("explain",)])
def test_ctrl_c_while_it_reads(tmp_path, command):
    fifo = tmp_path / "brief.toml"
    os.mkfifo(fifo)
    pair = PAIR if command == ("explain",) else ()
    process = start(*command, str(fifo), *pair, "--catalogue", DEMO)
    with fifo.open("w"):  # waits until the program reads from it
        process.send_signal(signal.SIGINT)
        assert ended(process) == (130, b"", b"")


@posix
def test_ctrl_c_while_it_imports(tmp_path):
    # numpy's compiled parts turn a KeyboardInterrupt in an import of theirs into an ImportError
    (tmp_path / "numpy").mkdir()
    fifo = tmp_path / "fifo"
    os.mkfifo(fifo)
    (tmp_path / "numpy" / "__init__.py").write_text(
        f"try:\n    open({str(fifo)!r}).read()\nexcept BaseException:\n    raise ImportError('numpy failed')\n"
    )
    process = start("rank", JAR_LIDS, path=tmp_path)
    with fifo.open("w"):
        process.send_signal(signal.SIGINT)
        assert ended(process) == (130, b"", b"")


@posix
def test_ctrl_c_is_left_ignored_where_it_was(tmp_path):
    fifo = tmp_path / "brief.toml"
    os.mkfifo(fifo)
    ignore = lambda: signal.signal(signal.SIGINT, signal.SIG_IGN)  # noqa: E731
    process = start("concede", str(fifo), "--catalogue", DEMO, preexec_fn=ignore)
    with fifo.open("w") as file:
        process.send_signal(signal.SIGINT)
        file.write(Path(JAR_LIDS).read_text(encoding="utf-8"))
    status, out, err = ended(process)
    assert (status, err) == (0, b"")
    assert out


EVERY_KIND = [
    ("rank", JAR_LIDS),
    ("rank", JAR_LIDS, "--format", "json"),
    ("explain", JAR_LIDS, *PAIR),
    ("completion", "bash"),
    ("--help",),
    (),
]


@posix
@pytest.mark.parametrize("arguments", EVERY_KIND)
def test_a_closed_pipe_is_no_fault(arguments):
    reading, writing = os.pipe()
    os.close(reading)
    process = start(*arguments, stdout=writing)
    os.close(writing)
    status, _, err = ended(process)
    assert (status, err) == (0, b"")


def test_a_pipe_that_is_closed_after_a_line():
    process = start("rank", JAR_LIDS, "--format", "json", "--top", "1000")
    assert process.stdout.readline() == b"{\n"
    process.stdout.close()
    process.stdout = None
    status, _, err = ended(process)
    assert (status, err) == (0, b"")


@pytest.mark.skipif(not os.path.exists("/dev/full"), reason="needs a disk that is always full")
@pytest.mark.parametrize("arguments", EVERY_KIND)
def test_a_full_disk(arguments):
    with open("/dev/full", "wb") as full:
        status, _, err = ended(start(*arguments, stdout=full))
    assert status == 2
    assert err == b"visionplan: standard output: can't be written: No space left on device\n"


@posix
@pytest.mark.parametrize("arguments", EVERY_KIND)
def test_closed_standard_output(arguments):
    status, _, err = ended(start(*arguments, stdout=None, preexec_fn=lambda: os.close(1)))
    assert status == 2
    assert err.splitlines()[-1].startswith(b"visionplan: standard output: is closed")


@posix
def test_closed_standard_error_and_input():
    def close():
        os.close(2)
        os.close(0)

    status, out, _ = ended(start("concede", JAR_LIDS, stderr=None, stdin=None, preexec_fn=close))
    assert status == 0
    assert out
    status, out, _ = ended(start("concede", "missing.toml", stderr=None, stdin=None, preexec_fn=close))
    assert (status, out) == (2, b"")
    status, _, err = ended(start("concede", "-", "--catalogue", DEMO, stdin=None, preexec_fn=lambda: os.close(0)))
    assert status == 2
    assert b"standard input: can't be read" in err


@posix
@pytest.mark.parametrize("arguments", [("rank", "x.toml"), ("new", "x.toml"), ("concede", "-"), ("concede", JAR_LIDS)])
def test_a_working_folder_that_is_gone(tmp_path, arguments):
    gone = tmp_path / "gone"
    gone.mkdir()
    with open(JAR_LIDS, "rb") as text:
        status, _, err = ended(start(*arguments, cwd=gone, stdin=text, preexec_fn=gone.rmdir))
    assert b"Traceback" not in err
    assert status == (0 if JAR_LIDS in arguments else 2)


@pytest.mark.parametrize("encoding", ["ascii", "iso-8859-1", "cp1252", "iso-8859-7"])
def test_a_terminal_without_unicode(tmp_path, encoding):
    env = {"PYTHONIOENCODING": encoding}
    for arguments in (("rank", JAR_LIDS), ("explain", JAR_LIDS, *PAIR), ("concede", JAR_LIDS)):
        status, out, err = ended(start(*arguments, env=env))
        assert (status, err) == (0, b"")
        assert "?" not in out.decode(encoding)
    brief = tmp_path / "brief.toml"
    brief.write_text(
        'title = "Deckel Größe Ω 蓋"\n' + Path(JAR_LIDS).read_text(encoding="utf-8").replace("title", "#"), "utf-8"
    )
    status, out, _ = ended(start("explain", str(brief), *PAIR, "--catalogue", DEMO, env=env))
    assert status == 0
    assert "Deckel Gr" in out.decode(encoding)


@posix
def test_a_terminal_has_colour_unless_it_is_not_wanted():
    import pexpect

    def seen(**env):
        arguments = ["-m", "visionplan", "rank", JAR_LIDS]
        settings = ANY_TERMINAL | {"TERM": "xterm"} | env
        out, status = pexpect.run(
            shlex.join([sys.executable, *arguments]), env=settings, dimensions=(24, 100), withexitstatus=True
        )
        assert status == 0
        return out.decode()

    assert "\x1b[" in seen()
    plain = seen(NO_COLOR="1")
    assert "\x1b" not in plain
    assert 80 < max(map(len, plain.splitlines())) <= 100
    assert "\x1b" not in seen(TERM="dumb")


def test_files_for_programs_are_utf_8_in_every_locale(tmp_path):
    brief = tmp_path / "brief.toml"
    brief.write_text(Path(JAR_LIDS).read_text(encoding="utf-8").replace('title = "', 'title = "Größe '), "utf-8")
    arguments = ("rank", str(brief), "--catalogue", DEMO, "--format", "markdown")
    status, out, _ = ended(start(*arguments, env={"PYTHONIOENCODING": "ascii"}))
    assert status == 0
    assert "Größe" in out.decode("utf-8")


def test_json_is_the_same_byte_for_byte():
    arguments = ("rank", JAR_LIDS, "--format", "json", "--top", "100")
    results = {ended(start(*arguments, env={"PYTHONHASHSEED": seed}))[1] for seed in ("0", "1", "77")}
    assert len(results) == 1
    assert results.pop().isascii()


def test_a_fault_of_the_program_is_not_taken_for_nothing_fits(monkeypatch, capsys):
    def broken(*_):
        raise ZeroDivisionError

    monkeypatch.setattr("visionplan.commands.catalogue.run_check", broken)
    monkeypatch.setattr("visionplan.commands.inputs.read_inputs", broken)
    assert run(["concede", JAR_LIDS]) == 2
    assert "fault of visionplan itself" in capsys.readouterr().err


def test_out_of_memory(monkeypatch, capsys):
    def hungry(*_):
        raise MemoryError

    monkeypatch.setattr("visionplan.commands.inputs.read_inputs", hungry)
    assert run(["concede", JAR_LIDS]) == 2
    assert capsys.readouterr().err.startswith("visionplan: out of memory")
