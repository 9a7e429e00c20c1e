"""The usual cautions for whoever mounts a rig; local codes and licensed practice decide."""

from visionplan.solve.rig import Rig
from visionplan.units import show

ALWAYS = "Local codes and licensed practice decide; the standards are where to look it up."


def cautions(rig: Rig) -> list[str]:
    """Those that apply to a rig, the standards named."""
    brief, case = rig.case.brief, rig.case
    mass = show(case.camera_mass + case.lens_mass, "g", digits=3)
    what = "mass not stated" if mass == "not stated" else mass
    told = [
        f"Falling mounts: camera and lens, {what}, over the part; secure them twice (ISO 12100).",
        "Lamps and strobes: eyes, skin and flicker; mind the lamp's risk group (IEC 62471).",
        "Lasers, where one lights or aims: class, guards and signs (IEC 60825-1).",
        "Wiring: supplies off and locked before a cable is touched (IEC 60204-1).",
        "Not a safety device: nobody's safety may hang on its picture (ISO 13849-1).",
    ]
    if brief.speed or brief.rate:
        told.insert(1, "Moving parts: lock the drive first; guards and interlocks back on (ISO 14120, 14119).")
    if brief.fold or brief.layers:
        told.append("Glass and mirrors: edges cut, panes fall; hold them all round (ISO 12100).")
    return [*told, ALWAYS]
