"""The heading of a catalogue file: which column is which, in what unit."""

import difflib
import re
from collections.abc import Iterable
from dataclasses import dataclass, field

from visionplan.catalogue.items import COLUMNS, Column
from visionplan.catalogue.ledger import Ledger
from visionplan.text import quoted
from visionplan.units import EXPECTED, UnitError, factor

_HEADING = re.compile(r"(.*?)\s*\[(.*)\]", re.DOTALL)
_CURRENCY = re.compile(r"[A-Z]{3}|[$€£¥]")


@dataclass(frozen=True)
class Field:
    """A column of the file that is one of ours."""

    column: Column
    at: int
    """Where it stands in a row."""
    heading: str
    """As written."""
    factor: float | None
    """How many core units a bare number counts; None where the heading names no unit though one is needed."""


@dataclass
class Heading:
    """What the first row says."""

    line: int
    count: int
    """Cells in a row."""
    fields: list[Field] = field(default_factory=list)
    """Columns that can be read."""
    written: dict[str, str] = field(default_factory=dict)
    """By our name: each heading that is there, read or not."""
    notes: list[tuple[int, str]] = field(default_factory=list)
    """Where a column that is none of ours stands, and its heading, no two alike."""
    currency: str = ""


def example(column: Column) -> str:
    """Show how a column's heading is written."""
    return column.name + (f" [{column.unit}]" if column.kind == "number" and column.unit else "")


def read_heading(cells: list[str], line: int, item: str, ledger: Ledger) -> Heading | None:
    """Tell the columns from the first row; None where none of them is ours."""
    columns = {column.name: column for column in COLUMNS[item]}
    heading = Heading(line, len(cells))
    ledger.order = {cell.strip(): at for at, cell in enumerate(cells)}
    for at, cell in enumerate(map(str.strip, cells)):
        name, unit = split_heading(cell)
        if name not in columns:
            heading.notes.append((at, _unlike(cell, at, heading.notes)))
        elif name in heading.written:
            found = f"{quoted(cell)} means the same as {quoted(heading.written[name])}"
            ledger.of_file(found, "each column once", line, cell)
        else:
            heading.written[name] = cell
            _add_field(heading, columns[name], at, cell, unit, ledger)
    if not heading.written:
        parted = " (the cells seem to be parted by other than commas)" if len(cells) == 1 else ""
        headings = ", ".join(example(column) for column in COLUMNS[item] if column.required)
        ledger.of_file(f"no heading is known{parted}", f"headings, parted by commas, such as {headings}", line)
        return None
    for column in COLUMNS[item]:
        if column.required and column.name not in heading.written:
            missing(column, heading, ledger)
    return heading


def missing(column: Column, heading: Heading, ledger: Ledger) -> None:
    """Note that a column is not there."""
    alike = nearest(column.name, [note for _, note in heading.notes])
    hint = f" ({quoted(alike)} is no heading of ours)" if alike else ""
    ledger.of_file(f"the column is missing{hint}", f"a heading '{example(column)}'", heading.line, column.name)


def nearest(name: str, others: Iterable[str]) -> str | None:
    """Find what is probably meant by a name that is slightly wrong."""
    alike = {split_heading(other[:80])[0]: other for other in others}
    found = difflib.get_close_matches(split_heading(name[:80])[0], list(alike), 1, 0.8)
    return alike[found[0]] if found else None


def split_heading(text: str) -> tuple[str, str]:
    """Split 'Focal  length [mm]' into its name in small letters and its unit, "" where there is none."""
    match = _HEADING.fullmatch(text)
    name, unit = match.groups() if match else (text, "")
    return " ".join(name.casefold().split()), unit.strip()


def unnamed(at: int) -> str:
    """Name a column that has no heading."""
    return f"(column {at + 1})"


def _unlike(cell: str, at: int, notes: list[tuple[int, str]]) -> str:
    taken = {note for _, note in notes}
    return cell if cell and cell not in taken else f"{cell} {unnamed(at)}".strip()


def _add_field(heading: Heading, column: Column, at: int, cell: str, unit: str, ledger: Ledger) -> None:
    if column.currency and _CURRENCY.fullmatch(unit):
        heading.currency, unit = unit, ""
    number = column.kind in ("number", "count")
    try:
        if unit and not number:
            raise UnitError(f"the unit {quoted(unit)} has no place here", f"the heading '{column.name}'")
        bare = 1.0 if column.kind != "number" or column.unit in ("", "1") else None
        heading.fields.append(Field(column, at, cell, factor(unit, column.unit) if unit else bare))
    except UnitError as error:
        expected = (
            f"the unit of {error.expected}" if number and column.unit in EXPECTED and column.unit else error.expected
        )
        ledger.of_file(error.found, expected, heading.line, cell)
