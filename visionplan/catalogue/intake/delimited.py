"""CSV files of any delimiter and encoding."""

import codecs
import csv
import io
import re
from collections import Counter
from collections.abc import Iterator
from itertools import islice

from visionplan.catalogue.intake.sheet import MOST_COLUMNS, SHEET, Row, Sheet
from visionplan.faults import Fault, InputError
from visionplan.text import quoted

DELIMITERS = ",;\t|"
_SAMPLE = 200
_DECLARED = re.compile(r"sep=(.)\r?\n", re.IGNORECASE)
_MARKS = (
    (codecs.BOM_UTF8, "utf-8-sig"),
    (codecs.BOM_UTF32_LE, "utf-32"),
    (codecs.BOM_UTF32_BE, "utf-32"),
    (codecs.BOM_UTF16_LE, "utf-16"),
    (codecs.BOM_UTF16_BE, "utf-16"),
)
_WORDS = {
    "windows-1252": "is not UTF-8, so it is read as windows-1252, usual in western Europe and America",
    "cp850": "is neither UTF-8 nor windows-1252, so it is read as cp850, of old DOS programs",
}


def read_delimited(path: str, data: bytes, encoding: str = "", delimiter: str = "") -> Sheet:
    """Open a CSV file.

    Raises
    ------
    InputError
        No text, or no text in the encoding that is given.
    """
    found = encoding or find_encoding(path, data)
    text = _decoded(path, data, found)
    declared = _DECLARED.match(text)
    if declared:
        text = "\n" + text[declared.end() :]  # the line still counts
    if not text.strip():
        raise InputError([Fault(path, "the file is empty", SHEET)])
    delimiter = delimiter or (declared[1] if declared else find_delimiter(text))
    told = f"{_WORDS[found]}; --encoding names another" if not encoding and found in _WORDS else ""
    return Sheet(path, lambda: _rows(path, text, delimiter), delimiter, found, told=told)


def find_encoding(path: str, data: bytes) -> str:
    """Tell the encoding from a byte order mark, else by trying.

    Raises
    ------
    InputError
        Where it is no text.
    """
    for mark, name in _MARKS:
        if data.startswith(mark):
            return name
    start = data[:4096]
    if b"\0" in start:
        for name, zeros in (("utf-16-le", start[1::2]), ("utf-16-be", start[::2])):
            if zeros.count(0) > 0.7 * len(zeros) and start.count(0) < 1.3 * zeros.count(0):
                return name
    if b"\0" in data or sum(byte < 32 and byte not in b"\t\n\r\f\x1b" for byte in start) > 0.02 * len(start):
        raise InputError([Fault(path, "is no text", SHEET)])
    for name in ("utf-8", "windows-1252"):
        try:
            data.decode(name)
        except UnicodeDecodeError:
            continue
        return name
    return "cp850"


def _decoded(path: str, data: bytes, encoding: str) -> str:
    try:
        return data.decode(encoding).removeprefix("\ufeff")
    except LookupError:
        found = f"{quoted(encoding)} is no encoding that is known"
        raise InputError([Fault(path, found, "such as utf-8, utf-16, windows-1252 or iso-8859-15")]) from None
    except UnicodeError as error:
        line = data.count(b"\n", 0, getattr(error, "start", 0)) + 1
        raise InputError(
            [Fault(path, f"the file is not {encoding}", "the encoding that it was saved in", line)]
        ) from None


def find_delimiter(text: str) -> str:
    """Choose what parts most rows into equally many cells, more than one."""
    best, chosen = (0.0, 0), ","
    for delimiter in DELIMITERS:
        reader = csv.reader(io.StringIO(text, newline=""), delimiter=delimiter, skipinitialspace=True)
        try:
            counts = Counter(len(row) for row in islice(reader, _SAMPLE) if any(map(str.strip, row)))
        except csv.Error:
            continue
        if not counts:
            continue
        cells, rows = max(counts.items(), key=lambda pair: (pair[0] > 1, pair[1], pair[0]))
        score = (round(rows / counts.total(), 1), cells)
        if cells > 1 and score > best:
            best, chosen = score, delimiter
    return chosen


def _rows(path: str, text: str, delimiter: str) -> Iterator[Row]:
    csv.field_size_limit(2**31 - 1)
    source = io.StringIO(text, newline="")
    reader = csv.reader(source, delimiter=delimiter, strict=True, skipinitialspace=delimiter != " ")
    line = 1
    try:
        for cells in reader:
            if any(map(str.strip, cells)):
                yield Row(line, cells[:MOST_COLUMNS] if len(cells) > MOST_COLUMNS else cells)
            line = reader.line_num + 1
    except csv.Error:
        found = "from here on cells can't be told apart: one begins with a quotation mark that does not close it"
        expected = "quotation marks around the whole cell, doubled within"
        raise InputError([Fault(path, found, expected, line)]) from None
