"""Depth of field worked in manuals, and as computed exactly for a thin lens."""

import math

import pytest
from scipy.optimize import brentq

from visionplan.optics import depth


def test_hyperfocal_distance_of_a_manual():
    """US Army subcourse SS0507: f 2 in, f/8, circle 0.002 in: 20.8 ft; focused there sharp from 10.4 ft to infinity.

    The manual leaves the last focal length out of f²/(N c) + f, 2 in of 252.
    """
    hyperfocal = depth.hyperfocal_distance(2.0, 8.0, 0.002)
    assert (hyperfocal - 2.0) / 12 == pytest.approx(20.8, abs=0.05)
    near, far = depth.classic_limits(2.0, 8.0, 0.002, hyperfocal)
    assert near / 12 == pytest.approx(10.4, rel=0.01)
    assert far == math.inf


def test_focus_at_the_hyperfocal_distance_and_half_of_it():
    """Standard identity: H/2 … ∞ and H/3 … H."""
    hyperfocal = depth.hyperfocal_distance(25.0, 8.0, 0.00345)
    near, far = depth.classic_limits(25.0, 8.0, 0.00345, hyperfocal)
    assert near == pytest.approx(hyperfocal / 2)
    assert far == math.inf
    # For the half it holds of distances counted as if the hyperfocal distance were f²/(N c): within f/H.
    near, far = depth.classic_limits(25.0, 8.0, 0.00345, hyperfocal / 2)
    assert (near, far) == pytest.approx((hyperfocal / 3, hyperfocal), rel=2 * 25.0 / hyperfocal)


def test_focus_between_two_limits():
    """US Navy 14209: limits 9.8 and 10.2 ft, focus at 2 D d/(D + d), 10 ft."""
    focal_length, f_number, focus = 50 / 304.8, 8.0, 2 * 9.8 * 10.2 / (9.8 + 10.2)
    assert focus == pytest.approx(10, abs=0.005)
    blur = brentq(lambda c: depth.classic_limits(focal_length, f_number, c, focus)[0] - 9.8, 1e-7, 1e-3)
    assert depth.classic_limits(focal_length, f_number, blur, focus)[1] == pytest.approx(10.2, rel=1e-4)


@pytest.mark.parametrize(
    ("focal_length", "f_number", "blur", "distance", "near", "far"),
    [
        (16, 4, 0.005, 400, 388.3495, 412.3711),
        (25, 8, 0.00345, 300, 296.4005, 303.6880),
        (35, 5.6, 0.0069, 500, 492.7723, 507.4429),
    ],
)
def test_limits_of_a_thin_lens(focal_length, f_number, blur, distance, near, far):
    """Computed, exact thin lens."""
    limits = depth.classic_limits(focal_length, f_number, blur, distance)
    assert limits == pytest.approx((near, far), abs=5e-5)
