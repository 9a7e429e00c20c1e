"""Advice, held against judging every setting that it chose from."""

from dataclasses import replace

import numpy as np
import pytest

from tests.solve.traced import BRIEF, CAMERA, LENS, RINGS, catalogue
from visionplan.solve import advice, judge_one

LIT = replace(BRIEF, illuminance=6800.0, reflectance=0.5, snr=40.0, max_exposure=0.005)
SENSITIVE = {**CAMERA, "quantum efficiency": 0.6, "dark noise": 5.0, "saturation capacity": 10000.0, "bit depth": 12}


def rig(brief=BRIEF, works=None, **options):
    return judge_one(brief, works or catalogue(rings=RINGS), CAMERA["id"], "sixteen", **options)


@pytest.mark.parametrize(
    "brief",
    [
        BRIEF,
        replace(BRIEF, working_distance=(361.2, 373.9)),
        replace(BRIEF, working_distance=(361.2, 364.9)),
        replace(BRIEF, working_distance=(361.2, 361.9)),
        replace(BRIEF, comfort=0.5),
        replace(BRIEF, focus_plane=0.0, min_contrast=0.3),
    ],
)
def test_the_distance_is_the_roundest_that_keeps_the_grade(brief):
    built = rig(brief)
    assert built.fits
    expected = None
    for step in (10, 5, 1):
        kept = []
        for distance in range(step, 600, step):
            if abs(distance - built.working_distance) < 40:
                stands = rig(brief, at=float(distance), stop=built.stop, rings=built.spacers)
                kept += [distance] if stands.fits and stands.grade == built.grade else []
        if kept:
            expected = min(kept, key=lambda distance: abs(distance - built.working_distance))
            break
    found = advice.distance(built)
    assert (found and found.value) == expected
    if found:
        assert found.rig.working_distance == pytest.approx(expected)


def test_no_height_of_focus_leaves_more_than_the_one_advised():
    brief = replace(BRIEF, above=10.0, below=20.0, focus_plane=0.0)
    built = rig(brief, stop=8.0)
    found = advice.focus_plane(built)
    assert -20 <= found.value <= 10
    assert found.gain == pytest.approx(found.rig.latitude - built.latitude)
    tried = [
        rig(replace(brief, focus_plane=z), stop=8.0, rings=built.spacers).latitude for z in np.linspace(-20, 10, 41)
    ]
    assert found.rig.latitude >= max(tried) * 0.999
    assert found.gain > 0.05


def test_the_stop_advised_has_most_room_of_those_that_fit():
    built = rig()
    rooms = {stop: rig(stop=stop, rings=built.spacers).latitude for stop in built.stops}
    found = advice.best_stop(built)
    assert found.value != built.stop
    assert rooms[found.value] == pytest.approx(max(room for stop, room in rooms.items() if stop != built.stop))


def test_a_ring_more_and_a_ring_less():
    close = replace(BRIEF, field=(20.0, 15.0), feature=0.06, working_distance=(20.0, 200.0), above=0.5, below=0.5)
    built = rig(close)
    assert built.spacers
    less = advice.ring_less(built)
    assert less.value in built.spacers
    assert len(less.rig.spacers) == len(built.spacers) - 1
    more = advice.ring_more(built)
    one = rig(close, rings=(*built.spacers, more.value), stop=built.stop)
    assert (more.rig.fits, more.rig.latitude) == (one.fits, one.latitude)
    others = [rig(close, rings=(*built.spacers, ring["id"]), stop=built.stop) for ring in RINGS]
    assert one.latitude == max(other.latitude for other in others)


def test_turning_a_camera_swaps_the_sides_of_its_picture():
    built = rig(replace(BRIEF, field=(100.0, 100.0)))
    found = advice.turned(built)
    assert found.value == "portrait"
    assert found.rig.field[0] / found.rig.field[1] == pytest.approx(built.field[1] / built.field[0])
    assert found.gain == pytest.approx(0, abs=1e-9)


def test_with_the_light_advised_light_bounds_nothing_and_with_less_it_does():
    works = catalogue(cameras=[SENSITIVE])
    built = rig(LIT, works, stop=8.0)
    assert built.fits
    assert built.pinch[1] == "light"
    found = advice.light(built)
    assert found.value > 6800
    assert found.gain > 0.01
    assert found.rig.pinch[1] != "light"
    dimmer = judge_one(replace(LIT, illuminance=found.value * 0.999), works, CAMERA["id"], "sixteen", stop=8.0)
    assert dimmer.pinch[1] == "light"
    assert advice.light(found.rig) is None


def test_a_rig_that_does_not_fit_gets_no_advice():
    assert advice.advice(rig(replace(BRIEF, field=(900.0, 900.0)))) == ()


def test_a_telecentric_lens_is_set_to_a_round_distance_within_its_tolerance():
    tele = {"mount": "C", "kind": "telecentric", "f-number min": 8.0, "working distance": 112.4, "image circle": 20.0}
    tele |= {
        "id": "tele",
        "magnification": 0.25,
        "detail limit": 200.0,
        "length": 90.0,
        "working distance tolerance": 3.0,
    }
    brief = replace(BRIEF, field=(20.0, 15.0), feature=0.1, above=0.2, below=0.2, working_distance=(90.0, 130.0))
    built = judge_one(brief, catalogue([tele, LENS]), CAMERA["id"], "tele")
    assert built.fits
    assert advice.distance(built).value == 110.0
