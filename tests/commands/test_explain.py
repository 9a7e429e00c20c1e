"""explain, as planned and as a rig that stands."""

import re

PAIR = ("area-3.1-gige-mono", "plain-16")


def told(out, label):
    """What stands beside a label."""
    return re.search(rf"^  {label} +(.*)", out, re.M)[1]


def test_a_rig_that_fits_and_one_that_does_not(command):
    status, out, err = command("explain", command.jar_lids, *PAIR)
    assert (status, err) == (0, "")
    assert told(out, "verdict").startswith("fits")
    status, out, err = command("explain", command.jar_lids, "area-3.1-gige-mono", "small-4")
    assert (status, err) == (1, "")
    assert told(out, "verdict").startswith("does not fit")


def test_a_rig_that_stands_already(command):
    status, out, _ = command("explain", command.jar_lids, *PAIR, "--at", "400 mm", "--stop", "5.6")
    assert status == 0
    assert told(out, "working distance").startswith("400 mm")
    assert told(out, "f-number").startswith("5.6;")
    status, out, _ = command("explain", command.jar_lids, *PAIR, "--at", "12 in", "--units", "inch")
    assert told(out, "working distance").startswith("12 in")
    status, out, _ = command("explain", command.jar_lids, *PAIR, "--rings", "C-5", "--orientation", "portrait")
    assert told(out, "spacer rings") == "C-5, 5 mm"
    assert told(out, "orientation") == "portrait"
    status, out, _ = command("explain", command.jar_lids, *PAIR, "--rings=")
    assert told(out, "spacer rings") == "none"


def test_what_the_catalogue_has_not(command):
    assert "'area-9'" in command.refused("explain", command.jar_lids, "area-9", "plain-16")
    assert "'plan-16'" in command.refused("explain", command.jar_lids, PAIR[0], "plan-16")
    assert "'C-7'" in command.refused("explain", command.jar_lids, *PAIR, "--rings", "C-5,C-7")
    assert "focal length" in command.refused("explain", command.jar_lids, *PAIR, "--at", "1 mm")
