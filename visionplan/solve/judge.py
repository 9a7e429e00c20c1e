"""Judging rigs: the intervals of every demand intersected, for many rigs and all their stops at once.

This is the general path over the table of demands. It takes rows of cameras and lenses and one arrangement, adds the
spacer stacks that can matter, and leaves each rig's spans, gates and unknowns as arrays. What belongs to lens and stop
alone is worked out once for each lens and stop and gathered from there.
"""

from dataclasses import dataclass, replace

import numpy as np

from visionplan.solve import span
from visionplan.solve.ask import Arrangement
from visionplan.solve.bounds import STRAIGHT
from visionplan.solve.case import Case, case_of
from visionplan.solve.demands import BY_NAME, MET, UNKNOWN, asked_demands
from visionplan.solve.gates import asked_gates, judge_gate
from visionplan.solve.problem import Problem
from visionplan.solve.rigs import Bounds, Rigs, flat, rows_of

_TRAVEL, _HEADROOM = BY_NAME["travel"], BY_NAME["headroom"]


@dataclass(frozen=True)
class OfLens:
    """What belongs to lens and stop alone, for every lens of the catalogue."""

    bounds: Bounds
    """Shape (lenses, stops)."""
    lo: np.ndarray
    """Of all demands, a telecentric lens's magnification included; (inf, 0) where nothing is left."""
    hi: np.ndarray
    least: np.ndarray
    """Least `lo` over the stops, shape (lenses,)."""
    most: np.ndarray
    widest: Bounds
    """Bounds over all stops that leave something, shape (lenses, 1)."""

    @classmethod
    def of(cls, bounds: Bounds, case: Case) -> "OfLens":
        """What follows from the bounds of a case of every lens."""
        lo, hi = np.fmax(bounds.lo, case.M), np.fmin(bounds.hi, case.M)
        possible = span.holds(lo, hi) & np.isfinite(case.N)
        lo, hi = np.where(possible, lo, np.inf), np.where(possible, hi, 0.0)
        widest = replace(
            bounds,
            lo_p=np.where(possible, bounds.lo_p, np.inf).min(axis=1, keepdims=True),
            hi_p=np.where(possible, bounds.hi_p, 0.0).max(axis=1, keepdims=True),
        )
        return cls(bounds, lo, hi, lo.min(axis=1), hi.max(axis=1), widest)


class Judge:
    """Judges the rigs of a problem, all demands and gates but for those dropped."""

    def __init__(self, problem: Problem, drop: frozenset[str] = frozenset()):
        self.problem = problem
        self.demands = asked_demands(problem.ask, drop)
        self.gates = asked_gates(problem.ask, drop)
        self.stop_gates = tuple(gate for gate in self.gates if gate.of == "stop")
        self._lenses: dict[float, OfLens] = {}

    def of_lens(self, arrangement: Arrangement) -> "OfLens":
        """What belongs to lens and stop alone, for every lens."""
        slack = self.problem.ask.slack(arrangement)
        if slack not in self._lenses:
            every = np.arange(len(self.problem.catalogue.lenses))
            case = case_of(self.problem, arrangement, lenses=every)
            bounds = Bounds(np.zeros(case.N.shape), np.full(case.N.shape, np.inf))
            for demand in self.demands:
                if demand.of == "lens":
                    bounds = bounds.add(demand, case)
            self._lenses[slack] = OfLens.of(bounds, case)
        return self._lenses[slack]

    def rigs(self, arrangement: Arrangement, cameras: np.ndarray, lenses: np.ndarray, all_stacks=False) -> Rigs:
        """Judge cameras with lenses, row by row.

        Of the spacer stacks those that let a rig fit are kept, and where none does the nearest; with `all_stacks`
        every one that could be chosen when no rig fits either.
        """
        case = self._bare(arrangement, cameras, lenses)
        of_pair = Bounds()
        for demand in self.demands:
            if demand.of == "pair" and (demand is not _TRAVEL or not self.problem.has_rings):
                of_pair = of_pair.add(demand, case)
        source = np.arange(len(cameras))
        if not all_stacks:
            source = self._possible(arrangement, lenses, of_pair)
            case, of_pair = self._bare(arrangement, cameras[source], lenses[source]), of_pair.take(source)
        of_lens, none = self.of_lens(arrangement), np.zeros(len(source), int)
        whole = not self.problem.has_rings and not self.stop_gates and all(d.of != "rig" for d in self.demands)
        if whole:  # nothing more can come: what is possible fits
            unknown = rows_of(of_lens.bounds.unknown, case.lenses) | of_pair.unknown
            ends = None if all_stacks else of_lens.widest.take(case.lenses).both(of_pair)
            intersect = lambda: of_lens.bounds.take(case.lenses).both(of_pair)  # noqa: E731
            return self._rigs(arrangement, case, intersect, ends, unknown, none, source)
        bounds = of_lens.bounds.take(case.lenses).both(of_pair)
        for demand in self.demands:
            if demand.of == "rig":
                bounds = bounds.add(demand, case)
        stack = none
        if self.problem.has_rings:
            case, bounds, stack, row = self._with_stacks(arrangement, case, bounds, all_stacks)
            source = source[row]
            if _TRAVEL in self.demands:
                bounds = bounds.add(_TRAVEL, case)
            if _HEADROOM in self.demands and case.telecentric.any():  # its rings count, and they only make it longer
                bounds = bounds.add(_HEADROOM, case)
        return self._rigs(arrangement, case, lambda: bounds, None, bounds.unknown, stack, source)

    def _rigs(self, arrangement, case: Case, intersect, ends: Bounds | None, unknown, stack, source) -> Rigs:
        gates, unknown = np.full(len(source), MET), flat(unknown, len(source))
        for gate in self.gates:
            if gate.of == "pair":
                codes = flat(judge_gate(gate, case), len(gates))
                gates, unknown = np.maximum(gates, codes), unknown | (codes == UNKNOWN)
        return Rigs(arrangement, case, intersect, ends, stack, gates, unknown, source, self.stop_gates)

    def _bare(self, arrangement: Arrangement, cameras: np.ndarray, lenses: np.ndarray) -> Case:
        none = np.zeros((len(cameras), 1))
        return case_of(self.problem, arrangement, cameras, lenses, rings=none, ring_price=none, y=none)

    def _possible(self, arrangement: Arrangement, lenses: np.ndarray, of_pair: Bounds) -> np.ndarray:
        """Rows whose pair demands leave something to some stop of the lens."""
        lo, hi = (np.broadcast_to(end, (len(lenses), 1))[:, 0] for end in (of_pair.lo, of_pair.hi))
        of_lens = self.of_lens(arrangement)
        least, most = of_lens.least[lenses], of_lens.most[lenses]
        left = np.flatnonzero(span.holds(np.maximum(lo, least), np.minimum(hi, most)))
        possible = np.zeros(len(lenses), bool)
        stops = of_lens.lo.shape[1]
        for stop in sorted(range(stops), key=lambda stop: abs(stop - stops // 2)):  # the middle ones fit most often
            low = np.maximum(lo[left], of_lens.lo[lenses[left], stop])
            high = np.minimum(hi[left], of_lens.hi[lenses[left], stop])
            holds = span.holds(low, high)
            possible[left[holds]] = True
            left = left[~holds]
        return np.flatnonzero(possible)

    def _with_stacks(self, arrangement: Arrangement, case: Case, bounds: Bounds, all_stacks: bool):
        """The rigs, one for each spacer stack that can matter."""
        rows = [np.arange(len(case.cameras))]
        stack = [np.zeros(len(case.cameras), int)]
        between = self.problem.stacks_between
        low, high = _extensions(case, bounds, all_stacks)
        for here, stacks in between(case.cameras, case.lenses, arrangement.cameras):
            length, travel = stacks.length, stacks.travel.max()
            if len(length) == 1:
                continue
            first = np.searchsorted(length, low[here] - travel - 1e-9, "left")
            last = np.searchsorted(length, high[here] + 1e-9, "right")
            if all_stacks:
                # without helicoids the nearest to either side; with them a longer stack may reach less far
                first = np.where(travel > 0, 0, np.maximum(first - 1, 0))
                last = np.minimum(last + 1, len(length))
            useless = low[here] > high[here]
            last = np.where(useless, 0, last)
            first = np.maximum(first, 1)  # the empty stack is there already
            count = np.maximum(last - first, 0)
            rows.append(np.repeat(here, count))
            begin = np.cumsum(count) - count
            stack.append(np.arange(count.sum()) - np.repeat(begin - first, count))
            if all_stacks:  # where no stack helps the span, one may still spare a gate: the mount's, the price's
                unpriced = np.isnan(stacks.price) & (self.problem.brief.max_price is not None)
                sparing = np.flatnonzero((stacks.rings == 1) & ((stacks.joins & ~stacks.joins[0]) | unpriced))
                rows.append(np.repeat(here[useless], len(sparing)))
                stack.append(np.tile(sparing, np.count_nonzero(useless)))
        row, chosen = np.concatenate(rows), np.concatenate(stack)
        cameras, lenses = case.cameras[row], case.lenses[row]
        given = {name: np.zeros((len(row), 1)) for name in ("rings", "ring_price", "y")}
        given["joined"] = np.zeros((len(row), 1), bool)
        for here, stacks in between(cameras, lenses, arrangement.cameras):
            for name, of_stack in zip(given, (stacks.length, stacks.price, stacks.travel, stacks.joins)):
                given[name][here, 0] = of_stack[chosen[here]]
        return case_of(self.problem, arrangement, cameras, lenses, **given), bounds.take(row), chosen, row


def _extensions(case: Case, bounds: Bounds, all_stacks: bool):
    """Least and greatest spacer length at which the travel cuts nothing off what is left, over all stops.

    Where the travel is unknown no spacer helps: an empty range. So it is, but for `all_stacks`, where nothing is left.
    """
    with np.errstate(invalid="ignore", over="ignore"):
        lo, hi = np.fmax(bounds.lo, case.M), np.fmin(bounds.hi, case.M)
        shorter, longer = np.minimum(lo, hi), np.maximum(lo, hi)
        low = np.where(case.telecentric, -STRAIGHT, case.f * shorter - case.x) - case.d
        high = np.where(case.telecentric, STRAIGHT, case.f * longer) - case.d
    stop = np.isfinite(case.N) & (lo < np.inf) & (hi > 0)
    if not all_stacks:
        stop = stop & span.holds(lo, hi)
    low = np.where(stop & ~np.isnan(low), low, np.inf).min(axis=1)
    high = np.where(stop & ~np.isnan(high), high, -np.inf).max(axis=1)
    return low, high
