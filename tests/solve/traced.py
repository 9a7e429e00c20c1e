"""A lens, a camera and rings of round numbers for these tests, and rays through them."""

import math

from tests.reference.random_parts import table
from visionplan.brief.model import Brief
from visionplan.catalogue.items import Catalogue

LENS = {
    "id": "sixteen",
    "mount": "C",
    "kind": "entocentric",
    "focal length": 16.0,
    "f-number min": 2.8,
    "f-number max": 16.0,
    "nearest object": 100.0,
    "front principal": 12.0,
    "pupil ratio": 1.25,
    "image circle": 20.0,
    "detail limit": 200.0,
    "length": 40.0,
    "diameter": 30.0,
    "mass": 90.0,
    "price": 200.0,
    "focal tolerance": 0.0,
    "nearest magnification": 0.2,
}
OTHER = {**LENS, "id": "longer", "focal length": 25.0}
CAMERA = {
    "id": "square",
    "mount": "C",
    "pixels wide": 2048,
    "pixels high": 1536,
    "pixel pitch": 0.00345,
    "colour": "mono",
    "length": 40.0,
    "mass": 60.0,
    "price": 500.0,
}
RINGS = [{"id": f"R{length:g}", "mount": "C", "length": length, "price": 5.0} for length in (0.5, 2.0, 10.0)]
BRIEF = Brief(field=(120.0, 90.0), feature=0.4, working_distance=(200.0, 450.0), above=4.0, below=1.0)


def catalogue(lenses=(LENS, OTHER), cameras=(CAMERA,), rings=()):
    return Catalogue(
        table("lenses", list(lenses)), table("cameras", list(cameras)), table("spacers", list(rings)), "sha256:by hand"
    )


class Bench:
    """A rig as built: a thin lens with a stop, focused on a plane, over a part that may be tilted.

    Chief rays are traced: straight from a point of the part to the middle of the entrance pupil, bent where they cross
    the lens by the thin-lens law (slope less height over f), straight on to the sensor.
    """

    def __init__(self, f=16.0, ratio=1.25, principal=12.0, pitch=0.00345, distance=300.0, focus=0.0, sunk=0.0):
        """`focus` is the height of the focus plane over the reference plane, `sunk` the shift of the layers."""
        self.f, self.pitch = f, pitch
        self.pupil = f - f / ratio  # before the lens, which then images it `ratio` times as large
        self.reference = distance + principal - sunk
        self.sensor = 1 / (1 / f - 1 / (self.reference - focus))

    def pixel(self, across, up, tilt=(0.0, 0.0), height=0.0):
        """Where a point of the part is drawn, in whole pixels; tilt nearer to the right and to the top."""
        x, y = across * math.cos(tilt[0]), up * math.cos(tilt[1])
        away = self.reference - height - across * math.sin(tilt[0]) - up * math.sin(tilt[1])
        return tuple(round(-self._image(side, away) / self.pitch) for side in (x, y))

    def _image(self, side, away):
        slope = -side / (away - self.pupil)
        at_lens = side + slope * away
        return at_lens + (slope - at_lens / self.f) * self.sensor

    def span(self, length, along="width", middle=(0.0, 0.0), tilt=(0.0, 0.0), height=0.0):
        """How many pixels a target spans."""
        half = (length / 2, 0.0) if along == "width" else (0.0, length / 2)
        ends = [self.pixel(middle[0] + s * half[0], middle[1] + s * half[1], tilt, height) for s in (1, -1)]
        axis = 0 if along == "width" else 1
        return ends[0][axis] - ends[1][axis]
