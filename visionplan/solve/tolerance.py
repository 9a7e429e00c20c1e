"""Tolerance: in which share of the rigs built to a plan every demand still holds.

The bracket is fixed where the plan puts it. Focal length and working distance are drawn, uniform within their
tolerances, and the lens is focused anew on the part; each draw is judged in closed form. The place demands are held by
where the bracket stands, so they are judged in the plan and not drawn. A telecentric lens is not focused and keeps its
magnification: what the distance is off is within the slack of its depth.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from math import sqrt

import numpy as np

from visionplan.optics.conjugates import magnification_at, object_distance
from visionplan.solve.case import Case
from visionplan.solve.demands import NOT_ASKED, asked_demands, judge
from visionplan.solve.rig import Rig
from visionplan.solve.span import holds
from visionplan.solve.variant import varied

DRAWS = 10_000
SEED = 1
_BLOCK = 8
"""Rigs drawn at a time, so that their arrays stay in the cache."""
_Z = 1.959963984540054
"""Quantile of the normal distribution for 95 %, two-sided."""


@dataclass(frozen=True)
class Yield:
    """How a rig bears its tolerances."""

    share: float
    """Of the draws in which every demand holds."""
    low: float
    """Ends of the 95 % interval."""
    high: float
    fails: tuple[tuple[str, float], ...]
    """Demand and the share of draws in which it fails, most often first; only those that fail at all."""
    focal_tolerance: float | None
    """± fraction that was drawn; None where the lens states none and its focal length is taken as exact."""
    distance_tolerance: float
    """± mm that was drawn."""

    @property
    def weakest(self) -> str | None:
        """The demand that fails most often; None where none fails."""
        return self.fails[0][0] if self.fails else None


def yields(rigs: Sequence[Rig]) -> list[Yield | None]:
    """The yield of rigs of one brief; None for a rig that doesn't fit, or where nothing says what may be off."""
    found: list[Yield | None] = [None] * len(rigs)
    drawn = [place for place, rig in enumerate(rigs) if rig.fits and _varies(rig.case)]
    for begin in range(0, len(drawn), _BLOCK):
        some = drawn[begin : begin + _BLOCK]
        for place, one in zip(some, _block([rigs[place] for place in some])):
            found[place] = one
    return found


def interval(hits: int, draws: int) -> tuple[float, float]:
    """The 95 % interval of a share (Wilson 1927).

    >>> tuple(round(end, 4) for end in interval(81, 263))
    (0.2553, 0.3662)
    """
    share, square = hits / draws, _Z * _Z / draws
    middle = (share + square / 2) / (1 + square)
    half = _Z * sqrt(share * (1 - share) / draws + square / (4 * draws)) / (1 + square)
    return max(middle - half, 0.0), min(middle + half, 1.0)


def focal_tolerance(case: Case) -> float | None:
    """What the lens states, as a fraction; None for nothing. A telecentric lens has no focal length to be off."""
    stated = float(case.problem.catalogue.lenses["focal tolerance"][case.lenses])
    return 0.0 if case.telecentric else None if np.isnan(stated) else stated


def _varies(case: Case) -> bool:
    return focal_tolerance(case) is not None or case.brief.working_distance_tolerance > 0


def _block(rigs: Sequence[Rig]) -> list[Yield]:
    case, m = drawn(rigs)
    every, names, missed = np.ones((len(rigs), DRAWS), bool), [], []
    for demand in asked_demands(case.ask):
        if demand.place:
            continue
        lo, hi, code = judge(demand, case)
        held = (holds(lo, m) & holds(m, hi)) | (code == NOT_ASKED)
        every &= held
        names.append(demand.name)
        missed.append(np.broadcast_to(~held, every.shape).mean(axis=1))
    found = []
    for number, (rig, hits) in enumerate(zip(rigs, every.sum(axis=1))):
        fails = [(name, float(share[number])) for name, share in zip(names, missed) if share[number]]
        found.append(
            Yield(
                int(hits) / DRAWS,
                *interval(int(hits), DRAWS),
                tuple(sorted(fails, key=lambda fail: -fail[1])),
                focal_tolerance(rig.case),
                rig.case.brief.working_distance_tolerance,
            )
        )
    return found


def drawn(rigs: Sequence[Rig]) -> tuple[Case, np.ndarray]:
    """The rigs as drawn, and the magnification of each draw: arrays of shape (rigs, draws)."""
    first = rigs[0].case
    numeric = [name for name, value in first.__dict__.items() if isinstance(value, int | float)]
    columns = {name: np.array([getattr(rig.case, name) for rig in rigs])[:, None] for name in numeric}
    planned = varied(first, **columns)
    m = np.array([rig.magnification for rig in rigs])[:, None]
    focal, distance = np.random.default_rng(SEED).uniform(-1, 1, (2, DRAWS))
    tolerance = np.array([focal_tolerance(rig.case) or 0.0 for rig in rigs])[:, None]
    f = planned.f * (1 + tolerance * focal)
    with np.errstate(invalid="ignore", divide="ignore"):
        s = object_distance(planned.f, m) + first.brief.working_distance_tolerance * distance
        built = np.where(s > f, magnification_at(f, s), np.inf)
    return varied(planned, f=f), np.where(planned.telecentric, m, built)
