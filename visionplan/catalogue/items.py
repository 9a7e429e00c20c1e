"""The items of a catalogue and their columns, declared once: reader, checker, mapper and guide all read this table."""

from collections.abc import Sequence
from dataclasses import dataclass, field

import numpy as np


@dataclass(frozen=True, eq=False)
class Column:
    """One column of an item's table."""

    name: str
    """The heading without its unit, as written in the files."""
    doc: str
    """What it is, in a sentence: for the guide and for error messages."""
    kind: str = "text"
    """text, number (a quantity in `unit`), count (whole), choice (of `choices`) or stops (numbers parted by spaces)."""
    unit: str = ""
    """The unit that the core computes in; "" for a plain number. A count may leave it out."""
    low: float = 0.0
    """Least value allowed."""
    high: float = float("inf")
    """Greatest value allowed; infinity itself never is."""
    open_low: bool = True
    """Whether `low` itself is refused."""
    required: bool = False
    """Whether an empty cell, or a missing column, is an error."""
    choices: tuple[str, ...] = ()
    """The words allowed, for kind choice."""
    currency: bool = False
    """Whether the heading's brackets may name a currency."""


def _positive(name: str, unit: str, doc: str, **more) -> Column:
    return Column(name, doc, "number", unit, **more)


def _not_negative(name: str, unit: str, doc: str, **more) -> Column:
    return Column(name, doc, "number", unit, open_low=False, **more)


def _any_sign(name: str, unit: str, doc: str, **more) -> Column:
    return Column(name, doc, "number", unit, low=float("-inf"), **more)


_ID = Column("id", "The name the item goes by; no two alike in a file.", required=True)
_MOUNT = Column("mount", "The thread or bayonet: C, CS, F, M42, …", required=True)
_MAKER = Column("maker", "Who makes it.")
_PRICE = _not_negative("price", "", "Price, in the catalogue's one currency.", currency=True)
_STOCK = Column("stock", "How many are in stock.", "count", open_low=False)
_MASS = _positive("mass", "g", "Mass.")
_FLANGE = _positive("flange distance", "mm", "Flange focal distance of the mount.")

LENS_COLUMNS = (
    _ID,
    _MOUNT,
    _MAKER,
    Column("kind", "entocentric when empty.", "choice", choices=("entocentric", "telecentric")),
    _positive("focal length", "mm", "Focal length; not needed of a telecentric lens."),
    _positive("f-number min", "", "Smallest f-number, fully open.", required=True),
    _positive("f-number max", "", "Greatest f-number; not needed of a telecentric lens."),
    _positive("nearest object", "mm", "Nearest object distance from the lens front; not needed of a telecentric lens."),
    _positive("magnification", "", "Magnification of a telecentric lens."),
    _positive("working distance", "mm", "Working distance of a telecentric lens, from its front."),
    _positive("nearest magnification", "", "Magnification at the nearest object distance."),
    Column(
        "stops", "The f-numbers that can be set, parted by spaces, where they aren't the full-stop series.", "stops"
    ),
    _positive("image circle", "mm", "Diameter of the image circle."),
    _any_sign("distortion", "1", "Greatest distortion over the image circle, with its sign."),
    _positive("detail limit", "lp/mm", "Resolution on the sensor."),
    _positive("transmittance", "1", "Fraction of the light that passes.", high=1.0),
    _positive("pupil ratio", "", "Exit over entrance pupil diameter."),
    _any_sign("front principal", "mm", "From the front of the lens back to its front principal plane."),
    _positive("length", "mm", "From the front of the lens to its mounting flange."),
    _positive("diameter", "mm", "Greatest outer diameter."),
    _MASS,
    _PRICE,
    _STOCK,
    _not_negative("focal tolerance", "1", "Tolerance of the focal length, a fraction of it.", high=1.0),
    _FLANGE,
    _not_negative("working distance tolerance", "mm", "Of a telecentric lens: how far off it still holds its values."),
    _not_negative(
        "telecentricity", "rad", "Of a telecentric lens: greatest angle of a chief ray to the axis.", high=1.5
    ),
)

CAMERA_COLUMNS = (
    _ID,
    _MOUNT,
    _MAKER,
    Column("kind", "area when empty.", "choice", choices=("area", "line")),
    Column("pixels wide", "Pixels along the sensor's long side, or along the row.", "count", "px", required=True),
    Column("pixels high", "Pixels along the other side; 1 for one row.", "count", "px", required=True),
    _positive("pixel pitch", "mm", "Distance from pixel to pixel.", required=True),
    Column("colour", "mono or colour.", "choice", choices=("mono", "colour")),
    Column("shutter", "global or rolling.", "choice", choices=("global", "rolling")),
    Column("interface", "GigE Vision, USB3 Vision, …"),
    _positive("cable limit", "mm", "Longest cable of the interface."),
    _positive("frame rate", "1/s", "Frames in a second."),
    _positive("line rate", "1/s", "Rows in a second, of a line-scan camera."),
    Column("bit depth", "Bits of a pixel value.", "count", "bit", high=64),
    _positive("shortest exposure", "s", "Shortest exposure time."),
    _positive("quantum efficiency", "1", "At the wavelength in use, or at its peak.", high=1.0),
    _not_negative("dark noise", "e", "Temporal dark noise."),
    _positive("saturation capacity", "e", "Electrons that fill a pixel."),
    _positive("length", "mm", "From its mounting flange to its back, without the cable."),
    _MASS,
    _not_negative("power", "W", "Power taken."),
    _PRICE,
    _STOCK,
    _FLANGE,
)

SPACER_COLUMNS = (
    _ID,
    _MOUNT,
    _positive("length", "mm", "How far it moves the lens from the camera.", required=True),
    Column(
        "camera mount", "Of an adapter: the thread or bayonet on its camera side, where `mount` is on its lens side."
    ),
    _positive("travel", "mm", "Of a helicoid: how much longer it can be made."),
    _PRICE,
    Column("quantity", "How many there are; no limit when empty.", "count", open_low=False),
)

COLUMNS: dict[str, tuple[Column, ...]] = {"lenses": LENS_COLUMNS, "cameras": CAMERA_COLUMNS, "spacers": SPACER_COLUMNS}

REQUIRED_OF_KIND: dict[str, tuple[str, ...]] = {
    "entocentric": ("focal length", "f-number max", "nearest object"),
    "telecentric": ("magnification", "working distance"),
}
"""What a lens must state beside the columns that every lens must."""


@dataclass(frozen=True)
class Table:
    """The rows of one file, column by column.

    `table["focal length"]` is an array of floats in the column's unit, NaN where not stated (kinds number and
    count); a list of strings, "" where not stated (text and choice); a list of tuples of floats, () where not stated
    (stops). Every column of the item is there, whether the file had it or not.
    """

    item: str
    """lenses, cameras or spacers."""
    values: dict[str, np.ndarray | list]
    lines: Sequence[int]
    """The line of the file where each row begins."""
    file: str = ""
    notes: tuple[str, ...] = ()
    """Headings of the file that are no columns of ours; `table[heading]` is a list of strings too."""
    currency: str = ""
    """Of its prices, "" where the heading names none."""
    index: dict[str, int] = field(default_factory=dict)
    """Row by id."""

    def __getitem__(self, column: str):
        return self.values[column]

    def __len__(self) -> int:
        return len(self.lines)


@dataclass(frozen=True)
class Catalogue:
    """A folder's lenses, cameras and spacers."""

    lenses: Table
    cameras: Table
    spacers: Table
    fingerprint: str
    """sha256:… over the files' bytes."""
    warnings: tuple[str, ...] = ()
    """What was skipped or kept as notes, in sentences for a person."""
