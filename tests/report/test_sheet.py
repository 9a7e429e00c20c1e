"""The set-up sheet: what a fitter must find on it, its figures against rays traced through the rig."""

import itertools
import math
import re
from dataclasses import replace

import numpy as np
import pytest
from markdown_it import MarkdownIt

from tests.solve.traced import BRIEF, CAMERA, LENS, RINGS, Bench, catalogue
from visionplan.brief.model import Fold, Layer
from visionplan.report.between import footprint
from visionplan.report.sheet import as_set, sheet
from visionplan.solve import judge_one
from visionplan.text import width

LINE = {**CAMERA, "id": "row", "kind": "line", "pixels high": 1, "line rate": 20000.0}


def rig(brief=BRIEF, camera=CAMERA, lens=LENS, spacers=RINGS, **options):
    return judge_one(brief, catalogue([lens], [camera], spacers), camera["id"], lens["id"], **options)


def flat(text):
    return " ".join(text.split())


def test_a_fitter_finds_everything_in_the_order_it_is_mounted():
    text = sheet(rig(stop=8.0))
    order = ["MOUNT", "Camera square", "Lens sixteen", "SET", "f-stop", "working distance", "focus ring", "exposure  "]
    order += [
        "light  ",
        "PROVE",
        "must span",
        "EXPECT",
        "field  ",
        "sampling  ",
        "depth  ",
        "ELEVATION",
        "CAUTIONS",
        "ASSUMED",
    ]
    places = [text.find(word) for word in order]
    assert -1 not in places
    assert places == sorted(places)
    assert all(width(line) <= 80 for line in text.split("\n"))


def test_the_ruler_check_on_the_sheet_proves_the_rig():
    built = as_set(rig(stop=8.0))
    text = flat(sheet(built))
    length, pixels, room = re.search(r"a (\d+) mm target along the width must span (\d+) ± (\d+) pixels", text).groups()
    distance = float(re.search(r"working distance (\d+) mm", text)[1])
    assert distance == built.working_distance
    bench = Bench(distance=distance, focus=built.case.z)
    assert bench.span(float(length)) == pytest.approx(int(pixels), abs=1)
    assert int(room) > 5
    wrong = Bench(distance=distance + 90, focus=built.case.z)
    assert abs(wrong.span(float(length)) - int(pixels)) > int(room)


def test_rings_stand_between_camera_and_lens():
    close = replace(BRIEF, field=(20.0, 15.0), feature=0.06, working_distance=(20.0, 200.0), above=0.5, below=0.5)
    built = rig(close)
    text = flat(sheet(built))
    places = [text.find(f"Spacer ring {ring}") for ring in built.spacers]
    assert places
    assert text.find("Camera square") < min(places) <= max(places) < text.find("Lens sixteen")


def test_the_picture_behind_mirrors():
    one = replace(BRIEF, fold=Fold(80.0, 1))
    two = replace(BRIEF, fold=Fold(80.0, 2))
    assert "mirrored by the fold mirror: set ReverseX" in flat(sheet(rig(one)))
    assert "true to side" in flat(sheet(rig(two)))
    assert "mirrored" not in sheet(rig())
    assert "folded path" in flat(sheet(rig(one)))


def test_the_least_mirror_holds_every_ray_and_no_more():
    built = rig(replace(BRIEF, fold=Fold(80.0, 1)), stop=2.8)
    case, m = built.case, built.magnification
    down, across = case.h / m, case.w / m
    length, wide, off = footprint(case, m, 80.0, down, across)
    # The entrance pupil lies 16 (1 − 1/1.25) mm before the principal plane, that 12 mm behind the lens front.
    pupil = np.array([0.0, 0.0, -(12 - 3.2)])
    field_at = built.working_distance - case.z
    ends = []
    for y, x in itertools.product((-down / 2, down / 2), (-across / 2, across / 2)):
        for turn in np.linspace(0, 2 * math.pi, 721):
            rim = pupil + 16 / 2.8 / 2 * np.array([math.cos(turn), math.sin(turn), 0])
            ray = np.array([x, y, field_at]) - rim
            t = (80 - rim[2] - rim[1]) / (ray[2] + ray[1])  # on the plane z = 80 − y
            hit = rim + t * ray
            ends.append((hit[1] * -math.sqrt(2), hit[0]))
    slope, side = np.array(ends).T
    assert slope.max() - slope.min() == pytest.approx(length, rel=1e-4)
    assert side.max() - side.min() == pytest.approx(wide, rel=1e-4)
    assert (slope.max() + slope.min()) / 2 == pytest.approx(off, rel=1e-3)


def test_layers_tell_their_shift_and_the_error_in_the_corner():
    built = as_set(rig(replace(BRIEF, layers=(Layer(10.0, 1.5168, "N-BK7"),))))
    text = flat(sheet(built))
    assert "10 mm of N-BK7 3.407 mm" in text  # R. Smith's plate, paraxial: 3.407173 mm
    corner = math.hypot(*built.field) / 2
    s = built.working_distance + 12 - 3.407173 - built.case.z
    angle = math.atan(corner / (s - 3.2))
    inside = math.asin(math.sin(angle) / 1.5168)
    # Along the surface: what the ray gains in the plate, beside what a shift by the paraxial amount gains.
    off = 10 * (math.tan(angle) - math.tan(inside)) - 3.407173 * math.tan(angle)
    told, pixels = map(float, re.search(r"drawn ([\d.]+) mm \(([\d.]+) pixels\) off", text).groups())
    assert told == pytest.approx(off, rel=2e-3)
    assert pixels == pytest.approx(off / built.sampling, rel=0.05)


def test_cautions_that_apply_name_their_standards():
    still = sheet(rig())
    moving = sheet(rig(replace(BRIEF, rate=2.0)))
    for standard in ("IEC 62471", "IEC 60825-1", "ISO 12100", "IEC 60204-1", "ISO 13849-1"):
        assert standard in flat(still)
    assert "ISO 14120" not in still
    assert "ISO 14120, 14119" in flat(moving)
    assert "Local codes and licensed practice decide" in flat(still)
    assert "150 g" in flat(still)


def test_a_line_scan_camera():
    moving = replace(BRIEF, field=(120.0, 40.0), speed=500.0, above=0.0, below=0.0)
    text = flat(sheet(rig(moving, LINE)))
    assert "its row along the field's width, square across the motion" in text
    rows = float(re.search(r"line rate (\d+) /s", text)[1])
    assert rows * as_set(rig(moving, LINE)).sampling == pytest.approx(500, rel=1e-3)
    assert "along the height must span" not in text


def test_a_camera_on_its_side_and_a_grid():
    tall = sheet(rig(replace(BRIEF, field=(90.0, 120.0)), orientation="portrait"))
    assert "turned by 90°" in flat(tall)
    four = rig(replace(BRIEF, field=(400.0, 90.0), max_count=4, overlap=10.0))
    assert four.grid[0] > 1
    pitch = (400 - 10) / four.grid[0]
    assert f"{four.grid[0]} × 1 cameras, across × along the field, {pitch:.4g} mm from axis to axis" in flat(
        sheet(four)
    )


def test_a_rig_that_does_not_fit_says_so_first():
    text = flat(sheet(rig(replace(BRIEF, field=(300.0, 90.0)))))
    assert "DOES NOT FIT: misses" in text
    never = flat(sheet(rig(replace(BRIEF, feature=0.0005))))
    assert "NOTHING TO SET UP" in never


def test_what_stands_already_is_not_rounded():
    assert "361.7 mm" in flat(sheet(rig(at=361.7)))


def test_inches():
    text = flat(sheet(rig(stop=8.0), "inch"))
    assert re.search(r"a [125] in target along the width must span", text)
    assert " mm," not in text


@pytest.mark.parametrize("name", ["a|b", "`x`", "<img src=x>", "[l](http://e.org)", "*b*", "\x1b[31m", "# h", "a\nb"])
def test_markdown_shows_names_as_typed(name):
    lens, camera = {**LENS, "id": name}, {**CAMERA, "id": f"c {name}"}
    ring = {**RINGS[2], "id": f"r {name}"}
    brief = replace(BRIEF, title=name, layers=(Layer(3.0, 1.5, name),), field=(7.0, 5.0), feature=0.05)
    brief = replace(brief, working_distance=(10.0, 200.0), above=0.0)
    text = sheet(rig(brief, camera, lens, [ring], rings=[ring["id"]]), as_markdown=True)
    tokens = list(MarkdownIt("gfm-like", {"linkify": False}).parse(text))
    inline = [child for token in tokens for child in token.children or []]
    assert {child.type for child in inline} <= {"text", "strong_open", "strong_close", "text_special", "softbreak"}
    assert {t.type for t in tokens} & {"html_block", "table_open", "code_block"} == set()
    shown = " ".join("".join(c.content for c in token.children) for token in tokens if token.children)
    visible = name.replace("\x1b", "␛").replace("\n", "␊")
    for item in (f"Camera c {visible} (C mount)", f"Spacer ring r {visible},", f"Lens {visible} (C mount)"):
        assert item in shown
    fences = [token for token in tokens if token.type == "fence"]
    assert len(fences) == 1
    assert text == sheet(rig(brief, camera, lens, [ring], rings=[ring["id"]]), as_markdown=True)
