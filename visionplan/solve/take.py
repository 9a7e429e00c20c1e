"""Taking a concession: what it means in the brief's own lines, and whether the brief so changed fits something."""

import math
from collections.abc import Callable
from dataclasses import dataclass, replace
from math import tan

from visionplan.brief.edit import drop_line, set_line
from visionplan.brief.model import Brief
from visionplan.brief.read import parse_brief
from visionplan.catalogue.items import Catalogue
from visionplan.faults import InputError
from visionplan.solve.ask import Ask
from visionplan.solve.rig import Concession
from visionplan.solve.search import rank

Lines = dict[str, str | None]
"""By section.key what a line is to say, as a person types it; None for a line to drop."""

FURTHER = (0.0, 0.001, 0.01, 0.05)
"""By how much more than what is needed a demand gives way, tried one after the other, as a share of it: the change may
move what other demands see, the focus plane for one."""
_DIGITS = 4


@dataclass(frozen=True)
class Taken:
    """A concession in the brief."""

    text: str
    """The brief's text with it."""
    lines: Lines
    further: float
    """By how much more than needed it gave way."""
    fitting: int
    """How many pairs fit then."""


def take(text: str, name: str, catalogue: Catalogue, concession: Concession) -> Taken:
    """Write a concession into a brief's text, going a touch further where what is needed alone lets nothing fit.

    Where even that lets nothing fit, the change is the one that is needed and `fitting` is 0.

    Raises
    ------
    InputError
        Where the brief can't say it, because another line forbids it.
    """
    first: Taken | None = None
    for further in FURTHER:
        brief = parse_brief(text, name)
        lines = lines_for(brief, concession, further)
        try:
            changed = apply(text, lines)
            fitting = rank(parse_brief(changed, name), catalogue, top=1, concessions=False).fitting
        except InputError:
            if first is None:
                raise
            break
        taken = Taken(changed, lines, further, fitting)
        if fitting:
            return taken
        first = first or taken
    assert first
    return first


def apply(text: str, lines: Lines) -> str:
    """Set and drop lines of a brief's text."""
    for key, value in lines.items():
        text = drop_line(text, key) if value is None else set_line(text, key, value)
    return text


def lines_for(brief: Brief, concession: Concession, further: float = 0.0) -> Lines:
    """What a concession means in the brief's own lines.

    Numbers are rounded to the side that asks for less; `further` is the share of what is needed to go beyond it.
    """
    sign = 1 if concession.needed > concession.asked else -1
    given = replace(concession, needed=concession.needed * (1 + sign * further))
    return _MEANINGS[concession.demand](brief, given)


def _number(value: float, up: bool, digits: int = _DIGITS) -> str:
    """A number in so many digits, rounded up or down."""
    if value <= 0:
        return "0"
    exponent = math.floor(math.log10(value)) - digits + 1
    steps = value / 10.0**exponent
    whole = math.ceil(steps * (1 - 1e-9)) if up else math.floor(steps * (1 + 1e-9))
    return f"{float(f'{whole}e{exponent}'):.12g}" if whole else "0"


def _length(brief: Brief, value: float, up: bool) -> str:
    return f"{_number(value / 25.4, up)} in" if brief.units == "inch" else f"{_number(value, up)} mm"


def _looser(concession: Concession) -> bool:
    """Whether more asks for less."""
    return concession.needed > concession.asked


def _plain(key: str, unit: str = "", factor: float = 1.0) -> Callable[[Brief, Concession], Lines]:
    """One line that says what is needed."""

    def meaning(brief: Brief, concession: Concession) -> Lines:
        return {key: f"{_number(factor * concession.needed, _looser(concession))}{unit}"}

    return meaning


def _of_length(key: str) -> Callable[[Brief, Concession], Lines]:
    return lambda brief, concession: {key: _length(brief, concession.needed, _looser(concession))}


def _cover(brief: Brief, concession: Concession) -> Lines:
    """The field alone gives way where it can; else the play of the part with it."""
    factor = concession.needed
    kept = 2 * brief.placement + (brief.max_count - 1) * brief.overlap
    sides = [factor * (side + kept) - kept for side in brief.field]
    lines: Lines = {}
    if min(sides) <= 0:
        sides = [factor * side for side in brief.field]
        lines["scene.placement"] = _length(brief, factor * brief.placement, up=False)
    width, height = (_length(brief, side, up=False) for side in sides)
    return {"scene.field": f"{width}, {height}"} | lines


def _sampling(brief: Brief, concession: Concession) -> Lines:
    pixels = _number(brief.feature / concession.needed, up=False)
    return _without(brief, "scene.task") | {"scene.pixels_per_feature": pixels}


def _without(brief: Brief, key: str) -> Lines:
    return {key: None} if key in brief.stated else {}


def _reach(brief: Brief, concession: Concession) -> Lines:
    near, far = brief.working_distance
    ends = (
        (_length(brief, concession.needed, up=False), _exact(brief, far))
        if concession.end == "nearer"
        else (_exact(brief, near), _length(brief, concession.needed, up=True))
    )
    return {"station.working_distance": ", ".join(ends)}


def _exact(brief: Brief, value: float) -> str:
    return f"{value / 25.4:.12g} in" if brief.units == "inch" else f"{value:.12g} mm"


def _near_depth(brief: Brief, concession: Concession) -> Lines:
    return _shallower(brief, concession, "scene.above", "scene.below", brief.above, brief.below, 1)


def _far_depth(brief: Brief, concession: Concession) -> Lines:
    return _shallower(brief, concession, "scene.below", "scene.above", brief.below, brief.above, -1)


def _shallower(
    brief: Brief, concession: Concession, key: str, other_key: str, height: float, other: float, side: int
) -> Lines:
    """A part that reaches less far to one side of the focus plane; where that isn't enough, less slack."""
    ask = Ask(brief)
    slack = concession.asked - (ask.A if side > 0 else ask.B)
    reach = concession.needed - slack
    lines: Lines = {}
    if reach < 0:
        lines |= _slack(brief, concession.needed, slack)
        reach = 0.0
    if brief.focus_plane is None:
        # focus in the middle: both ends count half
        lines |= {key: _length(brief, max(2 * reach - other, 0.0), up=False)}
        if 2 * reach < other:
            lines |= {other_key: _length(brief, 2 * reach, up=False)}
    else:
        lines |= {key: _length(brief, max(reach + side * brief.focus_plane, 0.0), up=False)}
    return lines


def _slack(brief: Brief, needed: float, slack: float) -> Lines:
    """Less tolerance of the distance, and no tilt where that is not enough."""
    of_tilt = slack - brief.working_distance_tolerance
    if needed > of_tilt:
        return {"station.working_distance_tolerance": _length(brief, needed - of_tilt, up=False)}
    degrees = math.degrees(math.atan(tan(brief.tilt) * needed / of_tilt))
    return _without(brief, "station.working_distance_tolerance") | {"station.tilt": f"{_number(degrees, False)} deg"}


def _motion(brief: Brief, concession: Concession) -> Lines:
    if brief.motion_blur is not None:
        return {"motion.blur": _length(brief, concession.needed, up=True)}
    return {"motion.blur_pixels": _number(concession.needed / Ask(brief).q, up=True)}


_MEANINGS: dict[str, Callable[[Brief, Concession], Lines]] = {
    "cover": _cover,
    "sampling": _sampling,
    "reach": _reach,
    "headroom": _of_length("station.headroom"),
    "near depth": _near_depth,
    "far depth": _far_depth,
    "rayleigh": _of_length("scene.feature"),
    "lens detail": _of_length("scene.feature"),
    "light": _plain("light.snr"),
    "perspective": _plain("scene.max_perspective", " %", 100),
    "line rate": _plain("motion.speed", " mm/s"),
    "motion": _motion,
    "frame rate": _plain("motion.rate", " / s"),
    "distortion": _plain("choose.max_distortion", " %", 100),
    "price": _plain("choose.max_price"),
}
