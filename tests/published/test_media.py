"""Layers and refractive indices."""

import math

import numpy as np
import pytest

from visionplan.optics import media

ANGLES = np.radians([0, 5, 10, 15, 20, 30, 45])
SHIFTS = np.array([3.407173, 3.421391, 3.464362, 3.537034, 3.640999, 3.952422, 4.730536])
"""Plate of 10 mm, n 1.5168. Formula: W. J. Smith, Modern Optical Engineering, 4th ed., section 7.8, pp. 134–135; values
computed from it and confirmed with a ray tracer."""


def test_plate_at_an_angle():
    assert media.plate_shift_at(10.0, 1.5168, ANGLES) == pytest.approx(SHIFTS, abs=6e-7)
    assert media.plate_shift(10.0, 1.5168) == pytest.approx(SHIFTS[0], abs=6e-7)


def test_lateral_error_of_the_plate():
    """The excess over the paraxial shift, at the slope of the ray."""
    expected = (SHIFTS - SHIFTS[0]) * np.tan(ANGLES)
    assert media.lateral_error(10.0, 1.5168, ANGLES) == pytest.approx(expected, abs=2e-6)


def test_third_order_of_the_plate():
    """Smith, same section: the extra shift of small angles is t U² (n² − 1)/(2 n³)."""
    angle, index = 0.01, 1.5168
    extra = media.plate_shift_at(10.0, index, angle) - media.plate_shift(10.0, index)
    assert extra == pytest.approx(10.0 * angle**2 * (index**2 - 1) / (2 * index**3), rel=1e-3)


def test_apparent_depth_of_water():
    """University Physics vol. 3 (OpenStax), section 2.3: three quarters; 100 mm at n 1.333 look 75.0188 mm deep."""
    assert media.apparent_depth(100.0, 1.333) == pytest.approx(75.0188, abs=5e-5)
    assert media.apparent_depth(100.0, 1.333) == pytest.approx(75, abs=0.05)


@pytest.mark.parametrize(
    ("material", "index", "tolerance"),
    [
        ("N-BK7", 1.51680, 5e-6),  # n_d of the glass
        ("fused silica", 1.45846, 5e-6),  # Malitson 1965
        ("sapphire", 1.76817, 1e-5),  # Malitson and Dodge, ordinary ray
        ("water", 1.3334, 5e-5),  # 20 °C, Daimon and Masumura 2007
        ("PMMA", 1.492, 2e-3),  # ± 0.002
        ("acrylic", 1.492, 2e-3),  # the same plastic
        ("polycarbonate", 1.585, 2e-3),  # ± 0.002
    ],
)
def test_index_at_the_helium_d_line(material, index, tolerance):
    assert media.refractive_index(material, 587.5618e-6) == pytest.approx(index, abs=tolerance)


@pytest.mark.parametrize(
    ("material", "number", "tolerance"),
    [("N-BK7", 64.17, 0.02), ("fused silica", 67.8, 0.1), ("sapphire", 72.2, 0.3)],
)
def test_abbe_number(material, number, tolerance):
    """(n_d − 1)/(n_F − n_C) as usually quoted for these materials; from memory."""
    blue, yellow, red = (media.refractive_index(material, line) for line in (486.1327e-6, 587.5618e-6, 656.2725e-6))
    assert (yellow - 1) / (blue - red) == pytest.approx(number, abs=tolerance)


def test_critical_angle_of_water():
    """48.6° for n 1.333, as physics textbooks have it; from memory."""
    assert math.degrees(media.refraction_angle(math.pi / 2, 1.333)) == pytest.approx(48.6, abs=0.05)
