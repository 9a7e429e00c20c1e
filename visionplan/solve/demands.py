"""The table of demands: one entry each, with its bound, its direct check, its unit and its words.

Search, span chart, explanations, concessions and reports all read this table; a new demand is a new entry.
"""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np

from visionplan.solve import bounds, checks, gives
from visionplan.solve.ask import Ask
from visionplan.solve.case import Case
from visionplan.solve.gives import Give

NOT_ASKED, MET, UNKNOWN, MISSED = -1, 0, 1, 2
"""Codes of a verdict, worse ones greater."""
VERDICTS = {NOT_ASKED: "not asked", MET: "met", UNKNOWN: "unknown", MISSED: "missed"}


Concede = Callable[[Case, Any, Any], list[Give]]
"""From the interval that the other demands leave."""


@dataclass(frozen=True, eq=False)
class Demand:
    """One thing the cell asks for that holds on an interval of the magnification."""

    name: str
    unit: str
    """Of what is asked and got."""
    bound: Callable[[Case], tuple[Any, Any]]
    check: Callable[[Case, Any], Any]
    """What the rig gets at a magnification."""
    asked: Callable[[Case], Any]
    asks: Callable[[Ask], bool]
    """Whether the brief asks it of any rig."""
    law: str
    """What must hold, in symbols."""
    bound_law: str
    """The bound that follows."""
    symbols: tuple[str, ...]
    """The symbols of both, for the explanation."""
    source: str
    lines: tuple[str, ...]
    """The lines of the brief whose dropping drops it."""
    place: bool = False
    of: str = "pair"
    """What the bound is of: lens (with its stop, but without the camera), pair (whatever the stop), or rig."""
    applies: Callable[[Case], Any] = lambda case: True
    """Whether it is asked of these rigs, where that depends on the rig."""
    lacks: Callable[[Case], Any] = lambda case: False
    """Whether the catalogue leaves out what it needs."""
    concede: Concede | None = None
    concede_unit: str = ""
    """Unit of the concession, where it isn't the demand's."""


def _lacks_light(case: Case):
    """Quantum efficiency, or a capacity where nothing else limits the exposure; not where no light would do."""
    unlimited = (case.ask.irradiance is not None) & np.isinf(case.ask.longest_exposure) & ~(case.line & (case.v > 0))
    return (np.isnan(case.eta) | (np.isnan(case.saturation) & unlimited)) & bounds.well_holds(case)


DEMANDS: tuple[Demand, ...] = (
    Demand(
        "cover",
        "x",
        bounds.cover,
        checks.cover,
        lambda case: 1.0,
        lambda ask: True,
        "(w/m)(1 − A/u) ≥ W and (h/m)(1 − A/u) ≥ H, with u = f (1/m + 1/p)",
        "m ≤ the positive root of (F f/p) m² + (F f + E A − E f/p) m − E f = 0, F, E = W, w and H, h; the smaller",
        ("W", "H", "w", "h", "A", "f", "p"),
        "perspective projection through the entrance pupil",
        ("scene.field",),
        concede=gives.cover,
    ),
    Demand(
        "sampling",
        "mm",
        bounds.sampling,
        checks.sampling,
        lambda case: case.q,
        lambda ask: True,
        "(κ P/m)(1 + B/u) ≤ q, with u = f (1/m + 1/p)",
        "m ≥ the positive root of (q f/p) m² + (q f − κ P f/p − κ P B) m − κ P f = 0",
        ("q", "kappa", "P", "B", "f", "p"),
        "perspective projection through the entrance pupil; pixels a feature by common practice",
        ("scene.feature",),
        concede=gives.sampling,
    ),
    Demand(
        "reach",
        "mm",
        bounds.reach,
        checks.reach,
        lambda case: case.brief.working_distance,
        lambda ask: True,
        "least ≤ WD ≤ greatest, with WD = f (1 + 1/m) − a + D + z",
        "m = f/(s − f) at s = WD + a − D − z, of the greatest and of the least WD",
        ("f", "a", "D", "z"),
        "Gaussian conjugates",
        ("station.working_distance",),
        place=True,
        of="lens",
        concede=gives.reach,
    ),
    Demand(
        "headroom",
        "mm",
        bounds.headroom,
        checks.headroom,
        lambda case: case.brief.headroom,
        lambda ask: ask.brief.headroom is not None,
        "WD + lens length + (f m − d) + camera length + cable room ≤ headroom",
        "f m² − L m + f ≤ 0, L = headroom − (f − a + D + z + lens length − d + camera length + cable room)",
        ("f", "a", "D", "z", "lens_length", "camera_length", "d"),
        "Gaussian conjugates, unit focusing",
        ("station.headroom",),
        place=True,
        lacks=lambda case: (
            np.isnan(case.lens_length) | np.isnan(case.camera_length) | (~case.telecentric & np.isnan(case.d))
        ),
        concede=gives.headroom,
    ),
    Demand(
        "travel",
        "mm",
        bounds.travel,
        checks.travel,
        lambda case: (case.e, case.e + case.x + case.y),
        lambda ask: True,
        "e ≤ f m ≤ e + x + y, with e = d + spacers",
        "e/f ≤ m ≤ (e + x + y)/f",
        ("f", "d", "rings", "e", "x", "y"),
        "image-side extension f m beyond infinity focus (Newton)",
        (),
        lacks=lambda case: np.isnan(case.d) | np.isnan(case.x),
    ),
    Demand(
        "near depth",
        "mm",
        bounds.near_depth,
        checks.near_depth,
        lambda case: case.A + case.g,
        lambda ask: True,
        "(f/N)(A + g)/u ≤ β, and u > A + g",
        "m ≤ f/((A + g) max(1, f/(N β)) − f/p), none when that is not positive",
        ("f", "N", "p", "A", "g", "beta"),
        "geometric blur on the part, similar triangles from the entrance pupil",
        ("scene.above", "scene.below"),
        of="lens",
        applies=lambda case: case.A + case.g > 0,
        concede=gives.near_depth,
    ),
    Demand(
        "far depth",
        "mm",
        bounds.far_depth,
        checks.far_depth,
        lambda case: case.B + case.g,
        lambda ask: True,
        "(f/N)(B + g)/u ≤ β",
        "m ≤ f/((B + g) f/(N β) − f/p), none when that is not positive",
        ("f", "N", "p", "B", "g", "beta"),
        "geometric blur on the part, similar triangles from the entrance pupil",
        ("scene.above", "scene.below"),
        of="lens",
        applies=lambda case: case.B + case.g > 0,
        concede=gives.far_depth,
    ),
    Demand(
        "rayleigh",
        "mm",
        bounds.rayleigh,
        checks.rayleigh,
        lambda case: case.feature,
        lambda ask: True,
        "1.22 λ N_w ≤ feature · m, with N_w = N (1 + m/p)",
        "m ≥ 1.22 λ N/(feature − 1.22 λ N/p)",
        ("lam", "N", "p", "feature"),
        "Rayleigh criterion",
        ("scene.feature",),
        of="lens",
        concede=gives.rayleigh,
    ),
    Demand(
        "lens detail",
        "lp/mm",
        bounds.lens_detail,
        checks.lens_detail,
        lambda case: case.detail,
        lambda ask: True,
        "1/(2 feature m) ≤ the lens's stated resolution",
        "m ≥ 1/(2 feature · resolution)",
        ("feature", "detail"),
        "one line pair is two features",
        ("scene.feature",),
        of="lens",
        lacks=lambda case: np.isnan(case.detail),
        concede=gives.lens_detail,
        concede_unit="mm",
    ),
    Demand(
        "light",
        "1",
        bounds.light,
        checks.light,
        lambda case: case.brief.snr,
        lambda ask: ask.brief.snr is not None,
        "SNR = n/√(σ² + n) ≥ the SNR asked, n = η ρ E τ P² t λ/(4 N_w² h c), n ≤ saturation",
        "(1 + m/p)² ≤ n(m → 0)/n needed for a fixed exposure; m (1 + m/p)² ≤ … for one line period",
        ("N", "p", "P", "tau", "eta", "variance", "saturation"),
        "EMVA 1288 (linear); Lambertian part",
        ("light.snr",),
        of="rig",
        lacks=_lacks_light,
        concede=gives.light,
    ),
    Demand(
        "perspective",
        "1",
        bounds.perspective,
        checks.perspective,
        lambda case: case.brief.max_perspective,
        lambda ask: ask.brief.max_perspective is not None,
        "(A + B)/(u − A) ≤ k",
        "m ≤ f/(A + (A + B)/k − f/p), none when that is not positive",
        ("f", "p", "A", "B", "telecentricity"),
        "perspective projection through the entrance pupil",
        ("scene.max_perspective", "scene.above", "scene.below"),
        lacks=lambda case: case.telecentric & np.isnan(case.telecentricity) & (case.A + case.B > 0),
        concede=gives.perspective,
    ),
    Demand(
        "line rate",
        "1/s",
        bounds.line_rate,
        checks.line_rate,
        bounds.fastest_rows,
        lambda ask: ask.v > 0,
        "v m/P ≤ the line rate, and P/(v m) ≥ the shortest exposure",
        "m ≤ P · line rate/v, and m ≤ P/(v · shortest exposure)",
        ("v", "P", "line_rate", "t_min"),
        "one row a pixel of motion",
        ("motion.speed",),
        applies=lambda case: case.line,
        lacks=lambda case: np.isnan(case.line_rate),
        concede=gives.speed,
        concede_unit="mm/s",
    ),
)
BY_NAME = {demand.name: demand for demand in DEMANDS}


def judge(demand: Demand, case: Case):
    """(lo, hi, code) of a demand over a case: the bounds to intersect, and NOT_ASKED, MET (as far as any magnification
    meets it), UNKNOWN or MISSED (when none does, or when unknown and the brief is strict)."""
    with np.errstate(invalid="ignore", divide="ignore"):
        lo, hi = demand.bound(case)
    applies, lacks = demand.applies(case), demand.lacks(case)
    if lacks is not False:
        strict = case.brief.strict
        lo = np.where(lacks, bounds.NEVER[0] if strict else 0.0, lo)
        hi = np.where(lacks, bounds.NEVER[1] if strict else np.inf, hi)
    if applies is not True:
        lo, hi = np.where(applies, lo, 0.0), np.where(applies, hi, np.inf)
    never = np.isinf(lo) | (hi == 0)
    code = np.where(never, MISSED, np.where(lacks, UNKNOWN, MET))
    return lo, hi, np.where(applies, code, NOT_ASKED)


def asked_demands(ask: Ask, drop: frozenset[str] = frozenset()) -> list[Demand]:
    """The demands that a brief asks, but for those dropped."""
    return [demand for demand in DEMANDS if demand.name not in drop and demand.asks(ask)]
