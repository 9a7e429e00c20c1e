"""The page that explains one rig: every demand with its law, its numbers, result, verdict and source."""

import math
from collections.abc import Iterable, Iterator

from visionplan import __version__
from visionplan.report.advice import advice_rows
from visionplan.report.derivation import figures, working_point
from visionplan.report.figures import grid, rings, room, short
from visionplan.report.lines import wrap
from visionplan.report.symbols import numbers, sign, used_by, value_of
from visionplan.report.words import lacking, misses, value_words
from visionplan.solve.demands import BY_NAME, Demand
from visionplan.solve.rig import Rig, Value, Verdict
from visionplan.solve.span import EDGE
from visionplan.text import clean, figure, width
from visionplan.units import show

WIDTH = 80
_LABEL = 17
_NO_BREAK = "\0"

Row = tuple[str, str]
"""A label and what it tells."""


def explain(rig: Rig, system: str = "mm") -> str:
    """Everything that was judged of a rig, as a page of plain text at most 80 columns wide.

    Parameters
    ----------
    rig : Rig
    system : str
        "mm" or "inch", for lengths.
    """
    asked = [verdict for verdict in rig.demands if verdict.verdict != "not asked"]
    demands = [verdict for verdict in asked if not verdict.gate]
    idle = [verdict.name for verdict in rig.demands if verdict.verdict == "not asked"]
    return "\n".join(
        [
            *_section(f"Explanation of {_name(rig)}", _head(rig, system), "="),
            *_section("Set-up", _setup(rig, system)),
            *_section("Numbers of the brief", numbers(rig, "brief", demands, system)),
            *_section("Numbers of the camera", numbers(rig, "camera", demands, system)),
            *_section("Numbers of the lens", numbers(rig, "lens", demands, system)),
            *_section("Numbers of both", numbers(rig, "both", demands, system)),
            *_section("At the working point", working_point(rig, system)),
            *_heading("Demands"),
            *(line for verdict in demands for line in _demand(rig, verdict, system)),
            *_section("Gates", [_gate(verdict, system) for verdict in asked if verdict.gate]),
            *_heading("Not asked"),
            *_wrapped("  ", ", ".join(idle)),
            *_section("Span", _span(rig)),
            *_section("Figures", figures(rig, system)),
            *_section("Advice", advice_rows(rig, system)),
            *_heading("Assumptions and warnings"),
            *(line for told in rig.assumptions or ("None.",) for line in _wrapped("  - ", clean(told))),
            "",
        ]
    )


def _heading(title: str, rule: str = "-") -> list[str]:
    lines = wrap(title, WIDTH)
    return [*([] if rule == "=" else [""]), *lines, rule * max(map(width, lines))]


def _section(title: str, rows: Iterable[Row], rule: str = "-") -> list[str]:
    lines = _rows(rows)
    return [*_heading(title, rule), *lines] if lines else []


def _rows(rows: Iterable[Row]) -> list[str]:
    return [line for label, told in rows for line in _wrapped(f"  {label:<{_LABEL}} ", told)]


def _wrapped(begin: str, told: str) -> list[str]:
    """A label and its text, wrapped beside it."""
    lines = wrap(told, WIDTH, " " * len(begin), begin)
    return [line.replace(_NO_BREAK, " ") for line in lines]


def _glued(told: str) -> str:
    """Kept on one line: a value with its unit."""
    return told.replace(" ", _NO_BREAK)


def _name(rig: Rig) -> str:
    return f"{clean(rig.camera)} with {clean(rig.lens)}"


def _head(rig: Rig, system: str) -> Iterator[Row]:
    problem = rig.case.problem
    brief, catalogue = problem.brief, problem.catalogue
    yield "brief", f"{clean(brief.title) or 'no title'} ({clean(brief.source) or 'no file'})"
    counts = f"{len(catalogue.cameras)} cameras, {len(catalogue.lenses)} lenses"
    yield "catalogue", f"{catalogue.fingerprint[:23]}…, {counts}"
    yield "visionplan", __version__
    yield "verdict", _fits(rig, system)


def _fits(rig: Rig, system: str) -> str:
    unknown = f"; unknown: {', '.join(rig.unknown)}" if rig.unknown else ""
    if rig.fits:
        return f"fits, {rig.grade}{unknown}"
    return f"does not fit: {'; '.join(misses(rig, system)) or 'the span is empty'}{unknown}"


def _setup(rig: Rig, system: str) -> Iterator[Row]:
    case = rig.case
    camera, lens = case.problem.catalogue.cameras, case.problem.catalogue.lenses
    kind = camera["colour"][case.cameras] or "colour not stated"
    pixels = f"{camera['pixels wide'][case.cameras]:.0f} × {camera['pixels high'][case.cameras]:.0f} pixels"
    yield "camera", f"{clean(rig.camera)}, {clean(camera['mount'][case.cameras])} mount, {pixels}, {kind}"
    yield "lens", f"{clean(rig.lens)}, {clean(lens['mount'][case.lenses])} mount, {lens['kind'][case.lenses]}"
    stack = f"{rings(rig)}, {show(rig.extension, 'mm', system)}" if rig.spacers else "none"
    if case.telecentric:
        yield "telecentric lens", "the laws at their limit, f and p infinite and f/u = m; no focus travel"
    yield "spacer rings", stack
    yield "f-number", f"{figure(rig.stop)}; fitting: {', '.join(map(figure, rig.stops)) or 'none'}"
    yield "orientation", rig.orientation
    if rig.grid != (1, 1):
        yield "cameras", f"{grid(rig)} over the field"
    yield "working distance", f"{show(rig.working_distance, 'mm', system)}, lens front to reference plane"
    yield "magnification", figure(rig.magnification, 5)


def _demand(rig: Rig, verdict: Verdict, system: str) -> list[str]:
    demand = BY_NAME[verdict.name]
    case = rig.case
    put_in = [_glued(f"{sign(symbol)} = {value_of(case, symbol, system)}") for symbol in used_by(case, verdict)]
    rows = [
        ("must hold", demand.law),
        ("numbers", ", ".join(put_in)),
        ("asked", _told(verdict.asked, verdict, system)),
        ("got", _got(rig, verdict, system)),
        ("its interval", f"{demand.bound_law}: {_interval(verdict)}"),
        ("source", demand.source),
    ]
    place = ", a place demand" if demand.place else ""
    title = f"{verdict.name}{place}: {_judgement(rig, demand, verdict)}"
    return ["", *_wrapped("", title), *_rows(rows)]


def _judgement(rig: Rig, demand: Demand, verdict: Verdict) -> str:
    if verdict.never:
        return "missed, no magnification meets it"
    if verdict.verdict == "unknown":
        return f"unknown, {lacking(rig, verdict)}"
    return verdict.verdict


def _got(rig: Rig, verdict: Verdict, system: str) -> str:
    if rig.magnification is None:
        return _told(verdict.got, verdict, system)
    return f"{_told(verdict.got, verdict, system)} at m = {figure(rig.magnification, 5)}"


def _told(value: Value, verdict: Verdict, system: str) -> str:
    words = value_words(verdict.name, value, verdict.unit, system)
    return words if isinstance(value, str) else _glued(words)


def _interval(verdict: Verdict) -> str:
    if verdict.never:
        return "no m"
    lo, hi = figure(verdict.lo, 5), figure(verdict.hi, 5)
    if verdict.lo is None:
        return "every m" if verdict.hi is None else f"m ≤ {hi}"
    return f"m ≥ {lo}" if verdict.hi is None else f"{lo} ≤ m ≤ {hi}"


def _gate(verdict: Verdict, system: str) -> Row:
    asked, got = _told(verdict.asked, verdict, system), _told(verdict.got, verdict, system)
    return verdict.name, f"{verdict.verdict}: asked {asked}; got {got}"


def _ends(rig: Rig, place: bool | None = None) -> tuple[float, str, float, str]:
    """Greatest lo and least hi of the demands, of place or picture alone where asked for, and whose they are."""
    judged = [v for v in rig.demands if not v.gate and (place is None or BY_NAME[v.name].place == place)]
    lo, low = max(((v.lo or 0.0, v.name) for v in judged), key=lambda end: end[0])
    hi, high = min(((math.inf if v.hi is None else v.hi, v.name) for v in judged), key=lambda end: end[0])
    return lo, low, hi, high


def _between(lo: float, low: str, hi: float, high: str) -> str:
    if lo > hi * (1 + EDGE):
        return f"empty: from {figure(lo, 5)} ({low}) down to {figure(hi, 5)} ({high})"
    if not lo and hi == math.inf:
        return "every m"
    begin = f"{figure(lo, 5)} ({low}) ≤ " if lo else ""
    return f"{begin}m" + (f" ≤ {figure(hi, 5)} ({high})" if hi < math.inf else "")


def _span(rig: Rig) -> Iterator[Row]:
    m = rig.magnification
    if rig.span is None or m is None:
        yield "span", "none: no magnification meets " + ", ".join(v.name for v in rig.demands if v.never)
        yield "shortfall", short(rig.shortfall)
        return
    picture, place = _ends(rig, False), _ends(rig, True)
    yield "picture demands", _between(*picture)
    yield "place demands", _between(*place)
    yield "span", _between(*_ends(rig))
    yield "working point", _why_here(rig, picture)
    if rig.fits:
        ratios = [f"{figure(m, 5)}/{figure(picture[0], 5)}"] if picture[0] else []
        ratios += [f"{figure(picture[2], 5)}/{figure(m, 5)}"] if picture[2] < math.inf else []
        terms = f"min({', '.join(ratios)})² − 1 = " if ratios else ""
        yield "latitude", f"min(m/lo_p, hi_p/m)² − 1 = {terms}{room(rig.latitude)}"
        comfort = rig.case.brief.comfort
        yield "grade", f"{rig.grade}: comfortable from {room(comfort)}, fair from {room(comfort / 2)}"
        yield "pinch", f"{' and '.join(rig.pinch or ())}: the picture demands that bound the room"
        yield "held", f"by {rig.held}, off the middle of the picture demands" if rig.held else "by nothing"
    else:
        yield "shortfall", _shortfall(rig)
        yield "pinch", " and ".join(rig.pinch or ())


def _why_here(rig: Rig, picture: tuple[float, str, float, str]) -> str:
    case, m = rig.case, rig.magnification
    here = figure(m, 5)
    if case.telecentric:
        return f"m = M = {here}, the magnification of the telecentric lens"
    if not math.isnan(case.M):
        return f"m = {here}, where the rig stands"
    if rig.span and rig.span[0] > rig.span[1] * (1 + EDGE):
        return f"m* = √(lo hi) = {here}, where the worst violation is least"
    lo, _, hi, _ = picture
    if not lo or hi == math.inf:
        return f"m* = {here}, at the one end that there is"
    middle = f"m* = √(lo_p hi_p) = √({figure(lo, 5)} · {figure(hi, 5)}) = {figure(math.sqrt(lo * hi), 5)}"
    return f"{middle}, moved to {here}, the nearer end of the span" if rig.held else middle


def _shortfall(rig: Rig) -> str:
    case, (lo, hi) = rig.case, rig.span or (0.0, 0.0)
    if rig.shortfall == 0:
        return "0 %: the span holds the working point; a gate is missed"
    ends = f"lo = {figure(lo, 5)}, hi = {figure(hi, 5)}"
    law = "1 − hi/lo" if math.isnan(case.M) else "1 − min(M/lo, hi/M)²"
    return f"{law} = {short(rig.shortfall)}, {ends}"
