"""The lines of a brief, declared once: reader, editor, starter and guide all read this table."""

import math
from dataclasses import dataclass
from typing import Any

from visionplan.brief.model import Brief

SECTIONS = {
    "": "The cell as a whole",
    "scene": "The part, and what has to be seen on it",
    "station": "Where camera and lens may stand, and what lies between them and the part",
    "motion": "How the part moves",
    "light": "The light on the part, and the time there is to gather it",
    "focus": "What has to be sharp",
    "choose": "What to choose from",
}
"""The sections of the file in their order; "" is what stands before the first."""

TASKS = {"presence": 3, "edge": 4, "gauge": 10, "code": 4, "characters": 3}
"""Pixels across the smallest feature by task (common practice); of a code its module, of characters their stroke."""

RIVALS = {
    "scene.task": "scene.pixels_per_feature",
    "motion.blur": "motion.blur_pixels",
    "focus.blur": "focus.blur_pixels",
    "light.irradiance": "light.illuminance",
}
"""Lines that state one thing in two ways: only one of the two may stand."""


@dataclass(frozen=True, eq=False)
class Limits:
    """What a number must lie within, ends included, and its unit."""

    low: float = -math.inf
    high: float = math.inf
    words: str = ""
    """The limits in words."""
    unit: str = ""
    """The unit that the core computes in; "" for a plain number."""
    written: str = ""
    """The unit that the program writes it in, where that isn't `unit`."""


@dataclass(frozen=True, eq=False)
class Line:
    """One line of the brief."""

    key: str
    """section.name, as faults name it."""
    kind: str
    """quantity (with a unit), fraction, number, count, yes, text, choice, names; pair (two quantities), range (the
    same, the smaller first), plane, layers and fold; material within a layer."""
    doc: str
    example: str
    """A value as it stands in the file."""
    limits: Limits = Limits()
    choices: tuple[str, ...] = ()
    alias: str = ""
    """Its attribute of `Brief`, where that isn't the name."""
    required: bool = False
    parts: tuple["Line", ...] = ()
    """What a table holds, for layers and fold."""

    @property
    def section(self) -> str:
        """The section it stands in; "" before the first."""
        return self.key.rpartition(".")[0]

    @property
    def name(self) -> str:
        """The word before the equals sign."""
        return self.key.rpartition(".")[2]

    @property
    def attribute(self) -> str:
        """Its attribute of `Brief`."""
        return self.alias or self.name

    @property
    def default(self) -> Any:
        """What the brief takes where the line is left out; meaningless where it is required."""
        return Brief.__dataclass_fields__[self.attribute].default


SIZE = Limits(1e-6, 1e6, "from 1 nm to 1 km", "mm")
HEIGHT = Limits(0, 1e6, "from 0 to 1 km", "mm")
CABLE = Limits(0, 1e6, "from 0 to 1 km", "mm", "m")
PLANE = Limits(-1e6, 1e6, "", "mm")
WAVELENGTH = Limits(150e-6, 20e-3, "from 150 nm to 20 µm", "mm", "nm")
EXPOSURE = Limits(1e-9, 3600, "from 1 ns to 1 h", "s", "ms")
PULSE = Limits(1e-9, 3600, "from 1 ns to 1 h", "s", "us")
TILT = Limits(0, math.nextafter(math.pi / 2, 0), "from 0 to less than 90 deg", "rad", "deg")
SPEED = Limits(0, 1e6, "from 0 to 1 km/s", "mm/s")
RATE = Limits(1 / 3600, 1e6, "from 1 / h to 1 MHz", "1/s", "/ s")
ILLUMINANCE = Limits(1e-3, 1e9, "from 0.001 lx to 1000000 klx", "lx")
IRRADIANCE = Limits(1e-6, 1e7, "from 0.000001 W/m^2 to 10000 kW/m^2", "W/m^2")
MASS = Limits(0.01, 1e6, "from 10 mg to 1000 kg", "g")
COMFORT = Limits(0, 10, "from 0 to 1000 %", "1", "%")
SHARE = Limits(0, 1, "from 0 to 100 %", "1", "%")
SOME_SHARE = Limits(1e-5, 1, "from 0.001 % to 100 %", "1", "%")
PIXELS = Limits(0.01, 1e4, "from 0.01 to 10000")
MOSAIC = Limits(1, 10, "from 1 to 10")
INDEX = Limits(1, 10, "from 1 to 10")
SNR = Limits(0.01, 1e6, "from 0.01 to 1000000")
PRICE = Limits(0, 1e12, "from 0 to 1000000000000")
CAMERAS = Limits(1, 64, "from 1 to 64")
MIRRORS = Limits(1, 16, "from 1 to 16")

_LAYER = (
    Line("layers.material", "material", "Its name", '"N-BK7"'),
    Line("layers.index", "number", "Or its refractive index", "1.333", INDEX),
    Line("layers.thickness", "quantity", "How thick it is", '"6 mm"', SIZE, required=True),
)
_FOLD = (
    Line("fold.from_lens", "quantity", "From the lens front to the first mirror", '"120 mm"', SIZE, required=True),
    Line("fold.mirrors", "count", "How many mirrors", "1", MIRRORS),
)
_LAYERS = '[{ material = "N-BK7", thickness = "6 mm" }, { index = 1.333, thickness = "20 mm" }]'
_BOTH_KINDS = '["entocentric", "telecentric"]'

LINES = (
    Line("title", "text", "What the cell is called", '"Jar lids, line 3"'),
    Line("comfort", "fraction", "Latitude from which a rig is comfortable", '"20 %"', COMFORT),
    Line("strict", "yes", "Whether what a catalogue leaves out counts as missed", "false"),
    Line("units", "choice", "What people read: mm or inch", '"mm"', choices=("mm", "inch")),
    Line(
        "scene.field",
        "pair",
        "Width and height that must be in the picture",
        '["120 mm", "90 mm"]',
        SIZE,
        required=True,
    ),
    Line("scene.feature", "quantity", "Smallest feature that must be seen", '"0.4 mm"', SIZE, required=True),
    Line("scene.pixels_per_feature", "number", "Pixels across that feature", "4", PIXELS),
    Line(
        "scene.task",
        "choice",
        f"Or the task, with its usual number: {', '.join(TASKS)}",
        '"edge"',
        choices=tuple(TASKS),
    ),
    Line("scene.above", "quantity", "How far the part rises over the reference plane", '"4 mm"', HEIGHT),
    Line("scene.below", "quantity", "How far it reaches below that plane", '"1 mm"', HEIGHT),
    Line("scene.max_perspective", "fraction", "Greatest change of scale over the part's height", '"2 %"', SOME_SHARE),
    Line("scene.placement", "quantity", "How far off centre a part may lie", '"3 mm"', HEIGHT),
    Line("scene.mosaic_factor", "number", "What a colour mosaic costs in sampling", "1.4", MOSAIC),
    Line(
        "station.working_distance",
        "range",
        "From the lens front to the reference plane: nearest, farthest",
        '["250 mm", "450 mm"]',
        SIZE,
        required=True,
    ),
    Line("station.headroom", "quantity", "From the reference plane to what hangs over it", '"700 mm"', SIZE),
    Line("station.cable_room", "quantity", "Room for the cable behind the camera", '"50 mm"', HEIGHT),
    Line("station.working_distance_tolerance", "quantity", "How far off the distance may be, ±", '"3 mm"', HEIGHT),
    Line("station.tilt", "quantity", "How far out of square the camera looks at the part", '"1 deg"', TILT),
    Line("station.layers", "layers", "Cover glass or liquid between lens and part", _LAYERS, parts=_LAYER),
    Line(
        "station.fold",
        "fold",
        "Mirrors that fold the path: where the first stands, how many",
        '{ from_lens = "120 mm", mirrors = 1 }',
        parts=_FOLD,
    ),
    Line("motion.speed", "quantity", "How fast the part moves while it is seen", '"300 mm/s"', SPEED),
    Line(
        "motion.along",
        "choice",
        "Side of the field it moves along: width or height",
        '"width"',
        choices=("width", "height"),
    ),
    Line(
        "motion.blur_pixels", "number", "Greatest motion blur, in asked pixels", "1", PIXELS, alias="motion_blur_pixels"
    ),
    Line("motion.blur", "quantity", "Or as a length on the part", '"0.05 mm"', SIZE, alias="motion_blur"),
    Line("motion.rate", "quantity", "Parts or pictures in a second", '"4 / s"', RATE),
    Line("light.illuminance", "quantity", "Light on the part, as the eye weighs it", '"20 klx"', ILLUMINANCE),
    Line("light.irradiance", "quantity", "Or its power, needed where the eye sees nothing", '"30 W/m^2"', IRRADIANCE),
    Line("light.reflectance", "fraction", "How much of it the part throws back", "0.5", SOME_SHARE),
    Line("light.wavelength", "quantity", "Wavelength of the light", '"550 nm"', WAVELENGTH),
    Line("light.snr", "number", "Signal-to-noise ratio, electrons over noise", "40", SNR),
    Line("light.max_exposure", "quantity", "Longest exposure", '"5 ms"', EXPOSURE),
    Line("light.pulse", "quantity", "How long the light flashes, if it does", '"50 us"', PULSE),
    Line(
        "focus.plane",
        "plane",
        "Where focus lies: middle, reference, or a height over it",
        '"middle"',
        PLANE,
        alias="focus_plane",
    ),
    Line(
        "focus.blur_pixels",
        "number",
        "Greatest blur of focus, in asked pixels",
        "1.0",
        PIXELS,
        alias="focus_blur_pixels",
    ),
    Line("focus.blur", "quantity", "Or as a length on the part", '"0.1 mm"', SIZE, alias="focus_blur"),
    Line("focus.min_contrast", "fraction", "Least contrast of the smallest feature", '"20 %"', SHARE),
    Line("choose.sensor", "choice", "Kind of sensor: mono, colour or any", '"mono"', choices=("mono", "colour", "any")),
    Line("choose.mounts", "names", "Lens mounts", '["C", "CS"]'),
    Line("choose.interfaces", "names", "Camera interfaces", '["GigE Vision"]'),
    Line("choose.cable", "quantity", "Length of the camera's cable", '"30 m"', CABLE),
    Line("choose.max_distortion", "fraction", "Greatest distortion", '"1 %"', SHARE),
    Line("choose.max_count", "count", "How many cameras may share the field", "1", CAMERAS),
    Line("choose.overlap", "quantity", "How far their pictures overlap", '"5 mm"', HEIGHT),
    Line("choose.max_price", "number", "Highest price, in the catalogue's currency", "3000", PRICE),
    Line("choose.max_mass", "quantity", "Greatest mass of camera and lens together", '"600 g"', MASS),
    Line("choose.max_diameter", "quantity", "Greatest diameter of the lens", '"60 mm"', SIZE),
    Line("choose.min_yield", "fraction", "Least share of the rigs built in which all must hold", '"95 %"', SHARE),
    Line("choose.lens_kinds", "names", "Kinds of lens", _BOTH_KINDS, choices=("entocentric", "telecentric")),
    Line("choose.in_hand", "yes", "Only what is in stock", "false"),
    Line("choose.cameras", "names", "Only these cameras, by id", '["id"]'),
    Line("choose.lenses", "names", "Only these lenses, by id", '["id"]'),
)

BY_KEY = {line.key: line for line in LINES}

_NOUNS = {
    "pair": "a list of two lengths, each",
    "range": "a list of two lengths, the smaller first, each",
    "plane": '"middle", "reference" or a height over the reference plane',
    "fraction": "a fraction",
    "number": "a number",
    "count": "a whole number",
    "yes": "true or false",
    "text": "words in quotes",
    "layers": "a list of layers, each with a thickness and either material or index",
    "fold": "a table with from_lens and mirrors",
}
_QUANTITIES = {
    "mm": "a length",
    "s": "a time",
    "rad": "an angle",
    "g": "a mass",
    "lx": "an illuminance",
    "W/m^2": "an irradiance",
    "1/s": "a rate",
    "mm/s": "a speed",
}


def expected(line: Line) -> str:
    """What the line takes, in words, with an example.

    >>> expected(BY_KEY["scene.feature"])
    'a length from 1 nm to 1 km, such as "0.4 mm"'
    """
    words = ", ".join(f'"{choice}"' for choice in line.choices)
    if line.kind == "choice":
        return f"one of {words}"
    if line.kind == "names":
        return f"a list of {words}" if words else f"a list of names, such as {line.example}"
    noun = _QUANTITIES[line.limits.unit] if line.kind == "quantity" else _NOUNS[line.kind]
    return f"{noun} {line.limits.words}".rstrip() + ("" if line.kind == "yes" else f", such as {line.example}")
