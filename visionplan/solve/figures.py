"""Light, noise and contrast of a rig at a given magnification."""

import numpy as np

from visionplan.optics.diffraction import otf, pixel_mtf
from visionplan.optics.light import (
    cos4,
    electrons_for,
    illuminance_of,
    photons,
    sensor_irradiance,
    signal_to_noise,
)
from visionplan.solve.case import Case


def electron_rate(case: Case, m, irradiance: float):
    """Electrons in a pixel in a second, under an irradiance on the part in W/m²; NaN where the brief or camera lacks
    what that takes."""
    reflectance = case.brief.reflectance
    if reflectance is None:
        return np.full(np.shape(case.P * m), np.nan)
    on_sensor = sensor_irradiance(irradiance, reflectance, case.tau, case.N_w(m))
    return case.eta * photons(on_sensor, case.P, 1.0, case.lam)


def longest_exposure(case: Case, m):
    """What pulse, motion, rate, the longest exposure and the line period leave, s; infinite for no limit."""
    limit = case.ask.longest_exposure
    if case.v and case.brief.pulse is None:
        with np.errstate(divide="ignore"):
            return np.where(case.line, np.minimum(limit, case.P / (m * case.v)), limit)
    return np.broadcast_to(limit, np.shape(case.line * m))


def exposure(case: Case, m):
    """Exposure time, s: the longest allowed that does not fill the well; NaN where nothing known limits it."""
    limit = longest_exposure(case, m)
    with np.errstate(divide="ignore", invalid="ignore"):
        fills = saturation_time(case, m)
        time = np.fmin(limit, fills)
    return np.where(np.isinf(time), np.nan, time)


def saturation_time(case: Case, m):
    """Exposure that just fills the well, s; NaN where the light or the camera's capacity is unknown."""
    if case.ask.irradiance is None:
        return np.nan
    return case.saturation / electron_rate(case, m, case.ask.irradiance)


def signal_to_noise_at(case: Case, m, corner: bool = False):
    """Signal-to-noise ratio in the middle or in the corner of the picture; NaN where light or camera are unknown."""
    if case.ask.irradiance is None:
        return np.full(np.shape(case.N * m), np.nan)
    electrons = electron_rate(case, m, case.ask.irradiance) * exposure(case, m)
    if corner:
        with np.errstate(invalid="ignore"):
            tangent = np.hypot(case.w, case.h) / 2 / (case.f * (case.p + m))
        electrons = electrons * cos4(tangent)
    return signal_to_noise(electrons, case.variance)


def needed_illuminance(case: Case, m):
    """Illuminance on the part that yields the ratio asked for, lx.

    NaN where none is asked, a level is stated, no exposure limits it, the well is too small, or the camera's quantum
    efficiency or the eye's response is unknown or 0.
    """
    if case.brief.snr is None or case.ask.irradiance is not None:
        return np.full(np.shape(case.N * m), np.nan)
    electrons = electrons_for(case.brief.snr, case.variance)
    limit = longest_exposure(case, m)
    with np.errstate(divide="ignore", invalid="ignore"):
        irradiance = electrons / (electron_rate(case, m, 1.0) * limit)
        level = illuminance_of(irradiance, case.lam)
        unknown = np.isinf(limit) | (electrons > case.saturation * (1 + 1e-12)) | (level <= 0)
    return np.where(unknown, np.nan, level)


def contrasts(case: Case, m):
    """Modulation of the smallest feature at focus, nearest and farthest plane: three arrays, signs kept."""
    u, stop = case.u(m), case.N_w(m)
    return tuple(_contrast(case, m, u, stop, shift) for shift in (0.0, case.A + case.g, -(case.B + case.g)))


def _contrast(case: Case, m, u, stop, towards_lens):
    """At a plane that much nearer than the focus: 0 where that plane lies at or beyond the pupil."""
    with np.errstate(divide="ignore", invalid="ignore"):
        scale = np.where(np.isinf(u), 1.0, u / (u - towards_lens))
        seen = np.isinf(u) | (u > towards_lens)
        there = m * np.where(seen, scale, 1.0)
        blur = there * np.abs(towards_lens) / (case.N * case.nu(m))
        frequency = 1 / (2 * case.feature * there)
        value = otf(frequency, case.lam, stop, blur / (8 * stop)) * pixel_mtf(frequency, case.P)
    return np.where(np.isnan(m), np.nan, np.where(seen, value, 0.0))
