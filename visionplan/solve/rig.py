"""What a judgement yields: plain data for reports and interface."""

from dataclasses import dataclass
from typing import TYPE_CHECKING, Any, NamedTuple

if TYPE_CHECKING:
    from visionplan.brief.model import Brief
    from visionplan.catalogue.items import Catalogue

Value = float | str | tuple[float, float] | None
"""A number in the verdict's unit, a range of them, words, or nothing known."""


class Verdict(NamedTuple):
    """How one demand or gate came out for one rig."""

    name: str
    lo: float | None
    """Least magnification that holds it; None where there is no such bound."""
    hi: float | None
    asked: Value
    got: Value
    unit: str
    """Of asked and got: mm, 1, x, lp/mm, 1/s, electrons …; "" for words."""
    verdict: str
    """met, missed, unknown or not asked."""
    gate: bool = False
    never: bool = False
    """Whether no magnification holds it (lo and hi are None then)."""


class Contrast(NamedTuple):
    """Modulation of the smallest feature in focus, at the nearest and at the farthest plane; negative when reversed."""

    focus: float
    above: float
    below: float


@dataclass(frozen=True, eq=False)
class Rig:
    """A pair with its spacer stack, f-stop, orientation, camera grid and working point. Lengths in mm."""

    rank: int
    camera: str
    lens: str
    spacers: tuple[str, ...]
    extension: float
    """Length of the spacer stack."""
    orientation: str
    """landscape or portrait"""
    grid: tuple[int, int]
    stop: float
    stops: tuple[float, ...]
    """Every stop that fits."""
    fits: bool
    grade: str | None
    """comfortable, fair or tight; None when it doesn't fit."""
    unknown: tuple[str, ...]
    """Demands and gates that can't be judged for what the catalogue leaves out."""
    span: tuple[float, float] | None
    latitude: float
    shortfall: float
    pinch: tuple[str, str] | None
    held: str | None
    magnification: float | None
    working_distance: float | None
    """From lens front to reference plane."""
    sampling: float | None
    """Pitch over magnification, at the focus plane, mm a pixel."""
    field: tuple[float | None, float | None]
    """Width and height of one camera's picture at the focus plane; None across the row of a line-scan camera."""
    depth: tuple[float | None, float | None]
    """From the focus plane towards and away from the lens."""
    exposure: float | None
    """s"""
    snr: float | None
    snr_corner: float | None
    needed_illuminance: float | None
    """lx"""
    contrast: Contrast | None
    hyperfocal: float | None
    length: float | None
    """From the reference plane to the camera back."""
    price: float | None
    demands: tuple[Verdict, ...]
    """Demands, then gates, in the order of the tables."""
    assumptions: tuple[str, ...]
    """Assumptions and warnings, in sentences."""
    missed_gates: tuple[str, ...]
    case: Any
    """The `Case` behind it: every number that went in, as scalars."""


@dataclass(frozen=True)
class Concession:
    """The smallest change of one demand that lets at least one rig fit, all others as asked."""

    demand: str
    asked: float
    needed: float
    unit: str
    end: str | None
    """nearer or farther, for reach."""
    camera: str
    lens: str


@dataclass(frozen=True, eq=False)
class Ranking:
    """The rigs found for a brief."""

    brief: "Brief"
    catalogue: "Catalogue"
    order: str
    pairs: int
    fitting: int
    rigs: tuple[Rig, ...]
    concessions: tuple[Concession, ...] | None
    """None when they were not worked out."""
    seconds: float
    """Time the solve took."""
    notes: tuple[str, ...]
    """What holds of the whole ranking: contradictions within the brief, say."""
