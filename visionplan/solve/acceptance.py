"""The acceptance check: what a ruler in the picture must span for a rig to be as planned."""

from dataclasses import dataclass
from math import floor, inf, log10, sqrt

from visionplan.solve.advice import bounds
from visionplan.solve.case import Case
from visionplan.solve.rig import Rig
from visionplan.solve.target import READING

FILL = 0.8
"""Most of the field that the target takes."""


@dataclass(frozen=True)
class Acceptance:
    """A target in the middle of the picture, on the reference plane."""

    along: str
    """The side of the field that it lies along: width or height."""
    length: float
    """mm"""
    pixels: int
    room: int
    """± pixels within which the rig keeps its grade, where that is more than reading them takes, else all demands."""
    least: int
    """Fewer pixels break a demand."""
    most: int | None
    """More pixels do; None where nothing bounds them."""
    degree: float
    """Pixels that a target at the picture's one edge spans more than at the other for each degree out of square."""


def acceptance(rig: Rig, unit: float = 1.0) -> tuple[Acceptance, ...]:
    """One check for each side of the picture; of a line-scan camera for its row.

    Parameters
    ----------
    unit : what lengths are rounded in, mm
    """
    case, m = rig.case, rig.magnification
    if m is None:
        return ()
    sides = [("width", case.w, case.W), ("height", case.h, case.H)]
    return tuple(_check(rig, m, *side, unit) for side in sides if side[2] > 0)


def on_reference(case: Case, m: float) -> float:
    """Magnification on the reference plane, m u/(u + z)."""
    return m if case.telecentric else m / (1 + case.z / float(case.u(m)))


def _check(rig: Rig, m: float, along: str, side: float, asked: float, unit: float) -> Acceptance:
    case = rig.case
    length = _round_length(FILL * min(side / on_reference(case, m), asked), unit)

    def span(at: float) -> float:
        return length * on_reference(case, at) / case.P

    lo, hi = bounds(rig)
    kept = {"comfortable": case.brief.comfort, "fair": case.brief.comfort / 2}.get(rig.grade or "", 0.0)
    pixels = round(span(m))
    room = 0
    for within in (1 + kept, 1.0):
        low = span(lo * sqrt(within))
        high = span(hi / sqrt(within)) if hi < inf else inf
        room = max(room, floor(min(pixels - low, high - pixels, pixels) - READING)) if room < 1 else room
    half = side / 2 / on_reference(case, m)
    away = inf if case.telecentric else float(case.u(m)) + case.z
    return Acceptance(
        along,
        length,
        pixels,
        room if rig.fits else 0,
        max(0, floor(span(lo)) + 1),
        floor(span(hi)) if hi < inf else None,
        span(m) * 2 * half / away * 0.017453292519943295,
    )


def _round_length(most: float, unit: float) -> float:
    """The greatest of 1, 2 and 5 times a power of ten that is at most so long."""
    power = 10.0 ** floor(log10(most / unit))
    return unit * power * max(digit for digit in (1, 2, 5) if digit * power * unit <= most * (1 + 1e-9))
