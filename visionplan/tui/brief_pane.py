"""The Brief: every demand as one line, with what is asked and its toll, edited where it stands."""

import math
from functools import lru_cache, partial
from typing import ClassVar

from textual.binding import Binding, BindingType
from textual.events import Key

from visionplan.brief.fields import BY_KEY, LINES, SECTIONS, Line, expected
from visionplan.brief.forms import value_text, value_texts
from visionplan.brief.model import Brief
from visionplan.faults import Fault, InputError
from visionplan.text import shorten
from visionplan.tui.entry import Entry
from visionplan.tui.pane import Item, Pane
from visionplan.tui.rigs_table import preview
from visionplan.tui.rows import Row, cell, ends, fit

_NAME = 24
_BAR = 8
_PREVIEW = 5


@lru_cache(4)
def _texts(text: str) -> dict[str, str]:
    return value_texts(text)


@lru_cache(4)
def _held(brief: Brief) -> dict[str, str]:
    """What holds where a line is left out."""
    return {line.key: value_text(brief, line.key) for line in LINES}


class BriefPane(Pane):
    """The lines of the brief under a cursor."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("enter", "edit", "change"),
        Binding("delete,x", "drop", "drop line", key_display="Del"),
    ]
    number = 1
    label = "Brief"

    def __init__(self) -> None:
        super().__init__()
        self.cursor = "scene.field"
        self.entry: Entry | None = None
        self.fault: Fault | None = None
        """What is wrong with what is being typed."""

    @property
    def line(self) -> Line:
        """The line that the cursor is on."""
        return BY_KEY[str(self.cursor)] if self.cursor else LINES[0]

    def items(self, width: int) -> list[Item]:
        """Every line in its section."""
        texts = _texts(self.state.work.text)
        items: list[Item] = []
        for section, doc in SECTIONS.items():
            items.append(([(f" {doc}", "head")], None))
            for line in LINES:
                if line.section == section:
                    items.append((partial(self._row, line, texts, width), line.key))
                    if self.entry and line.key == self.cursor:
                        items.append((self._under(width), None))
        return items

    def _row(self, line: Line, texts: dict[str, str], width: int) -> Row:
        here = line.key == self.cursor
        asked = line.key in texts
        look = "cursor" if here and not self.entry else ""
        name = line.name.replace("_", " ")
        mark = ("▸ " if here else "  ", look)
        names = _NAME if width > 60 else 18
        tolls = self._toll(line.key, width > 60)
        values = width - 2 - names - sum(len(text) for text, _ in tolls) - 1
        if self.entry and here:
            return [mark, cell(shorten(name, names - 1), names, "strong"), *self.entry.row(values), (" ", ""), *tolls]
        value = texts[line.key] if asked else _held(self.state.brief)[line.key]
        shown = value if asked else f"not asked ({value})" if value not in ("", "any") else "not asked"
        role = "" if asked else "dim"
        return [
            mark,
            cell(shorten(name, names - 1), names, f"{role} {look}"),
            cell(shown, values, f"{role or 'strong'} {look}"),
            (" ", look),
            *tolls,
        ]

    def _toll(self, key: str, bar: bool) -> Row:
        results = self.state.results
        toll = (results.tolls or {}).get(key)
        if toll is None:
            return [(" " * (8 + (_BAR + 1) * bar), "")]
        role = "dim" if results.tolls_of != self.state.generation or not toll else ""
        row = [(f"{toll:>+8,}" if toll else f"{'0':>8}", role)]
        if bar:
            most = max(1, *results.tolls.values()) if results.tolls else 1
            length = math.ceil(_BAR * math.log1p(max(toll, 0)) / math.log1p(most))
            row.append((" " + "▪" * length + " " * (_BAR - length), role or "pinch"))
        return row

    def _under(self, width: int) -> Row:
        """What stands under a value that is being typed."""
        if self.fault:
            text = f"{self.fault.found}; expected {self.fault.expected}" if self.fault.expected else self.fault.found
            return fit([("    ", ""), (f"× {text}", "warn")], width)
        before = self.state.value(self.line.key) or "not asked"
        choices = f"   ↑↓ {', '.join(self._choices())}" if self._choices() else ""
        return fit([("    ", ""), (f"was {before}   Enter keeps, Esc drops{choices}", "dim")], width)

    def _choices(self) -> tuple[str, ...]:
        if self.line.kind == "yes":
            return ("yes", "no")
        return self.line.choices if self.line.kind == "choice" else ()

    def fixed(self, width: int) -> list[Row]:
        """What the columns are."""
        toll = f"{'toll':>8}" + " " * (_BAR + 1) * (width > 60)
        names = _NAME if width > 60 else 18
        return [ends([(" " * (2 + names) + "asked", "dim")], [(toll, "dim")], width)]

    def below(self, width: int, height: int) -> list[Row]:
        """The first of the ranking, where it doesn't stand beside."""
        return [] if self.app.wide else preview(self.state, width, _PREVIEW)

    def hint(self) -> str:
        """What the line means, and what its toll says."""
        line = self.line
        toll = (self.state.results.tolls or {}).get(line.key)
        cost = f" Without this line {toll:,} more {'pair' if toll == 1 else 'pairs'} would fit." if toll else ""
        if self.entry:
            return f"{line.doc}: {expected(line)}."
        return (
            f"{line.doc}.{cost}"
            if line.key in self.state.brief.stated
            else f"{line.doc}. Enter asks it: {expected(line)}."
        )

    # typing

    def action_edit(self) -> None:
        """Type another value."""
        if not self.cursor or not self.app.may_change():
            return
        value = self.state.value(self.line.key)
        self.entry, self.fault = Entry(value), None
        self.moved()

    @property
    def typing(self) -> bool:
        """Keys go into the value while one is being typed."""
        return self.entry is not None

    def typed(self, event: Key) -> None:
        """Type."""
        assert self.entry
        if event.key == "escape":
            self.leave()
        elif event.key == "enter":
            self._accept()
        elif event.key in ("up", "down", "tab") and self._choices():
            self.entry.turn(self._choices(), event.key == "up")
            self._typed()
        elif self.entry.press(event.key, event.character):
            self._typed()

    def pasted(self, text: str) -> None:
        """Type what was pasted."""
        assert self.entry
        self.entry.insert(text)
        self._typed()

    def _typed(self) -> None:
        assert self.entry
        if self.entry.text.strip():
            self.fault = self.state.type(self.line.key, self.entry.text)
        elif self.line.required:
            self.fault = Fault("", "nothing stands here", expected(self.line))
        else:
            self.fault = None
        self.app.brief_changed()

    def _accept(self) -> None:
        assert self.entry
        typed = self.entry.text.strip()
        try:
            if typed or self.line.required:
                self.state.set(self.line.key, typed)
            else:
                self.state.drop(self.line.key)
        except InputError as error:
            self.fault = error.faults[0]
            self.app.redraw()
            return
        self.entry = self.fault = None
        self.app.brief_changed()

    def leave(self) -> None:
        """Drop what is being typed."""
        self.entry = self.fault = None
        self.state.untype()
        self.app.brief_changed()

    def action_drop(self) -> None:
        """Take the line out of the brief."""
        if not self.cursor or not self.app.may_change():
            return
        if self.line.key not in self.state.brief.stated:
            self.app.tell(f"{self.line.name.replace('_', ' ')} is not asked.")
            return
        try:
            self.state.drop(self.line.key)
        except InputError as error:
            self.app.tell(f"{error.faults[0].found}; Enter changes it.", "warn")
            return
        self.app.tell(f"{self.line.name.replace('_', ' ')} is no longer asked. u brings it back.")
        self.app.brief_changed()
