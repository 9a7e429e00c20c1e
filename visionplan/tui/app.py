"""The app: the views, how they share the screen, and what every key does that belongs to none of them."""

from collections.abc import Callable, Iterator
from concurrent.futures import Future
from inspect import isawaitable
from typing import ClassVar

from textual.app import App, ComposeResult
from textual.binding import Binding, BindingType
from textual.containers import Horizontal, Vertical
from textual.dom import DOMNode
from textual.events import Event, Key, Paste, Resize

from visionplan.catalogue.items import Catalogue
from visionplan.faults import InputError
from visionplan.solve.rig import Rig
from visionplan.tui.asbuilt_pane import AsBuiltPane
from visionplan.tui.brief_pane import BriefPane
from visionplan.tui.chrome import NEEDED, Foot, Head, Small, key_names
from visionplan.tui.filing import Filing
from visionplan.tui.help import help_rows
from visionplan.tui.lines import Lines
from visionplan.tui.looks import PALETTES, THEMES
from visionplan.tui.pages import Page, PickPage, TextPage
from visionplan.tui.pane import Pane
from visionplan.tui.rig_pane import RigPane
from visionplan.tui.rigs_pane import RigsPane
from visionplan.tui.rows import paragraph
from visionplan.tui.shortlist_pane import ShortlistPane
from visionplan.tui.solving import Solving
from visionplan.tui.state import ReadOnly, State
from visionplan.tui.work import Mark

WIDE = (120, 35)
"""Columns and rows from which three views stand together."""


class PlanApp(Filing, Solving, App[None]):
    """The terminal interface of one work."""

    CSS = """
    Screen { layers: base; }
    #body, #right { height: 1fr; width: 1fr; }
    .wide #brief { width: 46; margin-right: 1; }
    .wide #rigs { height: 2fr; }
    .wide #rig { height: 3fr; }
    """
    ENABLE_COMMAND_PALETTE = False
    AUTO_FOCUS = None
    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("1", "view(1)", "Brief", show=False),
        Binding("2", "view(2)", "Rigs", show=False),
        Binding("3", "view(3)", "Rig", show=False),
        Binding("4", "view(4)", "Shortlist", show=False),
        Binding("5", "view(5)", "As built", show=False),
        Binding("tab", "turn(1)", "next view", show=False),
        Binding("shift+tab", "turn(-1)", "view before", show=False),
        Binding("u", "undo", "undo"),
        Binding("U", "redo", "redo"),
        Binding("ctrl+s", "save", "save"),
        Binding("ctrl+o", "open", "open a brief", show=False),
        Binding("C", "catalogue", "choose the catalogue", show=False),
        Binding("T", "colours", "choose colours", show=False),
        Binding("i", "whole", "the hint in full", show=False),
        Binding("ctrl+r", "rank", "rank anew", show=False),
        Binding("question_mark", "help", "help", show=False),
        Binding("colon,ctrl+p", "palette", "every action by name", show=False),
        Binding("escape", "stop", "stop a slow ranking", show=False),
        Binding("q,ctrl+q,ctrl+c", "leave", "quit", key_display="q"),
    ]

    def __init__(
        self,
        state: State,
        palette: str = "terminal",
        ascii: bool = False,
        reading: "Future[Catalogue] | None" = None,
    ):
        App.__init__(self)
        self.state = state
        self.ascii = ascii
        self.palette = palette
        self.wide = False
        self.message: tuple[str, str] | None = None
        self.broken: Exception | None = None
        """What ended the interface, where it wasn't the person at it."""
        self._after: dict[Page, Callable] = {}
        """What follows the answer of each page that is shown."""
        self.head, self.foot, self.small = Head(), Foot(), Small()
        self.brief_pane, self.rigs, self.rig_pane, self.shortlist = BriefPane(), RigsPane(), RigPane(), ShortlistPane()
        self.as_built = AsBuiltPane()
        self.panes: tuple[Pane, ...] = (self.brief_pane, self.rigs, self.rig_pane, self.shortlist, self.as_built)
        self.pane: Pane = self.rigs
        """The view in use."""
        for theme in THEMES:
            self.register_theme(theme)
        # before the style sheet is read, or it would be read twice
        self.wear(self.state.settings.get("palette", palette) if palette != "plain" else palette)
        Filing.__init__(self, reading)
        Solving.__init__(self)

    def compose(self) -> ComposeResult:
        """The views between head and foot."""
        yield self.small
        yield self.head
        self.body = Horizontal(
            self.brief_pane,
            Vertical(self.rigs, self.rig_pane, id="right"),
            self.shortlist,
            self.as_built,
            id="body",
        )
        yield self.body
        yield self.foot

    def on_mount(self) -> None:
        """Begin with the work as it was left."""
        self.arrange()
        self.opened()

    # the screen

    def arrange(self, size: tuple[int, int] | None = None) -> None:
        """Share the screen, of a size that has just changed where it is given, among the views."""
        width, height = size or self.size
        enough = width >= NEEDED[0] and height >= NEEDED[1]
        self.wide = width >= WIDE[0] and height >= WIDE[1]
        for part in (self.head, self.body, self.foot):
            part.display = enough
        alone = (self.shortlist, self.as_built)
        together = self.wide and self.pane not in alone
        for pane in self.panes:
            _show(pane, pane is self.pane or (together and pane not in alone))
        _show(self.small, not enough)
        self.query_one("#right").display = self.rigs.display or self.rig_pane.display
        self.screen_stack[0].set_class(together, "wide")
        if enough and len(self.screen_stack) == 1:
            self.pane.focus()
        if self.wide and self.rig_pane.base is None:
            self.follow()

    def on_resize(self, event: Resize) -> None:
        """Share the new screen."""
        self.arrange(event.size)
        self.call_after_refresh(self.redraw)

    def redraw(self) -> None:
        """Show what has changed, wherever."""
        if not self.is_running or not self.screen_stack:
            return
        top = self.screen
        if isinstance(top, Page):
            top.redraw()
            return
        for part in (self.head, self.small, *self.panes, self.foot):
            if part.is_mounted:
                part.redraw()

    def wear(self, palette: str) -> None:
        """Put on other colours."""
        self.palette = palette if palette in (*PALETTES, "plain") else "terminal"
        self.theme = self.palette if self.palette in ("dusk", "daylight") else "ansi-dark"
        self.redraw()

    async def on_event(self, event: Event) -> None:
        """Take keys one after the other, each wholly before the next: on a slow line they come in bursts."""
        if isinstance(event, Key) and not event.is_forwarded:
            await self._press(event)
        elif isinstance(event, Paste) and not event.is_forwarded:
            top = self.screen
            if isinstance(top, Page):
                top.pasted(event.text)
            elif self.pane.typing:
                self.pane.pasted(event.text)
        else:
            await super().on_event(event)

    async def _press(self, event: Key) -> None:
        top = self.screen
        if isinstance(top, Page):
            if not await top.pressed(event):
                await self._act_on(top, event.key)
            return
        self.message = None
        if self.pane.typing:
            self.pane.typed(event)
        elif not await self._act_on(self.pane, event.key):
            await self._act_on(self, event.key)
        self.foot.redraw()

    async def _act_on(self, holder: DOMNode, key: str) -> bool:
        """Do what a binding of the holder says of the key; whether there is one."""
        bindings = holder._bindings.key_to_bindings.get(key)
        if bindings:
            await self.run_action(bindings[-1].action, holder)
        return bool(bindings)

    def show(self, page: Page, then: Callable) -> None:
        """Put a page over the views, and act on its answer."""
        self._after[page] = then
        self.push_screen(page)

    async def leave(self, page: Page, value: object) -> None:
        """Take a page away and act on its answer."""
        then = self._after.pop(page, None)
        if then is None:
            return
        await self.pop_screen()
        told = then(value)
        if isawaitable(told):
            await told
        self.redraw()

    def tell(self, text: str, role: str = "strong") -> None:
        """Say something until the next key."""
        self.message = text, role
        self.redraw()

    def may_change(self) -> bool:
        """Whether the work may be changed here; says so where not."""
        if not self.state.writable:
            self.tell(self.state.told(), "warn")
        return self.state.writable

    def write_raw(self, sequence: str) -> None:
        """Send a control sequence to the terminal."""
        if self._driver is not None:
            self._driver.write(sequence)
            self._driver.flush()

    # views

    def action_view(self, number: int) -> None:
        """Bring a view up."""
        self._leave_typing()
        before, self.pane = self.pane, self.panes[number - 1]
        if self.pane is self.rig_pane and self.rig_pane.base is None:
            self.follow()
        if self.pane is self.as_built is not before:
            self.as_built.choose(self._in_hand(before))
        self.arrange()
        self.redraw()

    def _in_hand(self, pane: Pane) -> Mark | None:
        """The rig that a view is about, where it is about one."""
        if pane is self.shortlist:
            return self.shortlist.mark
        return self.rig_pane.setting[0] if pane is self.rig_pane else None

    def action_turn(self, by: int) -> None:
        """Go on to the next view."""
        self.action_view((self.panes.index(self.pane) + by) % len(self.panes) + 1)

    def focused_pane(self, pane: Pane) -> None:
        """The view that takes the keys is the one in use, also where the mouse pointed at it."""
        if pane is not self.pane:
            self._leave_typing()
            self.pane = pane
        self.redraw()

    def _leave_typing(self) -> None:
        if self.brief_pane.entry:
            self.brief_pane.leave()
        self.as_built.leave()
        self.rigs.entry = self.shortlist.entry = None

    def look_at(self, rig: Rig | None) -> None:
        """Show a rig of the ranking in the rig view."""
        self.rig_pane.look_at(rig)

    def look_at_mark(self, mark: Mark, rig: Rig) -> None:
        """Show a rig of the shortlist as it is set there."""
        ranking = self.state.results.ranking
        pairs = {(one.camera, one.lens): one for one in (ranking.rigs if ranking else ())}
        self.rig_pane.look_at(pairs.get(mark.pair, rig), mark, rig)
        self.action_view(3)

    def follow(self) -> None:
        """Let the rig view show what the ranking has of its rig now, else what stands under the cursor."""
        ranking = self.state.results.ranking
        if ranking is None:
            return
        looked = self.rig_pane.base
        pairs = {(one.camera, one.lens): one for one in ranking.rigs}
        self.rigs.settle(self.rigs.keys())
        at_cursor = self.rigs.rig or next(iter(ranking.rigs), None)
        if self.wide and self.pane is not self.rig_pane:
            self.look_at(at_cursor)
        else:
            self.look_at(pairs.get((looked.camera, looked.lens), at_cursor) if looked else at_cursor)

    # changes

    def brief_changed(self) -> None:
        """Rank anew and show what has changed."""
        self.state.results.fault = ""
        self.rank()
        self.redraw()

    def set_order(self, order: str | None) -> None:
        """Put the ranking into another order."""
        if order and order != self.order:
            self.state.settings["order"] = order
            self.state.keep()
            self.rigs.touched = False
            self.rank()
        self.redraw()

    def _undone(self, step: Callable[[], str | None], word: str) -> None:
        if not self.may_change():
            return
        catalogue = self.state.work.catalogue
        label = step()
        if label is None:
            self.tell(f"There is nothing to {word}.")
            return
        self.tell(f"{'Undone' if word == 'undo' else 'Done again'}: {label}.")
        if self.state.work.catalogue != catalogue:
            self.state.catalogue = None
            self.read()
        self.brief_changed()
        self.marks_changed()

    def action_undo(self) -> None:
        """Take the last change back."""
        self._undone(self.state.undo, "undo")

    def action_redo(self) -> None:
        """Make it again."""
        self._undone(self.state.redo, "redo")

    def action_rank(self) -> None:
        """Rank the brief anew."""
        self.brief_changed()

    def action_stop(self) -> None:
        """Give up a slow ranking."""
        self.stop()

    # pages

    def _everywhere(self) -> Iterator[Binding]:
        return (binding for binding in self.BINDINGS if isinstance(binding, Binding))

    def _of(self, pane: Pane) -> Iterator[Binding]:
        own = [*type(pane).BINDINGS, *Pane.BINDINGS]
        return (binding for binding in own if isinstance(binding, Binding) and binding.description)

    def keys_shown(self) -> Iterator[tuple[str, str]]:
        """The keys at the foot: those of the view, then those that work everywhere."""
        yield from self.pane.pairs_of_keys
        for binding in (*self._of(self.pane), *self._everywhere()):
            if binding.show:
                yield binding.key_display or key_names(binding), self.pane.word(binding)

    def action_help(self) -> None:
        """Tell what this view is and its keys."""
        keys = [(key_names(binding), binding.description) for binding in self._of(self.pane)]
        everywhere = [(key_names(binding), binding.description) for binding in self._everywhere()]
        label = self.pane.label
        self.show(TextPage(label, lambda width: help_rows(label, keys, everywhere, width)), self._back)

    def action_whole(self) -> None:
        """Show the hint in full."""
        text = self.pane.hint()
        if text:
            self.show(TextPage(self.pane.label, lambda width: paragraph(text, width - 4, "", "  ")), self._back)

    def action_palette(self) -> None:
        """Find an action by its name."""
        options = []
        for pane in (self.pane, *(pane for pane in self.panes if pane is not self.pane)):
            for binding in self._of(pane):
                words = f"{pane.label}, {key_names(binding)}"
                options.append((binding.description, words, f"{pane.number} {binding.action}"))
        for binding in self._everywhere():
            options.append((binding.description, key_names(binding), f"0 {binding.action}"))
        options += [
            ("save under another name", "", "0 save_as"),
            ("copy the comparison table alone", "", "0 copy_as('table')"),
            ("copy the shortlist as CSV", "", "0 copy_as('csv')"),
            ("copy the shortlist as JSON", "", "0 copy_as('json')"),
        ]
        self.show(PickPage("Every action", options), self._act)

    async def _act(self, chosen: str | None) -> None:
        if chosen:
            number, _, action = chosen.partition(" ")
            if int(number):
                self.action_view(int(number))
                await self.run_action(action, self.panes[int(number) - 1])
            else:
                await self.run_action(action, self)
        self.redraw()

    def _back(self, _: object) -> None:
        self.redraw()

    def action_copy_as(self, form: str) -> None:
        """Send the shortlist in another format to the clipboard."""
        self.copy(form)

    def action_colours(self) -> None:
        """Choose other colours."""
        words = {
            "terminal": "the terminal's own sixteen colours",
            "dusk": "light on dark",
            "daylight": "dark on light",
        }
        options = [(name, words[name], name) for name in PALETTES]
        self.show(PickPage("Which colours?", options, current=self.palette), self._wear)

    def _wear(self, palette: str | None) -> None:
        if palette:
            self.state.settings["palette"] = palette
            self.state.keep()
            self.wear(palette)
        self.redraw()

    def action_leave(self) -> None:
        """Quit, but ask where the brief's file doesn't hold every change."""
        if not (self.state.work.changed and self.state.writable):
            self.end()
            return
        options = [
            ("Save and quit", "write the brief to its file", "save"),
            ("Quit", "the work is kept as it is and offered at the next start", "quit"),
            ("Back", "go on", "back"),
        ]
        intro = "The brief has changes that its file doesn't hold."
        if self.state.journal.problem:
            intro += f" They are not kept on disk either ({self.state.journal.problem}): quitting loses them."
            options[1] = ("Quit", "lose them", "quit")
        self.show(PickPage("Quit?", options, intro=intro, narrow=False), self._leave)

    def _leave(self, choice: str | None) -> None:
        if choice == "quit":
            self.end()
        elif choice == "save":
            if self.state.work.path:
                try:
                    self.state.save()
                except (InputError, ReadOnly) as error:
                    self.tell(f"The brief could not be saved: {error}", "warn")
                else:
                    self.end()
            else:
                self.action_save_as(self.end)
        self.redraw()

    def _handle_exception(self, error: Exception) -> None:
        """Leave the screen in order; `start` words what went wrong."""
        if self.is_headless:
            super()._handle_exception(error)
        elif self.broken is None:
            self.broken = error
            self.exit(return_code=2)

    def end(self) -> None:
        """Leave."""
        self.solver.close()
        self.state.close()
        self.exit()


def _show(part: Lines, shown: bool) -> None:
    """Show a part or hide it; one that comes into view is drawn anew, as it may have changed."""
    if shown and not part.display:
        part.anew()
    part.display = shown
