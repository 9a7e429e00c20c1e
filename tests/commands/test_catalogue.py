"""catalogue check, map and take."""

import json
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


SHEET = """\
Artikel;Fassung;Brennweite (mm);Blende;MOD [m];Preis [EUR];Bestand;Notiz
A16;C;16;1,4 - 16;0,1;1.234,50;5;neu
A25;CS;25;1,8 - 22;0,15;399,00;-;\x1b[31mrot
"""


def test_map_then_take(command, tmp_path):
    (tmp_path / "sheet.csv").write_text(SHEET)
    status, out, err = command("catalogue", "map", "sheet.csv")
    assert status == 0
    assert "7 of 8 columns guessed" in err
    assert "left: Notiz" in err
    assert "\x1b" not in out + err
    (tmp_path / "map.toml").write_text(out)
    status, out, err = command("catalogue", "take", "sheet.csv", "map.toml", "parts")
    assert (status, err) == (0, "")
    assert "lenses.csv: 2 added" in out

    (tmp_path / "sheet.csv").write_text(SHEET.replace("399,00", "419,00").replace("0,1;", "0,2;"))
    status, out, err = command("catalogue", "take", "sheet.csv", "map.toml", "parts")
    assert status == 0
    assert "1 updated" in out
    assert "A25: price 399.00 → 419.00" in out
    assert "A16: nearest object 0.1, in the sheet 0.2" in out
    assert "1 updated" in command("catalogue", "take", "sheet.csv", "map.toml", "parts", "--all")[1]


def test_take_lists_bad_rows_or_skips_them(command, tmp_path):
    (tmp_path / "sheet.csv").write_text(SHEET)
    (tmp_path / "map.toml").write_text(command("catalogue", "map", "sheet.csv")[1])
    (tmp_path / "sheet.csv").write_text(SHEET.replace("1,8 - 22", "open") + "A50;C;-50;2,8-22;0,4;;;\n")
    err = command.refused("catalogue", "take", "sheet.csv", "map.toml", "parts")
    assert "sheet.csv:3 [Blende]: 'open'" in err
    assert "sheet.csv:4 [Brennweite (mm)]: '-50'" in err
    assert not (tmp_path / "parts").exists()
    status, out, err = command("catalogue", "take", "sheet.csv", "map.toml", "parts", "--skip-bad")
    assert status == 0
    assert "1 added" in out
    assert err.count("row skipped") == 2


def test_what_can_not_be_mapped_or_taken(command, tmp_path):
    (tmp_path / "sheet.csv").write_text(SHEET)
    (tmp_path / "empty").write_text("")
    assert "empty" in command.refused("catalogue", "map", "empty")
    assert "nowhere" in command.refused("catalogue", "map", "nowhere")
    assert "row 7" in command.refused("catalogue", "map", "sheet.csv", "--heading", "7")
    assert "nowhere" in command.refused("catalogue", "take", "sheet.csv", "nowhere", "parts")
    assert "the map is empty" in command.refused("catalogue", "take", "sheet.csv", "empty", "parts")


def test_several_folders(command, tmp_path):
    shutil.copytree(command.demo, tmp_path / "works")
    (tmp_path / "more").mkdir()
    lenses = (command.demo / "lenses.csv").read_text(encoding="utf-8").splitlines()
    (tmp_path / "more" / "lenses.csv").write_text("\n".join([lenses[0], "other-" + lenses[1]]), encoding="utf-8")
    folders = ("--catalogue", "works", "--catalogue", "more")
    status, out, _ = command("rank", command.jar_lids, *folders, "--format", "json", "--top", "1")
    assert status == 0
    assert json.loads(out)["catalogue"]["lenses"] == command.rows("lenses") + 1
    (tmp_path / "more" / "lenses.csv").write_text("\n".join(lenses[:2]), encoding="utf-8")
    err = command.refused("rank", command.jar_lids, *folders)
    assert "more/lenses.csv:2 [id]" in err
    assert "works/lenses.csv:2 already" in err
    assert command.refused("catalogue", "check", "works", "more") == err
