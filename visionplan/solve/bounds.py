"""The closed forms: on which interval of the magnification each demand holds.

Every function takes a `Case` and returns (lo, hi), arrays that broadcast: 0 and infinity where there is no bound,
(infinity, 0) where no magnification will do. ψ = 1/p and φ = 1/f are 0 for a telecentric lens, which makes each
formula its own limit for an entrance pupil at infinity. Derivations: each bound is the root of the demand's check in
`checks.py`, multiplied out.
"""

import numpy as np

from visionplan.optics.light import electrons_for, photons, sensor_irradiance
from visionplan.solve.case import Case
from visionplan.solve.span import EDGE

NEVER = (np.inf, 0.0)
STRAIGHT = 0.01
"""How far off its flange a telecentric lens may sit, mm."""


def cover(case: Case):
    """The field fits at the part's nearest plane."""
    width = _positive_root(case.W * case.psi, case.W + case.w * (case.A * case.phi - case.psi), case.w)
    height = _positive_root(case.H * case.psi, case.H + case.h * (case.A * case.phi - case.psi), case.h)
    return 0.0, np.minimum(width, height)


def sampling(case: Case):
    """The smallest feature has its pixels at the part's farthest plane."""
    pixel = case.kappa * case.P
    return _positive_root(case.q * case.psi, case.q - pixel * (case.psi + case.B * case.phi), pixel), np.inf


def reach(case: Case):
    """The working distance lies in the allowed range."""
    near, far = case.brief.working_distance
    offset = case.a - case.D - case.z
    nominal = case.WD_stated + case.D + case.z
    with np.errstate(invalid="ignore"):
        met = (nominal - case.WD_room <= far * (1 + EDGE)) & (nominal + case.WD_room >= near * (1 - EDGE))
    focusable = np.where(case.telecentric, met, far + offset > case.f)
    with np.errstate(divide="ignore", invalid="ignore"):
        lo = np.where(case.telecentric, 0.0, case.f / (far + offset - case.f))
        hi = np.where(case.telecentric | (near + offset <= case.f), np.inf, case.f / (near + offset - case.f))
    return _unless(focusable, lo, hi)


def headroom(case: Case):
    """The camera's back and its cable stay under what hangs above."""
    room = (case.brief.headroom or np.inf) - case.ask.cable_room
    # entocentric: the sum is f m + f/m + fixed, least where m = 1
    fixed = case.f - case.a + case.D + case.z + case.lens_length - case.d + case.camera_length
    L = room - fixed
    with np.errstate(invalid="ignore", divide="ignore"):
        enough = np.where(case.telecentric, case.length(case.M) <= room * (1 + EDGE), 2 * case.f <= L)
        larger = L + np.sqrt(np.maximum(L * L - 4 * case.f * case.f, 0.0))
        lo = np.where(case.telecentric, 0.0, 2 * case.f / larger)
        hi = np.where(case.telecentric, np.inf, larger / (2 * case.f))
    return _unless(enough, lo, hi)


def travel(case: Case):
    """Focus ring and spacers reach the extension f m."""
    with np.errstate(invalid="ignore"):
        straight = (case.e <= STRAIGHT * (1 + EDGE)) & (case.e + case.y >= -STRAIGHT * (1 + EDGE))
        longest = case.e + case.x + case.y
        reached = np.where(case.telecentric, straight, longest > 0)
        lo = np.where(case.telecentric, 0.0, np.maximum(case.e / case.f, 0.0))
        hi = np.where(case.telecentric, np.inf, longest / case.f)
    return _unless(reached, lo, hi)


def near_depth(case: Case):
    """The part's nearest plane is sharp enough."""
    height = case.A + case.g
    return 0.0, _largest(np.maximum(height / (case.N * case.beta), height * case.phi) - case.psi)


def far_depth(case: Case):
    """The part's farthest plane is sharp enough."""
    return 0.0, _largest((case.B + case.g) / (case.N * case.beta) - case.psi)


def rayleigh(case: Case):
    """Diffraction lets the smallest feature be told apart."""
    airy = 1.22 * case.lam * case.N
    room = case.feature - airy * case.psi
    with np.errstate(divide="ignore"):
        return _unless(room > 0, airy / room, np.inf)


def lens_detail(case: Case):
    """The lens resolves the smallest feature."""
    return 1 / (2 * case.feature * case.detail), np.inf


def light(case: Case):
    """The exposure yields the signal-to-noise ratio asked for."""
    needed, possible = electrons_for(case.brief.snr, case.variance), well_holds(case)
    if case.ask.irradiance is None:
        return _unless(possible, 0.0, np.inf)
    # electrons in a second where m tends to 0; they fall with (1 + m ψ)² from there
    fastest = case.eta * photons(
        sensor_irradiance(case.ask.irradiance, case.brief.reflectance, case.tau, case.N), case.P, 1.0, case.lam
    )
    plenty = fastest * case.ask.longest_exposure / needed
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        room = np.sqrt(plenty) - 1
        hi = np.where(case.psi == 0, np.where(plenty >= 1 - EDGE, np.inf, 0.0), room / case.psi)
        hi = np.where(np.isinf(plenty), np.inf, hi)
        if case.ask.v and case.brief.pulse is None and np.any(case.line):
            period = np.where(case.line, _line_period_root(fastest * case.P / (case.v * needed), case.psi), np.inf)
            hi = np.minimum(hi, period)
    return _unless(possible & (hi > 0), 0.0, hi)


def well_holds(case: Case):
    """Whether a pixel holds the electrons that the signal-to-noise ratio takes; so it is where nothing is stated."""
    with np.errstate(invalid="ignore"):
        return ~(electrons_for(case.brief.snr, case.variance) > case.saturation * (1 + EDGE))


def perspective(case: Case):
    """The scale changes little enough from the part's farthest to its nearest surface."""
    deep, k = case.A + case.B, case.brief.max_perspective
    pupil = _largest(case.phi * (case.A + deep / k) - case.psi)
    with np.errstate(divide="ignore", invalid="ignore"):
        shear = 2 * deep * np.tan(case.telecentricity)
        tilted = np.where(shear == 0, np.inf, k * np.hypot(case.w, case.h) / shear)
    return 0.0, np.where(case.telecentric, tilted, pupil)


def line_rate(case: Case):
    """The camera takes rows as fast as the part moves on by one pixel."""
    return 0.0, fastest_rows(case) * case.P / case.v


def fastest_rows(case: Case):
    """Rows in a second that the line rate and the shortest exposure, or the pulse, allow; NaN for no stated rate."""
    shortest = case.t_min if case.brief.pulse is None else case.brief.pulse
    return np.where(np.isnan(case.line_rate), np.nan, np.fmin(case.line_rate, 1 / shortest))


def _unless(possible, lo, hi):
    """(lo, hi) where possible, else no magnification at all."""
    return np.where(possible, lo, NEVER[0]), np.where(possible, hi, NEVER[1])


def _largest(inverse):
    """Hi = 1/inverse; no bound where that is not positive."""
    with np.errstate(divide="ignore"):
        return np.where(inverse > 0, 1 / inverse, np.inf)


def _positive_root(square, linear, constant):
    """m > 0 with square m² + linear m = constant; infinite where there is none. square ≥ 0, constant > 0."""
    with np.errstate(divide="ignore", invalid="ignore"):
        root = np.sqrt(linear * linear + 4 * square * constant)
        return np.where(linear >= 0, 2 * constant / (linear + root), (root - linear) / (2 * square))


def _line_period_root(most, psi):
    """m with m (1 + m ψ)² = most, by the hyperbolic form of the cubic's one real root."""
    with np.errstate(divide="ignore", invalid="ignore"):
        root = 4 / 3 * np.sinh(np.arcsinh(np.sqrt(27 * most * psi) / 2) / 3) ** 2
        return np.where(psi == 0, most, root / psi)
