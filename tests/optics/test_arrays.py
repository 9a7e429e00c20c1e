"""Every function takes scalars and arrays alike, and hands on what is not known."""

import inspect

import numpy as np
import pytest

from visionplan.optics import bessel, conjugates, depth, diffraction, light, media, sensor

FUNCTIONS = [
    (bessel.j0, (2.0,)),
    (bessel.j1, (2.0,)),
    (conjugates.object_distance, (25.0, 0.1)),
    (conjugates.image_distance, (25.0, 0.1)),
    (conjugates.extension, (25.0, 0.1)),
    (conjugates.magnification_at, (25.0, 300.0)),
    (conjugates.image_distance_of, (25.0, 300.0)),
    (conjugates.entrance_pupil_distance, (25.0, 0.1, 1.2)),
    (conjugates.working_f_number, (4.0, 0.1, 1.2)),
    (depth.blur_on_part, (4.0, 0.1, 1.2, 3.0)),
    (depth.depth_for_blur, (4.0, 0.1, 1.2, 0.05)),
    (depth.hyperfocal_distance, (25.0, 4.0, 0.005)),
    (depth.classic_limits, (25.0, 4.0, 0.005, 300.0)),
    (diffraction.airy_diameter, (550e-6, 4.0)),
    (diffraction.rayleigh_separation, (550e-6, 4.0)),
    (diffraction.airy_intensity, (0.7,)),
    (diffraction.encircled_energy, (0.7,)),
    (diffraction.cutoff_frequency, (550e-6, 4.0)),
    (diffraction.pixel_mtf, (100.0, 0.00345)),
    (diffraction.otf, (100.0, 550e-6, 4.0, 400e-6)),
    (light.luminosity, (532e-6,)),
    (light.irradiance_of, (20_000.0, 532e-6)),
    (light.illuminance_of, (30.0, 532e-6)),
    (light.sensor_irradiance, (30.0, 0.5, 0.9, 4.0)),
    (light.photons, (0.1, 0.00345, 1e-3, 550e-6)),
    (light.signal_to_noise, (5000.0, 9.0)),
    (light.electrons_for, (40.0, 9.0)),
    (light.cos4, (0.3,)),
    (media.refraction_angle, (0.3, 1.5, 1.0)),
    (media.plate_shift, (6.0, 1.5)),
    (media.plate_shift_at, (6.0, 1.5, 0.3)),
    (media.lateral_error, (6.0, 1.5, 0.3)),
    (media.apparent_depth, (6.0, 1.5)),
    (media.mirror_footprint, (120.0, 90.0, 6.0, 400.0, 120.0, 0.8)),
    (media.mirror_offset, (120.0, 6.0, 400.0, 120.0, 0.8)),
    (sensor.diagonal, (7.2, 5.4)),
]
APART = {
    light.noise_variance: "leaves unknown terms out",
    media.refractive_index: "takes a name",
    media.sellmeier: "takes coefficients",
    sensor.sides: "takes a flag",
}

with_each = pytest.mark.parametrize(("function", "values"), FUNCTIONS, ids=lambda value: getattr(value, "__name__", ""))


def outputs(function, values):
    result = function(*values)
    return result if isinstance(result, tuple) else (result,)


def test_no_function_is_left_out():
    modules = (bessel, conjugates, depth, diffraction, light, media, sensor)
    public = {
        function
        for module in modules
        for name, function in inspect.getmembers(module, inspect.isfunction)
        if function.__module__ == module.__name__ and not name.startswith("_")
    }
    assert public == {function for function, _ in FUNCTIONS} | set(APART)


@with_each
def test_scalars_give_finite_scalars(function, values):
    for output in outputs(function, values):
        assert isinstance(output, float)
        assert np.isfinite(output)


@with_each
def test_arrays_broadcast_and_agree_with_scalars(function, values):
    """Each argument along an axis of its own, varied by some percent."""
    factors = (1.0, 1.03, 0.96)
    axes = len(values)
    arrays = [
        np.multiply(value, factors).reshape([-1 if axis == own else 1 for axis in range(axes)])
        for own, value in enumerate(values)
    ]
    before = [array.copy() for array in arrays]
    results = outputs(function, arrays)
    for place in [(0,) * axes, (1,) * axes, tuple(i % 3 for i in range(axes))]:
        scalars = [float(values[i] * factors[place[i]]) for i in range(axes)]
        for whole, single in zip(results, outputs(function, scalars)):
            assert np.broadcast_to(whole, (3,) * axes)[place] == pytest.approx(single, rel=1e-12)
    assert all(np.array_equal(array, copy) for array, copy in zip(arrays, before))


@with_each
def test_empty_arrays(function, values):
    for output in outputs(function, [np.full(0, value) for value in values]):
        assert output.shape == (0,)


@with_each
def test_what_is_not_known_stays_unknown(function, values):
    for unknown in range(len(values)):
        given = [np.nan if i == unknown else value for i, value in enumerate(values)]
        assert any(np.isnan(output) for output in outputs(function, given))


@with_each
def test_whole_numbers_are_numbers(function, values):
    whole = [int(value) if value >= 2 else value for value in values]
    for one, other in zip(outputs(function, whole), outputs(function, [float(value) for value in whole])):
        assert one == pytest.approx(other, rel=1e-12)


def test_noise_variance_broadcasts():
    variance = light.noise_variance(np.array([[2.0], [np.nan]]), np.array([1e4, np.nan, 2e4]), 12)
    assert variance.shape == (2, 3)
    assert np.all(np.isfinite(variance))
