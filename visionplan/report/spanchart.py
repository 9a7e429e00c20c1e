"""The span chart: every demand a bar over one logarithmic axis of magnification, the working point a line through all.

The rows are those of the table of demands, always all of them and in its order.
"""

from dataclasses import dataclass

from visionplan.report.axis import Axis, axis_over
from visionplan.report.canvas import Canvas, Segment, join
from visionplan.report.figures import room, short
from visionplan.report.lines import to_ascii, wrap
from visionplan.report.words import is_unknown, lacking, missed_by, misses, pinch_words
from visionplan.solve.demands import BY_NAME
from visionplan.solve.rig import Rig, Verdict
from visionplan.solve.span import EDGE
from visionplan.text import figure

_NAMES = max(map(len, ("magnification", *BY_NAME))) + 1
"""Terminal cells of the names."""
_WORDY = 60
"""Width of a chart from which a word on each demand stands beside its name."""
_WORD = 5
"""Terminal cells that such a word takes beyond the names."""
_MARGIN = 9
"""Cells at both ends of the axis that no bound near the rig's span lies in: room for its value."""
_NEAR = 2.0
"""Bounds farther from the span than by this factor lie beyond the axis."""


@dataclass(frozen=True)
class _Signs:
    """Characters to draw with; of a bar its left end, middle, right end, and where the working point crosses it."""

    bar: tuple[str, ...] = ("├", "─", "┤", "┼")
    pinch: tuple[str, ...] = ("┣", "━", "┫", "┿")
    span: tuple[str, ...] = ("╞", "═", "╡", "╪")
    tick: str = "╷"
    point: str = "┊"
    beyond: str = "◂▸"
    gap: str = "·"


_BOXES = _Signs()
_ASCII = _Signs(("|", "-", "|", "+"), ("[", "=", "]", "#"), ("<", "~", ">", "#"), "'", ":", "<>", ".")


def span_chart(rig: Rig, width: int, ascii: bool = False, system: str = "mm") -> list[str]:
    """The chart of one rig as lines of text, `width` terminal cells wide, at least 40."""
    return join(span_rows(rig, width, ascii, system))


def span_rows(rig: Rig, width: int, ascii: bool = False, system: str = "mm") -> list[list[Segment]]:
    """The same as rows of segments (text, role), for a screen to style.

    Roles: name, axis, bar, pinch, holds, missed, value, word, span, point.
    """
    chart = _Chart(rig, width, _ASCII if ascii else _BOXES, system)
    words = _legend(rig, system)
    legend = wrap(to_ascii(words) if ascii else words, width)
    return [*chart.rows(), *([(line, "word")] for line in legend)]


def _legend(rig: Rig, system: str) -> str:
    missed = misses(rig, system)
    parts = [
        f"stands at {figure(rig.magnification)}" if rig.magnification else "",
        f"{_outcome(rig)}, {rig.grade}" if rig.fits else _outcome(rig),
        f"pinch: {pinch_words(rig)}" if rig.pinch else "",
        f"misses {'; '.join(missed)}" if missed else "",
    ]
    return "; ".join(filter(None, parts))


def _outcome(rig: Rig) -> str:
    if rig.fits:
        return f"{room(rig.latitude)} of room"
    if rig.span is None:
        return "no magnification meets every demand"
    return f"{short(rig.shortfall)} short" if rig.shortfall else "doesn't fit"


def _axis(rig: Rig, cells: int) -> Axis | None:
    """Over the span, the working point, what pinches and what is missed, and the bounds that lie near these."""
    every = [bound for verdict in rig.demands for bound in (verdict.lo, verdict.hi) if bound]
    core = [*(rig.span or ()), *([rig.magnification] if rig.magnification else [])] or every
    core += [bound for verdict in rig.demands for bound in _facing(verdict, rig) if bound]
    near = [bound for bound in every if min(core) / _NEAR <= bound <= max(core) * _NEAR]
    return axis_over([*core, *near], cells, _MARGIN) if core else None


def _facing(verdict: Verdict, rig: Rig) -> tuple[float | None, ...]:
    """The bounds of a demand that the chart must hold: those that pinch and those that are missed."""
    low, high = rig.pinch or ("", "")
    m = rig.magnification
    lo = verdict.name == low or (verdict.lo is not None and m is not None and m < verdict.lo)
    hi = verdict.name == high or (verdict.hi is not None and m is not None and m > verdict.hi)
    return verdict.lo if lo else None, verdict.hi if hi else None


class _Chart:
    """The chart's rows, drawn one after the other."""

    def __init__(self, rig: Rig, width: int, signs: _Signs, system: str):
        self.rig = rig
        self.signs = signs
        self.system = system
        self.demands = [verdict for verdict in rig.demands if not verdict.gate]
        self.names = _NAMES if width < _WORDY else _NAMES + _WORD
        self.cells = width - self.names
        self.axis = _axis(rig, self.cells)
        self.point = None if rig.magnification is None or not self.axis else self.axis.place(rig.magnification)
        self.canvas = Canvas(width, len(self.demands) + 2)

    def rows(self) -> list[list[Segment]]:
        self.canvas.put(0, 0, "magnification", "name")
        for place, text in self.axis.labels() if self.axis else ():
            self.put(0, place, self.signs.tick + text, "axis")
        for row, verdict in enumerate(self.demands, 1):
            state = self.state(verdict)
            self.canvas.put(row, 0, verdict.name, state or "name")
            if self.names > _NAMES:
                self.canvas.put(row, _NAMES - 2, state, state)
            if words := self.words(verdict):
                self.put(row, 0, words, state or "word")
            elif self.axis:
                self.bar(row, verdict, self.axis)
        last = len(self.demands) + 1
        self.canvas.put(last, 0, "span", "name")
        if self.axis:
            self.span(last, self.axis)
        for row in range(1, last):
            if self.point is not None and self.blank(row, self.point, self.point + 1):
                self.put(row, self.point, self.signs.point, "point")
        return self.canvas.segments()

    def put(self, row: int, place: int, text: str, role: str) -> None:
        self.canvas.put(row, self.names + place, text, role)

    def blank(self, row: int, start: int, end: int) -> bool:
        return start >= 0 and self.canvas.blank(row, self.names + start, self.names + end)

    def words(self, verdict: Verdict) -> str:
        """What stands in place of a bar; "" where there is one."""
        if verdict.verdict == "not asked":
            return "not asked"
        if is_unknown(self.rig, verdict):
            strictly = ": strictly a miss" if verdict.verdict == "missed" else ""
            return f"unknown{strictly}: {lacking(self.rig, verdict)}"
        return "no magnification holds it" if verdict.never else ""

    def bar(self, row: int, verdict: Verdict, axis: Axis) -> None:
        missed, pinches = verdict.verdict == "missed", verdict.name in (self.rig.pinch or ())
        role = "missed" if missed else "pinch" if pinches else "bar"
        start = -1 if verdict.lo is None else axis.place(verdict.lo)
        end = self.cells if verdict.hi is None else axis.place(verdict.hi)
        self.draw(row, start, end, self.signs.pinch if pinches else self.signs.bar, role)
        untold: list[tuple[bool, tuple[str, ...]]] = []
        for bound, place, low in ((verdict.lo, start, True), (verdict.hi, end, False)):
            notes = () if bound is None else self.notes(verdict, bound, low)
            if bound is not None and not self.value(row, bound, place, low, notes) and notes:
                untold.append((low, notes))
        for low, notes in untold:
            self.within(row, max(start, 0), min(end, self.cells - 1), low, notes)

    def notes(self, verdict: Verdict, bound: float, low: bool) -> tuple[str, ...]:
        """What may be said of a bound that is missed, the longest first."""
        m = self.rig.magnification
        if verdict.verdict != "missed" or m is None or (m >= bound if low else m <= bound):
            return ()
        by = missed_by(verdict, self.system)
        return (f"misses by {by}", f"by {by}") if by else ()

    def state(self, verdict: Verdict) -> str:
        """A word on a demand: missed, pinch, holds."""
        if verdict.verdict == "missed":
            return "missed"
        if verdict.name in (self.rig.pinch or ()):
            return "pinch"
        return "holds" if verdict.name == self.rig.held else ""

    def draw(self, row: int, start: int, end: int, signs: tuple[str, ...], role: str) -> None:
        """A bar between two cells, with an end where it lies on the axis; the working point crosses its middle."""
        left, middle, right, cross = signs
        for place in range(max(start, 0), min(end, self.cells - 1) + 1):
            self.put(row, place, cross if place == self.point else middle, role)
        if 0 <= start < self.cells:
            self.put(row, start, left, role)
        if 0 <= end < self.cells:
            self.put(row, end, right, role)

    def value(self, row: int, bound: float, place: int, low: bool, notes: tuple[str, ...]) -> bool:
        """A bound's value outside its end of the bar, or inside where there is no room; whether a note stands by it."""
        value = figure(bound, 3)
        if not 0 <= place < self.cells:
            arrow = self.signs.beyond[place >= 0]
            text = f"{arrow} {value} " if place < 0 else f" {value} {arrow}"
            self.put(row, 0 if place < 0 else self.cells - len(text), text, "value")
            return False
        for note in (*notes, ""):
            text = " ".join(filter(None, (note, value) if low else (value, note)))
            for start in self.outside(place, len(text), low):
                if self.blank(row, start, start + len(text)):
                    self.put(row, start, text, "missed" if notes else "value")
                    return bool(note)
        self.put(row, place + 2 if low else place - 1 - len(value), value, "value")
        return False

    def within(self, row: int, start: int, end: int, low: bool, notes: tuple[str, ...]) -> None:
        """A note in the bar itself, beside its missed end, or else behind all that stands in the row."""
        behind = self.canvas.end(row) - self.names + 1
        for note in notes:
            if end - start > len(note) + 2:
                self.put(row, start + 1 if low else end - 2 - len(note), f" {note} ", "missed")
                return
            if behind + len(note) <= self.cells:
                self.put(row, behind, note, "missed")
                return

    def outside(self, place: int, length: int, low: bool) -> list[int]:
        """Where a text may begin outside the end of a bar: beyond the working point where that would cross it."""
        near = place - 1 - length if low else place + 2
        if self.point is None or not near <= self.point < near + length:
            return [near]
        return [self.point - 1 - length if low else self.point + 2, near]

    def span(self, row: int, axis: Axis) -> None:
        if self.rig.span is None:
            self.put(row, 0, _outcome(self.rig), "missed")
            return
        lo, hi = (axis.place(end) for end in self.rig.span)
        if self.rig.span[0] <= self.rig.span[1] * (1 + EDGE):
            self.draw(row, lo, hi, self.signs.span, "span")
        else:
            self.put(row, hi, self.signs.span[2] + self.signs.gap * (lo - hi - 1), "missed")
            self.put(row, lo, self.signs.span[0], "missed")
        if self.point is not None:
            self.put(row, self.point, self.signs.span[3], "point")
        text = _outcome(self.rig)
        for start in (max(lo, hi, self.point or 0) + 3, min(lo, hi, self.point or 0) - 2 - len(text)):
            if self.blank(row, start, start + len(text)):
                self.put(row, start, text, "span" if self.rig.fits else "missed")
                return
