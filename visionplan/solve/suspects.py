"""Which lenses and spacer stacks of the catalogue would explain what was measured."""

import numpy as np

from visionplan.optics.conjugates import magnification_at
from visionplan.solve.case import Case
from visionplan.solve.rig import Rig
from visionplan.solve.stacks import stacks_between
from visionplan.solve.target import Measured

MOST = 3
"""Suspects named."""


def lenses_like(case: Case, m: Measured, distance: tuple[float, float]) -> tuple[str, ...]:
    """Other lenses of the thread that show such a magnification within a range of distances (mm), likeliest first.

    Their own tolerance of the focal length is allowed for.
    """
    problem, lens = case.problem, case.problem.lens
    table = problem.catalogue.lenses
    tolerance = np.nan_to_num(table["focal tolerance"])
    offset = lens["a"] - case.D - case.z
    with np.errstate(divide="ignore", invalid="ignore"):
        ends = [
            np.where(distance[end] + offset > f, magnification_at(f, distance[end] + offset), np.nan)
            for end, f in ((1, lens["f"] * (1 - tolerance)), (0, lens["f"] * (1 + tolerance)))
        ]
        nominal = magnification_at(lens["f"], sum(distance) / 2 + offset)
    low, high, nominal = (np.where(lens["telecentric"], lens["M"], values) for values in (*ends, nominal))
    threads = problem.thread[1]
    alike = (low <= m.high) & (high >= m.low) & (threads == threads[case.lenses])
    alike[case.lenses] = False
    rows = np.flatnonzero(alike)
    best = rows[np.argsort(np.abs(np.log(nominal[rows] / m.value)), kind="stable")]
    return tuple(table["id"][row] for row in best[:MOST])


def stacks_reaching(rig: Rig, extension: float) -> tuple[str, ...]:
    """Spacer stacks with which the rig's focus ring reaches an image-side extension, fewest rings first."""
    case, problem = rig.case, rig.case.problem
    cameras, lenses, names = problem.thread
    threads = names[cameras[case.cameras]], names[lenses[case.lenses]]
    # Not the problem's own stacks: where the rig's rings are given it knows no others.
    stacks = stacks_between(problem.catalogue.spacers, *threads, rig.grid[0] * rig.grid[1])
    least = case.d + stacks.length
    rows = np.flatnonzero(stacks.joins & (least <= extension) & (extension <= least + case.x + stacks.travel))
    best = rows[np.argsort(stacks.rings[rows], kind="stable")]
    return tuple(" + ".join(stacks.ids[row]) or "none" for row in best[:MOST])
