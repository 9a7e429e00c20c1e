"""Lenses, cameras and rings as plain scalars, with what is assumed where a catalogue is silent. None: not stated."""

import math
from typing import NamedTuple

FLANGE = {"C": 17.526, "CS": 12.526, "F": 46.5}
FULL_STOPS = (1, 1.4, 2, 2.8, 4, 5.6, 8, 11, 16, 22, 32)
ROUNDING = 1e-12
"""Every comparison forgives this much, relative."""


def at_most(value, limit):
    return value <= limit + ROUNDING * abs(limit)


def thread(mount):
    return "C" if mount in ("C", "CS") else mount


class Ring(NamedTuple):
    id: str
    thread: str
    length: float
    price: float | None
    quantity: int | None


class Camera(NamedTuple):
    id: str
    mount: str
    line_scan: bool
    pixels_wide: int
    pixels_high: int
    pitch: float
    row: dict
    """Every other cell by its heading."""


class Lens(NamedTuple):
    id: str
    mount: str
    telecentric: bool
    focal_length: float
    """Infinite for a telecentric lens."""
    pupil_ratio: float
    """Infinite for a telecentric lens."""
    magnification: float | None
    """Of a telecentric lens."""
    stops: tuple
    front_principal: float
    ring_travel: float | None
    """How far the focus ring moves the lens out; None where it can't be known."""
    row: dict
    assumptions: tuple


def rows(table):
    """Each row as a dict from heading to number, text or tuple of stops; None where the cell is empty."""
    for i in range(len(table)):
        row = {}
        for heading, column in table.values.items():
            cell = column[i]
            if isinstance(cell, str | tuple):
                row[heading] = cell or None
            else:
                number = float(cell)
                row[heading] = None if math.isnan(number) else number
        yield row


def camera(row):
    return Camera(
        row["id"],
        row["mount"],
        row["kind"] == "line",
        int(row["pixels wide"]),
        int(row["pixels high"]),
        row["pixel pitch"],
        row,
    )


def ring(row):
    quantity = row["quantity"]
    return Ring(
        row["id"], thread(row["mount"]), row["length"], row["price"], None if quantity is None else int(quantity)
    )


def lens(row):
    least, greatest = row["f-number min"], row["f-number max"]
    if row["stops"]:
        stops = tuple(row["stops"])
    elif greatest is None:
        stops = (least,)
    else:
        stops = tuple(sorted({least, greatest, *(n for n in FULL_STOPS if least < n < greatest)}))
    if row["kind"] == "telecentric":
        return Lens(row["id"], row["mount"], True, math.inf, math.inf, row["magnification"], stops, 0.0, None, row, ())
    told = []
    pupil_ratio = row["pupil ratio"]
    if pupil_ratio is None:
        pupil_ratio = 1.0
        told.append("pupil ratio 1")
    front, told_front = _front_principal(row)
    told += told_front
    return Lens(
        row["id"],
        row["mount"],
        False,
        row["focal length"],
        pupil_ratio,
        None,
        stops,
        front,
        _ring_travel(row, front),
        row,
        tuple(told),
    )


def _front_principal(row):
    f, nearest, m_near = row["focal length"], row["nearest object"], row["nearest magnification"]
    if row["front principal"] is not None:
        return row["front principal"], []
    if m_near is not None:  # the object distance at that magnification, less the distance from the front
        return f * (1 + 1 / m_near) - nearest, ["front principal plane from the nearest magnification"]
    if row["length"] is not None:
        return row["length"] / 2, ["front principal plane at half the length: working distance approximate"]
    return 0.0, ["front principal plane at the front: working distance approximate"]


def _ring_travel(row, front):
    f, m_near = row["focal length"], row["nearest magnification"]
    if m_near is not None:
        return f * (1 + m_near) - f  # image distance there, less that at infinity
    object_distance = row["nearest object"] + front
    if object_distance <= f:
        return None  # no real image: the stated distances can't both be right
    image_distance = 1 / (1 / f - 1 / object_distance)
    return image_distance - f


def flange_difference(cam, len_):
    """Camera flange distance less the lens's, mm; None where it can't be known."""
    of_camera = cam.row["flange distance"] or FLANGE.get(cam.mount)
    of_lens = len_.row["flange distance"] or FLANGE.get(len_.mount)
    if of_camera is None and of_lens is None and cam.mount == len_.mount:
        return 0.0
    if of_camera is None or of_lens is None:
        return None
    return of_camera - of_lens
