"""Workbooks, written by openpyxl: cells of every kind, and their addresses."""

import datetime
import re
import sys
import zipfile

import pytest

from tests.catalogue.intake.conftest import LENSES, MAP
from visionplan.catalogue.intake.sheet import letters, read_sheets
from visionplan.faults import InputError

TYPED = [LENSES[0], ["A16", "C", 16, "1,4 - 16", 0.1, 1234.5, 5], ["A25", "CS", 25, "1,8 - 22", 0.15, 399, "-"]]


def patched(path, change):
    """The same workbook with the text of its first worksheet changed."""
    with zipfile.ZipFile(path) as archive:
        parts = {name: archive.read(name) for name in archive.namelist()}
    name = "xl/worksheets/sheet1.xml"
    before = parts[name]
    parts[name] = change(before)
    assert parts[name] != before
    with zipfile.ZipFile(path, "w") as archive:
        for part, data in parts.items():
            archive.writestr(part, data)
    return path


def test_numbers_are_numbers_whatever_the_decimal_sign(intake):
    ((merged,), _) = intake.take(intake.workbook(TYPED))
    assert merged.added == ["A16", "A25"]
    lenses = intake.lenses()
    assert lenses["focal length"].tolist() == [16, 25]
    assert lenses["f-number min"].tolist() == [1.4, 1.8]
    assert lenses["nearest object"].tolist() == [100, 150]
    assert lenses["price"].tolist() == [1234.5, 399]


def test_faults_carry_the_address_of_their_cell(intake):
    rows = [TYPED[0], ["A16", "C", -16, "1,4 - 16", 0.1, "?", 5], ["A16", None, 25, "1,8", "far", 399, 1.5]]
    faults = intake.refused(intake.workbook([["our prices"], *rows]), MAP.replace("[lenses]", "[lenses]\nheading = 2"))
    assert [(fault.line, fault.column.split()[0]) for fault in faults if fault.line == 3] == [(3, "C3"), (3, "F3")]
    assert {fault.column for fault in faults if fault.line == 4} == {
        "A4 Artikel",
        "B4 Fassung",
        "D4 Blende",
        "E4 MOD [m]",
        "G4 Bestand",
    }
    assert all("sheet.xlsx (Linsen)" in fault.file for fault in faults)


def test_percent_cells(intake):
    def work(sheet):
        for row in (2, 3):
            sheet.cell(row, 8, -0.015).number_format = "0.0 %"

    rows = [[*LENSES[0], "Verzeichnung"], *TYPED[1:]]
    intake.take(intake.workbook(rows, work), MAP + '"Verzeichnung" = { is = "distortion", unit = "%" }\n')
    assert intake.lenses()["distortion"].tolist() == pytest.approx([-0.015, -0.015])


def test_a_formula_without_its_result(intake):
    rows = [*TYPED[:2], ["A25", "CS", "=20+5", "1,8 - 22", 0.15, 399, 1]]
    (fault,) = intake.refused(intake.workbook(rows))
    assert fault.column == "C3 Brennweite (mm)"
    assert "formula" in fault.found


def test_a_formula_with_its_result(intake):
    rows = [*TYPED[:2], ["A25", "CS", "=20+5", "1,8 - 22", 0.15, 399, 1]]
    path = patched(
        intake.workbook(rows), lambda xml: re.sub(rb"<f>20\+5</f><v ?/?>(</v>)?", b"<f>20+5</f><v>25</v>", xml)
    )
    intake.take(path)
    assert intake.lenses()["focal length"].tolist() == [16, 25]


def test_text_that_looks_like_a_formula(intake):
    def work(sheet):
        sheet["A2"].value = "=A1"
        sheet["A2"].data_type = "s"

    ((merged,), _) = intake.take(intake.workbook(TYPED, work))
    assert merged.added[0] == "'=A1"


def test_merged_cells(intake):
    def work(sheet):
        sheet.merge_cells("B2:B3")

    (fault,) = intake.refused(intake.workbook(TYPED, work))
    assert (fault.line, fault.column, fault.found) == (3, "B3 Fassung", "the cell is merged with B2")


def test_a_merged_title_and_blank_merged_rows_do_no_harm(intake):
    def work(sheet):
        sheet.merge_cells("A1:G1")
        sheet.merge_cells("A5:G5")

    map = MAP.replace("[lenses]", "[lenses]\nheading = 2")
    ((merged,), _) = intake.take(intake.workbook([["our prices"], *TYPED], work), map)
    assert merged.added == ["A16", "A25"]


@pytest.mark.parametrize(
    ("value", "found"),
    [(datetime.date(2024, 2, 8), "date"), (datetime.time(4, 2), "date or time"), ("#N/A", "'#N/A'"), (True, "TRUE")],
)
def test_cells_of_other_kinds(intake, value, found):
    (fault,) = intake.refused(intake.workbook([TYPED[0], ["A16", "C", 16, "1,4 - 16", 0.1, 1, value]]))
    assert fault.column == "G2 Bestand"
    assert found in fault.found


def test_the_worksheet_that_the_map_names(intake):
    path = intake.workbook([["notes"]], Zweite=TYPED)
    (fault,) = intake.refused(path, MAP.replace("[lenses]", '[lenses]\nworksheet = "Dritte"'))
    assert "'Dritte'" in fault.found
    assert "'Linsen', 'Zweite'" in fault.expected
    ((merged,), _) = intake.take(path, MAP.replace("[lenses]", '[lenses]\nworksheet = "Zweite"'))
    assert merged.added == ["A16", "A25"]


def test_two_items_of_one_workbook_are_taken_together_or_not_at_all(intake):
    cameras = [["Name", "Mount", "W", "H", "Pitch"], ["K1", "C", 2448, 2048, 3.45]]
    map = (
        MAP
        + """
[cameras]
worksheet = "Kameras"
[cameras.columns]
Name = "id"
Mount = "mount"
W = "pixels wide"
H = "pixels high"
Pitch = { is = "pixel pitch", unit = "µm" }
"""
    )
    wrong = [*cameras, ["K2", "C", 2448, 0, 3.45]]
    (fault,) = intake.refused(intake.workbook(TYPED, Kameras=wrong), map)
    assert fault.column == "D3 H"
    merged, _ = intake.take(intake.workbook(TYPED, Kameras=cameras), map)
    assert [len(one.added) for one in merged] == [2, 1]
    assert set(intake.files()) == {"lenses.csv", "cameras.csv"}


def test_a_broken_workbook(intake):
    def fault(path):
        (found,) = intake.refused(path)
        return found.found

    assert "broken" in fault(patched(intake.workbook(TYPED), lambda xml: xml[: len(xml) // 2]))
    assert "broken" in fault(patched(intake.workbook(TYPED), lambda xml: b"nothing"))


def test_a_workbook_that_unpacks_to_very_much(intake, monkeypatch):
    monkeypatch.setattr("visionplan.catalogue.intake.workbook._MOST_BYTES", 1000)
    (fault,) = intake.refused(intake.workbook(TYPED))
    assert "unpacks" in fault.found


def test_cells_far_out(intake):
    def work(sheet):
        sheet["XFD9"] = "x"
        sheet["A20000"] = "A50"

    faults = intake.refused(intake.workbook(TYPED, work), MAP)
    assert {fault.line for fault in faults} == {20000}
    assert "B20000 Fassung" in {fault.column for fault in faults}


def test_openpyxl_is_not_installed(intake, monkeypatch):
    path = intake.workbook(TYPED)
    monkeypatch.setitem(sys.modules, "openpyxl", None)
    (fault,) = intake.refused(path)
    assert "openpyxl" in fault.found
    assert "visionplan[xlsx]" in fault.expected


def test_letters_are_the_workbook_s():
    from openpyxl.utils import get_column_letter

    assert [letters(at) for at in range(1000)] == [get_column_letter(at + 1) for at in range(1000)]


def test_reading_raises_input_errors_alone(intake):
    with pytest.raises(InputError):
        read_sheets(intake.sheet(b"PK\x03\x04"))
