"""The yield against the area of the draws that hold, cut out of the rectangle of tolerances with straight edges."""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from tests.solve.traced import BRIEF, CAMERA, LENS, Bench, catalogue
from visionplan.solve import judge_one
from visionplan.solve.tolerance import DRAWS, interval, yields

FLAT = replace(BRIEF, above=0.0, below=0.0, feature=0.4)


def rig(brief=FLAT, at=None, **lens):
    return judge_one(brief, catalogue([{**LENS, **lens}]), CAMERA["id"], LENS["id"], at, 4.0)


def area_below(corners, a, b, c):
    """Share of a convex polygon where a x + b y ≤ c: its corners clipped at the line, its area by the shoelace."""

    def area(points):
        x, y = np.array(points).T
        return abs(x @ np.roll(y, 1) - y @ np.roll(x, 1)) / 2

    kept = []
    for p, q in zip(corners, corners[1:] + corners[:1]):
        at_p, at_q = (a * x + b * y - c for x, y in (p, q))
        if at_p <= 0:
            kept.append(p)
        if at_p * at_q < 0:
            kept.append(tuple(np.array(p) + (np.array(q) - np.array(p)) * at_p / (at_p - at_q)))
    return area(kept) / area(corners) if len(kept) > 2 else 0.0


@settings(max_examples=25, deadline=None)
@given(
    off=st.floats(-8, 8),
    tolerance=st.floats(0.001, 0.03),
    distance=st.floats(0.1, 10),
    side=st.sampled_from(["cover", "sampling"]),
)
def test_the_yield_is_the_area_that_holds(off, tolerance, distance, side):
    # A flat part: the field is (s/f − 1) w wide and the sampling (s/f − 1) P, so what holds is a half plane in (f, s).
    brief = replace(FLAT, working_distance_tolerance=distance, focus_blur=3.0, working_distance=(50.0, 900.0))
    needed = 1 + 120 / (2048 * 0.00345) if side == "cover" else 1 + 0.1 / 0.00345
    built = rig(
        brief, at=16 * needed - 12 + (abs(off) if side == "cover" else -abs(off)), **{"focal tolerance": tolerance}
    )
    assert built.fits
    s = built.working_distance + 12
    corners = [(16 * (1 + i * tolerance), s + j * distance) for i, j in ((-1, -1), (1, -1), (1, 1), (-1, 1))]
    sign = 1 if side == "cover" else -1
    expected = area_below(corners, sign * needed, -sign, 0.0)
    (found,) = yields([built])
    assert found.share == pytest.approx(expected, abs=4 * np.sqrt(0.25 / DRAWS))
    assert found.low <= found.share <= found.high
    assert found.weakest == (None if found.share == 1 else side)


def test_a_height_is_drawn_like_rigs_traced_one_by_one():
    brief = replace(BRIEF, working_distance_tolerance=6.0, working_distance=(50.0, 900.0), focus_blur=3.0)
    nearest = judge_one(brief, catalogue(), CAMERA["id"], "sixteen", stop=4.0)
    hi = next(verdict.hi for verdict in nearest.demands if verdict.name == "cover")
    built = rig(brief, at=16 * (1 + 1 / hi) - 12 + 1.5 + 2, **{"focal tolerance": 0.01})
    rng, holds = np.random.default_rng(7), 0
    for focal, off in rng.uniform(-1, 1, (3000, 2)):
        bench = Bench(16 * (1 + 0.01 * focal), distance=built.working_distance + 6 * off, focus=1.5, pitch=1e-9)
        right, left = bench.pixel(60, 0, height=4), bench.pixel(-60, 0, height=4)
        top, bottom = bench.pixel(0, 45, height=4), bench.pixel(0, -45, height=4)
        holds += (right[0] - left[0]) * 1e-9 <= 2048 * 0.00345 and (top[1] - bottom[1]) * 1e-9 <= 1536 * 0.00345
    (found,) = yields([built])
    assert 0.3 < found.share < 0.95
    assert found.share == pytest.approx(holds / 3000, abs=0.04)
    assert found.weakest == "cover"


def test_the_interval_is_wilsons():
    # Newcombe 1998, Statistics in Medicine 17, 857–872, table I (from memory): 81 of 263, 15 of 148, 0 of 20, 1 of 29.
    for hits, draws, low, high in (
        (81, 263, 0.2553, 0.3662),
        (15, 148, 0.0624, 0.1605),
        (0, 20, 0.0, 0.1611),
        (1, 29, 0.0061, 0.1718),
    ):
        assert interval(hits, draws) == pytest.approx((low, high), abs=6e-5)


def test_many_rigs_at_once_are_each_as_alone():
    brief = replace(FLAT, working_distance_tolerance=9.0, focus_blur=3.0)
    rigs = [rig(brief, at=at, **{"focal tolerance": 0.02}) for at in (278.0, 290.0, 300.0, 440.0, 446.0) * 4]
    together = yields(rigs)
    assert together == [yields([one])[0] for one in rigs]
    assert len({one.share for one in together if one}) > 2


def test_standing_at_the_end_of_the_allowed_distances_is_no_risk():
    brief = replace(FLAT, working_distance_tolerance=2.0, working_distance=(350.0, 350.0), focus_blur=3.0)
    (found,) = yields([rig(brief)])
    assert found.share == 1


def test_what_is_not_stated_is_said():
    (only_distance,) = yields([rig(replace(FLAT, working_distance_tolerance=2.0), **{"focal tolerance": None})])
    assert only_distance.focal_tolerance is None
    assert yields([rig(FLAT, **{"focal tolerance": None})]) == [None]
    (certain,) = yields([rig(FLAT, **{"focal tolerance": 0.0})])
    assert (certain.share, certain.weakest) == (1, None)


def test_a_rig_that_does_not_fit_has_no_yield():
    assert yields([rig(replace(FLAT, field=(500.0, 400.0), working_distance_tolerance=2.0))]) == [None]
