"""Judging one pair: as the search would plan it, or as a rig that stands already."""

from collections.abc import Sequence

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
        For an id that the catalogue hasn't, a stop or a distance that the lens can't be set to, a ring of another
        thread.
    """
    camera_row = _row(catalogue.cameras, camera)
    lens_row = _row(catalogue.lenses, lens)
    stack = None if rings is None else _stack(catalogue, camera_row, lens_row, rings)
    if stop is not None:
        _check_stop(catalogue.lenses, lens_row, stop)
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


def _check_stop(lenses: Table, lens: int, stop: float) -> None:
    low, high = lenses["f-number min"][lens], lenses["f-number max"][lens]
    if stop not in lenses["stops"][lens] and (stop < low or stop > high):
        ends = f"f/{low:g}" if np.isnan(high) else f"f/{low:g} to f/{high:g}"
        raise _fault("stop", f"the lens can't be set to f/{stop:g}", ends)


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


def _stack(catalogue: Catalogue, camera: int, lens: int, rings: Sequence[str]) -> Stacks:
    spacers = catalogue.spacers
    rows = [_row(spacers, ring) for ring in rings]
    lens_thread = thread(catalogue.lenses["mount"][lens])
    camera_thread = thread(catalogue.cameras["mount"][camera])
    adapters = 0
    for row, ring in zip(rows, rings):
        lens_side = thread(spacers["mount"][row])
        camera_side = thread(spacers["camera mount"][row] or spacers["mount"][row])
        adapters += lens_side != camera_side
        if not {lens_side, camera_side} <= {lens_thread, camera_thread} or adapters > 1:
            threads = " and ".join(dict.fromkeys((lens_thread, camera_thread)))
            raise _fault("rings", f"ring {ring} joins {lens_side} to {camera_side}", f"rings between {threads}")
    total = [sum(spacers[name][row] for row in rows) for name in ("length", "price")]
    travel = sum(np.nan_to_num(spacers["travel"][row]) for row in rows)
    length, travel, count, price = (np.array([value], float) for value in (total[0], travel, len(rows), total[1]))
    joins = np.array([camera_thread == lens_thread or adapters == 1])
    return Stacks(length, travel, count, price, joins, (tuple(sorted(rings)),))


def _row(table: Table, id: str) -> int:
    if id in table["id"]:
        return table["id"].index(id)
    from difflib import get_close_matches

    near = get_close_matches(id, table["id"], 3)
    expected = f"one like {', '.join(near)}" if near else "an id of its list"
    raise _fault(table.item, f"the catalogue has no {id!r} among its {table.item}", expected)


def _fault(column: str, found: str, expected: str) -> InputError:
    return InputError([Fault("", found, expected, column=column)])
