"""The table of gates: what a rig must satisfy whatever its magnification.

A gate of a camera or of a lens is judged once for each row of its table; a gate of a pair for each rig.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from visionplan.solve.ask import Ask
from visionplan.solve.case import Case
from visionplan.solve.demands import DEMANDS, MET, MISSED, NOT_ASKED, UNKNOWN, Demand
from visionplan.solve.problem import Problem
from visionplan.solve.span import EDGE


@dataclass(frozen=True, eq=False)
class Gate:
    """One thing the cell asks for that doesn't depend on the magnification."""

    name: str
    of: str
    """camera, lens, pair, or stop: a pair at each stop's working point."""
    codes: Callable[[Any], Any]
    """NOT_ASKED, MET, UNKNOWN or MISSED: from the Problem for every row of the table (camera, lens), or from a Case."""
    asks: Callable[[Ask], bool]
    asked: Callable[[Case], Any]
    """For one rig, as the files word it."""
    got: Callable[[Case], Any]
    unit: str = ""
    lines: tuple[str, ...] = ()
    """The lines of the brief whose dropping drops it."""
    loosens: int = 0
    """Whether a greater (1) or a smaller (−1) value asks for less; 0 where it isn't conceded."""


def _at_most(got, limit):
    return np.where(np.isnan(got), UNKNOWN, np.where(got <= limit * (1 + EDGE), MET, MISSED))


def _at_least(got, limit):
    return np.where(np.isnan(got), UNKNOWN, np.where(got >= limit * (1 - EDGE), MET, MISSED))


def _one_of(words: Sequence[str], allowed: Sequence[str]):
    code = {word: MET if word in allowed else MISSED if word else UNKNOWN for word in set(words)}
    return np.array([code[word] for word in words], int)


def _where(applies, codes):
    return np.where(applies, codes, NOT_ASKED)


def _shutter(problem: Problem):
    shutters = problem.catalogue.cameras["shutter"]
    codes = MET if problem.brief.pulse is not None else _one_of(shutters, ["global"])
    return _where(~problem.camera["line"], codes)


def _blur_time(problem: Problem):
    """Pulse, else the camera's shortest exposure."""
    pulse = problem.brief.pulse
    return problem.camera["t_min"] if pulse is None else np.full(len(problem.camera["t_min"]), pulse)


def longest_pause(ask: Ask) -> float:
    """What rate and longest exposure leave for an exposure, s."""
    return min(1 / ask.brief.rate if ask.brief.rate else np.inf, ask.brief.max_exposure or np.inf)


def _mount(case: Case):
    if case.brief.mounts is None:
        return np.where(case.joined, MET, MISSED)
    cameras, lenses = case.problem.mount_allowed
    allowed = cameras[case.cameras] & lenses[case.lenses]
    return np.where(case.joined & allowed[:, None], MET, MISSED)


def _image(case: Case):
    """Sensor diagonal, of a line-scan camera its row."""
    return np.where(case.line, np.maximum(case.w, case.h), np.hypot(case.w, case.h))


def _pitch(case: Case):
    """Least distance between neighbouring cameras of a grid; infinite for one."""
    ask, overlap = case.ask, case.brief.overlap
    across = np.where(np.asarray(case.nx) > 1, (ask.W_all - overlap) / case.nx, np.inf)
    along = np.where(np.asarray(case.ny) > 1, (ask.H_all - overlap) / case.ny, np.inf)
    return np.minimum(across, along)


def _grid_pitch(case: Case):
    return _where(np.asarray(case.nx) * case.ny > 1, _at_most(case.lens_diameter, _pitch(case)))


def price(case: Case):
    """Price of every camera, lens and ring of the rig; NaN where one isn't stated."""
    return np.asarray(case.nx) * case.ny * (case.camera_price + case.lens_price + case.ring_price)


def _stock(case: Case):
    """Fewer of what is in stock of camera and lens; NaN where one isn't stated."""
    return np.minimum(case.camera_stock, case.lens_stock)


def _stock_codes(case: Case):
    needed = np.asarray(case.nx) * case.ny
    return np.maximum(_at_least(case.camera_stock, needed), _at_least(case.lens_stock, needed))


def _yield_codes(case: Case):
    """Unknown where the lens doesn't state its tolerance, but missed where it is too low without it."""
    codes = _at_least(case.share, case.brief.min_yield)
    vague = ~case.telecentric & np.isnan(case.focal_tolerance)
    return np.where(vague & (codes == MET), UNKNOWN, codes)


def _words(table: str, column: str) -> Callable[[Case], str]:
    def read(case: Case) -> str:
        row = case.cameras if table == "cameras" else case.lenses
        return getattr(case.problem.catalogue, table)[column][row] or "not stated"

    return read


def _listing(attribute: str) -> Callable[[Case], str]:
    return lambda case: ", ".join(getattr(case.brief, attribute))


GATES: tuple[Gate, ...] = (
    Gate(
        "lens kind",
        "lens",
        lambda problem: _one_of(problem.lens_kinds, problem.brief.lens_kinds),
        lambda ask: ask.brief.lens_kinds is not None,
        _listing("lens_kinds"),
        lambda case: case.problem.lens_kinds[case.lenses],
        lines=("choose.lens_kinds",),
    ),
    Gate(
        "cameras",
        "camera",
        lambda problem: _one_of(problem.catalogue.cameras["id"], problem.brief.cameras),
        lambda ask: ask.brief.cameras is not None,
        _listing("cameras"),
        _words("cameras", "id"),
        lines=("choose.cameras",),
    ),
    Gate(
        "lenses",
        "lens",
        lambda problem: _one_of(problem.catalogue.lenses["id"], problem.brief.lenses),
        lambda ask: ask.brief.lenses is not None,
        _listing("lenses"),
        _words("lenses", "id"),
        lines=("choose.lenses",),
    ),
    Gate(
        "mount",
        "pair",
        _mount,
        lambda ask: True,
        lambda case: ", ".join(case.brief.mounts or ()) or "same thread or an adapter",
        lambda case: f"{_words('cameras', 'mount')(case)} camera, {_words('lenses', 'mount')(case)} lens",
        lines=("choose.mounts",),
    ),
    Gate(
        "image circle",
        "pair",
        lambda case: _at_least(case.circle, _image(case)),
        lambda ask: True,
        _image,
        lambda case: case.circle,
        "mm",
    ),
    Gate(
        "colour",
        "camera",
        lambda problem: _one_of(problem.catalogue.cameras["colour"], [problem.brief.sensor]),
        lambda ask: ask.brief.sensor != "any",
        lambda case: case.brief.sensor,
        _words("cameras", "colour"),
        lines=("choose.sensor",),
    ),
    Gate(
        "shutter",
        "camera",
        _shutter,
        lambda ask: ask.v > 0,
        lambda case: "global" if case.brief.pulse is None else "global, or a light pulse",
        _words("cameras", "shutter"),
        lines=("motion.speed",),
    ),
    Gate(
        "motion",
        "camera",
        lambda problem: _at_most(problem.ask.v * _blur_time(problem), problem.ask.beta_v),
        lambda ask: ask.v > 0,
        lambda case: case.beta_v,
        lambda case: case.v * (case.t_min if case.brief.pulse is None else case.brief.pulse),
        "mm",
        lines=("motion.speed",),
        loosens=1,
    ),
    Gate(
        "exposure",
        "camera",
        lambda problem: _at_most(problem.camera["t_min"], longest_pause(problem.ask)),
        lambda ask: bool(np.isfinite(longest_pause(ask))),
        lambda case: longest_pause(case.ask),
        lambda case: case.t_min,
        "s",
        lines=("light.max_exposure",),
    ),
    Gate(
        "frame rate",
        "camera",
        lambda problem: _where(~problem.camera["line"], _at_least(problem.camera["frame_rate"], problem.brief.rate)),
        lambda ask: ask.brief.rate is not None,
        lambda case: case.brief.rate,
        lambda case: case.frame_rate,
        "1/s",
        lines=("motion.rate",),
        loosens=-1,
    ),
    Gate(
        "line-scan motion",
        "camera",
        lambda problem: _where(problem.camera["line"], MET if problem.ask.v > 0 else MISSED),
        lambda ask: True,
        lambda case: "a speed",
        lambda case: f"{case.v:g} mm/s" if case.v else "none",
    ),
    Gate(
        "interface",
        "camera",
        lambda problem: _one_of(problem.catalogue.cameras["interface"], problem.brief.interfaces),
        lambda ask: ask.brief.interfaces is not None,
        _listing("interfaces"),
        _words("cameras", "interface"),
        lines=("choose.interfaces",),
    ),
    Gate(
        "cable",
        "camera",
        lambda problem: _at_least(problem.catalogue.cameras["cable limit"], problem.brief.cable),
        lambda ask: ask.brief.cable is not None,
        lambda case: case.brief.cable,
        lambda case: case.problem.catalogue.cameras["cable limit"][case.cameras],
        "mm",
        lines=("choose.cable",),
    ),
    Gate(
        "distortion",
        "lens",
        lambda problem: _at_most(np.abs(problem.lens["distortion"]), problem.brief.max_distortion),
        lambda ask: ask.brief.max_distortion is not None,
        lambda case: case.brief.max_distortion,
        lambda case: np.abs(case.distortion),
        "1",
        lines=("choose.max_distortion",),
        loosens=1,
    ),
    Gate(
        "grid pitch",
        "pair",
        _grid_pitch,
        lambda ask: ask.brief.max_count > 1,
        lambda case: case.lens_diameter,
        _pitch,
        "mm",
    ),
    Gate(
        "count",
        "pair",
        lambda case: np.where(np.asarray(case.nx) * case.ny <= case.brief.max_count, MET, MISSED),
        lambda ask: ask.brief.max_count > 1,
        lambda case: float(case.brief.max_count),
        lambda case: float(case.nx * case.ny),
    ),
    Gate(
        "price",
        "pair",
        lambda case: _at_most(price(case), case.brief.max_price),
        lambda ask: ask.brief.max_price is not None,
        lambda case: case.brief.max_price,
        price,
        lines=("choose.max_price",),
        loosens=1,
    ),
    Gate(
        "mass",
        "pair",
        lambda case: _at_most(case.camera_mass + case.lens_mass, case.brief.max_mass),
        lambda ask: ask.brief.max_mass is not None,
        lambda case: case.brief.max_mass,
        lambda case: case.camera_mass + case.lens_mass,
        "g",
        lines=("choose.max_mass",),
    ),
    Gate(
        "diameter",
        "lens",
        lambda problem: _at_most(problem.lens["lens_diameter"], problem.brief.max_diameter),
        lambda ask: ask.brief.max_diameter is not None,
        lambda case: case.brief.max_diameter,
        lambda case: case.lens_diameter,
        "mm",
        lines=("choose.max_diameter",),
    ),
    Gate(
        "stock",
        "pair",
        _stock_codes,
        lambda ask: ask.brief.in_hand,
        lambda case: float(case.nx * case.ny),
        _stock,
        lines=("choose.in_hand",),
    ),
    Gate(
        "contrast",
        "stop",
        lambda case: _at_least(case.least_contrast, case.brief.min_contrast),
        lambda ask: ask.brief.min_contrast is not None,
        lambda case: case.brief.min_contrast,
        lambda case: case.least_contrast,
        "1",
        lines=("focus.min_contrast",),
    ),
    Gate(
        "yield",
        "stop",
        _yield_codes,
        lambda ask: ask.brief.min_yield is not None,
        lambda case: case.brief.min_yield,
        lambda case: case.share,
        "1",
        lines=("choose.min_yield",),
    ),
)

ASKED: tuple[Demand | Gate, ...] = (*DEMANDS, *GATES)
"""Everything a brief can ask, demands first."""


def asked_gates(ask: Ask, drop: frozenset[str] = frozenset()) -> list[Gate]:
    """The gates that a brief asks, but for those dropped."""
    return [gate for gate in GATES if gate.name not in drop and gate.asks(ask)]


def judge_gate(gate: Gate, subject: Problem | Case):
    """Codes of a gate; unknown counts as missed when the brief is strict."""
    codes = gate.codes(subject)
    return np.where(codes == UNKNOWN, MISSED, codes) if subject.brief.strict else codes
