"""The Rigs: the ranking, one row a pair; where nothing fits, the concessions over the nearest misses."""

from typing import ClassVar

from textual.binding import Binding, BindingType
from textual.events import Key

from visionplan.report.concession import concession_sentence
from visionplan.report.figures import BY_NAME, room
from visionplan.report.remarks import ORDERS, pair
from visionplan.report.words import misses, pinch_words
from visionplan.solve.rig import Rig
from visionplan.text import figure
from visionplan.tui.entry import Entry
from visionplan.tui.pages import PickPage
from visionplan.tui.pane import Item, Pane
from visionplan.tui.rigs_table import Given, Table, concession_row, shown_rigs
from visionplan.tui.rows import Row, ends, fit


class RigsPane(Pane):
    """The ranking under a cursor."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("enter", "choose", "look at it, or take it"),
        Binding("space", "mark", "mark"),
        Binding("o", "order", "order"),
        Binding("slash", "filter", "filter", key_display="/"),
        Binding("m", "misses", "misses"),
        Binding("escape", "unfilter", "filter off", show=False),
    ]
    number = 2
    label = "Rigs"
    first = True

    def __init__(self) -> None:
        super().__init__()
        self.words = ""
        self.entry: Entry | None = None
        """The filter while it is being typed."""
        self.misses = True
        self._tables: tuple[tuple | None, Table | None, Table | None] = (None, None, None)
        """What the tables were made of, and the tables."""

    def items(self, width: int) -> list[Item]:
        """Concessions, rigs that fit, nearest misses."""
        results = self.state.results
        ranking = results.ranking
        fitting, missing = self._shown_tables(width)
        items: list[Item] = []
        if ranking and not ranking.fitting:
            items += self._concessions(width)
        if fitting:
            items += [self._rig(fitting, place) for place in range(len(fitting.rigs))]
        elif ranking and ranking.fitting:
            items.append(([("   No rig that fits holds these words.", "dim")], None))
        if missing:
            title = "nearest misses" if not fitting else "misses"
            items += [([], None), (fit([(f"   {title}", "head")], width), None), *self._inline(missing, fitting)]
            items += [self._rig(missing, place) for place in range(len(missing.rigs))]
        return items

    def _inline(self, missing: Table, fitting: Table | None) -> list[Item]:
        """The misses' own head, where the one that stays on top is that of the rigs that fit."""
        return [(missing.head(), None)] if self.rig is None or self.rig.fits else []

    def _shown_tables(self, width: int) -> tuple[Table | None, Table | None]:
        """Rigs that fit and rigs that don't, laid out anew only where something has changed."""
        ranking = self.state.results.ranking
        made_of = (ranking, self.words, self.misses, width)
        if self._tables[0] is None or any(one is not other for one, other in zip(self._tables[0], made_of)):
            both = shown_rigs(ranking, self.words, self.misses or not (ranking and ranking.fitting))
            fitting, missing = (Table(rigs, self.state, width) if rigs else None for rigs in both)
            self._tables = made_of, fitting, missing
        return self._tables[1], self._tables[2]

    def _concessions(self, width: int) -> list[Item]:
        given = self.state.results.concessions
        if given is None:
            return [([("   Nothing fits. Working out what would have to give …", "head")], None)]
        if not given:
            return [([("   Nothing fits, and no change of one demand alone lets a rig fit.", "head")], None)]
        title = "   Nothing fits. Each of these alone would let a rig fit; Enter takes one:"
        return [([(title, "head")], None)] + [
            (concession_row(self.state, one, width, Given(one) == self.cursor), Given(one)) for one in given
        ]

    def _rig(self, table: Table, place: int) -> Item:
        rig = table.rigs[place]
        key = (rig.camera, rig.lens)
        return (lambda: table.row(place, key == self.cursor, self.state.marked(key))), key

    @property
    def rig(self) -> Rig | None:
        """The rig under the cursor."""
        ranking = self.state.results.ranking
        found = (rig for rig in (ranking.rigs if ranking else ()) if (rig.camera, rig.lens) == self.cursor)
        return next(found, None)

    def fixed(self, width: int) -> list[Row]:
        """Order and filter."""
        fitting, missing = self._shown_tables(width)
        rig = self.rig
        table = missing if rig and not rig.fits else fitting
        head = [table.head()] if table and rig else []
        order = self.app.order
        if self.entry is not None:
            typed = self.entry.row(min(40, width - 40))
            return [[("   filter ", "strong"), *typed, ("  Enter keeps, Esc drops", "dim")], *head]
        left: Row = [("   by ", "dim"), (order, "strong"), (f": {ORDERS[order]}", "dim")]
        right: Row = [(f"filter: {self.words} (Esc drops it) ", "pinch")] if self.words else []
        if not self.misses:
            right = [*right, ("misses hidden ", "dim")]
        return [ends(left, right, width), *head]

    def hint(self) -> str:
        """The whole of what the row may have cut."""
        system = self.state.brief.units
        if isinstance(self.cursor, Given):
            given = self.cursor.concession
            sentence = concession_sentence(self.state.asked, given, system)
            return f"{sentence[0].upper()}{sentence[1:]}: then {pair(given.camera, given.lens)} fits. Enter takes it."
        rig = self.rig
        if rig is None:
            return ""
        price = BY_NAME["price"].text(rig, system)
        name = pair(rig.camera, rig.lens)
        if rig.fits:
            doubt = f"; unknown: {', '.join(rig.unknown)}" if rig.unknown else ""
            rings = f" with {BY_NAME['spacer rings'].text(rig)}" if rig.spacers else ""
            return (
                f"{name}{rings} at f/{figure(rig.stop)}, {price}: {rig.grade}, {room(rig.latitude)} of room, "
                f"{pinch_words(rig)}{doubt}."
            )
        return f"{name}, {price}, misses {'; '.join(misses(rig, system))}."

    def word(self, binding: Binding) -> str:
        """Enter does one thing or the other."""
        if binding.action == "choose":
            return "take it" if isinstance(self.cursor, Given) else "look at"
        return super().word(binding)

    def moved(self) -> None:
        """Let the rig view follow, and fetch more of the ranking near its end."""
        rig = self.rig
        ranking = self.state.results.ranking
        if rig and ranking and rig.rank > len(ranking.rigs) - 3:
            self.app.more()
        if self.app.wide:
            self.app.look_at(rig)
        super().moved()

    def action_choose(self) -> None:
        """Look at the rig, or take the concession."""
        if isinstance(self.cursor, Given):
            self.app.take(self.cursor.concession)
        elif self.rig:
            self.app.look_at(self.rig)
            self.app.action_view(3)

    def action_mark(self) -> None:
        """Put the rig on the shortlist or take it off."""
        if self.rig and self.app.may_change():
            key = (self.rig.camera, self.rig.lens)
            on = self.state.toggle(key)
            count = len(self.state.work.marks)
            self.app.tell(f"{pair(*key)} {'marked' if on else 'no longer marked'}; {count} on the shortlist (4).")
            self.app.marks_changed()

    def action_order(self) -> None:
        """Choose another order."""
        options = [(name, words, name) for name, words in ORDERS.items()]
        self.app.show(PickPage("Which rig comes first?", options, current=self.app.order), self.app.set_order)

    def action_misses(self) -> None:
        """Show or hide what doesn't fit."""
        self.misses = not self.misses
        self.app.redraw()

    def action_filter(self) -> None:
        """Type words that a rig must hold."""
        self.entry = Entry(self.words)
        self.app.more()
        self.app.tell("Words of camera, lens, maker, interface, mount, pinch or grade, in any order.")

    def action_unfilter(self) -> None:
        """Show every rig again."""
        self.words = ""
        self.app.redraw()

    @property
    def typing(self) -> bool:
        """Keys go into the filter while it is being typed."""
        return self.entry is not None

    def typed(self, event: Key) -> None:
        """Type the filter."""
        assert self.entry
        if event.key in ("escape", "enter"):
            self.words = "" if event.key == "escape" else self.entry.text
            self.entry = None
        elif event.key in ("up", "down"):
            self.action_move(-1 if event.key == "up" else 1)
        elif self.entry.press(event.key, event.character):
            self.words = self.entry.text
        self.app.redraw()

    def pasted(self, text: str) -> None:
        """Type what was pasted."""
        assert self.entry
        self.entry.insert(text)
        self.words = self.entry.text
        self.app.redraw()
