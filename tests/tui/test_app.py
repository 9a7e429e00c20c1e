"""The interface under the fingers: for every action the keys that the screen shows, and what then is true."""

import json
import re

import pytest

from tests.tui.desk import sit_down
from visionplan.brief.read import read_brief
from visionplan.catalogue.folder import read_catalogue
from visionplan.demo import demo_folder
from visionplan.solve import rank
from visionplan.tui.rigs_table import Given

JAR, RIM = "jar-lids", "rim-cracks"


def ranked(name, **more):
    """The ranking by the solver itself."""
    return rank(read_brief(demo_folder() / "briefs" / f"{name}.toml"), read_catalogue(demo_folder()), **more)


async def test_first_screen_shows_the_ranking():
    async with sit_down(JAR) as desk:
        expected = ranked(JAR)
        assert desk.says(f"{expected.fitting} of {expected.pairs:,} pairs fit")
        assert desk.app.rigs.cursor == (expected.rigs[0].camera, expected.rigs[0].lens)
        rows = [line for line in desk.text.splitlines() if re.match(r"[▸ ] +\d+ ", line)]
        for row, rig in zip(rows, expected.rigs):
            assert rig.lens in row


@pytest.mark.parametrize("number", [1, 2, 3, 4, 5])
async def test_every_key_at_the_foot_does_something(number):
    """No key that is shown is dead: each changes the screen or says something."""
    async with sit_down(JAR) as desk:
        await desk.press("space", str(number))
        await desk.rest()
        bindings = [*type(desk.app.pane).BINDINGS, *type(desk.app).BINDINGS]
        shown = [binding for binding in bindings if binding.show and "leave" not in binding.action]
        assert shown
        for binding in shown:
            before = desk.text
            await desk.press(binding.key.split(",")[0])
            assert desk.text != before, binding.key
            await desk.press("escape", "escape")
            if desk.app.pane.number != number:
                await desk.press(str(number))


async def test_brief_edited_in_place_with_the_ranking_following_each_key():
    async with sit_down(JAR) as desk:
        await desk.press("1")
        assert "▸ field" in desk.text
        await desk.press("enter", "ctrl+u")
        await desk.type("60 x 40 mm")
        assert desk.state.brief.field == (130, 110), "not yet kept"
        typed = desk.state.results.ranking
        assert typed.brief.field == (60, 40)
        assert desk.says(f"{typed.fitting} of")
        assert desk.says("was 130 mm, 110 mm")
        await desk.press("enter")
        assert desk.state.brief.field == (60, 40)
        assert desk.says("not saved")
        await desk.press("u")
        assert desk.state.brief.field == (130, 110)
        assert desk.says("Undone: field 60 x 40 mm")
        await desk.press("U")
        assert desk.state.brief.field == (60, 40)


async def test_escape_drops_what_was_typed_and_the_ranking_returns():
    async with sit_down(JAR) as desk:
        fitting = desk.state.results.ranking.fitting
        await desk.press("1", "enter", "ctrl+u")
        await desk.type("60 x 40 mm")
        assert desk.state.results.ranking.fitting != fitting
        await desk.press("escape")
        assert desk.state.results.ranking.fitting == fitting
        assert not desk.state.past


async def test_wrong_value_says_on_its_line_what_was_expected_and_keeps_the_old_one():
    async with sit_down(JAR) as desk:
        await desk.press("1", "down", "enter", "ctrl+u")
        await desk.type("3 lx")
        lines = desk.text.splitlines()
        under = lines[next(n for n, line in enumerate(lines) if line.startswith("▸ feature")) + 1]
        assert "expected a length" in under
        await desk.press("enter")
        assert desk.app.brief_pane.entry, "it stays under the fingers"
        assert desk.state.brief.feature == 0.45
        await desk.press("escape")
        assert desk.state.brief.feature == 0.45


async def test_contradiction_between_lines_is_told_where_it_is_typed():
    async with sit_down(JAR) as desk:
        await desk.press("1")
        desk.app.brief_pane.cursor = "scene.above"
        await desk.press("enter", "ctrl+u")
        await desk.type("400 mm")
        assert desk.says("leaves no room for")
        await desk.press("enter")
        assert desk.state.brief.above == 14


async def test_line_dropped_and_asked_again():
    async with sit_down(JAR) as desk:
        await desk.press("1")
        desk.app.brief_pane.cursor = "station.headroom"
        await desk.press("delete")
        assert desk.state.brief.headroom is None
        assert desk.says("no longer asked")
        await desk.press("enter")
        await desk.type("640 mm")
        await desk.press("enter")
        assert desk.state.brief.headroom == 640
        desk.app.brief_pane.cursor = "scene.field"
        await desk.press("x")
        assert desk.says("can't be without field")


async def test_choices_turn_with_the_arrows():
    async with sit_down(JAR) as desk:
        await desk.press("1")
        desk.app.brief_pane.cursor = "choose.sensor"
        await desk.press("enter", "down")
        assert desk.app.brief_pane.entry.text == "mono"
        await desk.press("down", "enter")
        assert desk.state.brief.sensor == "colour"


async def test_tolls_stand_beside_their_lines():
    async with sit_down(JAR) as desk:
        await desk.press("1")
        await desk.rest()
        tolls = desk.state.results.tolls
        dropped = desk.state.work.text.replace('field = ["130 mm", "110 mm"]', 'field = ["0.001 mm", "0.001 mm"]')
        assert dropped != desk.state.work.text
        line = next(line for line in desk.text.splitlines() if line.startswith("▸ field"))
        assert f"{tolls['scene.field']:+,}" in line


async def test_orders():
    async with sit_down(JAR) as desk:
        await desk.press("o")
        assert desk.says("Which rig comes first?")
        await desk.type("pri")
        await desk.press("enter")
        assert desk.says("by price")
        shown = [rig.price for rig in desk.state.results.ranking.rigs if rig.fits]
        assert shown == sorted(shown)
        assert desk.app.rigs.rig.price == shown[0]


async def test_filter_narrows_as_one_types():
    async with sit_down(JAR) as desk:
        await desk.press("slash")
        await desk.type("fine mono")
        rows = [line for line in desk.text.splitlines() if re.match(r"[▸ ]..? *\d+ ", line)]
        assert rows
        assert all("fine" in row and "mono" in row for row in rows)
        await desk.press("enter", "down", "space")
        assert "fine" in desk.state.work.marks[0].lens
        await desk.press("escape")
        assert "plain-16" in desk.text


async def test_misses_shown_and_hidden():
    async with sit_down(JAR, size=(80, 50)) as desk:
        assert "short by" in desk.text or desk.state.results.ranking.fitting >= 20
        await desk.press("end")
        await desk.press("end")
        assert desk.says("short by")
        await desk.press("m")
        assert not desk.says("short by")
        assert desk.says("misses hidden")


async def test_list_goes_on_where_it_ends():
    async with sit_down(JAR) as desk:
        first = len(desk.state.results.ranking.rigs)
        await desk.press("end")
        assert len(desk.state.results.ranking.rigs) > first


async def test_impossible_brief_concession_taken_and_undone():
    async with sit_down(RIM) as desk:
        assert desk.says("nothing of")
        assert isinstance(desk.app.rigs.cursor, Given)
        assert desk.says("Enter take it")
        await desk.press("enter")
        assert desk.state.results.ranking.fitting > 0
        assert desk.state.brief.pixels_per_feature < 3
        assert desk.says("Taken: pixels per feature")
        await desk.press("u")
        assert desk.state.brief.pixels_per_feature == 3
        assert not desk.state.results.ranking.fitting


@pytest.mark.parametrize("place", range(5))
async def test_every_concession_lets_something_fit(place):
    async with sit_down(RIM) as desk:
        await desk.press(*["down"] * place, "enter")
        assert desk.state.results.ranking.fitting > 0


async def test_rig_view_and_what_if():
    async with sit_down(JAR) as desk:
        await desk.press("enter")
        pane = desk.app.rig_pane
        planned = pane.shown
        assert desk.says(f"{planned.camera} with {planned.lens}")
        assert desk.says("span")
        await desk.press("right")
        assert pane.shown.working_distance == pytest.approx(round(planned.working_distance) + 1)
        assert desk.says("as set by hand")
        await desk.press("left_square_bracket")
        assert pane.shown.working_distance == pytest.approx(round(planned.working_distance) - 9)
        await desk.press("full_stop")
        assert pane.shown.stop > planned.stop
        await desk.press("comma", "comma")
        assert pane.shown.stop < planned.stop
        await desk.press("p")
        assert pane.shown == planned
        assert desk.says("as planned")


async def test_far_enough_off_a_demand_is_missed_and_says_so():
    async with sit_down(JAR) as desk:
        await desk.press("enter", *["right_square_bracket"] * 8)
        rig = desk.app.rig_pane.shown
        assert rig.working_distance > 480
        assert "reach" in [verdict.name for verdict in rig.demands if verdict.verdict == "missed"]
        assert desk.says("does not fit")


async def test_rings_change_and_come_round():
    async with sit_down("glaze-pinholes") as desk:
        await desk.press("enter")
        seen = {desk.app.rig_pane.shown.spacers}
        for _ in range(3):
            await desk.press("r")
            seen.add(desk.app.rig_pane.shown.spacers)
        assert len(seen) == 4


async def test_changed_working_point_is_kept_for_the_shortlist():
    async with sit_down(JAR) as desk:
        await desk.press("space", "enter", "right", "space", "4")
        planned, moved = desk.state.work.marks
        assert planned.planned
        assert moved.at == pytest.approx(430)
        assert desk.says("set by hand")
        rigs = [rig for _, rig in desk.state.shortlist()]
        assert rigs[1].working_distance == pytest.approx(430)
        await desk.press("right", "enter")
        assert desk.app.rig_pane.shown.working_distance == pytest.approx(430)


async def test_shortlist_compares_with_a_star_at_the_best():
    async with sit_down(JAR) as desk:
        await desk.press("space", "down", "down", "space", "4")
        rigs = [rig for _, rig in desk.state.shortlist()]
        cheapest = min(rig.price for rig in rigs)
        await desk.press("end")
        row = next(line for line in desk.text.splitlines() if line.startswith("▸ price"))
        assert f"{cheapest:g} * " in row + " "
        assert row.count("*") == 1


async def test_note_is_written_and_kept():
    async with sit_down(JAR) as desk:
        await desk.press("space", "4", "n")
        await desk.type("spare in the van")
        await desk.press("enter")
        assert desk.state.work.marks[0].note == "spare in the van"
        assert desk.says("spare in the van")
        await desk.press("u")
        assert desk.state.work.marks[0].note == ""
        await desk.press("delete")
        assert not desk.state.work.marks
        assert desk.says("Nothing is marked yet")


@pytest.mark.parametrize(("form", "suffix"), [("m", ".md"), ("c", ".csv"), ("j", ".json")])
async def test_export(tmp_path, monkeypatch, form, suffix):
    monkeypatch.chdir(tmp_path)
    async with sit_down() as desk:
        await desk.press("space", "4", "x")
        await desk.press(form)
        await desk.press("enter")
        written = tmp_path / f"shortlist{suffix}"
        assert desk.says("Exported to")
        rig = next(rig for _, rig in desk.state.shortlist())
        assert rig.lens in written.read_text()
        if form == "j":
            assert json.loads(written.read_text())["rigs"][0]["camera"] == rig.camera


async def test_export_never_overwrites_without_asking(tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)
    (tmp_path / "mine.md").write_text("mine")
    async with sit_down() as desk:
        for choice, kept in (("enter", True), ("escape", True), ("o", False)):
            await desk.press("2", "home")
            if not desk.state.work.marks:
                await desk.press("space")
            await desk.press("4", "x", "m", "ctrl+u")
            await desk.type("mine.md")
            await desk.press("enter")
            assert desk.says("Overwrite?")
            await desk.press(choice)
            assert ((tmp_path / "mine.md").read_text() == "mine") == kept


async def test_copy_sends_markdown_to_the_terminal(monkeypatch):
    import base64

    monkeypatch.delenv("TMUX", raising=False)
    monkeypatch.delenv("STY", raising=False)
    sent = []
    async with sit_down(JAR) as desk:
        monkeypatch.setattr(desk.app, "write_raw", sent.append)
        await desk.press("y")
        await desk.press("4", "y")
        assert desk.says("Nothing is on the shortlist")
        await desk.press("2", "space", "4", "y")
        assert desk.says("sent to the clipboard")
        coded = re.fullmatch("\x1b\\]52;c;([A-Za-z0-9+/=]+)\x07", sent[0])[1]
        text = base64.b64decode(coded).decode()
        assert text.startswith("# Jar lids on the capping belt: shortlist")
        assert desk.state.work.marks[0].lens in text
        assert "Bill of materials" in text


async def test_shortlist_too_long_to_copy_offers_its_table(monkeypatch):
    import base64

    sent = []
    async with sit_down(JAR) as desk:
        monkeypatch.setattr(desk.app, "write_raw", sent.append)
        await desk.press(*["space", "down"] * 9, "4", "n", "x", "y", "enter", "y")
        assert desk.says("Too long to copy")
        assert desk.says("more than terminals take")
        assert not sent
        await desk.press("c")
        assert desk.says("characters of table sent to the clipboard")
        text = base64.b64decode(re.search(";c;([A-Za-z0-9+/=]+)", sent[0])[1]).decode()
        for mark in desk.state.work.marks:
            assert mark.lens in text
        assert "| note | xy |" in text
        assert "Bill of materials" not in text
        await desk.press("y", "e")
        assert desk.says("Export the shortlist as")


async def test_save_asks_for_a_name_where_there_is_none(tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)
    async with sit_down() as desk:
        await desk.press("ctrl+s")
        assert desk.says("Save the brief as")
        await desk.press("ctrl+u")
        await desk.type("lids.toml")
        await desk.press("enter")
        assert read_brief(tmp_path / "lids.toml").title == desk.state.brief.title
        await desk.press("1", "enter", "ctrl+u")
        await desk.type("99 x 88 mm")
        await desk.press("enter", "ctrl+s")
        assert read_brief(tmp_path / "lids.toml").field == (99, 88)
        assert not desk.says("not saved")


async def test_another_brief_is_opened_with_completion():
    async with sit_down(JAR) as desk:
        await desk.press("ctrl+o")
        await desk.type("rim")
        await desk.press("tab", "enter")
        assert desk.says("Hair cracks")
        assert desk.state.work.path.endswith("rim-cracks.toml")


async def test_faulty_brief_is_told_and_the_work_stays(tmp_path):
    (tmp_path / "bad.toml").write_text('[scene]\nfield = "3"\n')
    async with sit_down(JAR) as desk:
        await desk.press("ctrl+o", "ctrl+u")
        await desk.type(str(tmp_path / "bad.toml"))
        await desk.press("enter")
        assert re.search(r"\d faults? in", desk.text)
        await desk.press("down", "escape")
        assert desk.says("Jar lids")


@pytest.fixture
def bad_catalogue(tmp_path):
    folder = tmp_path / "works"
    folder.mkdir()
    for name in ("lenses", "cameras", "spacers"):
        text = (demo_folder() / f"{name}.csv").read_text()
        if name == "lenses":
            lines = text.splitlines()
            lines[3] = lines[3].replace(",CS,", ",,")
            lines[5] = lines[5].replace(",entocentric,", ",monocle,")
            text = "\n".join(lines) + "\n"
        (folder / f"{name}.csv").write_text(text)
    return folder


async def test_faults_of_a_catalogue_are_a_list_to_walk(bad_catalogue):
    async with sit_down(JAR, folder=str(bad_catalogue)) as desk:
        assert re.search(r"\d faults in", desk.text)
        assert desk.says("lenses.csv:4")
        before = desk.text
        await desk.press("down")
        assert desk.text != before
        await desk.press("s")
        for _ in range(500):
            if desk.state.catalogue is not None:
                break
            await desk.pilot.pause(0.01)
        await desk.press("2")
        assert len(desk.state.catalogue.lenses) < len(read_catalogue(demo_folder()).lenses)
        assert desk.says("pairs fit")


async def test_catalogue_chosen_and_undone(tmp_path):
    folder = tmp_path / "small"
    folder.mkdir()
    for name in ("lenses", "cameras"):
        lines = (demo_folder() / f"{name}.csv").read_text().splitlines()
        (folder / f"{name}.csv").write_text("\n".join(lines[:20]) + "\n")
    async with sit_down(JAR) as desk:
        pairs = desk.state.results.ranking.pairs
        await desk.press("C", "ctrl+u")
        await desk.type(str(folder))
        await desk.press("enter")
        assert desk.state.results.ranking.pairs == 19 * 19
        await desk.press("u")
        assert desk.state.results.ranking.pairs == pairs


async def test_help_lists_the_keys_of_the_view():
    for number in range(1, 5):
        async with sit_down(JAR) as desk:
            await desk.press(str(number), "question_mark")
            seen = desk.text
            for _ in range(4):
                await desk.press("pagedown")
                seen += desk.text
            assert f"Keys in {desk.app.pane.label}" in seen
            assert "Ctrl+s" in seen
            await desk.press("escape")
            assert desk.says("Jar lids")


async def test_palette_finds_every_action_by_name():
    async with sit_down(JAR) as desk:
        await desk.press("colon")
        await desk.type("mark")
        await desk.press("enter")
        assert len(desk.state.work.marks) == 1
        await desk.press("ctrl+p")
        await desk.type("note")
        await desk.press("enter")
        assert desk.app.shortlist.entry is not None


async def test_colours_are_chosen_and_kept():
    async with sit_down(JAR) as desk:
        await desk.press("T")
        await desk.type("daylight")
        await desk.press("enter")
        assert desk.app.palette == "daylight"
        assert desk.state.settings["palette"] == "daylight"


async def test_quitting_with_unsaved_changes_asks():
    async with sit_down(JAR) as desk:
        await desk.press("1", "enter", "ctrl+u")
        await desk.type("99 x 88 mm")
        await desk.press("enter", "q")
        assert desk.says("Quit?")
        await desk.press("b")
        assert desk.app.is_running
        assert desk.says("99 mm, 88 mm")


async def test_work_left_off_is_offered_again(tmp_path):
    brief = tmp_path / "lids.toml"
    brief.write_text((demo_folder() / "briefs" / "jar-lids.toml").read_text())
    async with sit_down(brief) as desk:
        await desk.press("space", "1", "enter", "ctrl+u")
        await desk.type("99 x 88 mm")
        await desk.press("enter")
    async with sit_down(brief) as desk:
        assert desk.says("Work left off")
        await desk.press("enter")
        assert desk.state.brief.field == (99, 88)
        assert len(desk.state.work.marks) == 1
    async with sit_down(brief) as desk:
        await desk.press("f")
        assert desk.state.brief.field == (130, 110)
        await desk.press("u")
        assert desk.state.brief.field == (99, 88)


async def test_second_interface_is_read_only():
    async with sit_down(JAR), sit_down(JAR) as second:
        assert second.says("READ-ONLY")
        await second.press("space")
        assert not second.state.work.marks
        assert second.says("open elsewhere")
        await second.press("1", "enter")
        assert second.app.brief_pane.entry is None
        await second.press("3", "right")
        assert second.says("as set by hand"), "looking is free"


@pytest.mark.parametrize("size", [(120, 35), (140, 45), (200, 60)])
async def test_three_views_together_on_a_wide_screen(size):
    async with sit_down(JAR, size=size) as desk:
        lines = desk.text
        assert "field" in lines
        assert "latitude" in lines
        assert "magnification" in lines
        await desk.press("down")
        rig = desk.app.rigs.rig
        assert desk.app.rig_pane.shown == rig
        assert desk.says(f"{rig.camera} with {rig.lens}")


async def test_resizing_at_any_moment():
    async with sit_down(JAR) as desk:
        await desk.press("1", "enter")
        for size in [(140, 45), (60, 20), (81, 25), (10, 3), (200, 60), (80, 24), (1, 1), (80, 24)]:
            await desk.pilot.resize_terminal(*size)
            await desk.pilot.pause()
        await desk.press("escape", "2")
        assert desk.says("pairs fit")
        await desk.pilot.resize_terminal(60, 20)
        await desk.pilot.pause()
        assert desk.says("visionplan needs 80 × 24 characters; here are 60 × 20")


async def test_ascii_screens_are_ascii():
    for size in ((80, 24), (140, 45)):
        async with sit_down(JAR, size=size, ascii=True) as desk:
            for keys in (["space"], ["1"], ["3"], ["e"], ["4"], ["question_mark"], ["escape"], ["colon"]):
                await desk.press(*keys)
                assert desk.text.isascii(), [one for one in desk.text if not one.isascii()]


async def test_nothing_of_a_file_is_taken_for_markup_or_control(tmp_path):
    brief = tmp_path / "b.toml"
    text = (demo_folder() / "briefs" / "jar-lids.toml").read_text()
    brief.write_text(text.replace("Jar lids on the capping belt", "[red]lids[/] \\u001b[31m \\u202e end"))
    async with sit_down(brief) as desk:
        assert "[red]lids[/]" in desk.text
        assert "\x1b" not in desk.text
        assert "\u202e" not in desk.text
