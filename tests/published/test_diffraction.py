"""Airy pattern and transfer functions, against handbook forms and a Fourier-optics library.

Computed values; forms as in W. J. Smith, Modern Optical Engineering, and J. W. Goodman, Introduction to Fourier Optics.
"""

import math

import numpy as np
import pytest
from prysm.coordinates import cart_to_polar, make_xy_grid
from prysm.geometry import circle
from prysm.otf import diffraction_limited_mtf, mtf_from_psf
from prysm.propagation import Wavefront
from prysm.psf import airydisk
from scipy.optimize import minimize_scalar

from visionplan.optics import diffraction

WAVELENGTH, F_NUMBER = 550e-6, 4.0


@pytest.mark.parametrize("zero", [1.219670, 2.233131, 3.238315])
def test_dark_rings(zero):
    found = minimize_scalar(diffraction.airy_intensity, bounds=(zero - 0.2, zero + 0.2), options={"xatol": 1e-9})
    assert found.x == pytest.approx(zero, abs=1e-6)
    assert found.fun < 1e-12


def test_rounded_factors_of_the_first_dark_ring():
    """1.22 and 2.44 λN."""
    assert diffraction.rayleigh_separation(1.0, 1.0) == pytest.approx(1.219670, abs=5e-4)
    assert diffraction.airy_diameter(1.0, 1.0) == pytest.approx(2 * 1.219670, abs=1e-3)


def test_energy_within_the_first_dark_ring():
    assert diffraction.encircled_energy(1.219670) == pytest.approx(0.837785, abs=1e-6)


def test_airy_pattern_against_prysm():
    radius = np.linspace(0.1, 20.0, 200)
    expected = airydisk(radius, F_NUMBER, 0.55)
    assert diffraction.airy_intensity(radius / (0.55 * F_NUMBER)) == pytest.approx(expected, abs=1e-12)


def test_cutoff():
    """f/4 at 550 nm: 454.5 lp/mm."""
    assert diffraction.cutoff_frequency(WAVELENGTH, F_NUMBER) == pytest.approx(454.5, abs=0.05)


def in_focus(shear):
    """(2/π)(acos s − s√(1 − s²)), as in Goodman."""
    return 2 / math.pi * (math.acos(shear) - shear * math.sqrt(1 - shear * shear))


@pytest.mark.parametrize(
    ("shear", "expected"), [(0.1, 0.872889), (0.25, in_focus(0.25)), (0.5, 0.391002), (0.8, 0.104088)]
)
def test_mtf_in_focus(shear, expected):
    cutoff = diffraction.cutoff_frequency(WAVELENGTH, F_NUMBER)
    assert diffraction.otf(shear * cutoff, WAVELENGTH, F_NUMBER) == pytest.approx(expected, abs=1e-6)


def test_mtf_in_focus_over_all_frequencies():
    shear = np.linspace(0, 1, 501)
    cutoff = diffraction.cutoff_frequency(WAVELENGTH, F_NUMBER)
    expected = [in_focus(s) for s in shear]
    assert diffraction.otf(shear * cutoff, WAVELENGTH, F_NUMBER) == pytest.approx(expected, abs=1e-9)


def test_mtf_in_focus_against_prysm():
    frequency = np.linspace(1, 450, 100)
    expected = diffraction_limited_mtf(F_NUMBER, 0.55, frequency)
    assert diffraction.otf(frequency, WAVELENGTH, F_NUMBER) == pytest.approx(expected, abs=1e-9)


@pytest.mark.parametrize(("frequency", "expected"), [(25, 0.9177), (50, 0.8207), (100, 0.6246), (200, 0.3396)])
def test_mtf_a_quarter_wave_out_of_focus(frequency, expected):
    """W020 = 0.25 λ at f/4 and 550 nm; prysm 0.21 and an independent integral agree to 1e-4."""
    value = diffraction.otf(frequency, WAVELENGTH, F_NUMBER, 0.25 * WAVELENGTH)
    assert value == pytest.approx(expected, abs=1e-4)


def test_a_quarter_wave_as_a_shift_of_the_image():
    """8 λ N² W020/λ = 17.6 µm: the blur there, shift over N, is the W020 of b/(8 N) that the transfer is told."""
    blur = 0.0176 / F_NUMBER
    assert blur / (8 * F_NUMBER) == pytest.approx(0.25 * WAVELENGTH)
    value = diffraction.otf(100.0, WAVELENGTH, F_NUMBER, blur / (8 * F_NUMBER))
    assert value == pytest.approx(0.6246, abs=1e-4)


@pytest.mark.parametrize("waves", [0.25, 0.6, 1.2])
def test_defocused_mtf_against_prysm(waves):
    """A pupil on a grid, its pattern and the transfer of that, by Fourier transforms; the grid errs by under 1e-3."""
    samples, diameter = 256, 10.0
    x, y = make_xy_grid(samples, diameter=diameter)
    radius, _ = cart_to_polar(x, y)
    wave_nm = waves * 550 * (2 * radius / diameter) ** 2
    pupil = Wavefront.from_amp_and_phase(circle(diameter / 2, radius), wave_nm, 0.55, x[0, 1] - x[0, 0])
    psf = pupil.focus(diameter * F_NUMBER, Q=4).intensity
    grid, modulus = mtf_from_psf(psf.data, psf.dx).slices().x
    frequency = np.linspace(10, 440, 44)
    expected = np.interp(frequency, grid, modulus)
    value = diffraction.otf(frequency, WAVELENGTH, F_NUMBER, waves * WAVELENGTH)
    assert np.abs(value) == pytest.approx(expected, abs=1e-3)


def test_pixel_mtf_at_nyquist():
    """Full fill: 2/π, 0.636620."""
    assert diffraction.pixel_mtf(1 / (2 * 0.00345), 0.00345) == pytest.approx(0.636620, abs=5e-7)
