"""Rigs under judgement: the intersections of their demands, and what follows from them, as arrays."""

from collections.abc import Callable
from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np

from visionplan.solve import span
from visionplan.solve.ask import Arrangement
from visionplan.solve.case import Case
from visionplan.solve.demands import MET, MISSED, UNKNOWN, Demand, judge
from visionplan.solve.figures import contrasts
from visionplan.solve.gates import Gate, judge_gate


@dataclass(frozen=True, eq=False)
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
        unknown = self.unknown | (code == UNKNOWN).any(axis=-1, keepdims=True)
        if demand.place:
            lo, hi = np.maximum(self.lo_place, lo), np.minimum(self.hi_place, hi)
            return replace(self, lo_place=lo, hi_place=hi, unknown=unknown)
        lo, hi = np.maximum(self.lo_p, lo), np.minimum(self.hi_p, hi)
        return replace(self, lo_p=lo, hi_p=hi, unknown=unknown)

    def both(self, other: "Bounds") -> "Bounds":
        """These and others."""
        return Bounds(
            np.maximum(self.lo_p, other.lo_p),
            np.minimum(self.hi_p, other.hi_p),
            np.maximum(self.lo_place, other.lo_place),
            np.minimum(self.hi_place, other.hi_place),
            self.unknown | other.unknown,
        )

    def take(self, rows: np.ndarray) -> "Bounds":
        """Of some rows."""
        return Bounds(*(rows_of(getattr(self, name), rows) for name in self.__dataclass_fields__))

    @property
    def lo(self):
        """Of all demands."""
        return np.maximum(self.lo_p, self.lo_place)

    @property
    def hi(self):
        """Of all demands."""
        return np.minimum(self.hi_p, self.hi_place)


@dataclass(frozen=True, eq=False)
class Rigs:
    """Rigs in one arrangement, each with every stop of its lens: arrays of shape (rigs,) and (rigs, stops)."""

    arrangement: Arrangement
    case: Case
    intersect: Callable[[], Bounds]
    """Works out `bounds`: where it is enough to know that a rig fits, nobody asks."""
    ends: Bounds | None
    """Where every rig is known to fit its span: bounds over all its stops, so wider than those of any."""
    stack: np.ndarray
    """Row of the spacer stack within the stacks of the lens's thread."""
    gates: np.ndarray
    """Worst code of the gates of a pair, but for the contrast."""
    unknown: np.ndarray
    """Whether a demand or a gate of the pair is unknown, of each rig."""
    source: np.ndarray
    """Which of the pairs asked for each rig belongs to."""
    stop_gates: tuple[Gate, ...]
    """The gates of a stop that are asked."""

    @property
    def cameras(self) -> np.ndarray:
        """Row of each rig's camera."""
        return self.case.cameras

    @property
    def lenses(self) -> np.ndarray:
        """Row of each rig's lens."""
        return self.case.lenses

    @cached_property
    def bounds(self) -> Bounds:
        """Intersections of the demands: shape (rigs, stops)."""
        return self.intersect()

    @cached_property
    def fit(self) -> np.ndarray:
        """Whether a rig fits at some stop, gates of the pair included."""
        return np.asarray(self.fits.any(axis=1) if self.ends is None else self.gates < MISSED)

    @cached_property
    def best_grade(self) -> np.ndarray:
        """Grade of each rig at its best stop, or a better one where that isn't worked out."""
        if self.ends is None:
            return self.grade.min(axis=1)
        with np.errstate(divide="ignore"):
            return np.asarray(span.grade(self.ends.hi_p / self.ends.lo_p - 1, self.case.brief.comfort))[:, 0]

    @cached_property
    def fits_span(self) -> np.ndarray:
        """Whether the span holds a magnification, per stop."""
        return span.fits(self.bounds.lo, self.bounds.hi, self.case.M) & np.isfinite(self.case.N)

    @cached_property
    def point(self) -> np.ndarray:
        """Working point of each stop; NaN where no magnification meets some demand, unless the rig stands already."""
        b, case = self.bounds, self.case
        M = np.where(case.telecentric & (b.hi == 0), np.nan, case.M)
        return span.working_point(b.lo_p, b.hi_p, b.lo, b.hi, M)

    @cached_property
    def room(self) -> np.ndarray:
        """Latitude of each stop, where it fits."""
        return np.where(self.fits_span, span.latitude(self.point, self.bounds.lo_p, self.bounds.hi_p), 0.0)

    @cached_property
    def short(self) -> np.ndarray:
        """Shortfall of each stop; infinite where the lens has no such stop."""
        short = span.shortfall(self.bounds.lo, self.bounds.hi, self.case.M)
        return np.where(np.isfinite(self.case.N), short, np.inf)

    def stop_codes(self, rows: np.ndarray, stops: np.ndarray) -> np.ndarray:
        """Worst code of the gates of a stop, at some rigs' stops; MET where none is asked."""
        codes = np.full(len(rows), MET)
        for gate in self.stop_gates:
            left = np.flatnonzero(codes < MISSED)
            some = self.case.pick(self.arrangement, rows[left], stops[left])
            codes[left] = np.maximum(codes[left], stop_code(gate, some, self.point[rows[left], stops[left]][:, None]))
        return codes

    @cached_property
    def share(self) -> np.ndarray:
        """Yield of every stop that fits; NaN for the others."""
        found = np.full(self.fits.shape, np.nan)
        rows, stops = np.nonzero(self.fits)
        if len(rows):
            from visionplan.solve.tolerance import share

            some = self.case.pick(self.arrangement, rows, stops)
            found[rows, stops] = share(some, self.point[rows, stops][:, None])[:, 0]
        return found

    @cached_property
    def fits(self) -> np.ndarray:
        """Whether a stop fits, gates of the pair included; gates of camera or lens alone are not."""
        fits = self.fits_span & (self.gates < MISSED)[:, None]
        if self.stop_gates:
            rows, stops = np.nonzero(fits)
            fits[rows, stops] = self.stop_codes(rows, stops) < MISSED
        return fits

    @cached_property
    def grade(self) -> np.ndarray:
        """Grade of each stop, as an index into GRADES; one past the last where it doesn't fit."""
        return np.where(self.fits, span.grade(self.room, self.case.brief.comfort), len(span.GRADES))


def flat(values, count: int) -> np.ndarray:
    """Values of so many rigs, (rigs, 1) or the same for all, as shape (rigs,)."""
    return np.broadcast_to(np.reshape(values, -1) if np.ndim(values) else values, count)


def rows_of(values, rows):
    """Some rows of an array, or what is the same for all rows."""
    return values[rows] if np.ndim(values) and len(values) > 1 else values


def stop_code(gate: Gate, case: Case, point: np.ndarray) -> np.ndarray:
    """Codes of a gate of a stop for rigs at their working points, shape (rigs, 1); MISSED where there is none."""
    if gate.name == "contrast":
        case.least_contrast = np.minimum.reduce(contrasts(case, point))
    else:
        from visionplan.solve.tolerance import share

        case.share = share(case, point)
    return np.where(np.isfinite(point), judge_gate(gate, case), MISSED)[:, 0]
