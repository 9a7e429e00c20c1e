"""Advice in words: the figures it tells, against the rigs it is about."""

import re
from dataclasses import replace

import pytest

from tests.solve.traced import BRIEF, CAMERA, RINGS, catalogue
from visionplan.report.advice import advice_rows
from visionplan.report.explain import explain
from visionplan.solve import judge_one


def rig(brief=BRIEF, **options):
    return judge_one(brief, catalogue(rings=RINGS), CAMERA["id"], "sixteen", **options)


def test_every_room_told_is_what_the_rig_so_set_has():
    built = rig(stop=8.0, rings=[])
    told = dict(advice_rows(built))
    height = re.match(r"([\d.]+) mm over the reference plane: (\d+) %", told["best focus"])
    focused = rig(replace(BRIEF, focus_plane=float(height[1])), stop=8.0, rings=[])
    assert float(height[2]) == pytest.approx(100 * focused.latitude, abs=1)
    distance = re.match(r"(\d+) mm: (\d+) % of room", told["round distance"])
    assert float(distance[2]) == pytest.approx(100 * rig(at=float(distance[1]), stop=8.0, rings=[]).latitude, abs=1)
    ring = re.match(r"(R[\d.]+): (.*)", told["a ring more"])
    assert ("does not fit" in ring[2]) == (not rig(stop=8.0, rings=[ring[1]]).fits)


def test_what_does_not_fit_then_says_what_it_misses():
    built = rig(replace(BRIEF, field=(160.0, 60.0)))
    told = dict(advice_rows(built))
    assert re.match("portrait: does not fit, misses cover by .* %", told["turned by 90°"])


def test_it_stands_in_the_explanation():
    text = explain(rig())
    assert "\nAdvice\n------\n" in text
    assert all(len(line) <= 80 for line in text.split("\n"))
    assert "Advice" not in explain(rig(replace(BRIEF, field=(900.0, 900.0)), stop=8.0))
