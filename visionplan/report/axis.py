"""A logarithmic axis over terminal cells, with round labels."""

import math
from collections.abc import Iterable
from dataclasses import dataclass
from itertools import pairwise

from visionplan.text import figure

_SETS = (
    (1.0, 1.2, 1.4, 1.6, 1.8, 2.0, 2.5, 3.0, 3.5, 4.0, 5.0, 6.0, 7.0, 8.0, 9.0),
    (1.0, 1.2, 1.5, 2.0, 2.5, 3.0, 4.0, 5.0, 6.0, 8.0),
    (1.0, 1.5, 2.0, 3.0, 5.0, 7.0),
    (1.0, 2.0, 5.0),
    (1.0, 3.0),
    (1.0,),
)
"""Mantissas of labels, the densest set first."""


@dataclass(frozen=True)
class Axis:
    """A range of values over so many cells."""

    low: float
    """Value at the left edge of the first cell."""
    high: float
    """Value at the right edge of the last one."""
    cells: int

    def place(self, value: float) -> int:
        """The cell that a value lies in; below 0 or from `cells` on where it lies beyond the axis."""
        share = math.log(value / self.low) / math.log(self.high / self.low)
        return math.floor(share * self.cells)

    def value(self, place: float) -> float:
        """The value at so many cells from the left edge."""
        return self.low * (self.high / self.low) ** (place / self.cells)

    def labels(self) -> list[tuple[int, str]]:
        """Round values with their cells: the densest set whose labels stand apart."""
        for mantissas in _SETS:
            found = list(self._labels(mantissas))
            if all(right - left > len(text) + 2 for (left, text), (right, _) in pairwise(found)):
                return found
        return found[:1]

    def _labels(self, mantissas: Iterable[float]) -> Iterable[tuple[int, str]]:
        first, last = (math.floor(math.log10(end)) for end in (self.low, self.high))
        for decade in range(first, last + 1):
            for mantissa in mantissas:
                value = float(f"{mantissa}e{decade}")
                place = self.place(value)
                text = figure(value)
                if place >= 0 and place + len(text) < self.cells:
                    yield place, text


def axis_over(values: Iterable[float], cells: int, margin: int, least_ratio: float = 2.0) -> Axis:
    """An axis that holds all values, with a margin of cells at both sides; they span at least a ratio."""
    low, high = min(values), max(values)
    middle, ratio = math.sqrt(low * high), max(high / low, least_ratio)
    inner = max(1, cells - 2 * margin)
    half = math.log(ratio) / 2 * cells / inner
    return Axis(middle * math.exp(-half), middle * math.exp(half), cells)
