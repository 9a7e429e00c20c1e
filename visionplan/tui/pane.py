"""What the views have in common: rows under a cursor, scrolled, with a hint for what the cursor stands on."""

from collections.abc import Callable, Hashable, Sequence
from typing import TYPE_CHECKING, ClassVar

from textual.binding import Binding, BindingType
from textual.events import Blur, Click, Focus, Key, MouseScrollDown, MouseScrollUp

from visionplan.tui.lines import Lines
from visionplan.tui.rows import Row, cell

if TYPE_CHECKING:
    from visionplan.tui.app import PlanApp
    from visionplan.tui.state import State

Item = tuple[Row | Callable[[], Row], Hashable]
"""A row, or what draws it once it comes into view, and what the cursor stands on there; None where it can't."""


class Pane(Lines, can_focus=True):
    """A view. Those below say what their rows are."""

    DEFAULT_CSS = "Pane { height: 1fr; width: 1fr; }"
    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("up,k", "move(-1)", "up", show=False),
        Binding("down,j", "move(1)", "down", show=False),
        Binding("pageup", "page(-1)", "a page up", show=False),
        Binding("pagedown", "page(1)", "a page down", show=False),
        Binding("home,g", "move(-100000)", "first", show=False),
        Binding("end,G", "move(100000)", "last", show=False),
    ]
    number = 0
    """The key that brings it up."""
    label = ""
    first = False
    """Whether the cursor stays on the first row until it is moved."""
    pairs_of_keys: tuple[tuple[str, str], ...] = ()

    def __init__(self) -> None:
        super().__init__(id=self.label.lower().replace(" ", "-"))
        self.cursor: Hashable = None
        self.top = 0
        self._place = 0
        self.touched = False
        """Whether the cursor was moved by hand; else it stays on the first row."""

    app: "PlanApp"

    @property
    def state(self) -> "State":
        """The app's state."""
        return self.app.state

    def fixed(self, width: int) -> Sequence[Row]:
        """Rows that stay on top."""
        return ()

    def items(self, width: int) -> Sequence[Item]:
        """Rows that scroll."""
        raise NotImplementedError

    def below(self, width: int, height: int) -> Sequence[Row]:
        """Rows that stay at the bottom."""
        return ()

    def word(self, binding: Binding) -> str:
        """What a key does where the cursor stands."""
        return binding.description

    @property
    def typing(self) -> bool:
        """Whether keys go into a value, not to the bindings."""
        return False

    def typed(self, event: Key) -> None:
        """Take a key into the value that is being typed."""

    def pasted(self, text: str) -> None:
        """Take text into the value that is being typed."""

    def hint(self) -> str:
        """What there is to know of the place of the cursor, in a sentence."""
        return ""

    def keys(self) -> list[Hashable]:
        """What the cursor can stand on."""
        return [key for _, key in self.items(self.size.width or 80) if key is not None]

    def settle(self, keys: Sequence[Hashable]) -> None:
        """Put the cursor on a row that is there: the one it was on, else the one in its place."""
        if keys and not self.touched and self.first:
            self.cursor, self._place = keys[0], 0
        elif self.cursor in keys:
            self._place = keys.index(self.cursor)
        elif keys:
            self._place = min(self._place, len(keys) - 1)
            self.cursor = keys[self._place]
        else:
            self.cursor, self._place = None, 0

    def rows(self, width: int, height: int) -> Sequence[Row]:
        """The rows in view."""
        title = self.title_row(width)
        items = self.items(width)
        before = self.cursor
        self.settle([key for _, key in items if key is not None])
        if self.cursor != before:
            items = self.items(width)
        head = [*title, *self.fixed(width)]
        foot = list(self.below(width, height))
        room = max(1, height - len(head) - len(foot))
        here = next((place for place, (_, key) in enumerate(items) if key is not None and key == self.cursor), 0)
        self.scroll_into(here, items, room)
        shown = [row() if callable(row) else row for row, _ in items[self.top : self.top + room]]
        shown += [[] for _ in range(room - len(shown))]
        return [*head, *shown, *foot]

    def scroll_into(self, here: int, items: Sequence[Item], room: int) -> None:
        """Bring a row into view, with the headings right above it where it is the first under them."""
        above = here
        while above and items[above - 1][1] is None:
            above -= 1
        self.top = min(self.top, above if here - above < room else here)
        self.top = max(self.top, here - room + 1)
        self.top = max(0, min(self.top, len(items) - room))

    def title_row(self, width: int) -> Sequence[Row]:
        """The pane's name, where several stand together."""
        if not self.app.wide:
            return ()
        role = "strong" if self.has_focus else "dim"
        line = "━" if self.has_focus else "─"
        name = f"{line}{line} {self.number} {self.label} "
        return [[cell(name + line * (width - len(name)), width, role)]]

    def action_move(self, by: int) -> None:
        """Move the cursor by so many rows."""
        keys = self.keys()
        if keys:
            self.settle(keys)
            self.touched = True
            self._place = min(max(self._place + by, 0), len(keys) - 1)
            self.cursor = keys[self._place]
            self.moved()

    def action_page(self, by: int) -> None:
        """Move by what is in view."""
        self.action_move(by * max(1, self.size.height - 4))

    def moved(self) -> None:
        """Show what the cursor has come to."""
        self.app.redraw()

    def _on_focus(self, event: Focus) -> None:
        """Take the keys. What Textual itself would do here sends the whole view again."""
        event.prevent_default()
        self.has_focus = True
        self.app.focused_pane(self)

    def _on_blur(self, event: Blur) -> None:
        event.prevent_default()
        self.has_focus = False
        self.app.redraw()

    def on_click(self, event: Click) -> None:
        """Put the cursor where the mouse points."""
        width = self.size.width
        head = len(self.title_row(width)) + len(self.fixed(width))
        place = self.top + event.y - head
        items = self.items(width)
        if event.y >= head and place < len(items) and items[place][1] is not None:
            self.cursor, self.touched = items[place][1], True
            self.moved()

    def on_mouse_scroll_down(self, event: MouseScrollDown) -> None:
        """Move down."""
        self.action_move(3)

    def on_mouse_scroll_up(self, event: MouseScrollUp) -> None:
        """Move up."""
        self.action_move(-3)
