"""Bad briefs: each is refused, where and why is said, and nothing else is."""

from contextlib import suppress

import pytest
from hypothesis import given
from hypothesis import strategies as st

from visionplan.brief.fields import BY_KEY, LINES
from visionplan.brief.read import parse_brief
from visionplan.faults import InputError

SHORTEST = {
    "scene.field": '["120 mm", "90 mm"]',
    "scene.feature": '"0.4 mm"',
    "station.working_distance": '["250 mm", "450 mm"]',
}


def text_of(**lines: str) -> str:
    """A brief that asks the least, with these lines (scene__above = …) added or changed."""
    rows: dict[str, list[str]] = {"": []}
    for key, value in (SHORTEST | {key.replace("__", "."): value for key, value in lines.items()}).items():
        section, _, name = key.rpartition(".")
        rows.setdefault(section, []).append(f"{name} = {value}")
    return "\n".join(
        "\n".join([f"[{section}]", *names] if section else names) for section, names in rows.items() if names
    )


def faults_of(text: str):
    with pytest.raises(InputError) as caught:
        parse_brief(text, "b.toml")
    return caught.value.faults


def only_fault(text: str):
    (fault,) = faults_of(text)
    assert fault.file == "b.toml"
    return fault


def line_of(text: str, start: str) -> int:
    return next(number for number, row in enumerate(text.split("\n"), 1) if row.startswith(start))


@pytest.mark.parametrize(
    ("key", "value", "found", "expected"),
    [
        ("scene.feature", "0.4", "0.4 has no unit", "a length"),
        ("scene.feature", '"0.4"', "no unit", '"0.4 mm"'),
        ("scene.feature", '"0 mm"', '"0 mm"', "a length from 1 nm"),
        ("scene.feature", '"-1 mm"', '"-1 mm"', "a length from 1 nm"),
        ("scene.feature", '"4 s"', "'s'", "a length"),
        ("scene.feature", '"4 furlongs per"', "furlongs", "a length"),
        ("scene.feature", '"0,4 mm"', "0,4 mm", "a length"),
        ("scene.feature", '"nan mm"', "nan mm", "a length"),
        ("scene.feature", '"inf mm"', "inf mm", "a length"),
        ("scene.feature", '"1e400 mm"', "1e400", "a length"),
        ("scene.feature", '"1e300 mm"', "1e300 mm", "to 1 km"),
        ("scene.feature", '"1e-300 mm"', "1e-300 mm", "from 1 nm"),
        ("scene.feature", '""', "nothing stands here", "a length"),
        ("scene.feature", "true", "true", "a length"),
        ("scene.feature", '["0.4 mm"]', "a list of 1", "a length"),
        ("scene.feature", '{ a = "0.4 mm" }', "a table", "a length"),
        ("scene.feature", "2024-01-01", "a date or time", "a length"),
        ("scene.field", '"120 mm"', '"120 mm"', "a list of two lengths"),
        ("scene.field", "[]", "an empty list", "a list of two lengths"),
        ("scene.field", '["1 mm", "2 mm", "3 mm"]', "a list of 3", "a list of two lengths"),
        ("scene.field", '["120 mm", 90]', "90 has no unit", "lengths"),
        ("station.working_distance", '["450 mm", "250 mm"]', "greater than", "the smaller first"),
        ("station.working_distance", '["0 mm", "250 mm"]', '"0 mm"', "from 1 nm"),
        ("title", "3", "3", "words"),
        ("comfort", "20", "20", "a fraction from 0 to 1000 %"),
        ("comfort", '"-1 %"', "-1 %", "a fraction"),
        ("comfort", "true", "true", "a fraction"),
        ("comfort", "nan", "nan", "a fraction"),
        ("strict", '"yes"', '"yes"', "true or false"),
        ("strict", "1", "1", "true or false"),
        ("units", '"metric"', '"metric"', '"inch"'),
        ("scene.pixels_per_feature", "0", "0", "a number from 0.01"),
        ("scene.pixels_per_feature", '"4"', '"4"', "a number"),
        ("scene.pixels_per_feature", "inf", "inf", "a number"),
        ("scene.pixels_per_feature", "1e400", "inf", "a number"),
        ("scene.pixels_per_feature", "false", "false", "a number"),
        ("scene.pixels_per_feature", "9" * 400, "out of all bounds", "a number"),
        ("scene.pixels_per_feature", "0x" + "f" * 9000, "out of all bounds", "a number"),
        ("scene.pixels_per_feature", "9" * 9000, "far too many digits", "pixels_per_feature = 4"),
        ("scene.task", '"gaging"', '"gaging"', '"gauge"'),
        ("scene.max_perspective", '"0 %"', "0 %", "from 0.001 %"),
        ("scene.max_perspective", "0", "0", "from 0.001 %"),
        ("scene.mosaic_factor", "0.9", "0.9", "from 1"),
        ("station.tilt", '"90 deg"', "90 deg", "less than 90 deg"),
        ("station.tilt", '"-1 deg"', "-1 deg", "an angle from 0"),
        ("station.layers", "[]", "an empty list", "a list of layers"),
        ("station.layers", '"glass"', '"glass"', "a list of layers"),
        ("station.layers", '["glass"]', 'layer 1: "glass"', "a list of layers"),
        ("station.layers", '[{ material = "BK7", thickness = "6 mm" }]', '"BK7" is not known', "N-BK7"),
        ("station.layers", '[{ index = 0.9, thickness = "6 mm" }]', "layer 1: index: 0.9", "from 1"),
        ("station.layers", "[{ index = 1.5 }]", "layer 1: thickness is missing", "thickness ="),
        ("station.layers", '[{ thickness = "6 mm" }]', "neither material nor index", "one of the two"),
        (
            "station.layers",
            '[{ index = 1.5, material = "water", thickness = "6 mm" }]',
            "both material and index",
            "one of the two",
        ),
        ("station.layers", '[{ index = 1.5, thicknes = "1 mm", thickness = "1 mm" }]', "thicknes", '"thickness"'),
        ("station.layers", "[{ index = 1.5, thickness = 6 }]", "layer 1: thickness: 6 has no unit", "a length"),
        ("station.fold", "{ mirrors = 1 }", "from_lens is missing", "from_lens ="),
        ("station.fold", '{ from_lens = "120 mm", mirrors = 0 }', "mirrors: 0", "from 1"),
        ("station.fold", '{ from_lens = "120 mm", mirrors = 1.5 }', "mirrors: 1.5", "a whole number"),
        ("station.fold", '"120 mm"', '"120 mm"', "a table"),
        ("motion.speed", '"300 mm"', "'mm'", "a speed"),
        ("motion.along", '"length"', '"length"', '"height"'),
        ("motion.blur", '"0 mm"', "0 mm", "from 1 nm"),
        ("motion.rate", "4", "4 has no unit", '"4 / s"'),
        ("motion.rate", '"0 / s"', "0 / s", "a rate"),
        ("light.illuminance", '"20 W/m^2"', "W/m^2", "an illuminance"),
        ("light.irradiance", '"20 klx"', "klx", "an irradiance"),
        ("light.reflectance", "1.5", "1.5", "to 100 %"),
        ("light.reflectance", "0", "0", "from 0.001 %"),
        ("light.wavelength", '"149 nm"', "149 nm", "from 150 nm"),
        ("light.wavelength", '"20.1 um"', "20.1 um", "to 20 µm"),
        ("light.pulse", '"0 us"', "0 us", "a time"),
        ("focus.plane", '"centre"', "centre", '"middle"'),
        ("focus.plane", "0", "0 has no unit", '"reference"'),
        ("focus.blur", '"0 mm"', "0 mm", "from 1 nm"),
        ("focus.min_contrast", '"101 %"', "101 %", "to 100 %"),
        ("choose.sensor", '"color"', '"color"', '"colour"'),
        ("choose.mounts", '"C"', '"C"', "a list"),
        ("choose.mounts", "[]", "an empty list", "a list"),
        ("choose.mounts", '["C", "C"]', '"C" stands twice', "once"),
        ("choose.mounts", '["C", " C "]', "stands twice", "once"),
        ("choose.mounts", '[""]', '"" in the list', "names"),
        ("choose.mounts", "[1]", "1 in the list", "names"),
        ("choose.lens_kinds", '["telecentic"]', '"telecentic" in the list', '"telecentric"'),
        ("choose.max_count", "0", "0", "from 1 to 64"),
        ("choose.max_count", "65", "65", "from 1 to 64"),
        ("choose.max_count", "1.5", "1.5", "a whole number"),
        ("choose.max_count", "true", "true", "a whole number"),
        ("choose.max_price", "-1", "-1", "from 0"),
        ("choose.max_mass", '"600 mm"', "'mm'", "a mass"),
        ("choose.cable", "30", "30 has no unit", '"30 m"'),
    ],
)
def test_a_value_that_its_line_does_not_take(key, value, found, expected):
    text = text_of(**{key.replace(".", "__"): value})
    fault = only_fault(text)
    assert fault.column == key
    assert fault.line == line_of(text, key.rpartition(".")[2])
    assert found in fault.found
    assert expected in fault.expected


@pytest.mark.parametrize(
    ("key", "value"),
    [
        ("station.tilt", '"89.999 deg"'),
        ("light.wavelength", '"150 nm"'),
        ("light.wavelength", '"20 um"'),
        ("choose.max_count", "64"),
        ("motion.speed", '"0 mm/s"'),
        ("motion.rate", '"1 / h"'),
        ("scene.feature", '"1 nm"'),
        ("scene.max_perspective", '"0.001 %"'),
        ("station.layers", '[{ index = 1, thickness = "6 mm" }]'),
    ],
)
def test_the_ends_of_the_limits_are_within_them(key, value):
    assert key in parse_brief(text_of(**{key.replace(".", "__"): value}), "").stated


@pytest.mark.parametrize("line", [line for line in LINES if line.required], ids=lambda line: line.key)
def test_a_required_line_is_missing(line):
    text = "\n".join(row for row in text_of().split("\n") if not row.startswith(f"{line.name} ="))
    fault = only_fault(text)
    assert (fault.column, fault.found) == (line.key, f"{line.name} is missing")
    assert fault.line == line_of(text, f"[{line.section}]")
    parse_brief(text.replace(f"[{line.section}]", f"[{line.section}]\n{line.name} = {line.example}"), "")


def test_all_faults_at_once_in_the_order_of_the_file():
    text = """titel = "x"
speed = "3 mm/s"
[scene]
field = ["120 mm", 90]
feature = 0.4 mm
task = "edg"
pixel_per_feature = 4
below = "-1 mm"
[station]
working_distance = ["250 mm", "150 mm"
tilt = "90 deg"
hello world
[mtion]
speeed = "3 mm/s"
rate = 4
"""
    faults = [(fault.line, fault.column) for fault in faults_of(text)]
    assert faults == [
        (1, "titel"),
        (2, "speed"),
        (4, "scene.field"),
        (5, "scene.feature"),
        (6, "scene.task"),
        (7, "scene.pixel_per_feature"),
        (8, "scene.below"),
        (10, "station.working_distance"),
        (11, "station.tilt"),
        (12, "station.hello"),
        (13, "mtion"),
        (14, "mtion.speeed"),
        (15, "motion.rate"),
    ]


def test_both_elements_and_all_layers_are_judged():
    layers = '[{ index = 0, thickness = 1 }, { material = "glas", thickness = "2" }]'
    starts = ["1 has", "2 has", "layer 1: index", "layer 1: thick", "layer 2: mat", "layer 2: thick"]
    faults = faults_of(text_of(scene__field="[1, 2]", station__layers=layers))
    assert [fault.found[: len(start)] for fault, start in zip(faults, starts, strict=True)] == starts


@pytest.mark.parametrize(
    ("column", "hint"),
    [
        ("scene.featur", 'did you mean "feature"?'),
        ("scene.speed", "it in [motion]"),
        ("scene.blur", "it in [motion] or it in [focus]"),
        ("scene.title", "it before the first section"),
        ("scene.xyz", "one of field, feature"),
        ("Title", 'did you mean "title"?'),
    ],
)
def test_unknown_lines_with_what_was_meant(column, hint):
    text = text_of(**{column.replace(".", "__"): "3"})
    fault = only_fault(text)
    assert fault.column == column
    assert fault.line == line_of(text, column.rpartition(".")[2] + " =")
    assert hint in fault.expected


@pytest.mark.parametrize(
    ("text", "line", "column", "hint"),
    [
        (text_of() + "\n[lihgt]\nsnr = 4", 6, "lihgt", 'did you mean "light"?'),
        (text_of() + "\n[xyz]\n", 6, "xyz", "one of [scene]"),
        ("light = 3\n" + text_of(), 1, "light", "a section [light]"),
        (text_of() + "\n[[light]]\n", 6, "light", "a section [light]"),
        (text_of() + "\n[scene.above]\na = 1", 6, "scene.above", "a length"),
        ('"" = 3\n' + text_of(), 1, "", "one of title"),
        ('"scene.above" = 3\n' + text_of(), 1, "scene.above", "one of title"),
        (text_of().replace("[station]", '"a.b" = 3\n[station]'), 4, "scene.a.b", "one of field"),
    ],
)
def test_unknown_and_misused_sections(text, line, column, hint):
    faults = faults_of(text)
    assert (faults[0].line, faults[0].column) == (line, column)
    assert hint in faults[0].expected


@pytest.mark.parametrize(
    ("text", "line"),
    [
        ("[scene\n", 1),
        ("[scene]\nfeature = 0.4 mm\n", 2),
        ('[scene]\nfeature = "0.4 mm\n', 2),
        ('[scene]\nfeature "0.4 mm"\n', 2),
        ('[scene]\nfeature: "0.4 mm"\n', 2),
        ('[scene]\nfeature = "0.4 mm" # ok\n] \n', 3),
        ('[scene]\nfield = [\n  "120 mm",\n  90 mm\n]\n', 4),
        ('[scene]\nfeature = "\\q"\n', 2),
        ('[scene]\nfeature = "a\x00b"\n', 2),
        ("title = 'a'\ntitle = 'b'\n", 2),
        ("[scene]\n[station]\n[scene]\n", 3),
        ("title = '''\na", None),
        ("= 3\n", 1),
        ("title = 'a'\rcomfort = 3", 1),
        ("title = " + "[" * 5000, 1),
        ("title = " + "{a=" * 5000, 1),
        ("\n" + "a." * 30000 + "a = 1", 2),
        ("[" + "a." * 5000 + "a]", None),
    ],
)
def test_invalid_toml_names_its_line(text, line):
    assert line in [fault.line for fault in faults_of(text)] or line is None


@pytest.mark.parametrize("text", ["", " \n\t\n"])
def test_an_empty_file(text):
    fault = only_fault(text)
    assert "empty" in fault.found
    assert "scene.feature" in fault.expected


def test_a_file_of_comments_lacks_what_is_required():
    assert [fault.column for fault in faults_of("# nothing yet\n")] == list(SHORTEST)


def test_control_characters_from_the_file_are_in_no_message():
    escape = r"\u001b]0;x\u0007\u202e\n"
    text = text_of(scene__above=f'"{escape}"', choose__sensor=f'"{escape}"', choose__mounts=f'["{escape}", "{escape}"]')
    text += f'\n["{escape}"]\n"{escape}" = 3\n[scene."{escape}"]\n'
    for fault in faults_of(text):
        assert str(fault).isprintable()


@given(st.text(max_size=200))
def test_any_text_is_read_or_refused(text):
    with suppress(InputError):
        parse_brief(text, "b.toml")


_RAW = st.recursive(
    st.one_of(
        st.booleans().map(lambda value: str(value).lower()),
        st.integers().map(str),
        st.sampled_from(
            ["nan", "inf", "-inf", "1e400", "1e-400", "0.0", "-0.0", "2024-01-01", "07:00:00", "''", '"1 mm"']
        ),
        st.floats(allow_nan=False, allow_infinity=False).map(repr),
        st.from_regex(r'"[-+0-9.e]{0,6} ?(mm|s|klx|%|deg|in|px)?"', fullmatch=True),
    ),
    lambda inner: st.one_of(
        st.lists(inner, max_size=3).map(lambda items: f"[{', '.join(items)}]"),
        st.dictionaries(st.sampled_from(["index", "material", "thickness", "from_lens", "mirrors", "x"]), inner).map(
            lambda items: "{" + ", ".join(f"{name} = {value}" for name, value in items.items()) + "}"
        ),
    ),
    max_leaves=6,
)


@given(st.dictionaries(st.sampled_from(sorted(BY_KEY)), _RAW, max_size=4))
def test_any_values_are_read_or_refused_on_their_lines(values):
    text = text_of(**{key.replace(".", "__"): value for key, value in values.items()})
    try:
        brief = parse_brief(text, "b.toml")
    except InputError as error:
        for fault in error.faults:
            row = text.split("\n")[(fault.line or 0) - 1]
            assert fault.column in BY_KEY
            assert row.startswith(fault.column.rpartition(".")[2])
    else:
        assert brief.stated == set(SHORTEST) | set(values)
