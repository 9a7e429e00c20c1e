"""Rigs built wrong on purpose, looked at through traced rays, and what the diagnosis makes of the whole pixels."""

import math
from dataclasses import replace

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from tests.solve.traced import BRIEF, CAMERA, LENS, RINGS, Bench, catalogue
from visionplan.brief.model import Layer
from visionplan.faults import InputError
from visionplan.solve import judge_one
from visionplan.solve.asbuilt import as_built
from visionplan.solve.target import Target


def plan(brief=BRIEF, lens="sixteen", works=None, **options):
    return judge_one(brief, works or catalogue(), CAMERA["id"], lens, **options)


def kinds(built):
    return [cause.kind for cause in built.causes]


def cause(built, kind):
    return next(cause for cause in built.causes if cause.kind == kind)


@pytest.mark.parametrize("taped", [False, True])
def test_eight_millimetres_too_far_are_found_and_taken_back(taped):
    rig = plan()
    assert rig.fits
    bench = Bench(distance=rig.working_distance + 8, focus=1.5)
    tape = round(rig.working_distance + 8) if taped else None
    built = as_built(rig, [Target(100, bench.span(100))], tape)
    assert cause(built, "distance").off.holds(8)
    assert built.move.holds(-8)
    assert built.move.high - built.move.low < 1
    assert built.corrected.fits
    assert built.corrected.working_distance == pytest.approx(rig.working_distance)
    assert built.certain == taped
    if taped:
        assert kinds(built) == ["distance"]


def test_a_rig_as_planned_has_nothing_wrong():
    rig = plan()
    bench = Bench(distance=rig.working_distance, focus=1.5)
    for tape in (None, rig.working_distance + 0.4):
        built = as_built(rig, [Target(100, bench.span(100)), Target(80, bench.span(80, "height"), "height")], tape)
        assert built.causes == ()
        assert built.found.fits
        assert built.move.holds(0)
        assert all(tilt.angle.low == 0 for tilt in built.tilts)


@settings(max_examples=40, deadline=None)
@given(
    off=st.floats(-40, 60),
    error=st.floats(-0.06, 0.06),
    height=st.sampled_from([0.0, 4.0, -1.0]),
    length=st.floats(40, 110),
    along=st.sampled_from(["width", "height"]),
    glass=st.booleans(),
)
def test_errors_come_back_within_what_pixels_and_tape_allow(off, error, height, length, along, glass):
    layers = (Layer(10.0, 1.5),) if glass else ()
    rig = plan(replace(BRIEF, layers=layers, working_distance=(150.0, 600.0)))
    length = min(length, 75.0) if along == "height" else length
    f, distance = 16 * (1 + error), rig.working_distance + off
    bench = Bench(f, 1.25, distance=distance, focus=1.5, sunk=10 / 3 if glass else 0.0)
    target = Target(length, bench.span(length, along, height=height), along)
    taped = as_built(rig, [target], round(distance), height)
    assert taped.focal_length.low <= f <= taped.focal_length.high
    assert taped.distance.holds(distance)
    if abs(error) < 1e-12:
        built = as_built(rig, [target], None, height)
        assert built.distance.holds(distance)
        assert built.move.holds(-off)


@settings(max_examples=40, deadline=None)
@given(off=st.floats(-60, 90), height=st.sampled_from([0.0, 4.0, -1.0]), focus=st.sampled_from([None, 0.0, 4.0]))
def test_distance_comes_back_without_a_tape(off, height, focus):
    rig = plan(replace(BRIEF, focus_plane=focus, working_distance=(100.0, 600.0)))
    distance = rig.working_distance + off
    bench = Bench(distance=distance, focus=1.5 if focus is None else focus)
    built = as_built(rig, [Target(70, bench.span(70, height=height))], None, height)
    assert built.distance.holds(distance)
    assert built.move.holds(-off)


def test_a_wrong_focal_length_needs_the_tape_to_be_told_from_distance():
    rig = plan()
    bench = Bench(f=16.5, distance=rig.working_distance, focus=1.5)
    target = Target(100, bench.span(100))
    untaped = as_built(rig, [target])
    assert not untaped.certain
    assert kinds(untaped)[:2] == ["distance", "focal length"]
    assert cause(untaped, "focal length").off.holds(16.5 / 16 - 1)
    taped = as_built(rig, [target], rig.working_distance)
    assert kinds(taped) == ["focal length"]
    assert taped.certain
    moved = Bench(f=16.5, distance=rig.working_distance + taped.move.value, focus=1.5)
    wanted = Bench(f=16.5, distance=taped.corrected.working_distance, focus=1.5)
    assert moved.span(100) == pytest.approx(wanted.span(100), abs=1)
    assert taped.corrected.fits
    field = [moved.pixel(60, 45, height=4), moved.pixel(-60, -45, height=4)]
    assert field[0][0] - field[1][0] <= 2048
    assert field[0][1] - field[1][1] <= 1536


def test_a_focal_length_within_its_tolerance_is_called_so():
    works = catalogue([{**LENS, "focal tolerance": 0.03}])
    rig = plan(works=works)
    bench = Bench(f=16.4, distance=rig.working_distance, focus=1.5)
    built = as_built(rig, [Target(100, bench.span(100))])
    assert cause(built, "focal length").allowed
    assert as_built(rig, [Target(100, bench.span(100))], rig.working_distance).causes == ()


def test_a_wrong_lens_is_named():
    rig = plan()
    bench = Bench(f=25, distance=rig.working_distance, focus=1.5)
    for tape in (None, rig.working_distance):
        built = as_built(rig, [Target(80, bench.span(80))], tape)
        assert cause(built, "lens").ids == ("longer",)
        assert built.broken == ("cover",)


def test_a_ring_too_many_shows_where_the_focus_ring_cannot_reach():
    # With 10 mm of rings instead of none the lens is sharp only from m = 10/16 on.
    rig = plan(works=catalogue(rings=RINGS), rings=[])
    bench = Bench(distance=16 * (1 + 16 / 11) - 12 + 1.5, focus=1.5)
    built = as_built(rig, [Target(8, bench.span(8))])
    assert cause(built, "rings").ids[0] == "R10"
    assert built.corrected.spacers == ()
    assert "cover" in built.broken


@settings(max_examples=30, deadline=None)
@given(
    lean=st.floats(-8, 8),
    side=st.sampled_from(["width", "height"]),
    along=st.sampled_from(["width", "height"]),
    off=st.floats(-15, 15),
)
def test_tilt_comes_back_from_a_target_at_each_end(lean, side, along, off):
    rig = plan()
    angle = math.radians(lean)
    bench = Bench(distance=rig.working_distance + off, focus=1.5)
    tilt = (angle, 0.0) if side == "width" else (0.0, angle)
    names = ("left", "right") if side == "width" else ("bottom", "top")
    targets = []
    for sign, name in zip((-1, 1), names):
        middle = (sign * 35.0, 0.0) if side == "width" else (0.0, sign * 28.0)
        targets.append(Target(30, bench.span(30, along, middle, tilt), along, name, max(map(abs, middle))))
    built = as_built(rig, targets)
    (found,) = built.tilts
    assert found.along == side
    assert found.angle.low <= angle <= found.angle.high
    if found.angle.low > 0 or found.angle.high < 0:
        assert found.nearer == names[angle > 0]
    assert built.move.holds(-off)


def test_targets_at_the_edges_of_the_picture_give_tilt_without_their_place():
    rig = plan()
    angle = math.radians(5)
    bench = Bench(distance=rig.working_distance, focus=1.5)
    # The edge is where the picture ends: walk out until half the sensor is reached.
    places = [next(x for x in range(1, 200) if abs(bench.pixel(sign * x, 0, (angle, 0))[0]) > 1024) for sign in (-1, 1)]
    targets = [
        Target(40, bench.span(40, "height", (sign * place, 0), (angle, 0)), "height", name)
        for sign, place, name in zip((-1, 1), places, ("left", "right"))
    ]
    (found,) = as_built(rig, targets).tilts
    assert found.angle.low / 1.01 <= angle <= found.angle.high * 1.01
    right, left = (bench.span(40, "height", (x, 0), (angle, 0)) for x in (places[1], -places[0]))
    assert found.keystone == pytest.approx(right / left - 1, abs=0.004)


def test_width_and_height_in_the_middle_give_the_tilt_but_not_its_side():
    rig = plan()
    for sign in (-1, 1):
        angle = math.radians(12)
        bench = Bench(distance=rig.working_distance, focus=1.5)
        tilt = (0.0, sign * angle)
        targets = [
            Target(80, bench.span(80, "width", tilt=tilt)),
            Target(70, bench.span(70, "height", tilt=tilt), "height"),
        ]
        (found,) = as_built(rig, targets).tilts
        assert (found.along, found.nearer) == ("height", None)
        assert found.angle.holds(angle)


def test_a_tilt_that_is_more_than_the_depth_bears_breaks_the_depth():
    rig = plan(replace(BRIEF, feature=0.3), stop=2.8)
    bench = Bench(distance=rig.working_distance, focus=1.5)
    angle = math.radians(20)
    spans = [bench.span(30, "height", (x, 0), (angle, 0)) for x in (-40, 40)]
    targets = [Target(30, span, "height", end, 40) for span, end in zip(spans, ("left", "right"))]
    built = as_built(rig, targets)
    assert "near depth" in built.broken or "far depth" in built.broken


def test_a_telecentric_lens_shows_another_lens_but_never_the_distance():
    tele = {"mount": "C", "kind": "telecentric", "f-number min": 8.0, "working distance": 110.0, "image circle": 20.0}
    tele |= {"detail limit": 200.0, "length": 100.0, "working distance tolerance": 3.0, "telecentricity": 0.001}
    works = catalogue([{**tele, "id": "half", "magnification": 0.5}, {**tele, "id": "fourth", "magnification": 0.25}])
    brief = replace(BRIEF, field=(12.0, 9.0), feature=0.05, working_distance=(90.0, 130.0), above=0.5, below=0.5)
    rig = plan(brief, "half", works)
    good, bad = round(10 * 0.5 / 0.00345), round(10 * 0.25 / 0.00345)
    assert as_built(rig, [Target(10, good)]).causes == ()
    far = as_built(rig, [Target(10, good)], 120.0)
    assert kinds(far) == ["distance"]
    assert far.move.value == pytest.approx(-10)
    wrong = as_built(rig, [Target(10, bad)])
    assert cause(wrong, "lens").ids == ("fourth",)
    assert "sampling" in wrong.broken


@pytest.mark.parametrize(
    ("target", "word"),
    [(Target(0, 500), "length"), (Target(50, 3), "pixels"), (Target(50, 1700, "height"), "1536")],
)
def test_what_can_be_no_target_is_refused(target, word):
    with pytest.raises(InputError, match=word):
        as_built(plan(), [target])


def test_no_target_is_refused():
    with pytest.raises(InputError, match="no target"):
        as_built(plan(), [])
