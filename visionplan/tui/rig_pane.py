"""The Rig: its span chart, its elevation, its figures; and what-if, moved by hand."""

from collections.abc import Sequence
from dataclasses import replace
from typing import ClassVar

from textual.binding import Binding, BindingType

from visionplan.report.figures import FIGURES, room, short
from visionplan.report.remarks import pair
from visionplan.report.words import asked_words, got_words, limits
from visionplan.solve.rig import Rig
from visionplan.solve.settings import stacks_for, stops_of
from visionplan.text import figure
from visionplan.tui.pane import Item, Pane
from visionplan.tui.rigs_table import GRADE_ROLE
from visionplan.tui.rows import Row, cell, ends, paragraph
from visionplan.tui.work import Mark
from visionplan.units import show

_WORD_ROLE = {"met": "good", "missed": "missed", "unknown": "fair", "not asked": "dim"}


class RigPane(Pane):
    """One rig as a page that scrolls."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("right", "shift(1)", "farther by 1 mm", show=False),
        Binding("left", "shift(-1)", "nearer by 1 mm", show=False),
        Binding("shift+right,right_square_bracket", "shift(10)", "farther by 10 mm", show=False),
        Binding("shift+left,left_square_bracket", "shift(-10)", "nearer by 10 mm", show=False),
        Binding("full_stop", "stop(1)", "next stop", show=False),
        Binding("comma", "stop(-1)", "stop before", show=False),
        Binding("r", "rings(1)", "rings"),
        Binding("R", "rings(-1)", "rings before", show=False),
        Binding("p", "plan", "plan"),
        Binding("space", "keep", "keep"),
        Binding("e", "part('elevation')", "elevation"),
        Binding("f", "part('figures')", "figures"),
        Binding("c", "part('chart')", "chart", show=False),
        Binding("n", "next(1)", "next rig", show=False),
        Binding("b", "next(-1)", "rig before", show=False),
    ]
    number = 3
    label = "Rig"
    pairs_of_keys = (("←→ []", "move"), (", .", "stop"))
    """Keys that belong together, shown so at the foot."""

    def __init__(self) -> None:
        super().__init__()
        self.base: Rig | None = None
        """The rig as planned."""
        self.mark: Mark | None = None
        """How it is set by hand; None while it stands as planned."""
        self.shown: Rig | None = None
        self._shown_as: Mark | None = None
        """The setting by hand that `shown` is of."""
        self.trouble = ""
        self._parts: dict[str, int] = {}

    def look_at(self, rig: Rig | None, mark: Mark | None = None, shown: Rig | None = None) -> None:
        """Show another rig, or the same one judged anew."""
        same = rig and self.base and (rig.camera, rig.lens) == (self.base.camera, self.base.lens)
        self.base, self.trouble = rig, ""
        if not same:
            self.top = 0
        if mark or not same or not rig:
            self.mark, self.shown = (mark, shown or rig) if mark and not mark.planned else (None, rig)
        elif self.mark:
            self._judge()
        else:
            self.shown = rig

    @property
    def setting(self) -> tuple[Mark | None, Rig | None]:
        """The rig looked at and how it is set, as planned where it can't be set so; and that rig once it is judged."""
        if self.base is None:
            return None, None
        if self.mark is None or self.trouble:
            return Mark(self.base.camera, self.base.lens), self.base
        return self.mark, self.shown if self.mark == self._shown_as else None

    def _sheet(self, width: int) -> list[Row]:
        rig = self.shown
        if rig is None:
            text = "Nothing is looked at yet. In view 2 put the cursor on a rig and press Enter."
            return [[], *paragraph(text, width - 4, "dim", "  ")]
        # not needed for the first screen, so not imported for it
        from visionplan.report.elevation import elevation_rows
        from visionplan.report.spanchart import span_rows

        system, ascii = self.state.brief.units, self.app.ascii
        rows: list[Row] = list(span_rows(rig, width - 1, ascii, system))
        self._parts = {"chart": 0, "elevation": len(rows) + 1}
        height = 13 if width >= 60 else 9
        rows += [[], *elevation_rows(rig, width - 1, height, ascii, system), []]
        self._parts["figures"] = len(rows)
        return [
            *rows,
            *self._asked(rig, width, system),
            [],
            *self._figures(rig, width, system),
            *self._assumed(rig, width),
        ]

    def _asked(self, rig: Rig, width: int, system: str) -> list[Row]:
        """What was asked beside what it gets."""
        rest = width - 18 - 11 - 2
        rows: list[Row] = [[cell("", 17), cell("asked", rest // 2, "dim"), cell(" gets", rest - rest // 2, "dim")]]
        for verdict in rig.demands:
            if verdict.verdict == "not asked":
                continue
            asked, got = asked_words(verdict, system), got_words(rig, verdict, system)
            rows.append(
                [
                    cell(verdict.name, 17, "strong" if verdict.name in (rig.pinch or ()) else ""),
                    cell(asked, rest // 2),
                    cell(f" {got}", rest - rest // 2),
                    (f" {verdict.verdict}", _WORD_ROLE[verdict.verdict]),
                ]
            )
        return rows

    def _figures(self, rig: Rig, width: int, system: str) -> list[Row]:
        """Every figure, in two columns where there is room."""
        texts = [(entry.name, entry.text(rig, system)) for entry in FIGURES if entry.value(rig) is not None]
        if width < 72:
            return [[cell(name, 24, "dim"), (text, "")] for name, text in texts]
        half = (len(texts) + 1) // 2
        own = (width - 2) // 2
        rows: list[Row] = []
        for place in range(half):
            row: Row = []
            for name, text in texts[place::half]:
                row += [cell(name, 23, "dim"), cell(text, own - 23), (" ", "")]
            rows.append(row)
        return rows

    def _assumed(self, rig: Rig, width: int) -> list[Row]:
        if not rig.assumptions:
            return []
        rows: list[Row] = [[], [("assumed", "head")]]
        return rows + [row for text in rig.assumptions for row in paragraph(text, width - 1, "dim")]

    def fixed(self, width: int) -> list[Row]:
        """Which rig, how it is set and how it comes out."""
        rig = self.shown
        if rig is None:
            return []
        system = self.state.brief.units
        outcome = f"{rig.grade}, {room(rig.latitude)} of room" if rig.fits else "does not fit"
        if not rig.fits and rig.shortfall:
            outcome += f", {short(rig.shortfall)} short"
        marked = "◆ " if any(self._is(mark) for mark in self.state.work.marks) else ""
        head = ends(
            [(f"{marked}{pair(rig.camera, rig.lens)}", "strong")], [(f" {outcome} ", GRADE_ROLE[rig.grade])], width
        )
        settings: Row = [
            ("WD ", "dim"),
            (show(rig.working_distance, "mm", system), "strong"),
            ("  stop ", "dim"),
            (f"f/{figure(rig.stop)}", "strong"),
            ("  rings ", "dim"),
            (" + ".join(rig.spacers) or "none", "strong"),
            (f"  {rig.orientation}", "dim"),
        ]
        if self.trouble:
            settings.append((f"  {self.trouble}", "warn"))
        moved: Row = [(" as set by hand; p: as planned ", "pinch")] if self.mark else [(" as planned ", "dim")]
        return [head, ends(settings, moved, width)]

    def _is(self, mark: Mark) -> bool:
        if self.base is None or mark.pair != (self.base.camera, self.base.lens):
            return False
        return mark.planned if self.mark is None else replace(mark, note="") == self.mark

    def rows(self, width: int, height: int) -> Sequence[Row]:
        """The part of the page in view."""
        head = [*self.title_row(width), *self.fixed(width)]
        sheet = self._sheet(width)
        room_left = max(1, height - len(head))
        self.top = max(0, min(self.top, len(sheet) - room_left))
        return [*head, *sheet[self.top : self.top + room_left]]

    def items(self, width: int) -> list[Item]:
        """Nothing for a cursor to stand on."""
        return []

    def hint(self) -> str:
        """Why it can't be set so, else what limits the rig, in numbers."""
        if self.trouble:
            return f"It can't be set so: {self.trouble}."
        told = limits(self.shown) if self.shown else ""
        return f"{told[0].upper()}{told[1:]}." if told else ""

    def action_move(self, by: int) -> None:
        """Scroll."""
        self.top = max(0, self.top + by)
        self.app.redraw()

    def action_part(self, part: str) -> None:
        """Scroll to a part of the page; to the chart from there."""
        place = self._parts.get(part, 0)
        self.top = 0 if self.top == place else place
        self.app.redraw()

    def action_next(self, by: int) -> None:
        """Look at the next rig of the ranking."""
        self.app.rigs.action_move(by)
        if self.app.rigs.rig:
            self.app.look_at(self.app.rigs.rig)
        self.app.redraw()

    # what-if

    def _set(self, **settings) -> None:
        if self.base is None:
            return
        mark = self.mark or Mark(self.base.camera, self.base.lens)
        self.mark = replace(mark, **settings)
        self._judge()

    def _judge(self) -> None:
        assert self.base
        assert self.mark
        self.app.judge(self.base, self.mark)

    def judged(self, mark: Mark, rig: Rig | str) -> None:
        """Take what came out of a setting."""
        if mark != self.mark:
            return
        if isinstance(rig, str):
            self.trouble = rig
        else:
            self.shown, self.trouble, self._shown_as = rig, "", mark

    def action_shift(self, steps: int) -> None:
        """Move the camera away from the part or towards it."""
        if self.shown is None or self.shown.working_distance is None:
            return
        unit = 2.54 if self.state.brief.units == "inch" else 1.0
        now = self.mark.at if self.mark and self.mark.at is not None else self.shown.working_distance
        self._set(at=max(unit, round((now / unit) + steps) * unit))

    def action_stop(self, by: int) -> None:
        """Turn the stop."""
        if self.base is None or self.shown is None:
            return
        stops = stops_of(self.base)
        now = self.mark.stop if self.mark and self.mark.stop is not None else self.shown.stop
        place = min(range(len(stops)), key=lambda place: abs(stops[place] - now))
        other = min(max(place + by, 0), len(stops) - 1)
        if other == place:
            self.app.tell("The lens has no stop beyond that.")
        else:
            self._set(stop=stops[other])

    def action_rings(self, by: int) -> None:
        """Put the next stack of rings under the lens, the shortest first."""
        if self.base is None or self.shown is None:
            return
        stacks = stacks_for(self.base)
        if len(stacks) < 2:
            self.app.tell("The catalogue has no ring for this lens.")
            return
        now = tuple(sorted(self.mark.rings if self.mark and self.mark.rings is not None else self.shown.spacers))
        place = stacks.index(now) if now in stacks else 0
        self._set(rings=stacks[(place + by) % len(stacks)])

    def action_plan(self) -> None:
        """Back to where the plan puts it."""
        self.mark, self.shown, self.trouble = None, self.base, ""
        self.app.redraw()

    def action_keep(self) -> None:
        """Put it on the shortlist as it stands, or take it off."""
        if self.base is None or not self.app.may_change():
            return
        mark = self.mark or Mark(self.base.camera, self.base.lens)
        self.state.mark(mark)
        if self.shown and mark == self._shown_as:
            self.state.results.rigs[mark] = self.shown
        on = any(replace(one, note="") == mark for one in self.state.work.marks)
        self.app.tell(f"{'Kept' if on else 'Taken off'}; {len(self.state.work.marks)} on the shortlist (4).")
        self.app.marks_changed()
