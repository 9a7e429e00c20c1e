"""asbuilt: from the pixels of a target to the move."""

import json
import re

import pytest

PAIR = ("area-3.1-gige-mono", "plain-16")


@pytest.fixture
def asbuilt(command):
    return lambda *options: command("asbuilt", command.jar_lids, *PAIR, *options)


def planned(command):
    _, out, _ = command("rank", command.jar_lids, "--format", "json", "--top", "300")
    return next(rig for rig in json.loads(out)["rigs"] if (rig["camera"], rig["lens"]) == PAIR)


def test_eight_millimetres_too_far(command, asbuilt):
    plan = planned(command)
    # A thin lens, the same at the reference plane: m grows by (s − f)/(s + 8 − f), its focus plane 5.5 mm nearer.
    to_lens = 16 / plan["magnification"]
    there = 16 / (to_lens + 8)
    scale = there * (16 / there + 16) / (16 / there + 16 + 5.5)
    pixels = round(100 * scale / (plan["sampling_mm"] * plan["magnification"]))
    status, out, err = asbuilt("--target", "100 mm", "--pixels", pixels)
    assert (status, err) == (0, "")
    value, room = map(float, re.search(r"Move the camera ([\d.]+) ± ([\d.]+) mm towards the part", out).groups())
    assert value == pytest.approx(8, abs=room)
    assert room < 0.7
    distance = plan["working_distance_mm"] + 8
    status, out, _ = asbuilt("--target", "100 mm", "--pixels", pixels, "--distance", f"{distance:.0f} mm")
    assert "Focal length" not in out
    assert "too far" in out


def test_targets_at_both_ends_tell_the_tilt(asbuilt):
    status, out, _ = asbuilt(
        *("--target", "50 mm, height, left", "--pixels", "518"),
        *("--target", "50 mm, height, right 80 mm", "--pixels", "540"),
    )
    assert status == 1
    assert "nearer at the right" in out
    assert "Square up the camera" in out


def test_everything_wrong_with_targets_is_told_at_once(command, asbuilt):
    err = command.refused(
        *("asbuilt", command.jar_lids, *PAIR, "--target", "50", "--pixels", "500"),
        *("--target", "50 mm, sideways", "--pixels", "500", "--pixels", "1"),
    )
    assert "no unit" in err
    assert "sideways" in err
    assert "2 --target and 3 --pixels" in err


@pytest.mark.parametrize("pixels", ["0", "-4", "many", "nan", "99999"])
def test_pixels_that_cannot_be(command, pixels):
    command.refused("asbuilt", command.jar_lids, *PAIR, "--target", "50 mm", "--pixels", pixels)


def test_markup_in_arguments_stays_text(command):
    err = command.refused("asbuilt", command.jar_lids, *PAIR, "--target", "50 mm, \x1b[31m", "--pixels", "500")
    assert "\x1b" not in err
