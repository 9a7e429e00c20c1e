"""A brief and a catalogue made ready to judge: every symbol of every item as an array, defaults filled in.

NaN stands for a value that the catalogue leaves out and that has no default: what needs it is unknown.
"""

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from functools import cached_property
from math import isnan

import numpy as np

from visionplan.brief.model import Brief
from visionplan.catalogue.items import Catalogue, Table
from visionplan.optics.light import noise_variance
from visionplan.optics.mounts import FLANGE_DISTANCE, thread
from visionplan.optics.stops import stops_between
from visionplan.solve.ask import Arrangement, Ask
from visionplan.solve.stacks import Stacks, joined_threads, stacks_between

DEFAULT_TRANSMITTANCE = 0.9


@dataclass(frozen=True, eq=False)
class Problem:
    """A brief, a catalogue, and what follows from them once for all."""

    brief: Brief
    catalogue: Catalogue
    stop: float | None = None
    """The f-number that every lens stands at, where one is given."""
    stack: Stacks | None = None
    """The one spacer stack there is, where it is given."""
    watch: Callable[[float], None] | None = None
    """Called now and then with the share of a search that is done; what it raises ends the search."""

    @cached_property
    def ask(self) -> Ask:
        """The derived numbers of the brief."""
        return Ask(self.brief)

    @cached_property
    def lens(self) -> dict[str, np.ndarray]:
        """Symbol → array over the lenses; N is (lenses, stops), NaN where a lens has fewer stops."""
        symbols = _lens_symbols(self.catalogue.lenses)
        if self.stop is not None:
            symbols["N"] = np.full((len(self.catalogue.lenses), 1), self.stop)
        return symbols

    @cached_property
    def camera(self) -> dict[str, np.ndarray]:
        """Symbol → array over the cameras."""
        return _camera_symbols(self.catalogue.cameras, self.ask)

    @cached_property
    def flange(self) -> tuple[np.ndarray, np.ndarray]:
        """Flange distances of cameras and of lenses: stated, else usual for the mount, else NaN."""
        usual = self._by_mount([FLANGE_DISTANCE.get(name, np.nan) for name in self.mount_names])
        stated = self.catalogue.cameras["flange distance"], self.catalogue.lenses["flange distance"]
        return np.where(np.isnan(stated[0]), usual[0], stated[0]), np.where(np.isnan(stated[1]), usual[1], stated[1])

    @property
    def flange_unknown(self) -> tuple[np.ndarray, np.ndarray]:
        """Whether the flange distance of a camera, of a lens, is neither stated nor known by its mount."""
        return np.isnan(self.flange[0]), np.isnan(self.flange[1])

    @cached_property
    def mount_names(self) -> tuple[str, ...]:
        """Every mount of a camera or a lens, once."""
        return tuple(dict.fromkeys(self.catalogue.cameras["mount"] + self.catalogue.lenses["mount"]))

    @cached_property
    def mount(self) -> tuple[np.ndarray, np.ndarray]:
        """Mount of each camera and of each lens, as a place in `mount_names`."""
        place = {name: i for i, name in enumerate(self.mount_names)}
        cameras, lenses = self.catalogue.cameras["mount"], self.catalogue.lenses["mount"]
        return np.array([place[name] for name in cameras], int), np.array([place[name] for name in lenses], int)

    def _by_mount(self, values: list) -> tuple[np.ndarray, np.ndarray]:
        """Of each camera and of each lens what stands at its mount's place."""
        of_mount = np.array(values)
        return of_mount[self.mount[0]], of_mount[self.mount[1]]

    @cached_property
    def mount_allowed(self) -> tuple[np.ndarray, np.ndarray]:
        """Whether each camera's and each lens's mount is one that the brief lists."""
        return self._by_mount([name in (self.brief.mounts or ()) for name in self.mount_names])

    @cached_property
    def thread(self) -> tuple[np.ndarray, np.ndarray, tuple[str, ...]]:
        """Thread of each camera and of each lens as a number, and the threads' names."""
        threads = [thread(name) for name in self.mount_names]
        names = tuple(sorted(set(threads)))
        return *self._by_mount([names.index(name) for name in threads]), names

    @cached_property
    def id_rank(self) -> tuple[np.ndarray, np.ndarray]:
        """Place of each camera's and each lens's id among the ids in order."""
        return _order(self.catalogue.cameras["id"]), _order(self.catalogue.lenses["id"])

    @property
    def lens_kinds(self) -> list[str]:
        """Kind of each lens; entocentric where the file leaves it out."""
        return [kind or "entocentric" for kind in self.catalogue.lenses["kind"]]

    @cached_property
    def has_rings(self) -> bool:
        """Whether there is any spacer stack but the empty one."""
        return bool(len(self.catalogue.spacers)) or self.stack is not None

    def stacks_between(
        self, cameras: np.ndarray, lenses: np.ndarray, count: int
    ) -> Iterator[tuple[np.ndarray, Stacks]]:
        """Positions in the rows of `cameras` and `lenses`, and the spacer stacks between them when `count` rigs share
        the rings."""
        if not self.has_rings:
            return
        camera_thread, lens_thread, names = self.thread
        pair = camera_thread[cameras] * len(names) + lens_thread[lenses]
        for number in np.flatnonzero(np.bincount(pair)):  # np.unique would load numpy.ma
            yield np.flatnonzero(pair == number), self._stacks(*divmod(int(number), len(names)), count)

    @cached_property
    def joinable(self) -> np.ndarray:
        """Whether a camera's thread (row) and a lens's (column) are equal or can be joined by an adapter."""
        names = self.thread[2]
        if self.stack is not None:
            return np.eye(len(names), dtype=bool) | self.stack.joins
        joined = joined_threads(self.catalogue.spacers)
        return np.array([[camera == lens or (camera, lens) in joined for lens in names] for camera in names], bool)

    @cached_property
    def _known_stacks(self) -> dict[tuple[int, int, int], Stacks]:
        return {}

    def _stacks(self, camera_thread: int, lens_thread: int, count: int) -> Stacks:
        if self.stack is not None:
            return self.stack
        key = camera_thread, lens_thread, count
        if key not in self._known_stacks:
            names = self.thread[2]
            self._known_stacks[key] = stacks_between(
                self.catalogue.spacers, names[camera_thread], names[lens_thread], count
            )
        return self._known_stacks[key]

    def sides(self, arrangement: Arrangement) -> tuple[np.ndarray, np.ndarray]:
        """Length of every camera's sensor along the field's width and height."""
        long, short = self.camera["wide"], self.camera["high"]
        return (short, long) if arrangement.portrait else (long, short)


def _lens_symbols(table: Table) -> dict[str, np.ndarray]:
    telecentric = np.array([kind == "telecentric" for kind in table["kind"]], bool)
    f = np.where(telecentric, np.inf, table["focal length"])
    mod, nearest = table["nearest object"], table["nearest magnification"]
    length = table["length"]
    with np.errstate(invalid="ignore", divide="ignore"):
        from_nearest = f * (1 + 1 / nearest) - mod
        half = np.where(np.isnan(length), 0.0, length / 2)
        derived = np.where(np.isnan(nearest), half, from_nearest)
        a = np.where(np.isnan(table["front principal"]), derived, table["front principal"])
        reach = mod + a - f
        ring = np.where(np.isnan(nearest), np.where(reach > 0, f * f / reach, np.nan), f * nearest)
    ratio = table["pupil ratio"]
    tolerance = table["working distance tolerance"]
    tau = table["transmittance"]
    return {
        "telecentric": telecentric,
        "f": f,
        "N": _stops(table),
        "p": np.where(telecentric, np.inf, np.where(np.isnan(ratio), 1.0, ratio)),
        "a": np.where(telecentric, 0.0, a),
        "x": np.where(telecentric, 0.0, ring),
        "M": np.where(telecentric, table["magnification"], np.nan),
        "WD_stated": np.where(telecentric, table["working distance"], np.nan),
        "WD_room": np.where(np.isnan(tolerance), 0.0, tolerance),
        "telecentricity": table["telecentricity"],
        "tau": np.where(np.isnan(tau), DEFAULT_TRANSMITTANCE, tau),
        "detail": table["detail limit"],
        "lens_length": length,
        "lens_diameter": table["diameter"],
        "focal_tolerance": table["focal tolerance"],
        "distortion": table["distortion"],
        "circle": table["image circle"],
        "lens_mass": table["mass"],
        "lens_price": table["price"],
        "lens_stock": table["stock"],
    }


def _stops(table: Table) -> np.ndarray:
    """Every lens's stops, the smallest first, NaN after the last: each different list is laid out once."""
    low, high = table["f-number min"].tolist(), table["f-number max"].tolist()
    place: dict[tuple, int] = {}
    number = [place.setdefault(key, len(place)) for key in zip(map(tuple, table["stops"]), low, high)]
    lists = [sorted(listed) or stops_between(least, None if isnan(most) else most) for listed, least, most in place]
    stops = np.full((len(lists), max(map(len, lists), default=1)), np.nan)
    for row, values in enumerate(lists):
        stops[row, : len(values)] = values
    return stops[number]


def _camera_symbols(table: Table, ask: Ask) -> dict[str, np.ndarray]:
    pitch = table["pixel pitch"]
    return {
        "line": np.array([kind == "line" for kind in table["kind"]], bool),
        "P": pitch,
        "wide": table["pixels wide"] * pitch,
        "high": table["pixels high"] * pitch,
        "kappa": np.array([ask.mosaic if colour == "colour" else 1.0 for colour in table["colour"]]),
        "eta": table["quantum efficiency"],
        "variance": noise_variance(table["dark noise"], table["saturation capacity"], table["bit depth"]),
        "saturation": table["saturation capacity"],
        "t_min": table["shortest exposure"],
        "line_rate": table["line rate"],
        "frame_rate": table["frame rate"],
        "camera_length": table["length"],
        "camera_mass": table["mass"],
        "camera_price": table["price"],
        "camera_stock": table["stock"],
    }


def _order(ids: list[str]) -> np.ndarray:
    rank = np.empty(len(ids), int)
    rank[sorted(range(len(ids)), key=ids.__getitem__)] = np.arange(len(ids))
    return rank
