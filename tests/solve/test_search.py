"""The search against judging every pair in full: the same rigs, in the same order, and the same count."""

from pathlib import Path

import numpy as np
import pytest

from visionplan.brief.read import read_brief
from visionplan.catalogue.folder import read_catalogue
from visionplan.solve import rank
from visionplan.solve.choose import Items, choose
from visionplan.solve.judge import Judge
from visionplan.solve.orders import ORDERS
from visionplan.solve.problem import Problem
from visionplan.solve.tolerance import yield_of
from visionplan.solve.writeup import rigs_of

WORKS = Path(__file__).parents[2] / "catalogs_demo"
BRIEFS = sorted(WORKS.glob("briefs/*.toml"))


@pytest.fixture(scope="module")
def catalogue():
    return read_catalogue(WORKS)


def _yield(rig):
    borne = yield_of(rig)
    return float("inf") if borne is None else -borne.share


def _key(rig, order):
    """The order of a ranking, from the rigs' own figures."""
    grades = {"comfortable": 0, "fair": 1, "tight": 2}
    last = float("inf")
    price = last if rig.price is None else rig.price
    if not rig.fits:
        return (True, bool(rig.missed_gates), round(rig.shortfall, 9), bool(rig.unknown), price, rig.camera, rig.lens)
    figures = {
        "value": lambda: (grades[rig.grade], bool(rig.unknown), price, -rig.latitude),
        "price": lambda: (price, bool(rig.unknown)),
        "latitude": lambda: (-rig.latitude, bool(rig.unknown)),
        "depth": lambda: (-sum(rig.depth), bool(rig.unknown)),
        "snr": lambda: (last if rig.snr is None else -rig.snr, bool(rig.unknown)),
        "sampling": lambda: (rig.sampling, bool(rig.unknown)),
        "yield": lambda: (_yield(rig), bool(rig.unknown)),
        "length": lambda: (last if rig.length is None else rig.length, bool(rig.unknown)),
    }
    return (False, *(round(float(figure), 7) for figure in figures[order]()), rig.camera, rig.lens)


@pytest.mark.parametrize("path", BRIEFS, ids=lambda path: path.stem)
def test_search_agrees_with_judging_every_pair(path, catalogue):
    problem = Problem(read_brief(path), catalogue)
    cameras, lenses = len(catalogue.cameras), len(catalogue.lenses)
    every = np.repeat(np.arange(cameras), lenses), np.tile(np.arange(lenses), cameras)
    judge = Judge(problem)
    rigs = rigs_of(judge, choose(judge, Items.of(problem), *every))
    for order in ORDERS:
        expected = [(rig.camera, rig.lens, rig.stop, rig.spacers) for rig in sorted(rigs, key=lambda r: _key(r, order))]
        found = rank(problem.brief, catalogue, order=order, top=300, concessions=False)
        assert found.fitting == sum(rig.fits for rig in rigs)
        assert [(rig.camera, rig.lens, rig.stop, rig.spacers) for rig in found.rigs] == expected[:300]
