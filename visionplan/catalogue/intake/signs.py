"""What a sheet's numbers are written with: the decimal sign, and the one between thousands."""

import re
from collections.abc import Iterable

_DECIMAL = {sign: re.compile(rf"(?<![\d.,])\d+{re.escape(sign)}\d+(?![\d.,])") for sign in ".,"}
_PARTED = {
    sign: re.compile(rf"(?<![\d.,])\d{{1,3}}(?:{re.escape(sign)}\d{{3}})+(?![\d{re.escape(sign)}])") for sign in ".,'’ "
}


def find_signs(texts: Iterable[str]) -> tuple[str, str]:
    """Tell the decimal sign, and what parts thousands, "" where nothing does.

    What could be either, as 1.234, counts as a decimal sign only where nothing else tells.

    >>> find_signs(["1.234,50", "0,5"]), find_signs(["3.45", "1.234"]), find_signs(["12", "1,234"])
    ((',', '.'), ('.', ''), ('.', ','))
    """
    texts = [text for text in texts if any(map(str.isdigit, text))]
    decimal = {
        sign: sum(bool(pattern.search(text)) and not _PARTED[sign].fullmatch(text) for text in texts)
        for sign, pattern in _DECIMAL.items()
    }
    mixed = {sign: sum(bool(_MIXED[sign].search(text)) for text in texts) for sign in ".,"}
    comma = decimal[","] + mixed[","] > decimal["."] + mixed["."]
    for sign in ".'’ " if comma else ",'’ ":
        # A space parts other things too, so it takes a whole cell to be sure.
        if any(_PARTED[sign].fullmatch(text) or (sign != " " and _WITH[comma, sign].search(text)) for text in texts):
            return "," if comma else ".", sign
    return "," if comma else ".", ""


_MIXED = {",": re.compile(r"\d\.\d{3},\d"), ".": re.compile(r"\d,\d{3}\.\d")}
_WITH = {
    (comma, sign): re.compile(rf"\d{re.escape(sign)}\d{{3}}{',' if comma else '[.]'}\d")
    for comma in (True, False)
    for sign in ".,'’"
}
