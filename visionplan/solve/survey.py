"""The survey: how many pairs fit, and for each class of cameras with a lens how good a rig may be at best."""

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np

from visionplan.solve import screen, span
from visionplan.solve.choose import Items
from visionplan.solve.classes import Classes, classes_of
from visionplan.solve.demands import MISSED
from visionplan.solve.judge import Judge
from visionplan.solve.orders import ORDERS, Order
from visionplan.solve.problem import Problem
from visionplan.solve.rigs import Rigs

_PRICE = frozenset({"price"})
"""Judged camera by camera, not class by class."""


@dataclass(frozen=True)
class Survey:
    """Classes of cameras with lenses, of which at least one rig fits: arrays over them."""

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
    affordable: np.ndarray
    """Greatest price of a camera with which one of its rigs is within the price."""

    def count(self, camera_price: np.ndarray, strict: bool) -> int:
        """How many pairs fit."""
        if np.isposinf(self.affordable).all():
            return int(self.classes.size[self.number].sum())
        total = 0
        for begin in range(0, len(self.number), screen.CHUNK):
            some = slice(begin, begin + screen.CHUNK)
            position, camera = self.classes.spread(self.number[some])
            price, limit = camera_price[camera], self.affordable[some][position]
            total += int(np.count_nonzero(np.where(np.isnan(price), not strict, price <= limit)))
        return total


def classes_for(
    problem: Problem, items: Items, cameras: np.ndarray, order: str, apart: np.ndarray | None = None
) -> Classes:
    """Classes of the given cameras, each ordered as the ranking will be; those that `apart` tells apart are."""
    chosen = ORDERS[order]
    price, unknown = problem.camera["camera_price"], items.camera_unknown
    within = {"value": (unknown, price), "price": (price, unknown)}.get(order, (unknown,))
    return classes_of(problem, cameras, chosen.symbols if chosen else (), within, apart)


def survey(problem: Problem, items: Items, order: str = "value", drop: frozenset[str] = frozenset()) -> Survey:
    """Find every class of cameras and lens of which a rig fits, price left aside."""
    classes = classes_for(problem, items, np.flatnonzero(items.camera < MISSED), order)
    judge = Judge(problem, drop | _PRICE)
    limit = None if "price" in drop else problem.brief.max_price
    parts = [_part(classes, rigs, ORDERS[order], limit) for rigs in screen.fitting(judge, classes.first, items.lens)]
    columns = [np.concatenate(column) for column in zip(*parts)] if parts else [np.zeros(0, int)] * 7
    return Survey(classes, *_grouped(columns, len(items.lens)))


def _part(classes: Classes, rigs: Rigs, order: Order | None, limit: float | None) -> tuple[np.ndarray, ...]:
    """Of the rigs of a block that fit: class, lens, grade, unknown, price, figure, affordable."""
    rows = np.flatnonzero(rigs.fit)
    case, count = rigs.case, rigs.arrangement.cameras
    number, lens = classes.number[rigs.cameras[rows]], rigs.lenses[rows]
    rest = np.broadcast_to(case.lens_price + case.ring_price, (len(rigs.lenses), 1))[rows, 0]
    figure = np.zeros(len(rows))
    if order:
        values = np.broadcast_to(order.sign * order.figure(rigs), rigs.fits.shape)[rows]
        figure = np.fmin.reduce(np.where(rigs.fits[rows], values, np.nan), axis=1)
    affordable = np.full(len(rows), np.inf)
    if limit is not None:
        most = limit * (1 + span.EDGE) / count - rest
        affordable = np.where(np.isnan(most), -np.inf if case.brief.strict else np.inf, most)
    return (
        number,
        lens,
        rigs.best_grade[rows],
        rigs.unknown[rows],
        count * (classes.cheapest[number] + rest),
        figure,
        affordable,
    )


def _grouped(columns: Iterable[np.ndarray], lenses: int) -> list[np.ndarray]:
    """One row for each class and lens, the best of each column."""
    number, lens, grade, unknown, price, figure, affordable = columns
    pair = number.astype(np.int64) * lenses + lens
    order = np.argsort(pair, kind="stable")
    pair = pair[order]
    begin = np.flatnonzero(np.diff(pair, prepend=-1))
    if not len(begin):
        return [np.asarray(column) for column in columns]
    best = (np.minimum, np.logical_and, np.fmin, np.fmin, np.maximum)
    rest = (grade, unknown, price, figure, affordable)
    return [
        pair[begin] // lenses,
        pair[begin] % lenses,
        *(reduce.reduceat(column[order], begin) for reduce, column in zip(best, rest)),
    ]
