"""The size of the sensor."""

import numpy as np

from visionplan.optics import Numbers


def sides(pixels_wide: Numbers, pixels_high: Numbers, pitch: Numbers, portrait: Numbers) -> tuple[Numbers, Numbers]:
    """Sides of the sensor along the field's width and height, mm; `portrait` turns the camera by 90°."""
    width: np.ndarray = np.multiply(pixels_wide, pitch)
    height: np.ndarray = np.multiply(pixels_high, pitch)
    return np.where(portrait, height, width)[()], np.where(portrait, width, height)[()]


def diagonal(width: Numbers, height: Numbers) -> Numbers:
    """Diagonal of a rectangle, mm."""
    return np.hypot(width, height)
