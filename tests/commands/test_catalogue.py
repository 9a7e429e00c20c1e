"""catalogue check."""

import shutil


def test_a_good_catalogue(command):
    status, out, err = command("catalogue", "check", command.demo)
    assert (status, err) == (0, "")
    assert ", ".join(f"{command.rows(item)} {item}" for item in ("lenses", "cameras", "spacers")) in out
    assert "sha256:" in out


def test_what_is_wrong_with_file_and_line(command, tmp_path):
    folder = tmp_path / "parts"
    shutil.copytree(command.demo, folder)
    with (folder / "lenses.csv").open("a") as file:
        file.write("bad,C,Padderbury,entocentric,-3\n")
    with (folder / "cameras.csv").open("a") as file:
        file.write("bad,C\n")
    err = command.refused("catalogue", "check", folder)
    assert f"lenses.csv:{command.rows('lenses') + 2}" in err
    assert f"cameras.csv:{command.rows('cameras') + 2}" in err
    assert "nowhere" in command.refused("catalogue", "check", "nowhere")


def test_notes_are_told(command, tmp_path):
    folder = tmp_path / "parts"
    shutil.copytree(command.demo, folder)
    lines = (folder / "spacers.csv").read_text().splitlines()
    (folder / "spacers.csv").write_text(
        "\n".join(f"{line},{'shelf' if not n else 'A'}" for n, line in enumerate(lines))
    )
    status, _, err = command("catalogue", "check", folder)
    assert status == 0
    assert "shelf" in err
