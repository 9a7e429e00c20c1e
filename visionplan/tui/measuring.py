"""What can be measured of a rig as built: each value as typed, what it must be, and what all of them together say."""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import TYPE_CHECKING

from visionplan.faults import Fault, InputError
from visionplan.solve.rig import Rig
from visionplan.text import quoted
from visionplan.units import UnitError, parse

if TYPE_CHECKING:
    from visionplan.solve.target import Target

MOST_TARGETS = 4
"""One at each end of both sides of the field."""


@dataclass(frozen=True)
class Field:
    """A value that can be measured."""

    name: str
    doc: str
    expected: str
    unit: str = ""
    choices: tuple[str, ...] = ()
    default: str = ""
    """What holds where nothing is typed."""
    positive: bool = True


COLUMNS = {
    "length": Field("length", "How long the target is", "a length greater than 0 such as 50 mm", "mm"),
    "pixels": Field(
        "spans",
        "From end to end in the picture, to half a pixel, with the picture in focus",
        "a number of pixels greater than 0 such as 812",
        "px",
    ),
    "along": Field(
        "along",
        "The side of the picture that the target lies along",
        "width or height",
        choices=("width", "height"),
        default="width",
    ),
    "at": Field(
        "where",
        "Where in the picture it lies; one at each end of a side, or one along each side, tells the tilt",
        "centre, left, right, bottom or top",
        choices=("centre", "left", "right", "bottom", "top"),
        default="centre",
    ),
    "off": Field(
        "off the middle",
        "From the middle of the picture to that of the target; empty for as far out as the picture goes",
        "a length greater than 0 such as 60 mm",
        "mm",
        default="at the edge",
    ),
}
"""Of each target."""
SINGLE = {
    "distance": Field(
        "taped distance",
        "From the lens's front to the reference plane, which tells distance and focal length apart",
        "a length greater than 0 such as 312 mm",
        "mm",
        default="not taped",
    ),
    "height": Field(
        "target height",
        "How far the targets lie over the reference plane",
        "a length such as 12 mm",
        "mm",
        default="0 mm",
        positive=False,
    ),
}
Values = Mapping[str, str]
"""What was typed, by key: "distance", "height", of a target "1 length" and so on. What wasn't isn't there."""


@dataclass(frozen=True)
class Measures:
    """What was measured, as numbers."""

    targets: "tuple[Target, ...]"
    distance: float | None
    """mm"""
    height: float
    """mm"""


def field_of(key: str) -> Field:
    """The field of a key."""
    return SINGLE.get(key) or COLUMNS[key.partition(" ")[2]]


def numbers(values: Values) -> list[int]:
    """Of the targets that something is typed of."""
    return sorted({int(key.partition(" ")[0]) for key in values if key not in SINGLE})


def read_value(key: str, text: str) -> float | str:
    """What was typed for a key, in mm or pixels, or one of its choices.

    Raises
    ------
    InputError
        Where it isn't that.
    """
    field = field_of(key)
    try:
        if field.choices:
            if text not in field.choices:
                raise UnitError(f"{quoted(text)} is none of them", field.expected)
            return text
        value = parse(text, field.unit)
        if field.positive and value <= 0:
            raise UnitError(f"{quoted(text)} is not greater than 0", field.expected)
    except UnitError as error:
        raise InputError([Fault("", error.found, field.expected)]) from None
    return value


def target_of(values: Values, number: int) -> "Target | None":
    """A target, once its length and its pixels are there."""
    from visionplan.solve.target import Target

    read = {column: read_value(key, values[key]) for column in COLUMNS if (key := f"{number} {column}") in values}
    if not {"length", "pixels"} <= read.keys():
        return None
    if read.get("at", "centre") == "centre":
        read.pop("off", None)
    return Target(**read)  # type: ignore[arg-type]


def measures(values: Values) -> Measures:
    """What was measured; targets that lack their length or pixels are left out."""
    single = {key: read_value(key, values[key]) for key in SINGLE if key in values}
    targets = (target_of(values, number) for number in numbers(values))
    return Measures(
        tuple(target for target in targets if target),
        single.get("distance"),  # type: ignore[arg-type]
        single.get("height", 0.0),  # type: ignore[arg-type]
    )


def wrong(values: Values, key: str, planned: Rig | None) -> Fault | None:
    """What is wrong with the value of a key: by itself, or where the rig can't show it so."""
    from visionplan.solve.asbuilt import check

    try:
        read_value(key, values[key])
        if planned is None:
            return None
        if key == "distance":
            read = measures(values)
            if read.targets:
                check(planned, read.targets, read.distance)
        elif key not in SINGLE and (target := target_of(values, int(key.partition(" ")[0]))):
            check(planned, (target,), None)
    except InputError as error:
        return error.faults[0]
    return None


def lacking(values: Values) -> Iterator[str]:
    """What targets lack, a sentence each."""
    words = {"length": "its length", "pixels": "how many pixels it spans"}
    for number in numbers(values):
        if missing := [word for column, word in words.items() if f"{number} {column}" not in values]:
            yield f"Target {number} lacks {' and '.join(missing)}."


def without_target(values: Values, number: int) -> dict[str, str]:
    """The values without one target; those after it move up."""
    left = {}
    for key, text in values.items():
        first, _, column = key.partition(" ")
        if key in SINGLE or int(first) < number:
            left[key] = text
        elif int(first) > number:
            left[f"{int(first) - 1} {column}"] = text
    return left
