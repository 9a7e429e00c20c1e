"""Photometry of the CIE and the camera model of EMVA 1288, with worked values."""

import math

import numpy as np
import pytest

from visionplan.optics import light


@pytest.mark.parametrize(
    ("nanometres", "expected"),
    [
        (450, 0.038),
        (470, 0.09098),
        (500, 0.323),
        (525, 0.7932),
        (550, 0.99495),
        (555, 1.0),
        (590, 0.757),
        (625, 0.321),
        (630, 0.265),
        (660, 0.061),
    ],
)
def test_luminosity(nanometres, expected):
    """CIE 1931 ȳ."""
    assert light.luminosity(nanometres * 1e-6) == pytest.approx(expected, abs=1e-9)


def test_sum_of_the_luminosity_table():
    """ȳ of 5 nm steps adds up to 21.371 (tables of CIE weights for equal energy; from memory)."""
    assert light.luminosity(np.arange(380, 781, 5) * 1e-6).sum() == pytest.approx(21.371, abs=1e-3)


def test_one_lux():
    """CIE, 683 lm/W at 555 nm: 1 lx is 0.146413 µW/cm²."""
    microwatts_per_cm2 = light.irradiance_of(1.0, 555e-6) * 100
    assert microwatts_per_cm2 == pytest.approx(0.146413, abs=5e-7)
    assert light.illuminance_of(1.0, 555e-6) == pytest.approx(683)


@pytest.mark.parametrize("constant", [50.34, 50.3411657])
def test_photons_of_one_unit_each(constant):
    """EMVA 1288: 50.34 · A[µm²] · t[ms] · λ[µm] · E[µW/cm²]; the longer constant from h and c of the SI of 2019."""
    tolerance = 0.005 if constant == 50.34 else 1e-7
    assert light.photons(0.01, 0.001, 1e-3, 1e-3) == pytest.approx(constant, abs=tolerance)


def test_worked_camera():
    """EMVA 1288 worked: 3.45² µm², 1 ms, 0.525 µm, 10 µW/cm²; η 0.6, σd 2.5, gain 0.4 digital numbers an electron."""
    photons = light.photons(0.1, 0.00345, 1e-3, 525e-6)
    assert photons == pytest.approx(3145.725, abs=5e-4)
    variance = light.noise_variance(2.5, 255 / 0.4, 8)
    snr = light.signal_to_noise(0.6 * photons, variance)
    assert snr == pytest.approx(43.3669, abs=5e-5)
    assert 20 * math.log10(snr) == pytest.approx(32.743, abs=5e-4)
    assert light.electrons_for(43.3669, variance) == pytest.approx(0.6 * 3145.725, abs=0.01)


def test_best_signal_to_noise():
    """EMVA 1288: the square root of the saturation capacity."""
    assert light.signal_to_noise(10_400.0, 0.0) == pytest.approx(math.sqrt(10_400))


@pytest.mark.parametrize(("degrees", "expected"), [(10, 0.94060), (20, 0.77973), (30, 0.56250)])
def test_cos4(degrees, expected):
    """Computed."""
    assert light.cos4(math.tan(math.radians(degrees))) == pytest.approx(expected, abs=5e-6)
