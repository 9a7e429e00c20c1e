"""The conjugates against each other: each identity ties two functions that were written apart."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from visionplan.optics import conjugates

FOCAL_LENGTHS = st.floats(1.0, 500.0)
MAGNIFICATIONS = st.floats(1e-3, 10.0)


@given(FOCAL_LENGTHS, MAGNIFICATIONS)
def test_magnification_is_image_over_object_distance(f, m):
    assert conjugates.image_distance(f, m) / conjugates.object_distance(f, m) == pytest.approx(m, rel=1e-12)


@given(FOCAL_LENGTHS, MAGNIFICATIONS)
def test_lens_equation(f, m):
    s = conjugates.object_distance(f, m)
    assert conjugates.image_distance_of(f, s) == pytest.approx(conjugates.image_distance(f, m), rel=1e-9)


@given(FOCAL_LENGTHS, MAGNIFICATIONS)
def test_newtons_equation(f, m):
    beyond_focus = conjugates.object_distance(f, m) - f
    assert beyond_focus * conjugates.extension(f, m) == pytest.approx(f * f, rel=1e-9)


@given(FOCAL_LENGTHS, MAGNIFICATIONS)
def test_distance_and_magnification_are_inverse(f, m):
    assert conjugates.magnification_at(f, conjugates.object_distance(f, m)) == pytest.approx(m, rel=1e-9)


@given(FOCAL_LENGTHS, MAGNIFICATIONS)
def test_extension_is_what_the_image_moves_back_from_infinity_focus(f, m):
    assert conjugates.image_distance(f, m) - f == pytest.approx(conjugates.extension(f, m), rel=1e-9, abs=1e-12 * f)


@given(FOCAL_LENGTHS, MAGNIFICATIONS)
def test_a_lens_of_pupil_ratio_one_has_its_pupils_in_its_principal_planes(f, m):
    assert conjugates.entrance_pupil_distance(f, m, 1.0) == pytest.approx(conjugates.object_distance(f, m), rel=1e-12)


@given(FOCAL_LENGTHS, MAGNIFICATIONS, st.floats(0.2, 0.95) | st.floats(1.05, 5.0), st.floats(1.0, 32.0))
def test_working_f_number_is_the_cone_from_the_exit_pupil(f, m, p, f_number):
    """Image the entrance pupil through the lens: its image is the exit pupil, and the sensor sees that."""
    pupil_before_lens = conjugates.object_distance(f, m) - conjugates.entrance_pupil_distance(f, m, p)
    exit_pupil = conjugates.image_distance_of(f, pupil_before_lens)
    assert -exit_pupil / pupil_before_lens == pytest.approx(p, rel=1e-6)
    diameter = p * f / f_number
    to_sensor = conjugates.image_distance(f, m) - exit_pupil
    assert conjugates.working_f_number(f_number, m, p) == pytest.approx(to_sensor / diameter, rel=1e-6)


def test_at_the_front_focus_the_image_is_infinitely_far():
    assert conjugates.image_distance_of(50.0, 50.0) == math.inf
    assert conjugates.magnification_at(50.0, 50.0) == math.inf


def test_nearer_than_the_focus_the_image_is_virtual():
    assert conjugates.image_distance_of(50.0, 25.0) == -50.0
    assert conjugates.magnification_at(50.0, 25.0) < 0


def test_an_infinitely_far_object_is_imaged_at_the_focus():
    assert conjugates.image_distance_of(50.0, math.inf) == 50.0
    assert conjugates.magnification_at(50.0, math.inf) == 0
    assert conjugates.object_distance(50.0, 0.0) == math.inf
    assert conjugates.entrance_pupil_distance(50.0, 0.0, 1.0) == math.inf


def test_a_telecentric_lens_has_no_distances_and_a_constant_cone():
    assert conjugates.object_distance(math.inf, 0.5) == math.inf
    assert conjugates.entrance_pupil_distance(math.inf, 0.5, math.inf) == math.inf
    assert conjugates.working_f_number(8.0, 0.5, math.inf) == 8.0
    assert math.isnan(conjugates.magnification_at(math.inf, 100.0))
