"""Conjugates worked in textbooks and manuals."""

import math

import pytest

from visionplan.optics import conjugates, media


@pytest.mark.parametrize(
    ("focal_length", "distance", "image", "magnification"),
    [
        (10.0, 50.0, 12.5, 0.250),  # cm; University Physics vol. 3 (OpenStax), Example 2.4
        (10.0, 20.0, 20.0, 1.00),  # same
        (0.50, 0.75, 1.5, 2.0),  # m; same, Example 2.5, solved there for the focal length
        (50.0, 3000.0, 50.8476, 0.01695),  # mm; same, section 2.4, the camera; the last digit printed is 1 off
        (254.0, 1270.0, 317.5, 0.25),  # 10 in; Photography (Basic), US Navy training manual 14209, scale 1/4
        (12.0, 36.0, 18.0, 0.5),  # in; US Army subcourse SS0511, scale 1/2
    ],
)
def test_finite_conjugates(focal_length, distance, image, magnification):
    assert conjugates.image_distance_of(focal_length, distance) == pytest.approx(image, rel=3e-6)
    assert conjugates.magnification_at(focal_length, distance) == pytest.approx(magnification, rel=3e-4)
    exact = conjugates.magnification_at(focal_length, distance)
    assert conjugates.object_distance(focal_length, exact) == pytest.approx(distance, rel=1e-9)
    assert conjugates.image_distance(focal_length, exact) == pytest.approx(image, rel=3e-6)


def test_focal_length_from_both_distances():
    """University Physics vol. 3 (OpenStax), Example 2.5: object 0.75 m, image 1.5 m, hence f 0.50 m."""
    assert conjugates.image_distance(0.50, 1.5 / 0.75) == pytest.approx(1.5)
    assert conjugates.object_distance(0.50, 1.5 / 0.75) == pytest.approx(0.75)


def test_power():
    """College Physics 2e (OpenStax), section 25.6: light from far off meets at 8.00 cm behind a lens of 12.5 D."""
    assert conjugates.image_distance_of(1 / 12.5, math.inf) == pytest.approx(0.0800)


def test_projector():
    """College Physics 2e (OpenStax), 25.41: f 100 mm, slide of 24 × 36 mm at 103 mm."""
    assert conjugates.image_distance_of(100.0, 103.0) == pytest.approx(3430, abs=5)
    magnification = conjugates.magnification_at(100.0, 103.0)
    assert (24 * magnification, 36 * magnification) == pytest.approx((800, 1200), abs=0.5)


def test_newtonian_form():
    """W. J. Smith, Modern Optical Engineering, 4th ed., p. 32: f 10 in, an object 200 ft away and 50 ft high."""
    magnification = conjugates.magnification_at(10.0, 200 * 12.0)
    assert magnification == pytest.approx(0.004184, abs=5e-7)
    assert conjugates.extension(10.0, magnification) == pytest.approx(0.041841, abs=5e-7)
    assert 50 * 12 * magnification == pytest.approx(2.510460, abs=5e-7)


def traced(surfaces, height=1e-3):
    """Focal length and back focus of a ray near the axis, by Snell's law; (radius, gap behind, index behind) each."""
    y, angle, before = height, 0.0, 1.0
    for radius, gap, index in surfaces:
        normal = -math.asin(y / radius)
        angle = normal + float(media.refraction_angle(angle - normal, index, before))
        before = index
        y += gap * math.tan(angle)
    return -height / math.tan(angle), -y / math.tan(angle)


DOUBLET = [(50.0, 10.0, 1.5), (-50.0, 2.0, 1.6), (math.inf, 0.0, 1.0)]
TURNED = [(math.inf, 2.0, 1.6), (50.0, 10.0, 1.5), (-50.0, 0.0, 1.0)]


def test_snells_law_through_a_cemented_doublet():
    """Smith, Example 3.1: focal length 122.950820, back focus 113.504098, front focus −124.590164 mm."""
    assert traced(DOUBLET) == pytest.approx((122.950820, 113.504098), rel=1e-7)
    assert traced(TURNED) == pytest.approx((122.950820, 124.590164), rel=1e-7)


def test_snells_law_through_a_thick_lens():
    """R 50 / −30, 20 mm thick, n 1.6: focal length 34.48, back focus 29.3103 mm; computed, thick-lens formula."""
    focal_length, back_focus = traced([(50.0, 20.0, 1.6), (-30.0, 0.0, 1.0)])
    assert focal_length == pytest.approx(34.48, abs=5e-3)
    assert back_focus == pytest.approx(29.3103, abs=5e-5)


def test_conjugates_of_the_doublet_from_its_principal_planes():
    """Smith, pp. 41–43: an object 300 mm before it is imaged 199.6846 mm behind it (computed m −0.7009346)."""
    focal_length, back_focus, front_focus = 122.950820, 113.504098, -124.590164
    front_principal, rear_principal = front_focus + focal_length, back_focus - focal_length
    distance = 300.0 + front_principal
    magnification = conjugates.magnification_at(focal_length, distance)
    assert magnification == pytest.approx(0.7009346, abs=5e-8)
    assert rear_principal + conjugates.image_distance(focal_length, magnification) == pytest.approx(199.6846, abs=5e-5)
    assert rear_principal + conjugates.image_distance_of(focal_length, distance) == pytest.approx(199.6846, abs=5e-5)
