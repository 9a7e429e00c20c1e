"""The whole catalogue judged against a brief: the rigs in order, as plain dicts named as in the program's JSON."""

from functools import cmp_to_key

from tests.reference import parts
from tests.reference.choose import Doubt, judge_pair
from tests.reference.demands import DEMANDS
from tests.reference.interval import EVERYWHERE, truth
from tests.reference.judgement import GRADES, TIE


def judge_all(brief, catalogue, order="value"):
    """Beside the contract's keys each rig has "missed_gates", "doubt" (the nearest decision's relative gap)
    and "judgement", all that it was drawn from."""
    truth.cache_clear()
    cameras, lenses, rings = read(catalogue)
    rigs = []
    for camera in cameras:
        for lens in lenses:
            doubt = Doubt()
            judgement, stops = judge_pair(brief, camera, lens, rings, doubt)
            rigs.append(entry(judgement, stops, doubt))
    rigs = ranked(rigs, order)
    for rank, rig in enumerate(rigs, 1):
        rig["rank"] = rank
    return {"pairs": len(rigs), "fitting": sum(rig["fits"] for rig in rigs), "rigs": rigs}


def read(catalogue):
    cameras = [parts.camera(row) for row in parts.rows(catalogue.cameras)]
    lenses = [parts.lens(row) for row in parts.rows(catalogue.lenses)]
    rings = [parts.ring(row) for row in parts.rows(catalogue.spacers)]
    return cameras, lenses, rings


def entry(judgement, stops, doubt):
    setup = judgement.setup
    f, tele = setup.lens.focal_length, setup.lens.telecentric
    return {
        "camera": setup.camera.id,
        "lens": setup.lens.id,
        "spacers": [ring.id for ring in setup.stack],
        "extension_mm": setup.extension,
        "orientation": "portrait" if setup.portrait else "landscape",
        "grid": list(setup.grid),
        "stop": setup.stop,
        "stops": list(stops),
        "fits": judgement.fits,
        "grade": judgement.grade,
        "unknown": list(judgement.unknown),
        "span": judgement.span,
        "latitude": judgement.latitude,
        "shortfall": judgement.shortfall,
        "pinch": judgement.pinch,
        "held": judgement.held,
        **judgement.figures(),
        "hyperfocal_mm": None if tele else f * f / (setup.stop * setup.camera.pitch) + f,
        "price": setup.price,
        "demands": [line(judgement, name) for name in (*judgement.verdicts, "contrast")],
        "missed_gates": judgement.missed_gates,
        "doubt": doubt.closest,
        "judgement": judgement,
    }


def line(judgement, name):
    """One demand or gate; of a gate only the verdict."""
    row = {"name": name, "lo": None, "hi": None, "asked": None, "got": None, "unit": ""}
    row["verdict"] = judgement.contrast_verdict if name == "contrast" else judgement.verdicts[name]
    if name in DEMANDS:
        demand, bounds = judgement.demands[name], judgement.bounds[name]
        lo, hi = bounds or EVERYWHERE
        row["lo"] = lo if lo > 0 else None
        row["hi"] = hi if hi < float("inf") else None
        row["asked"], row["unit"] = demand.asked, demand.unit
        if demand.state == "asked" and judgement.m is not None:
            row["got"] = demand.got(judgement.m)
    return row


# Orders: figures that are to be least, compared one after another


def known_first(rig):
    return bool(rig["unknown"])


def descending(value):
    return None if value is None else -value


ORDERS = {
    "value": lambda rig: (
        GRADES.index(rig["grade"] or GRADES[0]),
        known_first(rig),
        rig["price"],
        1 / (1 + rig["latitude"]),
    ),
    "latitude": lambda rig: (1 / (1 + rig["latitude"]), known_first(rig)),
    "depth": lambda rig: (descending(sum(rig["depth_mm"])), known_first(rig)),
    "snr": lambda rig: (descending(rig["snr"]), known_first(rig)),
    "price": lambda rig: (rig["price"], known_first(rig)),
    "sampling": lambda rig: (rig["sampling_mm"], known_first(rig)),
    "length": lambda rig: (rig["length_mm"], known_first(rig)),
}


def ranked(rigs, order="value"):
    """Fitting ones by the order's figures; the others by shortfall, gate missers last, then as by value; then by id."""

    def figures(rig):
        if rig["fits"]:
            return (0, *ORDERS[order](rig))
        return (1, bool(rig["missed_gates"]), rig["shortfall"], *ORDERS["value"](rig))

    def compare(one, other):
        for a, b in zip(figures(one), figures(other), strict=False):
            a, b = (float("inf") if value is None else value for value in (a, b))
            if a != b and (float("inf") in (a, b) or abs(a - b) > TIE * max(abs(a), abs(b))):
                return -1 if a < b else 1
        one, other = ((rig["camera"], rig["lens"]) for rig in (one, other))
        return (one > other) - (one < other)

    return sorted(rigs, key=cmp_to_key(compare))
