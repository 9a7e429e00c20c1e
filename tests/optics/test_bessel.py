import numpy as np
import pytest
from scipy import special

from visionplan.optics import bessel


@pytest.mark.parametrize(("function", "reference"), [(bessel.j0, special.j0), (bessel.j1, special.j1)])
def test_against_scipy(function, reference):
    x = np.concatenate([[0.0, 1e-300, 1e-9], np.linspace(0, 60, 3001), np.geomspace(60, 1e6, 500)])
    assert function(x) == pytest.approx(reference(x), abs=1e-13)


def test_far_out_there_is_nothing_and_unknown_stays_unknown():
    assert bessel.j0(np.inf) == 0
    assert bessel.j1(np.inf) == 0
    assert np.isnan(bessel.j1(np.nan))
