"""The search against judging every pair in full: the same rigs, in the same order, and the same count."""

from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest

from tests.reference.random_works import works
from visionplan.brief.read import read_brief
from visionplan.catalogue.folder import read_catalogue
from visionplan.solve import concede, judge_one, rank
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
    """The demo works, every third camera and every second lens."""
    whole = read_catalogue(WORKS)
    return replace(whole, cameras=thinned(whole.cameras, 3), lenses=thinned(whole.lenses, 2))


def thinned(table, step):
    values = {column: cells[::step] for column, cells in table.values.items()}
    return replace(table, values=values, lines=table.lines[::step], index={id: i for i, id in enumerate(values["id"])})


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


def judged_every_pair(problem):
    cameras, lenses = len(problem.catalogue.cameras), len(problem.catalogue.lenses)
    judge = Judge(problem)
    every = np.repeat(np.arange(cameras), lenses), np.tile(np.arange(lenses), cameras)
    return rigs_of(judge, choose(judge, Items.of(problem), *every))


def assert_agrees(problem, rigs, order, top):
    expected = [(rig.camera, rig.lens, rig.stop, rig.spacers) for rig in sorted(rigs, key=lambda r: _key(r, order))]
    found = rank(problem.brief, problem.catalogue, order=order, top=top, concessions=False)
    assert found.fitting == sum(rig.fits for rig in rigs)
    assert [(rig.camera, rig.lens, rig.stop, rig.spacers) for rig in found.rigs] == expected[:top]


@pytest.mark.parametrize("path", BRIEFS, ids=lambda path: path.stem)
def test_search_agrees_with_judging_every_pair(path, catalogue):
    problem = Problem(read_brief(path), catalogue)
    rigs = judged_every_pair(problem)
    for order in ORDERS:
        assert_agrees(problem, rigs, order, 300)


def test_search_agrees_on_works_with_gaps():
    for seed in range(60):
        problem = Problem(*works(seed))
        rigs = judged_every_pair(problem)
        for order in ("value", "price", "sampling"):
            assert_agrees(problem, rigs, order, 7)


def crowded(seed):
    """Random works with two more cameras for each, alike but for length, mass, price and frame rate."""
    brief, catalogue = works(seed)
    draw = np.random.default_rng(seed)
    cameras = catalogue.cameras
    three = np.tile(np.arange(len(cameras)), 3)
    values = {
        column: cells[three] if isinstance(cells, np.ndarray) else [cells[row] for row in three]
        for column, cells in cameras.values.items()
    }
    values["id"] = [f"{id}-{number // len(cameras)}" for number, id in enumerate(values["id"])]
    for column in ("length", "mass", "price", "frame rate"):
        values[column] = np.round(values[column] * draw.uniform(0.4, 2.0, len(three)), 1)
    index = {id: row for row, id in enumerate(values["id"])}
    return brief, replace(
        catalogue, cameras=replace(cameras, values=values, lines=range(2, 2 + len(three)), index=index)
    )


def test_search_agrees_where_cameras_share_their_optics():
    for seed in range(40):
        problem = Problem(*crowded(seed))
        rigs = judged_every_pair(problem)
        for order in ("value", "price", "sampling", "length"):
            assert_agrees(problem, rigs, order, 9)


def test_concessions_are_the_least_of_those_of_each_camera_alone():
    compared = 0
    for seed in range(60):
        brief, catalogue = crowded(seed)
        given = concede(brief, catalogue)
        if not given:
            continue
        alone = [
            concede(brief, replace(catalogue, cameras=only(catalogue.cameras, row)))
            for row in range(len(catalogue.cameras))
        ]
        for one in given:
            others = [other for each in alone for other in each if other.demand == one.demand]
            sure = [other for other in others if not unknown_but(brief, catalogue, other)] or others
            least = min(abs(np.log(other.needed / other.asked)) for other in sure)
            assert abs(np.log(one.needed / one.asked)) == pytest.approx(least, rel=1e-9), (seed, one)
            compared += 1
    assert compared > 20


def only(table, row):
    values = {column: cells[row : row + 1] for column, cells in table.values.items()}
    return replace(table, values=values, lines=table.lines[row : row + 1], index={values["id"][0]: 0})


def unknown_but(brief, catalogue, given):
    """Whether the pair of a concession has something unknown beside what it concedes."""
    rig = judge_one(brief, catalogue, given.camera, given.lens)
    return bool(set(rig.unknown) - {given.demand})


def test_a_search_tells_its_share_and_ends_when_whoever_watches_says_so(catalogue):
    brief, shares = read_brief(WORKS / "briefs" / "jar-lids.toml"), []
    rank(brief, catalogue, watch=shares.append)
    assert len(shares) > 1
    assert all(0 < share <= 1 for share in shares)

    def enough(share):
        raise KeyboardInterrupt

    for work in (rank, concede):
        with pytest.raises(KeyboardInterrupt):
            work(brief, catalogue, watch=enough)
