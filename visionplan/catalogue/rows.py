"""The rows of a CSV file with the lines where they begin, a few hundred at a time."""

import codecs
import csv
import io
import re
from collections.abc import Iterator
from itertools import islice
from typing import TypeAlias

from visionplan.catalogue.ledger import Ledger

CHUNK = 256
"""Rows whose cells stay in a processor's cache until they are read; memory grows with what is kept, not with cells."""
_BLOCK = 1 << 20
Chunk: TypeAlias = tuple[list[list[str]], list[int]]
"""Rows, and the lines where they begin."""
_NOT_UTF8 = re.compile("[\udc80-\udcff]")
_UTF16 = (b"\xff\xfe", b"\xfe\xff")


def read_rows(data: bytes, ledger: Ledger) -> Iterator[Chunk]:
    """Split comma-separated UTF-8 text, with or without a byte order mark, into rows that are not blank.

    The ledger has the rows with quotation marks astray, which are left out, and those with NUL or with bytes that are
    not UTF-8, which come with U+FFFD instead.
    """
    if data.startswith(_UTF16):
        ledger.of_file("the file is UTF-16", 'UTF-8 text (a sheet saved as "CSV UTF-8")')
        return
    csv.field_size_limit(2**31 - 1)
    suspect = b"\0" in data or not _is_utf8(data)
    text = io.TextIOWrapper(io.BytesIO(data), "utf-8-sig", errors="surrogateescape", newline="")
    reader = csv.reader(text, strict=True, skipinitialspace=True)
    more = True
    while more:
        rows: list[list[str]] = []
        starts = [reader.line_num + 1]
        try:
            for row in islice(reader, CHUNK):
                rows.append(row)
                starts.append(reader.line_num + 1)
            more = len(rows) == CHUNK
        except csv.Error:
            where = f"in line {starts[-1]}" if starts[-1] >= reader.line_num else f"from line {starts[-1]} on"
            found = f"a cell {where} begins with a quotation mark that does not close it"
            ledger.of_row(starts[-1], found, "quotation marks around the whole cell, doubled within")
        if suspect:
            rows = [_readable(row, line, ledger) for row, line in zip(rows, starts)]
        if not all(map(any, rows)):
            stated = [at for at, row in enumerate(rows) if any(map(str.strip, row))]
            rows, starts = [rows[at] for at in stated], [starts[at] for at in stated]
        yield rows, starts[: len(rows)]


def _is_utf8(data: bytes) -> bool:
    decoder = codecs.getincrementaldecoder("utf-8")()
    try:
        for at in range(0, len(data), _BLOCK):
            decoder.decode(data[at : at + _BLOCK], final=at + _BLOCK >= len(data))
    except UnicodeDecodeError:
        return False
    return True


def _readable(row: list[str], line: int, ledger: Ledger) -> list[str]:
    text = "".join(row)
    if "\0" in text:
        ledger.of_row(line, "a NUL byte stands here", "text")
    if _NOT_UTF8.search(text):
        ledger.of_row(line, "bytes that are not UTF-8 stand here", 'UTF-8 text (a sheet saved as "CSV UTF-8")')
    return [_NOT_UTF8.sub("\ufffd", cell.replace("\0", "\ufffd")) for cell in row]
