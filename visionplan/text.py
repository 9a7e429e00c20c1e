"""Text for terminals, Markdown and CSV: whatever stood in a file, safe to show and of known width."""

import math
import re
import unicodedata

_CONTROL_PICTURES = {code: 0x2400 + code for code in range(0x20)} | {0x7F: 0x2421}
_JOINERS = "\u200c\u200d"
"""Zero-width, but scripts and emoji need them."""


def clean(text: str) -> str:
    """Make text safe to send to a terminal.

    Control characters become their pictures (ESC ␛, line break ␊), every kind of space a plain one; what else is
    invisible or has no place in text (C1 controls, bidi overrides, lone surrogates) becomes U+FFFD.

    >>> clean("lens\\x1b[31m")
    'lens␛[31m'
    """
    if text.isprintable():
        return text
    return "".join(map(_visible, text.translate(_CONTROL_PICTURES)))


def _visible(character: str) -> str:
    if character.isprintable() or character in _JOINERS:
        return character
    return " " if unicodedata.category(character) == "Zs" else "\ufffd"


def width(text: str) -> int:
    """Count the terminal cells that the text takes."""
    return len(text) if text.isascii() else sum(map(_cells, text))


def _cells(character: str) -> int:
    if unicodedata.category(character) in ("Mn", "Mc", "Me", "Cf"):
        return 0
    if "\u1160" <= character <= "\u11ff" or "\ud7b0" <= character <= "\ud7ff":  # Korean vowels join the letter before
        return 0
    return 2 if unicodedata.east_asian_width(character) in "WF" else 1


def shorten(text: str, cells: int) -> str:
    """Cut the text to so many terminal cells, with an ellipsis where something was cut.

    >>> shorten("working distance", 8)
    'working…'
    """
    if width(text) <= cells:
        return text
    if cells < 1:
        return ""
    kept, used = 0, 1
    for character in text:
        used += _cells(character)
        if used > cells:
            break
        kept += 1
    return text[:kept].rstrip() + "…"


def pad(text: str, cells: int, right: bool = False) -> str:
    """Fill the text with spaces to so many terminal cells; `right` sets it flush right. Longer text stays as it is."""
    space = " " * (cells - width(text))
    return space + text if right else text + space


def quoted(text: str) -> str:
    """Quote a text for a message, cleaned, and cut where it is very long."""
    return f"'{shorten(clean(text[:80]), 60)}'"


def figure(value: float | None, digits: int = 4) -> str:
    """Write a number for people: so many significant digits, whole part kept, no exponent from 1e-7 up to 1e15.

    None and NaN are "not stated".

    >>> figure(312.44), figure(12345.6), figure(0.00345), figure(-0.0)
    ('312.4', '12346', '0.00345', '0')
    """
    if value is None or math.isnan(value):
        return "not stated"
    if math.isinf(value):
        return "∞" if value > 0 else "-∞"
    if value == 0:
        return "0"
    exponent = math.floor(math.log10(abs(value)))
    if not -7 <= exponent < 15:
        mantissa, power = f"{value:.{digits - 1}e}".split("e")
        return f"{_without_tail(mantissa)}e{int(power)}"
    return _without_tail(f"{value:.{max(0, digits - 1 - exponent)}f}")


def _without_tail(decimal: str) -> str:
    return decimal.rstrip("0").rstrip(".") if "." in decimal else decimal


_MARKUP = re.compile(r"[\\`*_\[\]<>|~#&!$]|:(?=//)|(?<=/)/|(?<=\w)\.(?=[^\W\d])")
"""Markup, and what makes a bare address a link: "://", "//" and a dot before a letter."""
_BLOCK_START = re.compile(r"^(\s*)(?:([-+=])|(\d+)([.)]))")


def markdown(text: str) -> str:
    """Escape text so that Markdown shows it as typed: no markup, HTML or link, and no break in a table.

    >>> markdown("a|b *c*")
    'a\\\\|b \\\\*c\\\\*'
    """
    escaped = _MARKUP.sub(r"\\\g<0>", clean(text))
    escaped = _BLOCK_START.sub(lambda start: f"{start[1]}{start[3] or ''}\\{start[2] or start[4]}", escaped)
    # An escape alone does not keep every renderer from finding a mail address or a mention.
    return escaped.replace("@", "\\@<!-- -->")


def csv_cell(text: str) -> str:
    """Neutralise text that a spreadsheet would take for a formula, with a leading apostrophe; not for numbers.

    >>> csv_cell("=1+1")
    "'=1+1"
    """
    return ("'" if text.startswith(tuple("=+-@\t\r\n＝＋－＠")) else "") + clean(text)
