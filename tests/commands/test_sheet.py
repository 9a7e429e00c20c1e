"""sheet: the page for one rig."""

PAIR = ("area-3.1-gige-mono", "plain-16")


def test_a_sheet_as_text_and_as_markdown(command):
    status, out, err = command("sheet", command.jar_lids, *PAIR)
    assert (status, err) == (0, "")
    assert out.startswith("Set-up sheet: area-3.1-gige-mono with plain-16\n")
    status, out, _ = command("sheet", command.jar_lids, *PAIR, "--format", "markdown", "--units", "inch")
    assert status == 0
    assert out.startswith("# Set-up sheet: ")


def test_a_rig_that_does_not_fit(command):
    status, out, err = command("sheet", command.jar_lids, "area-3.1-gige-mono", "small-4")
    assert (status, err) == (1, "")
    assert "DOES NOT FIT" in out


def test_an_unknown_lens(command):
    assert "nosuch" in command.refused("sheet", command.jar_lids, "area-3.1-gige-mono", "nosuch")
