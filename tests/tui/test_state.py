"""The state: changes, history, saving, what is refused. Truth: what stands in the files, and undo as an identity."""

import random
from dataclasses import replace

import pytest

from visionplan.brief.read import parse_brief, read_brief
from visionplan.demo import DEMO_BRIEF, demo_folder
from visionplan.faults import InputError
from visionplan.tui.state import ReadOnly, State
from visionplan.tui.work import Mark

BRIEF = """\
# the lid shop's
[scene]
field = ["120 mm", "90 mm"]  # with a corner of belt
feature = "0.4 mm"

[station]
working_distance = ["250 mm", "450 mm"]
headroom = "700 mm"
"""


@pytest.fixture
def brief(tmp_path):
    path = tmp_path / "lids.toml"
    path.write_text(BRIEF)
    return path


@pytest.fixture
def state(brief):
    state = State()
    state.open(str(brief))
    yield state
    state.close()


def test_resume_begins_with_the_demo_works():
    state = State()
    state.resume()
    assert state.work.text == (demo_folder() / DEMO_BRIEF).read_text()
    assert not state.work.path
    assert not state.work.changed


def test_set_changes_only_its_line_and_keeps_comments(state):
    state.set("scene.field", "100 x 80 mm")
    assert state.brief.field == (100, 80)
    changed = [(a, b) for a, b in zip(BRIEF.splitlines(), state.work.text.splitlines()) if a != b]
    assert changed == [
        (
            'field = ["120 mm", "90 mm"]  # with a corner of belt',
            'field = ["100 mm", "80 mm"]  # with a corner of belt',
        )
    ]


def test_wrong_value_is_refused_and_nothing_changes(state):
    before = state.work, state.past
    with pytest.raises(InputError):
        state.set("scene.field", "120 lx")
    with pytest.raises(InputError):  # contradicts the working distance
        state.set("scene.above", "300 mm")
    assert (state.work, state.past) == before


def test_required_line_is_not_dropped(state):
    with pytest.raises(InputError):
        state.drop("scene.field")
    state.drop("station.headroom")
    assert state.brief.headroom is None


def test_typing_is_seen_but_not_kept(state):
    generation = state.generation
    assert state.type("scene.feature", "0.5 mm") is None
    assert state.asked.feature == 0.5
    assert state.brief.feature == 0.4
    assert state.generation > generation
    fault = state.type("scene.feature", "0.5 lx")
    assert fault
    assert "length" in fault.expected
    assert state.asked.feature == 0.5, "while it makes no sense the last that did stands"
    state.untype()
    assert state.asked.feature == 0.4
    assert state.work.text == BRIEF


def _random_change(state, chance):
    keys = {
        "scene.field": lambda: f"{chance.randint(20, 200)} mm, {chance.randint(20, 200)} mm",
        "scene.feature": lambda: f"{chance.randint(1, 9) / 10} mm",
        "station.headroom": lambda: f"{chance.randint(500, 900)} mm",
        "choose.max_price": lambda: str(chance.randint(100, 5000)),
        "light.snr": lambda: "40",  # refused: no reflectance is stated
        "choose.mounts": lambda: chance.choice(["C", "C, CS", "F"]),
    }
    key = chance.choice(list(keys))
    what = chance.randrange(5)
    try:
        if what == 0 and key not in ("scene.field", "scene.feature"):
            state.drop(key)
        elif what == 1:
            state.toggle((f"camera {chance.randrange(3)}", f"lens {chance.randrange(3)}"))
        elif what == 2 and state.work.marks:
            state.note(chance.randrange(len(state.work.marks)), f"note {chance.random()}")
        else:
            state.set(key, keys[key]())
    except InputError:
        pass


@pytest.mark.parametrize("seed", range(5))
def test_undo_and_redo_go_over_every_change(state, seed):
    chance = random.Random(seed)
    works = [state.work]
    for _ in range(40):
        _random_change(state, chance)
        if state.work != works[-1]:
            works.append(state.work)
    assert len(works) > 15
    for work in reversed(works[:-1]):
        assert state.undo()
        assert state.work == work
        assert state.brief == parse_brief(work.text, work.path)
    assert state.undo() is None
    for work in works[1:]:
        assert state.redo()
        assert state.work == work
    assert state.redo() is None


def test_a_change_ends_what_could_be_redone(state):
    state.set("scene.feature", "0.5 mm")
    state.undo()
    state.set("scene.feature", "0.6 mm")
    assert state.redo() is None


@pytest.mark.parametrize("seed", range(3))
def test_everything_is_there_after_a_new_start(brief, seed):
    first = State()
    first.open(str(brief))
    chance = random.Random(seed)
    for _ in range(30):
        _random_change(first, chance)
        if chance.random() < 0.2:
            first.undo()
    first.close()  # no saving, no leave-taking
    second = State()
    second.resume()
    assert (second.work, second.past, second.future) == (first.work, first.past, first.future)
    assert second.left_off == first.work.changed
    assert brief.read_text() == BRIEF
    second.close()


def test_save_writes_the_file_and_undo_goes_beyond_it(state, brief):
    state.set("scene.feature", "0.5 mm")
    assert state.work.changed
    state.save()
    assert not state.work.changed
    assert read_brief(brief).feature == 0.5
    state.undo()
    assert state.brief.feature == 0.4
    assert state.work.changed, "the file holds 0.5 mm"


def test_save_under_a_name_takes_the_journal_along(tmp_path, state_home):
    state = State()
    state.resume()
    state.toggle(("a", "b"))
    state.save(str(tmp_path / "mine.toml"))
    state.close()
    assert [file.name for file in state_home.glob("*.json")] == [state.journal.file.name]
    again = State()
    again.resume()
    assert again.work.path == str(tmp_path / "mine.toml")
    assert again.marked(("a", "b"))
    again.close()


def test_file_changed_by_someone_else(state, brief):
    state.set("scene.feature", "0.5 mm")
    state.close()
    brief.write_text(BRIEF.replace("120 mm", "130 mm"))
    again = State()
    again.open(str(brief))
    assert again.left_off
    assert again.outside
    assert again.brief.feature == 0.5
    again.take_file()
    assert again.brief.field[0] == 130
    assert again.brief.feature == 0.4
    again.undo()
    assert again.brief.feature == 0.5
    again.close()


def test_saved_file_changed_by_someone_else_is_taken(state, brief):
    state.toggle(("a", "b"))
    state.close()
    brief.write_text(BRIEF.replace("120 mm", "130 mm"))
    again = State()
    again.open(str(brief))
    assert again.brief.field[0] == 130
    assert again.marked(("a", "b"))
    assert not again.left_off
    again.close()


def test_a_file_that_has_gone_is_still_there_in_the_journal(state, brief):
    state.set("scene.feature", "0.5 mm")
    state.close()
    brief.unlink()
    again = State()
    again.resume()
    assert again.brief.feature == 0.5
    assert again.work.path == str(brief)
    again.save()
    assert read_brief(brief).feature == 0.5
    again.close()


def test_faulty_file_is_refused_and_what_is_open_stays(state, tmp_path):
    bad = tmp_path / "bad.toml"
    bad.write_text("[scene]\nfield = 3\n")
    work = state.work
    with pytest.raises(InputError):
        state.open(str(bad))
    assert state.work == work
    assert state.writable


def test_second_interface_is_read_only_and_says_so(state, brief):
    second = State()
    second.open(str(brief))
    assert not second.writable
    assert "Read-only" in second.told()
    for change in (
        lambda: second.set("scene.feature", "0.5 mm"),
        lambda: second.drop("station.headroom"),
        lambda: second.toggle(("a", "b")),
        second.undo,
        second.save,
    ):
        with pytest.raises(ReadOnly):
            change()
    assert second.work == state.work
    state.close()
    third = State()
    third.open(str(brief))
    assert third.writable, "the lock ends with its holder"
    third.close()
    second.close()


def test_a_rig_is_marked_as_it_stands(state):
    moved = Mark("a", "b", at=300.0, stop=8.0, rings=("r",))
    state.mark(moved)
    state.mark(Mark("a", "b"))
    assert state.work.marks == (moved, Mark("a", "b"))
    state.note(0, "as it hangs")
    state.mark(moved)
    assert state.work.marks == (Mark("a", "b"),)
    state.undo()
    assert state.work.marks[0] == replace(moved, note="as it hangs")


def test_measured_values_are_on_disk_at_once_and_undone_apart(state, brief):
    rig, moved = Mark("c", "l"), Mark("c", "l", at=300.0)
    state.measure(rig, "target 1 length 50 mm", {"1 length": "50 mm"})
    state.measure(moved, "taped distance 3 in", {"distance": "3 in"})
    state.measure(rig, "target 1 spans 812", {"1 length": "50 mm", "1 pixels": "812"})
    state.journal.close()
    other = State(state.folder)
    other.open(str(brief))
    assert other.measured(rig) == {"1 length": "50 mm", "1 pixels": "812"}
    assert other.measured(moved) == {"distance": "3 in"}
    assert other.kept() == (rig, moved)
    assert other.undo() == "target 1 spans 812 of c"
    assert other.measured(rig) == {"1 length": "50 mm"}
    other.measure(moved, "dropped", {})
    assert other.kept() == (rig,)
    other.close()


def test_journal_from_before_anything_could_be_measured_is_read(state, brief):
    import json

    state.mark(Mark("c", "l"))
    state.journal.close()
    data = json.loads(state.journal.file.read_text())
    for work in (data["work"], *(step["work"] for step in data["past"])):
        del work["measured"]
    state.journal.file.write_text(json.dumps(data))
    other = State(state.folder)
    other.open(str(brief))
    assert other.work.marks == (Mark("c", "l"),)
    other.close()
