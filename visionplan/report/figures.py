"""The figures of a rig, each declared once: tables, files, shortlist and interface read this table."""

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass

from visionplan.catalogue.items import Catalogue
from visionplan.report.words import pinch_words
from visionplan.solve.rig import Rig
from visionplan.solve.span import TIE
from visionplan.solve.tolerance import yield_of
from visionplan.text import clean, figure
from visionplan.units import show


@dataclass(frozen=True)
class Figure:
    """One figure of a rig: what it is called and how it reads."""

    name: str
    value: Callable[[Rig], float | str | None]
    """A number in `unit`, words that are safe to show, or None where there is none."""
    unit: str = ""
    percent: bool = False
    """Whether a fraction is told in percent."""
    per: str = ""
    """What follows the unit: " a pixel"."""
    better: int = 0
    """1 where more is better, -1 where less is, 0 where neither."""
    none: str = "–"
    """What stands where there is no value."""
    words: Callable[[Rig], str] | None = None
    """How the value reads, where its unit alone doesn't tell."""

    def text(self, rig: Rig, system: str = "mm") -> str:
        """Write the figure for people, lengths in `system` (mm or inch)."""
        value = self.value(rig)
        if value is None:
            return self.none
        if self.words:
            return self.words(rig)
        if isinstance(value, str):
            return value
        return show(value, self.unit, system, percent=self.percent) + self.per


def currency(catalogue: Catalogue) -> str:
    """The catalogue's one currency, safe to show; "" where no heading names it."""
    named = (table.currency for table in (catalogue.cameras, catalogue.lenses, catalogue.spacers))
    return clean(next(filter(None, named), ""))


def money(value: float, catalogue: Catalogue) -> str:
    """Write a price with the catalogue's currency."""
    return f"{figure(value, 6)} {currency(catalogue)}".rstrip()


def room(latitude: float) -> str:
    """Write a latitude in percent, cut and not rounded, so that 19.96 % does not pass for a comfort of 20 %."""
    percent = 100 * (latitude + 2 * TIE * (1 + latitude))
    if math.isinf(percent):
        return "∞ %"
    steps = 1 if percent >= 10 else 10
    return f"{figure(math.floor(percent * steps) / steps, 6)} %"


def short(shortfall: float) -> str:
    """Write a shortfall in percent, rounded up: what does not fit is never 0 % short."""
    percent = 100 * shortfall
    steps = 1 if percent >= 10 else 10
    return f"{figure(math.ceil(percent * steps * (1 - TIE)) / steps, 6)} %"


def rings(rig: Rig) -> str:
    """The spacer stack from the camera on; "none" without one."""
    return " + ".join(map(clean, rig.spacers)) or "none"


def grid(rig: Rig) -> str:
    """How many cameras stand side by side, across and along the field."""
    return f"{rig.grid[0]} × {rig.grid[1]}"


def setup(rig: Rig) -> str:
    """Rings, orientation and grid, of each only what is not the plain case; "" for a plain rig."""
    parts = [
        rings(rig) if rig.spacers else "",
        rig.orientation if rig.orientation != "landscape" else "",
        f"{grid(rig)} cameras" if rig.grid != (1, 1) else "",
    ]
    return ", ".join(filter(None, parts))


def field(rig: Rig, system: str = "mm") -> str:
    """Width × height of one camera's picture at the focus plane; of a line-scan camera its row alone."""
    sides = [side for side in rig.field if side is not None]
    if not sides:
        return "–"
    texts = [show(side, "mm", system) for side in sides]
    unit = texts[-1].rpartition(" ")[2]
    return " × ".join([text.removesuffix(" " + unit) for text in texts[:-1]] + texts[-1:])


def contrast(plane: str) -> Callable[[Rig], float | None]:
    """A rig's contrast in the plane focus, above or below."""
    return lambda rig: None if rig.contrast is None else getattr(rig.contrast, plane)


def _share(rig: Rig) -> float | None:
    """The share of rigs built to the plan that bear their tolerances."""
    borne = yield_of(rig)
    return None if borne is None else borne.share


FIGURES: tuple[Figure, ...] = (
    Figure("grade", lambda rig: rig.grade, none="doesn't fit"),
    Figure("latitude", lambda rig: rig.latitude, "1", True, better=1, words=lambda rig: room(rig.latitude)),
    Figure("shortfall", lambda rig: rig.shortfall, "1", True, better=-1, words=lambda rig: short(rig.shortfall)),
    Figure("pinch", lambda rig: pinch_words(rig) or None),
    Figure("unknown", lambda rig: ", ".join(rig.unknown) or None, none="nothing"),
    Figure("yield", _share, "1", True, better=1),
    Figure("stop", lambda rig: rig.stop),
    Figure("stops that fit", lambda rig: ", ".join(map(figure, rig.stops)) or None),
    Figure("spacer rings", rings),
    Figure("ring length", lambda rig: rig.extension, "mm"),
    Figure("orientation", lambda rig: rig.orientation),
    Figure("cameras", grid),
    Figure("magnification", lambda rig: rig.magnification),
    Figure("working distance", lambda rig: rig.working_distance, "mm"),
    Figure("sampling", lambda rig: rig.sampling, "mm", per=" a pixel", better=-1),
    Figure("field width", lambda rig: rig.field[0], "mm"),
    Figure("field height", lambda rig: rig.field[1], "mm"),
    Figure("depth towards the lens", lambda rig: rig.depth[0], "mm", better=1),
    Figure("depth away from it", lambda rig: rig.depth[1], "mm", better=1),
    Figure("exposure", lambda rig: rig.exposure, "s"),
    Figure("signal to noise", lambda rig: rig.snr, better=1),
    Figure("same in the corner", lambda rig: rig.snr_corner, better=1),
    Figure("illuminance needed", lambda rig: rig.needed_illuminance, "lx", better=-1),
    Figure("contrast in focus", contrast("focus"), "1", True, better=1),
    Figure("contrast nearest", contrast("above"), "1", True, better=1),
    Figure("contrast farthest", contrast("below"), "1", True, better=1),
    Figure("hyperfocal distance", lambda rig: rig.hyperfocal, "mm"),
    Figure("to the camera back", lambda rig: rig.length, "mm", better=-1, none="not stated"),
    Figure(
        "price",
        lambda rig: rig.price,
        better=-1,
        none="not stated",
        words=lambda rig: money(rig.price or 0.0, rig.case.problem.catalogue),
    ),
)
BY_NAME = {entry.name: entry for entry in FIGURES}


def best(entry: Figure, rigs: Sequence[Rig]) -> frozenset[int]:
    """Places of the rigs whose figure is the best; none where nothing tells them apart."""
    values = [entry.value(rig) for rig in rigs]
    numbers = {place: entry.better * value for place, value in enumerate(values) if isinstance(value, int | float)}
    if not entry.better or not numbers:
        return frozenset()
    top = max(numbers.values())
    found = frozenset(place for place, value in numbers.items() if math.isclose(value, top, rel_tol=TIE))
    return found if len(found) < len(rigs) else frozenset()
