"""How the figures of a rig follow from its numbers, step by step, at its working point."""

import math
from collections.abc import Iterator

import numpy as np

from visionplan.optics.conjugates import object_distance
from visionplan.optics.depth import classic_limits
from visionplan.optics.media import lateral_error, plate_shift
from visionplan.report.figures import field, money
from visionplan.solve import figures as solved
from visionplan.solve.case import Case
from visionplan.solve.checks import combined_blur
from visionplan.solve.rig import Rig
from visionplan.text import clean, figure
from visionplan.units import show

Row = tuple[str, str]


def working_point(rig: Rig, system: str) -> Iterator[Row]:
    """Distances and f-number at the working point; nothing where no magnification will do."""
    case, m = rig.case, rig.magnification
    if m is None:
        return

    def length(value) -> str:
        return show(float(value), "mm", system)

    yield "m", f"{figure(m, 5)}, magnification"
    if case.telecentric:
        yield "WD", f"stated WD + D + z, within its tolerance moved into the range asked = {length(case.WD(m))}"
        yield "N_w", f"N = {figure(case.N)}, working f-number"
    else:
        yield "s", f"f (1 + 1/m) = {length(object_distance(case.f, m))}, focus plane to front principal plane"
        yield "u", f"f (1/m + 1/p) = {length(case.u(m))}, focus plane to entrance pupil"
        yield "WD", f"s − a + D + z = {length(case.WD(m))}, lens front to reference plane"
        yield "f m", f"{length(case.f * m)}, extension beyond infinity focus"
        yield "N_w", f"N (1 + m/p) = {figure(case.N_w(m))}, working f-number"
    yield "P/m", f"{length(case.P / m)} a pixel at the focus plane"
    yield "field", f"{field(rig, system)}, w/m and h/m there"
    if rig.length is not None:
        yield "to camera back", f"{length(rig.length)} from the reference plane, without the cable"


def figures(rig: Rig, system: str) -> Iterator[Row]:
    """What the rig yields at its working point; nothing where no magnification will do."""
    case, m = rig.case, rig.magnification
    if m is None:
        return
    yield from _blur(rig, case, m, system)
    yield from _exposure(rig, case, m)
    yield from _signal(rig, case, m)
    if rig.contrast:
        seen = rig.contrast
        planes = (("in focus", seen.focus), ("nearest", seen.above), ("farthest", seen.below))
        told = ", ".join(f"{_percent(value)} {where}" for where, value in planes)
        reversed_ = "; below 0 the pattern is reversed" if min(value for _, value in planes) < 0 else ""
        yield "contrast", f"{told}: diffraction, defocus and pixel at 1/(2 feature m){reversed_}"
    yield from _layers(case, m, system)
    if rig.price is not None:
        yield "price", f"{money(rig.price, case.problem.catalogue)}, all cameras, lenses and rings"


def _blur(rig: Rig, case: Case, m: float, system: str) -> Iterator[Row]:
    def length(value) -> str:
        return show(float(value), "mm", system)

    law = "N β/m" if case.telecentric else "N β u/f"
    near, far = rig.depth
    yield "depth", f"{law}: {length(near)} towards the lens, {length(far)} away from it"
    with np.errstate(divide="ignore"):
        blur = combined_blur(case, np.float64(m))
    yield (
        "combined blur",
        f"√(geometric² + (2.44 λ N_w/m)²) = {length(blur)}; of the stops with the best grade "
        "the one where it is least is taken",
    )
    if case.telecentric:
        return
    s = object_distance(case.f, m)
    nearest, farthest = (float(limit) for limit in classic_limits(case.f, case.N, case.P, s))
    yield (
        "classic limits",
        f"thin lens, blur of one pixel on the sensor: {length(s - nearest)} towards the lens, "
        f"{length(farthest - s)} away from it",
    )
    yield "hyperfocal", f"f²/(N P) + f = {length(rig.hyperfocal)}, for the same blur"


def _exposure(rig: Rig, case: Case, m: float) -> Iterator[Row]:
    brief = case.brief
    limits = []
    if brief.pulse is not None:
        limits.append(("the light pulse", brief.pulse))
    else:
        if case.v:
            limits.append(("β_v/v", case.beta_v / case.v))
        if brief.rate:
            limits.append(("1/rate", 1 / brief.rate))
        if brief.max_exposure is not None:
            limits.append(("the longest exposure asked", brief.max_exposure))
        if case.line and case.v:
            limits.append(("line period P/(m v)", case.P / (m * case.v)))
    full = float(solved.saturation_time(case, m))
    if not math.isnan(full):
        limits.append(("a full well", full))
    told = ", ".join(f"{name} = {show(value, 's')}" for name, value in limits)
    yield "exposure", f"{show(rig.exposure, 's')}, the least of {told}" if told else "nothing limits it"


def _signal(rig: Rig, case: Case, m: float) -> Iterator[Row]:
    irradiance, brief = case.ask.irradiance, case.brief
    if irradiance is not None:
        rate = float(solved.electron_rate(case, m, irradiance))
        level = f"{show(brief.illuminance, 'lx')} = " if brief.illuminance is not None else ""
        yield "E", f"{level}{show(irradiance, 'W/m^2')} on the part, ρ = {figure(brief.reflectance)}"
        if rig.exposure is not None and rig.snr is not None:
            electrons = rate * rig.exposure
            yield "n", f"η ρ E τ P² t λ/(4 N_w² h c) = {show(electrons, 'e', digits=5)} in a pixel"
            noise = f"{figure(electrons)}/√({figure(np.nan_to_num(case.variance))} + {figure(electrons)})"
            yield "SNR", f"n/√(σ² + n) = {noise} = {figure(rig.snr)}"
    if rig.snr_corner is not None:
        yield "SNR, corner", f"{figure(rig.snr_corner)}, by cos⁴ of tan⁻¹(half diagonal/(f (p + m)))"
    if rig.needed_illuminance is not None:
        yield "light needed", f"{show(rig.needed_illuminance, 'lx')} on the part for an SNR of {figure(brief.snr)}"


def _layers(case: Case, m: float, system: str) -> Iterator[Row]:
    if not case.brief.layers:
        return
    shifts, off = [], 0.0
    angle = 0.0 if case.telecentric else math.atan(math.hypot(case.w, case.h) / (2 * m) / case.u(m))
    for layer in case.brief.layers:
        shift = plate_shift(layer.thickness, layer.index)
        off += float(lateral_error(layer.thickness, layer.index, angle))
        name = clean(layer.material) or "layer"
        shifts.append(
            f"{name} {show(layer.thickness, 'mm', system)}, n = {figure(layer.index, 5)}: {show(shift, 'mm', system)}"
        )
    yield "D", f"Σ t (1 − 1/n) = {show(case.D, 'mm', system)}; {'; '.join(shifts)}"
    yield (
        "lateral error",
        f"{show(off, 'mm', system)} at the field's corner, {show(angle, 'rad')} off the axis: the layers' exact shift "
        "beside the paraxial one",
    )


def _percent(fraction: float) -> str:
    return show(fraction, "1", percent=True)
