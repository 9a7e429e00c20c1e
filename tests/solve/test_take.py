"""Taking concessions: the brief so changed is read anew and ranked; truth is what that ranking finds."""

from dataclasses import replace

import pytest

from visionplan.brief.edit import set_line
from visionplan.brief.files import read_text
from visionplan.brief.forms import value_texts
from visionplan.brief.read import parse_brief
from visionplan.catalogue.folder import read_catalogue
from visionplan.demo import demo_folder
from visionplan.solve import concede, rank
from visionplan.solve.rig import Concession
from visionplan.solve.take import apply, lines_for, take

IMPOSSIBLE = {
    "rim-cracks": {},
    "jar-lids": {"scene.above": "26 mm"},
    "black-glaze": {"light.snr": "90"},
    "swing-stoppers": {"station.headroom": "300 mm"},
    "terminal-pins": {"scene.above": "3 mm"},
    "spout-gauge": {"choose.max_distortion": "0.01 %"},
}
"""Demo briefs with lines that nothing meets."""


@pytest.fixture(scope="module")
def catalogue():
    return read_catalogue(demo_folder())


def impossible(name):
    text = read_text(demo_folder() / "briefs" / f"{name}.toml")
    for key, value in IMPOSSIBLE[name].items():
        text = set_line(text, key, value)
    return text


@pytest.mark.parametrize("name", IMPOSSIBLE)
def test_taken_concessions_let_something_fit(catalogue, name):
    text = impossible(name)
    brief = parse_brief(text, name)
    concessions = concede(brief, catalogue)
    assert concessions
    for concession in concessions:
        taken = take(text, name, catalogue, concession)
        found = rank(parse_brief(taken.text, name), catalogue, top=1, concessions=False)
        assert taken.fitting == found.fitting
        assert taken.fitting > 0, concession
        before, after = value_texts(text), value_texts(taken.text)
        changed = {key for key in before.keys() | after.keys() if before.get(key) != after.get(key)}
        assert changed <= set(taken.lines), "no other line is touched"
        assert changed


def test_a_touch_less_fits_nothing_where_one_line_serves_one_demand(catalogue):
    """The price serves nothing else: a hundredth less than what was taken must not do."""
    text = impossible("rim-cracks")
    given = next(one for one in concede(parse_brief(text, "b"), catalogue) if one.demand == "price")
    short = replace(given, needed=given.needed * 0.99)
    brief = parse_brief(apply(text, lines_for(parse_brief(text, "b"), short)), "b")
    assert not rank(brief, catalogue, top=1, concessions=False).fitting


def brief_of(text):
    return parse_brief(f'[scene]\nfield = ["100 mm", "80 mm"]\nfeature = "0.4 mm"\n{text}', "b")


STATION = '[station]\nworking_distance = ["200 mm", "400 mm"]\n'


@pytest.mark.parametrize(
    ("text", "concession", "lines"),
    [
        # worked by hand: focus in the middle, so A = (6 + 2)/2 = 4; 3 mm are left of it, so above + below = 6
        (
            'above = "6 mm"\nbelow = "2 mm"\n' + STATION,
            Concession("near depth", 4.0, 3.0, "mm", None, "", ""),
            {"scene.above": "4 mm"},
        ),
        # 0.5 mm are left: above + below = 1, so below must give way too
        (
            'above = "6 mm"\nbelow = "2 mm"\n' + STATION,
            Concession("near depth", 4.0, 0.5, "mm", None, "", ""),
            {"scene.above": "0 mm", "scene.below": "1 mm"},
        ),
        # focus on the reference plane: A = above, with 2 mm of slack on top
        (
            'above = "6 mm"\n' + STATION + 'working_distance_tolerance = "2 mm"\n[focus]\nplane = "reference"\n',
            Concession("near depth", 8.0, 5.0, "mm", None, "", ""),
            {"scene.above": "3 mm"},
        ),
        # what is needed is less than the slack alone
        (
            'above = "6 mm"\n' + STATION + 'working_distance_tolerance = "2 mm"\n[focus]\nplane = "reference"\n',
            Concession("near depth", 8.0, 1.5, "mm", None, "", ""),
            {"scene.above": "0 mm", "station.working_distance_tolerance": "1.5 mm"},
        ),
        # 3 mm of play on each side: 0.5 (100 + 6) − 6 and 0.5 (80 + 6) − 6
        (
            'placement = "3 mm"\n' + STATION,
            Concession("cover", 1.0, 0.5, "x", None, "", ""),
            {"scene.field": "47 mm, 37 mm"},
        ),
        # the task's four pixels become a number; 0.4/0.1111 = 3.6003…, rounded down
        (
            'task = "edge"\n' + STATION,
            Concession("sampling", 0.1, 0.1111, "mm", None, "", ""),
            {"scene.task": None, "scene.pixels_per_feature": "3.6"},
        ),
        (
            STATION,
            Concession("reach", 200.0, 150.0, "mm", "nearer", "", ""),
            {"station.working_distance": "150 mm, 400 mm"},
        ),
        (
            STATION,
            Concession("reach", 400.0, 512.345, "mm", "farther", "", ""),
            {"station.working_distance": "200 mm, 512.4 mm"},
        ),
        # blur in asked pixels of 0.1 mm
        (STATION, Concession("motion", 0.1, 0.15, "mm", None, "", ""), {"motion.blur_pixels": "1.5"}),
        (STATION, Concession("perspective", 0.02, 0.0351234, "1", None, "", ""), {"scene.max_perspective": "3.513 %"}),
        (STATION, Concession("frame rate", 5.0, 4.5678, "1/s", None, "", ""), {"motion.rate": "4.567 / s"}),
    ],
)
def test_lines_worked_by_hand(text, concession, lines):
    assert lines_for(brief_of(text), concession) == lines


def test_inch_briefs_are_written_in_inches():
    brief = replace(brief_of(STATION), units="inch")
    given = Concession("headroom", 400.0, 508.0, "mm", None, "", "")
    assert lines_for(brief, given) == {"station.headroom": "20 in"}
