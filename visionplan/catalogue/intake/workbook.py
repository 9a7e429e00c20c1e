"""XLSX workbooks, read by openpyxl, which is loaded when the first of them is opened."""

import io
import re
import warnings
import zipfile
from collections import defaultdict
from collections.abc import Iterator
from datetime import date, time, timedelta
from itertools import islice
from typing import Any

from visionplan.catalogue.intake.sheet import MOST_COLUMNS, SHEET, Figure, Row, Sheet, letters
from visionplan.faults import Fault, InputError
from visionplan.text import clean, quoted

_MOST_BYTES = 2**30
_MOST_MERGED = 2**21
_BLOCK, _OVERLAP = 2**20, 256
_MERGED = re.compile(rb'<(?:\w+:)?mergeCell\s[^<>]{0,100}?ref="([A-Z]{1,3})(\d{1,7}):([A-Z]{1,3})(\d{1,7})"')
_PLAIN = "a number or text, typed or pasted as values"


def read_workbook(path: str, data: bytes) -> list[Sheet]:
    """Open the worksheets of a workbook.

    Raises
    ------
    InputError
        Where it is no workbook, or openpyxl is not installed.
    """
    try:
        archive = zipfile.ZipFile(io.BytesIO(data))
        if "xl/workbook.xml" not in archive.namelist():
            raise InputError([Fault(path, "is no XLSX workbook", SHEET)])
        if sum(part.file_size for part in archive.infolist()) > _MOST_BYTES:
            raise InputError([Fault(path, "unpacks to more than 1 GiB", "a sheet of a sensible size")])
    except zipfile.BadZipFile:
        raise InputError([Fault(path, "is broken: it can't be unpacked", SHEET)]) from None
    book = _open(path, data, data_only=False)
    if not book.worksheets:
        raise InputError([Fault(path, "has no worksheet", SHEET)])
    return [
        Sheet(f"{path} ({clean(sheet.title)})", _Rows(path, data, sheet), worksheet=sheet.title)
        for sheet in book.worksheets
    ]


def _open(path: str, data: bytes, data_only: bool) -> Any:
    try:
        from openpyxl import load_workbook
    except ImportError:
        expected = "pip install 'visionplan[xlsx]', or the sheet saved as CSV"
        raise InputError([Fault(path, "is a workbook, and openpyxl, which reads them, is missing", expected)]) from None
    try:
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")  # of features that have nothing to do with what the cells hold
            return load_workbook(io.BytesIO(data), read_only=True, data_only=data_only)
    except Exception:  # a broken workbook makes it raise anything, from KeyError to its own
        raise InputError([Fault(path, "is broken: the workbook can't be read", SHEET)]) from None


class _Rows:
    """Reads a worksheet each time it is called; the results of formulas only where there are any."""

    def __init__(self, path: str, data: bytes, sheet: Any):
        self._path, self._data, self._sheet = path, data, sheet

    def __call__(self) -> Iterator[Row]:
        number, results = 0, None
        merged = self._merged()
        try:
            for number, cells in enumerate(self._cells(self._sheet), 1):
                if results is not None:
                    values = next(results)
                elif any(cell.data_type == "f" for cell in cells if cell.value is not None):
                    results = islice(self._cells(self._twin()), number - 1, None)
                    values = next(results)
                else:
                    values = cells
                if row := self._row(number, cells, values, merged.get(number, ())):
                    yield row
        except InputError:
            raise
        except Exception:  # see _open
            raise InputError([Fault(self._path, "is broken: rows can't be read on", SHEET, number + 1)]) from None

    def _twin(self) -> Any:
        return _open(self._path, self._data, data_only=True)[self._sheet.title]

    @staticmethod
    def _cells(sheet: Any) -> Iterator[tuple]:
        sheet.reset_dimensions()  # those stated are often wrong
        for cells in sheet.iter_rows():
            yield cells[:MOST_COLUMNS]

    @staticmethod
    def _row(number: int, cells: tuple, values: tuple, merged: Any) -> Row | None:
        texts: list[str] = []
        spoilt: dict[int, tuple[str, str]] = {}
        for at, (cell, result) in enumerate(zip(cells, values)):
            text = "" if cell.value is None else _text(result)
            if isinstance(text, tuple):
                spoilt[at], text = text, ""
            texts.append(text)
        if not spoilt and not any(map(str.strip, texts)):
            return None
        for first, last, corner in merged:
            for at in range(first, min(last + 1, MOST_COLUMNS)):
                if f"{letters(at)}{number}" != corner:
                    spoilt[at] = f"the cell is merged with {corner}", "a cell of its own"
        return Row(number, texts, spoilt)

    def _merged(self) -> dict[int, list[tuple[int, int, str]]]:
        """By row: first and last column of each merged range, and its corner."""
        from openpyxl.utils import column_index_from_string

        rows: dict[int, list[tuple[int, int, str]]] = defaultdict(list)
        noted = 0
        for left, top, right, bottom in self._ranges():
            noted += int(bottom) - int(top) + 1
            if noted > _MOST_MERGED:
                raise InputError([Fault(self._path, "too many cells are merged", "a cell of its own for each value")])
            span = column_index_from_string(left) - 1, column_index_from_string(right) - 1, f"{left}{top}"
            for number in range(int(top), int(bottom) + 1):
                rows[number].append(span)
        return rows

    def _ranges(self) -> Iterator[tuple[str, str, str, str]]:
        # Reading row by row, openpyxl tells nothing of merged cells.
        with zipfile.ZipFile(io.BytesIO(self._data)).open(self._sheet._worksheet_path) as part:
            seen, before = set(), b""
            while block := part.read(_BLOCK):
                for match in _MERGED.finditer(before + block):
                    if match.groups() not in seen:
                        seen.add(match.groups())
                        yield tuple(group.decode() for group in match.groups())  # type: ignore[misc]
                before = (before + block)[-_OVERLAP:]


def _text(cell: Any) -> str | tuple[str, str]:
    """A cell as text, or why it can't be taken and what was expected."""
    value = cell.value
    if value is None:
        return "a formula stands here without its result", f"{_PLAIN}, or the workbook saved by a program that computes"
    if cell.data_type == "e":
        return f"the cell shows {quoted(str(value))}", _PLAIN
    if isinstance(value, str):
        return value
    if isinstance(value, bool):
        return str(value).upper()
    if isinstance(value, (date, time, timedelta)):
        return "a date or time stands here", _PLAIN
    if "%" in cell.number_format:
        return Figure(f"{value * 100:.15g} %")
    return Figure(f"{value:.15g}" if isinstance(value, float) else value)
