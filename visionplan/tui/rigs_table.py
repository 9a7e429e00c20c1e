"""The ranking as rows: concessions where nothing fits, the rigs that fit, the nearest misses."""

from collections.abc import Sequence
from dataclasses import dataclass

from visionplan.report.alike import Row as TableRow
from visionplan.report.columns import Column, choose, columns
from visionplan.report.concession import concession_change, concession_sentence
from visionplan.report.remarks import pair
from visionplan.solve.rig import Concession, Ranking, Rig
from visionplan.text import clean
from visionplan.tui.rows import Row, cell
from visionplan.tui.state import State

GRADE_ROLE = {"comfortable": "good", "fair": "fair", "tight": "tight", None: "missed"}


@dataclass(frozen=True)
class Given:
    """A concession as what the cursor stands on."""

    concession: Concession


def shown_rigs(ranking: Ranking | None, words: str, misses: bool) -> tuple[list[Rig], list[Rig]]:
    """Rigs that fit and rigs that don't, those that hold every word of the filter."""
    wanted = words.lower().split()
    rigs = [rig for rig in (ranking.rigs if ranking else ()) if all(word in _text(rig) for word in wanted)]
    fitting = [rig for rig in rigs if rig.fits]
    return fitting, [rig for rig in rigs if not rig.fits] if misses else []


def _text(rig: Rig) -> str:
    """What a filter looks through."""
    catalogue = rig.case.problem.catalogue
    cameras, lenses = catalogue.cameras, catalogue.lenses
    camera, lens = rig.case.cameras, rig.case.lenses
    parts = (
        rig.camera,
        rig.lens,
        *(cameras[name][camera] for name in ("maker", "interface", "colour", "mount")),
        *(lenses[name][lens] for name in ("maker", "kind", "mount")),
        *(rig.pinch or ()),
        rig.grade or "",
    )
    return " ".join(map(str, parts)).lower()


class Table:
    """Rigs, all of which fit or none, in the columns that a width has room for."""

    def __init__(self, rigs: Sequence[Rig], state: State, width: int):
        catalogue = rigs[0].case.problem.catalogue
        found = columns([TableRow(rig) for rig in rigs], [], state.brief.units, catalogue)
        self.columns: list[tuple[Column, int]] = choose(found, width - 3, 1 if width < 110 else 2)
        self.gap = " " if width < 110 else "  "
        self.rigs = rigs

    def head(self) -> Row:
        """The columns' names."""
        text = self.gap.join(cell(column.head, own, right=column.right)[0] for column, own in self.columns)
        return [("   " + text, "dim")]

    def row(self, place: int, here: bool, marked: bool) -> Row:
        """One rig."""
        rig = self.rigs[place]
        row: Row = [("▸" if here else " ", "cursor" if here else ""), ("◆ " if marked else "  ", "pinch")]
        for number, (column, own) in enumerate(self.columns):
            text, _ = cell(clean(column.cells[place]), own, right=column.right)
            last = number == len(self.columns) - 1
            if column.slot in ("outcome", "grade"):
                role = GRADE_ROLE[rig.grade] if rig.fits else "missed"
            else:
                role = "cursor" if here and column.slot in ("rank", "camera", "lens") else ""
            row.append((text + ("" if last else self.gap), role))
        return row


def concession_row(state: State, concession: Concession, width: int, here: bool) -> Row:
    """One concession."""
    assert state.results.ranking
    sentence = concession_sentence(state.asked, concession, state.brief.units)
    role = "cursor" if here else ""
    row = [("▸ " if here else "  ", role), (f"{concession_change(concession):>7}  ", role or "pinch"), (sentence, role)]
    rest = width - sum(len(text) for text, _ in row) - 2
    with_pair = pair(concession.camera, concession.lens)
    return [*row, (f"  {with_pair}", "dim")] if rest > len(with_pair) else row


def counts(state: State) -> str:
    """How many pairs fit, in short."""
    ranking = state.results.ranking
    if state.results.fault:
        return state.results.fault
    if ranking is None:
        return "ranking …"
    if not ranking.fitting:
        return f"nothing of {ranking.pairs:,} pairs fits"
    return f"{ranking.fitting:,} of {ranking.pairs:,} pairs fit"


def _rule(text: str, width: int) -> Row:
    return [(f"─── {text} ".ljust(width, "─"), "dim")]


def preview(state: State, width: int, height: int) -> list[Row]:
    """The first of the ranking in few rows, under another view."""
    rows: list[Row] = [_rule("first of the ranking", width)]
    ranking = state.results.ranking
    fitting, misses = shown_rigs(ranking, "", True)
    if ranking and not fitting and state.results.concessions:
        rows = [_rule("nothing fits: what would have to give (view 2 takes one)", width)]
        rows += [concession_row(state, given, width, False) for given in state.results.concessions[: height - 1]]
    elif rigs := fitting or misses:
        if not fitting:
            rows = [_rule("nothing fits: nearest misses", width)]
        table = Table(rigs[: height - 2], state, width)
        rows.append(table.head())
        rows += [table.row(place, False, state.marked(_pair(rig))) for place, rig in enumerate(rigs[: height - 2])]
    return rows + [[] for _ in range(height - len(rows))]


def _pair(rig: Rig) -> tuple[str, str]:
    return rig.camera, rig.lens
