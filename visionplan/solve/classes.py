"""Cameras that are optically the same: judged once, counted many times."""

from dataclasses import dataclass

import numpy as np

from visionplan.solve.problem import Problem

_OPTICS = ("line", "P", "wide", "high", "kappa")
_LIGHT = ("eta", "variance", "saturation")
_MOTION = ("line_rate", "t_min")


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
    ask, camera = problem.ask, problem.camera
    names = list(_OPTICS)
    if ask.brief.snr is not None:
        names += _LIGHT
    if ask.v:
        names += _MOTION
    if ask.brief.headroom is not None:
        names.append("camera_length")
    if ask.brief.max_mass is not None:
        names.append("camera_mass")
    if ask.brief.in_hand:
        names.append("camera_stock")
    columns = [camera[name] for name in dict.fromkeys([*names, *symbols])]
    columns += [problem.mount[0], problem.flange[0], *(() if apart is None else (apart,))]
    key = np.column_stack([np.nan_to_num(column.astype(float), nan=-1.0) for column in columns])[cameras]
    number = _numbers(key)
    order = np.lexsort((*(array[cameras] for array in (problem.id_rank[0], *reversed(within))), number))
    count = np.bincount(number) if len(number) else np.zeros(0, int)
    begin = np.concatenate(([0], np.cumsum(count)))
    members = cameras[order]
    of_all = np.full(len(camera["P"]), -1)
    of_all[cameras] = number
    price = camera["camera_price"][members]
    cheapest = np.fmin.reduceat(price, begin[:-1]) if len(members) else np.zeros(0)
    return Classes(members[begin[:-1]], begin, members, of_all, cheapest)


def _numbers(key: np.ndarray) -> np.ndarray:
    """Number of each row, equal rows alike."""
    rows = np.ascontiguousarray(key).view(f"V{key.shape[1] * key.itemsize}").ravel().tolist() if key.size else []
    seen: dict[bytes, int] = {}
    return np.array([seen.setdefault(row, len(seen)) for row in rows], int)
