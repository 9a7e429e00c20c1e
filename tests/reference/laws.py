"""The laws of imaging at a given magnification m, scalar. A telecentric lens has no pupil distance: it is infinite."""

import math
from typing import NamedTuple


class Optics(NamedTuple):
    focal_length: float
    f_number: float
    pupil_ratio: float
    telecentric: bool


def object_distance(optics, m):
    return optics.focal_length * (1 + 1 / m)


def pupil_distance(optics, m):
    """From the focus plane to the entrance pupil."""
    if optics.telecentric:
        return math.inf
    return optics.focal_length * (1 / m + 1 / optics.pupil_ratio)


def working_f_number(optics, m):
    if optics.telecentric:
        return optics.f_number
    return optics.f_number * (1 + m / optics.pupil_ratio)


def blur_on_part(optics, m, distance):
    """Diameter, on the surface at that distance from the focus plane, of what the entrance pupil sees as one point."""
    if optics.telecentric:
        return m * distance / optics.f_number
    pupil_diameter = optics.focal_length / optics.f_number
    return pupil_diameter * distance / pupil_distance(optics, m)


def scale_at(optics, m, nearer):
    """Magnification of the surface that lies so much nearer than the focus plane (negative: farther)."""
    if optics.telecentric:
        return m
    u = pupil_distance(optics, m)
    return m * u / (u - nearer)


def blur_on_sensor(optics, m, nearer):
    """Diameter of the cone on the sensor, for a point that lies so much nearer than the focus plane."""
    if optics.telecentric:
        return m * m * abs(nearer) / optics.f_number
    u = pupil_distance(optics, m)
    return m * (optics.focal_length / optics.f_number) * abs(nearer) / (u - nearer)


def layer_shift(layers):
    """How much nearer the layers bring the image of the part."""
    return sum(layer.thickness * (1 - 1 / layer.index) for layer in layers)
