"""Sentences into lines of a width, and lines into plain ASCII."""

from visionplan.text import width

_PLAIN = str.maketrans("…–—−×·±≤≥→↵∞µβκλρτησ²³°", "~---x.+<>>|8ubklrtes23o")


def wrap(text: str, cells: int, indent: str = "", first: str = "") -> list[str]:
    """Break text at spaces into lines of at most so many terminal cells.

    The first line begins with `first`, the others with `indent`; a word wider than a line is broken.
    """
    lines, empty = [first], True
    for word in text.split():
        joined = lines[-1] + ("" if empty else " ") + word
        if width(joined) > cells and not empty:
            lines.append(indent)
            joined = indent + word
        while width(joined) > cells:
            kept = max(len(indent) + 1, _count(joined, cells))
            lines[-1:] = [joined[:kept], indent]
            joined = indent + joined[kept:]
        lines[-1], empty = joined, False
    return lines


def _count(text: str, cells: int) -> int:
    """How many characters of the text so many cells have room for."""
    return next(count for count in range(min(len(text), cells), -1, -1) if width(text[:count]) <= cells)


def to_ascii(line: str) -> str:
    """Replace what isn't ASCII by the nearest single character, and what has none by "?"."""
    return line if line.isascii() else line.translate(_PLAIN).encode("ascii", "replace").decode("ascii")
