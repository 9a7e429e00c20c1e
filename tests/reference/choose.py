"""Every way to set a pair up, and the choice among them."""

import math
from itertools import combinations_with_replacement

from tests.reference import laws
from tests.reference.demands import stand
from tests.reference.judgement import GRADES, TIE, Judgement
from tests.reference.parts import thread
from tests.reference.setup import Setup


class Doubt:
    """How near the nearest decision came to going the other way, relative: what bisection can't vouch for."""

    EXACT = 1e-13
    """Figures nearer than this are equal but for rounding, on purpose and not by accident."""

    def __init__(self):
        self.closest = math.inf

    def note(self, one, other):
        if one == other or math.isinf(one) or math.isinf(other):
            return
        gap = abs(one - other) / max(abs(one), abs(other))
        if gap > self.EXACT:
            self.closest = min(self.closest, gap)


def least(candidates, figure, doubt):
    """Those whose figure is least, ties within 1e-9 included; no figure comes last."""
    figures = [math.inf if figure(candidate) is None else figure(candidate) for candidate in candidates]
    best = min(figures)
    for value in figures:
        doubt.note(value, best)
    limit = best + TIE * abs(best) if best < math.inf else best
    return [candidate for candidate, value in zip(candidates, figures, strict=True) if value <= limit]


def stacks(rings, mount, count):
    """One stack a total length: fewest rings, then cheapest, then by id."""
    stock = sorted(ring for ring in rings if ring.thread == thread(mount))
    found = []
    for size in range(4):
        for stack in combinations_with_replacement(stock, size):
            if any(ring.quantity is not None and stack.count(ring) * count > ring.quantity for ring in stack):
                continue
            prices = [ring.price for ring in stack]
            price = math.inf if None in prices else sum(prices)
            found.append((sum(ring.length for ring in stack), size, price, [ring.id for ring in stack], stack))
    found.sort(key=lambda entry: entry[:4])
    kept = []
    for entry in found:
        if kept and entry[0] - kept[-1][0][0] <= 1e-9:
            kept[-1].append(entry)
        else:
            kept.append([entry])
    return [min(equals, key=lambda entry: entry[1:4])[4] for equals in kept]


def arrangements(brief, camera, lens, rings):
    """(portrait, grid, stack)"""
    sides = [brief.along == "width"] if camera.line_scan else [False, True]
    for portrait in sides:
        for nx in range(1, brief.max_count + 1):
            for ny in range(1, brief.max_count // nx + 1):
                if camera.line_scan and (nx if portrait else ny) > 1:
                    continue  # only along the row
                for stack in stacks(rings, lens.mount, nx * ny):
                    yield portrait, (nx, ny), stack


def combined_blur(judgement):
    """On the part: of focus at the heights asked for, at least a hundredth of the distance, and of diffraction."""
    setup, m = judgement.setup, judgement.m
    hundredth = stand(setup, m) / 100
    near = max(setup.nearer + setup.slack, hundredth)
    far = max(setup.farther + setup.slack, hundredth)
    if laws.pupil_distance(setup.optics, m) <= near:
        return math.inf
    geometric = laws.blur_on_part(setup.optics, m, max(near, far))
    diffraction = 2.44 * setup.brief.wavelength * laws.working_f_number(setup.optics, m) / m
    return math.hypot(geometric, diffraction)


def choose_stop(judgements, doubt):
    """Among the stops of one arrangement."""
    fitting = [judgement for judgement in judgements if judgement.fits]
    if fitting:
        best = least(fitting, lambda judgement: GRADES.index(judgement.grade), doubt)
        best = least(best, combined_blur, doubt)
    else:
        best = least(judgements, lambda judgement: judgement.shortfall, doubt)
    return min(best, key=lambda judgement: judgement.setup.stop), tuple(j.setup.stop for j in fitting)


def choose_arrangement(judgements, doubt):
    """Among the arrangements of one pair, each at its own stop."""
    fitting = [judgement for judgement in judgements if judgement.fits]
    if fitting:
        best, keys = fitting, []
    else:
        best = judgements
        keys = [lambda judgement: judgement.misses_gate, lambda judgement: judgement.shortfall]
    keys += [
        lambda judgement: judgement.setup.count,
        lambda judgement: GRADES.index(judgement.grade) if judgement.fits else 0,
        lambda judgement: len(judgement.setup.stack),
        lambda judgement: judgement.setup.price,
        lambda judgement: 1 / (1 + judgement.latitude),
        lambda judgement: judgement.setup.portrait,
        lambda judgement: judgement.setup.extension,
        lambda judgement: judgement.setup.grid[0],
    ]
    for key in keys:
        best = least(best, key, doubt)
    (one,) = best
    return one


def judge_pair(brief, camera, lens, rings, doubt):
    """The judgement of the arrangement and stop chosen, and every stop that fits there."""
    chosen, stops = [], {}
    for portrait, grid, stack in arrangements(brief, camera, lens, rings):
        judgements = [Judgement(Setup(brief, camera, lens, portrait, grid, stack, stop)) for stop in lens.stops]
        for judgement in judgements:
            note_thresholds(judgement, doubt)
        judgement, fitting = choose_stop(judgements, doubt)
        chosen.append(judgement)
        stops[id(judgement)] = fitting
    best = choose_arrangement(chosen, doubt)
    return best, stops[id(best)]


def note_thresholds(judgement, doubt):
    """How near this setup is to fitting or not, and to the next grade."""
    if judgement.span is None:
        return
    lo, hi = judgement.span
    fixed, comfort = judgement.setup.lens.magnification, judgement.setup.brief.comfort
    if fixed is None:
        doubt.note(lo, hi)
    else:
        doubt.note(lo, fixed)
        doubt.note(fixed, hi)
    if judgement.fits:
        doubt.note(1 + judgement.latitude, 1 + comfort)
        doubt.note(1 + judgement.latitude, 1 + comfort / 2)
    if judgement.setup.brief.min_contrast is not None and judgement.span_holds:
        # quadrature is good to 1e-6, a thousand times worse than bisection
        doubt.note(1 + 1e-3 * min(judgement.contrast.values()), 1 + 1e-3 * judgement.setup.brief.min_contrast)
