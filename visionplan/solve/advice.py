"""Advice on one rig that costs nothing: what to set otherwise, and what that gains in latitude."""

from collections.abc import Iterator
from dataclasses import dataclass, replace
from math import inf, isnan, sqrt

import numpy as np

from visionplan.catalogue.items import Table
from visionplan.faults import InputError
from visionplan.optics.light import electrons_for, illuminance_of
from visionplan.optics.mounts import thread
from visionplan.solve import span
from visionplan.solve.case import Case
from visionplan.solve.demands import BY_NAME, asked_demands, judge
from visionplan.solve.figures import electron_rate, longest_exposure
from visionplan.solve.rig import Rig
from visionplan.solve.stacks import MOST_RINGS
from visionplan.solve.variant import variant

PLANES = 101
"""Heights between the part's top and bottom at which the focus is tried."""
ROUND = (10.0, 5.0, 1.0)
"""Steps of a round working distance, mm."""


@dataclass(frozen=True)
class Advice:
    """One thing that could be set otherwise."""

    kind: str
    """focus plane, stop, ring more, ring less, turned, distance or light"""
    value: float | str | None
    """What to set: mm over the reference plane, f-number, ring, orientation, mm, or lx."""
    rig: Rig
    """The rig so set."""
    gain: float
    """Its latitude less that of the rig as it is."""


def advice(rig: Rig) -> tuple[Advice, ...]:
    """What could be set otherwise on a rig that fits, best of each kind; nothing for one that doesn't."""
    if not rig.fits or rig.magnification is None:
        return ()
    found = [focus_plane(rig), best_stop(rig), ring_more(rig), ring_less(rig), turned(rig), distance(rig), light(rig)]
    return tuple(entry for entry in found if entry is not None)


def focus_plane(rig: Rig) -> Advice | None:
    """The height of focus between the part's bottom and top that leaves most latitude; None where it has no height."""
    brief, case = rig.case.brief, rig.case
    if not brief.above + brief.below:
        return None
    heights = np.linspace(-brief.below, brief.above, PLANES).round(9)
    room = _latitude(case.varied(z=heights, A=brief.above - heights, B=brief.below + heights))
    best = heights[int(np.argmax(room))]
    if np.isnan(room).all() or room.max() <= rig.latitude * (1 + span.TIE):
        best = case.z
    judged = variant(rig, replace(brief, focus_plane=float(best)))
    return _advice("focus plane", float(best), rig, judged) if judged.fits else _advice("focus plane", case.z, rig, rig)


def _latitude(case: Case) -> np.ndarray:
    """Latitude at the working point of each of many settings; -1 where they don't fit."""
    lo_p, hi_p, lo, hi = 0.0, inf, 0.0, inf
    for demand in asked_demands(case.ask):
        low, high, _ = judge(demand, case)
        lo, hi = np.maximum(lo, low), np.minimum(hi, high)
        if not demand.place:
            lo_p, hi_p = np.maximum(lo_p, low), np.minimum(hi_p, high)
    point = span.working_point(lo_p, hi_p, lo, hi, case.M)
    return np.where(span.fits(lo, hi, case.M), span.latitude(point, lo_p, hi_p), -1.0)


def best_stop(rig: Rig) -> Advice | None:
    """Of the stops that fit the one with most latitude; None where no other fits."""
    others = [variant(rig, stop=stop) for stop in rig.stops if stop != rig.stop]
    best = max((other for other in others if other.fits), key=lambda other: other.latitude, default=None)
    return _advice("stop", best.stop, rig, best) if best else None


def ring_more(rig: Rig) -> Advice | None:
    """The ring that leaves most latitude when put on; None where there is none."""
    if len(rig.spacers) == MOST_RINGS:
        return None
    judged = [(ring, variant(rig, rings=(*rig.spacers, ring))) for ring in _spare_rings(rig)]
    return _best_ring("ring more", rig, judged)


def ring_less(rig: Rig) -> Advice | None:
    """The ring that leaves most latitude when taken off; None where there is none."""
    rings = list(dict.fromkeys(rig.spacers))
    judged = []
    for ring in rings:
        rest = list(rig.spacers)
        rest.remove(ring)
        judged.append((ring, variant(rig, rings=rest)))
    return _best_ring("ring less", rig, judged)


def _best_ring(kind: str, rig: Rig, judged: list[tuple[str, Rig]]) -> Advice | None:
    best = max(judged, key=lambda entry: (entry[1].fits, entry[1].latitude, -entry[1].shortfall), default=None)
    return _advice(kind, best[0], rig, best[1]) if best else None


def _spare_rings(rig: Rig) -> list[str]:
    """One ring of each length and travel that could still be put on; no adapter."""
    catalogue = rig.case.problem.catalogue
    spacers: Table = catalogue.spacers
    threads = {thread(catalogue.lenses["mount"][rig.case.lenses]), thread(catalogue.cameras["mount"][rig.case.cameras])}
    cameras = rig.grid[0] * rig.grid[1]
    found: dict[tuple[float, float], str] = {}
    for row, id in enumerate(spacers["id"]):
        enough = not spacers["quantity"][row] < cameras * (rig.spacers.count(id) + 1)
        plain = spacers["camera mount"][row] in ("", spacers["mount"][row])
        if plain and thread(spacers["mount"][row]) in threads and enough:
            travel = float(np.nan_to_num(spacers["travel"][row]))
            found.setdefault((float(spacers["length"][row]), travel), id)
    return list(found.values())


def turned(rig: Rig) -> Advice | None:
    """The camera turned by 90°; None where it can't be."""
    other = "portrait" if rig.orientation == "landscape" else "landscape"
    try:
        return _advice("turned", other, rig, variant(rig, orientation=other))
    except InputError:
        return None


def distance(rig: Rig) -> Advice | None:
    """The roundest working distance (10, 5, then 1 mm) at which the rig keeps its grade, the nearest of those."""
    if rig.working_distance is None:
        return None
    for value in _round_distances(rig):
        if rig.case.telecentric:
            return _advice("distance", value, rig, replace(rig, working_distance=value))
        judged = variant(rig, at=value)
        if judged.fits and judged.grade == rig.grade:
            return _advice("distance", value, rig, judged)
    return None


def _round_distances(rig: Rig) -> Iterator[float]:
    low, high = distances(rig)
    here = rig.working_distance or 0.0
    for step in ROUND:
        first, last = int(np.ceil(low / step - 1e-9)), int(np.floor(high / step + 1e-9))
        nearest = round(here / step)
        if first <= last:
            yield step * min(max(nearest, first), last)


def distances(rig: Rig, keep_grade: bool = True) -> tuple[float, float]:
    """Nearest and farthest working distance at which all demands hold and, if asked, the grade stays, mm.

    Of a telecentric lens what its tolerance and the brief's range allow.
    """
    case = rig.case
    near, far = case.brief.working_distance
    if case.telecentric:
        nominal = case.WD_stated + case.D + case.z
        return max(near, nominal - case.WD_room), min(far, nominal + case.WD_room)
    (lo_p, hi_p), (lo, hi) = bounds(rig), bounds(rig, place=True)
    comfort = case.brief.comfort
    kept = {"comfortable": comfort, "fair": comfort / 2}.get(rig.grade or "", 0.0) if keep_grade else 0.0
    low, high = max(lo, lo_p * sqrt(1 + kept)), min(hi, hi_p / sqrt(1 + kept))
    at_high = float(case.WD(high)) if high < inf else near
    return max(near, at_high), min(far, float(case.WD(low)) if low > 0 else far)


def bounds(rig: Rig, place: bool = False) -> tuple[float, float]:
    """Intersection of the picture demands, or of the place demands."""
    verdicts = [v for v in rig.demands if not v.gate and BY_NAME[v.name].place == place]
    return max((v.lo or 0.0 for v in verdicts), default=0.0), min(
        (inf if v.hi is None else v.hi for v in verdicts), default=inf
    )


def light(rig: Rig) -> Advice | None:
    """The illuminance at which light no longer bounds the room; None where it doesn't, or no SNR is asked."""
    brief, case = rig.case.brief, rig.case
    lit = next(verdict for verdict in rig.demands if verdict.name == "light")
    others = [v.hi for v in rig.demands if not v.gate and v.name != "light" and v.hi and not BY_NAME[v.name].place]
    if brief.snr is None or case.ask.irradiance is None or not others or lit.hi is None or lit.hi >= min(others):
        return None
    level = illuminance_needed(case, min(others), brief.snr)
    if level is None:
        return None
    level *= 1 + 1e-9
    judged = variant(rig, replace(brief, illuminance=level, irradiance=None))
    return _advice("light", level, rig, judged)


def illuminance_needed(case: Case, m: float, snr: float) -> float | None:
    """Illuminance on the part that yields a ratio at a magnification, lx; None where that can't be told."""
    electrons = float(electrons_for(snr, case.variance))
    limit = float(longest_exposure(case, m))
    if not 0 < limit < inf or electrons > case.saturation or case.brief.reflectance is None:
        return None
    level = float(illuminance_of(electrons / (electron_rate(case, m, 1.0) * limit), case.lam))
    return None if isnan(level) or level <= 0 else level


def _advice(kind: str, value: float | str | None, rig: Rig, judged: Rig) -> Advice:
    return Advice(kind, value, judged, judged.latitude - rig.latitude)
