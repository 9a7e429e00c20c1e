"""Concessions as sentences, with numbers that can be typed into the brief: rounded to the side that still fits."""

import math
from collections.abc import Callable

from visionplan.brief.model import Brief
from visionplan.solve.rig import Concession
from visionplan.text import figure
from visionplan.units import show

_DIGITS = 4


def concession_sentence(brief: Brief, concession: Concession, system: str = "mm") -> str:
    """What would have to give, in the brief's own terms: "a field of 114 × 85.5 mm instead of 120 × 90 mm".

    Numbers are rounded towards what asks for less, so that a brief with them still fits.
    """
    return _SENTENCES.get(concession.demand, _plain(concession.demand))(brief, concession, system)


def concession_change(concession: Concession) -> str:
    """By how much it changes what was asked: "−12 %", "+3.4 %"."""
    change = 100 * (concession.needed / concession.asked - 1)
    return f"{'+' if change > 0 else '−'}{figure(abs(change), 2)} %"


def _looser(concession: Concession, unit: str, system: str) -> float:
    """What is needed, rounded away from what was asked."""
    return _rounded(concession.needed, concession.needed > concession.asked, unit, system)


def _rounded(value: float, up: bool, unit: str = "", system: str = "mm") -> float:
    """Round up or down to the digits that are shown."""
    scale = 25.4 if system == "inch" and unit in ("mm", "mm/s") else 1.0
    exponent = math.floor(math.log10(value / scale)) - _DIGITS + 1
    steps = value / scale / 10.0**exponent
    whole = math.ceil(steps * (1 - 1e-9)) if up else math.floor(steps * (1 + 1e-9))
    return float(f"{whole}e{exponent}") * scale


def _plain(phrase: str, unit: str = "", fraction: bool = False) -> Callable[[Brief, Concession, str], str]:
    """A sentence of what is needed instead of what was asked."""

    def sentence(brief: Brief, concession: Concession, system: str) -> str:
        shown = unit or concession.unit
        needed = show(_looser(concession, shown, system), shown, system, _DIGITS, fraction)
        return f"a {phrase} of {needed} instead of {show(concession.asked, shown, system, _DIGITS, fraction)}"

    return sentence


def _cover(brief: Brief, concession: Concession, system: str) -> str:
    """Placement and overlap are kept, so that the field alone gives way; of a grid by what suffices for any."""
    factor = concession.needed
    kept = 2 * brief.placement + (brief.max_count - 1) * brief.overlap
    given = [factor * (side + kept) - kept for side in brief.field]
    if min(given) <= 0:
        return f"a field and placement {figure(100 * (1 - factor), 3)} % smaller"
    needed = [_rounded(side, up=False, unit="mm", system=system) for side in given]
    return f"a field of {_size(needed, system)} instead of {_size(brief.field, system)}"


def _size(sides, system: str) -> str:
    width, height = (show(side, "mm", system) for side in sides)
    return f"{width.removesuffix(' ' + height.rpartition(' ')[2])} × {height}"


def _sampling(brief: Brief, concession: Concession, system: str) -> str:
    needed = show(_looser(concession, "mm", system), "mm", system)
    pixels = _rounded(brief.feature / concession.needed, up=False)
    return (
        f"sampling: {needed} a pixel instead of {show(concession.asked, 'mm', system)} "
        f"({figure(pixels)} pixels across the feature instead of {figure(brief.pixels_per_feature)})"
    )


def _reach(brief: Brief, concession: Concession, system: str) -> str:
    needed = show(_looser(concession, "mm", system), "mm", system)
    to = "from" if concession.end == "nearer" else "up to"
    return f"a working distance {to} {needed} (asked {show(concession.asked, 'mm', system)})"


def _depth(side: str) -> Callable[[Brief, Concession, str], str]:
    def sentence(brief: Brief, concession: Concession, system: str) -> str:
        needed, asked = (show(value, "mm", system) for value in (_looser(concession, "mm", system), concession.asked))
        return f"a depth of {needed} {side} the lens, from the focus plane, instead of {asked}"

    return sentence


def _feature(law: str) -> Callable[[Brief, Concession, str], str]:
    plain = _plain("smallest feature")
    return lambda brief, concession, system: f"{plain(brief, concession, system)}, for {law}"


_SENTENCES: dict[str, Callable[[Brief, Concession, str], str]] = {
    "cover": _cover,
    "sampling": _sampling,
    "reach": _reach,
    "near depth": _depth("towards"),
    "far depth": _depth("away from"),
    "rayleigh": _feature("diffraction"),
    "lens detail": _feature("the detail of the lens"),
    "light": _plain("signal-to-noise ratio"),
    "perspective": _plain("perspective", fraction=True),
    "line rate": _plain("speed", "mm/s"),
    "motion": _plain("motion blur"),
    "frame rate": _plain("rate"),
    "distortion": _plain("distortion", fraction=True),
}
