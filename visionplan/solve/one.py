"""Judging one pair: as the search would plan it, or as a rig that stands already."""

from collections.abc import Sequence
from difflib import get_close_matches

import numpy as np

from visionplan.brief.model import Brief
from visionplan.catalogue.items import Catalogue, Table
from visionplan.faults import Fault, InputError
from visionplan.optics.conjugates import magnification_at
from visionplan.optics.mounts import thread
from visionplan.solve.choose import Items, choose
from visionplan.solve.judge import Judge
from visionplan.solve.problem import Problem
from visionplan.solve.rig import Rig
from visionplan.solve.stacks import Stacks
from visionplan.solve.writeup import rigs_of


def judge_one(
    brief: Brief,
    catalogue: Catalogue,
    camera: str,
    lens: str,
    at: float | None = None,
    stop: float | None = None,
    rings: Sequence[str] | None = None,
    orientation: str | None = None,
    grid: tuple[int, int] | None = None,
) -> Rig:
    """One rig in full.

    Parameters
    ----------
    camera, lens : ids in the catalogue
    at : working distance it stands at, mm; None for the best
    stop : f-number it is set to; None for the best
    rings : ids of the rings on it, none of them for a bare lens; None for the best stack
    orientation : landscape or portrait; None for the better one
    grid : how many cameras stand across and along the field; None for the best that the brief allows

    Raises
    ------
    InputError
        For an id that the catalogue hasn't, a ring of another thread, or a working distance that the lens can't focus.
    """
    camera_row = _row(catalogue.cameras, camera)
    lens_row = _row(catalogue.lenses, lens)
    stack = None if rings is None else _stack(catalogue, lens_row, rings)
    problem = Problem(brief, catalogue, stop=stop, stack=stack)
    if orientation is not None:
        portrait = orientation == "portrait"
        allowed = tuple(a for a in problem.ask.arrangements if a.portrait == portrait)
        line = bool(problem.camera["line"][camera_row])
        if not any(a.line == line for a in allowed):
            raise _fault(
                "orientation", f"a line-scan camera can't stand in {orientation} here", "its row across the motion"
            )
        problem.ask.__dict__["arrangements"] = allowed
    if at is not None:
        problem.lens["M"][lens_row] = _magnification(problem, lens_row, at)
    if grid is not None:
        allowed = tuple(a for a in problem.ask.arrangements if (a.nx, a.ny) == grid)
        problem.ask.__dict__["arrangements"] = allowed
    judge = Judge(problem)
    chosen = choose(judge, Items.of(problem), np.array([camera_row]), np.array([lens_row]))
    return rigs_of(judge, chosen)[0]


def _magnification(problem: Problem, lens: int, at: float) -> float:
    f, a = problem.lens["f"][lens], problem.lens["a"][lens]
    if np.isinf(f):
        raise _fault("at", "a telecentric lens stands at its own working distance", "no distance of yours")
    s = at + a - problem.ask.D - problem.ask.z
    if s <= f:
        raise _fault(
            "at", f"at {at:g} mm the part is within the focal length of the lens", f"more than {f - s + at:.4g} mm"
        )
    return float(magnification_at(f, s))


def _stack(catalogue: Catalogue, lens: int, rings: Sequence[str]) -> Stacks:
    rows = [_row(catalogue.spacers, ring) for ring in rings]
    mount = catalogue.lenses["mount"][lens]
    for row, ring in zip(rows, rings):
        if thread(catalogue.spacers["mount"][row]) != thread(mount):
            raise _fault("rings", f"ring {ring} has a {catalogue.spacers['mount'][row]} mount", f"a ring for {mount}")
    total = sum(catalogue.spacers["length"][row] for row in rows)
    price = sum(catalogue.spacers["price"][row] for row in rows)
    return Stacks(np.array([total], float), np.array([len(rows)]), np.array([price], float), (tuple(sorted(rings)),))


def _row(table: Table, id: str) -> int:
    if id in table["id"]:
        return table["id"].index(id)
    near = get_close_matches(id, table["id"], 3)
    expected = f"one like {', '.join(near)}" if near else "an id of its list"
    raise _fault(table.item, f"the catalogue has no {id!r} among its {table.item}", expected)


def _fault(column: str, found: str, expected: str) -> InputError:
    return InputError([Fault("", found, expected, column=column)])
