"""Lines set and dropped in a person's own text."""

import tomllib

import pytest
from hypothesis import given
from hypothesis import strategies as st

from visionplan.brief.edit import drop_line, set_line
from visionplan.brief.fields import BY_KEY, LINES, SECTIONS
from visionplan.brief.forms import parse_value, value_text
from visionplan.brief.read import parse_brief
from visionplan.brief.starter import STARTER
from visionplan.faults import InputError

OWN = """# Lids
title = 'Jar lids'   # line 3

[scene]  # what is seen
# both sides
field = [  # as the drawing says
  "120 mm",  # across
  "90 mm",   # along
]
feature = "0.4 mm"    # the dent

# the robot's cell
[station]
working_distance = ["250 mm", "450 mm"]
layers = [
  { material = "N-BK7", thickness = "6 mm" },  # the window
  { index = 1.333, thickness = "20 mm" },      # water
]
[station.fold]
from_lens = "120 mm"  # to its middle
mirrors = 1

# last word
"""

TYPED = {
    line.key: value_text(f"[{line.section}]\n{line.name} = {line.example}".removeprefix("[]\n"), line.key)
    for line in LINES
}
"""Each line's example as a person would type it."""


def comments(text):
    return sorted(row.partition("#")[2].strip() for row in text.splitlines() if "#" in row)


def value(text, key):
    line = BY_KEY[key]
    data = tomllib.loads(text)
    return (data.get(line.section, {}) if line.section else data).get(line.name)


def without(data, key):
    """The data of a TOML text but for one line."""
    line = BY_KEY[key]
    rest = {name: dict(inner) if isinstance(inner, dict) else inner for name, inner in data.items()}
    (rest.get(line.section, {}) if line.section else rest).pop(line.name, None)
    return {name: inner for name, inner in rest.items() if inner != {}}


def test_one_line_changes_and_nothing_else():
    assert set_line(OWN, "scene.feature", "0.5 mm") == OWN.replace("0.4 mm", "0.5 mm")
    assert set_line(OWN, "scene.field", "4 x 3 in") == OWN.replace('120 mm",  #', '4 in",  #').replace("90 mm", "3 in")
    assert set_line(OWN, "station.fold", "130 mm, 1") == OWN.replace('"120 mm"  #', '"130 mm"  #')
    assert drop_line(OWN, "title") == OWN.replace("title = 'Jar lids'   # line 3\n", "")


def test_the_same_value_leaves_the_text_as_it_is():
    assert set_line(OWN, "title", "Jar lids") == OWN


def test_a_new_line_stands_in_its_section():
    text = set_line(OWN, "station.headroom", "700 mm")
    assert comments(text) == comments(OWN)
    assert parse_brief(text, "").headroom == 700


def test_a_new_section():
    assert set_line("", "light.snr", "40") == "[light]\nsnr = 40\n"
    text = set_line(OWN, "light.snr", "40")
    assert text.startswith(OWN)
    assert text.endswith("[light]\nsnr = 40\n")


def test_a_text_without_a_last_line_end():
    text = set_line(set_line("[light]\nsnr = 40", "light.reflectance", "0.5"), "scene.feature", "1 mm")
    assert tomllib.loads(text) == {"light": {"snr": 40, "reflectance": 0.5}, "scene": {"feature": "1 mm"}}


def test_line_ends_stay_as_they_are():
    text = OWN.replace("\n", "\r\n")
    for key in ("scene.feature", "scene.above", "light.pulse", "title", "comfort"):
        edited = set_line(text, key, TYPED[key])
        assert edited.count("\n") == edited.count("\r\n")
        assert value(edited, key) == parse_value(key, TYPED[key])


@pytest.mark.parametrize("line", LINES, ids=lambda line: line.key)
def test_every_line_can_be_set_and_dropped(line):
    for text in ("", OWN, STARTER, 'scene.feature = "1 mm"  # dotted\nstation."headroom" = "1 m"\n'):
        edited = set_line(text, line.key, TYPED[line.key])
        assert value(edited, line.key) == parse_value(line.key, TYPED[line.key])
        assert without(tomllib.loads(edited), line.key) == without(tomllib.loads(text), line.key)
        assert set(comments(text)) <= set(comments(edited)) | {"the window", "water", "to its middle"}
        if not line.required:
            dropped = drop_line(edited, line.key)
            assert value(dropped, line.key) is None
            assert without(tomllib.loads(dropped), line.key) == without(tomllib.loads(text), line.key)


@pytest.mark.parametrize("line", [line for line in LINES if not line.required], ids=lambda line: line.key)
def test_the_starter_takes_every_optional_line(line):
    text = set_line(STARTER, line.key, TYPED[line.key])
    if line.key == "light.snr":
        text = set_line(text, "light.reflectance", "50 %")
    if line.key == "focus.plane":
        text = set_line(text, "scene.above", "4 mm")
    brief = parse_brief(text, "")
    assert line.key in brief.stated
    assert comments(text) == comments(STARTER)


@pytest.mark.parametrize("line", [line for line in LINES if line.required], ids=lambda line: line.key)
def test_a_required_line_stays(line):
    with pytest.raises(InputError, match=line.name):
        drop_line(STARTER, line.key)


def test_dropping_what_is_not_there():
    assert drop_line(OWN, "light.snr") == OWN
    assert drop_line(OWN, "comfort") == OWN


@pytest.mark.parametrize("text", ["[scene", "a = " + "[" * 5000, "a = 1\na = 2", "light = 3"])
def test_a_text_with_faults_is_not_edited(text):
    with pytest.raises(InputError):
        set_line(text, "light.snr", "40")


def test_a_value_that_the_line_does_not_take_changes_nothing():
    with pytest.raises(InputError, match="no unit"):
        set_line(OWN, "scene.feature", "0.4")


_SIZES = st.decimals("0.001", "999", places=3).map(str)
_NAMES = st.lists(
    st.text(st.characters(codec="utf-8"), min_size=1).map(str.strip).filter(bool), min_size=1, unique=True
)
_LAYERS = st.lists(
    st.tuples(st.sampled_from(["N-BK7", "fused silica", "water", "1.5", "1.333"]), _SIZES), min_size=1, max_size=4
).map(lambda layers: ", ".join(f"{name} {size} mm" for name, size in layers))
_TYPED = st.one_of(
    st.tuples(st.sampled_from(["scene.feature", "station.headroom", "scene.above"]), _SIZES.map("{} mm".format)),
    st.tuples(st.just("scene.field"), st.tuples(_SIZES, _SIZES).map(" x ".join).map("{} cm".format)),
    st.tuples(st.just("station.layers"), _LAYERS),
    st.tuples(st.just("station.fold"), st.tuples(_SIZES, st.integers(1, 9)).map("{0[0]} mm, {0[1]}".format)),
    st.tuples(
        st.sampled_from(["choose.cameras", "choose.mounts"]),
        _NAMES.map(lambda names: value_text(_list(names), "choose.cameras")),
    ),
    st.tuples(st.just("title"), st.text(st.characters(codec="utf-8", exclude_characters="\r\n"))),
    st.sampled_from(
        [("strict", "yes"), ("strict", "no"), ("choose.in_hand", "yes"), ("light.snr", "40"), ("comfort", "0.2")]
    ),
)


def _list(names):
    import json

    # DEL may stand in a JSON string and not in a TOML one.
    return f"[choose]\ncameras = {json.dumps(names, ensure_ascii=False)}".replace("\x7f", "\\u007f")


_WAYS = st.lists(
    st.sampled_from(
        [
            "# a comment\n",
            "\n",
            'title = "x"  # t\n',
            '[scene]  # s\nfeature = "1 mm"  # f\n# above = "1 mm"\n\n',
            '[station]\nworking_distance = ["1 m", "2 m"]\nheadroom = "3 m"  # h\n',
            '[[station.layers]]\nindex = 1.5  # first\nthickness = "1 mm"\n[[station.layers]]\nindex = 1.4\n',
            '[station.fold]\nfrom_lens = "1 mm"  # fl\n',
            '[choose]\nmounts = [\n  "C",  # one\n  "CS",  # two\n]\ncameras = ["a"]',
        ]
    ),
    unique=True,
).map("\n".join)


@given(_WAYS, st.lists(_TYPED, min_size=1, max_size=4))
def test_what_is_set_stands_there_and_all_else_stays(text, typed):
    try:
        data = tomllib.loads(text)
    except tomllib.TOMLDecodeError:
        return
    for key, words in typed:
        text = set_line(text, key, words)
        after = tomllib.loads(text)
        assert value(text, key) == parse_value(key, words)
        assert without(after, key) == without(data, key)
        data = after


@given(_WAYS, st.lists(st.sampled_from([line.key for line in LINES if not line.required]), min_size=1, max_size=4))
def test_what_is_dropped_is_gone_and_all_else_stays(text, keys):
    try:
        data = tomllib.loads(text)
    except tomllib.TOMLDecodeError:
        return
    for key in keys:
        text = drop_line(text, key)
        after = tomllib.loads(text)
        assert value(text, key) is None
        assert without(after, key) == without(data, key)
        data = after


def test_sections_are_those_of_the_table():
    assert {line.section for line in LINES} == set(SECTIONS)
