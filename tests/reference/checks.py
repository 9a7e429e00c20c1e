"""Physical checks at a given magnification m: image the part and look. Nothing here is solved for m."""

import math

from tests.reference import laws, light

# Checks


def covers(m, optics, side, need, nearer):
    """The field at the nearest plane is at least as long as needed."""
    u = laws.pupil_distance(optics, m)
    return u > nearer and side / m * (1 - nearer / u) >= need


def samples(m, optics, pitch, farther, q):
    """A pixel (of one colour) at the farthest plane is small enough."""
    return pixel_on_part(m, optics, pitch, farther) <= q


def near_enough(m, optics, front, shift, farthest):
    return working_distance(m, optics, front, shift) <= farthest


def far_enough(m, optics, front, shift, nearest):
    return working_distance(m, optics, front, shift) >= nearest


def has_headroom(m, optics, front, shift, fixed, headroom):
    return tower(m, optics, front, shift, fixed) <= headroom


def ring_turned_out(m, optics, least):
    return optics.focal_length * m >= least


def ring_turned_in(m, optics, greatest):
    return optics.focal_length * m <= greatest


def sharp(m, optics, distance, blur):
    return laws.blur_on_part(optics, m, distance) <= blur


def before_pupil(m, optics, height):
    return laws.pupil_distance(optics, m) > height


def separates(m, optics, wavelength, feature):
    """Rayleigh: two points so far apart."""
    return rayleigh_distance(m, optics, wavelength) <= feature


def resolves(m, feature, limit):
    return image_frequency(m, feature) <= limit


def bright(m, optics, lit, snr):
    return light.signal_to_noise(light.electrons(lit, optics, m), lit.noise) >= snr


def flat(m, optics, nearer, farther, angle, diagonal, fraction):
    return change_of_scale(m, optics, nearer, farther, angle, diagonal) <= fraction


def rows_keep_up(m, speed, pitch, rate):
    return speed * m / pitch <= rate


def row_lasts(m, speed, pitch, shortest):
    return pitch / (m * speed) >= shortest


def fixed_within(m, value, limit):
    """Of a telecentric lens: holds or doesn't, whatever m."""
    return value <= limit + 1e-12 * abs(limit)


# What there is at m


def field_ratio(m, optics, sides, needs, nearer):
    u = laws.pupil_distance(optics, m)
    return min(side / m * (1 - nearer / u) / need for side, need in zip(sides, needs, strict=True))


def pixel_on_part(m, optics, pitch, farther):
    return pitch / m * (1 + farther / laws.pupil_distance(optics, m))


def working_distance(m, optics, front, shift):
    """From the lens front to the reference plane; shift is D + z."""
    return laws.object_distance(optics, m) - front + shift


def tower(m, optics, front, shift, fixed):
    """From the reference plane to the end of `fixed`: lens, flange difference, camera and what stands behind it."""
    return working_distance(m, optics, front, shift) + optics.focal_length * m + fixed


def depth(m, optics, blur):
    """Distance from the focus plane at which the blur on the part has grown to this."""
    if optics.telecentric:
        return optics.f_number * blur / m
    return optics.f_number * blur * laws.pupil_distance(optics, m) / optics.focal_length


def rayleigh_distance(m, optics, wavelength):
    return 1.22 * wavelength * laws.working_f_number(optics, m) / m


def image_frequency(m, feature):
    return 1 / (2 * feature * m)


def change_of_scale(m, optics, nearer, farther, angle, diagonal):
    """From the farthest to the nearest surface, as a fraction."""
    if optics.telecentric:
        return (nearer + farther) * math.tan(angle) / (diagonal / (2 * m))
    u = laws.pupil_distance(optics, m)
    return (nearer + farther) / (u - nearer) if u > nearer else math.inf
