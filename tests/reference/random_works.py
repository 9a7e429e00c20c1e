"""Random small works to judge: a catalogue, and a brief drawn around one of its pairs.

A brief asks for about what that pair can do at some magnification, each demand a little more or a little less, so that
a good share fits and many miss narrowly.
"""

import math
import random

from tests.reference.random_parts import catalogue, figures, log_uniform, some
from visionplan.brief.model import Brief, Layer

WAVELENGTHS = (450, 470, 500, 525, 550, 550, 550, 590, 625, 660)
KEYS = {
    "scene": "field above below feature pixels_per_feature max_perspective placement mosaic_factor",
    "station": "working_distance headroom cable_room working_distance_tolerance tilt layers",
    "motion": "speed along rate",
    "light": "illuminance irradiance reflectance wavelength snr max_exposure pulse",
    "focus": "min_contrast",
    "choose": "sensor mounts interfaces cable max_distortion max_count overlap max_price max_mass max_diameter"
    " lens_kinds in_hand cameras lenses",
}
LINES = {key: f"{section}.{key}" for section, keys in KEYS.items() for key in keys.split()} | {
    "comfort": "comfort",
    "strict": "strict",
    "motion_blur": "motion.blur",
    "motion_blur_pixels": "motion.blur_pixels",
    "focus_blur": "focus.blur",
    "focus_blur_pixels": "focus.blur_pixels",
    "focus_plane": "focus.plane",
}
"""The brief's line by attribute."""


def works(seed):
    """A brief and a catalogue."""
    rng = random.Random(seed)
    known, cameras, lenses = catalogue(rng)
    pairs = [(cam, lens) for cam in cameras for lens in lenses]
    matching = [(cam, lens) for cam, lens in pairs if cam["mount"] == lens["mount"]]
    cam, lens = rng.choice(matching if matching and rng.random() < 0.8 else pairs)
    hard = rng.choice((0.35, 0.5, 0.7, 1.0))  # how much is asked of what there is
    picky = rng.choice((0.05, 0.3, 1.0))  # how likely a line is stated that narrows the choice
    near = lambda spread=0.25: hard * math.exp(rng.uniform(-spread, spread))  # noqa: E731
    m, distance = standing(rng, lens)
    asks = scene(rng, cam, m, near, picky)
    if len(known.spacers) > 2:
        asks["max_count"] = min(asks["max_count"], 2)  # stacks times grids: keep the reference quick
    q = asks["feature"] / asks["pixels_per_feature"]
    asks |= focus(rng, lens, q, m, distance, near)
    asks |= station(rng, asks, distance, near)
    asks |= motion(rng, cam, q, picky) | light(rng, picky)
    asks |= choices(rng, asks, cameras, lenses, picky)
    asks = {key: value for key, value in asks.items() if value is not None}
    stated = frozenset(LINES[key] for key in asks)
    return Brief(**asks, title=f"Random works {seed}", stated=stated), known


def standing(rng, lens):
    """A magnification that the lens may be used at, and the working distance there."""
    if lens["kind"] == "telecentric":
        return lens["magnification"], lens["working distance"]
    f = lens["focal length"]
    distance = lens["nearest object"] * log_uniform(rng, 1.0, 6) + 0.5 * f
    return f / max(distance - f, 0.3 * f), distance


def scene(rng, cam, m, near, picky):
    pitch = cam["pixel pitch"]
    sides = [cam["pixels wide"] * pitch / m, cam["pixels high"] * pitch / m]
    along = rng.choice(("height", "height", "width"))
    if cam["kind"] == "line":
        sides[1] = sides[0] * rng.uniform(0.3, 2)
        if along == "width":
            sides.reverse()
    elif rng.random() < 0.3:
        sides.reverse()
    count = rng.choice((1, 1, 1, 1, 2, 3, 4))
    sides[rng.randint(0, 1)] *= rng.choice((1, count))
    pixels = rng.choice((3.0, 4.0, 4.0, 5.0))
    return {
        "field": tuple(figures(side * 0.9 * near()) for side in sides),
        "placement": some(rng, 0.3, figures(0.02 * sides[0])),
        "pixels_per_feature": pixels,
        "feature": figures(pixels * pitch / m * 1.1 / near()),
        "mosaic_factor": some(rng, 0.2, rng.choice((1.0, 1.4, 2.0))),
        "along": along,
        "max_count": count,
        "overlap": some(rng, 0.5, figures(sides[0] * 0.02)),
        "comfort": rng.choice((0.0, 0.1, 0.2, 0.2, 0.5)),
        "strict": some(rng, 0.2 * picky, True),
    }


def focus(rng, lens, q, m, distance, near):
    blur = some(rng, 0.2, figures(1.5 * q))
    pixels = None if blur else some(rng, 0.3, rng.choice((0.8, 1.5, 2.0)))
    f = lens["focal length"] if lens["kind"] != "telecentric" else distance * m
    depth = 6 * (blur or q * (pixels or 1.0)) * distance / f  # at about f/6
    share = rng.choice((0.0, 0.5, 1.0)) * near()
    above = min(figures(share * depth * rng.random()), figures(distance * 0.3))
    below = figures(share * depth * rng.random())
    return {
        "focus_blur": blur,
        "focus_blur_pixels": pixels,
        "above": above,
        "below": below,
        "focus_plane": some(rng, 0.3, rng.choice((0.0, above / 2, -below / 2))),
        "working_distance_tolerance": some(rng, 0.3, figures(0.2 * depth * near())),
        "tilt": some(rng, 0.2, rng.choice((0.005, 0.01, 0.02))),
        "max_perspective": some(rng, 0.3, figures((above + below) / distance / near(0.4)) or None),
        "min_contrast": some(rng, 0.15, rng.choice((0.1, 0.2, 0.4))),
    }


def station(rng, asks, distance, near):
    glass, water = Layer(rng.choice((3.0, 6.0)), 1.5185, "N-BK7"), Layer(8.0, 1.333)
    layers = rng.choice(((), (), (), (glass,), (glass, water)))
    least = 1 + 1.01 * max(asks["above"], sum(layer.thickness for layer in layers))
    nearest = max(least, figures(distance * rng.uniform(0.5, 1.02)))
    return {
        "working_distance": (nearest, max(nearest, figures(distance * rng.uniform(0.97, 1.8)))),
        "layers": layers,
        "headroom": some(rng, 0.5, figures((distance + 60 + rng.uniform(60, 300)) / near(0.15))),
        "cable_room": some(rng, 0.3, 30.0),
    }


def motion(rng, cam, q, picky):
    if cam["kind"] != "line" and rng.random() > 0.2 + 0.4 * picky:
        return {}
    blur = some(rng, 0.2, figures(q))
    return {
        "speed": figures(log_uniform(rng, 20, 1000)),
        "motion_blur": blur,
        "motion_blur_pixels": None if blur else some(rng, 0.3, 2.0),
        "pulse": some(rng, 0.2, figures(log_uniform(rng, 5e-6, 3e-4))),
    }


def light(rng, picky):
    snr = some(rng, 0.3 + 0.3 * picky, figures(log_uniform(rng, 8, 150), 2))
    level = log_uniform(rng, 1e3, 1e6)
    kind = rng.choice(("illuminance", "illuminance", "irradiance", None))
    levels = {kind: figures(level if kind == "illuminance" else level / 300)} if kind else {}
    return levels | {
        "rate": some(rng, 0.4, rng.choice((1.0, 4.0, 20.0, 60.0))),
        "wavelength": rng.choice(WAVELENGTHS) * 1e-6,
        "max_exposure": some(rng, 0.3, rng.choice((0.001, 0.005, 0.02))),
        "snr": snr,
        "reflectance": some(rng, 1.0 if snr else 0.5, rng.choice((0.1, 0.5, 0.9))),
    }


def choices(rng, asks, cameras, lenses, picky):
    kinds = (("entocentric",), ("entocentric", "telecentric"))
    return {
        "sensor": some(rng, 0.4 * picky, rng.choice(("mono", "mono", "colour"))),
        "mounts": some(rng, 0.15 * picky, ("C", "CS")),
        "interfaces": some(rng, 0.15 * picky, ("GigE Vision",)),
        "cable": some(rng, 0.15 * picky, 20000.0),
        "max_distortion": some(rng, 0.3 * picky, rng.choice((0.005, 0.01, 0.03))),
        "max_price": some(rng, 0.3 * picky, rng.choice((800, 1500, 4000)) * asks["max_count"]),
        "max_mass": some(rng, 0.15 * picky, rng.choice((200, 400))),
        "max_diameter": some(rng, 0.15 * picky, rng.choice((35, 50))),
        "lens_kinds": some(rng, 0.1 * picky, rng.choice(kinds)),
        "in_hand": some(rng, 0.1 * picky, True),
        "cameras": some(rng, 0.05 * picky, tuple(row["id"] for row in cameras[:2])),
        "lenses": some(rng, 0.05 * picky, tuple(row["id"] for row in lenses[:4])),
    }
