"""Concessions: the smallest change of one demand that lets at least one rig fit, all others as asked.

With a demand left out, each rig that then fits leaves an interval of the magnification; at its better end the demand
needs to give way least. There a tolerance breaks it in about half the rigs built, so a yield asked for is left aside.
"""

from collections.abc import Iterator
from dataclasses import dataclass, replace

import numpy as np

from visionplan.brief.model import Brief
from visionplan.catalogue.items import Catalogue
from visionplan.solve import screen, span
from visionplan.solve.choose import Items
from visionplan.solve.classes import Classes, classes_of
from visionplan.solve.demands import MISSED, Demand
from visionplan.solve.figures import contrasts
from visionplan.solve.gates import ASKED, Gate
from visionplan.solve.gives import Give
from visionplan.solve.judge import Judge
from visionplan.solve.problem import Problem
from visionplan.solve.rig import Concession
from visionplan.solve.rigs import Rigs
from visionplan.solve.survey import survey


@dataclass(frozen=True)
class _Offer:
    """What one pair would need, and how little that changes."""

    known: bool
    change: float
    camera: str
    lens: str
    asked: float
    needed: float
    end: str | None

    def beats(self, other: "_Offer | None") -> bool:
        """Known before unknown, then the least change, then by id."""
        if other is None or self.known != other.known:
            return other is None or self.known
        if abs(self.change - other.change) > span.TIE * max(self.change, other.change):
            return self.change < other.change
        return (self.camera, self.lens) < (other.camera, other.lens)


def concede(brief: Brief, catalogue: Catalogue) -> tuple[Concession, ...]:
    """Every concession by itself, least change first; none when something fits already."""
    problem = Problem(brief, catalogue)
    found = survey(problem, Items.of(problem))
    return concede_problem(problem, found.count(problem.camera["camera_price"], brief.strict))


def concede_problem(problem: Problem, fitting: int) -> tuple[Concession, ...]:
    """The same of a problem of which it is known how many pairs fit."""
    if fitting:
        return ()
    offers = []
    for asked in ASKED:
        conceded = asked.concede if isinstance(asked, Demand) else asked.loosens
        if not conceded or not asked.asks(problem.ask):
            continue
        best: _Offer | None = None
        for offer in _offers(problem, asked):
            best = offer if offer.beats(best) else best
        if best:
            offers.append((best, asked))
    offers.sort(key=lambda entry: entry[0].change)
    return tuple(_concession(offer, asked) for offer, asked in offers)


def _concession(offer: _Offer, asked: Demand | Gate) -> Concession:
    unit = (isinstance(asked, Demand) and asked.concede_unit) or asked.unit
    return Concession(asked.name, offer.asked, offer.needed, unit, offer.end, offer.camera, offer.lens)


def _offers(problem: Problem, asked: Demand | Gate) -> Iterator[_Offer]:
    """The best offers of each block of rigs that fit but for one demand or gate."""
    drop = frozenset({asked.name})
    items = Items.of(problem, drop)
    price = problem.camera["camera_price"]
    limit = None if asked.name == "price" else problem.brief.max_price
    vague = items.camera_unknown | (np.isnan(price) & (limit is not None))
    cheapest_first = (price,) if asked.name == "price" else ()
    symbols = asked.symbols if isinstance(asked, Gate) else ()
    cameras = np.flatnonzero(items.camera < MISSED)
    classes = classes_of(problem, cameras, symbols, cheapest_first, apart=vague)
    at_bound = isinstance(asked, Demand)
    judge = Judge(problem, drop | {"price", "yield"} | ({"contrast"} if at_bound else set()))
    for rigs in screen.fitting(judge, classes.first, items.lens):
        fits = rigs.fits & _affordable(problem, classes, rigs, limit)[:, None]
        if not fits.any():
            continue
        unknown = rigs.unknown | items.lens_unknown[rigs.lenses] | vague[rigs.cameras]
        for give in _gives(rigs, asked):
            with np.errstate(invalid="ignore", divide="ignore"):
                looser = fits & (give.loosens * (give.needed - give.asked) > 0) & _sharp(problem, rigs, give.at)
                change = np.where(looser, np.abs(np.log(give.needed / give.asked)), np.inf)
            change = np.where(np.isfinite(change), change, np.inf)
            for known in (True, False):
                rows = np.flatnonzero(unknown != known)
                for row, stop in _least(change, rows):
                    camera = _first_affordable(problem, classes, rigs, row, limit)
                    yield _Offer(
                        known,
                        float(change[row, stop]),
                        problem.catalogue.cameras["id"][camera],
                        problem.catalogue.lenses["id"][rigs.lenses[row]],
                        float(give.asked[row, stop]),
                        float(give.needed[row, stop]),
                        give.end,
                    )


def _gives(rigs: Rigs, asked: Demand | Gate) -> list[Give]:
    """What the demand or gate must give way, over rigs and stops."""
    case, shape = rigs.case, rigs.fits.shape
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        if isinstance(asked, Gate):
            gives = [Give(asked.asked(case), asked.got(case), None, asked.loosens)]
        else:
            assert asked.concede
            lo, hi = np.fmax(rigs.bounds.lo, case.M), np.fmin(rigs.bounds.hi, case.M)
            gives = asked.concede(case, lo, hi)
    return [
        replace(give, asked=np.broadcast_to(give.asked, shape), needed=np.broadcast_to(give.needed, shape))
        for give in gives
    ]


def _sharp(problem: Problem, rigs: Rigs, at) -> np.ndarray | bool:
    """Whether the contrast asked for is there where a demand that gave way just holds."""
    if at is None or problem.brief.min_contrast is None:
        return True
    least = np.minimum.reduce(contrasts(rigs.case, at))
    return least >= problem.brief.min_contrast * (1 - span.EDGE)


def _affordable(problem: Problem, classes: Classes, rigs: Rigs, limit: float | None) -> np.ndarray:
    """Whether some camera of each rig's class keeps the rig within the price."""
    if limit is None:
        return np.full(len(rigs.cameras), True)
    rest = (rigs.case.lens_price + rigs.case.ring_price)[:, 0]
    total = rigs.arrangement.cameras * (classes.cheapest[classes.number[rigs.cameras]] + rest)
    return np.where(np.isnan(total), not problem.brief.strict, total <= limit * (1 + span.EDGE))


def _least(change: np.ndarray, rows: np.ndarray) -> np.ndarray:
    """Row and stop of the least finite changes among some rows."""
    least = change[rows].min(initial=np.inf)
    if not np.isfinite(least):
        return np.zeros((0, 2), int)
    found = np.argwhere(change[rows] <= least * (1 + span.TIE))
    return np.column_stack((rows[found[:, 0]], found[:, 1]))


def _first_affordable(problem: Problem, classes: Classes, rigs: Rigs, row: int, limit: float | None) -> int:
    """The first camera of a rig's class that keeps it within the price."""
    members = classes.spread(classes.number[rigs.cameras[row : row + 1]])[1]
    if limit is None:
        return int(members[0])
    rest = rigs.case.lens_price[row, 0] + rigs.case.ring_price[row, 0]
    total = rigs.arrangement.cameras * (problem.camera["camera_price"][members] + rest)
    return int(members[np.isnan(total) | (total <= limit * (1 + span.EDGE))][0])
