"""The page about one rig, against values worked by hand and published ones."""

import math
import re
from dataclasses import replace

import pytest

from tests.reference.random_parts import table
from tests.reference.random_works import works
from visionplan.brief.model import Brief, Layer
from visionplan.catalogue.items import Catalogue
from visionplan.report.explain import explain
from visionplan.solve import judge_one, rank
from visionplan.solve.demands import DEMANDS

LENS = {
    "id": "wide",
    "mount": "C",
    "kind": "entocentric",
    "focal length": 25.0,
    "f-number min": 8.0,
    "f-number max": 8.0,
    "nearest object": 100.0,
    "front principal": 0.0,
    "pupil ratio": 1.0,
    "image circle": 40.0,
    "detail limit": 200.0,
    "length": 30.0,
}
CAMERA = {
    "id": "square",
    "mount": "C",
    "pixels wide": 2000,
    "pixels high": 1500,
    "pixel pitch": 0.00345,
    "colour": "mono",
    "length": 40.0,
}
BRIEF = Brief(field=(60.0, 40.0), feature=0.4, working_distance=(250.0, 350.0), above=2.0, below=1.0)


def catalogue(lens=LENS, camera=CAMERA):
    return Catalogue(table("lenses", [lens]), table("cameras", [camera]), table("spacers", []), "sha256:by hand")


def page(brief=BRIEF, lens=LENS, camera=CAMERA, system="mm", **options):
    rig = judge_one(brief, catalogue(lens, camera), camera["id"], lens["id"], **options)
    return explain(rig, system)


def flat(text):
    return " ".join(text.split())


def part(text, title):
    """The lines of one section."""
    lines = text.split("\n")
    begin = next(n for n, line in enumerate(lines) if line == title and set(lines[n + 1]) == {"-"}) + 2
    return flat("\n".join(lines[begin:]).split("\n---")[0])


def row(text, label, section):
    """What stands beside a label of a section."""
    body = text[text.index(f"\n{section}\n-") :]
    told = re.search(rf"^  {re.escape(label)} .*(?:\n {{20}}.*)*", body, re.M)
    return flat(told[0])[len(label) :].strip()


def demand(text, name):
    """The lines of one demand."""
    return flat(re.search(rf"^{name}[,:].*(?:\n  .*)*", text, re.M)[0])


def test_distances_worked_by_hand():
    # s = 300 mm: m = f/(s - f) = 25/275; unit pupil ratio: the entrance pupil lies in the principal plane
    text = page(at=300.0 + 0.5)  # the focus lies (2 - 1)/2 mm over the reference plane
    point = "At the working point"
    assert row(text, "m", point).startswith("0.090909,")
    assert "= 300 mm" in row(text, "s", point)
    assert "= 300 mm" in row(text, "u", point)
    assert "= 300.5 mm" in row(text, "WD", point)
    assert "2.273 mm" in row(text, "f m", point)  # 25 · 0.0909
    assert "= 8.727" in row(text, "N_w", point)  # 8 · 1.0909
    assert "0.03795 mm a pixel" in row(text, "P/m", point)  # 0.00345 · 11
    assert "75.9 × 56.9" in row(text, "field", point)  # 2000 · 0.03795, 1500 · 0.03795


def test_classic_limits_and_hyperfocal_distance():
    # f 25, N 8, c 0.00345, s 300: sharp from 296.4005 to 303.6880 (exact thin lens); f²/(N c) + f = 22670
    text = page(at=300.5)
    told = row(text, "classic limits", "Figures")
    assert "3.599 mm towards the lens" in told or "3.6 mm towards the lens" in told
    assert "3.688 mm away" in told
    assert "22670 mm" in row(text, "hyperfocal", "Figures")


def test_lateral_error_of_a_plate_at_30_degrees():
    # 10 mm of n 1.5168 (Smith, section 7.8): shift 3.407173 mm on the axis, 3.952422 mm at 30°, so beside the paraxial
    # place by 0.545249 tan 30° = 0.3148 mm. Half the diagonal 15.7459 mm is 30° seen from the pupil: u m = 27.2727 mm.
    pitch = 2 * 15.7459 / 5
    camera = CAMERA | {"pixels wide": 4, "pixels high": 3, "pixel pitch": pitch}
    brief = replace(BRIEF, layers=(Layer(10.0, 1.5168),), above=0.0, below=0.0)
    told = row(page(brief, camera=camera, at=300.0 + 3.407173), "lateral error", "Figures")
    assert told.startswith("0.3148 mm")
    assert "30 deg" in told
    assert "3.407 mm" in row(page(brief, camera=camera), "D", "Figures")


def test_photons_and_noise():
    # EMVA 1288, worked: 3.45 µm, 1 ms, 525 nm, 10 µW/cm² on the sensor: 3145.725 photons; quantum efficiency 0.6, dark
    # noise 2.5 e, a step of 2.5 e: SNR 43.3669. 10 µW/cm² there is 0.1 · 4 N_w² W/m² on a white part.
    camera = CAMERA | {
        "quantum efficiency": 0.6,
        "dark noise": 2.5,
        "saturation capacity": 255 / 0.4,
        "bit depth": 8,
    }
    lit = 0.1 * 4 * (8 * (1 + 1 / 11)) ** 2
    brief = replace(BRIEF, irradiance=lit, reflectance=1.0, wavelength=525e-6, max_exposure=1e-3, above=0.0, below=0.0)
    text = page(
        brief, LENS | {"transmittance": 1.0}, camera | {"saturation capacity": 10200.0, "bit depth": 12}, at=300
    )
    assert "= 1887.4 e- in a pixel" in row(text, "n", "Figures")  # 0.6 · 3145.725
    # 10200/4095 = 2.4908 e a step: √(2.5² + 2.4908²/12 + 1887.4)
    assert row(text, "SNR", "Figures").endswith(f"= {1887.435 / math.sqrt(6.25 + 2.4908**2 / 12 + 1887.435):.4g}")
    assert row(text, "exposure", "Figures").startswith("1 ms, the least of the longest exposure asked = 1 ms, a full")


def test_every_demand_asked_stands_there_with_law_numbers_interval_and_source():
    brief = replace(BRIEF, headroom=700.0, max_perspective=0.1, illuminance=2e4, reflectance=0.5, snr=20.0)
    text = page(brief, camera=CAMERA | {"quantum efficiency": 0.6, "saturation capacity": 10000.0})
    for entry in DEMANDS:
        if entry.name == "line rate":
            assert "line rate" in part(text, "Not asked")
            continue
        told = demand(text, entry.name)
        assert flat(entry.law) in told
        assert flat(entry.bound_law) in told
        assert flat(entry.source) in told
    # rayleigh, by hand: 1.22 · 550 nm · 8/(0.4 - 1.22 · 550 nm · 8) = 0.013603; travel: ring to 25²/(100 - 25) mm
    assert "m ≥ 0.013603" in demand(text, "rayleigh")
    assert "x = 8.333 mm" in demand(text, "travel")
    assert "m ≤ 0.33333" in demand(text, "travel")
    assert "asked 0 to 8.333 mm" in demand(text, "travel")


def test_what_the_catalogue_leaves_out_is_told_where_it_counts():
    text = page(lens={key: value for key, value in LENS.items() if key != "detail limit"})
    assert demand(text, "lens detail").startswith("lens detail: unknown, resolution of the lens")
    assert "unknown: lens detail" in flat(text)


def test_a_telecentric_lens():
    straight = {
        "id": "straight",
        "mount": "C",
        "kind": "telecentric",
        "magnification": 0.1,
        "working distance": 300.0,
        "f-number min": 8.0,
        "image circle": 20.0,
        "detail limit": 200.0,
    }
    text = page(lens=straight)
    assert "m = M = 0.1" in row(text, "working point", "Span")
    assert "telecentricity" not in text  # no perspective is asked
    assert "f = ∞" in demand(text, "cover")
    assert "N = 8" in row(text, "N_w", "At the working point")
    assert "classic limits" not in text


def test_a_part_within_the_focal_length_of_every_magnification():
    # blur can't be met however small the picture: nothing at the working point, and no traceback
    text = page(replace(BRIEF, working_distance=(5.0, 20.0)))
    assert "missed, no magnification meets it" in demand(text, "reach")
    assert "none: no magnification meets reach" in row(text, "span", "Span")


def test_inches_show_the_same_lengths():
    millimetres, inches = page(at=300.5), page(at=300.5, system="inch")
    assert "= 11.81 in" in row(inches, "s", "At the working point")  # 300/25.4
    assert " mm" not in inches.replace("17.526 mm", "").replace("lp/mm", "").replace("50 mm", "")
    assert row(inches, "m", "At the working point") == row(millimetres, "m", "At the working point")


def test_text_from_files_cannot_steer_the_terminal():
    text = page(replace(BRIEF, title="\x1b[31mred\nnext", source="a\rb"), camera=CAMERA | {"id": "cam\x1b]0;"})
    assert all(character.isprintable() or character == "\n" for character in text)


def number(text):
    return float(re.match(r"[0-9.e+-]+", text)[0])


@pytest.mark.parametrize("seed", range(24))
def test_any_rig_can_be_explained(seed):
    brief, known = works(seed)
    for rig in rank(brief, known, top=6).rigs:
        for system in ("mm", "inch"):
            text = explain(rig, system)
            assert max(map(len, text.split("\n"))) <= 80
            assert "nan" not in text.lower().replace("nano", "")
        if rig.fits:
            # the room at the working point, worked out from the ends that the page tells
            told = row(text, "latitude", "Span")
            ratios = re.search(r"= min\((.*?)\)² − 1 = (\S+) %", told)
            least = min(number(a) / number(b) for a, b in (ratio.split("/") for ratio in ratios[1].split(", ")))
            # told to five figures, and cut to whole percents
            assert 100 * (least**2 - 1) == pytest.approx(number(ratios[2]), abs=1.1, rel=1e-3)
