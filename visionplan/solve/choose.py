"""Choosing for each pair its rig: the stop, the spacer stack, the orientation and the camera grid."""

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from visionplan.solve import checks, span
from visionplan.solve.demands import MET, MISSED, UNKNOWN
from visionplan.solve.gates import asked_gates, judge_gate, price
from visionplan.solve.judge import Judge
from visionplan.solve.problem import Problem
from visionplan.solve.rigs import Rigs


@dataclass(frozen=True, eq=False)
class Items:
    """The gates of cameras alone and of lenses alone, row by row of their tables."""

    camera: np.ndarray
    """Worst code."""
    lens: np.ndarray
    camera_unknown: np.ndarray
    """Whether any of them is unknown."""
    lens_unknown: np.ndarray

    @classmethod
    def of(cls, problem: Problem, drop: frozenset[str] = frozenset()) -> "Items":
        """Judge every camera and every lens, but for the gates dropped."""
        worst = {"camera": _clear(len(problem.catalogue.cameras)), "lens": _clear(len(problem.catalogue.lenses))}
        unknown = {of: codes == UNKNOWN for of, codes in worst.items()}
        for gate in asked_gates(problem.ask, drop):
            if gate.of in worst:
                codes = judge_gate(gate, problem)
                worst[gate.of] = np.maximum(worst[gate.of], codes)
                unknown[gate.of] = unknown[gate.of] | (codes == UNKNOWN)
        return cls(worst["camera"], worst["lens"], unknown["camera"], unknown["lens"])


def _clear(count: int) -> np.ndarray:
    return np.full(count, MET)


@dataclass(frozen=True, eq=False)
class Chosen:
    """The rig chosen for each of some pairs: arrays over the pairs."""

    camera: np.ndarray
    lens: np.ndarray
    block: np.ndarray
    """Which of `blocks` it stands in."""
    row: np.ndarray
    """Its row there."""
    stop: np.ndarray
    """Its stop, as a number within the lens's."""
    fits: np.ndarray
    misses_gate: np.ndarray
    shortfall: np.ndarray
    grade: np.ndarray
    latitude: np.ndarray
    unknown: np.ndarray
    """Whether anything is unknown."""
    price: np.ndarray
    blocks: Sequence[Rigs]

    def __len__(self) -> int:
        return len(self.camera)

    def take(self, rows: np.ndarray) -> "Chosen":
        """Of some pairs."""
        arrays = {name: getattr(self, name)[rows] for name in self.__dataclass_fields__ if name != "blocks"}
        return Chosen(**arrays, blocks=self.blocks)

    @cached_property
    def point(self) -> np.ndarray:
        """Working point of each rig."""
        return self.gather(lambda block: block.point)

    def gather(self, values) -> np.ndarray:
        """A figure of the chosen rigs from a function of a block that yields (rigs, stops)."""
        out = np.full(len(self), np.nan)
        for number, block in enumerate(self.blocks):
            here = np.flatnonzero(self.block == number)
            if len(here):
                table = np.broadcast_to(values(block), block.case.N.shape)
                out[here] = table[self.row[here], self.stop[here]]
        return out


def best_stop(rigs: Rigs, fits: np.ndarray) -> np.ndarray:
    """The stop of each rig: of those that fit, of the best grade, the least combined blur, then the smaller number;
    when none fits the least shortfall, then the smallest number."""
    grade = np.where(fits, span.grade(rigs.room, rigs.case.brief.comfort), len(span.GRADES))
    best = grade == grade.min(axis=1, keepdims=True)
    with np.errstate(invalid="ignore", divide="ignore", over="ignore"):
        blur = np.where(fits & best, checks.combined_blur(rigs.case, rigs.point), np.inf)
    figure = np.where(fits.any(axis=1, keepdims=True), blur, rigs.short)
    return np.argmax(figure <= figure.min(axis=1, keepdims=True) * (1 + span.TIE), axis=1)


def choose(judge: Judge, items: Items, cameras: np.ndarray, lenses: np.ndarray) -> Chosen:
    """Judge every arrangement of the given pairs (rows of cameras and lenses) and choose one for each.

    Of those that fit: fewest cameras, best grade, fewest rings, least price, greatest latitude, landscape first,
    shortest stack, smallest nx. If none fits: those that miss a gate last, least shortfall, then as before.
    """
    problem = judge.problem
    pair_code = np.maximum(items.camera[cameras], items.lens[lenses])
    line = problem.camera["line"][cameras]
    blocks: list[Rigs] = []
    columns: list[dict[str, np.ndarray]] = []
    for arrangement in problem.ask.arrangements:
        pairs = np.flatnonzero(line == arrangement.line)
        if not len(pairs):
            continue
        rigs = judge.rigs(arrangement, cameras[pairs], lenses[pairs], all_stacks=True)
        pair = pairs[rigs.source]
        column = _columns(problem, rigs, pair, pair_code[pair], len(blocks))
        column["unknown"] |= items.camera_unknown[rigs.cameras] | items.lens_unknown[rigs.lenses]
        columns.append(column)
        blocks.append(rigs)
    table = {name: np.concatenate([column[name] for column in columns]) for name in columns[0]}
    key = (
        table["nx"],
        span.tie_rank(table["length"]),
        table["portrait"],
        span.tie_rank(-(1 + table["latitude"])),
        span.tie_rank(table["price"]),
        table["rings"],
        table["grade"],
        table["count"],
        span.tie_rank(table["shortfall"]),
        table["misses_gate"],
        ~table["fits"].astype(bool),
        table["pair"],
    )
    order = np.lexsort(key)
    first = order[np.searchsorted(table["pair"][order], np.arange(len(cameras)))]
    names = ("block", "row", "stop", "fits", "misses_gate", "shortfall", "grade", "latitude", "unknown", "price")
    return Chosen(cameras, lenses, **{name: table[name][first] for name in names}, blocks=blocks)


def _columns(
    problem: Problem, rigs: Rigs, pair: np.ndarray, pair_code: np.ndarray, block: int
) -> dict[str, np.ndarray]:
    """What the choice goes by, of every rig of a block at its best stop."""
    rows = np.arange(len(pair))
    fits = rigs.fits & (pair_code < MISSED)[:, None]
    stop = best_stop(rigs, fits)
    fit = fits.any(axis=1)
    of_stop = rigs.stop_codes(rows, stop)
    code = np.maximum(np.maximum(pair_code, rigs.gates), of_stop)
    arrangement = rigs.arrangement
    counted = np.zeros(len(rows), int)
    for here, stacks in problem.stacks_between(rigs.cameras, rigs.lenses, arrangement.cameras):
        counted[here] = stacks.rings[rigs.stack[here]]
    return {
        "pair": pair,
        "block": np.full(len(rows), block),
        "row": rows,
        "stop": stop,
        "fits": fit,
        "misses_gate": code == MISSED,
        "shortfall": np.where(fit, 0.0, rigs.short[rows, stop]),
        "grade": np.where(fit, span.grade(rigs.room, problem.brief.comfort)[rows, stop], len(span.GRADES)),
        "latitude": np.where(fit, rigs.room[rows, stop], 0.0),
        "unknown": rigs.unknown | (of_stop == UNKNOWN),
        "price": price(rigs.case)[:, 0],
        "count": np.full(len(rows), arrangement.cameras),
        "rings": counted,
        "length": rigs.case.rings[:, 0],
        "portrait": np.full(len(rows), arrangement.portrait),
        "nx": np.full(len(rows), arrangement.nx),
    }
