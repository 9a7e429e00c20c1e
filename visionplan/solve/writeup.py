"""Writing up chosen rigs: every figure and verdict of each, as plain data."""

from collections.abc import Sequence
from math import isfinite, sqrt
from typing import Any

import numpy as np

from visionplan.optics.depth import hyperfocal_distance
from visionplan.solve import checks, figures, span
from visionplan.solve.assumptions import assumptions
from visionplan.solve.case import Case
from visionplan.solve.choose import Chosen
from visionplan.solve.demands import (
    DEMANDS,
    MET,
    MISSED,
    NOT_ASKED,
    UNKNOWN,
    VERDICTS,
    Demand,
)
from visionplan.solve.demands import judge as judge_demand
from visionplan.solve.gates import ASKED, GATES, Gate, judge_gate
from visionplan.solve.gates import price as rig_price
from visionplan.solve.judge import Judge
from visionplan.solve.rig import Contrast, Rig, Value, Verdict
from visionplan.solve.rigs import flat, stop_code

End = tuple[float, str]
"""A bound of magnification and the demand that sets it."""


def rigs_of(judge: Judge, chosen: Chosen) -> tuple[Rig, ...]:
    """Write up rigs, ranked as they stand."""
    case = _case(judge, chosen)
    m = chosen.point[:, None]
    demands = [_demand_columns(demand, judge, case, m) for demand in DEMANDS]
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        shown = _figures(case, m)
        contrast = figures.contrasts(case, m)
    gates = [_gate_columns(gate, judge, case, m) for gate in GATES]
    ends = _Ends(demands)
    return tuple(
        _rig(chosen, number, one, demands, gates, shown, contrast, ends) for number, one in enumerate(case.rows())
    )


def _case(judge: Judge, chosen: Chosen) -> Case:
    """One case of all chosen rigs, each in its own arrangement: arrays of shape (rigs, 1)."""
    blocks = [chosen.blocks[number] for number in chosen.block]
    rows = list(zip(blocks, chosen.row, chosen.stop))
    column = lambda values: np.array(list(values))[:, None]  # noqa: E731
    covered = [judge.problem.ask.covered(block.arrangement) for block in blocks]
    return Case(
        judge.problem,
        chosen.camera,
        chosen.lens,
        W=column(c[0] for c in covered),
        H=column(c[1] for c in covered),
        g=column(judge.problem.ask.slack(block.arrangement) for block in blocks),
        nx=column(block.arrangement.nx for block in blocks),
        ny=column(block.arrangement.ny for block in blocks),
        portrait=column(block.arrangement.portrait for block in blocks),
        w=column(block.case.w[row, 0] for block, row, _ in rows),
        h=column(block.case.h[row, 0] for block, row, _ in rows),
        N=column(block.case.N[row, stop] for block, row, stop in rows),
        rings=column(block.case.rings[row, 0] for block, row, _ in rows),
        y=column(block.case.y[row, 0] for block, row, _ in rows),
        joined=column(block.case.joined[row, 0] for block, row, _ in rows),
        ring_price=column(block.case.ring_price[row, 0] for block, row, _ in rows),
    )


def _figures(case: Case, m) -> dict[str, list[float]]:
    hyperfocal = np.where(case.telecentric, np.nan, hyperfocal_distance(case.f, case.N, case.P))
    corner = figures.signal_to_noise_at(case, m, corner=True)
    table: dict[str, np.ndarray] = {
        "magnification": m,
        "working_distance": np.where(np.isnan(m), np.nan, case.WD(m)),
        "sampling": case.P / m,
        "width": np.where(case.line & (case.W == 0), np.nan, case.w / m),
        "height": np.where(case.line & (case.H == 0), np.nan, case.h / m),
        "nearer": checks.near_depth(case, m),
        "farther": checks.far_depth(case, m),
        "exposure": figures.exposure(case, m),
        "snr": figures.signal_to_noise_at(case, m),
        "snr_corner": corner,
        "needed_illuminance": figures.needed_illuminance(case, m),
        "hyperfocal": hyperfocal,
        "length": np.where(np.isnan(m), np.nan, case.length(m)),
        "price": rig_price(case),
    }
    return {name: np.broadcast_to(values, m.shape)[:, 0].tolist() for name, values in table.items()}


def _demand_columns(demand: Demand, judge: Judge, case: Case, m) -> dict[str, Any]:
    """Bounds, code, asked and got of one demand for every rig."""
    rigs = len(m)
    if demand not in judge.demands:
        return {"lo": [0.0] * rigs, "hi": [np.inf] * rigs, "code": [NOT_ASKED] * rigs}
    lo, hi, code = judge_demand(demand, case)
    lo, hi, code = flat(lo, rigs), flat(hi, rigs), flat(code, rigs)
    at = m[:, 0]
    with np.errstate(invalid="ignore", divide="ignore", over="ignore"):
        outside = ~(span.holds(lo, at) & span.holds(at, hi)) & np.isfinite(at)
        got = flat(demand.check(case, m), rigs)
    code = np.where((code == MET) & outside, MISSED, code)
    asked = demand.asked(case)
    if isinstance(asked, tuple):
        asked = list(zip(*(flat(end, rigs).tolist() for end in asked)))
    else:
        asked = flat(asked, rigs).tolist()
    return {"lo": lo.tolist(), "hi": hi.tolist(), "code": code.tolist(), "asked": asked, "got": got.tolist()}


def _gate_columns(gate: Gate, judge: Judge, case: Case, m) -> np.ndarray:
    rigs = len(case.cameras)
    if gate not in judge.gates:
        return np.full(rigs, NOT_ASKED)
    if gate.of == "camera":
        return judge_gate(gate, judge.problem)[case.cameras]
    if gate.of == "lens":
        return judge_gate(gate, judge.problem)[case.lenses]
    return stop_code(gate, case, m) if gate.of == "stop" else flat(judge_gate(gate, case), rigs)


def _rig(chosen: Chosen, number: int, one: Case, demands, gates, shown, contrast, ends: "_Ends") -> Rig:
    fits = bool(chosen.fits[number])
    figure = {name: _known(values[number]) for name, values in shown.items()}
    verdicts = [_verdict(demand, columns, number) for demand, columns in zip(DEMANDS, demands)]
    verdicts += [_gate_verdict(gate, int(codes[number]), one) for gate, codes in zip(GATES, gates)]
    block, row = chosen.blocks[chosen.block[number]], chosen.row[number]
    (lo, _), (hi, _) = ends.whole[number]
    never = lo == np.inf or hi == 0
    stops = block.case.N[row][block.fits[row]].tolist() if fits else []
    m = figure["magnification"]
    return Rig(
        rank=number + 1,
        camera=one.problem.catalogue.cameras["id"][one.cameras],
        lens=one.problem.catalogue.lenses["id"][one.lenses],
        spacers=_spacers(block, row),
        extension=float(one.rings),
        orientation="portrait" if one.portrait else "landscape",
        grid=(int(one.nx), int(one.ny)),
        stop=float(one.N),
        stops=tuple(stops),
        fits=fits,
        grade=span.GRADES[int(chosen.grade[number])] if fits else None,
        unknown=tuple(v.name for v in verdicts if v.verdict == VERDICTS[UNKNOWN]),
        span=None if never else (lo, hi),
        latitude=float(chosen.latitude[number]),
        shortfall=float(chosen.shortfall[number]),
        pinch=None if never else ends.pinch(number, one.M),
        held=ends.held(number) if span.holds(lo, hi) and np.isnan(one.M) else None,
        magnification=m,
        working_distance=figure["working_distance"],
        sampling=figure["sampling"],
        field=(figure["width"], figure["height"]),
        depth=(figure["nearer"], figure["farther"]),
        exposure=figure["exposure"],
        snr=figure["snr"],
        snr_corner=figure["snr_corner"],
        needed_illuminance=figure["needed_illuminance"],
        contrast=None if m is None else Contrast(*(float(value[number, 0]) for value in contrast)),
        hyperfocal=figure["hyperfocal"],
        length=figure["length"],
        price=figure["price"],
        demands=tuple(verdicts),
        assumptions=assumptions(one, m, figure["snr_corner"]),
        missed_gates=tuple(v.name for v in verdicts if v.gate and v.verdict == VERDICTS[MISSED]),
        case=one,
    )


def _spacers(block, row: int) -> tuple[str, ...]:
    pair = block.cameras[row : row + 1], block.lenses[row : row + 1]
    for _, stacks in block.case.problem.stacks_between(*pair, block.arrangement.cameras):
        return stacks.ids[block.stack[row]]
    return ()


def _verdict(demand: Demand, columns: dict[str, Any], number: int) -> Verdict:
    code = columns["code"][number]
    if code == NOT_ASKED:
        return _UNASKED[demand.name]
    lo, hi = columns["lo"][number], columns["hi"][number]
    never = lo == np.inf or hi == 0
    asked = columns["asked"][number]
    return Verdict(
        demand.name,
        None if never or lo == 0 else lo,
        None if never or hi == np.inf else hi,
        _range(asked) if isinstance(asked, tuple) else _known(asked),
        _known(columns["got"][number]),
        demand.unit,
        VERDICTS[code],
        never=never,
    )


def _gate_verdict(gate: Gate, code: int, one: Case) -> Verdict:
    if code == NOT_ASKED:
        return _UNASKED[gate.name]
    asked, got = gate.asked(one), gate.got(one)
    return Verdict(gate.name, None, None, _word(asked), _word(got), gate.unit, VERDICTS[code], gate=True)


_UNASKED = {
    asked.name: Verdict(asked.name, None, None, None, None, asked.unit, VERDICTS[NOT_ASKED], isinstance(asked, Gate))
    for asked in ASKED
}


def _word(value: Any) -> Value:
    return value if isinstance(value, str) else _known(value)


def _range(ends: tuple[float, float]) -> Value:
    return ends if all(map(isfinite, ends)) else None


def _known(value: Any) -> float | None:
    return float(value) if isfinite(value) else None


class _Ends:
    """Of each rig the ends of its demands' intersection, and the demands that set them."""

    def __init__(self, demands: Sequence[dict[str, Any]]):
        self.whole = self._of(demands, DEMANDS)
        self.picture = self._of(demands, [demand for demand in DEMANDS if not demand.place])
        self.place = self._of(demands, [demand for demand in DEMANDS if demand.place])

    @staticmethod
    def _of(columns: Sequence[dict[str, Any]], some: Sequence[Demand]) -> list[tuple[End, End]]:
        """((lo, its demand), (hi, its demand)) of each rig; of equal ones the first in the table."""
        chosen = [column for demand, column in zip(DEMANDS, columns) if demand in some]
        lows, highs = np.array([c["lo"] for c in chosen]), np.array([c["hi"] for c in chosen])
        lo, hi = lows.max(axis=0), highs.min(axis=0)
        low, high = (lows >= lo * (1 - span.TIE)).argmax(axis=0), (highs <= hi * (1 + span.TIE)).argmax(axis=0)
        named = ([some[i].name for i in places.tolist()] for places in (low, high))
        return list(zip(*(list(zip(values.tolist(), names)) for values, names in zip((lo, hi), named))))

    def pinch(self, number: int, M: float) -> tuple[str, str]:
        """The demands that bound the room; where the span is empty, those at its ends."""
        (lo, _), (hi, _) = self.whole[number]
        low, high = (self.picture if span.fits(lo, hi, M) else self.whole)[number]
        return low[1], high[1]

    def held(self, number: int) -> str | None:
        """The place demand that keeps the working point off the middle of the picture demands."""
        (lo_p, _), (hi_p, _) = self.picture[number]
        (lo, low), (hi, high) = self.place[number]
        middle = sqrt(lo_p * hi_p)
        if not span.holds(lo, middle):
            return low
        return high if not span.holds(middle, hi) else None
