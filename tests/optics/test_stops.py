import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from visionplan.optics.stops import FULL_STOPS, stops_between


@given(st.floats(0.5, 40.0), st.floats(0.5, 40.0))
def test_ends_and_full_stops_in_rising_order(one, other):
    low, high = min(one, other), max(one, other)
    stops = stops_between(low, high)
    assert (stops[0], stops[-1]) == (low, high)
    assert list(stops) == sorted(set(stops))
    assert set(stops) == {low, high} | {stop for stop in FULL_STOPS if low <= stop <= high}


@pytest.mark.parametrize("high", [None, math.nan, 8.0])
def test_one_stop(high):
    assert stops_between(8.0, high) == (8.0,)


def test_a_marked_end_is_not_counted_twice():
    assert stops_between(1.4, 4.0) == (1.4, 2, 2.8, 4.0)
    assert stops_between(1.8, 3.0) == (1.8, 2, 2.8, 3.0)
    assert stops_between(33.0, 45.0) == (33.0, 45.0)
