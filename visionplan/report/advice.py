"""What could be set otherwise on a rig, in words, with what it gains."""

from collections.abc import Iterator

from visionplan.report.figures import room
from visionplan.report.words import misses
from visionplan.solve.advice import Advice, advice
from visionplan.solve.rig import Rig
from visionplan.text import clean, figure
from visionplan.units import show

NOTHING = 5e-4
"""Latitude under which a gain is none."""


def advice_rows(rig: Rig, system: str = "mm") -> Iterator[tuple[str, str]]:
    """Label and text of each thing; nothing for a rig that doesn't fit."""
    if len(rig.stops) > 1:
        yield "stops", f"{figure(rig.stops[0])} to {figure(rig.stops[-1])} fit: {', '.join(map(figure, rig.stops))}"
    if rig.fits and rig.needed_illuminance is not None:
        yield "light needed", f"{show(rig.needed_illuminance, 'lx')} on the part"
    for entry in advice(rig):
        label, what = _WORDS[entry.kind]
        yield label, f"{what.format(_value(entry, system))}: {_gain(rig, entry, system)}"


_WORDS = {
    "focus plane": ("best focus", "{}"),
    "stop": ("another stop", "{}"),
    "ring more": ("a ring more", "{}"),
    "ring less": ("a ring less", "without {}"),
    "turned": ("turned by 90°", "{}"),
    "distance": ("round distance", "{}"),
    "light": ("more light", "{} on the part"),
}
"""Kind of advice → its label, and how its value reads."""


def _value(entry: Advice, system: str) -> str:
    value = entry.value
    if isinstance(value, str):
        return clean(value)
    if entry.kind == "focus plane" and value is not None:
        side = "over" if value >= 0 else "under"
        return f"{show(abs(value), 'mm', system)} {side} the reference plane"
    return show(value, {"distance": "mm", "light": "lx"}.get(entry.kind, ""), system)


def _gain(rig: Rig, entry: Advice, system: str) -> str:
    judged = entry.rig
    if not judged.fits:
        return f"does not fit, misses {'; '.join(misses(judged, system)) or 'its span'}"
    if abs(entry.gain) < NOTHING:
        return f"{room(judged.latitude)} of room, as it is"
    grade = "" if judged.grade == rig.grade else f", {judged.grade} then"
    more = f"{100 * abs(entry.gain):.1f} points {'more' if entry.gain > 0 else 'less'}"
    return f"{room(judged.latitude)} of room, {more}{grade}"
