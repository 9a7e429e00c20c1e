"""The direct checks: what a rig gets at a given magnification, computed from the optics.

Each function takes a `Case` and the magnification m, arrays that broadcast, and returns the figure to hold against
what is asked. The closed forms in `bounds.py` must agree with them at and around every bound.
"""

import numpy as np

from visionplan.optics.depth import blur_on_part, depth_for_blur
from visionplan.optics.diffraction import rayleigh_separation
from visionplan.solve.case import Case
from visionplan.solve.figures import signal_to_noise_at


def cover(case: Case, m):
    """The smaller ratio of the field seen at the nearest plane to the field asked for."""
    with np.errstate(divide="ignore", invalid="ignore"):
        shrunk = 1 - case.A / case.u(m)
        ratios = case.w / m * shrunk / case.W, case.h / m * shrunk / case.H
        across = np.isinf(case.w / case.W), np.isinf(case.h / case.H)
    return np.fmin(np.where(across[0], np.inf, ratios[0]), np.where(across[1], np.inf, ratios[1]))


def sampling(case: Case, m):
    """Millimetres a pixel at the farthest plane, mosaic counted."""
    return case.kappa * case.P / m * (1 + case.B / case.u(m))


def reach(case: Case, m):
    """The working distance."""
    return case.WD(m)


def headroom(case: Case, m):
    """From the reference plane to the camera's back and its cable."""
    return case.length(m) + case.ask.cable_room


def travel(case: Case, m):
    """The image-side extension; of a telecentric lens how far it sits off its flange."""
    with np.errstate(invalid="ignore"):
        return np.where(case.telecentric, case.e, case.f * m)


def near_depth(case: Case, m):
    """Depth towards the lens within which the blur stays allowed."""
    return np.minimum(depth_for_blur(case.N, m, case.p, case.beta), case.u(m))


def far_depth(case: Case, m):
    """Depth away from the lens within which the blur stays allowed."""
    return depth_for_blur(case.N, m, case.p, case.beta)


def rayleigh(case: Case, m):
    """The smallest distance on the part that diffraction lets be told apart."""
    return rayleigh_separation(case.lam, case.N_w(m)) / m


def lens_detail(case: Case, m):
    """Frequency of the smallest feature on the sensor, lp/mm."""
    return 1 / (2 * case.feature * m)


def light(case: Case, m):
    """Signal-to-noise ratio; NaN where the brief states no light level."""
    return signal_to_noise_at(case, m)


def perspective(case: Case, m):
    """Change of scale from the part's farthest to its nearest surface."""
    deep = case.A + case.B
    with np.errstate(divide="ignore", invalid="ignore"):
        u = case.u(m)
        pupil = np.where(u > case.A, deep / (u - case.A), np.inf)
        half_diagonal = np.hypot(case.w, case.h) / (2 * m)
        return np.where(case.telecentric, deep * np.tan(case.telecentricity) / half_diagonal, pupil)


def line_rate(case: Case, m):
    """Rows in a second that the motion asks for."""
    return case.v * m / case.P


def combined_blur(case: Case, m):
    """Blur of focus and diffraction together on the part, what the choice of the stop minimises, mm.

    Geometric blur of the farther of the two ends of the depth, at least a hundredth of the working distance away.
    """
    least = case.WD(m) / 100
    nearer, farther = np.maximum(case.A + case.g, least), np.maximum(case.B + case.g, least)
    geometric = np.where(case.u(m) > nearer, blur_on_part(case.N, m, case.p, np.maximum(nearer, farther)), np.inf)
    return np.hypot(geometric, 2 * rayleigh(case, m))
