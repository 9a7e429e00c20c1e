"""Good briefs, from every kind of source."""

import io
import subprocess
import sys

import pint
import pytest

from visionplan.brief.model import Brief, Fold
from visionplan.brief.read import parse_brief, read_brief

SHORTEST = """
[scene]
field = ["120 mm", "90 mm"]
feature = "0.4 mm"
[station]
working_distance = ["250 mm", "450 mm"]
"""

WHOLE = """
title = "Jar lids, line 3"
comfort = "25 %"
strict = true
units = "inch"
[scene]
field = ["12 cm", "90 mm"]
above = "4 mm"
below = "1 mm"
feature = "400 µm"
task = "gauge"
max_perspective = "2 %"
placement = "3 mm"
mosaic_factor = 1.5
[station]
working_distance = ["10 in", "0.45 m"]
headroom = "700 mm"
cable_room = "60 mm"
working_distance_tolerance = "3 mm"
tilt = "1 deg"
layers = [{ material = "N-BK7", thickness = "6 mm" }, { index = 1.333, thickness = "20 mm" }]
fold = { from_lens = "120 mm", mirrors = 2 }
[motion]
speed = "18 m/min"
along = "width"
blur = "0.05 mm"
rate = "240 / min"
[light]
illuminance = "20 klx"
reflectance = "50 %"
wavelength = "587.5618 nm"
snr = 40
max_exposure = "5 ms"
pulse = "50 us"
[focus]
plane = "-1 mm"
blur_pixels = 2
min_contrast = 0.2
[choose]
sensor = "mono"
mounts = ["C", "CS"]
interfaces = ["GigE Vision"]
cable = "30 m"
max_distortion = "1 %"
max_count = 2
overlap = "5 mm"
max_price = 3_000
max_mass = "0.6 kg"
max_diameter = "60 mm"
lens_kinds = ["telecentric"]
in_hand = true
cameras = ["a", "b"]
lenses = ["c"]
"""


def test_the_shortest_brief_leaves_the_defaults():
    brief = parse_brief(SHORTEST, "short.toml")
    expected = Brief(
        field=(120.0, 90.0),
        feature=0.4,
        working_distance=(250.0, 450.0),
        stated=frozenset({"scene.field", "scene.feature", "station.working_distance"}),
        source="short.toml",
    )
    assert brief == expected
    assert (brief.pixels_per_feature, brief.along, brief.comfort, brief.wavelength) == (4, "height", 0.2, 550e-6)


def test_every_line_is_read_in_core_units():
    brief = parse_brief(WHOLE, "whole.toml")
    measure = pint.UnitRegistry().Quantity
    assert brief.title == "Jar lids, line 3"
    assert (brief.comfort, brief.strict, brief.units) == (0.25, True, "inch")
    assert brief.field == (120.0, 90.0)
    assert (brief.above, brief.below, brief.feature) == (4.0, 1.0, 0.4)
    assert (brief.task, brief.pixels_per_feature) == ("gauge", 10.0)
    assert (brief.max_perspective, brief.placement, brief.mosaic_factor) == (0.02, 3.0, 1.5)
    assert brief.working_distance == pytest.approx((measure(10, "inch").m_as("mm"), 450.0))
    assert (brief.headroom, brief.cable_room, brief.working_distance_tolerance) == (700.0, 60.0, 3.0)
    assert brief.tilt == pytest.approx(measure(1, "degree").m_as("radian"))
    glass, water = brief.layers
    assert (glass.thickness, glass.material) == (6.0, "N-BK7")
    assert glass.index == pytest.approx(1.51680, abs=5e-6)  # nd of the glass's data sheet
    assert (water.thickness, water.material, water.index) == (20.0, "", 1.333)
    assert brief.fold == Fold(120.0, 2)
    assert brief.speed == pytest.approx(measure(18, "m/min").m_as("mm/s"))
    assert (brief.along, brief.motion_blur, brief.motion_blur_pixels) == ("width", 0.05, None)
    assert brief.rate == pytest.approx(4.0)
    assert (brief.illuminance, brief.irradiance, brief.reflectance) == (20e3, None, 0.5)
    assert brief.wavelength == pytest.approx(587.5618e-6)
    assert (brief.snr, brief.max_exposure, brief.pulse) == (40.0, 5e-3, 5e-5)
    assert (brief.focus_plane, brief.focus_blur, brief.focus_blur_pixels) == (-1.0, None, 2.0)
    assert (brief.min_contrast, brief.sensor) == (0.2, "mono")
    assert (brief.mounts, brief.interfaces) == (("C", "CS"), ("GigE Vision",))
    assert (brief.cable, brief.max_distortion) == (30e3, 0.01)
    assert (brief.max_count, brief.overlap, brief.max_price) == (2, 5.0, 3000.0)
    assert (brief.max_mass, brief.max_diameter) == (600.0, 60.0)
    assert (brief.lens_kinds, brief.in_hand) == (("telecentric",), True)
    assert (brief.cameras, brief.lenses) == (("a", "b"), ("c",))
    assert len(brief.stated) == WHOLE.count(" = ") - 6  # those within layers and fold are no lines


@pytest.mark.parametrize(
    ("task", "pixels"), [("presence", 3), ("edge", 4), ("gauge", 10), ("code", 4), ("characters", 3)]
)
def test_a_task_has_its_usual_number_of_pixels(task, pixels):
    text = SHORTEST.replace("[station]", f'task = "{task}"\n[station]')
    assert parse_brief(text, "").pixels_per_feature == pixels


@pytest.mark.parametrize(("plane", "height"), [("middle", None), ("reference", 0.0), ("0 mm", 0.0)])
def test_a_focus_plane_by_its_name(plane, height):
    assert parse_brief(f'{SHORTEST}[focus]\nplane = "{plane}"', "").focus_plane == height


@pytest.mark.parametrize(
    "way",
    [
        '[station.fold]\nfrom_lens = "120 mm"',
        'fold.from_lens = "120 mm"',
        "fold = { \"from_lens\" = '120 mm' }",
    ],
)
def test_tables_are_the_same_however_toml_writes_them(way):
    assert parse_brief(SHORTEST + way, "").fold == Fold(120.0, 1)


def test_layers_as_headings():
    layers = (
        '[[station.layers]]\nindex = 1.5\nthickness = "1 mm"\n[[station.layers]]\nindex = 1.4\nthickness = "2 mm"\n'
    )
    assert [layer.index for layer in parse_brief(SHORTEST + layers, "").layers] == [1.5, 1.4]


def test_a_title_is_kept_to_the_letter():
    assert parse_brief('title = "a\\u001b[31m|b"' + SHORTEST, "").title == "a\x1b[31m|b"


@pytest.mark.parametrize("start", [b"", b"\xef\xbb\xbf"])
@pytest.mark.parametrize("end", [b"\n", b"\r\n"])
def test_byte_order_mark_and_line_ends_make_no_difference(tmp_path, start, end):
    path = tmp_path / "brief.toml"
    path.write_bytes(start + WHOLE.encode().replace(b"\n", end))
    assert read_brief(path) == read_brief(str(path)) == parse_brief(WHOLE, str(path))


def test_standard_input(monkeypatch):
    monkeypatch.setattr(sys, "stdin", io.TextIOWrapper(io.BytesIO(WHOLE.encode())))
    assert read_brief("-") == parse_brief(WHOLE, "standard input")


def test_reading_everyday_units_loads_neither_pint_nor_tomlkit():
    program = (
        "import sys; from visionplan.brief.read import parse_brief; parse_brief(sys.stdin.read(), '');"
        "print(sorted({'pint', 'tomlkit', 'textual', 'rich'} & set(sys.modules)))"
    )
    done = subprocess.run([sys.executable, "-c", program], input=WHOLE, capture_output=True, text=True, check=True)
    assert done.stdout == "[]\n"


def test_a_brief_without_materials_does_without_numpy():
    program = (
        "import sys; from visionplan.brief.read import parse_brief; parse_brief(sys.stdin.read(), '');"
        "print('numpy' in sys.modules)"
    )
    done = subprocess.run([sys.executable, "-c", program], input=SHORTEST, capture_output=True, text=True, check=True)
    assert done.stdout == "False\n"
