"""Read one file of a catalogue: its bytes in, a `Table` out, column by column."""

from collections.abc import Iterable
from dataclasses import replace
from itertools import chain
from typing import Any

import numpy as np

from visionplan.catalogue.checks import check_ids, check_lenses
from visionplan.catalogue.heading import Heading, read_heading
from visionplan.catalogue.items import COLUMNS, Column, Table
from visionplan.catalogue.ledger import Ledger
from visionplan.catalogue.numbers import Numbers
from visionplan.catalogue.rows import Chunk, read_rows
from visionplan.catalogue.words import Words


def read_table(data: bytes, item: str, ledger: Ledger) -> Table | None:
    """Read lenses, cameras or spacers, leaving out the rows at fault.

    Parameters
    ----------
    data : bytes
        The file: comma-separated UTF-8 with a heading.
    item : str
        lenses, cameras or spacers.
    ledger : Ledger
        Where faults are noted. When it is `fatal` afterwards the table is of no use.

    Returns
    -------
    Table or None
        None where the heading can't be read.
    """
    chunks = read_rows(data, ledger)
    rows, lines = next((chunk for chunk in chunks if chunk[0] or ledger.bad), ([], []))
    if ledger.bad and (not rows or min(ledger.bad) <= lines[0]):
        ledger.fatal = True  # the first row, the heading, is broken
    if not rows and not ledger.fatal:
        ledger.of_file("the file is empty", "a heading and a row for each item")
    heading = None if ledger.fatal else read_heading(rows[0], lines[0], item, ledger)
    if heading is None:
        return None
    return _read_body(chain([(rows[1:], lines[1:])], chunks), heading, item, ledger)


def _read_body(chunks: Iterable[Chunk], heading: Heading, item: str, ledger: Ledger) -> Table:
    numbers, words = Numbers(heading.fields, ledger), Words(heading, ledger)
    begins: list[int] = []
    for chunk in chunks:
        rows, lines = _well_formed(chunk, heading, ledger)
        if rows:
            columns = list(zip(*rows))
            numbers.take(columns, lines)
            words.take(columns, lines)
            begins += lines
    if not begins and not ledger.bad and item != "spacers":
        ledger.of_file("no row stands below the heading", f"a row for each of the {item}")
    values: dict[str, Any] = {column.name: _unstated(column, len(begins)) for column in COLUMNS[item]}
    notes = words.notes()
    values |= numbers.values() | words.values() | notes
    check_ids(values["id"], begins, heading, ledger)
    if item == "lenses":
        check_lenses(values, begins, heading, ledger)
    index = dict(zip(values["id"], range(len(begins))))
    return without(ledger.bad, Table(item, values, begins, ledger.file, tuple(notes), heading.currency, index))


def _well_formed(chunk: Chunk, heading: Heading, ledger: Ledger) -> Chunk:
    rows, lines = chunk
    if set(map(len, rows)) <= {heading.count}:
        return chunk
    for row, line in zip(rows, lines):
        if len(row) != heading.count:
            ledger.of_row(line, f"the row has {len(row)} cells, the heading {heading.count}", f"{heading.count} cells")
    good = [at for at, row in enumerate(rows) if len(row) == heading.count]
    return [rows[at] for at in good], [lines[at] for at in good]


def _unstated(column: Column, count: int) -> np.ndarray | list:
    if column.kind in ("number", "count"):
        return np.full(count, np.nan)
    return [() if column.kind == "stops" else ""] * count


def without(bad: set[int], table: Table) -> Table:
    """Leave out the rows that begin at these lines."""
    good = [row for row, line in enumerate(table.lines) if line not in bad] if bad else range(len(table))
    if len(good) == len(table):
        return table
    kept = {
        name: column[good] if isinstance(column, np.ndarray) else [column[row] for row in good]
        for name, column in table.values.items()
    }
    index = dict(zip(kept["id"], range(len(good))))
    return replace(table, values=kept, lines=[table.lines[row] for row in good], index=index)
