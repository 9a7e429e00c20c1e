"""Screening: which classes of cameras can fit which lenses, by conditions that need no root.

With m_s = κP/q and r = min(w/W, h/H), what lens and stop alone demand, [Lo, Hi], can hold with the sampling only if
m_s ≤ Hi/(1 + B/u(Hi)), and with the cover only if r ≥ Lo/(1 − A/u(Lo)): two numbers of the camera against two of the
lens. What passes is judged in full, so the screen decides nothing by itself.
"""

from collections.abc import Iterator

import numpy as np

from visionplan.solve.ask import Arrangement
from visionplan.solve.demands import MISSED
from visionplan.solve.judge import Judge
from visionplan.solve.rigs import Rigs

ROOM = 1e-9
"""Relative room of the screen, so that rounding can't lose a rig."""
CHUNK = 1 << 14
"""Rigs judged at a time, so that their arrays stay in the cache."""


def candidates(judge: Judge, arrangement: Arrangement, cameras: np.ndarray, lens_code: np.ndarray):
    """Rows of cameras and of lenses, pair by pair, that may fit in an arrangement."""
    problem = judge.problem
    cameras = cameras[problem.camera["line"][cameras] == arrangement.line]
    most, least = _lens_ends(judge, arrangement)
    most = np.where(lens_code < MISSED, most, -np.inf)
    if not len(cameras) or not len(most):
        return np.zeros(0, int), np.zeros(0, int)
    w, h = (side[cameras] for side in problem.sides(arrangement))
    W, H = problem.ask.covered(arrangement)
    demanded = {demand.name for demand in judge.demands}
    asked = {gate.name for gate in judge.gates}
    with np.errstate(divide="ignore"):
        ratio = np.minimum(w / W, h / H) if "cover" in demanded else np.full(len(cameras), np.inf)
    finest = problem.camera["kappa"] * problem.camera["P"] / problem.ask.q
    finest = finest[cameras] if "sampling" in demanded else np.zeros(len(cameras))
    able = finest <= ratio * (1 + ROOM)  # the others have too few pixels for the field, whatever the lens
    cameras, w, h, ratio, finest = (values[able] for values in (cameras, w, h, ratio, finest))
    pairs = (finest[:, None] <= most * (1 + ROOM)) & (ratio[:, None] * (1 + ROOM) >= least)
    if "mount" in asked:
        camera_thread, lens_thread, _ = problem.thread
        pairs &= problem.joinable[camera_thread[cameras]][:, lens_thread]
    if "image circle" in asked:
        image = np.maximum(w, h) if arrangement.line else np.hypot(w, h)
        circle = problem.lens["circle"]
        circle = np.where(np.isnan(circle), 0.0 if problem.brief.strict else np.inf, circle)
        pairs &= image[:, None] <= circle * (1 + ROOM)
    camera, lens = np.divmod(np.flatnonzero(pairs), len(most))
    return cameras[camera], lens


def _lens_ends(judge: Judge, arrangement: Arrangement):
    """Of each lens, over its stops: Hi/(1 + B/u(Hi)), the greatest m_s, and Lo/(1 − A/u(Lo)), the least r."""
    problem = judge.problem
    lo, hi = judge.of_lens(arrangement).least, judge.of_lens(arrangement).most
    f, p = problem.lens["f"], problem.lens["p"]
    with np.errstate(divide="ignore", invalid="ignore"):
        most = np.where(hi > 0, hi / (1 + problem.ask.B / (f * (1 / hi + 1 / p))), -np.inf)
        shrunk = 1 - problem.ask.A / (f * (1 / lo + 1 / p))
        least = np.where(lo == 0, 0.0, np.where(shrunk > 0, lo / shrunk, np.inf))
    return np.where(np.isinf(hi), np.inf, most), least


def fitting(judge: Judge, cameras: np.ndarray, lens_code: np.ndarray) -> Iterator[Rigs]:
    """Judged blocks that hold every rig of these cameras that fits, arrangement by arrangement."""
    for number, arrangement in enumerate(judge.problem.ask.arrangements):
        camera, lens = candidates(judge, arrangement, cameras, lens_code)
        for begin in range(0, len(camera), CHUNK):
            chunk = slice(begin, begin + CHUNK)
            yield judge.rigs(arrangement, camera[chunk], lens[chunk])
            _tell(judge, number + (begin + CHUNK) / len(camera))


def everything(judge: Judge, cameras: np.ndarray) -> Iterator[Rigs]:
    """Judged blocks of every rig that a pair could choose, whether it fits or not."""
    lenses = np.arange(len(judge.problem.catalogue.lenses))
    for number, arrangement in enumerate(judge.problem.ask.arrangements):
        here = cameras[judge.problem.camera["line"][cameras] == arrangement.line]
        step = max(1, CHUNK // max(1, len(lenses)))
        for begin in range(0, len(here), step):
            some = here[begin : begin + step]
            yield judge.rigs(arrangement, np.repeat(some, len(lenses)), np.tile(lenses, len(some)), all_stacks=True)
            _tell(judge, number + (begin + step) / len(here))


def _tell(judge: Judge, arrangements: float) -> None:
    """Tell who watches how much of the arrangements is done."""
    if judge.problem.watch:
        judge.problem.watch(min(arrangements / len(judge.problem.ask.arrangements), 1.0))
