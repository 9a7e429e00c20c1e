"""One setup judged: where its demands hold, where it stands, whether it fits, and what it does there."""

import math
from functools import cached_property

from tests.reference import light
from tests.reference.contrast import modulation
from tests.reference.demands import DEMANDS, PLACE, depths, length, stand
from tests.reference.gates import gates
from tests.reference.interval import EVERYWHERE, all_of
from tests.reference.parts import at_most

TIE = 1e-9
GRADES = ("comfortable", "fair", "tight")


class Judgement:
    """`drop` names demands and gates not to be asked; `value` stands in for what one demand asks: (name, value)."""

    def __init__(self, setup, drop=frozenset(), value=None):
        self.setup = setup
        strict = setup.brief.strict
        self.demands, self.bounds, self.verdicts = {}, {}, {}
        for name, demand_of in DEMANDS.items():
            demand = demand_of(setup, value[1]) if value and value[0] == name else demand_of(setup)
            state = "not asked" if name in drop else demand.state
            if state == "unknown" and strict:
                state = "never"
            self.demands[name] = demand
            self.verdicts[name] = {"asked": "met", "never": "missed"}.get(state, state)
            self.bounds[name] = {"asked": all_of(demand.checks), "never": None}.get(state, EVERYWHERE)
        for name, verdict in gates(setup).items():
            if name in drop:
                verdict = "not asked"
            self.verdicts[name] = "missed" if verdict == "unknown" and strict else verdict
        self.unknown = tuple(name for name, verdict in self.verdicts.items() if verdict == "unknown")
        self._find_working_point()
        for name, bounds in self.bounds.items():
            if self.verdicts[name] == "met" and not self._holds(bounds):
                self.verdicts[name] = "missed"
        self.other_missed_gates = tuple(
            name for name, verdict in self.verdicts.items() if name not in DEMANDS and verdict == "missed"
        )
        self.contrast_asked = setup.brief.min_contrast is not None and "contrast" not in drop
        self.fits = self.span_holds and not self.misses_gate
        if not self.fits:
            self.latitude = 0.0

    @cached_property
    def contrast_verdict(self):
        """Worked out only where something depends on it: it takes long."""
        if not self.contrast_asked:
            return "not asked"
        enough = self.m is not None and at_most(self.setup.brief.min_contrast, min(self.contrast.values()))
        return "met" if enough else "missed"

    @cached_property
    def missed_gates(self):
        return self.other_missed_gates + (("contrast",) if self.contrast_verdict == "missed" else ())

    @cached_property
    def misses_gate(self):
        return bool(self.other_missed_gates) or self.contrast_verdict == "missed"

    def _holds(self, bounds):
        """At the working point; where there is none, at some magnification."""
        if bounds is None or self.m is None:
            return bounds is not None
        return at_most(bounds[0], self.m) and at_most(self.m, bounds[1])

    def _find_working_point(self):
        self.span = self.m = self.pinch = self.held = None
        self.latitude, self.shortfall, self.span_holds = 0.0, 1.0, False
        if None in self.bounds.values():
            return
        lo_name, lo, hi_name, hi = self._meet(DEMANDS)
        lo_picture, lo_p, hi_picture, hi_p = self._meet(name for name in DEMANDS if name not in PLACE)
        self.span = (lo, hi)
        fixed = self.setup.lens.magnification
        self.span_holds = at_most(lo, hi)
        if fixed is not None:
            self.m = fixed
            self.span_holds = at_most(lo, fixed) and at_most(fixed, hi)
        if not self.span_holds:
            self.pinch = (lo_name, hi_name)
            self.shortfall = 1 - hi / lo if fixed is None else 1 - min(fixed / lo if lo else math.inf, hi / fixed) ** 2
            if fixed is None:
                self.m = math.sqrt(lo * hi)
            return
        self.shortfall, self.pinch = 0.0, (lo_picture, hi_picture)
        if fixed is None:
            # one-sided only where a toll drops cover or sampling: any finite point serves
            middle = math.sqrt(max(lo_p, 1e-6) * min(hi_p, 1e3))
            self.m = min(max(middle, lo), hi)
            self.held = lo_name if middle < lo else hi_name if middle > hi else None
        ratio = min(self.m / lo_p if lo_p else math.inf, hi_p / self.m)
        self.latitude = max(0.0, ratio**2 - 1)

    def _meet(self, names):
        """Greatest lower and least upper bound with the demands they belong to, the first of equals."""
        lo_name, lo, hi_name, hi = None, 0.0, None, math.inf
        for name in names:
            if not at_most(self.bounds[name][0], lo):
                lo_name, lo = name, self.bounds[name][0]
            if not at_most(hi, self.bounds[name][1]):
                hi_name, hi = name, self.bounds[name][1]
        return lo_name, lo, hi_name, hi

    @property
    def grade(self):
        if not self.fits:
            return None
        comfort = self.setup.brief.comfort
        if 1 + self.latitude >= (1 + comfort) * (1 - TIE):
            return "comfortable"
        return "fair" if 1 + self.latitude >= (1 + comfort / 2) * (1 - TIE) else "tight"

    @cached_property
    def contrast(self):
        setup = self.setup
        planes = {"focus": 0.0, "above": setup.nearer + setup.slack, "below": -(setup.farther + setup.slack)}
        pitch, wavelength, feature = setup.camera.pitch, setup.brief.wavelength, setup.brief.feature
        return {
            plane: modulation(setup.optics, self.m, pitch, wavelength, feature, nearer)
            for plane, nearer in planes.items()
        }

    # Light at the working point

    def exposure(self):
        setup = self.setup
        line_speed = 0.0 if setup.brief.pulse is not None else setup.line_speed
        times = [setup.time_limit, setup.camera.pitch / (self.m * line_speed) if line_speed else math.inf]
        lit, full = setup.lit(setup.part_irradiance), setup.camera.row["saturation capacity"]
        if lit is not None and full is not None:
            times.append(full / light.electrons_per_second(lit, setup.optics, self.m))
        return min(times) if min(times) < math.inf else None

    def snr(self, corner=False):
        setup = self.setup
        lit = setup.lit(setup.part_irradiance)
        if lit is None:
            return None
        signal = light.electrons(lit, setup.optics, self.m)
        if corner:
            signal *= light.corner_share(setup.optics, self.m, setup.diagonal)
        return light.signal_to_noise(signal, lit.noise)

    def needed_illuminance(self):
        """The least level that gives the SNR asked for, where the brief states none: found by trying levels."""
        setup = self.setup
        if setup.brief.snr is None or setup.part_irradiance is not None:
            return None
        per_lux = 1 / (light.LUMENS_PER_WATT * light.luminosity(setup.brief.wavelength))
        lit = setup.lit(per_lux)
        if lit is None or math.isinf(light.longest_exposure(lit, self.m)):
            return None

        def enough(level):
            brighter = lit._replace(reflected=lit.reflected * level)
            return light.signal_to_noise(light.electrons(brighter, setup.optics, self.m), lit.noise) >= setup.brief.snr

        low, high = 1e-9, 1e15
        if not enough(high):
            return None
        while high / low > 1 + 4e-16 and low < math.sqrt(low * high) < high:
            middle = math.sqrt(low * high)
            low, high = (low, middle) if enough(middle) else (middle, high)
        return high

    def figures(self):
        """What the rig does at its working point; nothing where it has none."""
        setup, m = self.setup, self.m
        names = (
            "magnification",
            "working_distance_mm",
            "sampling_mm",
            "field_mm",
            "depth_mm",
            "exposure_s",
            "snr",
            "snr_corner",
            "needed_illuminance_lx",
            "contrast",
            "length_mm",
        )
        if m is None:
            return dict.fromkeys(names)
        w, h = (side / m for side in setup.sides)
        if setup.camera.line_scan:
            w, h = (None, h) if setup.portrait else (w, None)
        values = (
            m,
            stand(setup, m),
            setup.camera.pitch / m,
            (w, h),
            depths(setup, m),
            self.exposure(),
            self.snr(),
            self.snr(corner=True),
            self.needed_illuminance(),
            self.contrast,
            length(setup, m),
        )
        return dict(zip(names, values, strict=True))
