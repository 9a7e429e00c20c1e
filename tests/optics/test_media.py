"""Layers and mirrors against rays traced one by one."""

import math

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from visionplan.optics import media

THICKNESSES = st.floats(0.1, 100.0)
INDICES = st.floats(1.0, 2.5)
ANGLES = st.floats(1e-3, 1.5)


@given(THICKNESSES, INDICES, ANGLES)
def test_shift_of_a_traced_ray(thickness, index, angle):
    """A ray through the layer meets the axis farther on by the shift than one through air."""
    in_air = thickness * math.tan(angle)
    in_layer = thickness * math.tan(media.refraction_angle(angle, index))
    expected = (in_air - in_layer) / math.tan(angle)
    assert media.plate_shift_at(thickness, index, angle) == pytest.approx(expected, rel=1e-9, abs=1e-12 * thickness)


@given(THICKNESSES, INDICES, ANGLES)
def test_lateral_error_of_a_traced_ray(thickness, index, angle):
    """Where the ray meets the part, against a ray of the same slope through a layer of air as thick as it looks."""
    traced = thickness * math.tan(media.refraction_angle(angle, index))
    paraxial = media.apparent_depth(thickness, index) * math.tan(angle)
    error = media.lateral_error(thickness, index, angle)
    assert error == pytest.approx(paraxial - traced, abs=1e-12 * max(1.0, paraxial))
    assert error >= -1e-12 * max(1.0, paraxial)


@given(THICKNESSES, INDICES)
def test_a_steep_shift_becomes_the_paraxial_one(thickness, index):
    paraxial = media.plate_shift(thickness, index)
    assert media.plate_shift_at(thickness, index, 1e-6) == pytest.approx(paraxial, abs=1e-10 * thickness)
    assert media.plate_shift_at(thickness, index, 0.0) == pytest.approx(paraxial, abs=1e-12 * thickness)
    assert media.apparent_depth(thickness, index) + paraxial == pytest.approx(thickness)


def test_air_shifts_nothing():
    assert media.plate_shift(10.0, 1.0) == 0
    assert media.plate_shift_at(10.0, 1.0, 0.7) == pytest.approx(0, abs=1e-15)
    assert media.lateral_error(10.0, 1.0, 0.7) == pytest.approx(0, abs=1e-15)


@given(st.floats(0.0, 1.5), INDICES)
def test_refraction_can_be_walked_back(angle, index):
    inside = media.refraction_angle(angle, index)
    assert media.refraction_angle(inside, 1.0, index) == pytest.approx(angle, abs=1e-7)


def test_total_reflection_has_no_angle():
    critical = math.asin(1 / 1.5)
    assert math.isnan(media.refraction_angle(critical + 1e-6, 1.0, 1.5))
    assert media.refraction_angle(critical - 1e-6, 1.0, 1.5) == pytest.approx(math.pi / 2, abs=5e-3)


@pytest.mark.parametrize("material", media.MATERIALS)
def test_materials_are_denser_than_air_and_take_arrays(material):
    indices = media.refractive_index(material, np.array([450e-6, 550e-6, 650e-6]))
    assert np.all((indices > 1.3) & (indices < 1.8))
    assert np.all(np.diff(indices) <= 0)
    assert np.ndim(media.refractive_index(material, 550e-6)) == 0
    assert media.refractive_index(material, 550e-6) == indices[1]


def test_an_unknown_material_is_refused():
    with pytest.raises(KeyError):
        media.refractive_index("butter", 550e-6)


def test_sellmeier_has_no_index_in_a_resonance():
    """Where n² would be negative there is none."""
    assert math.isnan(media.sellmeier(0.99e-3, (1.0, 0.0, 0.0), (1.0, 1.0, 1.0)))
    assert math.isnan(media.sellmeier(math.nan, (1.0, 0.0, 0.0), (1.0, 1.0, 1.0)))


def rays_on_the_mirror(field, pupil, to_field, to_mirror, angle):
    """Where rays from the corners of the field to the rim of the pupil meet the mirror: down its slope, across it."""
    turn = np.linspace(0, 2 * np.pi, 721)
    rim = pupil / 2 * np.stack([np.cos(turn), np.sin(turn), np.zeros_like(turn)], axis=-1)
    corners = np.array([(x * field[0] / 2, y * field[1] / 2, to_field) for x in (-1, 1) for y in (-1, 1)])
    direction = corners[:, None] - rim
    normal, point = np.array([-np.sin(angle), 0, np.cos(angle)]), np.array([0, 0, to_mirror])
    share = ((point - rim) @ normal) / (direction @ normal)
    met = rim + share[..., None] * direction - point
    return met @ np.array([np.cos(angle), 0, np.sin(angle)]), met[..., 1]


@given(
    st.tuples(st.floats(1.0, 300.0), st.floats(1.0, 300.0)),
    st.floats(0.5, 40.0),
    st.floats(150.0, 800.0),
    st.floats(0.1, 0.8),
    st.floats(0.1, 1.1),
)
def test_mirror_holds_every_ray_and_no_more(field, pupil, to_field, part, angle):
    length, width = media.mirror_footprint(*field, pupil, to_field, part * to_field, angle)
    assume(not math.isnan(length))
    down, across = rays_on_the_mirror(field, pupil, to_field, part * to_field, angle)
    assert length == pytest.approx(down.max() - down.min(), rel=1e-4)
    assert width == pytest.approx(across.max() - across.min(), rel=1e-4)
    offset = media.mirror_offset(field[0], pupil, to_field, part * to_field, angle)
    assert offset == pytest.approx((down.max() + down.min()) / 2, abs=1e-4 * length)


def test_a_mirror_square_to_the_axis_is_as_large_as_the_cone_there():
    length, width = media.mirror_footprint(100.0, 60.0, 20.0, 400.0, 100.0, 0.0)
    assert (length, width) == pytest.approx((0.75 * 20 + 0.25 * 100, 0.75 * 20 + 0.25 * 60))
    assert media.mirror_offset(100.0, 20.0, 400.0, 100.0, 0.0) == 0


def test_a_parallel_beam_needs_its_width_times_root_two():
    length, width = media.mirror_footprint(20.0, 20.0, 20.0, 400.0, 100.0)
    assert (length, width) == pytest.approx((20 * math.sqrt(2), 20.0))


def test_a_fold_mirror_stands_at_45_degrees_unless_said():
    cone = (20.0, 400.0, 100.0)
    assert media.mirror_footprint(100.0, 60.0, *cone) == media.mirror_footprint(100.0, 60.0, *cone, math.radians(45))
    assert media.mirror_offset(100.0, *cone) == media.mirror_offset(100.0, *cone, math.radians(45))


@pytest.mark.parametrize("to_mirror", [5.0, 390.0])
def test_a_mirror_that_would_reach_into_lens_or_part_has_no_size(to_mirror):
    assert all(math.isnan(side) for side in media.mirror_footprint(100.0, 60.0, 20.0, 400.0, to_mirror))


def test_light_steeper_than_the_mirror_has_no_footprint():
    assert all(math.isnan(side) for side in media.mirror_footprint(1000.0, 60.0, 20.0, 400.0, 100.0))
