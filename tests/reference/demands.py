"""What a setup is asked for, demand by demand, and the checks that tell whether a magnification meets it."""

from typing import NamedTuple

from tests.reference import checks, laws, light
from tests.reference.parts import at_most


class Demand(NamedTuple):
    name: str
    state: str
    """asked, not asked, unknown, or never: no magnification can meet it."""
    asked: object = None
    unit: str = ""
    got: object = None
    """What there is at m, a function of m."""
    checks: tuple = ()
    """Pairs of a check and its arguments after m; all must hold. Each holds on an interval of m."""


def asked(name, value, unit, got, *tests):
    return Demand(name, "asked", value, unit, got, tests)


# `value` stands in for what the brief asks: what a concession tries.


def cover(setup, value=1.0):
    optics, nearer = setup.geometry, setup.nearer
    sides, needs = setup.sides, tuple(value * need for need in setup.field)
    if setup.camera.line_scan:
        along = slice(1, 2) if setup.portrait else slice(0, 1)
        sides, needs = sides[along], needs[along]
    tests = [(checks.covers, (optics, side, need, nearer)) for side, need in zip(sides, needs, strict=True)]
    return asked("cover", value, "x", lambda m: checks.field_ratio(m, optics, sides, needs, nearer), *tests)


def sampling(setup, value=None):
    q = setup.q if value is None else value
    args = (setup.geometry, setup.mosaic * setup.camera.pitch, setup.farther)
    return asked("sampling", q, "mm", lambda m: checks.pixel_on_part(m, *args), (checks.samples, (*args, q)))


def stand(setup, m):
    """The working distance reported: a telecentric lens's is moved towards the range as far as its tolerance goes."""
    shift = setup.layer_shift + setup.focus_height
    if setup.lens.telecentric:
        nearest, farthest = setup.brief.working_distance
        stated, tolerance = telecentric_distance(setup)
        return min(max(min(max(stated, nearest), farthest), stated - tolerance), stated + tolerance)
    return checks.working_distance(m, setup.geometry, setup.lens.front_principal, shift)


def reach(setup, value=None):
    nearest, farthest = setup.brief.working_distance if value is None else value
    shift = setup.layer_shift + setup.focus_height
    if setup.lens.telecentric:
        distance, tolerance = telecentric_distance(setup)
        tests = (
            (checks.fixed_within, (distance - tolerance, farthest)),
            (checks.fixed_within, (nearest, distance + tolerance)),
        )
    else:
        args = (setup.geometry, setup.lens.front_principal, shift)
        tests = ((checks.near_enough, (*args, farthest)), (checks.far_enough, (*args, nearest)))
    return asked("reach", (nearest, farthest), "mm", lambda m: stand(setup, m), *tests)


def telecentric_distance(setup):
    """To the reference plane, with its tolerance."""
    row = setup.lens.row
    return row["working distance"] + setup.layer_shift + setup.focus_height, row["working distance tolerance"] or 0.0


def fixed_tower(setup):
    """What the stack from lens front to camera back adds to the travel f m; None where a length isn't stated."""
    lens, camera = setup.lens.row["length"], setup.camera.row["length"]
    # the travel of an entocentric lens holds the rings already, and the flanges differ by what is taken off again
    between = setup.extension if setup.lens.telecentric else setup.flange_difference
    if None in (lens, camera, between):
        return None
    return lens + camera + (between if setup.lens.telecentric else -between)


def length(setup, m):
    """From the reference plane to the camera back."""
    fixed = fixed_tower(setup)
    if fixed is None:
        return None
    return stand(setup, m) + fixed + (0.0 if setup.lens.telecentric else setup.lens.focal_length * m)


def headroom(setup, value=None):
    limit = setup.brief.headroom if value is None else value
    if limit is None:
        return Demand("headroom", "not asked")
    fixed = fixed_tower(setup)
    if fixed is None:
        return Demand("headroom", "unknown", limit, "mm")
    cable = 50.0 if setup.brief.cable_room is None else setup.brief.cable_room
    if setup.lens.telecentric:
        test = (checks.fixed_within, (stand(setup, None) + fixed + cable, limit))
    else:
        shift = setup.layer_shift + setup.focus_height
        test = (checks.has_headroom, (setup.geometry, setup.lens.front_principal, shift, fixed + cable, limit))
    return asked("headroom", limit, "mm", lambda m: length(setup, m) + cable, test)


def travel(setup, value=None):
    e, x = setup.least_extension, setup.lens.ring_travel
    if setup.lens.telecentric and e is not None:
        return asked("travel", (0.0, 0.0), "mm", lambda m: e, (checks.fixed_within, (abs(e), 0.01)))
    if e is None or x is None:
        return Demand("travel", "unknown", None, "mm")
    tests = ((checks.ring_turned_out, (setup.geometry, e)), (checks.ring_turned_in, (setup.geometry, e + x)))
    return asked("travel", (e, e + x), "mm", lambda m: setup.lens.focal_length * m, *tests)


def near_depth(setup, value=None):
    need = setup.nearer + setup.slack if value is None else value
    if need <= 0:
        return Demand("near depth", "not asked")
    tests = ((checks.sharp, (setup.optics, need, setup.focus_blur)), (checks.before_pupil, (setup.geometry, need)))
    return asked("near depth", need, "mm", lambda m: depths(setup, m)[0], *tests)


def far_depth(setup, value=None):
    need = setup.farther + setup.slack if value is None else value
    if need <= 0:
        return Demand("far depth", "not asked")
    test = (checks.sharp, (setup.optics, need, setup.focus_blur))
    return asked("far depth", need, "mm", lambda m: depths(setup, m)[1], test)


def depths(setup, m):
    """Towards the lens, where it ends at the pupil, and away from it."""
    depth = checks.depth(m, setup.optics, setup.focus_blur)
    return min(depth, laws.pupil_distance(setup.optics, m)), depth


def rayleigh(setup, value=None):
    feature = setup.brief.feature if value is None else value
    args = (setup.optics, setup.brief.wavelength)
    return asked(
        "rayleigh", feature, "mm", lambda m: checks.rayleigh_distance(m, *args), (checks.separates, (*args, feature))
    )


def lens_detail(setup, value=None):
    """`value` is the feature, whose frequency is asked."""
    feature = setup.brief.feature if value is None else value
    limit = setup.lens.row["detail limit"]
    if limit is None:
        return Demand("lens detail", "unknown", None, "lp/mm")
    test = (checks.resolves, (feature, limit))
    return asked("lens detail", limit, "lp/mm", lambda m: checks.image_frequency(m, feature), test)


def lights(setup, value=None):
    snr = setup.brief.snr if value is None else value
    if snr is None:
        return Demand("light", "not asked")
    row = setup.camera.row
    full = row["saturation capacity"]
    if full is not None and not at_most(snr, light.signal_to_noise(full, light.noise_variance(row))):
        return Demand("light", "never", snr, "1")
    if setup.part_irradiance is None and row["quantum efficiency"] is not None:
        return asked("light", snr, "1", lambda m: None)  # the level needed is told instead
    lit = setup.lit(setup.part_irradiance)
    if lit is None:
        return Demand("light", "unknown", snr, "1")
    return asked(
        "light",
        snr,
        "1",
        lambda m: light.signal_to_noise(light.electrons(lit, setup.optics, m), lit.noise),
        (checks.bright, (setup.optics, lit, snr)),
    )


def perspective(setup, value=None):
    fraction = setup.brief.max_perspective if value is None else value
    if fraction is None:
        return Demand("perspective", "not asked")
    angle = setup.lens.row["telecentricity"] if setup.lens.telecentric else 0.0
    if angle is None:
        return Demand("perspective", "unknown", fraction, "1")
    args = (setup.geometry, setup.nearer, setup.farther, angle, setup.diagonal)
    return asked(
        "perspective", fraction, "1", lambda m: checks.change_of_scale(m, *args), (checks.flat, (*args, fraction))
    )


def line_rate(setup, value=None):
    """`value` is the speed."""
    speed = setup.brief.speed if value is None else value
    if not setup.camera.line_scan or not speed:
        return Demand("line rate", "not asked")
    pitch, rate = setup.camera.pitch, setup.camera.row["line rate"]
    if rate is None:
        return Demand("line rate", "unknown", None, "1/s")
    shortest = setup.camera.row["shortest exposure"] if setup.brief.pulse is None else setup.brief.pulse
    tests = [(checks.rows_keep_up, (speed, pitch, rate))]
    if shortest is not None:
        tests.append((checks.row_lasts, (speed, pitch, shortest)))
        rate = min(rate, 1 / shortest)
    return asked("line rate", rate, "1/s", lambda m: speed * m / pitch, *tests)


DEMANDS = {
    "cover": cover,
    "sampling": sampling,
    "reach": reach,
    "headroom": headroom,
    "travel": travel,
    "near depth": near_depth,
    "far depth": far_depth,
    "rayleigh": rayleigh,
    "lens detail": lens_detail,
    "light": lights,
    "perspective": perspective,
    "line rate": line_rate,
}
PLACE = ("reach", "headroom")
