"""What a brief asks for, in the symbols that the demands are written in. Computed once for a brief."""

from dataclasses import dataclass
from functools import cached_property
from math import inf, tan
from typing import NamedTuple

from visionplan.brief.model import Brief
from visionplan.optics.light import irradiance_of
from visionplan.optics.media import plate_shift

DEFAULT_MOSAIC = 1.4
DEFAULT_CABLE_ROOM = 50.0


class Arrangement(NamedTuple):
    """How the cameras stand over the field: which way they are turned and how many share it."""

    portrait: bool
    nx: int
    ny: int
    line: bool
    """Whether it is for line-scan cameras."""

    @property
    def cameras(self) -> int:
        """How many cameras it takes."""
        return self.nx * self.ny


@dataclass(frozen=True, eq=False)
class Ask:
    """The derived numbers of a brief. Lengths in mm, times in s; `inf` for no limit."""

    brief: Brief

    @cached_property
    def q(self) -> float:
        """Sampling asked for on the part, mm a pixel."""
        return self.brief.feature / self.brief.pixels_per_feature

    @cached_property
    def z(self) -> float:
        """Height of the focus plane over the reference plane."""
        plane = self.brief.focus_plane
        return (self.brief.above - self.brief.below) / 2 if plane is None else plane

    @cached_property
    def A(self) -> float:
        """How far the part rises over the focus plane."""
        return self.brief.above - self.z

    @cached_property
    def B(self) -> float:
        """How far the part reaches below the focus plane."""
        return self.brief.below + self.z

    @cached_property
    def D(self) -> float:
        """By how much the layers bring the image of the part nearer."""
        return float(sum(plate_shift(layer.thickness, layer.index) for layer in self.brief.layers))

    @cached_property
    def beta(self) -> float:
        """Blur of focus allowed on the part."""
        stated, pixels = self.brief.focus_blur, self.brief.focus_blur_pixels
        return stated if stated is not None else (1.0 if pixels is None else pixels) * self.q

    @cached_property
    def beta_v(self) -> float:
        """Blur of motion allowed on the part."""
        stated, pixels = self.brief.motion_blur, self.brief.motion_blur_pixels
        return stated if stated is not None else (1.0 if pixels is None else pixels) * self.q

    @cached_property
    def v(self) -> float:
        """Speed of the part, 0 at rest."""
        return self.brief.speed or 0.0

    @cached_property
    def mosaic(self) -> float:
        """κ of a colour camera."""
        return DEFAULT_MOSAIC if self.brief.mosaic_factor is None else self.brief.mosaic_factor

    @cached_property
    def cable_room(self) -> float:
        """Room that the cable takes behind the camera."""
        return DEFAULT_CABLE_ROOM if self.brief.cable_room is None else self.brief.cable_room

    @cached_property
    def irradiance(self) -> float | None:
        """On the part, W/m²; None where the brief states no light level."""
        if self.brief.illuminance is not None:
            return float(irradiance_of(self.brief.illuminance, self.brief.wavelength))
        return self.brief.irradiance

    @cached_property
    def longest_exposure(self) -> float:
        """What pulse, motion blur, rate and the longest exposure leave; a line period not counted."""
        if self.brief.pulse is not None:
            return self.brief.pulse
        limits = [self.brief.max_exposure or inf]
        if self.v:
            limits.append(self.beta_v / self.v)
        if self.brief.rate:
            limits.append(1 / self.brief.rate)
        return min(limits)

    @cached_property
    def W_all(self) -> float:
        """Width to cover, placement added."""
        return self.brief.field[0] + 2 * self.brief.placement

    @cached_property
    def H_all(self) -> float:
        """Height to cover, placement added."""
        return self.brief.field[1] + 2 * self.brief.placement

    def covered(self, arrangement: Arrangement) -> tuple[float, float]:
        """Width and height that one camera must cover; 0 across the row of a line-scan camera."""
        overlap = self.brief.overlap
        W = (self.W_all + (arrangement.nx - 1) * overlap) / arrangement.nx
        H = (self.H_all + (arrangement.ny - 1) * overlap) / arrangement.ny
        if arrangement.line:
            return (0.0, H) if arrangement.portrait else (W, 0.0)
        return W, H

    def slack(self, arrangement: Arrangement) -> float:
        """g: what distance tolerance and tilt add to the depth on both sides."""
        return self.brief.working_distance_tolerance + max(self.covered(arrangement)) * tan(self.brief.tilt) / 2

    @cached_property
    def arrangements(self) -> tuple[Arrangement, ...]:
        """Every orientation and grid allowed, for area and for line-scan cameras."""
        most = self.brief.max_count
        area = [
            Arrangement(portrait, nx, ny, False)
            for portrait in (False, True)
            for nx in range(1, most + 1)
            for ny in range(1, most // nx + 1)
        ]
        portrait = self.brief.along == "width"
        rows = [Arrangement(portrait, *((1, n) if portrait else (n, 1)), True) for n in range(1, most + 1)]
        return tuple(area + rows)
