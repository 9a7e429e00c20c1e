"""Rows of text with roles: what every view draws, whatever shows it. A row is a list of segments (text, role).

Roles are words parted by spaces, which a palette turns into styles: "cursor good".
"""

from collections.abc import Iterable, Sequence

from visionplan.report.lines import wrap
from visionplan.text import pad, shorten, width

Segment = tuple[str, str]
Row = list[Segment]


def row_width(row: Iterable[Segment]) -> int:
    """Terminal cells that a row takes."""
    return sum(width(text) for text, _ in row)


def fit(row: Sequence[Segment], cells: int) -> Row:
    """Cut or fill a row to exactly so many cells."""
    fitted: Row = []
    left = cells
    for text, role in row:
        own = width(text)
        if own > left:
            text = shorten(text, left)
            own = width(text)
        if text:
            fitted.append((text, role))
        left -= own
        if left <= 0:
            break
    if left > 0:
        fitted.append((" " * left, ""))
    return fitted


def ends(left: Sequence[Segment], right: Sequence[Segment], cells: int) -> Row:
    """A row with one part flush left and one flush right; the left one is cut where both don't fit."""
    return [*fit(left, max(0, cells - row_width(right))), *right]


def cell(text: str, cells: int, role: str = "", right: bool = False) -> Segment:
    """Text cut or filled to so many cells."""
    return pad(shorten(text, cells), cells, right), role


def paragraph(text: str, cells: int, role: str = "", indent: str = "") -> list[Row]:
    """A sentence broken into rows."""
    return [[(line, role)] for line in wrap(text, max(10, cells), indent, indent)]
