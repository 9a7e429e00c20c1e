"""Rankings that take long: keys go on being answered, the newest request wins, a slow one can be stopped."""

import threading

import pytest

from tests.tui.desk import sit_down
from visionplan.tui import solver

pytestmark = pytest.mark.filterwarnings("error")


@pytest.fixture
def gate(monkeypatch):
    """Holds every ranking back while it is closed; counts those begun."""
    gate = threading.Event()
    gate.set()
    gate.begun = []
    rank = solver.rank

    def slow(brief, *more):
        gate.begun.append(brief)
        gate.wait(60)
        return rank(brief, *more)

    monkeypatch.setattr(solver, "rank", slow)
    yield gate
    gate.set()


async def wait(desk, words):
    for _ in range(500):
        await desk.pilot.pause(0.01)
        if desk.says(words):
            return
    raise AssertionError(f"no {words} in\n{desk.text}")


async def send(desk, *keys):
    for key in keys:
        desk.app.post_message(desk.event(key))
    await desk.pilot.pause(0.05)


async def test_slow_ranking_says_so_is_stopped_and_made_anew(gate):
    async with sit_down("jar-lids") as desk:
        await desk.press("1")
        gate.clear()
        await send(desk, "delete")  # refused, as no brief is without its field
        desk.app.brief_pane.cursor = "station.headroom"
        await send(desk, "delete")
        await wait(desk, "ranking … Esc stops it")
        await send(desk, "down", "down")
        assert desk.app.brief_pane.cursor == "station.working_distance_tolerance", "keys are answered meanwhile"
        await send(desk, "escape")
        assert desk.says("stopped; Ctrl+R ranks anew")
        gate.set()
        await desk.press("ctrl+r")
        assert desk.says("pairs fit")
        assert desk.state.results.ranking.brief.headroom is None


async def test_a_ranking_under_way_tells_how_much_is_done_and_ends_when_given_up(monkeypatch):
    async with sit_down("jar-lids") as desk:
        ended = threading.Event()
        whole = solver.rank

        def endless(brief, catalogue, order, top, concessions, watch):
            try:
                while True:
                    watch(0.42)
                    threading.Event().wait(0.01)
            finally:
                ended.set()

        monkeypatch.setattr(solver, "rank", endless)
        await desk.press("1")
        desk.app.brief_pane.cursor = "station.headroom"
        await send(desk, "delete")
        await wait(desk, "ranking 42 % … Esc stops it")
        await send(desk, "escape")
        assert ended.wait(10)
        monkeypatch.setattr(solver, "rank", whole)
        await desk.press("ctrl+r")
        assert desk.says("pairs fit")


async def test_only_the_newest_of_many_is_ranked(gate):
    async with sit_down("jar-lids") as desk:
        await desk.press("1", "enter", "ctrl+u")
        gate.begun.clear()
        gate.clear()
        await send(desk, *"60")
        await send(desk, "space", "m", "m", "comma", "space", "4", "0", "space", "m", "m")
        await desk.pilot.pause(0.1)
        gate.set()
        await desk.press()
        assert desk.state.results.ranking.brief.field == (60, 40)
        assert len(gate.begun) <= 2


async def test_keys_in_a_burst_are_taken_in_their_order():
    """As a slow line delivers them: all at once, before anything was painted."""
    async with sit_down("jar-lids") as desk:
        await send(
            desk, "1", "enter", "ctrl+u", *"60", "space", "m", "m", "comma", *"40", "space", "m", "m", "enter", "2"
        )
        await desk.press("colon", *"mark", "enter", "o", *"length", "enter", "m")
        assert desk.state.brief.field == (60, 40)
        assert desk.state.past[0].label.startswith("field")
        assert len(desk.state.work.marks) == 1
        assert desk.app.order == "length"
        assert not desk.app.rigs.misses
