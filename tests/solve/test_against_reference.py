"""The solver against the slow reference that tries every magnification, over random small works.

VISIONPLAN_REFERENCE_SEEDS sets how many works are judged.
"""

import math
import os

import pytest

from tests.reference.concessions import concessions, tolls
from tests.reference.random_works import works
from tests.reference.ranking import ORDERS, judge_all, ranked, read
from visionplan.solve import rank
from visionplan.solve.concessions import concede
from visionplan.solve.tolls import tolls as tolls_of

SEEDS = int(os.environ.get("VISIONPLAN_REFERENCE_SEEDS", "30"))
SLOW = slice(0, None, 2)
"""Every other work is ranked in every order."""
ALL = 10**6
VOUCHED = 1e-8
"""A pair with a decision nearer than this, relative, isn't compared: bisection can't tell which way it goes."""

SAME = ("orientation", "stop", "fits", "grade", "held", "pinch")
AT_WORKING_POINT = {
    "magnification": "magnification",
    "working_distance": "working_distance_mm",
    "sampling": "sampling_mm",
    "field": "field_mm",
    "depth": "depth_mm",
    "exposure": "exposure_s",
    "snr": "snr",
    "snr_corner": "snr_corner",
    "needed_illuminance": "needed_illuminance_lx",
    "length": "length_mm",
}
ALWAYS = {"span": "span", "extension": "extension_mm", "hyperfocal": "hyperfocal_mm", "price": "price"}


@pytest.fixture(scope="module")
def judged():
    """Seed, solver's ranking, reference."""
    rankings = []
    for seed in range(SEEDS):
        brief, catalogue = works(seed)
        rankings.append((seed, rank(brief, catalogue, "value", ALL), judge_all(brief, catalogue)))
    return rankings


def close(one, other, relative=1e-7, absolute=1e-12):
    if one is None or other is None:
        return one is other
    if isinstance(one, tuple | list):
        return len(one) == len(other) and all(close(a, b, relative, absolute) for a, b in zip(one, other, strict=True))
    return one == other or abs(one - other) <= relative * max(abs(one), abs(other)) + absolute


def bound(value):
    """None where it lies outside of what the reference scans."""
    return value if value is not None and 1e-6 < value < 1e3 else None


def differences(rig, entry):
    """What differs, as (name, the solver's, the reference's)."""
    setup = [(name, getattr(rig, name), entry[name]) for name in SAME]
    setup += [(name, tuple(getattr(rig, name)), tuple(entry[name])) for name in ("grid", "stops")]
    for name in ("spacers", "unknown", "missed_gates"):
        setup.append((name, sorted(getattr(rig, name)), sorted(entry[name])))
    found = [(name, one, other) for name, one, other in setup if one != other]
    if found:
        return found  # its figures are those of another setup
    figures = [("latitude", 1 + rig.latitude, 1 + entry["latitude"])]
    figures += [("shortfall", 1 - rig.shortfall, 1 - entry["shortfall"])]
    figures += [(name, getattr(rig, name), entry[key]) for name, key in ALWAYS.items()]
    if entry["magnification"] is None:
        figures.append(("magnification", rig.magnification, None))
    else:
        figures += [(name, getattr(rig, name), entry[key]) for name, key in AT_WORKING_POINT.items()]
        contrast = (rig.contrast.focus, rig.contrast.above, rig.contrast.below)
        if not close(contrast, tuple(entry["contrast"].values()), absolute=2e-6):  # quadrature
            found.append(("contrast", contrast, entry["contrast"]))
    found += [(name, one, other) for name, one, other in figures if not close(one, other)]
    return found + demand_differences(rig, entry)


def demand_differences(rig, entry):
    rows = [row for row in rig.demands if row.name != "yield"]  # the reference draws no tolerances
    assert [row.name for row in rows] == [row["name"] for row in entry["demands"]]
    telecentric = entry["judgement"].setup.lens.telecentric
    found = []
    for row, other in zip(rows, entry["demands"], strict=True):
        name = row.name
        if name == "count":
            continue  # always met: no grid has more; not asked says as much
        if row.verdict != other["verdict"]:
            found.append((f"verdict of {name}", row.verdict, other["verdict"]))
        figures = [("lo", bound(row.lo), bound(other["lo"])), ("hi", bound(row.hi), bound(other["hi"]))]
        if not row.gate and other["verdict"] in ("met", "missed"):
            figures.append(("unit", row.unit, other["unit"]))
            if other["got"] is not None and other["got"] != math.inf:
                figures.append(("got", row.got, other["got"]))
            if not (telecentric and name == "travel") and other["asked"] is not None:
                figures.append(("asked", row.asked, other["asked"]))
        if any(isinstance(value, float) and math.isnan(value) for value in flat(row.asked, row.got)):
            found.append((f"not a number in {name}", row.asked, row.got))
        for what, one, another in figures:
            if not (one == another if what == "unit" else close(one, another)):
                found.append((f"{what} of {name}", one, another))
    return found


def flat(*values):
    for value in values:
        yield from value if isinstance(value, tuple) else (value,)


def worded(found):
    return "\n".join(" ".join(map(str, line)) for line in found)


def test_every_pair_is_judged_alike(judged):
    pairs = fitting = narrow = skipped = 0
    found = []
    for seed, ranking, reference in judged:
        rigs = {(rig.camera, rig.lens): rig for rig in ranking.rigs}
        assert len(rigs) == len(ranking.rigs) == ranking.pairs == reference["pairs"]
        for entry in reference["rigs"]:
            pairs += 1
            fitting += entry["fits"]
            narrow += not entry["fits"] and not entry["missed_gates"] and entry["shortfall"] < 0.3
            if entry["doubt"] < VOUCHED:
                skipped += 1
                continue
            key = entry["camera"], entry["lens"]
            found += [(seed, *key, *difference) for difference in differences(rigs[key], entry)]
    assert not found, worded(found)
    assert skipped <= 0.02 * pairs
    assert fitting >= 0.03 * pairs
    assert narrow >= 0.02 * pairs


@pytest.mark.parametrize("order", ORDERS)
def test_the_ranking_is_in_the_same_order(judged, order):
    found, compared = [], 0
    for seed, ranking, reference in judged if order == "value" else judged[SLOW]:
        if any(entry["doubt"] < VOUCHED for entry in reference["rigs"]):
            continue
        compared += 1
        rigs = ranking.rigs if order == "value" else rank(ranking.brief, ranking.catalogue, order, ALL).rigs
        got = [(rig.camera, rig.lens) for rig in rigs]
        expected = [(entry["camera"], entry["lens"]) for entry in ranked(reference["rigs"], order)]
        if ranking.fitting != reference["fitting"]:
            found.append((seed, "fitting", ranking.fitting, reference["fitting"]))
        if got != expected:
            first = next(i for i, (one, other) in enumerate(zip(got, expected, strict=True)) if one != other)
            found.append((seed, f"rank {first + 1}", got[first], expected[first]))
    assert not found, worded(found)
    assert compared >= 0.4 * len(judged)


def test_concessions_and_tolls_agree_with_brute_force(judged):
    found, compared = [], 0
    for seed, ranking, reference in judged:
        brief, catalogue, items = ranking.brief, ranking.catalogue, read(ranking.catalogue)
        too_many = brief.min_contrast is not None or brief.max_count * (1 + len(catalogue.spacers)) > 4
        if too_many or any(entry["doubt"] < VOUCHED for entry in reference["rigs"]):
            continue
        compared += 1
        for line, toll in tolls(brief, *items).items():
            if tolls_of(brief, catalogue)[line] != toll:
                found.append((seed, "toll of", line, tolls_of(brief, catalogue)[line], toll))
        given = {} if reference["fitting"] else {row["demand"]: row for row in concessions(brief, *items)}
        solved = {row.demand: row for row in concede(brief, catalogue)}
        if list(solved) != list(given):
            found.append((seed, "concessions", list(solved), list(given)))
        for name in solved.keys() & given.keys():
            row, other = solved[name], given[name]
            same = (row.unit, row.end, row.camera, row.lens) == tuple(
                other[key] for key in ("unit", "end", "camera", "lens")
            )
            if not (same and close((row.asked, row.needed), (other["asked"], other["needed"]), relative=1e-6)):
                found.append((seed, row, other))
    assert not found, worded(found)
    assert compared >= 0.2 * len(judged)
