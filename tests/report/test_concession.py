"""A concession's sentence against the solver: a brief changed to the numbers it names must let something fit."""

import re
from dataclasses import replace

import pytest

from tests.report.rankings import BRIEF, CAMERA, demo, small
from visionplan.report.concession import concession_change, concession_sentence
from visionplan.solve import rank
from visionplan.solve.rig import Concession

NUMBER = r"(\d+(?:\.\d+)?)"


def given(demand, asked, needed, unit="mm", end=None):
    return Concession(demand, asked, needed, unit, end, "K5", "L25")


@pytest.mark.parametrize(
    ("concession", "system", "sentence"),
    [
        (given("cover", 1.0, 0.95, "x"), "mm", "a field of 114 × 85.5 mm instead of 120 × 90 mm"),
        (given("cover", 1.0, 0.95, "x"), "inch", "a field of 4.488 × 3.366 in instead of 4.724 × 3.543 in"),
        (
            given("sampling", 0.1, 0.112),
            "mm",
            "sampling: 0.112 mm a pixel instead of 0.1 mm (3.571 pixels across the feature instead of 4)",
        ),
        (given("reach", 250.0, 231.04, end="nearer"), "mm", "a working distance from 231 mm (asked 250 mm)"),
        (given("reach", 450.0, 461.01, end="farther"), "mm", "a working distance up to 461.1 mm (asked 450 mm)"),
        (given("headroom", 700.0, 712.34), "mm", "a headroom of 712.4 mm instead of 700 mm"),
        (
            given("near depth", 5.0, 4.0),
            "mm",
            "a depth of 4 mm towards the lens, from the focus plane, instead of 5 mm",
        ),
        (
            given("far depth", 5.0, 3.99999),
            "mm",
            "a depth of 3.999 mm away from the lens, from the focus plane, instead of 5 mm",
        ),
        (given("rayleigh", 0.4, 0.45), "mm", "a smallest feature of 0.45 mm instead of 0.4 mm, for diffraction"),
        (given("light", 40.0, 31.238, "1"), "mm", "a signal-to-noise ratio of 31.23 instead of 40"),
        (given("perspective", 0.02, 0.0301, "1"), "mm", "a perspective of 3.01 % instead of 2 %"),
        (given("distortion", 0.01, 0.015, "1"), "mm", "a distortion of 1.5 % instead of 1 %"),
        (given("line rate", 1000.0, 812.37, "mm/s"), "mm", "a speed of 812.3 mm/s instead of 1000 mm/s"),
        (given("frame rate", 5.0, 4.5, "1/s"), "mm", "a rate of 4.5 /s instead of 5 /s"),
        (given("motion", 0.1, 0.123456), "mm", "a motion blur of 0.1235 mm instead of 0.1 mm"),
        (given("price", 3000.0, 3790.0, ""), "mm", "a price of 3790 instead of 3000"),
    ],
)
def test_sentences(concession, system, sentence):
    brief = replace(BRIEF, field=(120.0, 90.0), feature=0.4, pixels_per_feature=4.0)
    assert concession_sentence(brief, concession, system) == sentence


def test_placement_and_overlap_are_kept():
    brief = replace(BRIEF, field=(100.0, 50.0), placement=5.0)
    # 110 × 60 must be covered; 0.9 of it is 99 × 54, less placement 89 × 44
    assert "a field of 89 × 44 mm" in concession_sentence(brief, given("cover", 1.0, 0.9, "x"))
    brief = replace(BRIEF, field=(2.0, 2.0), placement=5.0)
    assert concession_sentence(brief, given("cover", 1.0, 0.5, "x")) == "a field and placement 50 % smaller"


@pytest.mark.parametrize(
    ("asked", "needed", "text"), [(1.0, 0.88, "−12 %"), (5.0, 5.17, "+3.4 %"), (1.0, 3.0, "+200 %")]
)
def test_change(asked, needed, text):
    assert concession_change(given("cover", asked, needed)) == text


CHANGES = {
    "cover": lambda brief, n: replace(brief, field=(n[0], n[1])),
    "sampling": lambda brief, n: replace(brief, pixels_per_feature=n[2]),
    "headroom": lambda brief, n: replace(brief, headroom=n[0]),
    "perspective": lambda brief, n: replace(brief, max_perspective=n[0] / 100),
    "price": lambda brief, n: replace(brief, max_price=n[0]),
    "frame rate": lambda brief, n: replace(brief, rate=n[0]),
    "light": lambda brief, n: replace(brief, snr=n[0]),
    "distortion": lambda brief, n: replace(brief, max_distortion=n[0] / 100),
    "line rate": lambda brief, n: replace(brief, speed=n[0]),
}
"""How the numbers of a sentence change the brief, where one line of it is one demand."""


def change(brief, concession, numbers):
    near, far = brief.working_distance
    if concession.demand == "reach":
        return replace(brief, working_distance=(numbers[0], far) if concession.end == "nearer" else (near, numbers[0]))
    return CHANGES[concession.demand](brief, numbers)


def test_the_numbers_named_let_something_fit_in_the_demo():
    ranking = demo("rim-cracks", 12)
    told = [given for given in ranking.concessions if given.demand in (*CHANGES, "reach")]
    assert len(told) >= 4
    for concession in told:
        sentence = concession_sentence(ranking.brief, concession)
        numbers = [float(number) for number in re.findall(NUMBER, sentence)]
        eased = change(ranking.brief, concession, numbers)
        assert rank(eased, ranking.catalogue, top=1).fitting, sentence


HARD = {
    "cover": replace(BRIEF, field=(60.0, 113.37)),
    "sampling": replace(BRIEF, feature=0.1013),
    "headroom": replace(BRIEF, headroom=375.3),
    "perspective": replace(BRIEF, max_perspective=0.00531, above=3.1),
    "price": replace(BRIEF, max_price=333.3),
    "reach": replace(BRIEF, working_distance=(111.1, 166.6)),
    "frame rate": replace(BRIEF, rate=37.7),
}


@pytest.mark.parametrize("name", HARD)
def test_the_numbers_named_let_something_fit_where_one_demand_is_too_hard(name):
    cameras = [{"frame rate": 31.57}]
    ranking = small(cameras, brief=HARD[name])
    concession = next(given for given in ranking.concessions if given.demand == name)
    sentence = concession_sentence(ranking.brief, concession)
    numbers = [float(number) for number in re.findall(NUMBER, sentence)]
    assert not ranking.fitting
    assert small(cameras, brief=change(ranking.brief, concession, numbers)).fitting, sentence


def test_camera_fits_its_own_hand_worked_field():
    assert CAMERA["pixels high"] * CAMERA["pixel pitch"] == pytest.approx(5.25)
