"""The stop series and flange distances of the standards."""

import pytest

from visionplan.optics.mounts import FLANGE_DISTANCE
from visionplan.optics.stops import FULL_STOPS


def test_full_stops_as_marked():
    """ISO 517: 2^(k/2), marked 1, 1.4, 2, 2.8, 4, 5.6, 8, 11, 16, 22, 32."""
    assert FULL_STOPS == (1, 1.4, 2, 2.8, 4, 5.6, 8, 11, 16, 22, 32)
    for k, stop in enumerate(FULL_STOPS):
        assert stop == pytest.approx(2 ** (k / 2), rel=0.03)


def test_flange_distances():
    """C: ISO 10935; CS, 5.000 mm less, and F: common practice."""
    assert FLANGE_DISTANCE == {"C": 17.526, "CS": 12.526, "F": 46.5}
    assert FLANGE_DISTANCE["C"] - FLANGE_DISTANCE["CS"] == pytest.approx(5.0)
    assert FLANGE_DISTANCE["C"] == pytest.approx(0.690 * 25.4)
