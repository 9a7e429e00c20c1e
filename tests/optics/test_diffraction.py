"""The transfer function against the pupil itself; the rest against each other and against scipy."""

import math
import tracemalloc

import numpy as np
import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st
from scipy.integrate import dblquad, quad
from scipy.special import j1

from visionplan.optics import diffraction

WAVELENGTH, F_NUMBER = 550e-6, 4.0
CUTOFF = 1 / (WAVELENGTH * F_NUMBER)


def otf_along_chords(shear, waves):
    """The overlap cut the other way: the phase integrated over each chord by hand, the chords added up by scipy."""
    half_height = math.sqrt(1 - shear**2)
    slope = 8 * math.pi * waves * shear

    def chord(y):
        half_length = math.sqrt(1 - y * y) - shear
        return 2 * half_length * np.sinc(slope * half_length / math.pi)

    return quad(chord, -half_height, half_height, limit=1000, epsabs=1e-11, epsrel=1e-11)[0] / math.pi


def otf_of_pupils(shear, waves):
    """From the definition: the pupil function times its sheared conjugate, integrated over the overlap."""

    def product(x, y):
        wave = [2 * math.pi * waves * ((x + side * shear) ** 2 + y * y) for side in (1, -1)]
        return math.cos(wave[0] - wave[1])

    return (
        dblquad(
            product,
            -math.sqrt(1 - shear**2),
            math.sqrt(1 - shear**2),
            lambda y: shear - math.sqrt(1 - y * y),
            lambda y: math.sqrt(1 - y * y) - shear,
            epsabs=1e-8,
        )[0]
        / math.pi
    )


def otf(shear, waves):
    return diffraction.otf(shear * CUTOFF, WAVELENGTH, F_NUMBER, waves * WAVELENGTH)


@pytest.mark.parametrize(("shear", "waves"), [(0.3, 0.0), (0.1, 0.25), (0.5, 0.75), (0.4, 1.5), (0.7, 2.0)])
def test_otf_is_the_autocorrelation_of_the_pupil(shear, waves):
    assert otf(shear, waves) == pytest.approx(otf_of_pupils(shear, waves), abs=1e-7)


@settings(max_examples=150)
@given(st.floats(0.0, 1.0), st.floats(0.0, 3.0))
def test_otf_over_all_frequencies_and_three_waves(shear, waves):
    assert otf(shear, waves) == pytest.approx(otf_along_chords(shear, waves), abs=1e-8)


@settings(max_examples=60)
@example(0.35, 80.0)
@example(0.7, 90.0)
@given(st.floats(0.0, 1.0), st.floats(3.0, 200.0))
def test_otf_far_out_of_focus(shear, waves):
    """Across both changes of method."""
    assert otf(shear, waves) == pytest.approx(otf_along_chords(shear, waves), abs=3e-7)


def test_methods_meet_at_their_limits():
    for limit in (diffraction.FEW_PHASE, diffraction.MANY_PHASE):
        for shear in (0.01, 0.3, 0.5, 0.9):
            waves = limit / (8 * math.pi * shear * (1 - shear))
            assert otf(shear, waves * (1 - 1e-9)) == pytest.approx(otf(shear, waves * (1 + 1e-9)), abs=5e-7)


@given(st.floats(0.0, 1.5), st.floats(-5.0, 5.0))
def test_otf_is_bounded_even_and_empty_beyond_cutoff(shear, waves):
    value = otf(shear, waves)
    assert abs(value) <= otf(shear, 0.0) + 1e-12 <= 1 + 1e-9
    assert value == otf(-shear, waves) == otf(shear, -waves)
    if shear >= 1 + 1e-12:
        assert value == 0


def test_otf_reverses_the_pattern():
    """A disc of blur without diffraction transfers 2 J1(z)/z, z = π · diameter · frequency; far out they agree."""
    waves, shear = 20.0, 0.0102
    z = math.pi * 8 * F_NUMBER * waves * WAVELENGTH * shear * CUTOFF
    assert 2 * j1(z) / z < -0.1
    assert otf(shear, waves) == pytest.approx(2 * j1(z) / z, abs=0.01)


def test_otf_at_its_ends():
    assert otf(0.0, 2.0) == pytest.approx(1.0, abs=1e-12)
    assert otf(0.0, math.inf) == pytest.approx(1.0, abs=1e-12)
    assert otf(0.5, math.inf) == 0
    assert otf(1.0, 0.0) == pytest.approx(0.0, abs=1e-9)
    assert otf(math.inf, 1.0) == 0
    assert math.isnan(otf(math.nan, 1.0))
    assert math.isnan(otf(0.5, math.nan))


def test_otf_of_many_points_needs_little_memory():
    frequency = np.linspace(0, CUTOFF, 200_000)
    tracemalloc.start()
    try:
        values = diffraction.otf(frequency, WAVELENGTH, F_NUMBER, 20 * WAVELENGTH)
        peak = tracemalloc.get_traced_memory()[1]
    finally:
        tracemalloc.stop()
    assert peak < 24 * values.nbytes + 40e6
    assert values[123_456] == pytest.approx(otf(frequency[123_456] / CUTOFF, 20.0), abs=1e-12)


@given(st.floats(1e-4, 2e-3), st.floats(1.0, 64.0))
def test_rayleigh_separation_is_the_radius_of_the_first_dark_ring(wavelength, f_number):
    separation = diffraction.rayleigh_separation(wavelength, f_number)
    assert separation == pytest.approx(diffraction.airy_diameter(wavelength, f_number) / 2)
    assert diffraction.airy_intensity(separation / (wavelength * f_number)) < 1e-6


@given(st.floats(1e-4, 2e-3), st.floats(1.0, 64.0))
def test_transfer_ends_at_the_cutoff(wavelength, f_number):
    cutoff = diffraction.cutoff_frequency(wavelength, f_number)
    assert diffraction.otf(1.000001 * cutoff, wavelength, f_number) == 0
    assert diffraction.otf(0.999 * cutoff, wavelength, f_number) > 0


def test_encircled_energy_is_the_integral_of_the_intensity():
    for radius in (0.3, 1.0, 2.5):
        ring = quad(lambda r: diffraction.airy_intensity(r) * r, 0, radius, epsabs=1e-12)[0]
        # Parseval: with 1 in the middle the energy of the whole pattern is one over the area of its pupil, which has
        # a radius of 1/2 in these units: 4/π.
        assert diffraction.encircled_energy(radius) == pytest.approx(2 * math.pi * ring / (4 / math.pi), abs=1e-9)
    assert diffraction.encircled_energy(0.0) == 0
    assert diffraction.encircled_energy(math.inf) == 1


def test_airy_intensity_in_the_middle_and_far_out():
    assert diffraction.airy_intensity(0.0) == 1
    assert diffraction.airy_intensity(1e-200) == pytest.approx(1)
    assert diffraction.airy_intensity(math.inf) == 0
    assert diffraction.airy_intensity(-0.7) == diffraction.airy_intensity(0.7)


@pytest.mark.parametrize("frequency", [0.0, 40.0, 145.0, 250.0, 400.0])
def test_pixel_mtf_averages_a_wave_over_the_pixel(frequency):
    pitch = 0.00345
    average = quad(lambda x: math.cos(2 * math.pi * frequency * x), -pitch / 2, pitch / 2)[0] / pitch
    assert diffraction.pixel_mtf(frequency, pitch) == pytest.approx(average, abs=1e-12)


def test_pixel_mtf_keeps_its_sign():
    assert diffraction.pixel_mtf(1.5 / 0.00345, 0.00345) < 0
