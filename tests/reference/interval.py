"""The magnifications at which a check holds, found by trying them: a dense scan, then bisection at its ends."""

import math
from functools import cache

PER_DECADE = 20
GRID = tuple(10 ** (k / PER_DECADE) for k in range(-6 * PER_DECADE, 3 * PER_DECADE + 1))
"""From 1e-6 to 1e3; m = 1, where object and image are closest together and headroom is least, is one of them."""
EVERYWHERE = (0.0, math.inf)


@cache
def truth(check, args):
    """(lo, hi) where check(m, *args) holds: lo 0 or hi infinite where it still does at the grid's end; None: never."""
    holds = [check(m, *args) for m in GRID]
    if not any(holds):
        return None
    first = holds.index(True)
    last = len(holds) - 1 - holds[::-1].index(True)
    if not all(holds[first : last + 1]):
        raise AssertionError(f"{check.__name__}{args} doesn't hold on one interval")
    lo = edge(check, args, GRID[first - 1], GRID[first]) if first else 0.0
    hi = edge(check, args, GRID[last + 1], GRID[last]) if last + 1 < len(GRID) else math.inf
    return lo, hi


def edge(check, args, outside, inside):
    """The last magnification from inside towards outside at which the check holds, to the last digit."""
    while True:
        middle = math.sqrt(outside * inside)
        if middle in (outside, inside) or not min(outside, inside) < middle < max(outside, inside):
            return inside
        if check(middle, *args):
            inside = middle
        else:
            outside = middle


def all_of(checks):
    """Where all the checks of one demand hold; None when at no magnification."""
    lo, hi = EVERYWHERE
    for check, args in checks:
        found = truth(check, args)
        if found is None:
            return None
        lo, hi = max(lo, found[0]), min(hi, found[1])
    return (lo, hi) if lo <= hi * (1 + 1e-12) else None
