"""Rigs that differ in nothing the optics see: rows that fold into one."""

from collections.abc import Sequence
from dataclasses import dataclass

from visionplan.catalogue.items import CAMERA_COLUMNS
from visionplan.solve.rig import Rig

_FREE = ("id", "interface", "cable limit", "price", "stock")
"""What the cameras of rows that fold into one may differ in."""


@dataclass(frozen=True)
class Row:
    """A rig and those that fold into it."""

    rig: Rig
    folded: tuple[Rig, ...] = ()


def fold(rigs: Sequence[Rig]) -> list[Row]:
    """Fold rigs that differ only in the camera's interface (with its cable limit), price or stock into the first."""
    groups: dict[tuple, list[Rig]] = {}
    for rig in rigs:
        groups.setdefault(_key(rig), []).append(rig)
    return [Row(first, tuple(others)) for first, *others in groups.values()]


def _key(rig: Rig) -> tuple:
    cameras, row = rig.case.problem.catalogue.cameras, rig.case.cameras
    stated = tuple(str(cameras[column.name][row]) for column in CAMERA_COLUMNS if column.name not in _FREE)
    set_up = (rig.lens, rig.spacers, rig.orientation, rig.grid, rig.stop, rig.magnification)
    return (*set_up, rig.fits, rig.unknown, rig.missed_gates, *stated)
