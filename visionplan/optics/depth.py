"""Blur out of the focus plane: on the part as it is judged here, and the classic limits of depth of field.

A cone of the pupil's diameter f/N stands on every point of the focus plane. At Δ from that plane its width on the part
is (f/N) Δ/u, u the distance of the entrance pupil from the focus plane: geometry alone, on both sides alike.
"""

import numpy as np

from visionplan.optics import Numbers


def blur_on_part(f_number: Numbers, magnification: Numbers, pupil_ratio: Numbers, defocus: Numbers) -> Numbers:
    """Diameter of the blur on the part at `defocus` from the focus plane, Δ/(N (1/m + 1/p)), mm."""
    with np.errstate(divide="ignore", invalid="ignore"):
        return defocus / (f_number * (np.divide(1, magnification) + np.divide(1, pupil_ratio)))


def depth_for_blur(f_number: Numbers, magnification: Numbers, pupil_ratio: Numbers, blur: Numbers) -> Numbers:
    """Distance from the focus plane at which the blur on the part reaches `blur`, N β (1/m + 1/p), mm."""
    with np.errstate(divide="ignore"):
        return blur * f_number * (np.divide(1, magnification) + np.divide(1, pupil_ratio))


def hyperfocal_distance(focal_length: Numbers, f_number: Numbers, blur: Numbers) -> Numbers:
    """Nearest focus at which infinity is still sharp, f²/(N c) + f, mm, for a blur of c on the sensor.

    >>> float(hyperfocal_distance(16.0, 4.0, 0.005))
    12816.0
    """
    with np.errstate(divide="ignore"):
        return np.divide(np.square(focal_length), np.multiply(f_number, blur)) + focal_length


def classic_limits(
    focal_length: Numbers, f_number: Numbers, blur: Numbers, object_distance: Numbers
) -> tuple[Numbers, Numbers]:
    """Nearest and farthest distance that is sharp when focused at `object_distance`, mm.

    Exact for a thin lens with its stop at the lens and a blur of `blur` on the sensor; all distances from the lens.
    The far limit is infinite from the hyperfocal distance on. NaN for a telecentric lens.
    """
    with np.errstate(divide="ignore", invalid="ignore"):
        focus = np.divide(1, object_distance)
        spread = np.multiply(f_number, blur) * (1 - focal_length * focus) / np.square(focal_length)
        behind = focus - spread
        # Rounding must not turn "infinite" into 1e15 mm at the hyperfocal distance itself.
        far = np.where(behind > 1e-12 * focus, 1 / behind, np.where(np.isnan(behind), np.nan, np.inf))[()]
        return 1 / (focus + spread), far
