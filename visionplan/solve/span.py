"""Spans of magnification: intersection, working point, latitude, grade, shortfall.

A bound that isn't there is 0 below and infinity above; a demand that no magnification meets has lo = inf, hi = 0.
"""

import numpy as np

EDGE = 1e-12
"""Relative room within which a span still counts as not empty."""
TIE = 1e-9
"""Relative distance within which two figures are equal in choices and orders."""
GRADES = ("comfortable", "fair", "tight")


def holds(lo, hi):
    """Whether a span is not empty."""
    return lo <= hi * (1 + EDGE)


def working_point(lo_p, hi_p, lo, hi, M):
    """The magnification a rig stands at.

    Parameters
    ----------
    lo_p, hi_p : intersection of the picture demands
    lo, hi : intersection of all demands
    M : magnification of a telecentric lens, NaN for others

    The middle of the picture demands (geometric), moved to the nearer end of the span; √(lo hi) when the span is
    empty; NaN when no magnification meets some demand.
    """
    with np.errstate(invalid="ignore", over="ignore"):
        middle = np.where(np.isinf(hi_p), lo_p, np.where(lo_p == 0, hi_p, np.sqrt(lo_p * hi_p)))
        moved = np.clip(middle, np.minimum(lo, hi), np.maximum(lo, hi))
        point = np.where(holds(lo, hi), moved, np.sqrt(lo * hi))
    return np.where(np.isnan(M), point, M)


def latitude(m, lo_p, hi_p):
    """Room that the picture demands leave at m, as a fraction, at least 0."""
    with np.errstate(invalid="ignore", over="ignore", divide="ignore"):
        return np.maximum(np.minimum(m / lo_p, hi_p / m) ** 2 - 1, 0.0)


def shortfall(lo, hi, M):
    """How far from fitting: 0 when it fits, 1 when some demand is never met."""
    with np.errstate(invalid="ignore", divide="ignore", over="ignore"):
        short = np.where(np.isnan(M), 1 - hi / lo, 1 - np.minimum(M / lo, hi / M) ** 2)
    never = (lo == np.inf) | (hi == 0)
    return np.where(never, 1.0, np.where(fits(lo, hi, M), 0.0, np.clip(short, 0.0, 1.0)))


def fits(lo, hi, M):
    """Whether the span is not empty and, of a telecentric lens, holds its magnification M."""
    with np.errstate(invalid="ignore"):
        return holds(np.fmax(lo, M), np.fmin(hi, M))


def grade(room, comfort: float):
    """Index into GRADES of a fitting rig's latitude."""
    with np.errstate(invalid="ignore"):
        reached = (1 + room) * (1 + TIE)
        return np.where(reached >= 1 + comfort, 0, np.where(reached >= 1 + comfort / 2, 1, 2))


def tie_rank(values):
    """Rank of each figure, ascending, figures within 1e-9 of the one before sharing a rank; NaN last."""
    values = np.asarray(values, float)
    order = np.argsort(values, kind="stable")
    sorted_values = values[order]
    with np.errstate(invalid="ignore"):
        step = np.diff(sorted_values) > TIE * np.abs(sorted_values[1:])
    step |= np.isnan(sorted_values[1:]) & ~np.isnan(sorted_values[:-1])
    ranks = np.empty(len(values), int)
    ranks[order] = np.concatenate(([0], np.cumsum(step))) if len(values) else []
    return ranks
