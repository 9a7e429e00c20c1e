"""What lies between lens and part, for the sheet: fold mirrors and layers."""

import math
from collections.abc import Iterator

from visionplan.optics.media import lateral_error, mirror_footprint, mirror_offset, plate_shift
from visionplan.solve.case import Case
from visionplan.solve.rig import Rig
from visionplan.text import figure
from visionplan.units import show

Row = tuple[str, str]


def mirror(rig: Rig, system: str = "mm") -> Iterator[Row]:
    """Place and least size of the first fold mirror at 45°; nothing without one."""
    case, fold, m = rig.case, rig.case.brief.fold, rig.magnification
    if fold is None or m is None:
        return
    place = f"its middle {show(fold.from_lens, 'mm', system)} from the lens front, on the axis, at 45°"
    yield "mirror", place + ("" if fold.mirrors == 1 else f"; the first of {fold.mirrors}, the others larger")
    sides = {"height": (case.h / m, case.w / m), "width": (case.w / m, case.h / m)}
    for along, (down, across) in sides.items():
        length, width, off = footprint(case, m, fold.from_lens, down, across)
        if math.isnan(length) or math.isnan(width):
            told = "no mirror fits there: it would reach through the lens or the part"
        else:
            size = f"{show(length, 'mm', system)} down its slope × {show(width, 'mm', system)} across"
            told = f"at least {size}, set {show(off, 'mm', system)} down the slope"
        yield f"folding {along}", f"{told}: what the field's edges and the open stop need, no margin"


def footprint(case: Case, m: float, from_lens: float, down: float, across: float) -> tuple[float, float, float]:
    """Length down the slope, width across it, and how far down the slope its middle lies; NaN where there is no room.

    The layers lie behind the mirror and bring the field nearer, as everywhere. A telecentric lens's light widens from
    every point of the field by M/N: a cone that ends on the lens in a pupil as wide as field and cone together.
    """
    if case.telecentric:
        room = float(case.WD(m)) - case.D
        cone = m / case.N * room
        length = mirror_footprint(down, across, down + cone, room, from_lens)[0]
        width = mirror_footprint(across, across, across + cone, room, from_lens)[1]
        return float(length), float(width), float(mirror_offset(down, down + cone, room, from_lens))
    u = float(case.u(m))
    to_mirror = from_lens + case.a - case.f * (1 - case.psi)
    pupil = case.f / case.N
    length, width = mirror_footprint(down, across, pupil, u, to_mirror)
    return float(length), float(width), float(mirror_offset(down, pupil, u, to_mirror))


def layers(rig: Rig, system: str = "mm") -> Iterator[Row]:
    """What the layers do: shift, and the lateral error at the corner; nothing without any."""
    case, m, brief = rig.case, rig.magnification, rig.case.brief
    if not brief.layers or m is None:
        return
    angle = 0.0 if case.telecentric else math.atan(math.hypot(case.w, case.h) / (2 * m) / float(case.u(m)))
    shifts, off = [], 0.0
    for layer in brief.layers:
        shift = plate_shift(layer.thickness, layer.index)
        off += float(lateral_error(layer.thickness, layer.index, angle))
        name = layer.material or f"index {figure(layer.index)}"
        shifts.append(f"{show(layer.thickness, 'mm', system)} of {name} {show(float(shift), 'mm', system)}")
    yield "layers", f"bring the part nearer by {show(case.D, 'mm', system)} ({', '.join(shifts)}); counted in all above"
    pixels = figure(off * m / case.P, 2)
    yield "in the corner", f"a point is drawn {show(off, 'mm', system)} ({pixels} pixels) off, more the farther out"
