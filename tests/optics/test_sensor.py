import numpy as np
import pytest

from visionplan.optics import sensor


def test_landscape_and_portrait():
    assert sensor.sides(1600, 1200, 0.0045, False) == pytest.approx((7.2, 5.4))
    assert sensor.sides(1600, 1200, 0.0045, True) == pytest.approx((5.4, 7.2))


def test_orientation_by_row():
    wide, high = sensor.sides(np.array([1600, 2000]), 1200, 0.0045, np.array([[False], [True]]))
    assert wide == pytest.approx(np.array([[7.2, 9.0], [5.4, 5.4]]))
    assert high == pytest.approx(np.array([[5.4, 5.4], [7.2, 9.0]]))


def test_diagonal():
    assert sensor.diagonal(7.2, 5.4) == pytest.approx(9.0)
    assert sensor.diagonal(*sensor.sides(4096, 1, 0.007, False)) == pytest.approx(28.672, abs=1e-6)
    assert np.isnan(sensor.diagonal(np.nan, 5.4))
