"""F-stops as marked on lenses."""

import math

FULL_STOPS = (1, 1.4, 2, 2.8, 4, 5.6, 8, 11, 16, 22, 32)
"""The full-stop series of ISO 517, as marked."""


def stops_between(low: float, high: float | None) -> tuple[float, ...]:
    """Both ends and the full stops strictly between them; the low end alone when there is no other.

    >>> stops_between(1.8, 8)
    (1.8, 2, 2.8, 4, 5.6, 8)
    """
    if high is None or math.isnan(high) or high == low:
        return (low,)
    return (low, *(stop for stop in FULL_STOPS if low < stop < high), high)
