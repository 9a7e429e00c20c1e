"""Join the tables of several folders into one."""

from collections.abc import Sequence

import numpy as np

from visionplan.catalogue.items import Table
from visionplan.catalogue.ledger import Ledger
from visionplan.text import quoted


def check_clashes(read: Sequence[tuple[Table, Ledger]]) -> None:
    """No id stands in two files; the later row is at fault."""
    for at, (table, ledger) in enumerate(read):
        for earlier, _ in read[:at]:
            for name in table.index.keys() & earlier.index.keys():
                found = f"{quoted(name)} stands in {earlier.file}:{earlier.lines[earlier.index[name]]} already"
                ledger.of_row(table.lines[table.index[name]], found, "an id of its own", "id")


def join(tables: Sequence[Table]) -> Table:
    """Put the rows of tables of one item one after the other; a table's notes are empty in the rows of the others."""
    if len(tables) == 1:
        return tables[0]
    ids = [name for table in tables for name in table["id"]]
    notes = tuple(dict.fromkeys(note for table in tables for note in table.notes))
    values = {name: _column([table[name] for table in tables]) for name in tables[0].values.keys() - notes}
    for note in notes:
        values[note] = _column([table.values.get(note, [""] * len(table)) for table in tables])
    return Table(
        tables[0].item,
        values,
        [line for table in tables for line in table.lines],
        ", ".join(table.file for table in tables),
        notes,
        next((table.currency for table in tables if table.currency), ""),
        dict(zip(ids, range(len(ids)))),
    )


def _column(parts: Sequence[np.ndarray | list]) -> np.ndarray | list:
    if isinstance(parts[0], np.ndarray):
        return np.concatenate(parts)
    return [cell for part in parts for cell in part]
