"""The survey: how many pairs fit, and for each class of cameras with a lens how good a rig may be at best."""

from collections.abc import Iterator
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from visionplan.solve import checks, screen, span
from visionplan.solve.choose import Items
from visionplan.solve.classes import Classes, classes_of
from visionplan.solve.demands import MISSED
from visionplan.solve.judge import Judge
from visionplan.solve.orders import ORDERS, Order
from visionplan.solve.problem import Problem
from visionplan.solve.rigs import Rigs


@dataclass(frozen=True)
class Survey:
    """Classes of cameras with lenses, of which a rig of the class's stand-in fits: arrays over them."""

    problem: Problem
    classes: Classes
    number: np.ndarray
    """The class."""
    lens: np.ndarray
    grade: np.ndarray
    """Best grade of any of its rigs."""
    unknown: np.ndarray
    """Whether something is unknown in all of them."""
    price: np.ndarray
    """Least price; NaN where none is known."""
    figure: np.ndarray
    """Best figure of the order asked for, its sign on."""
    begin: np.ndarray
    """Where the rigs of each begin in `limits`; one more at the end."""
    limits: dict[str, np.ndarray]
    """Camera symbol → the most of it that each rig bears; empty where nothing tells cameras of a class apart."""

    def within(self, rig: np.ndarray, camera: np.ndarray) -> np.ndarray:
        """Whether cameras stay within what rigs (rows of `limits`) bear; what isn't stated does, unless strict."""
        ok = np.ones(len(camera), bool)
        for symbol, limit in self.limits.items():
            values = self.problem.camera[symbol][camera]
            ok &= np.where(np.isnan(values), not self.problem.brief.strict, values <= limit[rig])
        return ok

    @cached_property
    def most(self) -> dict[str, np.ndarray]:
        """Camera symbol → the most of it that any rig of each pair bears."""
        if not len(self.number):
            return {}
        return {symbol: np.maximum.reduceat(limit, self.begin[:-1]) for symbol, limit in self.limits.items()}

    def may(self, pair: np.ndarray, camera: np.ndarray) -> np.ndarray:
        """Whether cameras stay within the most that any rig of their pair (rows of `number`) bears of each."""
        ok = np.ones(len(camera), bool)
        for symbol, most in self.most.items():
            values = self.problem.camera[symbol][camera]
            ok &= np.isnan(values) | (values <= most[pair])
        return ok

    def count(self) -> int:
        """How many pairs fit."""
        if not self.most:
            return int(self.classes.size[self.number].sum())
        pair = np.repeat(np.arange(len(self.number)), np.diff(self.begin))
        # where one rig bears as much of everything as any other of its pair, it alone decides
        bears = np.logical_and.reduce([self.limits[symbol] >= most[pair] for symbol, most in self.most.items()])
        alone = np.logical_or.reduceat(bears, self.begin[:-1])
        rigs = np.flatnonzero(bears & alone[pair])
        rigs = rigs[np.diff(pair[rigs], prepend=-1) != 0]
        total = sum(int(np.count_nonzero(ok)) for _, _, ok in self._tried(rigs, pair))
        for number, camera, ok in self._tried(np.flatnonzero(~alone[pair]), pair):
            total += len(np.unique(number[ok] * len(self.classes.number) + camera[ok]))
        return total

    def _tried(self, rigs: np.ndarray, pair: np.ndarray) -> Iterator[tuple[np.ndarray, np.ndarray, np.ndarray]]:
        """Pair, camera and whether it stays within what the rig bears, for every camera of some rigs.

        Rigs of one pair come together.
        """
        step = screen.CHUNK // 8
        ends = np.flatnonzero(np.diff(pair[rigs], append=-1) != 0) + 1  # after the last rig of each pair
        begin = 0
        while begin < len(rigs):
            end = int(ends[np.searchsorted(ends, min(begin + step, len(rigs)))])
            position, camera = self.classes.spread(self.number[pair[rigs[begin:end]]])
            rig = rigs[begin:end][position]
            yield pair[rig], camera, self.within(rig, camera)
            begin = end


def classes_for(
    problem: Problem, items: Items, cameras: np.ndarray, order: str, apart: np.ndarray | None = None
) -> Classes:
    """Classes of the given cameras, each ordered as the ranking will be; those that `apart` tells apart are."""
    chosen = ORDERS[order]
    price, unknown = problem.camera["camera_price"], items.camera_unknown
    within = {"value": (unknown, price), "price": (price, unknown)}.get(order, (unknown,))
    symbols = chosen.symbols if chosen else ()
    if chosen and problem.brief.headroom is not None:
        symbols += ("camera_length",)  # headroom moves the working point, and with it the figure either way
    return classes_of(problem, cameras, symbols, within, apart)


def survey(problem: Problem, items: Items, order: str = "value", drop: frozenset[str] = frozenset()) -> Survey:
    """Find every class of cameras and lens of which a rig fits, by the class's stand-in."""
    classes = classes_for(problem, items, np.flatnonzero(items.camera < MISSED), order)
    judge = Judge(classes.stand_ins(problem), drop)
    parts = [_part(classes, rigs, ORDERS[order], drop) for rigs in screen.fitting(judge, classes.first, items.lens)]
    if not parts:
        none = np.zeros(0, int)
        return Survey(problem, classes, none, none, none, none, none, none, np.zeros(1, int), {})
    columns = {name: np.concatenate([part[name] for part in parts]) for name in parts[0]}
    return _grouped(problem, classes, columns, len(items.lens))


def _part(classes: Classes, rigs: Rigs, order: Order | None, drop: frozenset[str]) -> dict[str, np.ndarray]:
    """Of the rigs of a block that fit: class, lens, grade, unknown, price, figure, and what they bear."""
    rows = np.flatnonzero(rigs.fit)
    case, count = rigs.case, rigs.arrangement.cameras
    number = classes.number[rigs.cameras[rows]]
    rest = np.broadcast_to(case.lens_price + case.ring_price, (len(rigs.lenses), 1))[rows, 0]
    figure = np.zeros(len(rows))
    if order:
        values = np.broadcast_to(order.sign * order.figure(rigs), rigs.fits.shape)[rows]
        figure = np.fmin.reduce(np.where(rigs.fits[rows], values, np.nan), axis=1)
    return {
        "number": number,
        "lens": rigs.lenses[rows],
        "grade": rigs.best_grade[rows],
        "unknown": rigs.unknown[rows],
        "price": count * (classes.cheapest[number] + rest),
        "figure": figure,
    } | _borne(rigs, rows, rest, drop)


def _borne(rigs: Rigs, rows: np.ndarray, rest: np.ndarray, drop: frozenset[str]) -> dict[str, np.ndarray]:
    """The most price, mass and length of a camera with which each rig fits."""
    case, brief, found = rigs.case, rigs.case.brief, {}
    if brief.max_price is not None and "price" not in drop:
        found["camera_price"] = brief.max_price * (1 + span.EDGE) / rigs.arrangement.cameras - rest
    if brief.max_mass is not None and "mass" not in drop:
        found["camera_mass"] = brief.max_mass * (1 + span.EDGE) - case.lens_mass[rows, 0]
    if brief.headroom is not None and "headroom" not in drop:
        lo, hi = np.fmax(rigs.bounds.lo, case.M), np.fmin(rigs.bounds.hi, case.M)
        with np.errstate(invalid="ignore", divide="ignore", over="ignore"):
            without = checks.headroom(case.varied(camera_length=0.0), np.clip(1.0, lo, hi))
        room = np.broadcast_to(brief.headroom * (1 + span.EDGE) - without, rigs.fits.shape)
        found["camera_length"] = np.where(rigs.fits, room, -np.inf)[rows].max(axis=1)
    vague = -np.inf if brief.strict else np.inf
    return {symbol: np.where(np.isnan(most), vague, most) for symbol, most in found.items()}


def _grouped(problem: Problem, classes: Classes, columns: dict[str, np.ndarray], lenses: int) -> Survey:
    """One row for each class and lens, the best of each column; the limits rig by rig."""
    pair = columns["number"].astype(np.int64) * lenses + columns["lens"]
    order = np.argsort(pair, kind="stable")
    pair = pair[order]
    begin = np.flatnonzero(np.diff(pair, prepend=-1))
    best = {"grade": np.minimum, "unknown": np.logical_and, "price": np.fmin, "figure": np.fmin}
    grouped = {
        name: reduce.reduceat(columns[name][order], begin) if len(begin) else columns[name]
        for name, reduce in best.items()
    }
    number, lens = np.divmod(pair[begin], lenses)
    limits = {name: values[order] for name, values in columns.items() if name.startswith("camera_")}
    return Survey(problem, classes, number, lens, **grouped, begin=np.append(begin, len(pair)), limits=limits)
