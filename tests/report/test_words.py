from dataclasses import replace

import pytest

from tests.report.rankings import BRIEF, small
from visionplan.report.words import (
    asked_words,
    got_words,
    lacking,
    limits,
    miss_words,
    missed_by,
    misses,
    pinch_words,
    value_words,
)
from visionplan.solve.rig import Verdict


def verdict(rig, name):
    return next(verdict for verdict in rig.demands if verdict.name == name)


@pytest.mark.parametrize(
    ("name", "value", "unit", "system", "text"),
    [
        ("cover", 1.125, "x", "mm", "1.125 ×"),
        ("reach", (250.0, 450.0), "mm", "mm", "250 to 450 mm"),
        ("reach", (254.0, 508.0), "mm", "inch", "10 to 20 in"),
        ("cable", 25000.0, "mm", "mm", "25 m"),
        ("perspective", 0.02, "1", "mm", "2 %"),
        ("light", 40.0, "1", "mm", "40"),
        ("exposure", 0.0002, "s", "mm", "200 µs"),
        ("mount", "C camera, F\x1b[31m lens", "", "mm", "C camera, F␛[31m lens"),
        ("travel", (-5.0, 0.5), "mm", "mm", "-5 to 0.5 mm"),
        ("price", None, "", "mm", "not stated"),
    ],
)
def test_values_read_in_their_units(name, value, unit, system, text):
    assert value_words(name, value, unit, system) == text


def test_a_gate_that_is_missed_says_what_it_gets():
    rig = small(lenses=[{"mount": "F", "flange distance": 46.5}]).rigs[0]
    assert misses(rig)[-1] == "mount: C camera, F lens"


def test_a_gate_of_the_brief_that_is_missed_says_what_was_asked():
    rig = small(brief=replace(BRIEF, max_price=550.0, mounts=("CS",))).rigs[0]
    assert misses(rig) == ["mount: C camera, C lens, asked CS", "price: 600, asked 550"]


def test_misses_by_percent_of_what_was_asked():
    # cover holds up to 5.25/50 = 0.105, sampling from 0.0035/0.025 = 0.14: at sqrt(0.105 * 0.14) = 0.12124
    # the height seen is 5.25/0.12124 = 43.30 of 50 (13.4 % short), a pixel 0.028868 instead of 0.025 (15.5 % more)
    rig = small(brief=replace(BRIEF, field=(60.0, 50.0), feature=0.1)).rigs[0]
    assert misses(rig) == ["cover by 13 %", "sampling by 15 %"]
    assert pinch_words(rig) == "sampling against cover"
    assert limits(rig) == (
        "sampling needs a magnification of at least 0.14, cover of at most 0.105; the rig stands at 0.1212"
    )


def test_place_demands_are_missed_by_a_length():
    # only 0.0667 (distance 400) to 0.1429 (200) fits; at 100 to 150 mm the magnification is 0.2 and more
    rig = small(brief=replace(BRIEF, working_distance=(100.0, 150.0))).rigs[0]
    by = missed_by(verdict(rig, "reach"))
    assert by == f"{rig.working_distance - 150:.0f} mm"
    assert missed_by(verdict(rig, "reach"), "inch") == f"{(rig.working_distance - 150) / 25.4:.2g} in"


def test_what_no_magnification_meets_is_said_so():
    rig = small(brief=replace(BRIEF, feature=0.0005)).rigs[0]
    assert "rayleigh at any magnification" in misses(rig)
    assert limits(rig) == ""
    assert pinch_words(rig) == ""


def test_limits_are_the_bounds_that_pinch():
    rig = small().rigs[0]
    assert limits(rig) == (
        "sampling sets 0.07 at the low end of the magnification, cover 0.1167 at the high end; "
        "the rig stands at 0.09037"
    )


def test_a_held_rig_says_by_what():
    rig = small(brief=replace(BRIEF, working_distance=(200.0, 280.0))).rigs[0]
    assert pinch_words(rig) == "sampling against cover, held by reach"
    assert pinch_words(replace(rig, pinch=("travel", "travel"), held=None)) == "travel at both ends"


def test_what_is_not_stated_is_named():
    brief = replace(BRIEF, headroom=700.0, max_mass=500.0)
    rig = small(lenses=[{"length": None}], brief=brief).rigs[0]
    assert lacking(rig, verdict(rig, "headroom")) == "length of the lens not stated"
    assert got_words(rig, verdict(rig, "headroom")) == "length of the lens not stated"
    assert got_words(rig, verdict(rig, "mass")) == "not stated"
    assert asked_words(verdict(rig, "headroom")) == "700 mm"
    assert asked_words(verdict(rig, "light")) == "not asked"
    assert got_words(rig, verdict(rig, "light")) == "–"


def test_strictly_unknown_is_a_miss_that_says_why():
    brief = replace(BRIEF, headroom=700.0, strict=True)
    rig = small(lenses=[{"length": None}], brief=brief).rigs[0]
    assert miss_words(rig, verdict(rig, "headroom")) == (
        "headroom: length of the lens not stated, which is strictly a miss"
    )


def test_a_miss_that_has_no_ratio_is_told_by_name():
    assert missed_by(Verdict("travel", 0.1, 0.2, (0.0, 1.0), -0.5, "mm", "missed")) == ""
    assert missed_by(Verdict("light", None, 0.2, 40.0, None, "1", "missed")) == ""
