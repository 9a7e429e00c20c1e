"""How little a demand must give way for a rig to fit, where the other demands leave it an interval of magnification.

Every function takes a `Case` and the ends of that interval, and says at which magnification the demand then just
holds: the end where it gets most.
"""

from dataclasses import dataclass
from typing import Any

import numpy as np

from visionplan.optics.light import signal_to_noise
from visionplan.solve import bounds, checks
from visionplan.solve.case import Case


@dataclass(frozen=True, eq=False)
class Give:
    """What a demand must give way for a rig to fit, where the other demands leave it an interval: arrays over rigs."""

    asked: Any
    needed: Any
    at: Any
    """The magnification at which the demand then just holds."""
    loosens: int
    """Whether a greater (1) or a smaller (−1) value asks for less."""
    end: str | None = None
    """The end of a range that is meant: nearer or farther."""


def cover(case: Case, lo, hi) -> list[Give]:
    """A factor on width and height."""
    return [Give(1.0, checks.cover(case, lo), lo, -1)]


def sampling(case: Case, lo, hi) -> list[Give]:
    """Millimetres a pixel at the farthest plane."""
    return [Give(case.q, checks.sampling(case, hi), hi, 1)]


def reach(case: Case, lo, hi) -> list[Give]:
    """The nearer or the farther end, where the part stays clear of the lens and of the layers."""
    near, far = case.brief.working_distance
    least = max(case.brief.above, sum(layer.thickness for layer in case.brief.layers))
    nearer = case.WD(lo)
    return [
        Give(near, np.where(nearer > least, nearer, np.nan), lo, -1, "nearer"),
        Give(far, case.WD(hi), hi, 1, "farther"),
    ]


def headroom(case: Case, lo, hi) -> list[Give]:
    """The height, which is least where the magnification is nearest to 1."""
    shortest = np.clip(1.0, lo, hi)
    return [Give(case.brief.headroom, checks.headroom(case, shortest), shortest, 1)]


def near_depth(case: Case, lo, hi) -> list[Give]:
    """Height towards the lens, slack included."""
    return [Give(case.A + case.g, checks.near_depth(case, lo), lo, -1)]


def far_depth(case: Case, lo, hi) -> list[Give]:
    """Height away from the lens, slack included."""
    return [Give(case.B + case.g, checks.far_depth(case, lo), lo, -1)]


def rayleigh(case: Case, lo, hi) -> list[Give]:
    """The feature that diffraction is judged by."""
    return [Give(case.feature, checks.rayleigh(case, hi), hi, 1)]


def lens_detail(case: Case, lo, hi) -> list[Give]:
    """The feature that the lens's resolution is judged by."""
    return [Give(case.feature, 1 / (2 * case.detail * hi), hi, 1)]


def light(case: Case, lo, hi) -> list[Give]:
    """The signal-to-noise ratio; without a light level the best that a full pixel has."""
    if case.ask.irradiance is None:
        return [Give(case.brief.snr, signal_to_noise(case.saturation, case.variance), lo, -1)]
    return [Give(case.brief.snr, checks.light(case, lo), lo, -1)]


def perspective(case: Case, lo, hi) -> list[Give]:
    """The change of scale."""
    return [Give(case.brief.max_perspective, checks.perspective(case, lo), lo, 1)]


def speed(case: Case, lo, hi) -> list[Give]:
    """The speed that the line rate is judged by."""
    return [Give(case.v, bounds.fastest_rows(case) * case.P / lo, lo, -1)]
