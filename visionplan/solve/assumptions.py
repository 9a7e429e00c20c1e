"""What a judgement takes for granted, in sentences: what catalogue and brief leave out, and what to watch."""

import numpy as np

from visionplan.catalogue.items import Table
from visionplan.optics.mounts import FLANGE_DISTANCE
from visionplan.solve.ask import DEFAULT_CABLE_ROOM, DEFAULT_MOSAIC
from visionplan.solve.case import Case
from visionplan.solve.figures import longest_exposure, saturation_time
from visionplan.solve.problem import DEFAULT_TRANSMITTANCE

TABULATED = ("water", "PMMA", "acrylic", "polycarbonate")
"""Materials taken at their index for 588 nm."""


def assumptions(case: Case, m: float | None, snr_corner: float | None) -> tuple[str, ...]:
    """Of one rig (a case of scalars) at its working point."""
    told = [*_lens(case), *_camera(case), *_brief(case)]
    if m is not None:
        told += _warnings(case, m, snr_corner)
    return tuple(told)


def _lens(case: Case) -> list[str]:
    lenses, row = case.problem.catalogue.lenses, case.lenses
    told = []
    if case.telecentric:
        if _missing(lenses, "working distance tolerance", row):
            told.append("The lens states no tolerance of its working distance: taken as 0.")
    else:
        if _missing(lenses, "pupil ratio", row):
            told.append("The lens states no pupil ratio: taken as 1.")
        if _missing(lenses, "front principal", row):
            told.append(_principal(lenses, row))
    if (case.ask.irradiance is not None or case.brief.snr is not None) and _missing(lenses, "transmittance", row):
        told.append(f"The lens states no transmittance: taken as {DEFAULT_TRANSMITTANCE}.")
    return told


def _principal(lenses: Table, row: int) -> str:
    if not _missing(lenses, "nearest magnification", row):
        return "The front principal plane follows from the lens's nearest distance and magnification."
    taken = "at the lens front" if _missing(lenses, "length", row) else "half the lens length behind its front"
    return f"The front principal plane is taken {taken}: the working distance is approximate, set it by a target."


def _camera(case: Case) -> list[str]:
    catalogue, row = case.problem.catalogue, case.cameras
    cameras, told = catalogue.cameras, []
    if not cameras["colour"][row]:
        told.append("The camera states no colour: its sampling is counted as of a mono camera.")
    if case.ask.irradiance is not None or case.brief.snr is not None:
        missing = [name for name in ("dark noise", "saturation capacity", "bit depth") if _missing(cameras, name, row)]
        if missing:
            told.append(f"The camera states no {' and no '.join(missing)}: left out of the noise.")
    told += _flange(cameras, row, "camera")
    told += _flange(catalogue.lenses, case.lenses, "lens")
    same = cameras["mount"][row] == catalogue.lenses["mount"][case.lenses]
    if same and case.problem.flange_unknown[0][row] and case.problem.flange_unknown[1][case.lenses]:
        told.append(
            f"Neither camera nor lens states the flange distance of their {cameras['mount'][row]} mount: alike."
        )
    return told


def _flange(table: Table, row: int, item: str) -> list[str]:
    mount = table["mount"][row]
    if mount in FLANGE_DISTANCE and _missing(table, "flange distance", row):
        return [f"The {item} states no flange distance: {FLANGE_DISTANCE[mount]} mm by its {mount} mount."]
    return []


def _brief(case: Case) -> list[str]:
    brief, told = case.brief, []
    if brief.headroom is not None and brief.cable_room is None:
        told.append(f"Room for the cable behind the camera: {DEFAULT_CABLE_ROOM:g} mm.")
    if brief.mosaic_factor is None and case.problem.catalogue.cameras["colour"][case.cameras] == "colour":
        told.append(f"A colour camera's pixels count {DEFAULT_MOSAIC} times (common practice).")
    if any(layer.index > 1.2 for layer in brief.layers):
        told.append("Heights of the part are taken in air, also inside a liquid.")
    if any(layer.material in TABULATED for layer in brief.layers):
        told.append("Water and plastics are taken at their index for 588 nm.")
    if brief.pulse is not None and case.v > 0:
        told.append("The light pulse stops the motion: ambient light is kept out, and all rows expose during it.")
    return told


def _warnings(case: Case, m: float, snr_corner: float | None) -> list[str]:
    told = []
    fills = saturation_time(case, m)
    if not np.isnan(case.t_min) and fills < case.t_min:
        told.append("Warning: the light fills a pixel in less than the camera's shortest exposure.")
    if case.brief.snr is not None and snr_corner is not None and snr_corner < case.brief.snr:
        told.append(f"Warning: in the corner of the picture the signal-to-noise ratio falls to {snr_corner:.3g}.")
    if np.isinf(longest_exposure(case, m)) and case.ask.irradiance is not None:
        told.append("Nothing limits the exposure: the one that just fills a pixel is taken.")
    return told


def _missing(table: Table, column: str, row: int) -> bool:
    return bool(np.isnan(table[column][row]))
