"""The elevation: a rig on its side, camera left and part right, at one scale in both directions."""

import math
from itertools import pairwise

from visionplan.report.canvas import Canvas, Segment, join
from visionplan.report.lines import to_ascii, wrap
from visionplan.report.measures import Measure, measures
from visionplan.report.profile import Profile
from visionplan.solve.rig import Rig
from visionplan.units import show

ASPECT = 2.0
"""How much higher than wide a terminal cell is taken to be."""
_ROOMY = 12
"""Rows from which the scale is told at length."""
_ROUND = (1.0, 1.2, 1.5, 2.0, 2.5, 3.0, 4.0, 5.0, 6.0, 8.0, 10.0)
"""Mantissas of the scale, in mm or inches a column."""
_FILLS = {
    "camera": ("█", "#"),
    "ring": ("▓", "o"),
    "lens": ("▒", "="),
    "layer": ("░", ":"),
    "part": ("▞", "%"),
    "plane": ("┃", "|"),
    "cone": ("·", "."),
    "cable": ("~", "~"),
    "limit": ("║", "|"),
    "mirror": ("╱", "/"),
}
"""By what is drawn: its character, and the one in ASCII."""
_DIMENSION = (("├", "─", "┤", "│"), ("|", "-", "|", "|"))
"""Left end, line, right end, and a length of one column; the second ones in ASCII."""


def elevation(rig: Rig, width: int, height: int, ascii: bool = False, system: str = "mm") -> list[str]:
    """The drawing as at most `height` lines of text.

    Parameters
    ----------
    width, height : int
        Terminal cells there are, at least 40 × 7. Where they are few, labels are left out, never the scale.
    ascii : bool
        Whether to keep to ASCII.
    system : str
        mm or inch
    """
    return join(elevation_rows(rig, width, height, ascii, system))


def elevation_rows(rig: Rig, width: int, height: int, ascii: bool = False, system: str = "mm") -> list[list[Segment]]:
    """The same as rows of segments (text, role), for a screen to style.

    Roles: camera, ring, lens, cone, layer, part, plane, cable, limit, mirror, dimension, word.
    """
    if rig.magnification is None:
        return [[(line, "word")] for line in wrap("nothing to draw: no magnification meets every demand", width)]
    return _Drawing(Profile(rig), width, height, ascii, system).rows()


class _Drawing:
    """One elevation: what there is room for, the scale that follows, then what is drawn."""

    def __init__(self, profile: Profile, width: int, height: int, ascii: bool, system: str):
        self.profile = profile
        self.width = width
        self.roomy = height >= _ROOMY
        self.ascii = ascii
        self.system = system
        known = (profile.back, profile.flange, profile.front, profile.cable, profile.limit)
        self.left = min(station for station in known if station is not None)
        self.right = max(profile.bottom, 0.0)
        self.marks = 2 if profile.flange is None else 1 if profile.back is None else 0
        """Columns at the left for what has no stated length."""
        self.scale = self.rounded((self.right - self.left) / (width - self.marks - 2))
        """mm a column"""
        lacking = profile.not_stated
        self.sentences = [f"not stated: {', '.join(lacking)}"] if lacking else []
        if self.roomy:
            self.sentences = [f"{name} not stated: {drawn}" for name, drawn in lacking.items()]
        self.measures: list[Measure] = []
        most = 2 * math.ceil(profile.high / (2 * ASPECT * self.scale)) + 1
        kept = min(most, max(3, height // 2))
        self.fill(height - kept)
        rows = min(most, height - len(self.measures) - len(self.lines()))
        self.middle = max(1, (rows - 1) // 2)
        self.scale = self.rounded(max(self.scale, profile.high / (ASPECT * (2 * self.middle + 1))))
        self.middle = max(self.rows_to(profile.widest), self.rows_within(profile.solid))
        while self.measures and 2 * self.middle + 1 + len(self.measures) + len(self.lines()) > height:
            self.measures.pop()  # the scale, rounded up, may have become longer to tell
        self.canvas = Canvas(width, 2 * self.middle + 1 + len(self.measures))

    def fill(self, rows: int) -> None:
        """Take what so many rows have room for, the most needed first: measures, then remarks."""
        first, *others = measures(self.profile, self.system)
        remarks = [
            f"sees {self.length(self.profile.seen)} of {self.profile.side}, {self.length(self.profile.asked)} asked"
        ]
        if self.profile.layers:
            remarks.append("layers drawn against the reference plane: where they stand changes nothing")
        if self.profile.mirror is not None:
            remarks.append(
                f"drawn unfolded: mirror {self.length(self.profile.mirror - self.profile.front)} from the lens"
            )
        for wanted in (first, *others, *remarks):
            chosen = self.measures if isinstance(wanted, Measure) else self.sentences
            chosen.append(wanted)  # type: ignore[arg-type]
            if len(self.measures) + len(self.lines()) > rows:
                chosen.pop()

    def lines(self) -> list[str]:
        """The sentences beneath the drawing."""
        column, row = self.length(self.scale), self.length(ASPECT * self.scale)
        scale = f"cells of {column} × {row}"
        if self.roomy:
            scale = f"{column} a column, {row} a row, to scale where a character is twice as high as wide"
        text = "; ".join([scale, *self.sentences])
        return wrap(to_ascii(text) if self.ascii else text, self.width)

    def length(self, value: float) -> str:
        return show(value, "mm", self.system)

    def rounded(self, scale: float) -> float:
        """The next scale that is a round number of mm or inches a column."""
        unit = 25.4 if self.system == "inch" else 1.0
        decade = 10.0 ** math.floor(math.log10(scale / unit))
        return next(mantissa * decade * unit for mantissa in _ROUND if mantissa * decade * unit >= scale * (1 - 1e-9))

    def column(self, station: float) -> int:
        """The column whose left edge is nearest to a station."""
        return self.marks + round((station - self.left) / self.scale)

    def rows_to(self, height: float) -> int:
        """Rows from the axis to the one that a height over it lies in."""
        return math.floor(height / (ASPECT * self.scale) + 0.5)

    def rows_within(self, high: float) -> int:
        """Rows at each side of the axis whose middles lie within a height."""
        return math.floor(high / 2 / (ASPECT * self.scale))

    def rows(self) -> list[list[Segment]]:
        profile = self.profile
        for start, end in profile.layers:
            self.box("layer", self.column(start), self.column(end), profile.high)
        if profile.limit is not None:
            for row in range(2 * self.middle + 1):
                self.put(row, self.column(profile.limit), "limit")
        self.cone()
        self.body()
        above, plane, below = (self.column(station) for station in (profile.top, 0.0, profile.bottom))
        self.box("part", above, max(below, plane + 1), profile.asked)
        self.box("plane", plane, plane + 1, profile.asked)
        if profile.mirror is not None:
            self.put(self.middle, self.column(profile.mirror), "mirror")
        for row, measure in enumerate(self.measures, 2 * self.middle + 1):
            self.measure(row, measure)
        return [*self.canvas.segments(), *([(line, "word")] for line in self.lines())]

    def body(self) -> None:
        """Camera, rings and lens; marks of a column each where a length isn't stated."""
        profile = self.profile
        diameter = profile.rig.case.lens_diameter
        high = 0.0 if math.isnan(diameter) else diameter
        front = self.column(profile.front)
        if profile.mounting is None or profile.flange is None:
            self.box("camera", front - 2, front - 1, high)
            self.box("lens", front - 1, front, high)
            return
        flange, mounting = self.column(profile.flange), self.column(profile.mounting)
        if profile.cable is not None and profile.back is not None:
            for column in range(self.column(profile.cable), self.column(profile.back)):
                self.put(self.middle, column, "cable")
        back = flange - 1 if profile.back is None else self.column(profile.back)
        self.box("camera", back, flange, high)
        self.box("ring", flange, mounting, high)
        self.box("lens", min(mounting, front - 1), front, high)

    def box(self, role: str, start: int, end: int, high: float) -> None:
        """Fill columns start up to, not including, end, in every row whose middle lies within a height."""
        rows = self.rows_within(high)
        for row in range(self.middle - rows, self.middle + rows + 1):
            for column in range(start, end):
                self.put(row, column, role)

    def cone(self) -> None:
        """The edges of what is seen, from the lens front to the part's farthest surface."""
        for column in range(self.column(self.profile.front), self.column(self.right)):
            station = self.left + (column - self.marks + 0.5) * self.scale
            rows = self.rows_to(self.profile.half(station))
            for row in (self.middle - rows, self.middle + rows):
                self.put(row, column, "cone")

    def put(self, row: int, column: int, role: str) -> None:
        if row <= 2 * self.middle:
            self.canvas.put(row, column, _FILLS[role][self.ascii], role)

    def measure(self, row: int, measure: Measure) -> None:
        """A line of dimension: its text within where there is room, else beside it, else left out."""
        left, line, right, narrow = _DIMENSION[self.ascii]
        columns = [self.column(station) for station in measure.stations]
        for start, end in pairwise(columns):
            text = narrow * (end - start) if end - start < 2 else left + line * (end - start - 2) + right
            self.canvas.put(row, start, text, "dimension")
        start, end = columns[0], columns[-1]
        for text in filter(None, (measure.text, measure.brief)):
            cells = len(text) + 2
            if len(columns) == 2 and end - start >= cells + 4:
                self.canvas.put(row, (start + end - cells) // 2, f" {text} ", "word")
            elif end + cells <= self.width + 1:
                self.canvas.put(row, end + 1, text, "word")
            elif start >= cells - 1:
                self.canvas.put(row, start - cells + 1, text, "word")
            else:
                continue
            return
