"""What the lines of a brief must hold to among each other."""

from collections.abc import Callable, Collection, Iterator
from typing import Any

from visionplan.brief.fields import BY_KEY, RIVALS
from visionplan.brief.layers import nanometres, out_of_range
from visionplan.units import show

Found = Iterator[tuple[str, str, str]]
"""The key at fault, what was found, what was expected."""

VISIBLE = (380e-6, 780e-6)
"""Wavelengths, mm, at which the eye sees: the ends of the CIE's table of V(λ)."""


def check(brief: Any, stated: Collection[str], sound: Callable[..., bool]) -> Found:
    """Yield what contradicts what.

    Parameters
    ----------
    brief : has the attributes of `Brief`, layers and fold as dicts of their parts
    stated : the keys that the file has
    sound : tells whether all the keys given could be read, or are left out and have a default
    """
    for rule in (_rivals, _distance, _focus, _pulse, _snr, _illuminance, _materials):
        yield from rule(brief, stated, sound)


def _rivals(brief, stated, sound) -> Found:
    for key, rival in RIVALS.items():
        if key in stated and rival in stated:
            name = BY_KEY[rival].name
            yield key, f"{BY_KEY[key].name} and {name} state one thing in two ways", f"this line or {name}, not both"


def _distance(brief, stated, sound) -> Found:
    key = "station.working_distance"
    if not sound(key):
        return
    nearest, farthest = brief.working_distance
    taken = {
        "scene.above": ("above", brief.above),
        "station.layers": ("the layers' thicknesses added up", sum(layer["thickness"] for layer in brief.layers)),
    }
    for other, (words, length) in taken.items():
        if sound(other) and nearest <= length:
            least, most = show(nearest, "mm", brief.units), show(length, "mm", brief.units)
            yield key, f"the least working distance, {least}, leaves no room for {words}, {most}", f"more than {most}"
    if brief.fold and sound("station.fold") and brief.fold["from_lens"] >= farthest:
        found = f"from_lens, {show(brief.fold['from_lens'], 'mm', brief.units)}, puts the mirror beyond the part"
        yield "station.fold", found, f"less than the working distance, {show(farthest, 'mm', brief.units)}"


def _focus(brief, stated, sound) -> Found:
    plane = brief.focus_plane
    if not sound("focus.plane", "scene.above", "scene.below") or plane is None:
        return
    if not -brief.below <= plane <= brief.above:
        low, high = (show(height, "mm", brief.units) for height in (-brief.below, brief.above))
        found = f"the focus plane, at {show(plane, 'mm', brief.units)}, lies outside the part"
        yield "focus.plane", found, f"a height from {low} (below) to {high} (above)"


def _pulse(brief, stated, sound) -> Found:
    if brief.pulse is None or not sound("light.pulse"):
        return
    pulse = show(brief.pulse, "s")
    if brief.rate is not None and sound("motion.rate") and brief.pulse >= 1 / brief.rate:
        period = show(1 / brief.rate, "s")
        yield "light.pulse", f"the pulse, {pulse}, is not shorter than 1/rate", f"less than {period}"
    if brief.max_exposure is not None and sound("light.max_exposure") and brief.pulse >= brief.max_exposure:
        longest = show(brief.max_exposure, "s")
        yield "light.pulse", f"the pulse, {pulse}, is not shorter than max_exposure", f"less than {longest}"


def _snr(brief, stated, sound) -> Found:
    if "light.snr" in stated and "light.reflectance" not in stated:
        example = BY_KEY["light.reflectance"].example
        yield (
            "light.snr",
            "an snr is asked for and the part's reflectance isn't stated",
            f"reflectance = {example}, say",
        )


def _illuminance(brief, stated, sound) -> Found:
    if "light.illuminance" in stated and sound("light.wavelength") and not VISIBLE[0] <= brief.wavelength <= VISIBLE[1]:
        found = f"light of {nanometres(brief.wavelength)} is invisible and has no illuminance"
        yield "light.illuminance", found, f"irradiance = {BY_KEY['light.irradiance'].example}, say"


def _materials(brief, stated, sound) -> Found:
    if sound("station.layers", "light.wavelength"):
        for found, expected in out_of_range(brief.layers, brief.wavelength):
            yield "station.layers", found, expected
