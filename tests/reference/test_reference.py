"""The reference against values worked by hand and values from outside."""

import math
from dataclasses import replace

import pytest

from tests.reference import laws, light, parts
from tests.reference.choose import Doubt, least, stacks
from tests.reference.concessions import concessions, tolls
from tests.reference.contrast import optical_transfer, pixel_transfer
from tests.reference.interval import all_of, truth
from tests.reference.random_parts import table
from tests.reference.random_works import works
from tests.reference.ranking import judge_all, read
from visionplan.brief.model import Brief, Layer
from visionplan.catalogue.items import Catalogue

LENS = {
    "id": "fifty",
    "mount": "C",
    "focal length": 50.0,
    "f-number min": 4.0,
    "f-number max": 4.0,
    "nearest object": 200.0,
    "front principal": 20.0,
    "pupil ratio": 1.0,
    "image circle": 20.0,
    "detail limit": 200.0,
    "length": 60.0,
}
TELECENTRIC = {
    "id": "straight",
    "mount": "C",
    "kind": "telecentric",
    "magnification": 0.1,
    "working distance": 300.0,
    "f-number min": 8.0,
    "image circle": 20.0,
    "detail limit": 200.0,
    "length": 100.0,
}
CAMERA = {
    "id": "square",
    "mount": "C",
    "pixels wide": 1200,
    "pixels high": 1000,
    "pixel pitch": 0.005,
    "length": 40.0,
}
BRIEF = Brief(field=(50.0, 40.0), feature=0.25, working_distance=(300.0, 700.0))  # q = 0.0625 mm


def catalogue(lenses, cameras, rings=()):
    tables = [table(*rows) for rows in (("lenses", lenses), ("cameras", cameras), ("spacers", rings))]
    return Catalogue(*tables, "sha256:by hand")


def rig(brief=BRIEF, lens=LENS, camera=CAMERA, rings=()):
    (one,) = judge_all(brief, catalogue([lens], [camera], rings))["rigs"]
    return one


def demand(one, name):
    return next(row for row in one["demands"] if row["name"] == name)


def test_scan_and_bisection_find_an_interval_to_the_last_digit():
    lo, hi = all_of([(lambda m: m >= 0.123, ()), (lambda m: m <= 4.56, ())])
    assert lo == pytest.approx(0.123, rel=4e-16)
    assert hi == pytest.approx(4.56, rel=4e-16)
    assert truth(lambda m: m + 1 / m <= 2 + 1e-9, ()) is not None  # however narrow
    assert truth(lambda m: False, ()) is None
    with pytest.raises(AssertionError):
        truth(lambda m: m < 0.1 or m > 1, ())


def test_conjugates():
    # University Physics vol. 3 (OpenStax), section 2.4: f 50 mm, object 3.00 m, m 0.01695
    optics = laws.Optics(50.0, 4.0, 1.0, False)
    m = 50 / 2950
    assert m == pytest.approx(0.01695, rel=1e-3)
    assert laws.object_distance(optics, m) == pytest.approx(3000)
    assert laws.pupil_distance(optics, m) == pytest.approx(3000)  # pupil ratio 1: pupils in the principal planes
    assert laws.working_f_number(optics, 1.0) == 8.0


def test_blur_follows_similar_triangles():
    optics = laws.Optics(50.0, 5.0, 1.0, False)
    m = 0.1  # pupil of 10 mm, 550 mm away
    assert laws.blur_on_part(optics, m, 11.0) == pytest.approx(10 * 11 / 550)
    for nearer in (11.0, -11.0):
        on_part = laws.blur_on_sensor(optics, m, nearer) / laws.scale_at(optics, m, nearer)
        assert on_part == pytest.approx(0.2)


def test_signal_to_noise():
    # worked after EMVA 1288: pixel 3.45 µm, 1 ms, 525 nm, 10 µW/cm² on the sensor: 3145.725 photons;
    # quantum efficiency 0.6, dark noise 2.5 e, 1/K = 1/0.4 DN: SNR 43.3669
    lit = light.Lit(0.00345, 525e-6, 1.0, 0.1 * 4 * 16, math.inf, 0.0, math.inf, 0.0)
    photons = light.electrons_per_second(lit, laws.Optics(math.inf, 4.0, math.inf, True), 1.0) * 1e-3
    assert photons == pytest.approx(3145.725, rel=1e-6)
    row = {"dark noise": 2.5, "saturation capacity": 255 / 0.4, "bit depth": 8}
    assert light.signal_to_noise(0.6 * photons, light.noise_variance(row)) == pytest.approx(43.3669, rel=1e-6)


def test_corner_share_is_cos4():
    optics = laws.Optics(50.0, 4.0, 1.0, False)
    diagonal = 2 * 50 * 1.5 * math.tan(math.radians(20))  # at m 0.5 the exit pupil is 75 mm away
    assert light.corner_share(optics, 0.5, diagonal) == pytest.approx(0.77973, rel=1e-5)


@pytest.mark.parametrize(("frequency", "value"), [(25, 0.9177), (50, 0.8207), (100, 0.6246), (200, 0.3396)])
def test_defocused_transfer(frequency, value):
    # f/4 at 550 nm, W020 a quarter wave: prysm 0.21 and an independent integral
    assert optical_transfer(frequency * 550e-6 * 4, 0.25) == pytest.approx(value, abs=1e-4)


@pytest.mark.parametrize(("s", "value"), [(0.1, 0.872889), (0.5, 0.391002), (0.8, 0.104088), (1.0, 0.0)])
def test_transfer_in_focus(s, value):
    # Goodman, Introduction to Fourier Optics: (2/π)(acos s − s √(1 − s²))
    assert optical_transfer(s, 0.0) == pytest.approx(value, abs=1e-6)


def test_pixel_transfer_at_nyquist():
    assert pixel_transfer(100.0, 0.005) == pytest.approx(2 / math.pi)


def test_stops():
    def stops(**cells):
        return parts.lens(next(parts.rows(table("lenses", [LENS | cells])))).stops

    assert stops(**{"f-number min": 1.8, "f-number max": 6.0}) == (1.8, 2, 2.8, 4, 5.6, 6.0)
    assert stops(**{"f-number max": None}) == (4.0,)
    assert stops(stops=(4.0, 6.3)) == (4.0, 6.3)


def test_what_a_lens_leaves_out():
    def lens(**cells):
        return parts.lens(next(parts.rows(table("lenses", [LENS | {"front principal": None} | cells]))))

    assert lens().front_principal == 30.0
    assert lens(length=None).front_principal == 0.0
    known = lens(**{"nearest magnification": 0.25})
    assert known.front_principal == 50.0  # 250 mm from the principal plane, 200 mm from the front
    assert known.ring_travel == 12.5
    assert lens().ring_travel == pytest.approx(2500 / 180)  # f² over what the object is farther away than f
    assert lens(length=None, **{"nearest object": 45.0}).ring_travel is None


def test_flange_distances():
    def difference(camera, lens):
        (row,) = parts.rows(table("cameras", [CAMERA | camera]))
        (other,) = parts.rows(table("lenses", [LENS | lens]))
        return parts.flange_difference(parts.camera(row), parts.lens(other))

    assert difference({"mount": "C"}, {"mount": "CS"}) == pytest.approx(5.0)
    assert difference({"mount": "CS"}, {"mount": "C"}) == pytest.approx(-5.0)
    assert difference({"mount": "M42"}, {"mount": "M42"}) == 0.0
    assert difference({"mount": "M42", "flange distance": 45.46}, {"mount": "M42"}) is None


def test_stacks_keep_the_fewest_then_the_cheapest_rings():
    ring = parts.Ring
    five, cheap, ten = ring("a", "C", 5.0, 20.0, 1), ring("b", "C", 5.0, 10.0, 1), ring("c", "C", 10.0, 30.0, None)
    other = ring("f", "F", 7.0, 1.0, None)
    found = {
        sum(r.length for r in stack): [r.id for r in stack] for stack in stacks([five, cheap, ten, other], "CS", 1)
    }
    assert found == {0: [], 5: ["b"], 10: ["c"], 15: ["b", "c"], 20: ["c", "c"], 25: ["b", "c", "c"], 30: ["c"] * 3}
    shared = stacks([five, cheap], "C", 2)  # one ring is not enough for two cameras
    assert shared == [()]


def test_ties():
    doubt = Doubt()
    assert least([1.0, 1 + 1e-10, 1 + 1e-8], lambda value: value, doubt) == [1.0, 1 + 1e-10]
    assert doubt.closest == pytest.approx(1e-10, rel=1e-3)
    assert least([None, 2.0], lambda value: value, Doubt()) == [2.0]


def test_flat_part_without_heights():
    """Cover ends at 6 mm on 50 mm, sampling begins at 5 µm on 62.5 µm; reach and travel lie outside."""
    one = rig()
    assert one["fits"]
    assert one["span"] == pytest.approx((0.08, 0.12))
    assert one["pinch"] == ("sampling", "cover")
    assert one["magnification"] == pytest.approx(math.sqrt(0.08 * 0.12))
    assert one["latitude"] == pytest.approx(0.5)
    assert one["grade"] == "comfortable"
    assert one["held"] is None
    m = math.sqrt(0.0096)
    assert one["working_distance_mm"] == pytest.approx(50 + 50 / m - 20)
    assert one["length_mm"] == pytest.approx(50 + 50 / m - 20 + 60 + 50 * m + 40)
    assert demand(one, "reach")["lo"] == pytest.approx(50 / 670)
    assert demand(one, "travel")["hi"] == pytest.approx(50 / 170)
    assert demand(one, "near depth")["verdict"] == "not asked"


def test_place_holds_the_working_point():
    one = rig(replace(BRIEF, working_distance=(300.0, 480.0)))  # s to 500 mm: m from 1/9
    assert one["span"] == pytest.approx((1 / 9, 0.12))
    assert one["magnification"] == pytest.approx(1 / 9)
    assert one["held"] == "reach"
    assert one["pinch"] == ("sampling", "cover")
    assert one["latitude"] == pytest.approx((0.12 * 9) ** 2 - 1)
    assert one["grade"] == "fair"


def test_a_field_that_fits_exactly():
    one = rig(replace(BRIEF, field=(90.0, 1.0), feature=0.3, working_distance=(1.0, 2000.0)))
    assert one["fits"]
    assert one["magnification"] == pytest.approx(1 / 15)
    assert one["latitude"] == 0.0
    assert one["grade"] == "tight"


def test_heights_and_slack():
    brief = replace(BRIEF, above=6.0, below=2.0, working_distance_tolerance=1.0, layers=(Layer(15.0, 1.5),))
    one = rig(brief)
    m = one["magnification"]
    u = 50 / m + 50
    assert demand(one, "cover")["got"] == pytest.approx(6 / m * (1 - 4 / u) / 50)
    assert demand(one, "sampling")["got"] == pytest.approx(0.005 / m * (1 + 4 / u))
    assert demand(one, "near depth")["asked"] == 5.0
    assert one["depth_mm"] == pytest.approx([4 * 0.0625 * u / 50] * 2)
    assert one["working_distance_mm"] == pytest.approx(50 + 50 / m - 20 + 5 + 2)
    hi = demand(one, "far depth")["hi"]  # there a pupil of 12.5 mm sees 5 mm out of focus as 0.0625 mm
    assert 12.5 * 5 / (50 / hi + 50) == pytest.approx(0.0625)


def test_a_field_too_large():
    """Cover needs m ≤ 0.06, sampling m ≥ 0.08: conceding 4/3 in either is enough; nothing else is."""
    brief = replace(BRIEF, field=(100.0, 40.0), working_distance=(300.0, 1500.0), stated=frozenset({"scene.field"}))
    one = rig(brief)
    assert not one["fits"]
    assert one["span"] == pytest.approx((0.08, 0.06))
    assert one["shortfall"] == pytest.approx(0.25)
    assert one["magnification"] == pytest.approx(math.sqrt(0.0048))
    known = read(catalogue([LENS], [CAMERA]))
    given = {concession["demand"]: concession for concession in concessions(brief, *known)}
    assert set(given) == {"cover", "sampling"}
    assert given["cover"]["needed"] == pytest.approx(0.75)
    assert given["sampling"]["needed"] == pytest.approx(0.0625 / 0.75)
    assert tolls(brief, *known) == {"scene.field": 1}


def test_telecentric():
    brief = replace(BRIEF, field=(55.0, 45.0), max_perspective=0.01, above=2.0, below=2.0)
    one = rig(brief, TELECENTRIC)
    assert one["fits"]
    assert one["unknown"] == ["perspective"]
    assert one["magnification"] == 0.1
    assert one["working_distance_mm"] == 300.0
    assert one["length_mm"] == 440.0
    assert one["depth_mm"] == pytest.approx([8 * 0.0625 / 0.1] * 2)
    assert one["latitude"] == pytest.approx((6 / 55 / 0.1) ** 2 - 1)
    assert one["hyperfocal_mm"] is None
    angled = rig(brief, TELECENTRIC | {"telecentricity": 0.01})
    half = math.hypot(6, 5) / 0.2
    assert demand(angled, "perspective")["got"] == pytest.approx(4 * math.tan(0.01) / half)
    assert not rig(brief, TELECENTRIC, CAMERA | {"mount": "CS"})["fits"]  # 5 mm short
    spaced = rig(brief, TELECENTRIC, CAMERA | {"mount": "CS"}, [{"id": "five", "mount": "C", "length": 5.0}])
    assert spaced["spacers"] == ["five"]
    assert spaced["length_mm"] == 445.0


def test_line_scan():
    camera = CAMERA | {"kind": "line", "pixels high": 1, "line rate": 10e3, "shortest exposure": 2e-4}
    brief = replace(BRIEF, speed=300.0, along="width", field=(500.0, 50.0))
    one = rig(brief, LENS, camera)
    assert one["orientation"] == "portrait"
    m = one["magnification"]
    assert one["field_mm"] == pytest.approx((None, 6 / m))
    assert demand(one, "line rate")["hi"] == pytest.approx(0.005 / (300 * 2e-4))
    assert demand(one, "line rate")["asked"] == pytest.approx(5e3)
    assert one["exposure_s"] == pytest.approx(min(0.0625 / 300, 0.005 / (m * 300)))
    still = rig(replace(brief, speed=None), LENS, camera)
    assert still["missed_gates"] == ("line-scan motion",)


def test_unknown_and_strict():
    lens = LENS | {"detail limit": None}
    assert rig(lens=lens)["unknown"] == ["lens detail"]
    strict = rig(replace(BRIEF, strict=True), lens)
    assert not strict["fits"]
    assert strict["unknown"] == []
    assert demand(strict, "lens detail")["verdict"] == "missed"
    assert strict["span"] is None
    assert strict["shortfall"] == 1.0


def test_level_needed_gives_the_ratio_asked():
    camera = CAMERA | {"quantum efficiency": 0.5, "saturation capacity": 10e3}
    brief = replace(BRIEF, snr=40.0, reflectance=0.5, max_exposure=0.01)
    dark = rig(brief, camera=camera)
    assert demand(dark, "light")["verdict"] == "met"
    assert dark["snr"] is None
    lit = rig(replace(brief, illuminance=dark["needed_illuminance_lx"]), camera=camera)
    assert demand(lit, "light")["hi"] == pytest.approx(dark["magnification"])  # just enough there
    assert demand(rig(replace(brief, snr=101.0), camera=camera), "light")["verdict"] == "missed"  # best is √10000


def test_random_works_are_the_same_for_a_seed_and_obey_a_brief_s_rules():
    for seed in range(20):
        brief, known = works(seed)
        assert brief == works(seed)[0]
        assert brief.working_distance[0] > max(brief.above, sum(layer.thickness for layer in brief.layers))
        assert brief.focus_plane is None or -brief.below <= brief.focus_plane <= brief.above
        if brief.pulse is not None:
            assert brief.pulse < min(1 / (brief.rate or 1e-9), brief.max_exposure or math.inf)
        for row in parts.rows(known.lenses):
            stated = row["front principal"]
            assert stated is None or row["nearest object"] + stated > row["focal length"]
