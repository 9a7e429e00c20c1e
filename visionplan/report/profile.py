"""What stands where along the optical axis of a rig: the stations of its elevation, in mm.

Stations are counted from the reference plane, negative towards the lens; a folded path is taken unfolded.
"""

import math
from dataclasses import dataclass
from functools import cached_property

from visionplan.solve.rig import Rig


@dataclass(frozen=True)
class Profile:
    """A rig at its working point, seen from the side."""

    rig: Rig

    @cached_property
    def side(self) -> str:
        """The side of the field that is seen: its height; its width where a line-scan camera sees nothing else."""
        return "width" if self.rig.field[1] is None else "height"

    @cached_property
    def seen(self) -> float:
        """What the camera sees of that side at the focus plane."""
        return self.rig.field[self.side == "height"] or 0.0

    @cached_property
    def asked(self) -> float:
        """What it must cover of it, placement included."""
        return self.rig.case.H if self.side == "height" else self.rig.case.W

    @cached_property
    def front(self) -> float:
        """The front of the lens."""
        return -(self.rig.working_distance or 0.0)

    @cached_property
    def mounting(self) -> float | None:
        """Where the rings or the camera begin: the lens flange drawn out to its focus; None where not known."""
        length = self.rig.case.lens_length
        return None if math.isnan(length) else self.front - length - max(0.0, self.extension - self.rig.extension)

    @cached_property
    def extension(self) -> float:
        """From the lens flange to the camera's: rings and focus; the rings alone where the focus is not known."""
        case = self.rig.case
        if case.telecentric or math.isnan(case.d):
            return self.rig.extension
        return max(self.rig.extension, case.f * (self.rig.magnification or 0.0) - case.d)

    @cached_property
    def flange(self) -> float | None:
        """The camera's flange."""
        return None if self.mounting is None else self.mounting - self.rig.extension

    @cached_property
    def back(self) -> float | None:
        """The camera's back."""
        length = self.rig.case.camera_length
        return None if self.flange is None or math.isnan(length) else self.flange - length

    @cached_property
    def limit(self) -> float | None:
        """Where the headroom ends, where any is asked."""
        headroom = self.rig.case.brief.headroom
        return None if headroom is None else -headroom

    @cached_property
    def cable(self) -> float | None:
        """How far the cable needs room behind the camera, where headroom is asked."""
        return None if self.back is None or self.limit is None else self.back - self.rig.case.ask.cable_room

    @cached_property
    def top(self) -> float:
        """The part's nearest surface."""
        return -self.rig.case.brief.above

    @cached_property
    def bottom(self) -> float:
        """The part's farthest surface."""
        return self.rig.case.brief.below

    @cached_property
    def layers(self) -> list[tuple[float, float]]:
        """The layers, in the brief's order, the last against the reference plane: where they stand changes nothing."""
        found: list[tuple[float, float]] = []
        end = 0.0
        for layer in reversed(self.rig.case.brief.layers):
            found.insert(0, (end - layer.thickness, end))
            end -= layer.thickness
        return found

    @cached_property
    def mirror(self) -> float | None:
        """The first fold mirror."""
        fold = self.rig.case.brief.fold
        return None if fold is None else self.front + fold.from_lens

    def half(self, station: float) -> float:
        """Half of what is seen at a station between lens and part: the cone from the entrance pupil.

        Exact in air; through layers its edge is drawn straight.
        """
        focus = -self.rig.case.z
        share = (station - self.front) / (focus - self.front)
        return self.half_at_front + share * (self.seen / 2 - self.half_at_front)

    @cached_property
    def half_at_front(self) -> float:
        """Half of what passes the lens front towards the field's edges, chief rays."""
        case, m = self.rig.case, self.rig.magnification
        if case.telecentric or not m:
            return self.seen / 2
        u = case.u(m)
        in_air = -case.z - self.front - case.D
        return max(0.0, self.seen / 2 * (1 - in_air / u))

    @cached_property
    def widest(self) -> float:
        """Half of what is seen where that is most."""
        return max(self.half(self.front), self.half(max(self.bottom, 0.0)))

    @cached_property
    def solid(self) -> float:
        """The height of the highest thing that stands along the axis."""
        lens = self.rig.case.lens_diameter
        return max(self.asked, 0.0 if math.isnan(lens) else lens)

    @cached_property
    def high(self) -> float:
        """The height of all that is drawn."""
        return max(2 * self.widest, self.solid)

    @cached_property
    def not_stated(self) -> dict[str, str]:
        """What the catalogue leaves out that a drawing needs, and how it is drawn without it."""
        case = self.rig.case
        told = {}
        if math.isnan(case.lens_length):
            told["lens length"] = "lens and camera are marks, not to scale"
        elif math.isnan(case.camera_length):
            told["camera length"] = "the camera is a mark, not to scale"
        if not case.telecentric and math.isnan(case.d):
            told["flange distance"] = "the lens is drawn without what focusing draws it out"
        if math.isnan(case.lens_diameter):
            told["lens diameter"] = "drawn one row high"
        return told
