"""The starter brief."""

import re

import pytest

from visionplan.brief.fields import LINES
from visionplan.brief.read import parse_brief
from visionplan.brief.starter import STARTER


def test_it_asks_only_what_is_required():
    brief = parse_brief(STARTER, "starter")
    assert brief.stated == {line.key for line in LINES if line.required}


@pytest.mark.parametrize("line", LINES, ids=lambda line: line.key)
def test_every_line_stands_in_it_once_with_its_meaning(line):
    section = re.search(rf"(?ms)^\[{line.section}\].*?(?=^\[|\Z)" if line.section else r"(?s)\A.*?(?=\n\[)", STARTER)
    rows = re.findall(rf"^(?:# )?{line.name} = .*$", section[0], re.MULTILINE)
    assert len(rows) == 1
    assert line.doc in section[0]


def test_it_is_a_brief_with_every_line_taken_that_has_no_rival():
    text = re.sub(r"(?m)^# (?=\w+ = )", "", STARTER)
    text = re.sub(r"(?m)^(task|blur|irradiance) = .*\n", "", text)
    brief = parse_brief(text, "starter")
    assert len(brief.stated) == len(LINES) - 4
