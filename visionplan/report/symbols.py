"""The numbers that went into a rig, by the symbols that the laws are written in."""

import math
from collections.abc import Iterator, Sequence

from visionplan.solve.case import SYMBOLS, Case
from visionplan.solve.demands import BY_NAME
from visionplan.solve.rig import Rig, Verdict
from visionplan.units import show

SIGNS = {
    "beta": "β",
    "beta_v": "β_v",
    "lam": "λ",
    "kappa": "κ",
    "eta": "η",
    "tau": "τ",
    "variance": "σ²",
    "detail": "resolution",
    "lens_length": "lens length",
    "camera_length": "camera length",
    "lens_diameter": "lens diameter",
    "circle": "image circle",
    "rings": "spacers",
    "line_rate": "line rate",
    "t_min": "shortest exposure",
    "WD_stated": "stated WD",
    "WD_room": "WD tolerance",
}
"""Symbol → how the laws write it, where that differs."""

_BOTH = ("d", "rings", "y", "e")
_OF_TELECENTRIC = ("M", "WD_stated", "WD_room", "telecentricity")
_OF_FOCUSING = ("a", "x")


def sign(symbol: str) -> str:
    """How a symbol is written in the laws."""
    return SIGNS.get(symbol, symbol)


def value_of(case: Case, symbol: str, system: str = "mm") -> str:
    """A symbol's value in words, with its unit."""
    value = float(getattr(case, symbol))
    return "∞" if math.isinf(value) else show(value, SYMBOLS[symbol][1], system)


def origin(case: Case, symbol: str) -> str:
    """Whose number it is: brief, camera, lens or both."""
    if symbol in _BOTH:
        return "both"
    if symbol in case.problem.camera or symbol in ("w", "h"):
        return "camera"
    return "lens" if symbol in case.problem.lens else "brief"


def used_by(case: Case, verdict: Verdict) -> list[str]:
    """The symbols in a demand's laws that mean something for the rig's kind of lens."""
    idle = _OF_FOCUSING if case.telecentric else _OF_TELECENTRIC
    return [symbol for symbol in BY_NAME[verdict.name].symbols if symbol not in idle]


def numbers(rig: Rig, of: str, demands: Sequence[Verdict], system: str) -> Iterator[tuple[str, str]]:
    """Sign, and value with meaning, of every number of one origin that these demands use."""
    used = {symbol for verdict in demands for symbol in used_by(rig.case, verdict)}
    for symbol, (meaning, _) in SYMBOLS.items():
        if symbol in used and origin(rig.case, symbol) == of:
            yield sign(symbol), f"{value_of(rig.case, symbol, system)}, {meaning}"
    if of == "brief" and rig.case.brief.headroom is not None:
        yield "cable room", f"{show(rig.case.ask.cable_room, 'mm', system)}, room for the cable behind the camera"
