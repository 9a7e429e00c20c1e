"""Spacer stacks: which lengths the rings of a thread can make, and with which rings."""

from dataclasses import dataclass
from itertools import combinations_with_replacement

import numpy as np

from visionplan.catalogue.items import Table
from visionplan.optics.mounts import thread

MOST_RINGS = 3
SAME_LENGTH = 1e-9


@dataclass(frozen=True)
class Stacks:
    """Every stack of one thread, shortest first; the first is the empty one."""

    length: np.ndarray
    rings: np.ndarray
    """How many rings."""
    price: np.ndarray
    """NaN where a ring's price isn't stated."""
    ids: tuple[tuple[str, ...], ...]


def stacks_of(spacers: Table, of_thread: str, cameras: int = 1) -> Stacks:
    """Stacks of up to three rings of a thread, when that many cameras share the rings.

    For each total length (to 1e-9 mm) the stack with fewest rings, then the cheapest, then by id.
    """
    units: dict[float, list[tuple[float, str]]] = {}
    for row, mount in enumerate(spacers["mount"]):
        if thread(mount) != of_thread:
            continue
        quantity, price = spacers["quantity"][row], spacers["price"][row]
        each = MOST_RINGS if np.isnan(quantity) else int(min(MOST_RINGS, quantity // cameras))
        unit = (np.inf if np.isnan(price) else float(price), spacers["id"][row])
        units.setdefault(float(spacers["length"][row]), []).extend([unit] * each)
    for same in units.values():
        same.sort()

    best: dict[int, tuple] = {0: (0, 0.0, (), 0.0)}
    for count in range(1, MOST_RINGS + 1):
        for lengths in combinations_with_replacement(sorted(units), count):
            taken = [
                units[x][lengths[:i].count(x)] for i, x in enumerate(lengths) if lengths[:i].count(x) < len(units[x])
            ]
            if len(taken) < count:
                continue
            key = round(sum(lengths) / SAME_LENGTH)
            stack = (count, sum(price for price, _ in taken), tuple(sorted(id for _, id in taken)), sum(lengths))
            if key not in best or stack < best[key]:
                best[key] = stack
    ordered = [best[key] for key in sorted(best)]
    price = np.array([stack[1] for stack in ordered])
    return Stacks(
        np.array([stack[3] for stack in ordered]),
        np.array([stack[0] for stack in ordered]),
        np.where(np.isinf(price), np.nan, price),
        tuple(stack[2] for stack in ordered),
    )
