"""How roles look: palettes, one for terminals with the user's own sixteen colours, two for those with more."""

from functools import cache

from rich.style import Style
from textual.theme import Theme

_TERMINAL = {
    "": "",
    "dim": "dim",
    "head": "bold",
    "strong": "bold",
    "name": "",
    "axis": "dim",
    "bar": "",
    "holds": "green",
    "pinch": "bold yellow",
    "missed": "red",
    "value": "",
    "word": "dim",
    "span": "bold green",
    "point": "cyan",
    "good": "green",
    "fair": "yellow",
    "tight": "red",
    "best": "bold",
    "entry": "underline",
    "caret": "reverse",
    "cursor": "reverse",
    "key": "bold",
    "here": "reverse",
    "warn": "bold red",
    "camera": "cyan",
    "lens": "bold",
    "ring": "yellow",
    "cone": "dim",
    "layer": "cyan",
    "part": "green",
    "plane": "",
    "cable": "dim",
    "limit": "red",
    "mirror": "cyan",
    "dimension": "",
}
_PLAIN = {
    role: " ".join(word for word in look.split() if word in ("bold", "dim", "reverse", "underline"))
    for role, look in _TERMINAL.items()
}
_DUSK = {
    "paper": "#161a1d",
    "ink": "#dfe3e0",
    "faint": "#a0abab",
    "good": "#86d39b",
    "fair": "#e6c35c",
    "bad": "#ff9d8a",
    "blue": "#8cc4e4",
    "here": "#26363d",
}
_DAYLIGHT = {
    "paper": "#faf8f2",
    "ink": "#22282b",
    "faint": "#5b6468",
    "good": "#136134",
    "fair": "#6d4d00",
    "bad": "#a3240f",
    "blue": "#0b5177",
    "here": "#d9e3e0",
}
COLOURS = {"dusk": _DUSK, "daylight": _DAYLIGHT}
"""The colours of the palettes that bring their own."""
_COLOURED = {
    "": "ink",
    "dim": "faint",
    "head": "bold ink",
    "strong": "bold ink",
    "name": "ink",
    "axis": "faint",
    "bar": "ink",
    "holds": "good",
    "pinch": "bold fair",
    "missed": "bad",
    "value": "ink",
    "word": "faint",
    "span": "bold good",
    "point": "blue",
    "good": "good",
    "fair": "fair",
    "tight": "bad",
    "best": "bold",
    "entry": "underline",
    "caret": "reverse",
    "cursor": "on here",
    "key": "bold blue",
    "here": "on here",
    "warn": "bold bad",
    "camera": "blue",
    "lens": "bold ink",
    "ring": "fair",
    "cone": "faint",
    "layer": "blue",
    "part": "good",
    "plane": "ink",
    "cable": "faint",
    "limit": "bad",
    "mirror": "blue",
    "dimension": "ink",
}
ROLES = tuple(_TERMINAL)
PALETTES = ("terminal", "dusk", "daylight")
"""What a person chooses from."""


def _theme(name: str, colours: dict[str, str]) -> Theme:
    return Theme(
        name,
        primary=colours["blue"],
        foreground=colours["ink"],
        background=colours["paper"],
        surface=colours["paper"],
        panel=colours["paper"],
        dark=name == "dusk",
    )


THEMES = tuple(_theme(name, colours) for name, colours in COLOURS.items())
"""Of Textual, for what it draws itself: the screen behind the rows."""


@cache
def style(palette: str, role: str) -> Style:
    """The style of a role, or of several parted by spaces, the last the strongest."""
    if palette not in COLOURS:
        table = _PLAIN if palette == "plain" else _TERMINAL
        return Style.combine([Style.parse(table[one]) for one in (role.split() or [""])])
    colours = COLOURS[palette]
    looks = [_COLOURED[one] for one in ["", *role.split()]]
    parsed = [Style.parse(" ".join(colours.get(word, word) for word in look.split())) for look in looks]
    return Style.combine([Style(bgcolor=colours["paper"]), *parsed])
