import re
from dataclasses import replace
from itertools import product

import pytest

from tests.report.rankings import BRIEF, demo, small
from visionplan.report.table import rank_table
from visionplan.text import width

CODES = re.compile(r"\x1b\[\d+m")
HOSTILE = "a|b `c`\x1b[31m\n\u202e漢字-" + "x" * 60


def text(lines):
    """The lines as one, wrapping undone."""
    return re.sub(r"\s+", " ", " ".join(lines))


def rows(lines):
    """Cells of the rows of rigs, by rank: what stands between a line of headings and an empty one."""
    found, inside = {}, False
    for line in lines:
        if match := inside and re.match(r" *(\d+)  ?(\S.*)", line):
            found[int(match[1])] = match[2].split()
        inside = bool(line) and (inside or line.lstrip().startswith("#"))
    return found


def test_no_line_is_wider_than_the_terminal(each_demo):
    for cells, system, ascii in product((40, 63, 80, 110, 200), ("mm", "inch"), (False, True)):
        lines = rank_table(each_demo, cells, system, ascii=ascii)
        assert all(width(line) <= cells for line in lines)
        assert not ascii or all(line.isascii() for line in lines)


@pytest.mark.parametrize("cells", [40, 80, 120])
def test_gaps_in_the_catalogue_break_nothing(each_random, cells):
    lines = rank_table(each_random, cells)
    assert all(width(line) <= cells for line in lines)
    assert not re.search(r"\bnan\b|None", "\n".join(lines))


def test_rows_show_the_rigs_figures(each_demo):
    found = rows(rank_table(each_demo, 110))
    assert list(found) == [rig.rank for rig in each_demo.rigs]
    for rig in each_demo.rigs:
        numbers = [float(cell) for cell in found[rig.rank] if re.fullmatch(r"[\d.]+", cell)]
        inch = 25.4 if each_demo.brief.units == "inch" else 1
        assert rig.camera in found[rig.rank]
        assert rig.lens in found[rig.rank]
        assert rig.stop in numbers
        assert any(number == pytest.approx(rig.working_distance, abs=0.06) for number in numbers) or inch > 1
        assert any(number == pytest.approx(rig.sampling, rel=0.006) for number in numbers) or inch > 1


def test_inches():
    ranking = demo("spout-gauge", 12)
    lines = rank_table(ranking, 80, "inch")
    first = ranking.rigs[0]
    distance, sampling = (float(cell) for cell in rows(lines)[1][3:5])
    assert distance == pytest.approx(first.working_distance / 25.4, rel=1e-3)
    assert sampling == pytest.approx(first.sampling / 25.4, rel=1e-2)
    assert any("WD in" in line and "in/px" in line for line in lines)


def test_colour_adds_nothing_to_the_words():
    for name in ("jar-lids", "rim-cracks"):
        painted = rank_table(demo(name, 12), 80, colour=True)
        assert [CODES.sub("", line) for line in painted] == rank_table(demo(name, 12), 80)
        assert any(CODES.search(line) for line in painted)


def test_more_columns_where_there_is_room():
    heads = [
        next(line for line in rank_table(demo("jar-lids", 12), cells) if line.lstrip().startswith("#"))
        for cells in (80, 110, 150)
    ]
    for name in ("camera", "lens", "stop", "WD mm", "mm/px", "latitude, pinch", "price"):
        assert all(name in head for head in heads)
    assert "grade" in heads[2]
    assert "field mm" in heads[2]
    assert len(heads[0].split()) < len(heads[2].split())


def test_says_what_was_judged_and_why_the_first_is_first():
    ranking = small(cameras=[{}, {"id": "K6", "price": 480.0, "shutter": "global"}])
    told = text(rank_table(ranking, 80))
    assert "2 pairs judged, 2 fit; ordered by value" in told
    assert f"; {ranking.seconds:.2g} s" in told
    assert "First: K6 with L25, comfortable, 66 % of room; the cheapest of the fully known comfortable ones: " in told
    assert ": 580, the next 600." in told
    assert "Sampling sets 0.07 at the low end of the magnification, cover 0.1167 at the high end" in told


REASONS = [
    ([{}], {}, "the only pair that fits: comfortable, 66 % of room"),
    ([{}, {"id": "K6", "pixels high": 950.0}], {}, "comfortable, 66 % of room; the next is only tight"),
    (
        [{"price": None}, {"id": "K6", "colour": None}],
        {"sensor": "mono"},
        "and fully known; of the next colour is unknown",
    ),
    ([{}, {"id": "K6", "shutter": "global"}], {}, "the next is its equal and comes after it by name"),
    ([{}, {"id": "K6", "pixels high": 1400.0}], {}, "alike in price with the next, which has 55 %"),
    (
        [{}, {"id": "K6", "price": None, "shutter": "global"}],
        {},
        "the cheapest of the fully known comfortable ones: 600, the next not stated",
    ),
]


@pytest.mark.parametrize(("cameras", "more", "reason"), REASONS)
def test_the_reason_is_what_sets_the_first_apart(cameras, more, reason):
    assert reason in text(rank_table(small(cameras, brief=replace(BRIEF, **more)), 80))


def test_the_grades_are_the_briefs():
    told = text(rank_table(small(brief=replace(BRIEF, comfort=0.25)), 80))
    assert "Comfortable is 25 % of room and more, fair 12.5 %, tight less." in told


def test_a_held_rig_says_what_holds_it():
    told = text(rank_table(small(brief=replace(BRIEF, working_distance=(200.0, 280.0))), 80))
    assert "reach holds it there (asked 200 to 280 mm)" in told


def test_unknowns_are_marked_in_their_rows_and_told_once():
    ranking = small(
        cameras=[{}, {"id": "K6", "length": None}, {"id": "K7", "length": None, "shutter": "global"}],
        brief=replace(BRIEF, headroom=700.0),
    )
    lines = rank_table(ranking, 80)
    assert [cells[-1] for cells in rows(lines).values()] == ["600", "?", "?"]
    assert text(lines).count("length of the camera not stated") == 1
    assert "headroom: length of the camera not stated (rows 2–3)" in text(lines)


def test_assumptions_are_told_once_and_marked_where_not_all_rows_share_them():
    ranking = small(
        lenses=[
            {"pupil ratio": None},
            {"id": "L26", "price": 110.0},
            {"id": "L27", "pupil ratio": None, "price": 120.0},
        ]
    )
    lines = rank_table(ranking, 80)
    assert [cells[-1] for cells in rows(lines).values()] == ["a", "610", "a"]
    assert "a The lens states no pupil ratio: taken as 1. (rows 1, 3)" in text(lines)
    every = small(lenses=[{"pupil ratio": None}, {"id": "L26", "pupil ratio": None}])
    assert "In every row: The lens states no pupil ratio: taken as 1." in text(rank_table(every, 80))


def test_warnings_that_differ_in_a_number_are_told_as_one():
    told = text(rank_table(demo("transfer-web", 12), 80))
    assert told.count("Warning: in the corner of the picture") <= 1


def test_rows_that_differ_in_interface_price_and_stock_alone_fold():
    cameras = [
        {"interface": "USB3 Vision", "stock": 3.0},
        {"id": "K6", "interface": "GigE Vision", "price": 530.0},
        {"id": "K7", "interface": "GigE Vision", "price": 540.0, "length": 60.0},
    ]
    lines = rank_table(small(cameras), 80)
    assert [cells[:2] for cells in rows(lines).values()] == [["K5", "+1"], ["K7", "L25"]]
    assert "+1 in row 1: K6 (GigE Vision, 630)." in text(lines)


def test_nothing_fits_tells_the_nearest_misses_and_what_could_give():
    ranking = demo("rim-cracks", 12)
    told = text(rank_table(ranking, 80))
    assert "nothing fits" in told
    assert "Nearest: area-12-gige-mono with large-25, which misses cover by 1.1 %; sampling by 1.1 %." in told
    changes = [
        float(f"{sign}{size}".replace("−", "-")) for sign, size in re.findall(r"([+−])(\S+) %  ?(?=[a-z])", told)
    ]
    assert len(changes) == len(ranking.concessions)
    assert [abs(change) for change in changes[:2]] == sorted(abs(change) for change in changes[:2])


def test_where_no_single_concession_helps_it_is_said():
    ranking = small(lenses=[{"mount": "F", "flange distance": 46.5}])
    assert ranking.concessions == ()
    assert "No change of one demand alone lets something fit." in text(rank_table(ranking, 80))


def test_rings_stand_beneath_the_row_where_no_column_has_room():
    ring = {"id": "ring-of-a-very-long-name-so-that-no-column-holds-it", "mount": "C", "length": 5.0, "price": 9.0}
    lens = {"nearest object": 5000.0}
    for cells in (60, 80):
        lines = rank_table(
            small(lenses=[lens], rings=[ring], brief=replace(BRIEF, working_distance=(100.0, 600.0))), cells
        )
        assert f"with {ring['id']}" in text(lines)


@pytest.mark.parametrize("cells", [40, 80, 120])
def test_text_of_files_is_shown_as_typed_and_harmless(cells):
    ranking = small(
        cameras=[{"id": HOSTILE}, {"id": "K6", "price": 900.0, "interface": "\x9b31m"}], lenses=[{"id": "L\tb"}]
    )
    lines = rank_table(replace(ranking, brief=replace(BRIEF, title="T\x1b]0;x\x07 [bold]")), cells)
    assert all(line.isprintable() for line in lines)
    assert all(width(line) <= cells for line in lines)
    assert "T␛]0;x␇ [bold]" in lines[0]


def test_an_empty_ranking_is_told():
    lines = rank_table(replace(small(), rigs=(), fitting=0), 80)
    assert "nothing fits" in text(lines)
