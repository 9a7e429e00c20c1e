"""Modulation of a periodic pattern: the autocorrelation of a defocused circular pupil, times the pixel's aperture.

With the pupil's radius 1 and the two pupils s to either side, the wavefront W020 (x² + y²) differs between them by
4 W020 s x (Hopkins 1955), which doesn't depend on y: each strip of the overlap has one phase and the height of the
lens-shaped overlap, and the strips are added up by Simpson's rule.
"""

import math
from functools import cache

from tests.reference.laws import blur_on_sensor, pupil_distance, scale_at, working_f_number


@cache
def optical_transfer(s, waves):
    """OTF at the fraction s of the cutoff frequency, with W020 in wavelengths. Good to 1e-6."""
    if s >= 1:
        return 0.0
    phase = 2 * math.pi * waves * 4 * s
    swing = phase * (1 - s)
    if swing > 1e4:
        return 0.0  # its envelope, swing to the -3/2, has fallen below 1e-6
    # x = cos(angle) - s makes the strip's height sin(angle) smooth at the ends of the overlap
    widest = math.acos(s)
    n = 2 * (100 + int(swing))
    step = widest / n
    total = 0.0
    for i in range(n + 1):
        angle = i * step
        weight = 1 if i in (0, n) else 4 if i % 2 else 2
        total += weight * math.sin(angle) ** 2 * math.cos(phase * (math.cos(angle) - s))
    return 4 / math.pi * total * step / 3


def pixel_transfer(frequency, pitch):
    x = math.pi * frequency * pitch
    return math.sin(x) / x


def modulation(optics, m, pitch, wavelength, feature, nearer):
    """Of a pattern of bars as wide as the feature, so much nearer than the focus plane (negative: farther)."""
    if pupil_distance(optics, m) <= nearer:
        return 0.0
    frequency = 1 / (2 * feature * scale_at(optics, m, nearer))
    f_number = working_f_number(optics, m)
    wavefront = blur_on_sensor(optics, m, nearer) / (8 * f_number)
    blurred = optical_transfer(frequency * wavelength * f_number, wavefront / wavelength)
    return blurred * pixel_transfer(frequency, pitch)
