"""The search: the best rigs of a brief over a catalogue, in any order, without judging every pair in full.

Each class of cameras with a lens has a bound on how good its rig may be; pairs are judged in full in the order of
those bounds until no bound left can beat what is found.
"""

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from time import perf_counter

import numpy as np

from visionplan.brief.model import Brief
from visionplan.catalogue.items import Catalogue
from visionplan.solve import screen, span
from visionplan.solve.choose import Chosen, Items, choose
from visionplan.solve.classes import Classes
from visionplan.solve.concessions import concede_problem
from visionplan.solve.contradictions import contradictions
from visionplan.solve.demands import MISSED
from visionplan.solve.judge import Judge
from visionplan.solve.orders import ORDERS
from visionplan.solve.problem import Problem
from visionplan.solve.rig import Ranking
from visionplan.solve.survey import Survey, classes_for, survey
from visionplan.solve.writeup import rigs_of

_BATCH, _MOST = 64, 1 << 14
"""Least and greatest number of pairs judged in full at a time."""
_CLASSES = 256
"""Classes with lenses spread into their cameras at first; twice as many each time."""

Key = list[np.ndarray]
"""Columns to order pairs by, the first the most important; smaller is better."""


@dataclass(frozen=True)
class _Pairs:
    """Classes of cameras with lenses, and a bound on the key of any of their pairs."""

    classes: Classes
    number: np.ndarray
    lens: np.ndarray
    bound: Key
    priced: bool
    """Whether the last column of the bound is the price of the class's cheapest camera."""
    may: Callable[[np.ndarray, np.ndarray], np.ndarray]
    """Whether cameras of pairs (rows of these arrays) are worth judging."""


def rank(
    brief: Brief,
    catalogue: Catalogue,
    order: str = "value",
    top: int = 20,
    concessions: bool | None = None,
    watch: Callable[[float], None] | None = None,
) -> Ranking:
    """The best rigs, one a pair; where fewer than `top` fit, the nearest misses follow.

    Parameters
    ----------
    order : a name in `ORDERS`
    top : how many rigs at most
    concessions : whether to work them out; None for only when nothing fits
    watch : called now and then with the share of a search that is done; what it raises ends the work
    """
    begin = perf_counter()
    problem = Problem(brief, catalogue, watch=watch)
    items = Items.of(problem)
    found = survey(problem, items, order)
    fitting = found.count()
    judge = Judge(problem)
    cameras, lenses = _best(judge, items, _fitting_pairs(found, order), _fitting_key(order), min(top, fitting), True)
    if len(cameras) < top:
        short = top - len(cameras)
        misses = _best(judge, items, _missing_pairs(problem, items), _missing_key, short, False)
        cameras, lenses = np.concatenate((cameras, misses[0])), np.concatenate((lenses, misses[1]))
    rigs = rigs_of(judge, choose(judge, items, cameras, lenses)) if len(cameras) else ()
    wanted = concessions if concessions is not None else not fitting
    given = concede_problem(problem, fitting) if wanted else None
    pairs = len(catalogue.cameras) * len(catalogue.lenses)
    notes = contradictions(problem.ask)
    if given and brief.min_yield is not None:
        notes += ("The concessions leave the yield aside: give somewhat more than they say to have it too.",)
    return Ranking(brief, catalogue, order, pairs, fitting, rigs, given, perf_counter() - begin, notes)


def _best(
    judge: Judge, items: Items, pairs: _Pairs, key: Callable[[Chosen], Key], top: int, fits: bool
) -> tuple[np.ndarray, np.ndarray]:
    """Rows of cameras and lenses of the best `top` pairs that fit, or that don't, best first."""
    camera, lens = np.zeros(0, int), np.zeros(0, int)
    keys: Key = []
    ids = judge.problem.id_rank
    for cameras, lenses, bound in _batches(judge, pairs, top) if top else ():
        if len(camera) == top and _beyond([b[0] for b in bound], [k[-1] for k in keys]):
            break
        chosen = choose(judge, items, cameras, lenses)
        chosen = chosen.take(np.flatnonzero(chosen.fits == fits))
        new = key(chosen)
        keys = [np.concatenate(both) for both in zip(keys, new)] if keys else new
        camera, lens = np.concatenate((camera, chosen.camera)), np.concatenate((lens, chosen.lens))
        best = np.lexsort((ids[1][lens], ids[0][camera], *(span.tie_rank(column) for column in reversed(keys))))[:top]
        camera, lens, keys = camera[best], lens[best], [column[best] for column in keys]
    return camera, lens


def _batches(judge: Judge, pairs: _Pairs, top: int) -> Iterator[tuple[np.ndarray, np.ndarray, Key]]:
    """Rows of cameras and lenses in the order of their bounds, with these: no later one's is better.

    Classes are spread into their cameras little by little: what is spread and worse than the next class waits.
    """
    brief, price = judge.problem.brief, judge.problem.camera["camera_price"]
    # cameras of a class differ in nothing that the choice sees but what a price, mass or headroom asked for bears
    most = top if (brief.max_price, brief.max_mass, brief.headroom) == (None, None, None) else None
    queue = _front(pairs.bound, _CLASSES + 1)
    at, spread, batch = 0, _CLASSES, min(max(_BATCH, top), _MOST)
    waiting = np.zeros(0, int), np.zeros(0, int), [np.zeros(0) for _ in pairs.bound]
    while at < len(queue) or len(waiting[0]):
        if at + spread >= len(queue) < len(pairs.number):
            queue = _front(pairs.bound, 8 * (at + spread))
        some, at, spread = queue[at : at + spread], min(at + spread, len(queue)), 2 * spread
        position, cameras = pairs.classes.spread(pairs.number[some], most)
        worth = pairs.may(some[position], cameras)
        position, cameras = position[worth], cameras[worth]
        bound = [column[some][position].astype(float) for column in pairs.bound]
        if pairs.priced:
            bound[-1] += np.nan_to_num(
                price[cameras] - pairs.classes.cheapest[pairs.number[some]][position], nan=np.inf
            )
        cameras, lenses = (
            np.concatenate((waiting[0], cameras)),
            np.concatenate((waiting[1], pairs.lens[some][position])),
        )
        bound = [np.concatenate(both) for both in zip(waiting[2], bound)]
        order, ready = np.lexsort(bound[::-1]), len(cameras)
        if at < len(queue):
            following = [np.append(column, of_pair[queue[at]]) for column, of_pair in zip(bound, pairs.bound)]
            ready = int(np.flatnonzero(np.lexsort(following[::-1]) == ready)[0])
        cameras, lenses, bound = cameras[order], lenses[order], [column[order] for column in bound]
        for begin in range(0, ready, batch):
            end = min(begin + batch, ready)
            yield cameras[begin:end], lenses[begin:end], [column[begin:end] for column in bound]
        waiting = cameras[ready:], lenses[ready:], [column[ready:] for column in bound]


def _front(columns: Key, most: int) -> np.ndarray:
    """Rows of the first `most` in the order of some columns, in that order; NaN last."""
    rows = np.arange(len(columns[0]))
    kept = [rows[:0]]
    for column in columns:
        if len(rows) <= most:
            break
        values = np.nan_to_num(column[rows].astype(float), nan=np.inf)
        last = np.partition(values, most - 1)[most - 1]
        kept.append(rows[values < last])
        most -= len(kept[-1])
        rows = rows[values == last]
    front = np.sort(np.concatenate((*kept, rows[:most])))
    return front[np.lexsort([column[front] for column in columns[::-1]])]


def _beyond(bound: list[float], worst: list[float]) -> bool:
    """Whether a bound is worse than the worst key kept, by more than a tie."""
    for b, k in zip(bound, worst):
        b, k = (np.inf if np.isnan(value) else float(value) for value in (b, k))
        if b != k and abs(b - k) > span.TIE * max(abs(b), abs(k), 1e-300):
            return b > k
    return False


def _fitting_pairs(found: Survey, order: str) -> _Pairs:
    bound = {"value": [found.grade, found.unknown, found.price], "price": [found.price]}.get(order, [found.figure])
    return _Pairs(found.classes, found.number, found.lens, bound, order in ("value", "price"), found.may)


def _fitting_key(order: str) -> Callable[[Chosen], Key]:
    def key(chosen: Chosen) -> Key:
        if order == "value":
            return [chosen.grade, chosen.unknown, chosen.price, -(1 + chosen.latitude)]
        if order == "price":
            return [chosen.price, chosen.unknown]
        named = ORDERS[order]
        assert named
        return [named.sign * chosen.gather(named.figure), chosen.unknown]

    return key


def _missing_key(chosen: Chosen) -> Key:
    """The same whatever the order: gates, shortfall, then as by value."""
    return [chosen.misses_gate, chosen.shortfall, chosen.unknown, chosen.price]


def _missing_pairs(problem: Problem, items: Items) -> _Pairs:
    """Every class with every lens, by the least shortfall that any of its rigs may have.

    Cameras that miss a gate of their own and cameras that don't are classes apart.
    """
    missing = items.camera == MISSED
    classes = classes_for(problem, items, np.arange(len(missing)), "value", apart=missing)
    lenses = len(items.lens)
    clear = np.full(len(classes) * lenses, np.inf)
    least = np.full(len(classes) * lenses, np.inf)
    for rigs in screen.everything(Judge(classes.stand_ins(problem)), classes.first):
        pair = classes.number[rigs.cameras] * lenses + rigs.lenses
        short = np.where(rigs.fits_span & ~rigs.fits, np.inf, rigs.short).min(axis=1)
        np.minimum.at(clear, pair, np.where(rigs.gates < MISSED, short, np.inf))
        np.minimum.at(least, pair, rigs.short.min(axis=1))
    number, lens = np.divmod(np.arange(len(least)), lenses)
    gate = np.isinf(clear) | missing[classes.first][number] | (items.lens[lens] == MISSED)
    return _Pairs(classes, number, lens, [gate, np.where(gate, least, clear)], False, lambda pair, camera: camera >= 0)
