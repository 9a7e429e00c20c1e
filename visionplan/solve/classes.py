"""Cameras that are optically the same: judged once, counted many times."""

from dataclasses import dataclass

import numpy as np

from visionplan.solve.problem import Problem

_OPTICS = ("line", "P", "wide", "high", "kappa")
_LIGHT = ("eta", "variance", "saturation")
_MOTION = ("line_rate", "t_min")


@dataclass(frozen=True)
class Classes:
    """Groups of cameras: those of a class stand side by side, cheapest first, then by id."""

    first: np.ndarray
    """Row of one camera of each class."""
    begin: np.ndarray
    """Where each class begins in `members`; one more at the end."""
    members: np.ndarray
    """Rows of the cameras, class by class: nothing unknown first, then cheapest, not stated last, then by id."""

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


def classes_of(problem: Problem, cameras: np.ndarray, unknown: np.ndarray, symbols: tuple[str, ...] = ()) -> Classes:
    """Group the given rows of cameras by everything that the demands asked for can tell apart, and by `symbols`.

    `unknown` says of every camera of the catalogue whether a gate of its own is unknown.
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
    columns += [problem.mount[0], problem.flange[0]]
    key = np.column_stack([np.nan_to_num(column.astype(float), nan=-1.0) for column in columns])[cameras]
    number = _numbers(key)
    ids = problem.catalogue.cameras["id"]
    by_id = np.empty(len(ids), int)
    by_id[sorted(range(len(ids)), key=ids.__getitem__)] = np.arange(len(ids))
    order = np.lexsort((by_id[cameras], camera["camera_price"][cameras], unknown[cameras], number))
    count = np.bincount(number) if len(number) else np.zeros(0, int)
    begin = np.concatenate(([0], np.cumsum(count)))
    members = cameras[order]
    return Classes(members[begin[:-1]], begin, members)


def _numbers(key: np.ndarray) -> np.ndarray:
    """Number of each row, equal rows alike."""
    rows = np.ascontiguousarray(key).view(f"V{key.shape[1] * key.itemsize}").ravel().tolist() if key.size else []
    seen: dict[bytes, int] = {}
    return np.array([seen.setdefault(row, len(seen)) for row in rows], int)
