"""What targets in the picture tell of a rig as built: where it stands, what is off, and what to move."""

import math
from collections.abc import Iterator

from visionplan.report.figures import rings, room
from visionplan.report.page import Section, page_text
from visionplan.report.words import misses
from visionplan.solve.asbuilt import TAPE, AsBuilt, Cause
from visionplan.solve.target import Measured, Target, Tilt, certain
from visionplan.solve.tolerance import focal_tolerance
from visionplan.text import figure
from visionplan.units import show

Row = tuple[str, str]


def asbuilt_text(built: AsBuilt, system: str = "mm") -> str:
    """The diagnosis as plain text of 80 columns."""
    title = f"As built: {built.planned.camera} with {built.planned.lens}"
    return page_text(title, sections(built, system))


def sections(built: AsBuilt, system: str = "mm") -> Iterator[Section]:
    """What is told of a rig as built."""
    yield Section("Measured", rows=list(_measured(built, system)))
    yield Section("Where it stands", rows=list(_stands(built, system)))
    yield Section("What is off", points=list(_causes(built, system)))
    yield Section("To set it right", steps=list(_steps(built, system)))
    yield Section("After that", rows=list(_after(built, system)))
    yield Section("Taken for granted", points=list(_granted(built, system)))


def _measured(built: AsBuilt, system: str) -> Iterator[Row]:
    for target in built.targets:
        where = "" if target.at == "centre" else f", {_end(target, system)}"
        yield "target", f"{show(target.length, 'mm', system)} along the {target.along}{where}: {target.pixels:g} pixels"
    if built.taped is not None:
        yield "tape", f"{show(built.taped, 'mm', system)} from lens front to reference plane"


def _end(target: Target, system: str) -> str:
    return f"at the {target.at}" + ("" if target.off is None else f", {show(target.off, 'mm', system)} off the middle")


def _stands(built: AsBuilt, system: str) -> Iterator[Row]:
    m, plan = built.magnification, built.planned
    yield "magnification", f"{within(m)} in focus; planned {figure(plan.magnification)}"
    if plan.span is not None:
        lo, hi = plan.span
        side = "below" if m.value < lo else "above" if m.value > hi else "within"
        yield "span", f"{side} {figure(lo)} to {figure(hi)}" + _share(m.value, lo, hi)
    yield "working distance", f"{lengths(built.distance, system)}; planned {show(plan.working_distance, 'mm', system)}"
    if built.focal_length is not None:
        stated = show(plan.case.f, "mm", system)
        yield "focal length", f"{lengths(built.focal_length, system)} by tape and target; stated {stated}"
    for tilt in built.tilts:
        yield "tilt", _tilt(tilt)
    if built.found.fits:
        yield "as it stands", f"all that is asked holds: {built.found.grade}, {room(built.found.latitude)} of room"
    else:
        yield "as it stands", f"misses {'; '.join(misses(built.found, system)) or 'its span'}"


def _share(m: float, lo: float, hi: float) -> str:
    return f", {100 * (m - lo) / (hi - lo):.0f} % of the way up" if lo < m < hi else ""


def within(measured: Measured, scale: float = 1.0) -> str:
    """A figure with what it may be off, no more digits than that leaves it."""
    off = max(abs(end - measured.value) for end in (measured.low, measured.high)) / scale
    places = max(0, 1 - math.floor(math.log10(off))) if off else 4
    return f"{measured.value / scale:.{places}f} ± {figure(off, 2)}"


def lengths(measured: Measured, system: str, sign: float = 1.0) -> str:
    """The same of a length, in the unit that people read."""
    scale, unit = (25.4, "in") if system == "inch" else (1.0, "mm")
    signed = Measured(*(sign * end for end in (measured.value, measured.low, measured.high)))
    return f"{within(signed, scale)} {unit}"


def _tilt(tilt: Tilt) -> str:
    angle = tilt.angle
    degrees = Measured(*(math.degrees(end) for end in (angle.value, angle.low, angle.high)))
    if not certain(tilt):
        most = max(abs(degrees.low), abs(degrees.high))
        return f"along the {tilt.along} none that the pixels show: at most {figure(most, 2)} deg"
    if tilt.nearer is None:
        size = f"{figure(degrees.low, 2)} to {figure(degrees.high, 2)} deg"
        return f"{size} along the {tilt.along}; a target at each end would tell to which side"
    size = within(Measured(abs(degrees.value), *sorted((abs(degrees.low), abs(degrees.high)))))
    return f"{size} deg along the {tilt.along}, nearer at the {tilt.nearer}: {_keystone(tilt)}"


def _keystone(tilt: Tilt) -> str:
    return f"the picture is {show(tilt.keystone, '1', percent=True, digits=2)} larger at that edge"


def _causes(built: AsBuilt, system: str) -> Iterator[str]:
    square = [tilt for tilt in built.tilts if certain(tilt)]
    if not built.causes and not square:
        yield "Nothing that the measurement can tell from the plan."
    if not built.certain and len(built.causes) > 1:
        yield "Any one of these alone would show so; a taped distance tells them apart."
    for cause in built.causes:
        yield _cause(built, cause, system)
    for tilt in square:
        yield f"Out of square along the {tilt.along}, by {show(abs(tilt.angle.value), 'rad', digits=2)}."


def _cause(built: AsBuilt, cause: Cause, system: str) -> str:
    if cause.kind == "distance" and cause.off is not None:
        way = "far" if cause.off.value > 0 else "near"
        return f"Distance: the lens stands {lengths(cause.off, system, -1 if cause.off.value < 0 else 1)} too {way}."
    if cause.kind == "focal length" and cause.off is not None:
        percent = Measured(*(100 * abs(end) for end in (cause.off.value, cause.off.low, cause.off.high)))
        way = "long" if cause.off.value > 0 else "short"
        stated = "the lens states no tolerance"
        if focal_tolerance(built.planned.case) is not None:
            stated = "within the tolerance that the lens states" if cause.allowed else "more than the lens's tolerance"
        return f"Focal length: {figure(percent.value, 2)} % too {way}; {stated}."
    if cause.kind == "lens":
        named = f": it may be {', '.join(cause.ids)}" if cause.ids else ", and none of the catalogue would show so"
        return f"Another lens than planned{named}."
    named = f"; in reach with {', or '.join(cause.ids)}" if cause.ids else ""
    told = f"Rings: with {rings(built.planned)} this magnification is out of focus{named}"
    return f"{told}. Or the picture isn't sharp."


def _steps(built: AsBuilt, system: str) -> Iterator[str]:
    kinds = {cause.kind for cause in built.causes}
    if built.certain and "lens" in kinds:
        yield f"Read the marking on the lens: {built.planned.lens} was planned. What follows is for the one that is on."
    if built.corrected.spacers != built.planned.spacers or "rings" in kinds:
        yield f"Rings: {rings(built.corrected)}."
    for tilt in built.tilts:
        if certain(tilt):
            by = show(abs(tilt.angle.value), "rad", digits=2)
            at = f": away from the {tilt.nearer} end" if tilt.nearer else ""
            yield f"Square up the camera by {by} along the {tilt.along}{at}."
    move = built.move
    if not move.low <= 0 <= move.high:
        way, sign = ("away from the part", 1) if move.value > 0 else ("towards the part", -1)
        goal = show(built.distance.value + move.value, "mm", system)
        yield f"Move the camera {lengths(move, system, sign)} {way}, to {goal} from lens front to reference plane."
        yield "Focus anew, and measure again."
    elif not kinds:
        yield "Nothing to move."


def _after(built: AsBuilt, system: str) -> Iterator[Row]:
    rig = built.corrected
    if rig.fits:
        yield "judged", f"all that is asked holds: {rig.grade}, {room(rig.latitude)} of room"
    else:
        yield "judged", f"it still misses {'; '.join(misses(rig, system)) or 'its span'}"
    yield "magnification", figure(rig.magnification)


def _granted(built: AsBuilt, system: str) -> Iterator[str]:
    yield "Pixels are counted to half a pixel at either end of a target, each picture in focus."
    raised = f"{show(built.height, 'mm', system)} over" if built.height else "on"
    yield f"The targets lie {raised} the reference plane."
    if built.taped is not None:
        yield f"A tape tells a distance to {show(TAPE, 'mm', system)}."
    if built.planned.case.telecentric:
        yield "A telecentric lens has one magnification: it tells the lens, never the distance."
    elif built.taped is None:
        yield "The focal length is taken as stated; were it 1 % off, the move would be 1 % off, no more."
    yield from (told for told in built.planned.assumptions if "principal plane" in told)
