"""Light and noise: from the light on the part to a signal-to-noise ratio (EMVA 1288, linear model)."""

import math
from typing import NamedTuple

from tests.reference.laws import working_f_number

PLANCK = 6.62607015e-34
LIGHT_SPEED = 299792458.0
LUMENS_PER_WATT = 683.0
LUMINOSITY = {
    450: 0.038,
    470: 0.09098,
    500: 0.323,
    525: 0.7932,
    550: 0.99495,
    555: 1.0,
    590: 0.757,
    625: 0.321,
    630: 0.265,
    660: 0.061,
}
"""V(λ), CIE 1931 ȳ, at the wavelengths in nm that the random works use."""


class Lit(NamedTuple):
    """What decides how many electrons a pixel collects, beside the lens and the magnification."""

    pitch: float
    wavelength: float
    quantum_efficiency: float
    reflected: float
    """Irradiance of the part times its reflectance times the lens's transmittance, W/m²."""
    time_limit: float
    """Longest exposure that motion, rate and brief allow, or the pulse; infinite where nothing does, s."""
    line_speed: float
    """Speed of the part over a line-scan camera without a pulse, else 0, mm/s."""
    saturation: float
    """Infinite where not stated."""
    noise: float
    """Variance of what doesn't depend on the signal, electrons²."""


def luminosity(wavelength):
    return LUMINOSITY[round(wavelength * 1e6)]


def electrons_per_second(lit, optics, m):
    sensor = lit.reflected / (4 * working_f_number(optics, m) ** 2)  # W/m²
    power = sensor * (lit.pitch * 1e-3) ** 2
    energy_of_photon = PLANCK * LIGHT_SPEED / (lit.wavelength * 1e-3)
    return lit.quantum_efficiency * power / energy_of_photon


def longest_exposure(lit, m):
    """What rate, motion, pulse and line period leave, the well not yet counted; infinite where nothing limits it."""
    line_period = lit.pitch / (m * lit.line_speed) if lit.line_speed else math.inf
    return min(lit.time_limit, line_period)


def electrons(lit, optics, m):
    time = longest_exposure(lit, m)
    if math.isinf(time):
        return lit.saturation
    return min(electrons_per_second(lit, optics, m) * time, lit.saturation)


def signal_to_noise(signal, noise):
    return signal / math.sqrt(noise + signal)


def noise_variance(row):
    dark, full, bits = row["dark noise"], row["saturation capacity"], row["bit depth"]
    variance = dark**2 if dark is not None else 0.0
    if full is not None and bits is not None:
        step = full / (2**bits - 1)
        variance += step**2 / 12  # uniform within one step
    return variance


def corner_share(optics, m, diagonal):
    """cos⁴ of the angle at which the exit pupil is seen from the sensor's corner."""
    if optics.telecentric:
        return 1.0
    tangent = (diagonal / 2) / (optics.focal_length * (optics.pupil_ratio + m))
    return math.cos(math.atan(tangent)) ** 4
