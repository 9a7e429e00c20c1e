"""The check by ruler, against chief rays traced through the rig it is for."""

import math
from dataclasses import replace

import pytest

from tests.solve.traced import BRIEF, CAMERA, Bench, catalogue
from visionplan.solve import judge_one
from visionplan.solve.acceptance import acceptance
from visionplan.solve.demands import BY_NAME

BRIEFS = {
    "middle": BRIEF,
    "reference": replace(BRIEF, focus_plane=0.0),
    "top": replace(BRIEF, focus_plane=4.0, comfort=0.1),
    "tight": replace(BRIEF, comfort=3.0),
}


def rig(brief, at=None):
    return judge_one(brief, catalogue(), CAMERA["id"], "sixteen", at, 8.0)


def bench(built, distance=None):
    return Bench(distance=distance or built.working_distance, focus=built.case.z)


@pytest.mark.parametrize("brief", BRIEFS.values(), ids=BRIEFS)
def test_a_ruler_spans_what_the_check_says(brief):
    built = rig(brief)
    for check in acceptance(built):
        assert bench(built).span(check.length, check.along) == pytest.approx(check.pixels, abs=1)


@pytest.mark.parametrize("brief", BRIEFS.values(), ids=BRIEFS)
def test_within_its_room_the_grade_stays_and_beyond_its_ends_a_demand_breaks(brief):
    built = rig(brief)
    assert built.fits
    (wide, _) = acceptance(built)
    assert wide.room >= 1
    seen = set()
    for distance in range(150, 600, 9):
        count = bench(built, distance).span(wide.length)
        stands = rig(brief, float(distance))
        picture = [v.name for v in stands.demands if v.verdict == "missed" and not BY_NAME[v.name].place]
        if abs(count - wide.pixels) <= wide.room:
            seen.add("room")
            assert not picture
            # A taped or counted rig may stand outside the allowed distances; its grade counts where it may stand.
            assert stands.grade in (None, built.grade) if not stands.fits else stands.grade == built.grade
        if count > wide.most + 1 or count < wide.least - 1:
            seen.add("beyond")
            assert picture
    assert seen == {"room", "beyond"}


def test_a_degree_out_of_square_shows_at_the_edges():
    built = rig(BRIEF)
    wide, high = acceptance(built)
    half = {"width": built.field[0] / 2, "height": built.field[1] / 2}
    for own, other in ((wide, high), (high, wide)):
        tilt = (math.radians(1), 0) if own.along == "width" else (0, math.radians(1))
        ends = []
        for sign in (1, -1):
            middle = (sign * half["width"], 0) if own.along == "width" else (0, sign * half["height"])
            ends.append(bench(built).span(other.length, other.along, middle, tilt))
        assert ends[0] - ends[1] == pytest.approx(own.degree * other.pixels / own.pixels, abs=2)


def test_lengths_are_round():
    for unit in (1.0, 25.4):
        for check in acceptance(rig(BRIEF), unit):
            digits = f"{check.length / unit:.6g}".replace(".", "").strip("0")
            assert digits in ("1", "2", "5")
            assert check.length <= {"width": 120, "height": 90}[check.along]
