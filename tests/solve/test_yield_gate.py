"""A wanted yield as a demand of the brief: held against the yield that tolerance.py tells of the same rig."""

from dataclasses import replace

import pytest

from tests.solve.works import catalogue
from visionplan.brief.model import Brief
from visionplan.solve import rank
from visionplan.solve.tolerance import yield_of

BRIEF = Brief(field=(100.0, 75.0), feature=0.22, working_distance=(200.0, 300.0), working_distance_tolerance=4.0)
LENS = {"focal tolerance": 0.05, "nearest object": 80.0, "stops": (8.0,)}


@pytest.fixture(scope="module")
def share():
    rig = rank(BRIEF, catalogue([LENS])).rigs[0]
    found = yield_of(rig).share
    assert rig.fits
    assert 0.1 < found < 0.9
    return found


def test_a_yield_within_reach_is_met_and_one_beyond_is_missed(share):
    within = rank(replace(BRIEF, min_yield=share - 0.01), catalogue([LENS])).rigs[0]
    beyond = rank(replace(BRIEF, min_yield=share + 0.01), catalogue([LENS]), concessions=False).rigs[0]
    assert (within.fits, within.missed_gates) == (True, ())
    assert (beyond.fits, beyond.missed_gates) == (False, ("yield",))
    told = next(verdict for verdict in beyond.demands if verdict.name == "yield")
    assert (told.asked, told.got) == (pytest.approx(share + 0.01), pytest.approx(share))


def test_a_stop_with_a_better_yield_is_taken_where_the_first_choice_has_too_little(share):
    deeper = LENS | {"stops": (8.0, 16.0)}
    deep = replace(BRIEF, above=4.0, feature=0.24)
    freely = rank(deep, catalogue([deeper])).rigs[0]
    each = {stop: yield_of(rank(deep, catalogue([LENS | {"stops": (stop,)}])).rigs[0]) for stop in (8.0, 16.0)}
    shares = {stop: one.share if one else 0.0 for stop, one in each.items()}
    better = max(shares, key=shares.get)
    picky = rank(replace(deep, min_yield=shares[better] - 0.005), catalogue([deeper])).rigs[0]
    assert shares[8.0] != shares[16.0]
    assert picky.stop == better
    assert freely.fits


def test_a_lens_that_states_no_tolerance_has_an_unknown_yield():
    vague = catalogue([LENS | {"focal tolerance": float("nan"), "front principal": 10.0}])
    easy = replace(BRIEF, min_yield=0.3)
    rig = rank(easy, vague).rigs[0]
    assert rig.fits
    assert "yield" in rig.unknown
    assert not rank(replace(easy, strict=True), vague, concessions=False).fitting


def test_concessions_leave_the_yield_aside_and_say_so():
    tight = replace(BRIEF, field=(120.0, 90.0), min_yield=0.9)
    ranking = rank(tight, catalogue([LENS]))
    assert ranking.concessions
    assert any("yield" in note for note in ranking.notes)
