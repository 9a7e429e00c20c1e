"""The same rig with something set otherwise: its distance, stop, stack or orientation, or numbers of its lens."""

from collections.abc import Mapping, Sequence
from dataclasses import replace

import numpy as np

from visionplan.brief.model import Brief
from visionplan.catalogue.items import Catalogue, Table
from visionplan.solve.one import judge_one
from visionplan.solve.rig import Rig


def variant(
    rig: Rig,
    brief: Brief | None = None,
    at: float | None = None,
    stop: float | None = None,
    rings: Sequence[str] | str | None = None,
    orientation: str | None = None,
    lens: Mapping[str, float] | None = None,
) -> Rig:
    """Judge a rig anew; what isn't given stays as it is, but for the working point.

    Parameters
    ----------
    at : working distance it stands at, mm; None for the best
    rings : ids, or "best"
    lens : column of its lens → the number that stands there instead

    Raises
    ------
    InputError
        As `judge_one` does.
    """
    case = rig.case
    stack = rig.spacers if rings is None else None if rings == "best" else rings
    catalogue = _of_pair(case.problem.catalogue, case.cameras, case.lenses, lens or {})
    judged = judge_one(
        brief or case.brief,
        catalogue,
        rig.camera,
        rig.lens,
        at,
        stop or rig.stop,
        stack,
        orientation or rig.orientation,
        rig.grid if orientation in (None, rig.orientation) else None,
    )
    return replace(judged, rank=rig.rank)


def _of_pair(catalogue: Catalogue, camera: int, lens: int, other: Mapping[str, float]) -> Catalogue:
    """The catalogue with one camera and one lens, so that judging it takes no time."""
    lenses = _row(catalogue.lenses, lens)
    lenses.values.update({column: np.array([value]) for column, value in other.items()})
    return replace(catalogue, cameras=_row(catalogue.cameras, camera), lenses=lenses)


def _row(table: Table, row: int) -> Table:
    values = {column: cells[row : row + 1] for column, cells in table.values.items()}
    return replace(table, values=values, lines=table.lines[row : row + 1], index={values["id"][0]: 0})
