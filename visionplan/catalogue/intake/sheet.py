"""A sheet from elsewhere: rows of cells as text, whatever file they stand in."""

from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from types import MappingProxyType
from typing import NamedTuple

from visionplan.faults import Fault, InputError
from visionplan.text import clean

SHEET = "a CSV file or an XLSX workbook"
MOST_COLUMNS = 512


class Figure(str):
    """The text of a cell that is a number itself: with a decimal point, whatever the sheet's texts have."""


class Row(NamedTuple):
    """A row that isn't blank."""

    number: int
    """The workbook's row, or the line where it begins."""
    cells: list[str]
    spoilt: Mapping[int, tuple[str, str]] = MappingProxyType({})
    """By place: why a cell can't be taken, and what was expected. Its text is empty."""


@dataclass(frozen=True)
class Sheet:
    """One table of a file."""

    file: str
    """As messages name it."""
    rows: Callable[[], Iterator[Row]]
    """Read them from the first; raises InputError where they can't be told apart."""
    delimiter: str = ""
    """Of a CSV file."""
    encoding: str = ""
    """Of a CSV file."""
    worksheet: str = ""
    """The name of a workbook's sheet."""
    told: str = ""
    """How the file was read, in a sentence for a person; "" where nothing had to be supposed."""

    def column(self, at: int) -> str:
        """Name a column by its letters in a workbook, else by its number."""
        return letters(at) if self.worksheet else str(at + 1)

    def headings(self, cells: list[str]) -> list[str]:
        """Name the columns: by heading, and where that is empty or not the only one of its kind by place too."""
        plain = [tidy(cell) for cell in cells]
        return [
            name if name and plain.count(name) == 1 else f"{name} (column {self.column(at)})".strip()
            for at, name in enumerate(plain)
        ]


def letters(at: int) -> str:
    """Count columns as workbooks do: A, B, …, Z, AA."""
    name, at = "", at + 1
    while at:
        at, letter = divmod(at - 1, 26)
        name = chr(65 + letter) + name
    return name


def tidy(text: str) -> str:
    """Make one line of a cell, safe to show."""
    return clean(" ".join(text.split()))


def read_sheets(path: str, encoding: str = "", delimiter: str = "") -> list[Sheet]:
    """Open a CSV file or the worksheets of a workbook.

    Parameters
    ----------
    encoding, delimiter : str
        Of a CSV file; found out where they are empty.

    Raises
    ------
    InputError
        Where it can't be read, holds nothing or is something else.
    """
    from visionplan.catalogue.intake.delimited import read_delimited
    from visionplan.catalogue.intake.workbook import read_workbook

    try:
        data = Path(path).read_bytes()
    except OSError as error:
        raise InputError([Fault(path, f"can't be read: {error.strerror}", SHEET)]) from None
    except ValueError:
        raise InputError([Fault(path, "no file can have this name", SHEET)]) from None
    if not data.strip():
        raise InputError([Fault(path, "the file is empty", SHEET)])
    if data.startswith(b"\xd0\xcf\x11\xe0"):
        found = "is a workbook of the old binary kind, or one locked with a password"
        raise InputError([Fault(path, found, f"{SHEET}, without a password")])
    if data.startswith(b"PK\x03\x04"):
        return read_workbook(path, data)
    return [read_delimited(path, data, encoding, delimiter)]
