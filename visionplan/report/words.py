"""How a rig's judgement reads: what was asked and what it gets, what pinches, what is missed, what isn't known."""

import math

from visionplan.solve.case import SYMBOLS
from visionplan.solve.demands import BY_NAME
from visionplan.solve.rig import Rig, Value, Verdict
from visionplan.text import clean, figure
from visionplan.units import show

_FRACTIONS = ("perspective", "distortion", "contrast")
"""Demands and gates of unit 1 that are told in percent."""
_PLAIN_WORDS = {"d": "flange distance", "eta": "quantum efficiency", "x": "travel of the focus ring"}
_DERIVED = ("e",)
"""Symbols that are unknown only where another one is."""


def value_words(name: str, value: Value, unit: str, system: str = "mm") -> str:
    """Write what a demand or gate asks or gets."""
    if isinstance(value, str):
        return clean(value)
    if isinstance(value, tuple):
        ends = [value_words(name, end, unit, system) for end in value]
        word = ends[1].rpartition(" ")[2]
        return f"{ends[0].removesuffix(' ' + word)} to {ends[1]}"
    if name == "cable" and value is not None and system == "mm":
        return show(value / 1000, "m")
    if unit == "x" and value is not None:
        return f"{figure(value)} ×"
    return show(value, unit, system, percent=name in _FRACTIONS)


def asked_words(verdict: Verdict, system: str = "mm") -> str:
    """What is asked."""
    if verdict.verdict == "not asked":
        return "not asked"
    return value_words(verdict.name, verdict.asked, verdict.unit, system)


def got_words(rig: Rig, verdict: Verdict, system: str = "mm") -> str:
    """What the rig gets; where that isn't known, what is missing."""
    if verdict.verdict == "not asked":
        return "–"
    if is_unknown(rig, verdict):
        return lacking(rig, verdict)
    if verdict.got is None:
        return "–"
    return value_words(verdict.name, verdict.got, verdict.unit, system)


def is_unknown(rig: Rig, verdict: Verdict) -> bool:
    """Whether the catalogue leaves out what a demand or gate needs; of a strict brief that is a miss."""
    if verdict.name in rig.unknown:
        return True
    strictly = verdict.verdict == "missed" and rig.case.brief.strict
    return strictly and (verdict.got is None if verdict.gate else verdict.never and bool(_missing(rig, verdict)))


def lacking(rig: Rig, verdict: Verdict) -> str:
    """What the catalogue leaves out that a demand or gate needs: "length of the lens not stated"."""
    missing = [] if verdict.gate else _missing(rig, verdict)
    return f"{', '.join(missing)} not stated".lstrip()


def _missing(rig: Rig, verdict: Verdict) -> list[str]:
    return [
        _PLAIN_WORDS.get(symbol, SYMBOLS[symbol][0])
        for symbol in BY_NAME[verdict.name].symbols
        if symbol not in _DERIVED and _unknown(getattr(rig.case, symbol))
    ]


def _unknown(value) -> bool:
    return isinstance(value, float) and math.isnan(value)


def pinch_words(rig: Rig) -> str:
    """What bounds the room, and what holds the rig off its middle: "sampling against cover, held by reach"."""
    if rig.pinch is None:
        return ""
    low, high = rig.pinch
    pinch = f"{low} at both ends" if low == high else f"{low} against {high}"
    return pinch + (f", held by {rig.held}" if rig.held else "")


def missed_by(verdict: Verdict, system: str = "mm") -> str:
    """How far what a missed demand gets is off what is asked: a length of a place demand, else percent of what is
    asked; "" where that can't be told."""
    asked, got = verdict.asked, verdict.got
    if isinstance(asked, tuple) and isinstance(got, float):
        near, far = asked
        asked = near if got < near else far
    if not isinstance(asked, float) or not isinstance(got, float):
        return ""
    if BY_NAME[verdict.name].place:
        return show(abs(got - asked), verdict.unit, system, digits=2)
    return percent(abs(got / asked - 1)) if asked > 0 else ""


def miss_words(rig: Rig, verdict: Verdict, system: str = "mm") -> str:
    """A missed demand or gate in short: "cover by 12 %", "mount: C camera, F lens"."""
    if is_unknown(rig, verdict):
        return f"{verdict.name}: {lacking(rig, verdict)}, which is strictly a miss"
    if verdict.gate:
        asked = asked_words(verdict, system)
        told = "" if asked.startswith("same thread") else f", asked {asked}"
        return f"{verdict.name}: {got_words(rig, verdict, system)}{told}"
    if verdict.never:
        return f"{verdict.name} at any magnification"
    by = missed_by(verdict, system)
    return f"{verdict.name} by {by}" if by else verdict.name


def percent(fraction: float) -> str:
    """Write a fraction in percent, two figures of it, and never 0 %."""
    return show(max(fraction, 1e-4), "1", percent=True, digits=2)


def misses(rig: Rig, system: str = "mm") -> list[str]:
    """Everything a rig misses, demands first."""
    return [miss_words(rig, verdict, system) for verdict in rig.demands if verdict.verdict == "missed"]


def limits(rig: Rig) -> str:
    """What bounds the magnification, with its numbers, and where the rig stands; "" where nothing can hold."""
    if rig.pinch is None or rig.magnification is None:
        return ""
    low, high = rig.pinch
    bounds = {verdict.name: (verdict.lo, verdict.hi) for verdict in rig.demands}
    lo, hi = bounds[low][0], bounds[high][1]
    at = f"the rig stands at {figure(rig.magnification)}"
    if rig.fits or (lo is not None and hi is not None and lo <= hi):
        return f"{low} sets {figure(lo)} at the low end of the magnification, {high} {figure(hi)} at the high end; {at}"
    return f"{low} needs a magnification of at least {figure(lo)}, {high} of at most {figure(hi)}; {at}"
