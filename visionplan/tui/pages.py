"""Pages over the views: a text to read, a choice, the name of a file."""

from collections.abc import Callable, Sequence
from pathlib import Path
from typing import ClassVar, Generic, TypeVar

from textual.app import ComposeResult
from textual.binding import Binding, BindingType
from textual.events import Key
from textual.screen import Screen

from visionplan.text import clean
from visionplan.tui.entry import Entry
from visionplan.tui.lines import Lines
from visionplan.tui.paths import complete, listing
from visionplan.tui.rows import Row, cell, fit, paragraph

Result = TypeVar("Result")
_MARGIN = 3


class _Body(Lines, can_focus=False):
    """Draws what its page says."""

    DEFAULT_CSS = "_Body { height: 1fr; }"

    def rows(self, width: int, height: int) -> Sequence[Row]:
        """The page's rows."""
        return self.screen.rows(width, height)  # type: ignore[attr-defined]


class Page(Screen[Result], Generic[Result]):
    """A page that takes the whole screen until it is left."""

    BINDINGS: ClassVar[list[BindingType]] = [Binding("escape", "leave", "back")]

    def __init__(self, title: str):
        super().__init__()
        self.heading = title
        self.body = _Body()

    async def pressed(self, event: Key) -> bool:
        """Take a key that no binding of the page has; whether it is taken, so that no binding sees it."""
        return False

    def pasted(self, text: str) -> None:
        """Take text from the terminal's clipboard."""

    async def answer(self, value: Result | None) -> None:
        """Leave the page with an answer, which is acted on before the next key is."""
        await self.app.leave(self, value)  # type: ignore[attr-defined]

    def compose(self) -> ComposeResult:
        """Only its rows."""
        yield self.body

    def redraw(self) -> None:
        """Show what has changed."""
        self.body.redraw()

    def rows(self, width: int, height: int) -> list[Row]:
        """The heading, a rule, what the page is about, and its keys at the bottom."""
        head: list[Row] = [[(f" {self.heading}", "strong")], [("─" * width, "dim")]]
        foot: list[Row] = [[("─" * width, "dim")], fit([(" ", ""), *self.key_row()], width)]
        body = self.content(width, max(1, height - 4))[: max(1, height - 4)]
        return [*head, *body, *([[]] * (height - 4 - len(body))), *foot]

    def content(self, width: int, height: int) -> list[Row]:
        """What stands between the rules."""
        raise NotImplementedError

    def key_row(self) -> Row:
        """The keys that work here."""
        return [("Esc", "key"), (" back", "")]

    async def action_leave(self) -> None:
        """Go back with nothing chosen."""
        await self.answer(None)


class TextPage(Page[None]):
    """A text to read, scrolled by its lines."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("up,k", "scroll(-1)"),
        Binding("down,j", "scroll(1)"),
        Binding("pageup,b", "scroll(-15)"),
        Binding("pagedown,space", "scroll(15)"),
        Binding("home,g", "scroll(-100000)"),
        Binding("end,G", "scroll(100000)"),
        Binding("q,enter,question_mark,i", "leave"),
    ]

    def __init__(self, title: str, text: Callable[[int], list[Row]]):
        super().__init__(title)
        self.text = text
        self.top = 0
        self._most = 0

    def content(self, width: int, height: int) -> list[Row]:
        """The lines in view."""
        lines = self.text(width)
        self._most = max(0, len(lines) - height)
        self.top = min(self.top, self._most)
        return lines[self.top : self.top + height]

    def key_row(self) -> Row:
        """Scrolling, where there is anything to scroll."""
        more: Row = [("   ↑↓ PgUp PgDn", "key"), (" read on", "")] if self._most else []
        return [*super().key_row(), *more]

    def action_scroll(self, by: int) -> None:
        """Read on or back."""
        self.top = max(0, min(self.top + by, self._most))
        self.redraw()


Option = tuple[str, str, str]
"""What is offered: its name, a word on it, and what is returned when it is chosen."""


class PickPage(Page[str]):
    """A list to choose from; typing narrows it."""

    def __init__(self, title: str, options: Sequence[Option], current: str = "", intro: str = "", narrow: bool = True):
        super().__init__(title)
        self.options = options
        self.intro = intro
        self.narrow = narrow
        """Whether typing narrows the list; else the first letter of an option chooses it."""
        self.entry = Entry()
        self.place = next((place for place, option in enumerate(options) if option[2] == current), 0)
        self.top = 0

    @property
    def found(self) -> list[Option]:
        """The options that hold what was typed, those whose names begin with it first."""
        typed = self.entry.text.lower().strip()
        found = [one for one in self.options if all(word in f"{one[0]} {one[1]}".lower() for word in typed.split())]
        return sorted(found, key=lambda one: not one[0].lower().startswith(typed))

    def content(self, width: int, height: int) -> list[Row]:
        """Introduction, what was typed, the options in view."""
        rows: list[Row] = [*paragraph(self.intro, width - 2 * _MARGIN, "", " " * _MARGIN), []] if self.intro else []
        if self.narrow:
            rows += [[(" " * _MARGIN, ""), *self.entry.row(40), ("  type to narrow", "dim")], []]
        found = self.found
        self.place = max(0, min(self.place, len(found) - 1))
        room = max(1, height - len(rows))
        self.top = max(min(self.top, self.place), self.place - room + 1, 0)
        names = min(36, max((len(name) for name, _, _ in found), default=0) + 2)
        for place, (name, words, _) in list(enumerate(found))[self.top : self.top + room]:
            here = place == self.place
            mark = ("▸ " if here else "  ", "cursor" if here else "")
            rows.append(
                [(" ", ""), mark, cell(clean(name), names, "cursor" if here else "strong"), (f" {clean(words)}", "dim")]
            )
        return rows if found else [*rows, [("   nothing of that name", "dim")]]

    def key_row(self) -> Row:
        """Choosing and leaving."""
        return [("↑↓ Enter", "key"), (" choose   ", ""), *super().key_row()]

    async def pressed(self, event: Key) -> bool:
        """Move, narrow, choose."""
        moves = {"up": -1, "down": 1, "pageup": -10, "pagedown": 10, "shift+tab": -1, "tab": 1}
        found = self.found
        if event.key == "escape":
            return False
        if event.key in moves:
            self.place += moves[event.key]
        elif event.key == "enter":
            if found:
                await self.answer(found[max(0, min(self.place, len(found) - 1))][2])
        elif self.narrow:
            if self.entry.press(event.key, event.character):
                self.place = 0
        else:
            initials = [name[0].lower() for name, _, _ in self.options]
            if (event.character or " ").lower() in initials:
                await self.answer(self.options[initials.index((event.character or " ").lower())][2])
        self.redraw()
        return True

    def pasted(self, text: str) -> None:
        """Narrow by what was pasted."""
        if self.narrow:
            self.entry.insert(text)
            self.redraw()


class PathPage(Page[str]):
    """The name of a file or folder, completed with Tab."""

    def __init__(
        self, title: str, start: str, intro: str, folders: bool = False, suffix: str = "", empty: bool = False
    ):
        super().__init__(title)
        self.empty = empty
        """Whether an empty line is an answer."""
        self.intro = intro
        self.folders = folders
        """Whether a folder is asked for."""
        self.suffix = suffix
        """Of the files that are listed; "" for all."""
        self.entry = Entry(start)
        self.place = -1
        self.trouble = ""

    def content(self, width: int, height: int) -> list[Row]:
        """What is typed, and what there is of that name."""
        rows: list[Row] = [
            *paragraph(self.intro, width - 2 * _MARGIN, "", " " * _MARGIN),
            [],
            [(" " * _MARGIN, ""), *self.entry.row(width - 2 * _MARGIN)],
            [(f"{' ' * _MARGIN}{self.trouble}", "warn")],
        ]
        names = self.names
        self.place = min(self.place, len(names) - 1)
        room = max(1, height - len(rows))
        top = max(0, self.place - room + 1)
        for place, name in list(enumerate(names))[top : top + room]:
            here = place == self.place
            rows.append(
                [(" ", ""), ("▸ " if here else "  ", "cursor" if here else ""), (clean(name), "cursor" if here else "")]
            )
        return rows

    @property
    def names(self) -> list[str]:
        """What there is that begins with what is typed."""
        return listing(self.entry.text, self.folders, self.suffix)

    def key_row(self) -> Row:
        """Completing and choosing."""
        return [
            ("Tab", "key"),
            (" complete   ", ""),
            ("↑↓", "key"),
            (" pick   ", ""),
            ("Enter", "key"),
            (" take it   ", ""),
            *super().key_row(),
        ]

    async def pressed(self, event: Key) -> bool:
        """Type, complete, pick."""
        self.trouble = ""
        if event.key == "escape":
            return False
        if event.key == "enter":
            await self._enter()
        elif event.key == "tab":
            self.entry.put(complete(self.entry.text, self.names))
            self.place = -1
        elif event.key in ("up", "down"):
            self.place = max(-1, self.place + (1 if event.key == "down" else -1))
        elif self.entry.press(event.key, event.character):
            self.place = -1
        self.redraw()
        return True

    def pasted(self, text: str) -> None:
        """Type what was pasted."""
        self.entry.insert(text)
        self.redraw()

    async def _enter(self) -> None:
        if self.place >= 0:
            name = self.names[self.place]
            self.entry.put(str(Path(self.entry.text).parent / name) if "/" in self.entry.text else name)
            if name.endswith("/"):
                self.entry.put(self.entry.text.rstrip("/") + "/")
            self.place = -1
            if name.endswith("/") or self.folders:
                return
        typed = self.entry.text.strip()
        if not typed and self.empty:
            await self.answer("")
            return
        if not typed:
            self.trouble = "Nothing stands here; type a name."
            return
        path = Path(typed).expanduser()
        if path.is_dir() and not self.folders:
            self.trouble = "That is a folder; type the name of a file in it."
            self.entry.put(typed.rstrip("/") + "/")
            return
        await self.answer(str(path))
