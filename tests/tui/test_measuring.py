"""What can be measured: values as typed. Truth: the command's own targets, and what the solver takes."""

import pytest

from visionplan.faults import InputError
from visionplan.solve.target import ENDS, Target
from visionplan.tui.measuring import COLUMNS, SINGLE, field_of, measures, read_value, without_target

ALL = {
    "1 length": "2 in",
    "1 pixels": "812.5",
    "2 length": "50 mm",
    "2 pixels": "800 px",
    "2 along": "height",
    "2 at": "left",
    "2 off": "6 cm",
    "distance": "312 mm",
    "height": "-4 mm",
}


def test_values_become_targets():
    read = measures(ALL)
    assert read.targets == (Target(50.8, 812.5), Target(50, 800, "height", "left", 60))
    assert (read.distance, read.height) == (312, -4)


def test_target_without_its_pixels_is_left_out():
    read = measures({"1 length": "50 mm", "2 length": "50 mm", "2 pixels": "800"})
    assert read.targets == (Target(50, 800),)
    assert (read.distance, read.height) == (None, 0)


def test_target_in_the_centre_has_no_distance_from_it():
    assert measures(ALL | {"2 at": "centre"}).targets[1] == Target(50, 800, "height")


def test_every_end_of_the_field_can_be_chosen():
    assert COLUMNS["at"].choices[1:] == tuple(ENDS)
    assert all(end in COLUMNS["at"].expected for end in ENDS)


@pytest.mark.parametrize("key", [*SINGLE, *(f"1 {column}" for column in COLUMNS)])
@pytest.mark.parametrize("text", ["", "x", "5 kg", "-1e999 mm", "50", "0 px", "-50 mm", "[red]"])
def test_wrong_value_says_what_was_expected(key, text):
    if (key, text) in {("height", "-50 mm"), ("1 pixels", "50")}:
        assert read_value(key, text)
        return
    with pytest.raises(InputError) as error:
        read_value(key, text)
    assert error.value.faults[0].found
    assert error.value.faults[0].expected == field_of(key).expected


def test_dropping_a_target_moves_those_after_it_up():
    left = without_target(ALL, 1)
    assert measures(left).targets == (Target(50, 800, "height", "left", 60),)
    assert left["distance"] == "312 mm"
