"""Concessions: the smallest change of one demand that lets at least one rig fit, all others as asked.

With a demand left out, each rig that then fits leaves an interval of the magnification; at its better end the demand
needs to give way least. There a tolerance breaks it in about half the rigs built, so a yield asked for is left aside.
"""

from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace

import numpy as np

from visionplan.brief.model import Brief
from visionplan.catalogue.items import Catalogue
from visionplan.solve import screen, span
from visionplan.solve.choose import Items
from visionplan.solve.classes import classes_of
from visionplan.solve.demands import MISSED, Demand
from visionplan.solve.figures import contrasts
from visionplan.solve.gates import ASKED, Gate
from visionplan.solve.gives import Give
from visionplan.solve.judge import Judge
from visionplan.solve.problem import Problem
from visionplan.solve.rig import Concession
from visionplan.solve.rigs import Rigs
from visionplan.solve.survey import survey

_BATCH = 64
"""Pairs of class and lens whose cameras are tried at a time."""


@dataclass(frozen=True)
class _Offer:
    """What one pair would need, and how little that changes."""

    change: float
    camera: str
    lens: str
    asked: float
    needed: float
    end: str | None

    def beats(self, other: "_Offer | None") -> bool:
        """The least change first, then by id."""
        if other is None:
            return True
        if abs(self.change - other.change) > span.TIE * max(self.change, other.change):
            return self.change < other.change
        return (self.camera, self.lens) < (other.camera, other.lens)


def concede(brief: Brief, catalogue: Catalogue, watch: Callable[[float], None] | None = None) -> tuple[Concession, ...]:
    """Every concession by itself, least change first; none when something fits already.

    `watch` is called as that of `rank` is.
    """
    problem = Problem(brief, catalogue, watch=watch)
    found = survey(problem, Items.of(problem))
    return concede_problem(problem, found.count())


def concede_problem(problem: Problem, fitting: int) -> tuple[Concession, ...]:
    """The same of a problem of which it is known how many pairs fit."""
    if fitting:
        return ()
    offers = []
    for asked in ASKED:
        conceded = asked.concede if isinstance(asked, Demand) else asked.loosens
        if conceded and asked.asks(problem.ask):
            best = _best_offer(problem, asked)
            if best:
                offers.append((best, asked))
    offers.sort(key=lambda entry: entry[0].change)
    return tuple(_concession(offer, asked) for offer, asked in offers)


def _concession(offer: _Offer, asked: Demand | Gate) -> Concession:
    unit = (isinstance(asked, Demand) and asked.concede_unit) or asked.unit
    return Concession(asked.name, offer.asked, offer.needed, unit, offer.end, offer.camera, offer.lens)


def _best_offer(problem: Problem, asked: Demand | Gate) -> _Offer | None:
    """The least change that lets a rig fit but for one demand or gate, among pairs with nothing unknown if there are.

    The classes' stand-ins tell how little each class could do with; their cameras are then tried in that order.
    """
    drop = frozenset({asked.name, "yield"} | ({"contrast"} if isinstance(asked, Demand) else set()))
    items = Items.of(problem, drop)
    classes = classes_of(problem, np.flatnonzero(items.camera < MISSED), apart=items.camera_unknown)
    standing = Judge(classes.stand_ins(problem), drop)
    hopes = [_hopes(items, rigs, asked) for rigs in screen.fitting(standing, classes.first, items.lens)]
    if not hopes:
        return None
    camera, lens, change, unknown = (np.concatenate(column) for column in zip(*hopes))
    judge = Judge(problem, drop)
    for vague in (False, True):
        best: _Offer | None = None
        rows = np.flatnonzero((unknown == vague) & np.isfinite(change))
        rows = rows[np.argsort(change[rows], kind="stable")]
        for begin in range(0, len(rows), _BATCH):
            some = rows[begin : begin + _BATCH]
            if best and change[some[0]] > best.change * (1 + span.TIE):
                break
            position, cameras = classes.spread(classes.number[camera[some]])
            for offer in _offers(judge, asked, cameras, lens[some][position]):
                best = offer if offer.beats(best) else best
        if best:
            return best
    return None


def _hopes(items: Items, rigs: Rigs, asked: Demand | Gate) -> tuple[np.ndarray, ...]:
    """Camera, lens, least change and whether anything is unknown, of each rig of a block.

    A stand-in that needs no change at all leaves all hope for its class: no camera of it may be so good.
    """
    changes = [np.where(rigs.fits & ~looser, 0.0, change) for _, looser, change in _changes(rigs, asked)]
    unknown = rigs.unknown | items.lens_unknown[rigs.lenses] | items.camera_unknown[rigs.cameras]
    return rigs.cameras, rigs.lenses, np.minimum.reduce(changes).min(axis=1), unknown


def _offers(judge: Judge, asked: Demand | Gate, cameras: np.ndarray, lenses: np.ndarray) -> Iterator[_Offer]:
    """The least offers of each arrangement of some pairs."""
    problem = judge.problem
    for arrangement in problem.ask.arrangements:
        here = problem.camera["line"][cameras] == arrangement.line
        rigs = judge.rigs(arrangement, cameras[here], lenses[here])
        for give, _, change in _changes(rigs, asked):
            least = change.min(initial=np.inf)
            for row, stop in np.argwhere((change <= least * (1 + span.TIE)) & np.isfinite(change)):
                yield _Offer(
                    float(change[row, stop]),
                    problem.catalogue.cameras["id"][rigs.cameras[row]],
                    problem.catalogue.lenses["id"][rigs.lenses[row]],
                    float(give.asked[row, stop]),
                    float(give.needed[row, stop]),
                    give.end,
                )


def _changes(rigs: Rigs, asked: Demand | Gate) -> Iterator[tuple[Give, np.ndarray, np.ndarray]]:
    """What must give way, whether it asks for less then, and by how much, of each rig and stop that fits but for that;
    infinite for the others."""
    for give in _gives(rigs, asked):
        with np.errstate(invalid="ignore", divide="ignore"):
            looser = give.loosens * (give.needed - give.asked) > 0
            change = np.where(
                rigs.fits & looser & _sharp(rigs, give.at), np.abs(np.log(give.needed / give.asked)), np.inf
            )
        yield give, looser, np.where(np.isfinite(change), change, np.inf)


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


def _sharp(rigs: Rigs, at) -> np.ndarray | bool:
    """Whether the contrast asked for is there where a demand that gave way just holds."""
    least = rigs.case.brief.min_contrast
    if at is None or least is None:
        return True
    return np.minimum.reduce(contrasts(rigs.case, at)) >= least * (1 - span.EDGE)
