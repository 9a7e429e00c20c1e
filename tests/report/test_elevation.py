"""The elevation read back from its text: columns and rows counted, times the scale it states, against the rig."""

import math
import re
from dataclasses import replace

import pytest

from tests.report.rankings import BRIEF, demo, small
from visionplan.brief.model import Fold, Layer
from visionplan.report.canvas import join
from visionplan.report.elevation import elevation, elevation_rows

SIZES = [(40, 7), (40, 9), (60, 12), (80, 16), (80, 24), (120, 30), (200, 60)]
UNIT = {"mm": 1.0, "in": 25.4}


class Drawing:
    """An elevation as a person reads it."""

    def __init__(self, rig, width, height, **more):
        self.lines = elevation(rig, width, height, **more)
        self.text = " ".join(self.lines)
        stated = re.search(r"([\d.]+) (mm|in) a column, ([\d.]+) (?:mm|in) a row", self.text) or re.search(
            r"cells of ([\d.]+) (mm|in) × ([\d.]+)", self.text
        )
        self.column = float(stated[1]) * UNIT[stated[2]]
        self.row = float(stated[3]) * UNIT[stated[2]]

    def count(self, sign):
        """Columns that hold a sign, rows that hold it."""
        rows = [line for line in self.lines if sign in line]
        columns = {place for line in rows for place, character in enumerate(line) if character == sign}
        return len(columns), len(rows)

    def dimension(self, word):
        """Start and end of the line of dimension that a word stands at."""
        row = next(line for line in self.lines if word in line and re.search("[├│]", line))
        return [(match.start(), match.end()) for match in re.finditer("├[^┤]*┤|│", row)]


def size(line):
    start, end = line
    return end - start


@pytest.mark.parametrize(("width", "height"), SIZES)
def test_fits_at_every_size_and_says_its_scale(each_demo, width, height):
    for rig in each_demo.rigs[:5]:
        drawing = Drawing(rig, width, height)
        assert len(drawing.lines) <= height
        assert all(len(line) <= width for line in drawing.lines)
        assert drawing.row == pytest.approx(2 * drawing.column)


@pytest.mark.parametrize(("width", "height"), SIZES[3:])
def test_lines_of_dimension_are_as_long_as_what_they_measure(each_demo, width, height):
    for rig in each_demo.rigs[:5]:
        drawing = Drawing(rig, width, height)
        (distance,) = drawing.dimension("working distance")
        assert size(distance) * drawing.column == pytest.approx(rig.working_distance, abs=drawing.column)
        if "to the camera back" in drawing.text:
            (length,) = drawing.dimension("to the camera back")
            assert size(length) * drawing.column == pytest.approx(rig.length, abs=drawing.column)
            assert length[1] == distance[1]
        if "headroom" in drawing.text:
            (headroom,) = drawing.dimension("headroom")
            assert size(headroom) * drawing.column == pytest.approx(rig.case.brief.headroom, abs=drawing.column)


@pytest.mark.parametrize(("width", "height"), SIZES)
def test_camera_lens_and_part_are_to_scale_in_both_directions(width, height):
    brief = replace(BRIEF, above=30.0, below=20.0, feature=0.3, working_distance=(150.0, 500.0))
    rig = small(lenses=[{"diameter": 46.0, "f-number min": 16.0, "f-number max": 16.0}], brief=brief).rigs[0]
    drawing = Drawing(rig, width, height)
    extension = 25 * rig.magnification
    camera, lens, part, plane = (drawing.count(sign) for sign in "█▒▞┃")
    assert camera[0] * drawing.column == pytest.approx(50, abs=drawing.column)
    assert lens[0] * drawing.column == pytest.approx(40 + extension, abs=drawing.column)
    assert (part[0] + plane[0]) * drawing.column == pytest.approx(50, abs=drawing.column)
    assert lens[1] * drawing.row == pytest.approx(46, abs=drawing.row)
    assert part[1] * drawing.row == pytest.approx(45, abs=drawing.row)


@pytest.mark.parametrize(("width", "height"), SIZES[3:])
def test_the_cone_is_what_the_entrance_pupil_sees(each_demo, width, height):
    for rig in each_demo.rigs[:4]:
        drawing, case = Drawing(rig, width, height), rig.case
        if case.telecentric or case.brief.layers or rig.field[1] is None:
            continue
        front, reference = drawing.dimension("working distance")[0]
        pupil = rig.case.f * (1 / rig.magnification + 1 / case.p)  # from the focus plane
        rows = [line for line in drawing.lines if not re.search("[├│]", line)]
        middle = None
        for column in range(front, reference):
            places = [row for row, line in enumerate(rows) if column < len(line) and line[column] == "·"]
            if len(places) == 2:
                to_focus = (reference - column - 0.5) * drawing.column - case.z
                seen = rig.field[1] * (pupil - to_focus) / pupil
                assert (places[1] - places[0]) * drawing.row == pytest.approx(seen, abs=1.5 * drawing.row)
                middle = sum(places) / 2 if middle is None else middle
                assert sum(places) / 2 == middle


def test_rings_stand_between_lens_and_camera():
    ring = {"id": "R20", "mount": "C", "length": 20.0, "price": 9.0}
    brief = replace(BRIEF, field=(10.0, 7.5), feature=0.05, working_distance=(20.0, 400.0))
    rig = small(lenses=[{"nearest object": 150.0}], rings=[ring], brief=brief).rigs[0]
    assert rig.spacers == ("R20",)
    drawing = Drawing(rig, 120, 30)
    row = next(line for line in drawing.lines if "▓" in line)
    assert re.fullmatch(r"█+▓+▒+[· ]*┃?[· ]*", row)
    assert drawing.count("▓")[0] * drawing.column == pytest.approx(20, abs=drawing.column)
    assert "rings 20" in drawing.text


def test_headroom_limit_and_cable():
    rig = small(brief=replace(BRIEF, headroom=480.0)).rigs[0]
    drawing = Drawing(rig, 80, 20)
    assert drawing.count("║")[0] == 1
    assert drawing.lines[0].startswith("║")
    assert drawing.count("~")[0] * drawing.column == pytest.approx(50, abs=drawing.column)


def test_layers_are_as_thick_as_they_are():
    layers = (Layer(30.0, 1.5), Layer(60.0, 1.33))
    rig = small(brief=replace(BRIEF, layers=layers)).rigs[0]
    drawing = Drawing(rig, 80, 20)
    assert drawing.count("░")[0] * drawing.column == pytest.approx(90, abs=drawing.column)
    assert "where they stand changes nothing" in drawing.text


def test_a_fold_is_drawn_unfolded():
    rig = small(brief=replace(BRIEF, fold=Fold(120.0))).rigs[0]
    drawing = Drawing(rig, 80, 20)
    row = next(line for line in drawing.lines if "╱" in line)
    front = drawing.dimension("working distance")[0][0]
    assert (row.index("╱") - front) * drawing.column == pytest.approx(120, abs=drawing.column)
    assert "drawn unfolded: mirror 120 mm from the lens" in drawing.text


@pytest.mark.parametrize(
    ("camera", "lens", "told"),
    [
        ({}, {"length": None}, "lens length not stated: lens and camera are marks, not to scale"),
        ({"length": None}, {}, "camera length not stated: the camera is a mark, not to scale"),
        ({}, {"diameter": None}, "lens diameter not stated"),
        (
            {"mount": "X", "flange distance": 10.0},
            {"mount": "X", "flange distance": None},
            "flange distance not stated",
        ),
    ],
)
def test_what_is_not_stated_is_said_and_left_out(camera, lens, told):
    rig = small([camera], [lens]).rigs[0]
    drawing = Drawing(rig, 80, 20)
    assert told in drawing.text
    assert told.partition(" not stated")[0] in Drawing(rig, 40, 7).text
    if "length" in lens:
        assert (drawing.count("▒")[0], drawing.count("█")[0]) == (1, 1)
        assert "to the camera back" not in drawing.text
    if "length" in camera:
        assert drawing.count("█")[0] == 1
        assert drawing.count("▒")[0] > 1


def test_one_magnification_sees_a_field_as_high_everywhere():
    rig = demo("terminal-pins", 12).rigs[0]
    drawing = Drawing(rig, 120, 30)
    rows = [line for line in drawing.lines if "·" in line]
    assert len({line.index("·") for line in rows}) == 1


def test_a_line_scan_camera_shows_its_row():
    rig = demo("transfer-web", 12).rigs[0]
    assert f"of {'width' if rig.field[1] is None else 'height'}" in Drawing(rig, 100, 24).text


def test_gaps_in_the_catalogue_break_nothing(each_random):
    for rig in each_random.rigs:
        for width, height in SIZES:
            lines = elevation(rig, width, height, ascii=True)
            assert len(lines) <= height
            assert all(len(line) <= width and line.isascii() for line in lines)
            assert not re.search(r"\bnan\b|None", " ".join(lines))


def test_nothing_to_draw_is_said():
    rig = small(brief=replace(BRIEF, feature=0.0005)).rigs[0]
    assert elevation(rig, 80, 20) == ["nothing to draw: no magnification meets every demand"]


def test_inches_have_a_round_scale_of_inches():
    rig = demo("spout-gauge", 12).rigs[0]
    drawing = Drawing(rig, 80, 20, system="inch")
    mantissa = drawing.column / 25.4
    mantissa /= 10 ** math.floor(math.log10(mantissa) + 1e-9)
    assert mantissa * 10 == pytest.approx(round(mantissa * 10))
    assert f"working distance {rig.working_distance / 25.4:.3f}".rstrip("0") in drawing.text


def test_segments_say_the_same_with_roles():
    rig = small(brief=replace(BRIEF, headroom=480.0)).rigs[0]
    rows = elevation_rows(rig, 80, 20)
    assert join(rows) == elevation(rig, 80, 20)
    roles = {role for row in rows for _, role in row}
    assert {"camera", "lens", "cone", "plane", "cable", "limit", "dimension", "word"} <= roles
