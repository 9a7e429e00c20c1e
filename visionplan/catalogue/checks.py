"""Checks between the cells of a row, and between rows."""

import numpy as np

from visionplan.catalogue.cells import expected
from visionplan.catalogue.heading import Heading, missing
from visionplan.catalogue.items import COLUMNS, REQUIRED_OF_KIND
from visionplan.catalogue.ledger import Ledger
from visionplan.text import figure, quoted


def check_ids(ids: list[str], lines: list[int], heading: Heading, ledger: Ledger) -> None:
    """No two rows have the same id."""
    if len(set(ids)) == len(ids):
        return
    first: dict[str, int] = {}
    for name, line in zip(ids, lines):
        if first.setdefault(name, line) != line and name:
            found = f"{quoted(name)} stands in line {first[name]} already"
            ledger.of_row(line, found, "an id of its own", heading.written["id"])


def check_lenses(values: dict, lines: list[int], heading: Heading, ledger: Ledger) -> None:
    """Each kind states what it needs; f-numbers and the nearest object make sense."""
    telecentric = np.array([kind == "telecentric" for kind in values["kind"]], bool)
    for kind, rows in (("entocentric", ~telecentric), ("telecentric", telecentric)):
        for name in REQUIRED_OF_KIND[kind]:
            _check_stated(name, kind, np.flatnonzero(rows & np.isnan(values[name])), lines, heading, ledger)

    low, high, focal_length, nearest, principal = (values[name] for name in _COMPARED)
    for row in np.flatnonzero(low > high):
        found = f"{figure(high[row])} is less than f-number min {figure(low[row])}"
        ledger.of_row(lines[row], found, "at least as much", heading.written["f-number max"])
    # Where the nearest magnification gives the front principal plane, the sum is f (1 + 1/m), always more than f.
    for row in np.flatnonzero(~telecentric & (nearest + principal <= focal_length)):
        near, plane, focal = (figure(column[row], 10) for column in (nearest, principal, focal_length))
        found = f"nearest object {near} mm and front principal {plane} mm make no more than focal length {focal} mm"
        ledger.of_row(lines[row], found, "an object beyond the front focal point", heading.written["nearest object"])


_COMPARED = ("f-number min", "f-number max", "focal length", "nearest object", "front principal")


def _check_stated(
    name: str, kind: str, lacking: np.ndarray, lines: list[int], heading: Heading, ledger: Ledger
) -> None:
    column = next(column for column in COLUMNS["lenses"] if column.name == name)
    if len(lacking) and name not in heading.written:
        missing(column, heading, ledger)
    elif name in (field.column.name for field in heading.fields):
        for row in lacking:
            if not ledger.knows(lines[row], heading.written[name]):
                found = f"nothing is stated, and the lens is {kind}"
                ledger.of_row(lines[row], found, expected(column), heading.written[name])
