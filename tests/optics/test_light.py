"""Light and noise against counting, against integrals and against each other."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy import constants
from scipy.integrate import quad

from visionplan.optics import light

WAVELENGTHS = st.floats(385e-6, 775e-6)


def test_luminosity_peaks_at_555_nm_and_ends_with_the_table():
    every_nm = np.arange(300, 901) * 1e-6
    values = light.luminosity(every_nm)
    assert every_nm[values.argmax()] == pytest.approx(555e-6)
    assert np.all(values[(every_nm < 379.5e-6) | (every_nm > 780.5e-6)] == 0)
    assert np.all(values[(every_nm > 380.5e-6) & (every_nm < 779.5e-6)] > 0)
    rising = np.diff(values)
    assert np.all(rising[every_nm[:-1] < 554.5e-6] >= 0)
    assert np.all(rising[every_nm[:-1] > 555.5e-6] <= 0)


def test_luminosity_is_smooth():
    """A misprinted digit would break the run of its neighbours; the ends of the table are rough by themselves."""
    logs = np.log(light.luminosity(np.arange(445, 666, 5) * 1e-6))
    assert np.abs(np.diff(logs, 3)).max() < 0.04


def test_unknown_wavelength():
    assert math.isnan(light.luminosity(math.nan))


@given(st.floats(0.0, 1e6), WAVELENGTHS)
def test_photometry_there_and_back(illuminance, wavelength):
    irradiance = light.irradiance_of(illuminance, wavelength)
    assert light.illuminance_of(irradiance, wavelength) == pytest.approx(illuminance, rel=1e-12)


def test_invisible_light_has_no_illuminance_and_can_not_be_known_from_one():
    assert light.illuminance_of(30.0, 850e-6) == 0
    assert math.isnan(light.irradiance_of(1000.0, 850e-6))


@pytest.mark.parametrize("working_f_number", [8.0, 16.0, 64.0])
def test_sensor_irradiance_is_a_bright_disc_seen_through_the_pupil(working_f_number):
    """Add up radiance over the cone: ρE/π from every direction within half an angle whose sine is 1/(2 N_w)."""
    half_angle = math.asin(1 / (2 * working_f_number))
    cone = quad(lambda t: 2 * math.pi * math.sin(t) * math.cos(t), 0, half_angle)[0]
    expected = 0.5 * 30.0 / math.pi * cone * 0.9
    assert light.sensor_irradiance(30.0, 0.5, 0.9, working_f_number) == pytest.approx(expected, rel=1e-9)


def test_constants_of_the_si():
    assert pytest.approx(constants.h, rel=1e-15) == light.PLANCK
    assert pytest.approx(constants.c) == light.LIGHT_SPEED


def test_photons_carry_the_energy():
    """One watt on one square metre for one second is one joule."""
    count = light.photons(1.0, 1000.0, 1.0, 500e-6)
    assert count * constants.h * constants.c / 500e-9 == pytest.approx(1.0, rel=1e-12)


@given(st.floats(1.0, 200.0), st.floats(0.0, 1e4))
def test_electrons_for_is_the_inverse(snr, variance):
    electrons = light.electrons_for(snr, variance)
    assert light.signal_to_noise(electrons, variance) == pytest.approx(snr, rel=1e-9)


@pytest.mark.parametrize(("electrons", "dark", "saturation", "bits"), [(400, 3.0, 2000, 8), (50, 8.0, 10_000, 12)])
def test_signal_to_noise_of_a_simulated_pixel(electrons, dark, saturation, bits):
    """Draw photons, add dark noise, round to steps, and take mean over spread."""
    draw = np.random.default_rng(20240501)
    step = saturation / (2**bits - 1)
    signal = draw.poisson(electrons, 400_000) + draw.normal(0, dark, 400_000)
    pixels = np.round(signal / step) * step
    expected = pixels.mean() / pixels.std()
    variance = light.noise_variance(dark, saturation, bits)
    assert light.signal_to_noise(electrons, variance) == pytest.approx(expected, rel=0.005)


def test_what_a_camera_does_not_state_is_left_out_of_the_noise():
    nan = math.nan
    assert light.noise_variance(nan, nan, nan) == 0
    assert light.noise_variance(3.0, nan, 8) == light.noise_variance(3.0, 5000.0, nan) == 9
    assert light.noise_variance(nan, 255.0, 8) == pytest.approx(1 / 12)
    assert light.noise_variance(0.0, 255.0, 8) == pytest.approx(1 / 12)


def test_darkness():
    assert light.signal_to_noise(0.0, 0.0) == 0
    assert light.signal_to_noise(0.0, 9.0) == 0
    assert light.electrons_for(0.0, 9.0) == 0


def test_photon_noise_alone():
    assert light.signal_to_noise(10_000.0, 0.0) == pytest.approx(100)
    assert light.electrons_for(100.0, 0.0) == pytest.approx(10_000)


@given(st.floats(0.0, 1.5))
def test_cos4(angle):
    assert light.cos4(math.tan(angle)) == pytest.approx(math.cos(angle) ** 4, rel=1e-9)


def test_cos4_far_off_the_axis():
    assert light.cos4(math.inf) == 0
