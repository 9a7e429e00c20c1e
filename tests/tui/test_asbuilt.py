"""The As built view under the fingers. Truth: a rig built off by hand-worked amounts, measured with whole pixels."""

import re

from tests.tui.desk import sit_down

JAR = "jar-lids"


def pixels(rig, length, off=0.0):
    """What a target spans when the rig stands so much farther from the part: m = f / (s - f)."""
    case = rig.case
    s = case.f * (1 + 1 / rig.magnification) + off
    return str(round(length * case.f / (s - case.f) / case.P))


async def lay_into_focus(desk, rig):
    """Say that the targets lie in the focus plane."""
    await desk.press("end", "enter")
    await desk.type(f"{rig.case.z} mm")
    await desk.press("enter", "home")


async def measure(desk, length, count):
    """Type a target, as its keys go."""
    await desk.press("enter")
    await desk.type(length)
    await desk.press("enter")
    await desk.type(count)
    await desk.press("enter")


async def test_rig_built_8_mm_too_far_is_told_and_corrected():
    async with sit_down(JAR) as desk:
        await desk.press("space", "5")
        rig = desk.app.as_built.planned
        await lay_into_focus(desk, rig)
        await measure(desk, "100 mm", pixels(rig, 100, 8))
        text = desk.text
        off = re.search(r"Move the camera (\d+\.\d+) ± (\d+\.\d+) mm towards the part", text)
        assert abs(float(off[1]) - 8) <= float(off[2])
        assert desk.says("all that is asked holds")
        await desk.press("down", "down")
        await desk.press("enter")
        await desk.type(f"{rig.working_distance + 8:.0f} mm")
        await desk.press("enter", "pagedown")
        assert desk.says("too far")
        assert not desk.says("Another lens")


async def test_what_is_measured_is_kept_and_found_again():
    async with sit_down(JAR) as desk:
        await desk.press("down", "enter", "5")
        mark = desk.app.as_built.mark
        assert not desk.state.marked(mark.pair)
        await measure(desk, "50 mm", "500")
    async with sit_down(JAR) as desk:
        await desk.press("5")
        assert desk.app.as_built.mark == mark
        assert desk.says("500 px")
        assert desk.says("Where it stands")
        await desk.press("u")
        assert desk.says("Target 1 lacks how many pixels it spans")
        await desk.press("U")
        assert desk.says("Where it stands")


async def test_wrong_value_says_on_its_line_what_was_expected_and_keeps_the_old_one():
    async with sit_down(JAR) as desk:
        await desk.press("space", "5")
        await measure(desk, "50 mm", "500")
        rig = desk.app.as_built.planned
        wide = round(rig.case.w / rig.case.P)
        for typed, expected in (("9999", f"expected from 10 to the {wide} that the camera has there"), ("5 mm", "px")):
            await desk.press("enter", "ctrl+u")
            await desk.type(typed)
            if typed == "5 mm":
                assert desk.says("has no place here; expected a number of pixels")
            else:
                assert desk.says(expected)
            await desk.press("enter")
            assert desk.app.as_built.entry, "it stays under the fingers"
            await desk.press("escape")
        assert desk.state.measured(desk.app.as_built.mark)["1 pixels"] == "500"


async def test_targets_at_both_ends_tell_the_tilt():
    async with sit_down(JAR, size=(140, 45)) as desk:
        await desk.press("space", "5")
        for end, count in (("down", "505"), ("up", "495")):
            await measure(desk, "50 mm", count)
            await desk.press("right", "enter", "down", "enter", "right", "enter", "down")
            if end == "up":
                await desk.press("down")
            await desk.press("enter", "down")
        values = desk.state.measured(desk.app.as_built.mark)
        assert [values[f"{number} at"] for number in (1, 2)] == ["left", "right"]
        assert [values[f"{number} along"] for number in (1, 2)] == ["height", "height"]
        assert desk.says("nearer at the left")
        assert desk.says("Square up the camera")


async def test_drop_target_or_value_and_take_it_back():
    async with sit_down(JAR) as desk:
        await desk.press("space", "5")
        await measure(desk, "50 mm", "500")
        await desk.press("down")
        await measure(desk, "60 mm", "600")
        await desk.press("up", "delete")
        assert desk.says("Target 1 is dropped")
        assert desk.state.measured(desk.app.as_built.mark) == {"1 length": "60 mm", "1 pixels": "600"}
        await desk.press("u")
        assert desk.state.measured(desk.app.as_built.mark)["1 length"] == "50 mm"
        await desk.press("end", "delete")
        assert desk.says("Target height is not measured")


async def test_each_rig_has_its_own_measures():
    async with sit_down(JAR) as desk:
        await desk.press("space", "down", "space", "4", "right", "5")
        second = desk.state.work.marks[1]
        assert desk.app.as_built.mark == second
        await measure(desk, "50 mm", "500")
        await desk.press("n")
        assert desk.app.as_built.mark == desk.state.work.marks[0]
        assert desk.says("Lay a ruler")
        await desk.press("b")
        assert desk.says("500 px")


async def test_rig_set_by_hand_is_corrected_to_where_it_was_set():
    async with sit_down(JAR) as desk:
        await desk.press("enter", "right_square_bracket", "space", "5")
        pane = desk.app.as_built
        assert pane.mark.at is not None
        assert desk.says("as set by hand")
        await lay_into_focus(desk, pane.planned)
        await measure(desk, "100 mm", pixels(pane.planned, 100))
        assert desk.says("Nothing to move")


async def test_chart_help_palette_and_copy(monkeypatch):
    sent = []
    async with sit_down(JAR) as desk:
        monkeypatch.setattr(desk.app, "write_raw", sent.append)
        await desk.press("space", "5")
        await measure(desk, "50 mm", "500")
        assert not desk.says("near depth")
        await desk.press("c")
        assert desk.says("near depth")
        await desk.press("c")
        assert not desk.says("near depth")
        await desk.press("y")
        assert len(sent) == 1
        await desk.press("question_mark")
        assert desk.says("A second target tells the tilt")
        await desk.press("escape", "1", "colon")
        await desk.type("next rig as built")
        await desk.press("enter")
        assert desk.app.pane is desk.app.as_built


async def test_without_any_rig_it_says_where_they_come_from():
    async with sit_down(JAR) as desk:
        desk.app.look_at(None)
        await desk.press("5")
        assert desk.says("There is no rig yet")
        await desk.press("enter", "delete", "n", "c", "y", "down", "right", "pagedown")
        assert desk.says("There is no rig yet")


async def test_ascii_keeps_what_a_value_may_be_off():
    async with sit_down(JAR, ascii=True) as desk:
        await desk.press("space", "5")
        await measure(desk, "50 mm", "500")
        assert re.search(r"working distance: \d+\.\d+ \+/- \d+\.\d+ mm; planned", desk.text)
        assert desk.text.isascii()
        assert desk.says("^v<> value")


async def test_rig_that_cannot_be_set_so_is_taken_as_planned():
    async with sit_down("terminal-pins") as desk:
        await desk.press("enter", "right")
        assert desk.says("stands at its own working distance")
        await desk.press("5")
        assert desk.app.as_built.mark.planned
        assert desk.app.as_built.planned.lens == desk.app.rig_pane.base.lens
        assert not desk.says("judging")
