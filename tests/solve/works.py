"""Catalogues and rigs of a few rows, built in memory."""

from tests.reference.random_parts import table
from visionplan.catalogue.items import Catalogue

LENS = {
    "id": "lens",
    "mount": "C",
    "focal length": 25.0,
    "f-number min": 1.4,
    "f-number max": 16.0,
    "nearest object": 100.0,
    "pupil ratio": 1.0,
    "front principal": 10.0,
    "image circle": 20.0,
    "detail limit": 200.0,
    "length": 40.0,
    "price": 100.0,
    "flange distance": 17.526,
}
CAMERA = {
    "id": "camera",
    "mount": "C",
    "colour": "mono",
    "pixels wide": 2000.0,
    "pixels high": 1500.0,
    "pixel pitch": 0.005,
    "length": 50.0,
    "price": 300.0,
    "flange distance": 17.526,
}


def catalogue(lenses=({},), cameras=({},), spacers=()) -> Catalogue:
    """Each row given as what differs from LENS, CAMERA."""
    return Catalogue(
        table("lenses", [LENS | lens for lens in lenses]),
        table("cameras", [CAMERA | camera for camera in cameras]),
        table("spacers", list(spacers)),
        "sha256:none",
    )
