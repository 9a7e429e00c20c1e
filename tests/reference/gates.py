"""What doesn't depend on the magnification: each gate is met, missed, unknown or not asked."""

import math

from tests.reference.parts import at_most, thread


def verdict(asked, known, holds):
    """`holds` is only called where the gate is asked and what it needs is known."""
    if not asked:
        return "not asked"
    if not known:
        return "unknown"
    return "met" if holds() else "missed"


def gates(setup):
    """Verdict by gate, in the table's order; contrast, which needs a working point, is judged elsewhere."""
    brief, camera, lens = setup.brief, setup.camera, setup.lens
    cells, lens_cells = camera.row, lens.row
    line = camera.line_scan
    moving = bool(brief.speed)
    shortest = cells["shortest exposure"]
    burst = shortest if brief.pulse is None else brief.pulse
    longest = min(1 / brief.rate if brief.rate else math.inf, brief.max_exposure or math.inf)
    mass = (cells["mass"], lens_cells["mass"])
    diameter = lens_cells["diameter"]
    kind = "telecentric" if lens.telecentric else "entocentric"
    threads_match = thread(camera.mount) == thread(lens.mount)
    return {
        "lens kind": listed(brief.lens_kinds, kind),
        "cameras": listed(brief.cameras, camera.id),
        "lenses": listed(brief.lenses, lens.id),
        "mount": verdict(
            True,
            True,
            lambda: threads_match and (not brief.mounts or {camera.mount, lens.mount} <= set(brief.mounts)),
        ),
        "image circle": verdict(
            True,
            lens_cells["image circle"] is not None,
            lambda: at_most(max(setup.sides) if line else setup.diagonal, lens_cells["image circle"]),
        ),
        "colour": verdict(brief.sensor != "any", cells["colour"] is not None, lambda: cells["colour"] == brief.sensor),
        "shutter": verdict(
            moving and not line,
            brief.pulse is not None or cells["shutter"] is not None,
            lambda: brief.pulse is not None or cells["shutter"] == "global",
        ),
        "motion": verdict(moving, burst is not None, lambda: at_most(brief.speed * burst, setup.motion_blur)),
        "exposure": verdict(longest < math.inf, shortest is not None, lambda: at_most(shortest, longest)),
        "frame rate": verdict(
            brief.rate is not None and not line,
            cells["frame rate"] is not None,
            lambda: at_most(brief.rate, cells["frame rate"]),
        ),
        "line-scan motion": verdict(line, True, lambda: moving),
        "interface": verdict(
            brief.interfaces is not None,
            cells["interface"] is not None,
            lambda: cells["interface"] in brief.interfaces,
        ),
        "cable": verdict(
            brief.cable is not None,
            cells["cable limit"] is not None,
            lambda: at_most(brief.cable, cells["cable limit"]),
        ),
        "distortion": verdict(
            brief.max_distortion is not None,
            lens_cells["distortion"] is not None,
            lambda: at_most(abs(lens_cells["distortion"]), brief.max_distortion),
        ),
        "grid pitch": verdict(setup.count > 1, diameter is not None, lambda: lenses_have_room(setup, diameter)),
        "count": verdict(True, True, lambda: setup.count <= brief.max_count),
        "price": verdict(
            brief.max_price is not None, setup.price is not None, lambda: at_most(setup.price, brief.max_price)
        ),
        "mass": verdict(brief.max_mass is not None, None not in mass, lambda: at_most(sum(mass), brief.max_mass)),
        "diameter": verdict(
            brief.max_diameter is not None, diameter is not None, lambda: at_most(diameter, brief.max_diameter)
        ),
        "stock": stock(setup),
    }


def listed(choices, choice):
    return verdict(choices is not None, True, lambda: choice in choices)


def lenses_have_room(setup, diameter):
    """Along each side of the grid that holds more than one camera."""
    return all(
        n == 1 or at_most(diameter, (side - setup.brief.overlap) / n)
        for side, n in zip(setup.whole_field, setup.grid, strict=True)
    )


def stock(setup):
    if not setup.brief.in_hand:
        return "not asked"
    in_stock = (setup.camera.row["stock"], setup.lens.row["stock"])
    if any(number is not None and number < setup.count for number in in_stock):
        return "missed"  # whatever the other one is
    return "unknown" if None in in_stock else "met"
