"""Bessel functions J0 and J1, which numpy lacks."""

import numpy as np

from visionplan.optics import Numbers

SWITCH = 30.0
"""From here on the asymptotic series is exact to rounding."""


def j0(x: Numbers) -> Numbers:
    """Bessel function of the first kind and order 0, of x ≥ 0."""
    return _bessel(0, x)


def j1(x: Numbers) -> Numbers:
    """Bessel function of the first kind and order 1, of x ≥ 0."""
    return _bessel(1, x)


def _bessel(order: int, x: Numbers) -> Numbers:
    x = np.asarray(x, dtype=float)
    with np.errstate(invalid="ignore"):
        return np.where(x < SWITCH, _integral(order, np.minimum(x, SWITCH)), _series(order, np.maximum(x, SWITCH)))[()]


def _integral(order: int, x: np.ndarray) -> np.ndarray:
    # Bessel's integral: over a period the midpoint rule converges faster than any power.
    nodes = 64
    total = np.zeros_like(x)
    for sine in np.sin((np.arange(nodes) + 0.5) * np.pi / nodes):
        total += sine * np.sin(x * sine) if order else np.cos(x * sine)
    return total / nodes


def _series(order: int, x: np.ndarray) -> np.ndarray:
    # Hankel's expansion for large arguments.
    term = np.ones_like(x, dtype=complex)
    total = term.copy()
    for k in range(1, 16):
        term = term * (1j * (4 * order**2 - (2 * k - 1) ** 2) / (8 * k)) / x
        total += term
    wave = np.sqrt(2 / (np.pi * x)) * (total * np.exp(1j * (x - order * np.pi / 2 - np.pi / 4))).real
    return np.where(np.isinf(x), 0.0, wave)
