import pytest

from tests.report.rankings import BRIEFS, any_works, demo


@pytest.fixture(params=BRIEFS)
def each_demo(request):
    """Every demo brief's ranking."""
    return demo(request.param, 12)


@pytest.fixture(params=range(12))
def each_random(request):
    """Rankings of random works, with gaps in their catalogues."""
    return any_works(request.param)
