"""What a heading says: its words in plain letters, its unit, and how well it suits a column of ours."""

import difflib
import re
import unicodedata
from collections.abc import Sequence
from functools import cache

from visionplan.units import EVERYDAY

_LONGEST = 80
_CURRENCIES = (
    "AUD BRL CAD CHF CNY CZK DKK EUR GBP HKD HUF INR JPY KRW MXN NOK NZD PLN RON SEK SGD TRY TWD USD ZAR $ € £ ¥"
)
MONEY = re.compile("|".join(map(re.escape, _CURRENCIES.split())))
"""Currencies that are told from other capitals, such as (MOD)."""
_UNIT_PLACES = (
    re.compile(r"\s*[\[(]([^\[\]()]*)[\])]"),
    re.compile(r"\s*(?:,|/|\bin\b)\s*(\S+)$"),
    re.compile(rf"\s+({MONEY.pattern})$"),
)


def split(heading: str) -> tuple[str, str]:
    """Part a heading into words in plain letters, and its unit where it is one that is known.

    >>> split("Brennweite (mm)"), split("Größe, in µm")
    (('brennweite', 'mm'), ('grosse', 'µm'))
    """
    for pattern in _UNIT_PLACES:
        for match in pattern.finditer(heading[:_LONGEST]):
            if is_unit(match[1].strip()):
                return plain(heading[: match.start()] + " " + heading[match.end() :]), match[1].strip()
    return plain(heading[:_LONGEST]), ""


def is_unit(text: str) -> bool:
    """Whether it is an everyday unit or a currency."""
    written = text.replace("µ", "u").replace("μ", "u").replace("⁻", "-").replace(" ", "")
    return bool(MONEY.fullmatch(text)) or (written != "1" and any(written in table for table in EVERYDAY.values()))


@cache
def plain(text: str) -> str:
    """Small letters and digits alone, without accents, words parted by one space."""
    letters = (letter for letter in unicodedata.normalize("NFKD", text.casefold()) if not unicodedata.combining(letter))
    return " ".join("".join(letter if letter.isalnum() else " " for letter in letters).split())


def likeness(words: str, names: Sequence[str]) -> float:
    """Tell how well words suit any of a column's names: 1 the same, less one within them, 0 something else."""
    best = 0.0
    for name in map(plain, names):
        if words.replace(" ", "") == name.replace(" ", ""):
            return 1.0
        if len(name) > 2 and f" {name} " in f" {words} ":
            best = max(best, 0.6 + 0.3 * len(name) / len(words))
        elif len(name) > 4:
            best = max(best, 0.8 * _ratio(words, name))
    return best


def _ratio(words: str, name: str) -> float:
    match = difflib.SequenceMatcher(None, words, name)
    if match.real_quick_ratio() < 0.8 or match.quick_ratio() < 0.8:
        return 0.0
    ratio = match.ratio()
    return ratio if ratio > 0.8 else 0.0
