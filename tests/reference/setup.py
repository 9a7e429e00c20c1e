"""One way to set a pair up (orientation, grid, spacers, stop), with every number that a judgement of it needs."""

import math
from functools import cached_property

from tests.reference import light, parts
from tests.reference.laws import Optics, layer_shift


class Setup:
    """Lengths in mm; the names are those of the model."""

    def __init__(self, brief, camera, lens, portrait, grid, stack, stop):
        self.brief, self.camera, self.lens = brief, camera, lens
        self.portrait, self.grid, self.stack, self.stop = portrait, grid, stack, stop
        self.optics = Optics(lens.focal_length, stop, lens.pupil_ratio, lens.telecentric)
        self.geometry = self.optics._replace(f_number=0.0)  # for checks that no stop changes: one search serves all

    # What must be seen

    @cached_property
    def q(self):
        """Sampling asked for, mm a pixel."""
        return self.brief.feature / self.brief.pixels_per_feature

    @cached_property
    def whole_field(self):
        return tuple(side + 2 * self.brief.placement for side in self.brief.field)

    @cached_property
    def field(self):
        """W, H that one camera must cover."""
        return tuple(
            (side + (n - 1) * self.brief.overlap) / n for side, n in zip(self.whole_field, self.grid, strict=True)
        )

    @cached_property
    def focus_height(self):
        """z over the reference plane."""
        if self.brief.focus_plane is None:
            return (self.brief.above - self.brief.below) / 2
        return self.brief.focus_plane

    @cached_property
    def nearer(self):
        """A"""
        return self.brief.above - self.focus_height

    @cached_property
    def farther(self):
        """B"""
        return self.brief.below + self.focus_height

    @cached_property
    def slack(self):
        """g"""
        w, h = self.field
        widest = max(w, h) if not self.camera.line_scan else h if self.portrait else w
        return self.brief.working_distance_tolerance + widest / 2 * math.tan(self.brief.tilt)

    @cached_property
    def focus_blur(self):
        """β"""
        return self._blur(self.brief.focus_blur, self.brief.focus_blur_pixels)

    @cached_property
    def motion_blur(self):
        """β_v"""
        return self._blur(self.brief.motion_blur, self.brief.motion_blur_pixels)

    def _blur(self, length, pixels):
        if length is not None:
            return length
        return self.q * (1.0 if pixels is None else pixels)

    # The sensor

    @cached_property
    def sides(self):
        """w, h of the sensor along the field's width and height."""
        long = self.camera.pixels_wide * self.camera.pitch
        short = self.camera.pixels_high * self.camera.pitch
        return (short, long) if self.portrait else (long, short)

    @cached_property
    def diagonal(self):
        return math.hypot(*self.sides)

    @cached_property
    def mosaic(self):
        """κ"""
        if self.camera.row["colour"] != "colour":
            return 1.0
        return 1.4 if self.brief.mosaic_factor is None else self.brief.mosaic_factor

    @cached_property
    def line_speed(self):
        """Of the part over a line-scan camera; 0 where there is none."""
        return (self.brief.speed or 0.0) if self.camera.line_scan else 0.0

    # The stack of parts

    @cached_property
    def count(self):
        return self.grid[0] * self.grid[1]

    @cached_property
    def extension(self):
        return sum(ring.length for ring in self.stack)

    @cached_property
    def flange_difference(self):
        return parts.flange_difference(self.camera, self.lens)

    @cached_property
    def least_extension(self):
        """e: of the lens beyond its infinity focus, with the ring turned in."""
        return None if self.flange_difference is None else self.flange_difference + self.extension

    @cached_property
    def price(self):
        prices = [self.camera.row["price"], self.lens.row["price"], *(ring.price for ring in self.stack)]
        return None if None in prices else self.count * sum(prices)

    @cached_property
    def layer_shift(self):
        """D"""
        return layer_shift(self.brief.layers)

    # Light

    @cached_property
    def part_irradiance(self):
        """W/m²; None where the brief states no light."""
        if self.brief.irradiance is not None:
            return self.brief.irradiance
        if self.brief.illuminance is None:
            return None
        return self.brief.illuminance / (light.LUMENS_PER_WATT * light.luminosity(self.brief.wavelength))

    @cached_property
    def time_limit(self):
        """Pulse, or the shortest of what motion, rate and brief allow; infinite where nothing does."""
        if self.brief.pulse is not None:
            return self.brief.pulse
        times = [math.inf]
        if self.brief.speed:
            times.append(self.motion_blur / self.brief.speed)
        if self.brief.rate is not None:
            times.append(1 / self.brief.rate)
        if self.brief.max_exposure is not None:
            times.append(self.brief.max_exposure)
        return min(times)

    def lit(self, irradiance):
        """What light there is with so much on the part; None where the catalogue or brief leaves out what it needs."""
        row = self.camera.row
        line_speed = 0.0 if self.brief.pulse is not None else self.line_speed
        saturation = row["saturation capacity"]
        unlimited = math.isinf(self.time_limit) and not line_speed and saturation is None
        if irradiance is None or self.brief.reflectance is None or row["quantum efficiency"] is None or unlimited:
            return None
        transmittance = self.lens.row["transmittance"] or 0.9
        return light.Lit(
            pitch=self.camera.pitch,
            wavelength=self.brief.wavelength,
            quantum_efficiency=row["quantum efficiency"],
            reflected=irradiance * self.brief.reflectance * transmittance,
            time_limit=self.time_limit,
            line_speed=line_speed,
            saturation=math.inf if saturation is None else saturation,
            noise=light.noise_variance(row),
        )
