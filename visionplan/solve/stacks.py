"""Spacer stacks: which lengths the rings between a camera and a lens can make, and with which rings."""

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import combinations_with_replacement
from math import inf, isnan
from operator import itemgetter
from typing import NamedTuple

import numpy as np

from visionplan.catalogue.items import Table
from visionplan.optics.mounts import thread

MOST_RINGS = 3
SAME_LENGTH = 1e-9


@dataclass(frozen=True, eq=False)
class Stacks:
    """Every stack between two threads, shortest first; the first is the empty one, whether it joins them or not."""

    length: np.ndarray
    travel: np.ndarray
    """What its helicoids add to the focus travel."""
    rings: np.ndarray
    """How many rings."""
    price: np.ndarray
    """NaN where a ring's price isn't stated."""
    joins: np.ndarray
    """Whether it joins the two threads: always for equal ones, else by an adapter."""
    ids: tuple[tuple[str, ...], ...]


NO_RINGS = Stacks(np.zeros(1), np.zeros(1), np.zeros(1, int), np.zeros(1), np.ones(1, bool), ((),))
"""What there is where a catalogue has no rings at all."""


class _Ring(NamedTuple):
    length: float
    travel: float
    adapter: bool
    thread: str
    """On its lens side."""


def stacks_between(spacers: Table, camera_thread: str, lens_thread: str, cameras: int = 1) -> Stacks:
    """Stacks of up to three rings between a camera and a lens, when that many cameras share the rings.

    Between unequal threads exactly one ring is an adapter; rings of the lens's thread alone are there too, to tell
    what else a pair misses. For each total length (to 1e-9 mm) and travel the stack with fewest rings, then the
    cheapest, then by id.
    """
    units = _units(spacers, camera_thread, lens_thread, cameras)
    alike = camera_thread == lens_thread
    empty = (0, 0.0, (), 0.0, 0.0, alike)
    best: dict[tuple[int, int, bool], tuple] = {}
    for rings in _combinations(units):
        adapters = sum(ring.adapter for ring, _ in rings)
        if adapters > (0 if alike else 1) or not (adapters or all(ring.thread == lens_thread for ring, _ in rings)):
            continue
        taken = [units[ring][i] for ring, i in rings]
        if sum(price for price, _ in taken) == inf:  # no stack of these lengths is cheaper than another
            taken = [sorted(units[ring], key=itemgetter(1))[i] for ring, i in rings]
        length, travel = sum(ring.length for ring, _ in rings), sum(ring.travel for ring, _ in rings)
        stack = (
            len(rings),
            sum(price for price, _ in taken),
            tuple(sorted(id for _, id in taken)),
            length,
            travel,
            alike or adapters == 1,
        )
        key = round(length / SAME_LENGTH), round(travel / SAME_LENGTH), stack[-1]
        if key not in best or stack < best[key]:
            best[key] = stack
    ordered = [empty, *(best[key] for key in sorted(best))]
    columns = list(zip(*ordered))
    return Stacks(
        length=np.array(columns[3]),
        travel=np.array(columns[4]),
        rings=np.array(columns[0]),
        price=np.array([np.nan if total == inf else total for total in columns[1]]),
        joins=np.array(columns[5]),
        ids=columns[2],
    )


def _units(spacers: Table, camera_thread: str, lens_thread: str, cameras: int) -> dict[_Ring, list[tuple[float, str]]]:
    """Price and id of every ring that can stand between the threads, alike rings together, the cheapest first."""
    units: dict[_Ring, list[tuple[float, str]]] = {}
    for row, id in enumerate(spacers["id"]):
        lens_side = thread(spacers["mount"][row])
        camera_side = thread(spacers["camera mount"][row] or spacers["mount"][row])
        adapter = lens_side != camera_side
        if (lens_side, camera_side) != (lens_thread, camera_thread) and (
            adapter or lens_side not in (lens_thread, camera_thread)
        ):
            continue
        quantity, price, travel = (float(spacers[name][row]) for name in ("quantity", "price", "travel"))
        each = MOST_RINGS if isnan(quantity) else int(min(MOST_RINGS, quantity // cameras))
        ring = _Ring(float(spacers["length"][row]), 0.0 if isnan(travel) else travel, adapter, lens_side)
        units.setdefault(ring, []).extend([(inf if isnan(price) else price, id)] * each)
    for same in units.values():
        same.sort()
    return units


def _combinations(units: dict) -> Iterator[list[tuple[_Ring, int]]]:
    """Every choice of rings, as rings and which one of its kind each is."""
    kinds = sorted(units, key=lambda ring: (ring.length, ring.travel))
    for count in range(1, MOST_RINGS + 1):
        for rings in combinations_with_replacement(kinds, count):
            which = [rings[:i].count(ring) for i, ring in enumerate(rings)]
            if all(i < len(units[ring]) for ring, i in zip(rings, which)):
                yield list(zip(rings, which))
