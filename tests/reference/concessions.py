"""What to give up when nothing fits, and what each line of the brief costs: by brute force over every setup."""

import math
from itertools import chain

from tests.reference.choose import arrangements
from tests.reference.demands import DEMANDS
from tests.reference.gates import gates
from tests.reference.judgement import Judgement
from tests.reference.parts import at_most
from tests.reference.setup import Setup

LOOSER = {
    "cover": -1,
    "sampling": 1,
    "nearer": -1,
    "farther": 1,
    "headroom": 1,
    "near depth": -1,
    "far depth": -1,
    "rayleigh": 1,
    "lens detail": 1,
    "light": -1,
    "perspective": 1,
    "line rate": -1,
}
"""Which way a value asked becomes easier; reach by its ends."""

GATE_VALUES = {
    "motion": lambda setup: (setup.motion_blur, setup.brief.speed * burst(setup)),
    "distortion": lambda setup: (setup.brief.max_distortion, abs(setup.lens.row["distortion"])),
    "frame rate": lambda setup: (setup.brief.rate, setup.camera.row["frame rate"]),
    "price": lambda setup: (setup.brief.max_price, setup.price),
}
"""Asked and what there is."""

UNITS = {"motion": "mm", "distortion": "1", "frame rate": "1/s", "price": "", "line rate": "mm/s", "lens detail": "mm"}

LINES = {
    "scene.field": ("cover",),
    "scene.feature": ("sampling", "rayleigh", "lens detail"),
    "scene.above": ("near depth", "far depth", "perspective"),
    "scene.below": ("near depth", "far depth", "perspective"),
    "scene.max_perspective": ("perspective",),
    "station.working_distance": ("reach",),
    "station.headroom": ("headroom",),
    "motion.speed": ("motion", "shutter", "line rate"),
    "motion.rate": ("frame rate",),
    "light.snr": ("light",),
    "light.max_exposure": ("exposure",),
    "focus.min_contrast": ("contrast",),
    "choose.sensor": ("colour",),
    "choose.interfaces": ("interface",),
    "choose.cable": ("cable",),
    "choose.max_distortion": ("distortion",),
    "choose.max_price": ("price",),
    "choose.max_mass": ("mass",),
    "choose.max_diameter": ("diameter",),
    "choose.lens_kinds": ("lens kind",),
    "choose.in_hand": ("stock",),
    "choose.cameras": ("cameras",),
    "choose.lenses": ("lenses",),
}
"""Which demands and gates fall with a line of the brief; mounts and max_count change what there is to judge."""


def burst(setup):
    return setup.camera.row["shortest exposure"] if setup.brief.pulse is None else setup.brief.pulse


def setups(brief, camera, lens, rings):
    for arrangement in arrangements(brief, camera, lens, rings):
        for stop in lens.stops:
            yield Setup(brief, camera, lens, *arrangement, stop)


def tolls(brief, cameras, lenses, rings):
    """How many more pairs would fit without each line of the brief that is stated."""
    counts = dict.fromkeys([None, *(line for line in LINES if line in brief.stated)], 0)
    for camera in cameras:
        for lens in lenses:
            judgements = [Judgement(setup) for setup in setups(brief, camera, lens, rings)]
            for line in counts:
                drop = frozenset(LINES.get(line, ()))
                counts[line] += any(fits_without(judgement, drop) for judgement in judgements)
    return {line: count - counts[None] for line, count in counts.items() if line}


def fits_without(judgement, drop):
    if judgement.fits:
        return True
    if set(judgement.other_missed_gates) - drop or common(judgement, drop) is None:
        return False
    return Judgement(judgement.setup, drop).fits


def concessions(brief, cameras, lenses, rings):
    """The least change of one demand that lets a pair fit; from pairs with unknowns only where no other can."""
    found = {}
    for camera in cameras:
        for lens in lenses:
            for setup in setups(brief, camera, lens, rings):
                judgement = Judgement(setup)
                assert not judgement.fits, "nothing is to be given up"
                for concession in chain(gate_concessions(judgement), demand_concessions(judgement)):
                    key = (bool(judgement.unknown), abs(math.log(concession["needed"] / concession["asked"])))
                    name = concession["demand"]
                    if name not in found or key < found[name][0]:
                        found[name] = (key, {**concession, "camera": camera.id, "lens": lens.id})
    return [concession for _, concession in sorted(found.values(), key=lambda pair: pair[0][1])]


def gate_concessions(judgement):
    if not judgement.span_holds or len(judgement.missed_gates) != 1:
        return
    (gate,) = judgement.missed_gates
    if gate in GATE_VALUES and gates(judgement.setup)[gate] == "missed":
        asked, needed = GATE_VALUES[gate](judgement.setup)
        if needed > 0:
            yield {"demand": gate, "asked": asked, "needed": needed, "unit": UNITS[gate], "end": None}


def demand_concessions(judgement):
    """With all other demands as asked."""
    if judgement.other_missed_gates:
        return
    for name, demand in judgement.demands.items():
        others = common(judgement, {name})
        if name == "travel" or demand.state not in ("asked", "never") or others is None:
            continue
        points = points_to_try(*others)
        if name == "reach":
            ends = [concession_of_end(judgement, end, points) for end in ("nearer", "farther")]
            ends = [end for end in ends if end]
            if ends:
                yield min(ends, key=lambda end: abs(math.log(end["needed"] / end["asked"])))
            continue
        asked = judgement.setup.brief.feature if name == "lens detail" else demand.asked
        if name == "line rate":
            asked = judgement.setup.brief.speed
        needed = needed_value(judgement, name, asked, LOOSER[name], points, lambda value: value)
        if needed is not None:
            unit = UNITS.get(name, demand.unit)
            yield {"demand": name, "asked": asked, "needed": needed, "unit": unit, "end": None}


def common(judgement, without):
    """The magnifications that all other demands share; None where there are none."""
    bounds = [bounds for name, bounds in judgement.bounds.items() if name not in without]
    if None in bounds:
        return None
    lo, hi = max(bound[0] for bound in bounds), min(bound[1] for bound in bounds)
    fixed = judgement.setup.lens.magnification
    if fixed is None:
        return (lo, hi) if at_most(lo, hi) else None
    return (fixed, fixed) if at_most(lo, fixed) and at_most(fixed, hi) else None


def points_to_try(lo, hi):
    """Where a demand whose check is one-sided, or least strict at m = 1, is easiest to meet."""
    lo, hi = max(lo, 1e-6), min(hi, 1e3)
    return (lo, hi, min(max(1.0, lo), hi))


def concession_of_end(judgement, end, points):
    nearest, farthest = judgement.setup.brief.working_distance
    asked = nearest if end == "nearer" else farthest

    def whole(value):
        return (value, farthest) if end == "nearer" else (nearest, value)

    needed = needed_value(judgement, "reach", asked, LOOSER[end], points, whole)
    return needed and {"demand": "reach", "asked": asked, "needed": needed, "unit": "mm", "end": end}


def needed_value(judgement, name, asked, looser, points, whole):
    """The value nearest to the one asked with which the setup fits; None where a factor of 1e9 doesn't help.

    Fitting is tried step by step and the first success bisected, for contrast may come and go with the working point.
    """
    setup = judgement.setup

    def fits(change):
        value = whole(asked * math.exp(looser * change))
        tests = DEMANDS[name](setup, value)
        if tests.state == "never" or not possible(tests.checks, points):
            return False
        return setup.brief.min_contrast is None or Judgement(setup, value=(name, value)).fits

    if setup.brief.min_contrast is None:
        steps = [0.0, math.log(1e9)]
    else:
        steps = [k / 50 for k in range(200)]
    last = next((k for k in range(1, len(steps)) if fits(steps[k])), None)
    if last is None:
        return None
    low, high = steps[last - 1], steps[last]
    for _ in range(60):
        middle = (low + high) / 2
        low, high = (low, middle) if fits(middle) else (middle, high)
    return asked * math.exp(looser * high)


def possible(tests, points):
    """Whether some magnification between the outer points passes all tests.

    Each test alone is passed at one of the points if anywhere; of a pair (reach) one is easiest at either end, and
    between them the working distance runs through every value.
    """
    return all(any(check(m, *args) for m in points) for check, args in tests)
