"""CSV files of any delimiter and encoding, and files that are none."""

import random
import zipfile

import pytest

from tests.catalogue.intake.conftest import LENSES, csv_bytes
from visionplan.catalogue.intake.sheet import read_sheets
from visionplan.faults import InputError

ROWS = [["Größe", "Maß"], ["5 µm", "ß"], ["é", "Ø"]]


def read(intake, data, **how):
    (sheet,) = read_sheets(intake.sheet(data), **how)
    return sheet, [row.cells for row in sheet.rows()]


def fault(path, **how):
    with pytest.raises(InputError) as error:
        _ = [list(sheet.rows()) for sheet in read_sheets(path, **how)]
    (found,) = error.value.faults
    return found


@pytest.mark.parametrize(
    "encoding",
    ["utf-8", "utf-8-sig", "utf-16", "utf-16-le", "utf-16-be", "utf-32", "windows-1252"],
)
def test_encodings_found_out(intake, encoding):
    sheet, rows = read(intake, csv_bytes(ROWS, encoding=encoding))
    assert rows == ROWS
    assert bool(sheet.told) == (encoding == "windows-1252")


def test_an_old_dos_page_is_said(intake):
    sheet, rows = read(intake, csv_bytes([["Länge", "Hülse"], ["1", "2"]], encoding="cp850"))
    assert rows[0] == ["Länge", "Hülse"]
    assert "cp850" in sheet.told


@pytest.mark.parametrize("encoding", ["windows-1250", "iso-8859-5", "shift_jis", "gb18030", "mac-roman"])
def test_encodings_that_are_given(intake, encoding):
    word = {"windows-1250": "průměr", "iso-8859-5": "длина", "mac-roman": "Länge"}.get(encoding, "長")
    sheet, rows = read(intake, csv_bytes([["id", word], ["1", "2"]], encoding=encoding), encoding=encoding)
    assert rows[0] == ["id", word]
    assert not sheet.told


@pytest.mark.parametrize("delimiter", [",", ";", "\t", "|"])
def test_delimiters_found_out(intake, delimiter):
    sheet, rows = read(intake, csv_bytes([["prices, of 1 June; for all"], *LENSES], delimiter))
    assert sheet.delimiter == delimiter
    assert rows[1:] == LENSES


def test_the_delimiter_that_the_file_names(intake):
    sheet, rows = read(intake, b"sep=^\r\na^b\r\n1,0^2,0\r\n")
    assert (sheet.delimiter, rows) == ("^", [["a", "b"], ["1,0", "2,0"]])
    assert [row.number for row in sheet.rows()] == [2, 3]


def test_lines_are_counted_through_breaks_and_blank_rows(intake):
    sheet, rows = read(intake, b'a;b\n\n"x\ny";1\n;\nz;2\n')
    assert [row.number for row in sheet.rows()] == [1, 3, 6]
    assert rows[1] == ["x\ny", "1"]


@pytest.mark.parametrize("data", [b"", b"\xef\xbb\xbf", b"\n \n", b"\xff\xfe"])
def test_empty(intake, data):
    assert "empty" in fault(intake.sheet(data)).found


def test_missing(intake):
    assert "can't be read" in fault(str(intake.folder / "nowhere.csv")).found
    assert "can't be read" in fault(str(intake.folder)).found
    assert "name" in fault("a\0b").found


@pytest.mark.parametrize(
    "data",
    [b"\x89PNG\r\n\x1a\n\0\0\0\rIHDR", bytes(range(256)) * 20, random.Random(5).randbytes(5000)],
    ids=["picture", "bytes", "noise"],
)
def test_binary(intake, data):
    assert "no text" in fault(intake.sheet(data)).found


def test_an_old_workbook(intake):
    assert "old binary kind" in fault(intake.sheet(b"\xd0\xcf\x11\xe0\xa1\xb1\x1a\xe1" + bytes(600))).found


def test_an_archive_that_is_no_workbook(intake):
    path = intake.folder / "sheet.xlsx"
    with zipfile.ZipFile(path, "w") as archive:
        archive.writestr("readme.txt", "x")
    assert "no XLSX workbook" in fault(str(path)).found
    path.write_bytes(b"PK\x03\x04" + bytes(100))
    assert "broken" in fault(str(path)).found


def test_another_encoding_than_given(intake):
    found = fault(intake.sheet(b"id;b\n1;\xe4\n"), encoding="utf-8")
    assert (found.line, found.found) == (2, "the file is not utf-8")
    assert "no encoding" in fault(intake.sheet(b"id;b\n"), encoding="klingon").found
    assert "no encoding" in fault(intake.sheet(b"id;b\n"), encoding="rot13").found


def test_a_quotation_mark_that_does_not_close(intake):
    found = fault(intake.sheet(b'id;b\n1;2\n"x" y;2\n3;4\n'))
    assert found.line == 3
    assert "quotation mark" in found.found
