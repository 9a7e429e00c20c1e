"""Checks between the cells of a row, and between rows."""

from collections.abc import Callable

import numpy as np

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

    def note(rows: np.ndarray, column: str, found: Callable[..., str], expected: str) -> None:
        for row in np.flatnonzero(rows):
            said = found(*(figure(float(values[name][row]), 10) for name in _NAMED))
            ledger.of_row(lines[row], said, expected, heading.written.get(column, column))

    low, high, focal_length, nearest, principal = (values[name] for name in _NAMED)
    note(
        low > high, "f-number max", lambda low, high, *_: f"{high} is less than f-number min {low}", "at least as much"
    )
    # Where the nearest magnification gives the front principal plane, the sum is f (1 + 1/m), always more than f.
    note(
        ~telecentric & (nearest + principal <= focal_length),
        "nearest object",
        lambda *stated: (
            "nearest object {3} mm and front principal {4} mm add up to no more than focal length {2} mm".format(
                *stated
            )
        ),
        "an object beyond the front focal point",
    )


_NAMED = ("f-number min", "f-number max", "focal length", "nearest object", "front principal")


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
                ledger.of_row(lines[row], found, column.doc.rstrip("."), heading.written[name])
