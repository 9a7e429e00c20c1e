"""Rows of a sheet into a file of a catalogue: new ones added, prices and stock of known ones updated."""

import csv
import io
import math
from dataclasses import dataclass

import numpy as np

from visionplan.catalogue.heading import Heading, read_heading
from visionplan.catalogue.intake.incoming import Incoming, titled
from visionplan.catalogue.items import Table
from visionplan.catalogue.ledger import Ledger
from visionplan.catalogue.read import read_table
from visionplan.catalogue.rows import read_rows
from visionplan.faults import Fault, InputError
from visionplan.units import UnitError, number

LIVE = ("price", "stock", "quantity")
"""Columns that change with every sheet."""


@dataclass(frozen=True)
class Change:
    """A cell that the sheet has otherwise than the file."""

    id: str
    column: str
    before: str
    after: str


@dataclass
class Merged:
    """What became of one file."""

    file: str
    data: bytes | None
    """What it should hold; None where nothing changes."""
    table: Table
    added: list[str]
    updated: list[Change]
    kept: list[Change]
    """Differences that were left as the file has them."""
    same: int
    """Rows of the sheet that the file had just so."""
    absent: int
    """Rows of the file that the sheet hasn't got."""


def merge(incoming: Incoming, before: bytes | None, file: str, everything: bool) -> Merged:
    """Merge rows into a file's bytes, None where there is no such file.

    Parameters
    ----------
    everything : bool
        Update every cell that the sheet states, not only `LIVE`.

    Raises
    ------
    InputError
        Where the file has faults, or would have.
    """
    new, item = incoming.table, incoming.table.item
    if before is None:
        rows = [[titled(name, unit) for name, unit in incoming.units.items()]]
        rows += [incoming.cells[line] for line in new.lines]
        return _checked(Merged(file, _written(rows), new, list(new.index), [], [], 0, 0), item)

    ledger = Ledger(file)
    old = read_table(before, item, ledger)
    if old is None or ledger.fatal or ledger.bad:
        raise InputError(ledger.faults())
    if old.currency and new.currency not in ("", old.currency):
        found = f"prices are in {old.currency}, those of {new.file} in {new.currency}"
        raise InputError([Fault(file, found, "one currency", column="price")])
    rows = [row for chunk, _ in read_rows(before, ledger) for row in chunk]
    heading = read_heading(rows[0], 1, item, ledger)
    assert heading is not None, "the table could be read"
    writer = _Writer(incoming, heading, rows)
    merged = Merged(file, None, new, [], [], [], 0, len(old.index.keys() - new.index.keys()))
    for name, at in new.index.items():
        if name not in old.index:
            merged.added.append(name)
            writer.append(at)
            continue
        differing = [column for column in incoming.units if _differ(old, old.index[name], new, at, column)]
        merged.same += not differing
        for column in differing:
            change = Change(name, column, writer.cell(old.index[name], column), writer.text(at, column))
            if everything or column in LIVE:
                merged.updated.append(change)
                writer.set(old.index[name], column, change.after)
            else:
                merged.kept.append(change)
    if merged.added or merged.updated:
        merged.data = _written(rows)
    return _checked(merged, item)


class _Writer:
    """The rows of a file, with the columns that the sheet brings."""

    def __init__(self, incoming: Incoming, heading: Heading, rows: list[list[str]]):
        self._incoming, self._rows = incoming, rows
        self._places = {field.column.name: field.at for field in heading.fields}
        self._factors = {field.column.name: field.factor for field in heading.fields}
        self._order = {name: at for at, name in enumerate(incoming.units)}
        self._width = heading.count
        if incoming.table.currency and not heading.currency and "price" in self._places:
            rows[0][self._places["price"]] = titled("price", incoming.table.currency)

    def cell(self, row: int, column: str) -> str:
        return self._rows[row + 1][self._places[column]].strip() if column in self._places else ""

    def text(self, at: int, column: str) -> str:
        """A cell of the sheet in the unit of the file's heading."""
        table = self._incoming.table
        text = self._incoming.cells[table.lines[at]][self._order[column]]
        if column not in self._factors or not isinstance(table[column], np.ndarray):
            return text
        try:
            bare = number(text)
        except UnitError:
            return text
        factor = self._factors[column]
        if factor is None:
            return f"{text} {self._incoming.units[column]}"
        figure = f"{table[column][at] / factor:.15g}"
        return text if float(figure) == bare else figure

    def append(self, at: int) -> None:
        row = len(self._rows) - 1
        self._rows.append([""] * self._width)
        for column in self._order:
            if text := self.text(at, column):
                self.set(row, column, text)

    def set(self, row: int, column: str, text: str) -> None:
        if column not in self._places:
            self._places[column] = self._width
            self._width += 1
            for cells in self._rows:
                cells.append("")
            self._rows[0][-1] = titled(column, self._incoming.units[column])
        self._rows[row + 1][self._places[column]] = text


def _differ(old: Table, row: int, new: Table, at: int, column: str) -> bool:
    """Whether the sheet states something else than the file."""
    before, after = old[column][row], new[column][at]
    if isinstance(after, float):
        return not math.isnan(after) and not math.isclose(before, after, rel_tol=1e-12)
    return after not in ("", (), before)


def _written(rows: list[list[str]]) -> bytes:
    text = io.StringIO()
    csv.writer(text, lineterminator="\n").writerows(rows)
    return text.getvalue().encode("utf-8", "replace")


def _checked(merged: Merged, item: str) -> Merged:
    """Read what is to be written."""
    if merged.data is not None:
        ledger = Ledger(merged.file)
        table = read_table(merged.data, item, ledger)
        if table is None or ledger.fatal or ledger.bad:
            found = [fault._replace(found=f"with the sheet's cells, {fault.found}") for fault in ledger.faults()]
            raise InputError(found)
        merged.table = table
    return merged
