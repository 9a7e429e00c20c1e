"""The set-up sheet: everything a fitter needs to mount one rig, and to prove with a ruler that it is right."""

import math
from collections.abc import Iterator, Sequence

from visionplan.catalogue.items import Table
from visionplan.optics.depth import classic_limits
from visionplan.optics.mounts import thread
from visionplan.report.between import layers, mirror
from visionplan.report.cautions import cautions
from visionplan.report.elevation import elevation
from visionplan.report.figures import field, grid, room
from visionplan.report.page import Section, page_markdown, page_text
from visionplan.report.words import lacking, misses, pinch_words
from visionplan.solve import advice
from visionplan.solve.acceptance import Acceptance, acceptance
from visionplan.solve.rig import Rig
from visionplan.solve.tolerance import Yield, yield_of
from visionplan.text import figure
from visionplan.units import show

CELLS = 80
DRAWING = 14
"""Lines of the elevation."""

Row = tuple[str, str]


def sheet(rig: Rig, system: str = "mm", as_markdown: bool = False, level: int = 1) -> str:
    """The sheet of one rig as plain text of 80 columns, or as Markdown under a heading of that level.

    The working distance is rounded to 10, 5 or 1 mm where the rig keeps its grade; a rig that stands already is taken
    as it stands.
    """
    rig = as_set(rig)
    title = f"Set-up sheet: {rig.camera} with {rig.lens}"
    if as_markdown:
        return page_markdown(title, sections(rig, system), level)
    return page_text(title, sections(rig, system), CELLS)


def as_set(rig: Rig) -> Rig:
    """The rig at the working distance that the sheet sets."""
    stands = not math.isnan(rig.case.M) and not rig.case.telecentric
    round_ = None if stands or not rig.fits else advice.distance(rig)
    return round_.rig if round_ else rig


def sections(rig: Rig, system: str = "mm") -> Iterator[Section]:
    """What stands on the sheet, of a rig as it is set."""
    yield Section("What it is for", rows=list(_head(rig, system)))
    if rig.magnification is None:
        yield Section("Nothing to set up", points=[f"It misses {miss}." for miss in misses(rig, system)])
        return
    yield Section("Mount, in this order", steps=list(_steps(rig, system)))
    yield Section("Set", rows=list(_settings(rig, system)))
    yield Section("Prove it with a ruler", points=list(_proof(rig, system)))
    yield Section("What to expect", rows=list(_expected(rig, system)))
    yield Section("Mirror and layers", rows=[*mirror(rig, system), *layers(rig, system)])
    yield Section("Elevation", drawing=elevation(rig, CELLS, DRAWING, system=system))
    yield Section("Cautions", points=cautions(rig))
    yield Section("Assumed and unknown", points=[*_unknown(rig), *rig.assumptions])


def _head(rig: Rig, system: str) -> Iterator[Row]:
    problem = rig.case.problem
    yield "cell", problem.brief.title or problem.brief.source or "without a title"
    if rig.fits:
        yield "judged", f"{rig.grade}: {room(rig.latitude)} of room, pinch {pinch_words(rig)}"
    else:
        yield "judged", f"DOES NOT FIT: misses {'; '.join(misses(rig, system)) or 'its span is empty'}"
    yield "catalogue", problem.catalogue.fingerprint[:23] + "…"


def _steps(rig: Rig, system: str) -> Iterator[str]:
    case, catalogue = rig.case, rig.case.problem.catalogue
    camera, lens = catalogue.cameras, catalogue.lenses
    if rig.grid != (1, 1):
        apart = _pitch(rig, system)
        yield f"{grid(rig)} cameras, across × along the field, {apart} from axis to axis; each as follows."
    name = f"Camera {rig.camera} ({camera['mount'][case.cameras]} mount), square over the field's middle"
    if case.line:
        side = "height" if rig.orientation == "portrait" else "width"
        yield f"{name}, its row along the field's {side}, square across the motion."
    else:
        yield f"{name}, {_orientation(rig)}"
    for row in _stacked(rig):
        yield _ring(catalogue.spacers, row, system)
    stack = "on the rings above, no other" if rig.spacers else "on the camera, no spacer ring"
    yield f"Lens {rig.lens} ({lens['mount'][case.lenses]} mount) {stack}, screwed home."


def _stacked(rig: Rig) -> list[int]:
    """Rows of the rig's rings from the camera on: those of its thread, an adapter, those of the lens's thread."""
    catalogue = rig.case.problem.catalogue
    spacers, of_camera = catalogue.spacers, thread(catalogue.cameras["mount"][rig.case.cameras])

    def place(row: int) -> int:
        lens_side, camera_side = spacers["mount"][row], spacers["camera mount"][row] or spacers["mount"][row]
        return 1 if thread(lens_side) != thread(camera_side) else 0 if thread(lens_side) == of_camera else 2

    return sorted((spacers["id"].index(ring) for ring in rig.spacers), key=place)


def _ring(spacers: Table, row: int, system: str) -> str:
    length, travel = (float(spacers[name][row]) for name in ("length", "travel"))
    camera_side, lens_side = spacers["camera mount"][row], spacers["mount"][row]
    adapts = camera_side and thread(camera_side) != thread(lens_side)
    name = (
        f"Adapter {spacers['id'][row]}, {camera_side} to {lens_side}" if adapts else f"Spacer ring {spacers['id'][row]}"
    )
    turns = "" if math.isnan(travel) else f", a helicoid that lengthens by up to {show(travel, 'mm', system)}"
    return f"{name}, {show(length, 'mm', system)}{turns}."


def _orientation(rig: Rig) -> str:
    if rig.orientation == "portrait":
        return (
            "turned by 90°: the sensor's long side along the field's height, the camera's top to the left; turn the "
            "picture by 90° in the software."
        )
    return "the sensor's long side along the field's width, the camera's top towards the far edge of the field."


def _pitch(rig: Rig, system: str) -> str:
    ask, overlap = rig.case.ask, rig.case.brief.overlap
    sides = zip(rig.grid, (ask.W_all, ask.H_all))
    return " × ".join(show((side - overlap) / count, "mm", system) for count, side in sides if count > 1)


def _settings(rig: Rig, system: str) -> Iterator[Row]:
    case, brief, m = rig.case, rig.case.brief, rig.magnification or 0.0

    def length(value: float) -> str:
        return show(float(value), "mm", system)

    fitting = f"; {', '.join(map(figure, rig.stops))} fit" if len(rig.stops) > 1 else ""
    yield "f-stop", f"{figure(rig.stop)}, locked{fitting}"
    tolerance = brief.working_distance_tolerance
    within = f" ± {length(tolerance)}" if tolerance else ""
    distance = length(rig.working_distance or 0.0)
    distance = distance.removesuffix(" " + distance.rpartition(" ")[2]) + within if within else distance
    yield "working distance", f"{distance}, lens's front rim to {_reference(rig, system)}"
    if rig.fits:
        near, far = (length(end) for end in advice.distances(rig, keep_grade=False))
        yield "may stand", f"from {near} to {far}: there all that is asked holds"
    yield "focus on", _focus_plane(rig, system)
    if case.telecentric:
        yield "focus ring", "none: a telecentric lens is in focus at its working distance"
    elif math.isnan(case.e) or math.isnan(case.x):
        yield "focus ring", f"extension {length(case.f * m)}; its travel is not known"
    else:
        out = case.f * m - case.e
        helicoid = ", the helicoid's travel counted" if case.y else ""
        yield (
            "focus ring",
            f"out by {figure(out, 3)} of {length(case.x + case.y)} from its infinity stop{helicoid}; lock it",
        )
    yield "exposure", _exposure(rig)
    yield "light", _light(rig)
    if case.line and case.v:
        yield "line rate", f"{show(case.v * m / case.P, '1/s')}, at {show(case.v, 'mm/s', system)}"
    yield "picture", _picture(rig)


def _reference(rig: Rig, system: str) -> str:
    brief = rig.case.brief
    parts = [
        f"{show(brief.above, 'mm', system)} under the part's top" if brief.above else "",
        f"{show(brief.below, 'mm', system)} over its foot" if brief.below else "",
    ]
    told = " and ".join(filter(None, parts))
    folded = ", along the folded path" if brief.fold else ""
    return f"the reference plane{' (' + told + ')' if told else ''}{folded}"


def _focus_plane(rig: Rig, system: str) -> str:
    z = rig.case.z
    if not z:
        return "the reference plane"
    return f"a plane {show(abs(z), 'mm', system)} {'over' if z > 0 else 'under'} the reference plane"


def _exposure(rig: Rig) -> str:
    pulse = rig.case.brief.pulse
    if pulse is not None:
        return f"by the light pulse of {show(pulse, 's')}, ambient light kept out"
    return "nothing limits it" if rig.exposure is None else f"at most {show(rig.exposure, 's')}"


def _light(rig: Rig) -> str:
    brief, wavelength = rig.case.brief, f"{show(rig.case.lam, 'mm')}"
    if brief.illuminance is not None or brief.irradiance is not None:
        level = show(brief.illuminance, "lx") if brief.illuminance is not None else show(brief.irradiance, "W/m^2")
        return f"{level} on the part, {wavelength}"
    if rig.needed_illuminance is not None:
        return f"at least {show(rig.needed_illuminance, 'lx')} on the part, {wavelength}"
    return f"no level asked; {wavelength} assumed"


def _picture(rig: Rig) -> str:
    fold = rig.case.brief.fold
    upright = "inverted by the lens, read out upright (common practice); if not, set ReverseX and ReverseY (GenICam)"
    if fold is None or not fold.mirrors % 2:
        return upright + ("" if fold is None else f"; {fold.mirrors} mirrors leave it true to side")
    by = "the fold mirror" if fold.mirrors == 1 else f"{fold.mirrors} mirrors"
    return f"mirrored by {by}: set ReverseX for a fold sideways, ReverseY for one up or down; {upright}"


def _proof(rig: Rig, system: str) -> Iterator[str]:
    checks = acceptance(rig, 25.4 if system == "inch" else 1.0)
    for check in checks:
        yield _ruler(rig, check, system)
    if len(checks) == 2:
        yield _square(checks, system)
    yield "Does a count miss? `visionplan asbuilt` tells from it what is off and by how much to move."


def _square(checks: Sequence[Acceptance], system: str) -> str:
    """What being out of square does to a target laid across the tilt."""
    wide, high = checks
    left, top = (
        f"{figure(own.degree * other.pixels / own.pixels, 2)} on {show(other.length, 'mm', system)}"
        for own, other in ((wide, high), (high, wide))
    )
    return (
        "Along the left and right edge a target must span the same, and so along top and bottom: each degree out of "
        f"square is a difference of {left} and {top} there."
    )


def _ruler(rig: Rig, check: Acceptance, system: str) -> str:
    where = "On the reference plane, in the middle of the picture, " if check.along == "width" or rig.case.line else ""
    bounds = f"under {check.least}" if check.most is None else f"under {check.least} or over {check.most}"
    target = f"a {show(check.length, 'mm', system)} target along the {check.along} must span {check.pixels}"
    told = f"{where}{target} ± {check.room} pixels; {bounds} a demand breaks."
    return told[0].upper() + told[1:]


def _expected(rig: Rig, system: str) -> Iterator[Row]:
    case, m = rig.case, rig.magnification or 0.0

    def length(value: float | None) -> str:
        return show(value, "mm", system)

    yield "magnification", figure(m)
    yield "field", f"{field(rig, system)} at the focus plane"
    yield "sampling", f"{length(rig.sampling)} a pixel there"
    yield "depth", f"{length(rig.depth[0])} towards the lens, {length(rig.depth[1])} away from it"
    if not case.telecentric:
        s = case.f * (1 + 1 / m)
        near, far = (float(end) for end in classic_limits(case.f, case.N, case.P, s))
        behind = "all that is farther" if math.isinf(far) else f"{length(far - s)} away"
        yield (
            "classic depth",
            f"one pixel of blur: {length(s - near)} towards, {behind}; hyperfocal {length(rig.hyperfocal)}",
        )
    if rig.snr is not None:
        corner = f", {figure(rig.snr_corner, 3)} in the corner" if rig.snr_corner is not None else ""
        yield "signal to noise", f"{figure(rig.snr, 3)}{corner}"
    if rig.contrast is not None:
        planes = (rig.contrast.focus, rig.contrast.above, rig.contrast.below)
        focus, above, below = (show(value, "1", percent=True, digits=3) for value in planes)
        yield "contrast", f"{focus} of the smallest feature in focus, {above} nearest, {below} farthest"
    yield "to camera back", f"{length(rig.length)} from the reference plane, cable not counted"
    borne = yield_of(rig)
    if borne is not None:
        yield "yield", yield_words(borne)


def yield_words(borne: Yield) -> str:
    """A yield with its interval, what was drawn, and what fails most often."""
    low, high = (show(end, "1", percent=True, digits=4) for end in (borne.low, borne.high))
    share = show(borne.share, "1", percent=True, digits=4)
    drawn = [f"distance ± {figure(borne.distance_tolerance)} mm"] if borne.distance_tolerance else []
    drawn += [f"focal length ± {show(borne.focal_tolerance, '1', percent=True)}"] if borne.focal_tolerance else []
    fails = f"; {borne.weakest} fails most often" if borne.weakest else ""
    unknown = "; the lens states no focal tolerance" if borne.focal_tolerance is None else ""
    return f"{share} (95 %: {low} to {high}) with {', '.join(drawn) or 'no tolerance'}{fails}{unknown}"


def _unknown(rig: Rig) -> Iterator[str]:
    for verdict in rig.demands:
        if verdict.name in rig.unknown:
            yield f"Unknown: {verdict.name}, {lacking(rig, verdict)}."
