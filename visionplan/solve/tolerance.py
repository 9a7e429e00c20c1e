"""Tolerance: in which share of the rigs built to a plan every demand still holds.

The bracket is fixed where the plan puts it. Focal length and working distance are drawn, uniform within their
tolerances, and the lens is focused anew on the part; each draw is judged in closed form. The place demands are held by
where the bracket stands, so they are judged in the plan and not drawn. A telecentric lens is not focused and keeps its
magnification: what the distance is off is within the slack of its depth.
"""

from collections.abc import Sequence
from dataclasses import dataclass
from math import sqrt
from weakref import WeakKeyDictionary

import numpy as np

from visionplan.optics.conjugates import magnification_at, object_distance
from visionplan.solve.case import Case
from visionplan.solve.demands import NOT_ASKED, Demand, asked_demands, judge
from visionplan.solve.rig import Rig
from visionplan.solve.span import holds

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


_KNOWN: WeakKeyDictionary[Case, Yield | None] = WeakKeyDictionary()


def yields(rigs: Sequence[Rig]) -> list[Yield | None]:
    """The yield of rigs of one brief; None for a rig that doesn't fit, or where nothing says what may be off."""
    found: list[Yield | None] = [None] * len(rigs)
    drawn = [place for place, rig in enumerate(rigs) if rig.fits and _varies(rig.case)]
    if drawn:
        case = _together([rigs[place].case for place in drawn])
        hits, fails = _drawn(case, np.array([rigs[place].magnification for place in drawn])[:, None])
        for number, place in enumerate(drawn):
            found[place] = _yield(rigs[place].case, int(hits[number]), {name: n[number] for name, n in fails.items()})
    return found


def yield_of(rig: Rig) -> Yield | None:
    """The yield of one rig, worked out once."""
    if rig.case not in _KNOWN:
        _KNOWN[rig.case] = yields([rig])[0]
    return _KNOWN[rig.case]


def share(case: Case, m: np.ndarray) -> np.ndarray:
    """The share of draws that holds, of rigs planned at m: shape (rigs, 1); NaN where nothing stated may be off."""
    return np.where(_varies(case), _drawn(case, m)[0][:, None] / DRAWS, np.nan)


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
    """What the lens of one rig states, as a fraction; None for nothing."""
    stated = float(stated_focal_tolerance(case))
    return None if np.isnan(stated) else stated


def stated_focal_tolerance(case: Case):
    """Of many rigs, NaN where not stated; a telecentric lens has no focal length to be off."""
    stated = case.problem.catalogue.lenses["focal tolerance"][case.lenses]
    return np.where(case.telecentric, 0.0, stated[:, None] if np.ndim(stated) else stated)


def _varies(case: Case):
    """Whether anything is stated that may be off."""
    return (case.brief.working_distance_tolerance > 0) | ~np.isnan(stated_focal_tolerance(case))


def _yield(case: Case, hits: int, fails: dict[str, int]) -> Yield:
    often = sorted(((name, int(count) / DRAWS) for name, count in fails.items() if count), key=lambda fail: -fail[1])
    tolerance = case.brief.working_distance_tolerance
    return Yield(hits / DRAWS, *interval(hits, DRAWS), tuple(often), focal_tolerance(case), tolerance)


def _together(cases: Sequence[Case]) -> Case:
    """One case of many rigs: arrays of shape (rigs, 1)."""
    numeric = [name for name, value in cases[0].__dict__.items() if isinstance(value, int | float)]
    columns = {name: np.array([getattr(case, name) for case in cases])[:, None] for name in numeric}
    columns |= {name: columns[name][:, 0] for name in ("cameras", "lenses")}
    return cases[0].varied(**columns)


def _drawn(case: Case, m: np.ndarray) -> tuple[np.ndarray, dict[str, np.ndarray]]:
    """Of rigs planned at m (shape (rigs, 1)): how many draws hold, and in how many each demand fails."""
    demands = [demand for demand in asked_demands(case.ask) if not demand.place]
    hits, fails = np.full(len(m), DRAWS), {demand.name: np.zeros(len(m), int) for demand in demands}
    # Each bound rises or falls with the focal length alone, and the magnification does with it and with the distance:
    # what holds at the ends of both for the worse of its bounds holds in between, and needs no draws.
    ends = _built(case, m, np.array([-1.0, 1.0, -1.0, 1.0]), np.array([-1.0, -1.0, 1.0, 1.0]))
    risky = ~np.logical_and.reduce([_holds(demand, *ends, worst=True).all(axis=1) for demand in demands])
    focal, distance = np.random.default_rng(SEED).uniform(-1, 1, (2, DRAWS))
    left = np.flatnonzero(risky)
    for rows in (left[begin : begin + _BLOCK] for begin in range(0, len(left), _BLOCK)):
        built = _built(_some(case, rows), m[rows], focal, distance)
        every = np.ones((len(rows), DRAWS), bool)
        for demand in demands:
            held = _holds(demand, *built)
            fails[demand.name][rows] = DRAWS - held.sum(axis=1)
            every &= held
        hits[rows] = every.sum(axis=1)
    return hits, fails


def _built(case: Case, m: np.ndarray, focal: np.ndarray, distance: np.ndarray) -> tuple[Case, np.ndarray]:
    """The rigs with their focal length and distance off by shares of their tolerances, and the magnification then."""
    f = case.f * (1 + np.nan_to_num(stated_focal_tolerance(case)) * focal)
    with np.errstate(invalid="ignore", divide="ignore"):
        s = object_distance(case.f, m) + case.brief.working_distance_tolerance * distance
        built = np.where(s > f, magnification_at(f, s), np.inf)
    return case.varied(f=f), np.where(case.telecentric, m, built)


def _holds(demand: Demand, case: Case, m: np.ndarray, worst: bool = False) -> np.ndarray:
    """Whether a demand holds: shape of m; with `worst` for the worst bound of each row."""
    lo, hi, code = judge(demand, case)
    if worst:
        lo, hi = np.max(lo, axis=-1, keepdims=True), np.min(hi, axis=-1, keepdims=True)
        m = np.where(np.isinf(m), np.nan, m)
    return np.broadcast_to((holds(lo, m) & holds(m, hi)) | (code == NOT_ASKED), m.shape)


def _some(case: Case, rows: np.ndarray) -> Case:
    """Of some rigs."""
    shared = {name: value[rows] for name, value in case.__dict__.items() if np.ndim(value) and len(value) > 1}
    return case.varied(**shared)
