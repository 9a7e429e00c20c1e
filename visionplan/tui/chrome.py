"""What stands around the views: the work and its outcome above, a hint and the keys below."""

from collections.abc import Sequence
from typing import TYPE_CHECKING

from textual.binding import Binding

from visionplan.report.lines import wrap
from visionplan.text import clean, shorten
from visionplan.tui.lines import Lines
from visionplan.tui.rigs_table import counts
from visionplan.tui.rows import Row, ends, fit, row_width

if TYPE_CHECKING:
    from visionplan.tui.app import PlanApp

NEEDED = (80, 24)
"""Columns and rows that the interface needs."""


class Head(Lines):
    """The work's title and how many pairs fit; under it the views, as stations of a scale."""

    DEFAULT_CSS = "Head { height: 2; }"
    app: "PlanApp"

    def rows(self, width: int, height: int) -> Sequence[Row]:
        """Both rows."""
        return [self._title(width), self._scale(width)]

    def _title(self, width: int) -> Row:
        state = self.app.state
        right: Row = [(f"{self._outcome()} ", "strong" if not self.app.slow else "dim")]
        if state.work.changed:
            right = [("not saved  ", "dim"), *right]
        if not state.writable:
            right = [("READ-ONLY  ", "warn"), *right]
        elif state.journal.problem:
            right = [("NOT KEPT ON DISK  ", "warn"), *right]
        name = state.asked.title or state.work.path or "a brief without a title"
        return ends([(f" {clean(name)}", "head"), ("  ", "")], right, width)

    def _outcome(self) -> str:
        if self.app.reading:
            return self.app.reading
        if self.app.slow:
            share = "" if self.app.share is None else f" {100 * self.app.share:.0f} %"
            return f"ranking{share} … Esc stops it"
        return counts(self.app.state)

    def _scale(self, width: int) -> Row:
        row: Row = [("├", "dim")]
        for pane in self.app.panes:
            here = pane is self.app.pane
            count = (
                f" {len(self.app.state.work.marks)}" if pane is self.app.shortlist and self.app.state.work.marks else ""
            )
            line = "━" if here else "─"
            row += [
                (line, "dim"),
                (f" {pane.number} {pane.label}{count} ", "here" if here else ""),
                (line, "dim"),
                ("┼", "dim"),
            ]
        rest = width - row_width(row) - 1
        return [*row, ("─" * rest + "┤", "dim")]


class Foot(Lines):
    """What was just said, else a hint, in two rows; under it the keys of the view."""

    DEFAULT_CSS = "Foot { height: 3; }"
    app: "PlanApp"

    def rows(self, width: int, height: int) -> Sequence[Row]:
        """Hint and keys."""
        text, role = self.app.message or (self.app.pane.hint(), "dim")
        lines = wrap(clean(text), width - 2, " ", " ") if text else []
        if len(lines) > 2:
            lines = [lines[0], shorten(f"{lines[1]} {lines[2].strip()}", width - 12) + " i: whole"]
        rows: list[Row] = [[(line, role)] for line in lines[:2]]
        return [*rows, *([[]] * (2 - len(rows))), self._keys(width)]

    def _keys(self, width: int) -> Row:
        last: Row = [("?", "key"), (" help ", "dim"), (":", "key"), (" actions ", "dim")]
        row: Row = [(" ", "")]
        for key, label in self.app.keys_shown():
            more: Row = [(key, "key"), (f" {label}  ", "dim")]
            if row_width(row) + row_width(more) + row_width(last) > width:
                break
            row += more
        return ends(row, last, width)


class Small(Lines):
    """What stands there where the terminal is too small."""

    DEFAULT_CSS = "Small { height: 1fr; display: none; }"

    def rows(self, width: int, height: int) -> Sequence[Row]:
        """What is needed and what there is."""
        text = (
            f"visionplan needs {NEEDED[0]} × {NEEDED[1]} characters; here are {width} × {height}. "
            "Make the window larger, or the letters smaller. Nothing is lost."
        )
        return [fit([(line, "")], width) for line in wrap(text, max(1, width))]


KEY_NAMES = {
    "enter": "Enter",
    "escape": "Esc",
    "space": "Space",
    "delete": "Del",
    "left": "←",
    "right": "→",
    "up": "↑",
    "down": "↓",
    "pageup": "PgUp",
    "pagedown": "PgDn",
    "home": "Home",
    "end": "End",
    "tab": "Tab",
    "slash": "/",
    "colon": ":",
    "question_mark": "?",
    "comma": ",",
    "full_stop": ".",
    "left_square_bracket": "[",
    "right_square_bracket": "]",
}


def key_names(binding: Binding) -> str:
    """The keys of a binding as they are written on the keyboard."""
    return " ".join(_name(key.strip()) for key in binding.key.split(","))


def _name(key: str) -> str:
    parts = key.split("+")
    named = KEY_NAMES.get(parts[-1], parts[-1])
    return "+".join([*(part.capitalize() for part in parts[:-1]), named])
