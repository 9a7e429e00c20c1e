"""Each closed form against its direct check: the check's verdict flips at the bound, and nowhere else.

The checks compute what a rig gets from the optics (the field, a blur, the electrons …); the bounds are roots found
by multiplying them out. Cases are drawn over the whole realistic range: f 2–200 mm, m 1e-4–5, p 0.3–3, a part that
reaches from nowhere to beyond the pupil.
"""

from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from visionplan.brief.model import Brief
from visionplan.solve import bounds, checks
from visionplan.solve.case import Case
from visionplan.solve.problem import Problem

DRAWS = 400
BRIEF = Brief(field=(60.0, 45.0), feature=0.3, working_distance=(150.0, 400.0), headroom=700.0, max_perspective=0.03)


def log_uniform(draw, low, high, size=DRAWS):
    return np.exp(draw.uniform(np.log(low), np.log(high), size))


def draw_case(seed: int, brief: Brief = BRIEF, line: bool = False, telecentric: bool = False) -> Case:
    draw = np.random.default_rng(seed)
    f = np.full(DRAWS, np.inf) if telecentric else log_uniform(draw, 2, 200)
    p = np.full(DRAWS, np.inf) if telecentric else log_uniform(draw, 0.3, 3)
    m = log_uniform(draw, 1e-4, 5)
    u = 1000.0 if telecentric else f * (1 / m + 1 / p)
    heights = [u * draw.uniform(0, 1.3, DRAWS) * draw.choice([0, 0.01, 0.1, 1], DRAWS) for _ in "AB"]
    pitch = log_uniform(draw, 1e-3, 2e-2)
    nothing = np.full(DRAWS, np.nan)
    some = {
        "f": f,
        "p": p,
        "N": log_uniform(draw, 0.95, 32),
        "A": heights[0],
        "B": heights[1],
        "g": draw.choice([0.0, 0.5, 3.0], DRAWS),
        "z": draw.uniform(-5, 20, DRAWS),
        "D": draw.choice([0.0, 4.0], DRAWS),
        "a": draw.uniform(-20, 60, DRAWS),
        "W": log_uniform(draw, 1, 500),
        "H": log_uniform(draw, 1, 500),
        "P": pitch,
        "w": pitch * draw.integers(300, 9000, DRAWS),
        "h": pitch * (1 if line else draw.integers(300, 9000, DRAWS)),
        "q": log_uniform(draw, 1e-3, 1),
        "beta": log_uniform(draw, 1e-3, 1),
        "feature": log_uniform(draw, 2e-3, 3),
        "kappa": draw.choice([1.0, 1.4], DRAWS),
        "detail": log_uniform(draw, 20, 300),
        "d": draw.choice([0.0, 5.0, -5.0], DRAWS),
        "rings": draw.choice([0.0, 0.5, 5.0, 40.0], DRAWS),
        "y": draw.choice([0.0, 0.0, 7.0], DRAWS),
        "x": np.zeros(DRAWS) if telecentric else log_uniform(draw, 0.05, 60),
        "lens_length": draw.uniform(20, 120, DRAWS),
        "camera_length": draw.uniform(20, 120, DRAWS),
        "telecentric": np.full(DRAWS, telecentric),
        "M": m if telecentric else nothing,
        "WD_stated": draw.uniform(30, 400, DRAWS) if telecentric else nothing,
        "WD_room": draw.choice([0.0, 3.0], DRAWS),
        "telecentricity": draw.uniform(1e-4, 5e-3, DRAWS) if telecentric else nothing,
        "tau": draw.uniform(0.5, 1, DRAWS),
        "eta": draw.uniform(0.05, 0.9, DRAWS),
        "variance": draw.uniform(0, 400, DRAWS),
        "saturation": log_uniform(draw, 2e3, 1e5),
        "line": np.full(DRAWS, line),
        "line_rate": log_uniform(draw, 1e3, 1e5),
        "t_min": log_uniform(draw, 1e-6, 1e-4),
    }
    return Case(Problem(brief, None), None, None, **some)


HOLDS = {
    "cover": lambda case, m: checks.cover(case, m) >= 1,
    "sampling": lambda case, m: checks.sampling(case, m) <= case.q,
    "reach": lambda case, m: (
        (checks.reach(case, m) >= case.brief.working_distance[0])
        & (checks.reach(case, m) <= case.brief.working_distance[1])
    ),
    "headroom": lambda case, m: checks.headroom(case, m) <= case.brief.headroom,
    "travel": lambda case, m: (checks.travel(case, m) >= case.e) & (checks.travel(case, m) <= case.e + case.x + case.y),
    "near_depth": lambda case, m: (checks.near_depth(case, m) >= case.A + case.g) & (case.u(m) > case.A + case.g),
    "far_depth": lambda case, m: checks.far_depth(case, m) >= case.B + case.g,
    "rayleigh": lambda case, m: checks.rayleigh(case, m) <= case.feature,
    "lens_detail": lambda case, m: checks.lens_detail(case, m) <= case.detail,
    "light": lambda case, m: checks.light(case, m) >= case.brief.snr,
    "perspective": lambda case, m: checks.perspective(case, m) <= case.brief.max_perspective,
    "line_rate": lambda case, m: checks.line_rate(case, m) <= bounds.fastest_rows(case),
}
LIT = replace(BRIEF, illuminance=20e3, reflectance=0.5, snr=40.0, max_exposure=5e-3)
BRIEFS = {
    "light, a longest exposure": ("light", LIT, False),
    "light, a rate and blur of motion": ("light", replace(LIT, max_exposure=None, rate=30.0, speed=200.0), False),
    "light, nothing limits": ("light", replace(LIT, max_exposure=None), False),
    "light, a line period": ("light", replace(LIT, max_exposure=None, speed=800.0, motion_blur=1.0), True),
    "light, a pulse on rows": ("light", replace(LIT, max_exposure=None, speed=800.0, pulse=2e-4), True),
    "line rate": ("line_rate", replace(BRIEF, speed=800.0), True),
    "line rate, a pulse": ("line_rate", replace(BRIEF, speed=800.0, pulse=2e-5), True),
}
PLAIN = [name for name in HOLDS if name not in ("light", "line_rate")]


def check_flips(name: str, case: Case, seed: int):
    lo, hi = (np.broadcast_to(end, DRAWS) for end in getattr(bounds, name)(case))
    inside, outside = 1 - 1e-9, 1 + 1e-9
    draw = np.random.default_rng(seed + 1)
    with np.errstate(all="ignore"):
        anywhere = log_uniform(draw, 1e-4, 5)
        near_lo, near_hi = lo * np.array([[outside], [inside]]), hi * np.array([[inside], [outside]])
        for m in (anywhere, *near_lo, *near_hi):
            usable = np.isfinite(m) & (m > 1e-9) & (m < 1e9)
            clear = usable & (abs(m / lo - 1) > 5e-10) & (abs(m / hi - 1) > 5e-10)
            expected = (m >= lo) & (m <= hi)
            got = HOLDS[name](case, np.where(usable, m, 1.0))
            wrong = np.flatnonzero(clear & (got != expected))
            assert not len(wrong), (name, m[wrong][:3], lo[wrong][:3], hi[wrong][:3])


@pytest.mark.parametrize("name", PLAIN)
@given(seed=st.integers(0, 2**32))
@settings(max_examples=25, deadline=None)
def test_bound_is_where_the_check_flips(name, seed):
    check_flips(name, draw_case(seed), seed)


@pytest.mark.parametrize("label", BRIEFS)
@given(seed=st.integers(0, 2**32))
@settings(max_examples=25, deadline=None)
def test_bound_of_light_and_line_rate_is_where_the_check_flips(label, seed):
    name, brief, line = BRIEFS[label]
    check_flips(name, draw_case(seed, brief, line), seed)


@pytest.mark.parametrize("name", ["cover", "sampling", "near_depth", "far_depth", "rayleigh", "perspective"])
@given(seed=st.integers(0, 2**32))
@settings(max_examples=25, deadline=None)
def test_bound_of_a_telecentric_lens_is_where_the_check_flips(name, seed):
    check_flips(name, draw_case(seed, telecentric=True), seed)


@given(seed=st.integers(0, 2**32))
@settings(max_examples=25, deadline=None)
def test_a_telecentric_lens_fits_its_distance_flange_headroom_and_light_or_does_not(seed):
    case = draw_case(seed, LIT, telecentric=True)
    near, far = case.brief.working_distance
    focus = case.WD_stated + case.D + case.z
    expected = {
        "reach": (focus + case.WD_room >= near) & (focus - case.WD_room <= far),
        "travel": (case.d + case.rings <= 0.01) & (case.d + case.rings + case.y >= -0.01),
        "headroom": case.WD(case.M) + case.lens_length + case.rings + case.camera_length + 50 <= case.brief.headroom,
        "light": checks.light(case, case.M) >= case.brief.snr,
    }
    for name, met in expected.items():
        lo, hi = getattr(bounds, name)(case)
        assert ((lo <= case.M) & (hi >= case.M) == met).all(), name


def test_a_thousand_two_hundred_pixels_of_75_micrometres_cover_90_mm_at_exactly_one_magnification():
    some = {"W": 90.0, "H": 90.0, "w": 1200 * 5e-3, "h": 1200 * 5e-3, "P": 5e-3, "q": 0.075, "A": 0.0, "B": 0.0}
    case = Case(Problem(BRIEF, None), None, None, **some, f=25.0, p=1.0, kappa=1.0)
    lo, hi = bounds.sampling(case)[0], bounds.cover(case)[1]
    assert lo == pytest.approx(5e-3 / 0.075, rel=1e-14)
    assert hi == pytest.approx(6.0 / 90, rel=1e-14)
