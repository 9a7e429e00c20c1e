"""Numbers in bulk: the very floats that Python reads, or none at all."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from visionplan.catalogue.decimals import read_decimals

DIGITS = st.text("0123456789", max_size=6)
DECIMAL = st.tuples(st.sampled_from(["", "-"]), DIGITS, st.sampled_from(["", "."]), DIGITS).map("".join)
DECIMAL = DECIMAL.filter(lambda text: any(map(str.isdigit, text)))


@given(st.lists(DECIMAL | st.just(""), min_size=1))
def test_the_nearest_float_of_every_decimal(cells):
    values = read_decimals(cells)
    assert values is not None
    np.testing.assert_array_equal(values, [float(cell) if cell else math.nan for cell in cells])


@given(st.lists(st.text("0123456789.-,eE+ _xnaif", max_size=17), min_size=1))
def test_what_is_no_decimal_is_never_taken_for_one(cells):
    values = read_decimals(cells)
    if values is not None:
        np.testing.assert_array_equal(values, [float(cell) if cell else math.nan for cell in cells])


@pytest.mark.parametrize(
    "cell",
    ["1_0", "1e3", "nan", "inf", "1,5", "1.2.3", "-", ".", "-.", "5-", "--5", "1 2", " 5", "+5", "٣", "1" * 16, "0x1"],
)
def test_left_to_the_careful_reader(cell):
    assert read_decimals(["1.5", cell, "2"]) is None
    assert read_decimals([cell]) is None
    assert read_decimals(["", cell, ""]) is None


def test_nothing_stated():
    assert np.isnan(read_decimals(["", ""])).all()
    assert np.isnan(read_decimals([""])).all()
