"""The span chart read back from its text: the axis is taken from its labels, and bars from what is drawn."""

import math
import re
from dataclasses import replace
from itertools import pairwise

import pytest

from tests.report.rankings import BRIEF, demo, small
from visionplan.report.axis import axis_over
from visionplan.report.canvas import join
from visionplan.report.spanchart import span_chart, span_rows
from visionplan.solve import judge_one
from visionplan.solve.demands import DEMANDS

NAMES = [demand.name for demand in DEMANDS]
START, END = "├┣", "┤┫"


class Chart:
    """A chart as a person reads it."""

    def __init__(self, rig, width, **more):
        self.lines = span_chart(rig, width, **more)
        self.rows = dict(zip(["axis", *NAMES, "span"], self.lines))
        ticks = [(match.start(), float(match[1])) for match in re.finditer(r"[╷']([\d.]+)", self.rows["axis"])]
        self.ticks = ticks
        if len(ticks) > 1:
            (a, low), (b, high) = ticks[0], ticks[-1]
            self.per_cell = math.log(high / low) / (b - a)
            self.column = lambda value: a + math.log(value / low) / self.per_cell


def bounds(rig):
    return {verdict.name: verdict for verdict in rig.demands if not verdict.gate}


@pytest.mark.parametrize("width", [60, 80, 100, 160])
def test_ends_of_bars_stand_at_their_bounds(each_demo, width):
    seen = 0
    for rig in each_demo.rigs[:4]:
        chart = Chart(rig, width)
        for name, verdict in bounds(rig).items():
            for sign, bound in ((START, verdict.lo), (END, verdict.hi)):
                found = [place for place, character in enumerate(chart.rows[name]) if character in sign]
                assert len(found) <= 1
                if found:
                    # a tick stands in the cell of its value, so the axis read from two ticks is itself a little vague
                    assert found[0] == pytest.approx(chart.column(bound), abs=1.3)
                    seen += 1
    assert seen > 8


@pytest.mark.parametrize("width", [40, 80, 132])
def test_every_bound_has_its_value(each_demo, width):
    for rig in each_demo.rigs[:4]:
        chart = Chart(rig, width)
        for name, verdict in bounds(rig).items():
            values = [float(number) for number in re.findall(r"(?<![\w.])\d+(?:\.\d+)?(?! %)", chart.rows[name])]
            for bound in filter(None, (verdict.lo, verdict.hi)):
                assert any(value == pytest.approx(bound, rel=0.006) for value in values), chart.rows[name]


def test_axis_cells_hold_their_values():
    axis = axis_over([0.07, 0.1167], 61, 9)
    for value in (0.07, 0.0811, 0.1, 0.1167):
        place = axis.place(value)
        assert 9 <= place < 52
        assert axis.value(place) <= value * (1 + 1e-12)
        assert value <= axis.value(place + 1) * (1 + 1e-12)
    for place, text in axis.labels():
        assert axis.place(float(text)) == place


@pytest.mark.parametrize(("low", "high"), [(1e-6, 2e3), (0.1, 0.1), (0.0999, 0.1001), (3.1, 9.7)])
def test_axis_labels_are_apart_and_round(low, high):
    for cells in (26, 61, 140):
        labels = axis_over([low, high], cells, 9).labels()
        assert labels
        for (left, text), (right, _) in pairwise(labels):
            assert right > left + len(text) + 1
        assert all(len(re.sub("e.*", "", text).replace(".", "").strip("0")) <= 2 for _, text in labels)


@pytest.mark.parametrize("ascii", [False, True])
def test_lines_fit_and_the_rows_are_always_the_same(each_random, ascii):
    for rig in each_random.rigs:
        for width in (40, 59, 60, 80, 200):
            lines = span_chart(rig, width, ascii)
            assert all(len(line) <= width for line in lines)
            assert not ascii or "".join(lines).isascii()
            assert [line[: len(name) + 1].rstrip() for name, line in zip(NAMES, lines[1:13])] == NAMES
            assert lines[13].startswith("span")


def test_the_span_and_the_working_point():
    rig = small().rigs[0]
    chart = Chart(rig, 80)
    row = chart.rows["span"]
    assert row.index("╞") == pytest.approx(chart.column(0.07), abs=1)
    assert row.index("╡") == pytest.approx(chart.column(5.25 / 45), abs=1)
    assert row.index("╪") == pytest.approx(chart.column((0.07 * 5.25 / 45) ** 0.5), abs=1)
    assert "66 % of room" in row
    point = row.index("╪")
    for name in NAMES:
        assert chart.rows[name][point] in "┼┿┊"
    assert "stands at 0.09037; 66 % of room, comfortable; pinch: sampling against cover" in " ".join(chart.lines[14:])


@pytest.mark.parametrize(("ascii", "heavy"), [(False, "━"), (True, "=")])
def test_what_pinches_is_heavier_and_named(ascii, heavy):
    chart = Chart(small().rigs[0], 80, ascii=ascii)
    assert {name for name in NAMES if heavy in chart.rows[name]} == {"sampling", "cover"}
    assert {name for name in NAMES if "pinch" in chart.rows[name]} == {"sampling", "cover"}


def test_what_holds_is_named():
    rig = small(brief=replace(BRIEF, working_distance=(200.0, 280.0))).rigs[0]
    chart = Chart(rig, 80)
    assert [name for name in NAMES if "holds" in chart.rows[name]] == ["reach"]
    assert "held by reach" in " ".join(chart.lines[14:])


@pytest.mark.parametrize("width", [60, 80, 120])
def test_a_missed_bar_ends_before_the_working_point_and_says_by_how_much(width):
    for rig in demo("rim-cracks", 12).rigs:
        chart = Chart(rig, width)
        point = chart.rows["span"].index("╪")
        gap = chart.rows["span"]
        assert gap.find("╡") <= point <= max(gap.find("╞"), point)
        for name, verdict in bounds(rig).items():
            row = chart.rows[name]
            if verdict.verdict == "missed":
                too_high = verdict.hi is not None and verdict.hi < rig.magnification
                end = next(place for place, sign in enumerate(row) if sign in (END if too_high else START))
                apart = abs(chart.column(rig.magnification) - chart.column(verdict.hi if too_high else verdict.lo))
                assert (end < point if too_high else point < end) or apart < 1.5
                assert "missed" in row
                told = row if width >= 80 else row + " ".join(chart.lines[14:])
                assert re.search(r"by [\d.]+ (%|mm)", told), row
        assert "short" in " ".join(chart.lines[13:])


def test_what_is_missed_is_told_beneath_where_rows_have_no_room():
    for rig in demo("rim-cracks", 12).rigs:
        told = " ".join(span_chart(rig, 40)[14:])
        for name, verdict in bounds(rig).items():
            assert (verdict.verdict == "missed") == bool(re.search(rf"{name} by [\d.]+ (%|mm)", told))


def test_what_is_not_known_or_not_asked_is_said_in_words():
    rig = small([{"length": None}], brief=replace(BRIEF, headroom=700.0)).rigs[0]
    rows = Chart(rig, 80).rows
    assert "unknown: length of the camera not stated" in rows["headroom"]
    assert "not asked" in rows["light"]
    assert not set(rows["light"]) & set("─━")
    strict = small([{"length": None}], brief=replace(BRIEF, headroom=700.0, strict=True)).rigs[0]
    assert "strictly a miss: length of the camera not stated" in Chart(strict, 80).rows["headroom"]


def test_no_span_is_said():
    rig = small(brief=replace(BRIEF, feature=0.0005)).rigs[0]
    chart = Chart(rig, 80)
    assert "no magnification holds it" in chart.rows["rayleigh"]
    assert "no magnification meets every demand" in chart.rows["span"]
    assert "┊" not in "".join(chart.lines)


def test_a_gate_missed_is_told_beneath():
    rig = small(brief=replace(BRIEF, max_price=550.0)).rigs[0]
    lines = span_chart(rig, 80)
    assert "doesn't fit" in lines[13]
    assert "misses price: 600, asked 550" in " ".join(lines[14:])


def test_a_rig_set_otherwise_stands_outside_its_span():
    ranking = small()
    rig = judge_one(BRIEF, ranking.catalogue, "K5", "L25", at=395.0)
    chart = Chart(rig, 80)
    row = chart.rows["span"]
    assert row.index("╪") < row.index("╞") < row.index("╡")
    assert "misses by" in chart.rows["sampling"]


def test_a_telecentric_lens_stands_at_its_magnification():
    rig = demo("terminal-pins", 12).rigs[0]
    chart = Chart(rig, 80)
    assert chart.rows["span"].index("╪") == pytest.approx(chart.column(rig.case.M), abs=1.5)


def test_lengths_in_inches():
    rig = demo("rim-cracks", 12).rigs[6]
    assert "misses by" in Chart(rig, 100, system="inch").rows["reach"]
    assert re.search(r"misses by [\d.]+ in", Chart(rig, 100, system="inch").rows["reach"])


def test_segments_say_the_same_with_roles():
    rig = small().rigs[0]
    rows = span_rows(rig, 80)
    assert join(rows) == span_chart(rig, 80)
    roles = {role for row in rows for _, role in row}
    assert {"name", "axis", "bar", "pinch", "value", "word", "span", "point"} <= roles
    assert ("sampling", "pinch") in [(text.strip(), role) for text, role in rows[2]]
