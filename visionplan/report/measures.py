"""The lengths that a fitter measures on a rig, each with where it lies along the axis."""

from dataclasses import dataclass

from visionplan.report.profile import Profile
from visionplan.text import figure
from visionplan.units import show


@dataclass(frozen=True)
class Measure:
    """Neighbouring lengths, each from one station to another, and what stands at their line."""

    stations: tuple[float, ...]
    text: str
    brief: str = ""
    """The same in fewer words."""


def measures(profile: Profile, system: str = "mm") -> list[Measure]:
    """Those that are known, the most needed first."""
    rig, case = profile.rig, profile.rig.case

    def length(value: float) -> str:
        return show(value, "mm", system)

    def number(value: float, digits: int = 3) -> str:
        return figure(value / scale, digits)

    unit, scale = ("in", 25.4) if system == "inch" else ("mm", 1.0)
    found = [Measure((profile.front, 0.0), f"working distance {length(-profile.front)}", length(-profile.front))]
    if profile.back is not None:
        found.append(
            Measure(
                (profile.back, 0.0), f"to the camera back {length(-profile.back)}", f"to back {length(-profile.back)}"
            )
        )
    if profile.limit is not None:
        found.append(Measure((profile.limit, 0.0), f"headroom {length(-profile.limit)}"))
    above, below = case.brief.above, case.brief.below
    if above or below:
        parts = [f"{length(above)} above" if above else "", f"{length(below)} below" if below else ""]
        found.append(Measure((profile.top, 0.0, profile.bottom), f"part {', '.join(filter(None, parts))}"))
    if profile.mounting is not None and profile.flange is not None:
        focus = profile.extension - rig.extension
        parts = [
            "" if profile.back is None else f"camera {number(case.camera_length)}",
            f"rings {number(rig.extension)}" if rig.extension else "",
            f"lens {number(case.lens_length)}" + (f" drawn out {number(focus, 2)}" if focus > 0 else ""),
        ]
        begin = () if profile.back is None else (profile.back,)
        found.append(
            Measure(
                (*begin, profile.flange, profile.mounting, profile.front), f"{', '.join(filter(None, parts))} {unit}"
            )
        )
    return found
