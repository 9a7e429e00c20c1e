"""The Shortlist: the marked rigs side by side, a column each, with a note to each."""

from dataclasses import replace
from typing import ClassVar

from textual.binding import Binding, BindingType
from textual.events import Key

from visionplan.report.remarks import pair
from visionplan.report.shortlist import Entry as Listed
from visionplan.report.shortlist import compared
from visionplan.report.words import limits
from visionplan.solve.rig import Rig
from visionplan.text import clean
from visionplan.tui.entry import Entry
from visionplan.tui.pane import Item, Pane
from visionplan.tui.rigs_table import GRADE_ROLE
from visionplan.tui.rows import Row, cell, paragraph
from visionplan.tui.work import Mark

_NAMES = 22
_LEAST, _MOST = 18, 30
"""Terminal cells of a rig's column."""


class ShortlistPane(Pane):
    """The marked rigs."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("left,h", "turn(-1)", "rig before", show=False),
        Binding("right,l", "turn(1)", "next rig", show=False),
        Binding("n", "note", "note"),
        Binding("enter", "open", "look at"),
        Binding("y", "copy", "copy"),
        Binding("x", "export", "export"),
        Binding("delete,space", "unmark", "take off", key_display="Del"),
    ]
    number = 4
    label = "Shortlist"
    pairs_of_keys = (("←→", "rig"),)

    def __init__(self) -> None:
        super().__init__()
        self.place = 0
        """The column under the cursor."""
        self.left = 0
        """The first column in view."""
        self.entry: Entry | None = None
        """A note while it is being typed."""

    def listed(self) -> list[Listed]:
        """What can be exported: the marked rigs that could be judged."""
        return [
            Listed(rig, mark.note, not mark.planned) for mark, rig in self.state.shortlist() if isinstance(rig, Rig)
        ]

    @property
    def mark(self) -> Mark | None:
        """The rig under the cursor, without its note."""
        marks = self.state.work.marks
        return replace(marks[max(0, min(self.place, len(marks) - 1))], note="") if marks else None

    def _columns(self, width: int) -> tuple[int, range]:
        """How wide a column is, and which are in view."""
        count = len(self.state.work.marks)
        shown = max(1, min(count, (width - _NAMES) // _LEAST))
        own = min(_MOST, (width - _NAMES) // shown)
        self.place = max(0, min(self.place, count - 1))
        self.left = max(min(self.left, self.place), self.place - shown + 1, 0)
        return own, range(self.left, min(count, self.left + shown))

    def fixed(self, width: int) -> list[Row]:
        """Camera, lens and note of each rig."""
        marks = self.state.work.marks
        if not marks:
            return []
        own, places = self._columns(width)
        count = f"{len(marks)} on the shortlist"
        if len(places) < len(marks):
            count = f"{places[0] + 1}–{places[-1] + 1} of {len(marks)}  ←→"
        cameras: Row = [cell(count, _NAMES, "dim")]
        lenses: Row = [cell("", _NAMES)]
        outcomes: Row = [cell("* best of its row", _NAMES, "dim")]
        notes: Row = [cell("note", _NAMES, "dim")]
        shortlist = self.state.shortlist()
        for place in places:
            mark, rig = shortlist[place]
            here = place == self.place
            role = "cursor" if here else "strong"
            cameras.append(cell(f"{'▸' if here else ' '}{clean(mark.camera)}", own, role))
            lenses.append(cell(f" {clean(mark.lens)}", own, role))
            word = " set by hand" if not mark.planned else ""
            if isinstance(rig, Rig):
                outcomes.append(cell(f" {rig.grade or 'does not fit'}{word}", own, GRADE_ROLE[rig.grade]))
            else:
                outcomes.append(cell(f" {rig or 'judging …'}", own, "missed"))
            if here and self.entry is not None:
                notes += [(" ", ""), *self.entry.row(own - 1)]
            else:
                notes.append(cell(f" {clean(mark.note) or '–'}", own, "" if mark.note else "dim"))
        return [cameras, lenses, outcomes, notes, [("─" * width, "dim")]]

    def items(self, width: int) -> list[Item]:
        """A row a figure; the cursor runs over them so that they can be read on."""
        marks = self.state.work.marks
        if not marks:
            text = "Nothing is marked yet. In view 2 Space marks the rig under the cursor, in view 3 the one shown."
            return [([], None), *((row, None) for row in paragraph(text, width - 4, "dim", "  "))]
        own, places = self._columns(width)
        rigs = [(place, rig) for place, (_, rig) in enumerate(self.state.shortlist()) if isinstance(rig, Rig)]
        columns = {place: number for number, (place, _) in enumerate(rigs)}
        items: list[Item] = []
        for name, texts, top in compared(self.listed(), self.state.brief.units):
            here = name == self.cursor
            alike = len(texts) > 1 and len(set(texts)) == 1
            row: Row = [cell(("▸ " if here else "  ") + name, _NAMES, "cursor" if here else "dim")]
            for place in places:
                if place not in columns:
                    row.append(cell("", own))
                    continue
                best = columns[place] in top
                text = texts[columns[place]] + (" *" if best else "")
                row.append(cell(f" {text}", own, "best good" if best else "dim" if alike else ""))
            items.append((row, name))
        return items

    def hint(self) -> str:
        """What limits the rig under the cursor, and the whole of a row that is cut."""
        shortlist = self.state.shortlist()
        if not shortlist:
            return ""
        mark, rig = shortlist[max(0, min(self.place, len(shortlist) - 1))]
        if self.entry is not None:
            return f"A note to {pair(mark.camera, mark.lens)}. Enter keeps it, Esc drops it."
        if not isinstance(rig, Rig):
            return f"{pair(mark.camera, mark.lens)}: {rig or 'being judged'}."
        rows = compared(self.listed(), self.state.brief.units)
        place = [one for _, one in shortlist if isinstance(one, Rig)].index(rig)
        best = ", ".join(name for name, _, top in rows if place in top)
        told = f"Best here in {best}. " if best else ""
        value = next((f"{name}: {texts[place]}. " for name, texts, _ in rows if name == self.cursor), "")
        note = f" Note: {clean(mark.note)}" if mark.note else ""
        return f"{value}{told}{limits(rig).capitalize()}.{note}"

    def action_turn(self, by: int) -> None:
        """Go to the next rig."""
        self.place = max(0, min(self.place + by, len(self.state.work.marks) - 1))
        self.app.redraw()

    def action_open(self) -> None:
        """Look at the rig under the cursor."""
        shortlist = self.state.shortlist()
        if shortlist:
            mark, rig = shortlist[self.place]
            if isinstance(rig, Rig):
                self.app.look_at_mark(mark, rig)

    def action_unmark(self) -> None:
        """Take the rig off the shortlist."""
        marks = self.state.work.marks
        if marks and self.app.may_change():
            mark = marks[self.place]
            self.state.mark(mark)
            self.app.tell(f"{pair(mark.camera, mark.lens)} is off the shortlist. u brings it back.")
            self.app.marks_changed()

    def action_note(self) -> None:
        """Write a note to the rig under the cursor."""
        if self.state.work.marks and self.app.may_change():
            self.entry = Entry(self.state.work.marks[self.place].note)
            self.app.redraw()

    def action_copy(self) -> None:
        """Send the shortlist as Markdown to the clipboard of the terminal."""
        self.app.copy("markdown")

    def action_export(self) -> None:
        """Write the shortlist to a file."""
        self.app.export()

    @property
    def typing(self) -> bool:
        """Keys go into the note while it is being typed."""
        return self.entry is not None

    def typed(self, event: Key) -> None:
        """Type the note."""
        assert self.entry
        if event.key == "enter":
            self.state.note(self.place, self.entry.text.strip())
            self.entry = None
        elif event.key == "escape":
            self.entry = None
        else:
            self.entry.press(event.key, event.character)
        self.app.redraw()

    def pasted(self, text: str) -> None:
        """Type what was pasted."""
        assert self.entry
        self.entry.insert(text)
        self.app.redraw()
