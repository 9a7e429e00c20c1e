"""Cameras that are optically the same: judged once, counted many times.

Cameras of a class may differ in their length, mass, price and frame rate, of which a rig can only have too much (or too
little): a class is judged by a stand-in that has the best of each, and so are all its cameras, too well if at all.
"""

from dataclasses import dataclass

import numpy as np

from visionplan.solve.problem import Problem

_OPTICS = ("line", "P", "wide", "high", "kappa")
_LIGHT = ("eta", "variance", "saturation")
_MOTION = ("line_rate", "t_min")
_STAND_IN = {"camera_length": 1, "camera_mass": 1, "camera_price": 1, "frame_rate": -1}
"""Symbol → whether less (1) or more (−1) of it is better."""


@dataclass(frozen=True)
class Classes:
    """Groups of cameras; those of a class stand side by side."""

    first: np.ndarray
    """Row of one camera of each class."""
    begin: np.ndarray
    """Where each class begins in `members`; one more at the end."""
    members: np.ndarray
    """Rows of the cameras, class by class, in the order asked for."""
    number: np.ndarray
    """Class of every camera of the catalogue; −1 for those left out."""
    cheapest: np.ndarray
    """Least price in each class; NaN where none is stated."""

    def __len__(self) -> int:
        return len(self.first)

    @property
    def size(self) -> np.ndarray:
        """How many cameras each class has."""
        return np.diff(self.begin)

    def spread(self, classes: np.ndarray, most: int | None = None) -> tuple[np.ndarray, np.ndarray]:
        """Every camera, or the first `most`, of each class given: positions in `classes`, and rows of cameras."""
        count = self.size[classes]
        if most is not None:
            count = np.minimum(count, most)
        position = np.repeat(np.arange(len(classes)), count)
        within = np.arange(len(position)) - np.repeat(np.cumsum(count) - count, count)
        return position, self.members[self.begin[classes][position] + within]

    def stand_ins(self, problem: Problem) -> Problem:
        """The problem with the first camera of each class as good as any of the class in each respect."""
        camera = dict(problem.camera)
        for symbol, sign in _STAND_IN.items() if len(self) else ():
            values = camera[symbol].copy()
            values[self.first] = sign * np.fmin.reduceat(sign * values[self.members], self.begin[:-1])
            camera[symbol] = values
        for shared in ("lens", "flange", "flange_unknown", "mount", "thread", "joinable", "mount_allowed"):
            getattr(problem, shared)  # worked out once for both
        other = Problem(problem.brief, problem.catalogue, problem.stop, problem.stack)
        other.__dict__.update(problem.__dict__ | {"camera": camera})
        return other


def classes_of(
    problem: Problem,
    cameras: np.ndarray,
    symbols: tuple[str, ...] = (),
    within: tuple[np.ndarray, ...] = (),
    apart: np.ndarray | None = None,
) -> Classes:
    """Group the given rows of cameras by everything that the demands asked for can tell apart, and by `symbols`.

    `within` are arrays over all cameras by which those of a class are ordered, the first first, then by id; `apart`
    is one that parts classes too.
    """
    brief, camera = problem.brief, problem.camera
    names = list(_OPTICS)
    if brief.snr is not None:
        names += _LIGHT
    if problem.ask.v:
        names += _MOTION
    if brief.headroom is not None and (brief.min_contrast is not None or brief.min_yield is not None):
        names.append("camera_length")  # headroom moves the working point, and a better one may have less contrast
    columns = [camera[name] for name in dict.fromkeys([*names, *symbols])]
    if brief.in_hand:
        columns.append(np.minimum(camera["camera_stock"], brief.max_count))
    stated = {"camera_length": brief.headroom, "camera_mass": brief.max_mass, "camera_price": brief.max_price}
    columns += [np.isnan(camera[symbol]) for symbol, asked in stated.items() if asked is not None]
    columns += [problem.mount[0], problem.flange[0], *(() if apart is None else (apart,))]
    number = _numbers([np.nan_to_num(column[cameras].astype(float), nan=-1.0) for column in columns])
    order = np.lexsort((*(array[cameras] for array in (problem.id_rank[0], *reversed(within))), number))
    count = np.bincount(number) if len(number) else np.zeros(0, int)
    begin = np.concatenate(([0], np.cumsum(count)))
    members = cameras[order]
    of_all = np.full(len(camera["P"]), -1)
    of_all[cameras] = number
    price = camera["camera_price"][members]
    cheapest = np.fmin.reduceat(price, begin[:-1]) if len(members) else np.zeros(0)
    return Classes(members[begin[:-1]], begin, members, of_all, cheapest)


def _numbers(columns: list[np.ndarray]) -> np.ndarray:
    """Number of each row, rows alike in every column alike."""
    number = np.zeros(len(columns[0]), int)
    for column in columns:
        if len(column) and (column != column[0]).any():
            of_column = np.unique(column, return_inverse=True)[1]
            number = np.unique(number * (of_column.max() + 1) + of_column, return_inverse=True)[1]
    return number
