"""Values as typed and as shown."""

from dataclasses import replace

import pytest
from hypothesis import given
from hypothesis import strategies as st

from visionplan.brief.fields import BY_KEY, LINES
from visionplan.brief.forms import parse_value, value_text, value_texts
from visionplan.brief.model import Brief, Fold, Layer
from visionplan.brief.read import parse_brief
from visionplan.brief.starter import STARTER
from visionplan.brief.values import take
from visionplan.faults import InputError


@pytest.mark.parametrize(
    ("key", "typed", "value"),
    [
        ("scene.field", "120 mm, 90 mm", ["120 mm", "90 mm"]),
        ("scene.field", "120 x 90 mm", ["120 mm", "90 mm"]),
        ("scene.field", "4.5×3 in", ["4.5 in", "3 in"]),
        ("scene.field", '["120 mm", "90 mm"]', ["120 mm", "90 mm"]),
        ("station.working_distance", "250..450 mm", ["250 mm", "450 mm"]),
        ("station.working_distance", "10 in .. 450 mm", ["10 in", "450 mm"]),
        ("station.working_distance", "0.25...0.45 m", ["0.25 m", "0.45 m"]),
        ("station.working_distance", "250 mm, 450 mm", ["250 mm", "450 mm"]),
        ("scene.feature", " 0.05mm ", "0.05mm"),
        ("scene.feature", '"0.4 mm"', "0.4 mm"),
        ("comfort", "20 %", "20 %"),
        ("comfort", "0.2", 0.2),
        ("strict", "yes", True),
        ("strict", "No", False),
        ("strict", "true", True),
        ("title", "Jar lids, line 3", "Jar lids, line 3"),
        ("title", '"two\\nlines"', "two\nlines"),
        ("title", '"Lids" for jars', '"Lids" for jars'),
        ("title", "", ""),
        ("title", "[3]", "[3]"),
        ("choose.mounts", "C, CS", ["C", "CS"]),
        ("choose.mounts", "C", ["C"]),
        ("choose.sensor", "mono", "mono"),
        ("choose.max_count", "2", 2),
        ("light.snr", "40", 40),
        ("light.snr", "4e1", 40.0),
        ("choose.max_price", "2999.5", 2999.5),
        ("motion.rate", "4 / s", "4 / s"),
        ("focus.plane", "reference", "reference"),
        ("focus.plane", "-1 mm", "-1 mm"),
        (
            "station.layers",
            "fused silica 6 mm, 1.333 20 mm",
            [{"material": "fused silica", "thickness": "6 mm"}, {"index": 1.333, "thickness": "20 mm"}],
        ),
        ("station.fold", "120 mm", {"from_lens": "120 mm"}),
        ("station.fold", "120 mm, 2", {"from_lens": "120 mm", "mirrors": 2}),
        ("station.fold", "120 mm, 1 mirror", {"from_lens": "120 mm", "mirrors": 1}),
    ],
)
def test_plain_forms(key, typed, value):
    read = parse_value(key, typed)
    assert read == value
    assert type(read) is type(value)


@pytest.mark.parametrize(
    ("key", "typed", "found", "expected"),
    [
        ("scene.feature", "0.4", "no unit", "a length from 1 nm to 1 km, such as 0.4 mm"),
        ("scene.feature", "", "nothing stands here", "a length"),
        ("scene.feature", '"0.4 mm"\nabove = "1 mm"', "above", "a length"),
        ("scene.field", "120 mm", '"120 mm"', "such as 120 mm, 90 mm"),
        ("station.working_distance", "450..250 mm", "greater", "the smaller first"),
        ("strict", "perhaps", '"perhaps"', "yes or no"),
        ("choose.sensor", "Mono", '"Mono"', 'did you mean "mono"?'),
        ("choose.mounts", "C, C", "twice", "once"),
        ("choose.mounts", "C,", '"" in the list', "such as C, CS"),
        ("choose.max_count", "1.5", "1.5", "a whole number from 1 to 64, such as 1"),
        ("light.snr", "1e400", "1e400", "a number"),
        ("light.snr", "nan", "nan", "a number"),
        ("station.layers", "N-BK7", '"N-BK7"', "such as N-BK7 6 mm, 1.333 20 mm"),
        ("station.layers", "glas 3 mm", '"glas" is not known', "N-BK7"),
        ("station.fold", "120 mm, two", '"120 mm, two"', "such as 120 mm, 1 mirror"),
        ("comfort", "20", "20", "such as 20 %"),
    ],
)
def test_what_a_line_does_not_take_says_what_it_does(key, typed, found, expected):
    with pytest.raises(InputError) as caught:
        parse_value(key, typed)
    (fault,) = caught.value.faults
    assert (fault.column, fault.line) == (key, None)
    assert found in fault.found
    assert expected in fault.expected


def test_both_of_a_pair_are_judged():
    with pytest.raises(InputError) as caught:
        parse_value("scene.field", "120, 90")
    assert [fault.found for fault in caught.value.faults] == ["'120' has no unit", "'90' has no unit"]


def test_brackets_that_are_no_toml_are_words():
    assert parse_value("title", "[" * 4000) == "[" * 4000


@pytest.mark.parametrize("line", LINES, ids=lambda line: line.key)
def test_every_example_is_shown_in_a_form_that_can_be_typed(line):
    text = f"[{line.section}]\n{line.name} = {line.example}" if line.section else f"{line.name} = {line.example}"
    shown = value_text(text, line.key)
    assert value_texts(text) == {line.key: shown}
    assert take(line, parse_value(line.key, shown)) == take(line, parse_value(line.key, line.example))
    assert not shown.startswith(("[", "{", '"'))


def test_a_line_that_does_not_stand_there_is_shown_empty():
    assert value_text("[scene]\n", "scene.feature") == ""
    assert value_text("scene = 3", "scene.feature") == ""


def test_names_with_commas_are_shown_as_the_file_has_them():
    text = "[choose]\ncameras = ['a,b', 'c']"
    assert value_text(text, "choose.cameras") == '["a,b", "c"]'
    assert parse_value("choose.cameras", '["a,b", "c"]') == ["a,b", "c"]


@given(st.text())
def test_any_title_comes_back_as_typed_from_what_is_shown(title):
    from tomlkit import document

    toml = document()
    try:
        toml["title"] = title
        text = toml.as_string()
        shown = value_text(text, "title")
    except UnicodeEncodeError:
        return
    assert parse_value("title", shown) == title
    assert all(character.isprintable() or ord(character) > 127 for character in shown)


@given(st.lists(st.text(st.characters(codec="utf-8"), min_size=1).map(str.strip).filter(bool), min_size=1, unique=True))
def test_any_names_come_back_as_typed_from_what_is_shown(names):
    brief = Brief((1, 1), 1, (1, 1), cameras=tuple(names))
    assert parse_value("choose.cameras", value_text(brief, "choose.cameras")) == names


def test_a_briefs_values_come_back_within_12_digits():
    brief = Brief(
        field=(100 / 3, 90.0),
        feature=0.1 + 0.2,
        working_distance=(250.0, 1000 / 3),
        title="Lids",
        comfort=1 / 7,
        strict=True,
        above=4.0,
        below=1.0,
        pixels_per_feature=10 / 3,
        max_perspective=0.02,
        tilt=0.1,
        layers=(Layer(6.0, 1.5, ""), Layer(2.0, 1.3334, "water")),
        fold=Fold(120.0, 2),
        speed=1000 / 3,
        rate=4.5,
        irradiance=30.0,
        reflectance=1 / 3,
        wavelength=632.8e-6,
        max_exposure=0.005,
        pulse=5e-5,
        focus_plane=-0.5,
        cable=30e3,
        max_mass=600.0,
        mounts=("C", "CS"),
        in_hand=False,
    )
    for line in LINES:
        shown, value = value_text(brief, line.key), getattr(brief, line.attribute)
        if value is None or value == ():
            assert shown == ""
            continue
        back = take(line, parse_value(line.key, shown))
        if line.key == "station.layers":
            assert back == [{"index": 1.5, "thickness": 6.0}, {"material": "water", "thickness": 2.0}]
        elif line.key == "station.fold":
            assert back == {"from_lens": 120.0, "mirrors": 2}
        elif isinstance(value, float | tuple) and not isinstance(back, tuple | str):
            assert back == pytest.approx(value, rel=1e-11)
        else:
            assert back == value or back == pytest.approx(value, rel=1e-11)


def test_defaults_and_names_of_a_brief():
    brief = parse_brief(STARTER, "")
    shown = {key: value_text(brief, key) for key in ("comfort", "focus.plane", "light.wavelength", "scene.above")}
    assert shown == {"comfort": "20 %", "focus.plane": "middle", "light.wavelength": "550 nm", "scene.above": "0 mm"}
    assert value_text(replace(brief, focus_plane=0.0), "focus.plane") == "reference"


def test_a_brief_in_inches_shows_its_lengths_in_inches():
    brief = replace(parse_brief(STARTER, ""), units="inch", feature=2.54, field=(254.0, 127.0), speed=25.4)
    assert value_text(brief, "scene.feature") == "0.1 in"
    assert value_text(brief, "scene.field") == "10 in, 5 in"
    assert value_text(brief, "motion.speed") == "1 in/s"
    assert value_text(brief, "light.wavelength") == "550 nm"


def test_unknown_keys_are_the_callers_mistake():
    assert "scene.fields" not in BY_KEY
    with pytest.raises(KeyError):
        parse_value("scene.fields", "1")
