"""What a perfect lens of a circular pupil still resolves: Airy pattern, cutoff and optical transfer function.

Sources: W. J. Smith, Modern Optical Engineering, 4th ed.; J. W. Goodman, Introduction to Fourier Optics; for the
defocused transfer function H. H. Hopkins, Proc. R. Soc. A 231 (1955), 91.
"""

from functools import cache

import numpy as np

from visionplan.optics import Numbers
from visionplan.optics.bessel import j0, j1

CHUNK = 1 << 13
"""Points worked out at a time, so that the nodes of each fit in the processor's cache."""

FEW_NODES, FEW_PHASE = 16, 24.0
MANY_NODES, MANY_PHASE = 128, 400.0
"""Nodes of the quadrature, and the phase in rad over half the overlap up to which they are exact to 1e-9."""


def airy_diameter(wavelength: Numbers, working_f_number: Numbers) -> Numbers:
    """Diameter of the first dark ring on the sensor, 2.44 λ N_w, mm."""
    return 2.44 * wavelength * working_f_number


def rayleigh_separation(wavelength: Numbers, working_f_number: Numbers) -> Numbers:
    """Least separation on the sensor of two points that are told apart after Rayleigh, 1.22 λ N_w, mm."""
    return 1.22 * wavelength * working_f_number


def airy_intensity(radius: Numbers) -> Numbers:
    """Intensity of the Airy pattern, 1 in the middle; `radius` in units of λ N_w."""
    argument = np.pi * np.abs(radius)
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(argument == 0, 1.0, np.square(2 * j1(argument) / argument))[()]


def encircled_energy(radius: Numbers) -> Numbers:
    """Fraction of the Airy pattern's energy within a circle; `radius` in units of λ N_w."""
    argument = np.pi * np.abs(radius)
    return 1 - np.square(j0(argument)) - np.square(j1(argument))


def cutoff_frequency(wavelength: Numbers, working_f_number: Numbers) -> Numbers:
    """Frequency on the sensor from which nothing is resolved, 1/(λ N_w), lp/mm."""
    return 1 / (wavelength * working_f_number)


def pixel_mtf(frequency: Numbers, pitch: Numbers) -> Numbers:
    """Modulation that a square pixel, sensitive all over, leaves: sin(π ν P)/(π ν P), with its sign."""
    return np.sinc(np.multiply(frequency, pitch))


def otf(frequency: Numbers, wavelength: Numbers, working_f_number: Numbers, defocus: Numbers = 0.0) -> Numbers:
    """Transfer of a perfect, defocused lens with a circular pupil: exact, after Hopkins.

    Two pupils of radius 1 sheared by 2 s, s = ν λ N_w, overlap where |x| + s < √(1 − y²), and over the overlap the
    defocus makes a phase of a x, a = 8π s W020/λ. So the transfer is (4/π) ∫ √(1 − (x + s)²) cos(a x) dx from 0 to
    1 − s. Negative values mean a reversed pattern.

    Parameters
    ----------
    frequency : on the sensor [lp/mm]; only its modulus matters
    wavelength : [mm]
    working_f_number : of the cone on the sensor
    defocus : W020, the defect of the wave at the edge of the pupil [mm]; a blur of diameter b on the sensor has
        b/(8 N_w)

    Returns
    -------
    Numbers
        1 at zero frequency, 0 from the cutoff on; within 1e-6 for any defocus, 1e-9 up to 60 wavelengths.

    >>> float(round(otf(227.27, 550e-6, 4.0), 4))
    0.391
    """
    with np.errstate(invalid="ignore"):
        shear, waves = np.broadcast_arrays(
            np.abs(frequency) * np.multiply(wavelength, working_f_number), np.abs(np.divide(defocus, wavelength))
        )
        shape, shear, waves = shear.shape, shear.ravel(), waves.ravel()
        rate = np.where(shear == 0, 0.0, 8 * np.pi * waves * shear)
        phase = rate * (1 - shear)
    result = np.where(shear >= 1, 0.0, np.nan)
    inside = shear < 1
    few = inside & (phase <= FEW_PHASE)
    many = inside & (phase > FEW_PHASE) & (phase <= MANY_PHASE)
    beyond = inside & (phase > MANY_PHASE)
    for chosen, nodes in ((few, FEW_NODES), (many, MANY_NODES)):
        rows = np.flatnonzero(chosen)
        for start in range(0, rows.size, CHUNK):
            part = rows[start : start + CHUNK]
            result[part] = _by_quadrature(1 - shear[part], phase[part], nodes)
    if beyond.any():
        result[beyond] = _far_defocused(shear[beyond], rate[beyond])
    return result.reshape(shape)[()]


def _by_quadrature(gap: np.ndarray, phase: np.ndarray, nodes: int) -> np.ndarray:
    # With x + s = 1 − (1 − s) t² the root at the overlap's end is gone and the integrand is even and smooth in t.
    square, weight = _even_rule(nodes)
    terms = np.sqrt(2 - gap[:, None] * square)
    terms *= np.cos(phase[:, None] * (1 - square))
    return 8 / np.pi * gap**1.5 * (terms @ (weight * square))


def _far_defocused(shear: np.ndarray, rate: np.ndarray) -> np.ndarray:
    # Only the ends of a fast oscillation count: the kink at x = 0 and the root at the end of the overlap.
    with np.errstate(invalid="ignore"):
        kink = shear / np.sqrt(1 - shear**2) / rate**2
        root = np.sqrt(np.pi / 2) * rate**-1.5 * np.cos(rate * (1 - shear) - 3 * np.pi / 4)
        return np.where(np.isinf(rate), 0.0, 4 / np.pi * (kink + root))


@cache
def _even_rule(nodes: int) -> tuple[np.ndarray, np.ndarray]:
    # The positive half of a Gauss-Legendre rule: its squared nodes and weights, for an even function over 0 to 1.
    node, weight = np.polynomial.legendre.leggauss(2 * nodes)
    return node[nodes:] ** 2, weight[nodes:]
