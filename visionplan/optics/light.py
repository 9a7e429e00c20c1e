"""From the light on the part to electrons and their noise: photometry, and the linear camera model of EMVA 1288."""

import numpy as np

from visionplan.optics import Numbers

PLANCK = 6.62607015e-34
"""J s, exact since the SI of 2019."""
LIGHT_SPEED = 299792458.0
"""m/s, exact."""
LUMENS_PER_WATT = 683.0
"""At 555 nm (CIE)."""

_WAVELENGTHS = np.arange(380, 785, 5) * 1e-6
# fmt: off
_LUMINOSITY = np.array([
    3.9e-05, 6.4e-05, 0.00012, 0.000217, 0.000396, 0.00064, 0.00121, 0.00218, 0.004, 0.0073,  # 380 to 425 nm
    0.0116, 0.01684, 0.023, 0.0298, 0.038, 0.048, 0.06, 0.0739, 0.09098, 0.1126,  # 430 to 475
    0.13902, 0.1693, 0.20802, 0.2586, 0.323, 0.4073, 0.503, 0.6082, 0.71, 0.7932,  # 480 to 525
    0.862, 0.91485, 0.954, 0.9803, 0.99495, 1.0, 0.995, 0.9786, 0.952, 0.9154,  # 530 to 575
    0.87, 0.8163, 0.757, 0.6949, 0.631, 0.5668, 0.503, 0.4412, 0.381, 0.321,  # 580 to 625
    0.265, 0.217, 0.175, 0.1382, 0.107, 0.0816, 0.061, 0.04458, 0.032, 0.0232,  # 630 to 675
    0.017, 0.01192, 0.00821, 0.005723, 0.004102, 0.002929, 0.002091, 0.001484, 0.001047, 0.00074,  # 680 to 725
    0.00052, 0.0003611, 0.0002492, 0.0001719, 0.00012, 8.48e-05, 6e-05, 4.24e-05, 3e-05, 2.12e-05,  # 730 to 775
    1.499e-05,  # 780
])
# fmt: on


def luminosity(wavelength_mm: Numbers) -> Numbers:
    """V(λ), how bright light of one wavelength looks, 1 at 555 nm.

    CIE 1931 2° standard observer, ȳ: the table of 5 nm steps from 380 to 780 nm (as the colour-science package 0.4
    has it, to five digits), linear between, 0 outside.
    """
    return np.interp(wavelength_mm, _WAVELENGTHS, _LUMINOSITY, left=0.0, right=0.0)


def irradiance_of(illuminance: Numbers, wavelength: Numbers) -> Numbers:
    """Irradiance in W/m² of light of one wavelength (mm) with an illuminance in lx; NaN for invisible light."""
    visible = luminosity(wavelength)
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(visible == 0, np.nan, np.divide(illuminance, LUMENS_PER_WATT * visible))[()]


def illuminance_of(irradiance: Numbers, wavelength: Numbers) -> Numbers:
    """Illuminance in lx of light of one wavelength (mm) with an irradiance in W/m²; 0 for invisible light."""
    return irradiance * LUMENS_PER_WATT * luminosity(wavelength)


def sensor_irradiance(
    irradiance: Numbers, reflectance: Numbers, transmittance: Numbers, working_f_number: Numbers
) -> Numbers:
    """Irradiance of the sensor in its middle, ρ E τ/(4 N_w²), W/m², for a matt (Lambertian) part lit with E W/m²."""
    return reflectance * irradiance * transmittance / (4 * np.square(working_f_number))


def photons(irradiance: Numbers, pitch_mm: Numbers, exposure_s: Numbers, wavelength_mm: Numbers) -> Numbers:
    """Mean number of photons on a pixel, E P² t λ/(h c), E in W/m² (EMVA 1288)."""
    energy = irradiance * np.square(pitch_mm) * 1e-6 * exposure_s
    return energy * wavelength_mm * 1e-3 / (PLANCK * LIGHT_SPEED)


def noise_variance(dark_noise: Numbers, saturation: Numbers, bits: Numbers) -> Numbers:
    """Variance without light, in electrons², of dark noise and quantisation (EMVA 1288).

    Dark noise and saturation capacity in electrons; one step of the pixel value is the saturation over 2^bits − 1. A
    term with a NaN is left out.
    """
    step = np.divide(saturation, np.exp2(bits) - 1)
    return np.nan_to_num(np.square(dark_noise), nan=0.0) + np.nan_to_num(np.square(step), nan=0.0) / 12


def signal_to_noise(electrons: Numbers, variance: Numbers) -> Numbers:
    """Signal-to-noise ratio of a pixel, e/√(σ² + e) (EMVA 1288, linear), σ² from `noise_variance`; 0 in the dark."""
    total = np.add(variance, electrons)
    with np.errstate(invalid="ignore"):
        return np.where(total == 0, 0.0, electrons / np.sqrt(total))[()]


def electrons_for(snr: Numbers, variance: Numbers) -> Numbers:
    """Electrons that a signal-to-noise ratio needs: the inverse of `signal_to_noise`."""
    return snr / 2 * (snr + np.sqrt(np.square(snr) + 4 * np.asarray(variance)))


def cos4(tangent: Numbers) -> Numbers:
    """How much of the light in the middle is left off the axis, cos⁴, from the tangent of the angle."""
    return (1 + np.square(tangent)) ** -2.0
