"""What is wrong with a catalogue or a brief: a list to walk, the fault under the cursor in full."""

from collections.abc import Sequence
from typing import ClassVar

from textual.binding import Binding, BindingType

from visionplan.faults import Fault
from visionplan.text import clean
from visionplan.tui.pages import Page
from visionplan.tui.rows import Row, cell, paragraph


class FaultsPage(Page[str]):
    """Every fault a row."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("up,k", "move(-1)"),
        Binding("down,j", "move(1)"),
        Binding("pageup", "move(-12)"),
        Binding("pagedown", "move(12)"),
        Binding("home", "move(-1000000)"),
        Binding("end", "move(1000000)"),
        Binding("s", "act('skip')"),
        Binding("r", "act('again')"),
        Binding("c,enter", "act('other')"),
    ]

    def __init__(self, name: str, faults: Sequence[Fault], catalogue: bool = True):
        count = f"{len(faults):,} faults" if len(faults) > 1 else "1 fault"
        super().__init__(f"{count} in {clean(name)}")
        self.faults = faults
        self.catalogue = catalogue
        self.place = self.top = 0

    def content(self, width: int, height: int) -> list[Row]:
        """The faults in view, and the one under the cursor in full."""
        fault = self.faults[self.place]
        whole = paragraph(clean(str(fault)), width - 4, "", "  ")[:5]
        room = max(1, height - len(whole) - 1)
        self.top = max(min(self.top, self.place), self.place - room + 1, 0)
        rows: list[Row] = []
        for place, one in list(enumerate(self.faults))[self.top : self.top + room]:
            here = place == self.place
            name = one.file.rpartition("/")[2]
            where = f"{name}:{one.line}" if one.line else name
            rows.append(
                [
                    (" ", ""),
                    cell(("▸ " if here else "  ") + clean(where), 22, "cursor" if here else "strong"),
                    cell(f" {clean(one.column)}", 20, "dim"),
                    (f" {clean(one.found)}", ""),
                ]
            )
        rows += [[]] * (room - len(rows))
        return [*rows, [("─" * width, "dim")], *whole]

    def key_row(self) -> Row:
        """What can be done about them."""
        walk: Row = [("↑↓", "key"), (" walk   ", "")]
        if not self.catalogue:
            return [*walk, *super().key_row()]
        return [
            *walk,
            ("s", "key"),
            (" go on without the rows at fault   ", ""),
            ("r", "key"),
            (" read again   ", ""),
            ("c", "key"),
            (" other catalogue", ""),
        ]

    def action_move(self, by: int) -> None:
        """Walk."""
        self.place = max(0, min(self.place + by, len(self.faults) - 1))
        self.redraw()

    async def action_act(self, answer: str) -> None:
        """Do something about them."""
        await self.answer(answer if self.catalogue else None)
