"""Random lenses, cameras and rings as rows of a catalogue, some cells left out."""

import math
import random

import numpy as np

from visionplan.catalogue.items import COLUMNS, Catalogue, Table


def catalogue(rng: random.Random):
    """A catalogue built in memory, with its camera and lens rows."""
    thin = rng.choice((0.0, 0.05, 0.3))  # how likely a cell is empty
    lenses = [lens(rng, i, thin) for i in range(rng.randint(3, 8))]
    cameras = [camera(rng, i, thin) for i in range(rng.randint(3, 6))]
    rings = [ring(rng, i) for i in range(rng.choice((0, 0, 1, 2, 3, 4)))]
    tables = [table(*rows) for rows in (("lenses", lenses), ("cameras", cameras), ("spacers", rings))]
    return Catalogue(*tables, "sha256:random"), cameras, lenses


def table(item, rows):
    values = {}
    for column in COLUMNS[item]:
        cells = [row.get(column.name) for row in rows]
        if column.kind in ("number", "count"):
            values[column.name] = np.array([math.nan if cell is None else cell for cell in cells], dtype=float)
        else:
            values[column.name] = [(() if column.kind == "stops" else "") if cell is None else cell for cell in cells]
    index = {row["id"]: i for i, row in enumerate(rows)}
    return Table(item, values, range(2, len(rows) + 2), f"{item}.csv", index=index)


def some(rng, probability, value):
    return value if rng.random() < probability else None


def log_uniform(rng, low, high):
    return math.exp(rng.uniform(math.log(low), math.log(high)))


def figures(value, digits=3):
    """Rounded as a data sheet or a brief would have it, so that equals and exact fits happen."""
    return float(f"{value:.{digits}g}")


def mount(rng):
    return rng.choices(("C", "CS", "F", "M42"), (76, 12, 8, 4))[0]


def flange(rng, mount_, missing):
    nominal = {"C": 17.526, "CS": 12.526, "F": 46.5, "M42": 45.46}[mount_]
    return some(rng, (1 - missing) * (0.7 if mount_ == "M42" else 0.3), nominal)


def lens(rng, i, thin):
    state = lambda value: some(rng, 1 - thin, value)  # noqa: E731
    thread = mount(rng)
    least = rng.choice((1.2, 1.4, 1.8, 2, 2.8, 4, 8, 16))
    greatest = rng.choice((8, 11, 16, 22, 32, least))
    common = {
        "id": f"lens-{i}",
        "mount": thread,
        "f-number min": least,
        "f-number max": max(least, greatest),
        "stops": some(rng, 0.1, tuple(sorted({least, 4.5, 6.3, max(greatest, 6.3)}))),
        "image circle": state(rng.choice((11, 16, 22, 30, 30, 45))),
        "distortion": state(rng.choice((-1, 1)) * figures(log_uniform(rng, 0.0005, 0.03), 2)),
        "detail limit": state(rng.choice((80, 100, 120, 160, 200))),
        "transmittance": some(rng, 0.5, rng.choice((0.8, 0.85, 0.95))),
        "diameter": state(rng.choice((29, 33, 40, 58))),
        "mass": state(rng.choice((60, 90, 150, 300))),
        "price": state(rng.choice((100, 250, 400, 800, 1500))),
        "stock": state(rng.choice((0, 1, 2, 5))),
        "flange distance": flange(rng, thread, thin),
    }
    if rng.random() < 0.2:
        return {
            **common,
            "kind": "telecentric",
            "focal length": some(rng, 0.2, 50.0),
            "f-number max": some(rng, 0.3, max(least, greatest)),
            "magnification": figures(log_uniform(rng, 0.05, 1.5)),
            "working distance": figures(rng.uniform(60, 250)),
            "working distance tolerance": some(rng, 0.6, rng.choice((0, 1, 3, 6))),
            "telecentricity": state(figures(math.radians(rng.uniform(0.02, 0.3)))),
            "length": state(figures(rng.uniform(80, 250))),
        }
    f = rng.choice((4, 6, 8, 12, 16, 25, 35, 50, 75, 100, figures(log_uniform(rng, 2, 200))))
    length = figures(rng.uniform(25, 60) + f * rng.uniform(0, 0.8))
    front = figures(rng.uniform(-0.2, 0.9) * length)
    m_near = figures(log_uniform(rng, 0.02, 1.0))
    nearest = figures(f * (1 + 1 / m_near) - front)
    nearest = nearest if nearest > 0 and nearest + front > f * 1.01 else figures(f * 30)
    return {
        **common,
        "kind": some(rng, 0.3, "entocentric"),
        "focal length": f,
        "nearest object": nearest,
        "nearest magnification": some(rng, 0.4, m_near),
        "front principal": some(rng, 0.5, front),
        "pupil ratio": some(rng, 0.6, figures(log_uniform(rng, 0.3, 3), 2)),
        "length": state(length),
        "focal tolerance": some(rng, 0.3, 0.02),
    }


def camera(rng, i, thin):
    state = lambda value: some(rng, 1 - thin, value)  # noqa: E731
    thread = mount(rng)
    common = {
        "id": f"cam-{i}",
        "mount": thread,
        "colour": state(rng.choice(("mono", "mono", "colour"))),
        "interface": state(rng.choice(("GigE Vision", "USB3 Vision"))),
        "cable limit": state(rng.choice((5000, 100000))),
        "bit depth": state(rng.choice((8, 10, 12))),
        "shortest exposure": state(rng.choice((5e-6, 1e-5, 5e-5))),
        "quantum efficiency": state(rng.choice((0.4, 0.55, 0.7))),
        "dark noise": state(figures(log_uniform(rng, 1.5, 30), 2)),
        "saturation capacity": state(figures(log_uniform(rng, 3000, 40000), 2)),
        "length": state(rng.choice((28, 40, 55, 80))),
        "mass": state(rng.choice((40, 90, 200))),
        "price": state(rng.choice((300, 500, 900, 1500, 3000))),
        "stock": state(rng.choice((0, 1, 2, 5))),
        "flange distance": flange(rng, thread, thin),
    }
    if rng.random() < 0.2:
        return {
            **common,
            "kind": "line",
            "pixels wide": rng.choice((1024, 2048, 4096)),
            "pixels high": 1,
            "pixel pitch": rng.choice((0.005, 0.007, 0.01)),
            "line rate": state(rng.choice((10e3, 20e3, 80e3))),
        }
    wide, high = rng.choice(((640, 480), (1280, 1024), (1920, 1200), (2448, 2048), (4096, 3000)))
    return {
        **common,
        "kind": some(rng, 0.3, "area"),
        "pixels wide": wide,
        "pixels high": high,
        "pixel pitch": rng.choice((0.0024, 0.00345, 0.0048, 0.0055)),
        "shutter": state(rng.choice(("global", "global", "rolling"))),
        "frame rate": state(rng.choice((15, 40, 120))),
    }


def ring(rng, i):
    return {
        "id": f"ring-{i}",
        "mount": rng.choice(("C", "C", "C", "F")),
        "length": rng.choice((0.5, 1, 2, 5, 5, 10, 20)),
        "price": some(rng, 0.8, rng.choice((0, 15, 25))),
        "quantity": some(rng, 0.5, rng.choice((0, 1, 2, 4))),
    }
