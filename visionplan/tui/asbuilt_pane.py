"""As built: what was measured of a rig goes in; where it stands, what is off and what to move comes out."""

from typing import TYPE_CHECKING, ClassVar

from textual.binding import Binding, BindingType
from textual.events import Key

from visionplan.faults import Fault
from visionplan.report.remarks import pair
from visionplan.solve.rig import Rig
from visionplan.text import clean, figure
from visionplan.tui.entry import Entry
from visionplan.tui.findings import findings, nothing_yet
from visionplan.tui.measuring import (
    COLUMNS,
    MOST_TARGETS,
    SINGLE,
    Field,
    Measures,
    Values,
    field_of,
    measures,
    numbers,
    without_target,
    wrong,
)
from visionplan.tui.pane import Item, Pane
from visionplan.tui.rows import Row, cell, ends, paragraph
from visionplan.tui.work import Mark
from visionplan.units import show

if TYPE_CHECKING:
    from visionplan.solve.asbuilt import AsBuilt

_NAMES = 17
_CELLS = {"length": 12, "pixels": 12, "along": 9, "at": 10, "off": 14}
_MORE = {"1": "none yet", "2": "one at the other end, or along the other side, tells the tilt"}
"""What stands in the row of a target that isn't measured."""


class AsBuiltPane(Pane):
    """The values under a cursor, and under them what they tell."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("left,h", "column(-1)", "column before", show=False),
        Binding("right,l", "column(1)", "next column", show=False),
        Binding("enter", "edit", "type"),
        Binding("delete,x", "drop", "drop", key_display="Del"),
        Binding("n", "turn(1)", "next rig"),
        Binding("b", "turn(-1)", "rig before", show=False),
        Binding("c", "chart", "chart"),
        Binding("y", "copy", "copy"),
    ]
    number = 5
    label = "As built"
    pairs_of_keys = (("↑↓←→", "value"), ("PgDn", "read on"))

    def __init__(self) -> None:
        super().__init__()
        self.cursor = "1"
        self.column = "length"
        self.mark: Mark | None = None
        """The rig: its pair, and how it is set."""
        self.entry: Entry | None = None
        self.fault: Fault | None = None
        """What is wrong with what is being typed."""
        self.built: AsBuilt | str | None = None
        """What came out, or why nothing can; None while nothing did."""
        self._asked: tuple[Rig, Measures] | None = None
        self._from = 0
        """The first row in view of what came out."""
        self._most = 0
        self._chart = 0
        """The row of it that the chart begins at."""

    # the rig

    def marks(self) -> list[Mark]:
        """The rigs that can be looked at: those of the shortlist, those measured, and the one that view 3 shows."""
        looked, _ = self.app.rig_pane.setting
        return list(dict.fromkeys([*self.state.kept(), *([looked] if looked else [])]))

    def choose(self, mark: Mark | None) -> None:
        """Go to a rig; None stays with the one that was chosen, as long as it is there."""
        marks = self.marks()
        if mark is None:
            mark = self.mark if self.mark in marks else marks[0] if marks else None
        if mark != self.mark:
            self.mark, self.cursor, self.column, self._from = mark, "1", "length", 0
            self.built = self._asked = None

    @property
    def planned(self) -> Rig | str | None:
        """The rig as it was to be built, why it can't be judged, or None while it isn't yet."""
        if self.mark is None:
            return None
        looked, shown = self.app.rig_pane.setting
        return self.state.judged(self.mark) or (shown if looked == self.mark else None)

    @property
    def values(self) -> dict[str, str]:
        """What was measured of it."""
        return self.state.measured(self.mark) if self.mark else {}

    def redraw(self) -> None:
        """Ask for what isn't known yet, and show what has changed."""
        if self.display:
            self.choose(None)
            self._ask()
        super().redraw()

    def _ask(self) -> None:
        read, planned = measures(self.values), self.planned
        if not read.targets:
            self.built = self._asked = None
        elif isinstance(planned, str):
            self.built = planned
        elif planned and not (self._asked and self._asked[0] is planned and self._asked[1] == read):
            self._asked = planned, read
            self.app.ask("built", rig=planned, measures=read)

    def diagnosed(self, planned: Rig | None, read: Measures | None, built: "AsBuilt | str | None") -> None:
        """Take what came out."""
        if self._asked and self._asked[0] is planned and self._asked[1] == read and self.mark:
            self.built = built

    # what stands on the screen

    def fixed(self, width: int) -> list[Row]:
        """Which rig, and how it was to be built."""
        if self.mark is None:
            return []
        marks = self.marks()
        count = f" rig {marks.index(self.mark) + 1} of {len(marks)}" if len(marks) > 1 else ""
        more: Row = [(count, "dim"), ("  n b ", "key")] if count else []
        head = ends([(f" {pair(self.mark.camera, self.mark.lens)}", "strong")], more, width)
        rig = self.planned
        if not isinstance(rig, Rig):
            return [head, [(f" {rig or 'judging …'}", "missed" if rig else "dim")]]
        plan: Row = [
            (" planned" if self.mark.planned else " as set by hand", "dim"),
            ("  WD ", "dim"),
            (show(rig.working_distance, "mm", self.state.brief.units), ""),
            ("  magnification ", "dim"),
            (figure(rig.magnification), ""),
            ("  rings ", "dim"),
            (clean(" + ".join(rig.spacers)) or "none", ""),
            (f"  {rig.orientation}", "dim"),
        ]
        heads: Row = [cell("", _NAMES + 2)]
        heads += [cell(field.name, _CELLS[column], "dim") for column, field in COLUMNS.items()]
        return [head, plan, heads]

    def items(self, width: int) -> list[Item]:
        """The values, a row a target."""
        if self.mark is None:
            text = "There is no rig yet. In view 2 Space marks one for the shortlist, Enter looks at it."
            return [([], None), *((row, None) for row in paragraph(text, width - 4, "dim", "  "))]
        values = self.values
        items: list[Item] = []
        shown = min(MOST_TARGETS, max(numbers(values), default=0) + 1)
        for row in [*(str(number) for number in range(1, shown + 1)), *SINGLE]:
            items.append((self._row(row, values, width), row))
            if self.entry and row == self.cursor:
                items += [(under, None) for under in self._under(values, width)]
        return items

    def _row(self, row: str, values: Values, width: int) -> Row:
        here = row == self.cursor
        name = SINGLE[row].name if row in SINGLE else f"target {row}"
        drawn: Row = [("▸ " if here else "  ", "cursor" if here else ""), cell(name, _NAMES, "strong" if here else "")]
        if row in SINGLE:
            return [*drawn, *self._cell(row, values, 24, here)]
        if not here and row not in map(str, numbers(values)):
            return [*drawn, (_MORE.get(row, "another one"), "dim")]
        for column in COLUMNS:
            drawn += self._cell(f"{row} {column}", values, _CELLS[column], here and column == self.column)
        return drawn

    def _cell(self, key: str, values: Values, cells: int, here: bool) -> Row:
        if here and self.entry:
            return [*self.entry.row(cells - 1), (" ", "")]
        field = field_of(key)
        text = clean(values.get(key, ""))
        if text and field.unit == "px" and text.replace(".", "").isdecimal():
            text += " px"
        none = key.endswith(" off") and values.get(key.replace(" off", " at"), "centre") == "centre"
        shown = "–" if none else text or field.default or "–"
        role = "dim" if none or not text else "strong"
        return [cell(shown, cells - 1, f"{role} cursor" if here else role), (" ", "")]

    def _under(self, values: Values, width: int) -> list[Row]:
        """What stands under a value that is being typed."""
        if self.fault:
            expected = f"; expected {self.fault.expected}" if self.fault.expected else ""
            return paragraph(f"× {self.fault.found}{expected}", width - 1, "warn", "    ")
        before = clean(values.get(self.key, "")) or "not measured"
        choices = f"   ↑↓ {', '.join(self.field.choices)}" if self.field.choices else ""
        return [[(f"    was {before}   Enter keeps, Esc drops{choices}", "dim")]]

    def below(self, width: int, height: int) -> list[Row]:
        """What the values tell, as much as there is room for."""
        if self.mark is None:
            return []
        rows = self._told(width)
        room = max(1, height - len(self.fixed(width)) - len(self.items(width)) - len(self.title_row(width)) - 1)
        self._most = max(0, len(rows) - room)
        self._from = min(self._from, self._most)
        shown = rows[self._from : self._from + room]
        part = f" {self._from + 1}–{self._from + len(shown)} of {len(rows)} rows, PgUp PgDn " if self._most else ""
        rule: Row = [("─" * (width - len(part) - 2), "dim"), (part or "", "dim"), ("──", "dim")]
        return [rule, *shown, *([[]] * (room - len(shown)))]

    def _told(self, width: int) -> list[Row]:
        if isinstance(self.built, str):
            return paragraph(f"Nothing can be told: {clean(self.built)}.", width - 2, "warn", " ")
        if self.built is None:
            rig = self.planned
            return nothing_yet(self.values, not isinstance(rig, Rig) or rig.magnification is not None, width)
        words, chart = findings(self.built, width, self.app.ascii, self.state.brief.units)
        self._chart = len(words)
        return [*words, *chart]

    def hint(self) -> str:
        """What the value under the cursor is."""
        if self.mark is None:
            return ""
        field = self.field
        return f"{field.doc}: {field.expected}."

    def word(self, binding: Binding) -> str:
        """What Del drops here."""
        if binding.action == "drop" and self.column in ("length", "pixels") and self.cursor not in SINGLE:
            return "drop target"
        return super().word(binding)

    # moving

    @property
    def key(self) -> str:
        """The value that the cursor is on."""
        return str(self.cursor) if self.cursor in SINGLE else f"{self.cursor or 1} {self.column}"

    @property
    def field(self) -> Field:
        """What that is."""
        return field_of(self.key)

    def action_column(self, by: int) -> None:
        """Go to the next value of a target."""
        if self.cursor in SINGLE:
            return
        columns = list(COLUMNS)
        self.column = columns[max(0, min(columns.index(self.column) + by, len(columns) - 1))]
        self.app.redraw()

    def action_move(self, by: int) -> None:
        """Go to another target or value; to a target that isn't there yet, at its length."""
        super().action_move(by)
        if self.cursor not in SINGLE and int(str(self.cursor or 1)) not in numbers(self.values):
            self.column = "length"
            self.app.redraw()

    def action_page(self, by: int) -> None:
        """Read on in what came out."""
        self._from = max(0, min(self._from + by * max(3, self.size.height - 12), self._most))
        self.app.redraw()

    def action_chart(self) -> None:
        """Go to the span chart, and back."""
        if self.built is None or isinstance(self.built, str):
            self.app.tell("The chart stands here once a target is measured.")
            return
        place = min(self._chart, self._most)
        self._from = 0 if self._from == place else place
        self.app.redraw()

    def action_turn(self, by: int) -> None:
        """Go to the next rig."""
        marks = self.marks()
        if len(marks) < 2 or self.mark is None:
            self.app.tell("There is no other rig: view 2 marks rigs for the shortlist.")
            return
        self.choose(marks[(marks.index(self.mark) + by) % len(marks)])
        self.app.redraw()

    # typing

    def action_edit(self) -> None:
        """Type another value."""
        if self.mark is None or not self.app.may_change():
            return
        if (
            self.column == "off"
            and self.cursor not in SINGLE
            and self.values.get(f"{self.cursor} at", "centre") == "centre"
        ):
            self.app.tell(
                "A target in the centre has no distance from it. Say first where it lies, one column to the left."
            )
            return
        text = self.values.get(self.key, "")
        self.entry, self.fault = Entry(text or (self.field.default if self.field.choices else "")), None
        self.app.redraw()

    @property
    def typing(self) -> bool:
        """Keys go into the value while one is being typed."""
        return self.entry is not None

    def typed(self, event: Key) -> None:
        """Type."""
        assert self.entry
        choices = self.field.choices
        if event.key == "escape":
            self.leave()
        elif event.key == "enter":
            self._accept()
        elif event.key in ("up", "down", "tab") and choices:
            self.entry.turn(choices, event.key == "up")
            self._check()
        elif self.entry.press(event.key, event.character):
            self._check()
        self.app.redraw()

    def pasted(self, text: str) -> None:
        """Type what was pasted."""
        assert self.entry
        self.entry.insert(text)
        self._check()
        self.app.redraw()

    def leave(self) -> None:
        """Drop what is being typed."""
        self.entry = self.fault = None

    def _check(self) -> None:
        assert self.entry
        typed, planned = self.entry.text.strip(), self.planned
        self.fault = None
        if typed:
            self.fault = wrong(self.values | {self.key: typed}, self.key, planned if isinstance(planned, Rig) else None)

    def _accept(self) -> None:
        assert self.entry
        self._check()
        if self.fault:
            return
        values, key, typed = self.values, self.key, self.entry.text.strip()
        self.leave()
        fresh = {other: text for other, text in values.items() if other != key}
        self._keep(fresh | {key: typed} if typed else fresh, f"{self._named()} {typed or 'not measured'}")
        if typed and self.column == "length" and self.cursor not in SINGLE and f"{self.cursor} pixels" not in values:
            self.column = "pixels"
            self.action_edit()

    def _named(self) -> str:
        return self.field.name if self.cursor in SINGLE else f"target {self.cursor} {self.field.name}"

    def _keep(self, values: dict[str, str], label: str) -> None:
        if self.mark:
            self.state.measure(self.mark, label, values)
            self.app.marks_changed()

    def action_drop(self) -> None:
        """Take a target out, or a value."""
        if self.mark is None or not self.app.may_change():
            return
        values = self.values
        whole = self.cursor not in SINGLE and self.column in ("length", "pixels")
        name = f"target {self.cursor}" if whole else self._named()
        if self.key not in values and not (whole and int(str(self.cursor)) in numbers(values)):
            self.app.tell(f"{name.capitalize()} is not measured.")
            return
        left = without_target(values, int(str(self.cursor))) if whole else values
        self._keep({key: text for key, text in left.items() if whole or key != self.key}, f"{name} dropped")
        self.app.tell(f"{name.capitalize()} is dropped. u brings it back.")

    def action_copy(self) -> None:
        """Send what came out to the clipboard of the terminal."""
        if self.built is None or isinstance(self.built, str):
            self.app.tell("There is nothing to copy before a target is measured.")
            return
        from visionplan.report.asbuilt import asbuilt_text

        text = asbuilt_text(self.built, self.state.brief.units)
        self.app.send(text, "text", "the asbuilt command prints the same")
