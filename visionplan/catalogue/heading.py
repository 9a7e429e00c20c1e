"""The heading of a catalogue file: which column is which, in what unit."""

import re
from collections.abc import Iterable
from dataclasses import dataclass, field
from itertools import islice

from visionplan.catalogue.items import COLUMNS, Column
from visionplan.catalogue.ledger import Ledger
from visionplan.text import clean, quoted, shorten
from visionplan.units import UnitError, factor

_MOST_COMPARED = 200
CURRENCY = re.compile(r"[A-Z]{3}|[$€£¥]")


@dataclass(frozen=True)
class Field:
    """A column of the file that is one of ours."""

    column: Column
    at: int
    """Where it stands in a row."""
    heading: str
    """As written, safe to show."""
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
    taken: set[str] = set()
    for at, cell in enumerate(map(str.strip, cells)):
        name, unit = split_heading(cell)
        shown = shorten(clean(cell[:80]), 60)
        if name not in columns:
            note = cell if cell and cell not in taken else f"{cell} {unnamed(at)}".strip()
            taken.add(note)
            heading.notes.append((at, note))
        elif name in heading.written:
            found = f"{quoted(cell)} means the same as {quoted(heading.written[name])}"
            ledger.of_file(found, "each column once", line, shown)
        else:
            heading.written[name], ledger.order[shown] = shown, at
            _add_field(heading, columns[name], at, shown, unit, ledger)
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
    alike = nearest(column.name, (note for _, note in heading.notes))
    hint = f" ({quoted(alike)} is no heading of ours)" if alike else ""
    ledger.of_file(f"the column is missing{hint}", f"a heading '{example(column)}'", heading.line, column.name)


def nearest(name: str, others: Iterable[str]) -> str | None:
    """Find what is probably meant by a name that is slightly wrong."""
    alike = {split_heading(other[:80])[0]: other for other in islice(others, _MOST_COMPARED)}
    from difflib import get_close_matches

    found = get_close_matches(split_heading(name[:80])[0], list(alike), 1, 0.8)
    return alike[found[0]] if found else None


def split_heading(text: str) -> tuple[str, str]:
    """Split 'Focal  length [mm]' into its name in small letters and its unit, "" where there is none."""
    name, opened, unit = text.removesuffix("]").partition("[") if text.endswith("]") else (text, "", "")
    name = name if opened else text
    return " ".join(name.casefold().split()), unit.strip()


def unnamed(at: int) -> str:
    """Name a column that has no heading."""
    return f"(column {at + 1})"


def _add_field(heading: Heading, column: Column, at: int, shown: str, unit: str, ledger: Ledger) -> None:
    if column.currency and CURRENCY.fullmatch(unit):
        heading.currency, unit = unit, ""
    bare = 1.0 if column.kind != "number" or column.unit in ("", "1") else None
    try:
        heading.fields.append(Field(column, at, shown, factor(unit, column.unit) if unit else bare))
    except UnitError as error:
        expected = f"the unit of {error.expected}" if column.unit else f"a heading '{column.name}' without one"
        ledger.of_file(error.found, expected, heading.line, shown)
