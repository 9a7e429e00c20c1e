"""What can be set on a rig by hand: its stops, and the spacer stacks that go under its lens."""

import numpy as np

from visionplan.solve.rig import Rig
from visionplan.solve.stacks import NO_RINGS, Stacks


def stops_of(rig: Rig) -> tuple[float, ...]:
    """Every stop of its lens, fitting or not, the smallest number first."""
    stops = rig.case.problem.lens["N"][rig.case.lenses]
    return tuple(float(stop) for stop in stops[~np.isnan(stops)])


def stacks_of(rig: Rig) -> Stacks:
    """Every spacer stack between its camera and its lens, the shortest first."""
    case = rig.case
    pair = np.array([case.cameras]), np.array([case.lenses])
    return next((stacks for _, stacks in case.problem.stacks_between(*pair, rig.grid[0] * rig.grid[1])), NO_RINGS)


def stacks_for(rig: Rig) -> tuple[tuple[str, ...], ...]:
    """The ids of every spacer stack for a rig, the shortest first; the first is the bare lens."""
    return stacks_of(rig).ids
