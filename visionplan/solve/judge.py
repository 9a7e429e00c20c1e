"""Judging rigs: the intervals of every demand intersected, for many rigs and all their stops at once.

This is the general path over the table of demands. It takes rows of cameras and lenses and one arrangement, adds the
spacer stacks that can matter, and leaves each rig's spans, gates and unknowns as arrays. What belongs to lens and stop
alone is worked out once for each lens and stop and gathered from there.
"""

from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np

from visionplan.solve import span
from visionplan.solve.ask import Arrangement
from visionplan.solve.case import Case, case_of
from visionplan.solve.demands import BY_NAME, MET, MISSED, UNKNOWN, Demand, asked_demands, judge
from visionplan.solve.figures import contrasts
from visionplan.solve.gates import GATES, asked_gates, judge_gate
from visionplan.solve.problem import Problem

_TRAVEL, _HEADROOM = BY_NAME["travel"], BY_NAME["headroom"]
_CONTRAST = next(gate for gate in GATES if gate.name == "contrast")


@dataclass(frozen=True)
class Bounds:
    """Intersections of demands: picture and place apart."""

    lo_p: np.ndarray | float = 0.0
    hi_p: np.ndarray | float = np.inf
    lo_place: np.ndarray | float = 0.0
    hi_place: np.ndarray | float = np.inf
    unknown: np.ndarray | bool = False
    """Whether some demand is unknown."""

    def add(self, demand: Demand, case: Case) -> "Bounds":
        """These and one demand more."""
        lo, hi, code = judge(demand, case)
        unknown = self.unknown | (code == UNKNOWN)
        if demand.place:
            lo, hi = np.maximum(self.lo_place, lo), np.minimum(self.hi_place, hi)
            return replace(self, lo_place=lo, hi_place=hi, unknown=unknown)
        lo, hi = np.maximum(self.lo_p, lo), np.minimum(self.hi_p, hi)
        return replace(self, lo_p=lo, hi_p=hi, unknown=unknown)

    def take(self, rows: np.ndarray) -> "Bounds":
        """Of some rows."""
        return Bounds(*(_rows(getattr(self, name), rows) for name in self.__dataclass_fields__))

    @property
    def lo(self):
        """Of all demands."""
        return np.maximum(self.lo_p, self.lo_place)

    @property
    def hi(self):
        """Of all demands."""
        return np.minimum(self.hi_p, self.hi_place)


@dataclass(frozen=True)
class Rigs:
    """Rigs in one arrangement, each with every stop of its lens: arrays of shape (rigs,) and (rigs, stops)."""

    arrangement: Arrangement
    case: Case
    bounds: Bounds
    stack: np.ndarray
    """Row of the spacer stack within the stacks of the lens's thread."""
    gates: np.ndarray
    """Worst code of the gates of a pair, but for the contrast."""
    gates_unknown: np.ndarray
    """Whether any gate of a pair is unknown, missed or not."""
    source: np.ndarray
    """Which of the pairs asked for each rig belongs to."""
    judges_contrast: bool

    @property
    def cameras(self) -> np.ndarray:
        """Row of each rig's camera."""
        return self.case.cameras

    @property
    def lenses(self) -> np.ndarray:
        """Row of each rig's lens."""
        return self.case.lenses

    @cached_property
    def unknown(self) -> np.ndarray:
        """Whether a demand or a gate of the pair is unknown, of each rig."""
        return np.asarray(self.bounds.unknown).any(axis=-1) | self.gates_unknown

    @cached_property
    def fits_span(self) -> np.ndarray:
        """Whether the span holds a magnification, per stop."""
        return span.fits(self.bounds.lo, self.bounds.hi, self.case.M) & np.isfinite(self.case.N)

    @cached_property
    def point(self) -> np.ndarray:
        """Working point of each stop."""
        b = self.bounds
        return span.working_point(b.lo_p, b.hi_p, b.lo, b.hi, self.case.M)

    @cached_property
    def room(self) -> np.ndarray:
        """Latitude of each stop, where it fits."""
        return np.where(self.fits_span, span.latitude(self.point, self.bounds.lo_p, self.bounds.hi_p), 0.0)

    @cached_property
    def short(self) -> np.ndarray:
        """Shortfall of each stop; infinite where the lens has no such stop."""
        short = span.shortfall(self.bounds.lo, self.bounds.hi, self.case.M)
        return np.where(np.isfinite(self.case.N), short, np.inf)

    def contrast(self, rows: np.ndarray, stops: np.ndarray) -> np.ndarray:
        """Code of the contrast gate at some rigs' stops; MET where it isn't asked."""
        if not self.judges_contrast:
            return np.full(len(rows), MET)
        some, point = self.case.pick(self.arrangement, rows, stops), self.point[rows, stops][:, None]
        some.least_contrast = np.minimum.reduce(contrasts(some, point))
        return np.where(np.isfinite(point), judge_gate(_CONTRAST, some), MISSED)[:, 0]

    @cached_property
    def fits(self) -> np.ndarray:
        """Whether a stop fits, gates of the pair included; gates of camera or lens alone are not."""
        fits = self.fits_span & (self.gates < MISSED)[:, None]
        if self.judges_contrast:
            rows, stops = np.nonzero(fits)
            fits[rows, stops] = self.contrast(rows, stops) < MISSED
        return fits

    @cached_property
    def grade(self) -> np.ndarray:
        """Grade of each stop, as an index into GRADES; one past the last where it doesn't fit."""
        return np.where(self.fits, span.grade(self.room, self.case.brief.comfort), len(span.GRADES))


class Judge:
    """Judges the rigs of a problem, all demands and gates but for those dropped."""

    def __init__(self, problem: Problem, drop: frozenset[str] = frozenset()):
        self.problem = problem
        self.drop = drop
        self.demands = asked_demands(problem.ask, drop)
        self.gates = asked_gates(problem.ask, drop)
        self._of_lens: dict[float, Bounds] = {}

    def lens_bounds(self, arrangement: Arrangement) -> Bounds:
        """What belongs to lens and stop alone, for every lens: shape (lenses, stops)."""
        slack = self.problem.ask.slack(arrangement)
        if slack not in self._of_lens:
            lenses = np.arange(len(self.problem.catalogue.lenses))
            case = case_of(self.problem, arrangement, lenses=lenses)
            bounds = Bounds(
                np.zeros(case.N.shape), np.full(case.N.shape, np.inf), unknown=np.zeros((len(lenses), 1), bool)
            )
            for demand in self.demands:
                if demand.of == "lens":
                    bounds = bounds.add(demand, case)
            self._of_lens[slack] = bounds
        return self._of_lens[slack]

    def rigs(self, arrangement: Arrangement, cameras: np.ndarray, lenses: np.ndarray, all_stacks=False) -> Rigs:
        """Judge cameras with lenses, row by row.

        Of the spacer stacks those that let a rig fit are kept, and where none does the nearest; with `all_stacks`
        every one that could be chosen when no rig fits either.
        """
        case = case_of(self.problem, arrangement, cameras, lenses, rings=0.0, ring_price=0.0)
        bounds = self.lens_bounds(arrangement).take(lenses)
        for demand in self.demands:
            if demand.of == "pair" and demand is not _TRAVEL:
                bounds = bounds.add(demand, case)
        case, bounds, stack, source = self._with_stacks(arrangement, case, bounds, all_stacks)
        if _TRAVEL in self.demands:
            bounds = bounds.add(_TRAVEL, case)
        if _HEADROOM in self.demands and case.telecentric.any():  # its rings count, and they only make it longer
            bounds = bounds.add(_HEADROOM, case)
        gates, unknown = np.full(len(case.cameras), MET), np.zeros(len(case.cameras), bool)
        for gate in self.gates:
            if gate.of == "pair":
                codes = _flat(judge_gate(gate, case), len(gates))
                gates, unknown = np.maximum(gates, codes), unknown | (codes == UNKNOWN)
        return Rigs(arrangement, case, bounds, stack, gates, unknown, source, _CONTRAST in self.gates)

    def _with_stacks(self, arrangement: Arrangement, case: Case, bounds: Bounds, all_stacks: bool):
        """The rigs, one for each spacer stack that can matter."""
        rows = [np.arange(len(case.cameras))]
        stack = [np.zeros(len(case.cameras), int)]
        if self.problem.has_rings and len(case.cameras):
            low, high = _extensions(case, bounds, all_stacks)
            for here, stacks in self.problem.stacks_by_thread(case.lenses, arrangement.cameras):
                length = stacks.length
                if len(length) == 1:
                    continue
                first = np.searchsorted(length, low[here] - 1e-9, "left")
                last = np.searchsorted(length, high[here] + 1e-9, "right")
                if all_stacks:
                    first, last = np.maximum(first - 1, 0), np.minimum(last + 1, len(length))
                first = np.maximum(first, 1)  # the empty stack is there already
                count = np.maximum(last - first, 0)
                rows.append(np.repeat(here, count))
                begin = np.cumsum(count) - count
                stack.append(np.arange(count.sum()) - np.repeat(begin - first, count))
        row, chosen = np.concatenate(rows), np.concatenate(stack)
        rings, price = np.zeros((len(row), 1)), np.zeros((len(row), 1))
        for here, stacks in self.problem.stacks_by_thread(case.lenses[row], arrangement.cameras):
            rings[here, 0], price[here, 0] = stacks.length[chosen[here]], stacks.price[chosen[here]]
        grown = case_of(self.problem, arrangement, case.cameras[row], case.lenses[row], rings=rings, ring_price=price)
        return grown, bounds.take(row), chosen, row


def _extensions(case: Case, bounds: Bounds, all_stacks: bool):
    """Least and greatest spacer length at which the travel cuts nothing off what is left, over all stops.

    Where the travel is unknown no spacer helps: an empty range. So it is, but for `all_stacks`, where nothing is left.
    """
    with np.errstate(invalid="ignore", over="ignore"):
        lo, hi = np.fmax(bounds.lo, case.M), np.fmin(bounds.hi, case.M)
        shorter, longer = np.minimum(lo, hi), np.maximum(lo, hi)
        low = np.where(case.telecentric, -0.01, case.f * shorter - case.x) - case.d
        high = np.where(case.telecentric, 0.01, case.f * longer) - case.d
    stop = np.isfinite(case.N)
    if not all_stacks:
        stop = stop & span.holds(lo, hi)
    low = np.where(stop & ~np.isnan(low), low, np.inf).min(axis=1)
    high = np.where(stop & ~np.isnan(high), high, -np.inf).max(axis=1)
    return low, high


def _rows(values, rows):
    return values[rows] if np.ndim(values) and len(values) > 1 else values


def _flat(codes, count: int):
    return np.broadcast_to(np.reshape(codes, -1) if np.ndim(codes) else codes, count)
