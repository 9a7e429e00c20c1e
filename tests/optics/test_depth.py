"""Blur and depth against rays: points off the focus plane imaged through the pupil onto the sensor."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from visionplan.optics import conjugates, depth

FOCAL_LENGTHS = st.floats(4.0, 200.0)
F_NUMBERS = st.floats(1.0, 32.0)
MAGNIFICATIONS = st.floats(5e-3, 4.0)
PUPIL_RATIOS = st.floats(0.3, 3.0)
BLURS = st.floats(1e-3, 0.05)


def blur_on_sensor(f, f_number, focus, distance):
    """Thin lens: where the cone that converges on a point's image cuts the sensor, focused at `focus`."""
    sensor = conjugates.image_distance_of(f, focus)
    image = conjugates.image_distance_of(f, distance)
    return f / f_number * abs(1 - sensor / image)


@given(FOCAL_LENGTHS, F_NUMBERS, MAGNIFICATIONS, st.floats(-0.4, 0.8))
def test_blur_of_a_thin_lens_divided_by_the_scale_there(f, f_number, m, part):
    """On both sides: the cone's width on the sensor over the scale along the chief rays."""
    focus = conjugates.object_distance(f, m)
    defocus = part * focus
    distance = focus + defocus
    if abs(distance - f) < 1e-3 * f:
        return
    scale = conjugates.image_distance(f, m) / distance
    expected = blur_on_sensor(f, f_number, focus, distance) / scale
    assert depth.blur_on_part(f_number, m, 1.0, abs(defocus)) == pytest.approx(expected, rel=1e-6, abs=1e-9)


@given(FOCAL_LENGTHS, F_NUMBERS, MAGNIFICATIONS, PUPIL_RATIOS, st.floats(0.01, 0.9))
def test_blur_is_the_cone_on_the_entrance_pupil(f, f_number, m, p, part):
    """Two rays from the edges of the entrance pupil to a point nearer than the focus, on to the focus plane."""
    pupil, u = f / f_number, conjugates.entrance_pupil_distance(f, m, p)
    near = (1 - part) * u
    edge = pupil / 2 * (1 - u / near)
    scale = m * u / near
    assert depth.blur_on_part(f_number, m, p, u - near) == pytest.approx(abs(2 * edge) * m / scale, rel=1e-9)


@given(F_NUMBERS, MAGNIFICATIONS, PUPIL_RATIOS, st.floats(1e-3, 1.0))
def test_depth_is_where_the_blur_is_reached(f_number, m, p, blur):
    reached = depth.depth_for_blur(f_number, m, p, blur)
    assert depth.blur_on_part(f_number, m, p, reached) == pytest.approx(blur, rel=1e-12)


def test_telecentric_blur_is_magnification_times_defocus_over_f_number():
    assert depth.blur_on_part(8.0, 0.5, math.inf, 4.0) == 0.25
    assert depth.depth_for_blur(8.0, 0.5, math.inf, 0.25) == 4.0
    assert math.isinf(depth.hyperfocal_distance(math.inf, 8.0, 0.005))
    assert all(math.isnan(limit) for limit in depth.classic_limits(math.inf, 8.0, 0.005, 100.0))


@given(FOCAL_LENGTHS, F_NUMBERS, BLURS, st.floats(1.2, 300.0))
def test_blur_on_the_sensor_at_the_classic_limits(f, f_number, blur, in_focal_lengths):
    focus = in_focal_lengths * f
    near, far = depth.classic_limits(f, f_number, blur, focus)
    assert near < focus < far
    if near > 1.001 * f:
        assert blur_on_sensor(f, f_number, focus, near) == pytest.approx(blur, rel=1e-6)
    if math.isfinite(far):
        assert blur_on_sensor(f, f_number, focus, far) == pytest.approx(blur, rel=1e-6)
    else:
        assert blur_on_sensor(f, f_number, focus, math.inf) <= blur * (1 + 1e-9)


@given(FOCAL_LENGTHS, F_NUMBERS, BLURS)
def test_hyperfocal_distance(f, f_number, blur):
    hyperfocal = depth.hyperfocal_distance(f, f_number, blur)
    near, far = depth.classic_limits(f, f_number, blur, hyperfocal)
    assert near == pytest.approx(hyperfocal / 2, rel=1e-9)
    assert far == math.inf
    assert math.isfinite(depth.classic_limits(f, f_number, blur, 0.999 * hyperfocal)[1])


def test_focused_at_infinity():
    near, far = depth.classic_limits(50.0, 8.0, 0.005, math.inf)
    assert near == pytest.approx(depth.hyperfocal_distance(50.0, 8.0, 0.005) - 50.0)
    assert far == math.inf


def test_no_blur_allowed_leaves_no_depth():
    assert depth.depth_for_blur(8.0, 0.1, 1.0, 0.0) == 0
    assert depth.hyperfocal_distance(50.0, 8.0, 0.0) == math.inf
    assert depth.classic_limits(50.0, 8.0, 0.0, 500.0) == pytest.approx((500.0, 500.0))


def test_ends_of_the_magnification():
    assert depth.blur_on_part(8.0, 0.0, 1.0, 5.0) == 0
    assert depth.depth_for_blur(8.0, 0.0, 1.0, 0.1) == math.inf
