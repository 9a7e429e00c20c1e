"""Taking a sheet in: what is added, updated, kept and refused."""

import csv
import os
import resource
import subprocess
import sys
from pathlib import Path

import pytest

import visionplan
from tests.catalogue.intake.conftest import LENSES, MAP, csv_bytes
from visionplan.catalogue.folder import read_catalogue


def changed(column, value, row=1):
    """The sheet with another cell."""
    rows = [list(row) for row in LENSES]
    rows[row][LENSES[0].index(column)] = value
    return rows


def test_a_new_catalogue(intake):
    ((merged,), faults) = intake.take(intake.sheet())
    assert (merged.added, merged.updated, merged.kept, faults) == (["A16", "A25"], [], [], ())
    lenses = intake.lenses()
    assert lenses["id"] == ["A16", "A25"]
    assert lenses["mount"] == ["C", "CS"]
    assert lenses["focal length"].tolist() == [16, 25]
    assert lenses["f-number min"].tolist() == [1.4, 1.8]
    assert lenses["f-number max"].tolist() == [16, 22]
    assert lenses["nearest object"].tolist() == [100, 150]
    assert lenses["price"].tolist() == [1234.5, 399]
    assert lenses["stock"][0] == 5
    assert lenses["stock"][1] != lenses["stock"][1]
    assert lenses.currency == "EUR"


def test_the_same_sheet_again_changes_nothing(intake):
    intake.take(intake.sheet())
    before, status = intake.files(), os.stat(intake.parts / "lenses.csv")
    ((merged,), _) = intake.take(intake.sheet())
    assert (merged.added, merged.updated, merged.kept, merged.same) == ([], [], [], 2)
    assert intake.files() == before
    assert os.stat(intake.parts / "lenses.csv").st_mtime_ns == status.st_mtime_ns


def test_prices_and_stock_follow_the_sheet(intake):
    intake.take(intake.sheet())
    rows = changed("Preis [EUR]", "1.299,00")
    rows[2][-1] = "7"
    rows.append(["A50", "C", "50", "2,8 - 22", "0,4", "800", "1"])
    ((merged,), _) = intake.take(intake.sheet(rows))
    assert [(c.id, c.column, c.before, c.after) for c in merged.updated] == [
        ("A16", "price", "1234.50", "1299.00"),
        ("A25", "stock", "", "7"),
    ]
    assert (merged.added, merged.same, merged.absent) == (["A50"], 0, 0)
    lenses = intake.lenses()
    assert lenses["id"] == ["A16", "A25", "A50"]
    assert lenses["price"].tolist() == [1299, 399, 800]
    assert lenses["stock"].tolist() == [5, 7, 1]


def test_other_differences_are_told_and_left(intake):
    intake.take(intake.sheet())
    sheet = intake.sheet(changed("MOD [m]", "0,2"))
    ((merged,), _) = intake.take(sheet)
    assert [(c.id, c.column, c.before, c.after) for c in merged.kept] == [("A16", "nearest object", "0.1", "0.2")]
    assert intake.lenses()["nearest object"].tolist() == [100, 150]
    ((merged,), _) = intake.take(sheet, everything=True)
    assert [c.column for c in merged.updated] == ["nearest object"]
    assert intake.lenses()["nearest object"].tolist() == [200, 150]


def test_what_the_sheet_leaves_out_stays(intake):
    intake.take(intake.sheet())
    ((merged,), _) = intake.take(intake.sheet([LENSES[0], *changed("Preis [EUR]", "-")[1:2]]), everything=True)
    assert (merged.same, merged.absent) == (1, 1)
    assert intake.lenses()["price"].tolist() == [1234.5, 399]


OURS = """\
shelf,nearest object [mm],id,mount,focal length [in],f-number min,f-number max,mass
A7,100,A16,C,0.62992125984251968,1.4,16,120 g
"""


def test_into_a_file_with_other_columns_and_units(intake):
    intake.parts.mkdir()
    (intake.parts / "lenses.csv").write_text(OURS)
    ((merged,), _) = intake.take(intake.sheet())
    assert merged.added == ["A25"]
    assert [(c.column, c.before, c.after) for c in merged.updated] == [("price", "", "1234.50"), ("stock", "", "5")]
    with (intake.parts / "lenses.csv").open(newline="") as file:
        first, second = csv.DictReader(file)
    assert [first[column] for column in ("shelf", "mass", "focal length [in]")] == [
        "A7",
        "120 g",
        "0.62992125984251968",
    ]
    assert [second[column] for column in ("shelf", "mass", "nearest object [mm]")] == ["", "", "150"]
    lenses = intake.lenses()
    assert lenses["focal length"].tolist() == pytest.approx([16, 25])
    assert lenses["price"].tolist() == [1234.5, 399]


def test_a_fraction_into_a_file_in_percent(intake):
    top, *rows = LENSES
    first = csv_bytes([[*top, "Verzeichnung"], *([*row, "-1,5 %"] for row in rows)])
    line = '"Verzeichnung" = { is = "distortion", unit = "%" }\n'
    intake.take(intake.sheet(first), MAP + line)
    again = csv_bytes([[*top, "Verzeichnung"], *([*row, "-0,02"] for row in rows)])
    intake.take(intake.sheet(again), MAP + '"Verzeichnung" = "distortion"\n', everything=True)
    assert intake.lenses()["distortion"].tolist() == pytest.approx([-0.02, -0.02])


def test_factor_words_and_fixed_cells(intake):
    text = """\
[cameras]
fixed = { mount = "C", "pixel pitch" = "3,45 µm" }
decimal = "."
[cameras.columns]
"Model" = "id"
"Size" = ["pixels wide", "pixels high"]
"Chip" = { is = "colour", words = { Farbe = "colour", "s/w" = "mono" } }
"Cost" = { is = "price", unit = "USD", factor = 1.5 }
"""
    rows = [
        ["Model", "Size", "Chip", "Cost"],
        ["K1", "2448 (H) x 2048 (V)", "s/w", "100"],
        ["K2", "640×480", "FARBE", "7"],
    ]
    sheet = intake.sheet(rows)
    (fault,) = intake.refused(sheet, text)
    assert (fault.file.endswith("map.toml"), fault.column) == (True, "cameras.fixed.pixel pitch")
    assert "length such as" in fault.expected
    intake.take(sheet, text.replace("3,45", "3.45"))
    (intake.parts / "lenses.csv").write_text(
        "id,mount,focal length [mm],f-number min,f-number max,nearest object [mm]\nL,C,16,2,8,99\n"
    )
    cameras = read_catalogue(intake.parts).cameras
    assert cameras["pixels wide"].tolist() == [2448, 640]
    assert cameras["pixels high"].tolist() == [2048, 480]
    assert cameras["colour"] == ["mono", "colour"]
    assert cameras["price"].tolist() == [150, 10.5]
    assert cameras["pixel pitch"].tolist() == pytest.approx([0.00345, 0.00345], rel=1e-14)


def test_every_row_at_fault_is_listed_with_line_and_heading(intake):
    rows = [*LENSES, [], ["A16", "C", "-16", "1,4", "0.1", "USD 5", "x"], ["", "C", "16", "1,4-16", "0,1", "5", "1"]]
    sheet = intake.sheet(rows)
    faults = intake.refused(sheet)
    assert {(fault.line, fault.column) for fault in faults} == {
        (5, "Artikel"),
        (5, "Brennweite (mm)"),
        (5, "Blende"),
        (5, "MOD [m]"),
        (5, "Preis [EUR]"),
        (5, "Bestand"),
        (6, "Artikel"),
    }
    assert "line 2" in next(fault.found for fault in faults if (fault.line, fault.column) == (5, "Artikel"))
    assert all(fault.file == sheet for fault in faults)
    ((merged,), skipped) = intake.take(sheet, skip_bad=True)
    assert merged.added == ["A16", "A25"]
    assert set(skipped) == set(faults)


def test_no_good_row_at_all(intake):
    faults = intake.refused(intake.sheet([*LENSES[:1], ["A1", "C", "?", "1", "1", "1", "1"]]), skip_bad=True)
    assert {fault.line for fault in faults} == {2}
    assert "no row" in intake.refused(intake.sheet(LENSES[:1]))[0].found


def test_a_row_longer_than_the_heading(intake):
    (fault,) = intake.refused(intake.sheet([*LENSES, [*LENSES[1], "more"]]))
    assert (fault.line, fault.expected) == (4, "7 cells")


def test_two_headings_alike(intake):
    rows = [[*row, cell] for row, cell in zip(LENSES, ("Bestand", "8", "9"))]
    (fault,) = intake.refused(intake.sheet(rows))
    assert "several columns" in fault.found
    assert "'Bestand (column 7)' or 'Bestand (column 8)'" in fault.expected
    intake.take(intake.sheet(rows), MAP.replace('"Bestand"', '"Bestand (column 8)"'))
    assert intake.lenses()["stock"].tolist() == [8, 9]


def test_a_heading_that_is_not_there(intake):
    (fault,) = intake.refused(intake.sheet(), MAP.replace('"Bestand"', '"Bestände"'))
    assert "'Bestände'" in fault.found
    assert "is 'Bestand' meant?" in fault.found
    (fault,) = intake.refused(intake.sheet(), MAP.replace("[lenses]", "[lenses]\nheading = 9"))
    assert "row 9" in fault.found


def test_a_column_that_must_be_there(intake):
    (fault,) = intake.refused(intake.sheet(), MAP.replace('"Fassung" = "mount"\n', ""))
    assert fault.file.endswith("map.toml")
    assert "'mount'" in fault.found
    intake.take(
        intake.sheet(),
        MAP.replace('"Fassung" = "mount"\n', "").replace("[lenses]", '[lenses]\nfixed = {mount = "F"}', 1),
    )
    assert intake.lenses()["mount"] == ["F", "F"]


def test_the_file_in_the_folder_has_faults(intake):
    intake.parts.mkdir()
    (intake.parts / "lenses.csv").write_text(OURS.replace("A7,100", "A7,-100"))
    (fault,) = intake.refused(intake.sheet())
    assert (fault.file, fault.line) == (str(intake.parts / "lenses.csv"), 2)


def test_update_that_would_spoil_a_row(intake):
    intake.take(intake.sheet())
    text = "\n".join(line for line in MAP.splitlines() if "MOD" not in line and "Blende" not in line)
    text += '\n"Blende" = "f-number min"\n"MOD [m]" = "nearest object"\n"Offen" = "f-number max"\n'
    rows = [[*row, more] for row, more in zip(changed("Blende", "20"), ("Offen", "32", "22"))]
    rows[1][4], rows[2][3], rows[2][4] = "0,1 m", "2", "0,15 m"
    partly = text.replace('"Offen" = "f-number max"\n', "").replace(
        "[lenses]", '[lenses]\nfixed = {"f-number max" = "32"}'
    )
    intake.take(intake.sheet(rows), text)
    (intake.parts / "lenses.csv").write_text(
        (intake.parts / "lenses.csv")
        .read_text()
        .replace("nearest object [m]", "nearest object [m],front principal [mm]")
        .replace(",0.1,", ",0.1,-83.5,")
        .replace(",0.15,", ",0.15,,")
    )
    rows[1][4] = "99 mm"
    (fault,) = intake.refused(intake.sheet(rows), partly, everything=True)
    assert "with the sheet's cells" in fault.found


def test_currencies(intake):
    intake.take(intake.sheet())
    (fault,) = intake.refused(intake.sheet(), MAP.replace('"EUR"', '"USD"'))
    assert "EUR" in fault.found
    rows = [["Ref", "Gewinde", "Dicke", "Cost"], ["R5", "C", "5", "3"]]
    spacers = """\
[spacers.columns]
Ref = "id"
Gewinde = "mount"
Dicke = { is = "length", unit = "mm" }
Cost = { is = "price", unit = "USD" }
"""
    (fault,) = intake.refused(intake.sheet(rows), spacers)
    assert "one currency" in fault.expected


def test_hidden_escape_sequences(intake):
    rows = changed("Artikel", "A\x1b[31m16\u202e")
    rows[0] = ["Arti\x1bkel", *LENSES[0][1:]]
    ((merged,), _) = intake.take(intake.sheet(rows), MAP.replace('"Artikel"', '"Arti␛kel"'))
    assert merged.added == ["A␛[31m16\ufffd", "A25"]
    assert b"\x1b" not in intake.files()["lenses.csv"]
    faults = intake.refused(intake.sheet(changed("Bestand", "\x1b]0;x\x07")))
    assert all(character.isprintable() for character in str(faults[0]))


def test_no_formula_comes_in(intake):
    rows = changed("Artikel", "=1+1")
    ((merged,), _) = intake.take(intake.sheet(rows))
    assert merged.added[0] == "'=1+1"
    ((merged,), _) = intake.take(intake.sheet(rows))
    assert merged.same == 2


def test_a_hundred_thousand_rows(intake):
    rows = [LENSES[0], *([f"A{k}", "C", str(5 + k % 95), "1,4 - 16", "0,5", str(k), "1"] for k in range(100_000))]
    ((merged,), _) = intake.take(intake.sheet(rows))
    assert len(merged.added) == 100_000
    assert intake.lenses()["price"].tolist() == list(range(100_000))


@pytest.mark.skipif(not os.path.isdir("/proc/self"), reason="needs a folder that not even root can write to")
def test_a_folder_that_can_not_be_written_to(intake):
    intake.parts = Path("/proc/self/task")
    (fault,) = intake.refused(intake.sheet())
    assert "nothing was" in fault.found
    intake.parts = Path("/proc/nowhere")
    (fault,) = intake.refused(intake.sheet())
    assert "nothing was" in fault.found


@pytest.mark.skipif(os.name != "posix", reason="needs a limit on the size of files")
def test_a_full_disk(intake):
    intake.take(intake.sheet())
    before = intake.files()
    rows = [LENSES[0], *([f"B{k}", "C", "16", "1,4-16", "0,1", "5", "1"] for k in range(500))]
    code = (
        "import resource, signal, sys; signal.signal(signal.SIGXFSZ, signal.SIG_IGN);"
        "resource.setrlimit(resource.RLIMIT_FSIZE, (4096, resource.RLIM_INFINITY));"
        "from visionplan.cli import run; sys.exit(run(sys.argv[1:]))"
    )
    arguments = ["catalogue", "take", intake.sheet(rows), intake.map(), str(intake.parts)]
    env = os.environ | {"PYTHONPATH": str(Path(visionplan.__file__).parents[1]), "PYTHONDONTWRITEBYTECODE": "1"}
    done = subprocess.run(
        [sys.executable, "-c", code, *arguments], env=env, capture_output=True, text=True, check=False
    )
    assert resource.getrlimit(resource.RLIMIT_FSIZE)[0] != 4096
    assert done.returncode == 2
    assert "can't be written, and nothing was" in done.stderr
    assert intake.files() == before
