"""One line of text being typed: the text, where the cursor stands, and what the keys do to it."""

import re
from collections.abc import Callable, Sequence

from visionplan.text import clean, width
from visionplan.tui.rows import Row


class Entry:
    """A line of text under the fingers."""

    def __init__(self, text: str = ""):
        self.text = text
        self.at = len(text)

    def press(self, key: str, character: str | None) -> bool:
        """Do what a key does; whether it does something here."""
        if action := _KEYS.get(key):
            action(self)
            return True
        if character and character.isprintable():
            self.insert(character)
            return True
        return False

    def insert(self, text: str) -> None:
        """Put text at the cursor: what was pasted too, its line breaks as spaces."""
        text = "".join(one for one in re.sub(r"[\r\n\t]+", " ", text) if one.isprintable())
        self.text = self.text[: self.at] + text + self.text[self.at :]
        self.at += len(text)

    def put(self, text: str) -> None:
        """Put another text in the place of all."""
        self.text, self.at = text, len(text)

    def turn(self, choices: Sequence[str], back: bool) -> None:
        """Put the next of some choices, or the one before."""
        place = choices.index(self.text) if self.text in choices else -1
        self.put(choices[(place + (-1 if back else 1)) % len(choices)])

    def _move(self, to: int) -> None:
        self.at = min(max(to, 0), len(self.text))

    def _cut(self, start: int, end: int) -> None:
        start, end = max(start, 0), min(end, len(self.text))
        self.text, self.at = self.text[:start] + self.text[end:], start

    def _word(self) -> int:
        """Where the word before the cursor begins."""
        return len(self.text[: self.at].rstrip().rpartition(" ")[0])

    def row(self, cells: int, role: str = "entry") -> Row:
        """The part around the cursor, in exactly so many cells, the cursor's cell apart."""
        shown, at = clean(self.text) + " ", self.at
        start = 0
        while width(shown[start : at + 1]) > cells and start < at:
            start += 1
        end = len(shown)
        while width(shown[start:end]) > cells and end > at + 1:
            end -= 1
        after = shown[at + 1 : end]
        fill = " " * (cells - width(shown[start:end]))
        return [(shown[start:at], role), (shown[at : at + 1], f"{role} caret"), (after + fill, role)]


_KEYS: dict[str, Callable[[Entry], None]] = {
    "left": lambda e: e._move(e.at - 1),
    "right": lambda e: e._move(e.at + 1),
    "home": lambda e: e._move(0),
    "ctrl+a": lambda e: e._move(0),
    "end": lambda e: e._move(len(e.text)),
    "ctrl+e": lambda e: e._move(len(e.text)),
    "backspace": lambda e: e._cut(e.at - 1, e.at) if e.at else None,
    "delete": lambda e: e._cut(e.at, e.at + 1),
    "ctrl+d": lambda e: e._cut(e.at, e.at + 1),
    "ctrl+u": lambda e: e._cut(0, e.at),
    "ctrl+k": lambda e: e._cut(e.at, len(e.text)),
    "ctrl+w": lambda e: e._cut(e._word(), e.at),
}
