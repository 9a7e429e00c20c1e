"""Spacer stacks: which lengths the rings between a camera and a lens can make, and with which rings."""

from collections.abc import Iterable, Iterator
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
    for rings in _combinations(units, lens_thread):
        joins = alike or rings[0].adapter
        length, travel = sum([ring.length for ring in rings]), sum([ring.travel for ring in rings])
        key = round(length / SAME_LENGTH), round(travel / SAME_LENGTH), joins
        if key in best and best[key][0] < len(rings):
            continue
        kinds = [(units[ring], rings.count(ring)) for ring in dict.fromkeys(rings)]
        taken = [unit for same, count in kinds for unit in same[:count]]
        if len(taken) < len(rings):
            continue
        price = sum([price for price, _ in taken])
        if price == inf:  # no stack of these lengths is cheaper than another
            taken = [unit for same, count in kinds for unit in sorted(same, key=itemgetter(1))[:count]]
        stack = len(rings), price, tuple(sorted([id for _, id in taken])), length, travel, joins
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


def joined_threads(spacers: Table) -> set[tuple[str, str]]:
    """Threads of camera and of lens between which there is a ring."""
    return {sides for sides, quantity in zip(_sides(spacers), spacers["quantity"]) if not quantity < 1}


def _sides(spacers: Table) -> Iterator[tuple[str, str]]:
    """Threads of each ring: on its camera's side, on its lens's."""
    for lens_side, camera_side in zip(spacers["mount"], spacers["camera mount"]):
        yield thread(camera_side or lens_side), thread(lens_side)


def _units(spacers: Table, camera_thread: str, lens_thread: str, cameras: int) -> dict[_Ring, list[tuple[float, str]]]:
    """Price and id of every ring that can stand between the threads, alike rings together, the cheapest first."""
    units: dict[_Ring, list[tuple[float, str]]] = {}
    for row, (id, (camera_side, lens_side)) in enumerate(zip(spacers["id"], _sides(spacers))):
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


def _combinations(rings: Iterable[_Ring], lens_thread: str) -> Iterator[tuple[_Ring, ...]]:
    """Rings of the lens's thread alone, or an adapter and rings of either thread; fewest first."""
    kinds = sorted(rings, key=lambda ring: (ring.length, ring.travel))
    adapters, plain = [ring for ring in kinds if ring.adapter], [ring for ring in kinds if not ring.adapter]
    of_lens = [ring for ring in plain if ring.thread == lens_thread]
    for count in range(1, MOST_RINGS + 1):
        yield from combinations_with_replacement(of_lens, count)
        for adapter in adapters:
            for others in combinations_with_replacement(plain, count - 1):
                yield adapter, *others
