"""The table of lines against the brief that it fills."""

from dataclasses import fields

from visionplan.brief.fields import BY_KEY, LINES, RIVALS, SECTIONS
from visionplan.brief.layers import FITTED
from visionplan.brief.model import Brief
from visionplan.brief.rules import VISIBLE
from visionplan.optics.light import luminosity
from visionplan.optics.media import SELLMEIER
from visionplan.units import factor


def test_every_attribute_of_a_brief_has_one_line():
    attributes = [field.name for field in fields(Brief) if field.name not in ("stated", "source")]
    assert sorted(line.attribute for line in LINES) == sorted(attributes)


def test_keys_are_unique_and_stand_in_the_order_of_the_sections():
    sections = [line.section for line in LINES]
    assert len(BY_KEY) == len(LINES)
    assert sections == sorted(sections, key=list(SECTIONS).index)


def test_only_field_feature_and_working_distance_are_required():
    required = {line.key for line in LINES if line.required}
    assert required == {"scene.field", "scene.feature", "station.working_distance"}


def test_rivals_are_lines():
    assert set(RIVALS) | set(RIVALS.values()) <= set(BY_KEY)


def test_units_that_values_are_written_in_are_known():
    limits = [part.limits for line in LINES for part in (line, *line.parts) if part.limits.unit]
    assert all(factor(limit.written or limit.unit, limit.unit) > 0 for limit in limits)


def test_limits_are_those_of_the_visible_table():
    ends = list(VISIBLE)
    assert all(luminosity(ends) > 0)
    assert list(luminosity([ends[0] - 1e-9, ends[1] + 1e-9])) == [0, 0]


def test_every_formula_of_an_index_has_its_range():
    assert set(FITTED) == set(SELLMEIER)
