"""Where object, image and pupils lie: Gaussian optics from the principal planes.

Source: W. J. Smith, Modern Optical Engineering, 4th ed., the chapter on paraxial optics.
"""

import numpy as np

from visionplan.optics import Numbers


def object_distance(focal_length: Numbers, magnification: Numbers) -> Numbers:
    """Distance from the front principal plane to the part, f (1 + 1/m), mm.

    >>> float(object_distance(25.0, 0.1))
    275.0
    """
    with np.errstate(divide="ignore"):
        return focal_length * (1 + np.divide(1, magnification))


def image_distance(focal_length: Numbers, magnification: Numbers) -> Numbers:
    """Distance from the rear principal plane to the sensor, f (1 + m), mm."""
    return focal_length * (1 + magnification)


def extension(focal_length: Numbers, magnification: Numbers) -> Numbers:
    """How much farther from the sensor the lens stands than when focused at infinity, f m, mm."""
    with np.errstate(invalid="ignore"):
        return np.multiply(focal_length, magnification)


def magnification_at(focal_length: Numbers, object_distance: Numbers) -> Numbers:
    """Magnification of a part at a distance from the front principal plane, f/(s − f).

    Infinite at s = f, negative nearer than that, where no real image forms; NaN for a telecentric lens, whose
    magnification does not follow from the distance.
    """
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.divide(focal_length, np.subtract(object_distance, focal_length))


def image_distance_of(focal_length: Numbers, object_distance: Numbers) -> Numbers:
    """Distance from the rear principal plane to the image of an object at a distance, mm.

    Negative where the image is virtual, before the lens; focal lengths of diverging lenses are negative.
    """
    with np.errstate(divide="ignore"):
        return np.divide(1, np.divide(1, focal_length) - np.divide(1, object_distance))


def entrance_pupil_distance(focal_length: Numbers, magnification: Numbers, pupil_ratio: Numbers) -> Numbers:
    """Distance from the entrance pupil to the part, f (1/m + 1/p), mm; p is exit over entrance pupil diameter."""
    with np.errstate(divide="ignore"):
        return focal_length * (np.divide(1, magnification) + np.divide(1, pupil_ratio))


def working_f_number(f_number: Numbers, magnification: Numbers, pupil_ratio: Numbers) -> Numbers:
    """F-number of the cone of light on the sensor, N (1 + m/p)."""
    return f_number * (1 + magnification / pupil_ratio)
