"""A ranking as lines of text: the table of rigs, and beneath it what limits, what is assumed, what could give."""

from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from visionplan.report.alike import Row, fold
from visionplan.report.columns import Column, choose, columns
from visionplan.report.figures import setup
from visionplan.report.lines import to_ascii, wrap
from visionplan.report.remarks import Remark, assumed, beneath, counts, unknowns
from visionplan.solve.rig import Ranking
from visionplan.text import clean, pad, shorten

WIDE = 110
"""Terminal cells from which gaps are wider."""
_HEADING = "1"
_OF_GRADE = {"comfortable": "32", "fair": "33", "tight": "31", None: "31"}
"""Colour codes, all of the terminal's own palette."""


@dataclass(frozen=True)
class _Page:
    """How lines are to look."""

    width: int
    system: str
    colour: bool
    ascii: bool

    def plain(self, text: str) -> str:
        return to_ascii(text) if self.ascii else text

    def painted(self, text: str, code: str) -> str:
        return f"\x1b[{code}m{text}\x1b[0m" if self.colour and text else text

    def sentence(self, text: str, mark: str = "") -> list[str]:
        """Lines of a sentence; those after the first stand in by the width of its mark, at least by four."""
        return wrap(self.plain(text), self.width, " " * max(4, len(mark)), self.plain(mark))


def rank_table(
    ranking: Ranking, width: int = 80, system: str = "mm", colour: bool = False, ascii: bool = False
) -> list[str]:
    """A ranking for a terminal.

    Parameters
    ----------
    width : int
        Terminal cells, at least 40. The more there are, the more columns stand.
    system : str
        mm or inch
    colour : bool
        Whether lines carry colour codes; everything they say stands in words too.
    ascii : bool
        Whether to keep to ASCII.
    """
    page = _Page(width, system, colour, ascii)
    rows = fold(ranking.rigs)
    remarks = [*unknowns(rows), *assumed(rows)]
    lines = [page.painted(line, _HEADING) for line in page.sentence(clean(ranking.brief.title)) if line]
    lines += page.sentence(f"{counts(ranking)}; {ranking.seconds:.2g} s")
    for fits in (True, False):
        some = [row for row in rows if row.rig.fits == fits]
        if some:
            lines += ["", *_rows(some, remarks, ranking, page)]
    for paragraph in beneath(ranking, rows, remarks, system):
        lines += ["", *(line for mark, text in paragraph for line in page.sentence(text, mark))]
    return lines


def _rows(some: Sequence[Row], remarks: Sequence[Remark], ranking: Ranking, page: _Page) -> Iterator[str]:
    gap = 2 if page.width >= WIDE else 1
    chosen = choose(columns(some, remarks, page.system, ranking.catalogue), page.width, gap)
    heads = [_cell(column, column.head, own, page) for column, own in chosen]
    yield page.painted((" " * gap).join(heads).rstrip(), _HEADING)
    for number, row in enumerate(some):
        cells = [_cell(column, column.cells[number], own, page) for column, own in chosen]
        painted = (
            page.painted(cell, _OF_GRADE[row.rig.grade]) if column.slot == "outcome" else cell
            for cell, (column, _) in zip(cells, chosen)
        )
        yield (" " * gap).join(painted).rstrip()
        if setup(row.rig) and all(column.slot != "setup" for column, _ in chosen):
            yield from page.sentence(f"with {setup(row.rig)}", " " * (chosen[0][1] + gap))


def _cell(column: Column, text: str, own: int, page: _Page) -> str:
    return pad(page.plain(shorten(text, own)), own, column.right)
