"""Reading magnification and tilt off targets of known length in the picture.

The plane of the targets may be tilted by θ against the sensor. A point x along the tilt, measured on the plane from the
middle of the picture and positive where the plane comes nearer, lies U − x sinθ before the entrance pupil, U being the
pupil's distance in the middle, and x cosθ off the axis. Central projection draws it at m U/(distance), m the
magnification in the middle. With w = sinθ/U a target that lies across the tilt is drawn at m/(1 − w x), one along it,
from x₁ to x₂, at m cosθ/((1 − w x₁)(1 − w x₂)).
"""

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from math import acos, asin, cos, hypot, inf, isinf, sin, sqrt

ENDS = {"left": ("width", -1), "right": ("width", 1), "bottom": ("height", -1), "top": ("height", 1)}
"""End of the field → the side of the field it ends, and its sign there."""
READING = 1.0
"""How far off a count of pixels may be: half a pixel at either end of the target."""


@dataclass(frozen=True)
class Measured:
    """A figure and the range that the reading leaves it."""

    value: float
    low: float
    high: float

    def holds(self, value: float) -> bool:
        """Whether the range holds a value."""
        return self.low <= value <= self.high


@dataclass(frozen=True)
class Target:
    """A target of known length and what it spans in the picture."""

    length: float
    """mm"""
    pixels: float
    along: str = "width"
    """The side of the field that it lies along: width or height."""
    at: str = "centre"
    """centre, or the end of the field where it lies: left, right, top or bottom."""
    off: float | None = None
    """From the middle of the picture to that of the target, mm; None for as far out as the picture goes."""


@dataclass(frozen=True)
class Tilt:
    """How far the plane of the targets is out of square with the camera."""

    angle: Measured
    """rad; where `nearer` is known below 0 for left and bottom, else its modulus alone."""
    along: str
    """The side of the field that it runs along: width or height."""
    nearer: str | None
    """The end of the field that is nearer; None where it can't be told."""
    keystone: float
    """Scale at the nearer edge of the picture over that at the other, less 1."""


@dataclass(frozen=True)
class Reading:
    """What the targets say."""

    magnification: Measured
    """In the middle of the picture."""
    tilts: tuple[Tilt, ...]
    """At most one for each side of the field."""


def read(
    targets: Sequence[Target], pitch: float, sides: Mapping[str, float], pupil: Callable[[float], float]
) -> Reading:
    """Magnification and tilt.

    Tilt follows from two targets laid alike at both ends of a side; else, as a modulus, from one along the width and
    one along the height in the middle.

    Parameters
    ----------
    pitch : of the pixels, mm
    sides : of the picture on the sensor along "width" and "height", mm
    pupil : from the plane of the targets to the entrance pupil at a magnification, mm
    """
    tilted: tuple[Tilt, ...] = ()
    m = _middle(targets, pitch, sides, tilted, inf)
    for _ in range(4):  # tilt and magnification hang together in second order only
        distance = pupil(m.value)
        tilted = tuple(_tilts(targets, pitch, sides, m.value, distance))
        m = _middle(targets, pitch, sides, tilted, distance)
    return Reading(m, tilted)


def _middle(
    targets: Sequence[Target], pitch: float, sides: Mapping[str, float], tilted: Sequence[Tilt], pupil: float
) -> Measured:
    """Magnification in the middle: pixels of all targets over what they would span at magnification 1."""
    length = 0.0
    for target in targets:
        drawn = target.length
        for tilt in filter(certain, tilted):
            drawn *= _drawn(
                _ends(target, tilt.along, pitch, sides), tilt.angle.value, pupil, tilt.along == target.along
            )
        length += drawn
    image, error = sum(target.pixels for target in targets) * pitch, READING * len(targets) * pitch
    return Measured(image / length, (image - error) / length, (image + error) / length)


def _drawn(ends: tuple[float, float], angle: float, pupil: float, along: bool) -> float:
    """Scale at which a target is drawn, over that in the middle."""
    near, far = (1 - x * sin(angle) / pupil for x in ends)
    return cos(angle) / (near * far) if along else 1 / near


def _ends(target: Target, side: str, pitch: float, sides: Mapping[str, float]) -> tuple[float, float]:
    """Where the target begins and ends along a side of the field, from the middle of the picture, mm."""
    half = target.length / 2 if target.along == side else 0.0
    of, sign = ENDS.get(target.at, ("", 0))
    if of != side:
        return -half, half
    edge = sides[side] / 2 * target.length / (target.pixels * pitch)
    middle = sign * (edge - half if target.off is None else target.off)
    return middle - half, middle + half


def _tilts(targets: Sequence[Target], pitch: float, sides: Mapping[str, float], m: float, pupil: float):
    if isinf(pupil):
        return
    paired = False
    for side in ("width", "height"):
        ends = {ENDS[target.at][1]: target for target in targets if ENDS.get(target.at, ("",))[0] == side}
        if len(ends) == 2 and ends[1].along == ends[-1].along:
            paired = True
            yield _of_ends(ends[1], ends[-1], side, pitch, sides, m, pupil)
    centred = {target.along: target for target in targets if target.at == "centre"}
    if len(centred) == 2 and not paired:
        yield _of_middle(centred, sides, m, pupil)


def _of_ends(
    plus: Target, minus: Target, side: str, pitch: float, sides: Mapping[str, float], m: float, pupil: float
) -> Tilt:
    a, b = _ends(minus, side, pitch, sides)
    c, d = _ends(plus, side, pitch, sides)
    if plus.along != side:
        b = d = 0.0

    def angle(more: float) -> float:
        """From (1 − w a)(1 − w b) = ratio (1 − w c)(1 − w d): the root that is 0 where the ratio is 1."""
        ratio = (plus.pixels + more) / plus.length / ((minus.pixels - more) / minus.length)
        square, linear = a * b - ratio * c * d, ratio * (c + d) - (a + b)
        root = 2 * (ratio - 1) / (linear + sqrt(max(linear**2 + 4 * square * (ratio - 1), 0.0)))
        return asin(max(-1.0, min(1.0, root * pupil)))

    value = angle(0.0)
    name = {sign: end for end, (of, sign) in ENDS.items() if of == side}
    nearer = name[1 if value > 0 else -1] if value else None
    return Tilt(
        Measured(value, angle(-READING), angle(READING)), side, nearer, _keystone(value, sides[side] / m, pupil)
    )


def _of_middle(centred: Mapping[str, Target], sides: Mapping[str, float], m: float, pupil: float) -> Tilt:
    """From foreshortening: the side that is drawn smaller is the one that the tilt runs along."""
    scale = {side: target.pixels / target.length for side, target in centred.items()}
    short, full = sorted(scale, key=scale.__getitem__)

    def angle(more: float) -> float:
        ratio = (centred[short].pixels - more) / (centred[full].pixels + more)
        ratio *= centred[full].length / centred[short].length
        found = acos(max(0.0, min(1.0, ratio)))
        for _ in range(3):  # the near half grows by more than the far half shrinks
            lean = sin(found) * centred[short].length / 2 / pupil
            found = acos(max(0.0, min(1.0, ratio * (1 - lean**2))))
        return found

    value = angle(0.0)
    return Tilt(
        Measured(value, angle(-READING), angle(READING)), short, None, _keystone(value, sides[short] / m, pupil)
    )


def _keystone(angle: float, field: float, pupil: float) -> float:
    lean = abs(sin(angle)) * field / 2 / pupil
    return (1 + lean) / (1 - lean) - 1 if lean < 1 else inf


def certain(tilt: Tilt) -> bool:
    """Whether a reading's fault alone can't be all of it."""
    return tilt.angle.low > 0 or tilt.angle.high < 0


def out_of_square(tilted: Sequence[Tilt]) -> float:
    """The least tilt that all readings together allow, rad: what can't be a reading's fault."""
    return hypot(*(max(0.0, tilt.angle.low, -tilt.angle.high) for tilt in tilted))
