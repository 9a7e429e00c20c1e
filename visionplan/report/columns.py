"""The columns of the table of rigs, and which of them a width has room for."""

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass

from visionplan.catalogue.items import Catalogue
from visionplan.report.alike import Row
from visionplan.report.figures import currency, field, room, setup, short
from visionplan.report.remarks import Remark, marks
from visionplan.report.words import misses
from visionplan.solve.rig import Rig
from visionplan.text import clean, figure, shorten, width

_BRIEF = 21
"""Terminal cells that latitude and pinch have before the sampling is shown."""
_BRIEFLY = {"near depth": "near", "far depth": "far", "lens detail": "detail"}
_PLACES = (
    *("rank", "camera", "lens", "stop", "setup", "distance", "sampling"),
    *("field", "depth", "snr", "length", "outcome", "grade", "price", "notes"),
)
"""The slots of columns from left to right."""


@dataclass(frozen=True)
class Column:
    """A column with its cells."""

    slot: str
    """Where it stands; of several columns for one slot the last that there is room for stands there."""
    head: str
    cells: tuple[str, ...]
    right: bool = False
    must: bool = False
    """Whether it stands there however narrow the table is."""
    least: int = 0
    """Terminal cells that it may be cut to; 0 where it must not be cut."""

    @property
    def width(self) -> int:
        """In terminal cells."""
        return max(map(width, (self.head, *self.cells)))


def columns(rows: Sequence[Row], remarks: Sequence[Remark], system: str, catalogue: Catalogue) -> list[Column]:
    """Every column that rigs may have, those that matter most first; all rows fit, or none does."""
    rigs = [row.rig for row in rows]
    unit = "in" if system == "inch" else "mm"

    def numbers(slot: str, head: str, value: Callable[[Rig], float | None], digits: int = 4) -> Column:
        return Column(slot, head, _numbers([value(rig) for rig in rigs], digits), right=True)

    def lengths(slot: str, head: str, value: Callable[[Rig], float | None], digits: int = 4) -> Column:
        scale = 25.4 if system == "inch" else 1.0
        scaled = [None if (own := value(rig)) is None else own / scale for rig in rigs]
        return Column(slot, head.format(unit), _numbers(scaled, digits), right=True)

    def texts(slot: str, head: str, text: Callable[[Rig], str], must: bool = False, least: int = 0) -> Column:
        return Column(slot, head, tuple(text(rig) for rig in rigs), must=must, least=least)

    outcome = ("latitude", "latitude, pinch") if rigs[0].fits else ("short by", "short by, misses")
    camera = [clean(row.rig.camera) + (f" +{len(row.folded)}" if row.folded else "") for row in rows]
    found = [
        Column("rank", "#", tuple(str(rig.rank) for rig in rigs), right=True, must=True),
        Column("camera", "camera", tuple(camera), must=True),
        texts("lens", "lens", lambda rig: clean(rig.lens), must=True),
        texts("outcome", outcome[0], _outcome(0, system), must=True),
        texts("notes", "", lambda rig: marks(rig.rank, remarks), must=True),
        lengths("distance", "WD {}", lambda rig: rig.working_distance),
        numbers("price", "price", lambda rig: rig.price, 0),
        Column("stop", "stop", tuple(figure(rig.stop) for rig in rigs), right=True),
        texts("outcome", outcome[1], lambda rig: shorten(_outcome(1, system)(rig), _BRIEF)),
        lengths("sampling", "{}/px", lambda rig: rig.sampling, 3),
        texts("outcome", outcome[1], _outcome(1, system), least=_BRIEF),
        texts("outcome", outcome[1], _outcome(2, system)),
        texts("setup", "rings, setting", setup),
        texts("outcome", outcome[1], _outcome(3, system)),
        texts("grade", "grade", lambda rig: rig.grade or ""),
        texts("field", f"field {unit}", lambda rig: field(rig, system).removesuffix(f" {unit}")),
        lengths("depth", "depth {}", _depth, 3),
        numbers("snr", "SNR", lambda rig: rig.snr, 2),
        lengths("length", "to back {}", lambda rig: rig.length),
        numbers("price", f"price {currency(catalogue)}".rstrip(), lambda rig: rig.price, 0),
    ]
    return [column for column in found if any(cell not in ("", "–") for cell in column.cells)]


def choose(found: Sequence[Column], cells: int, gap: int) -> list[tuple[Column, int]]:
    """The columns that so many cells have room for, from left to right, each with its width."""
    chosen: dict[str, tuple[Column, int]] = {}
    for column in found:
        others = [own for slot, (_, own) in chosen.items() if slot != column.slot]
        free = cells - sum(others) - gap * len(others)
        if column.must or column.width <= free:
            chosen[column.slot] = column, column.width
        elif column.least and column.least <= free:
            chosen[column.slot] = column, free
    for slot, share in (("camera", 2), ("lens", 1), ("camera", 1)):
        over = sum(own for _, own in chosen.values()) + gap * (len(chosen) - 1) - cells
        column, own = chosen[slot]
        chosen[slot] = column, min(own, max(8, own - math.ceil(over / share)))
    return [chosen[slot] for slot in _PLACES if slot in chosen]


def _numbers(values: Sequence[float | None], digits: int) -> tuple[str, ...]:
    """Numbers with their points in line: the smallest has so many digits; with 0 whole ones, or two decimals."""
    known = [abs(value) for value in values if value]
    places = 0 if all(value.is_integer() for value in known) else 2
    if digits and known:
        places = max(0, digits - 1 - math.floor(math.log10(min(known))))
    return tuple("–" if value is None else f"{value:.{places}f}" for value in values)


def _depth(rig: Rig) -> float | None:
    return None if None in rig.depth else sum(rig.depth)  # type: ignore[arg-type]


def _outcome(detail: int, system: str) -> Callable[[Rig], str]:
    """How a rig came out: its room and pinch, or how far short it is and what it misses."""

    def fitting(rig: Rig) -> str:
        if not detail:
            return f"{room(rig.latitude):>5}"
        low, high = rig.pinch or ("", "")
        pinch = f"{_BRIEFLY.get(low, low)}–{_BRIEFLY.get(high, high)}" if detail == 1 else f"{low}–{high}"
        return f"{room(rig.latitude):>5} {pinch}" + (f", held by {rig.held}" if rig.held and detail == 3 else "")

    def missing(rig: Rig) -> str:
        by = f"{short(rig.shortfall) if rig.shortfall else 'gate':>5}"
        names = [verdict.name for verdict in rig.demands if verdict.verdict == "missed"]
        if detail == 1:
            names = [_BRIEFLY.get(name, name) for name in names]
        elif detail == 3:
            names = misses(rig, system)
        return f"{by} {', '.join(names)}" if detail else by

    return lambda rig: fitting(rig) if rig.fits else missing(rig)
