"""Glass, liquids and mirrors between lens and part: refractive indices, layers and the size of a fold mirror."""

import numpy as np

from visionplan.optics import Numbers

SELLMEIER: dict[str, tuple[tuple[float, float, float], tuple[float, float, float]]] = {
    "N-BK7": ((1.03961212, 0.231792344, 1.01046945), (0.00600069867, 0.0200179144, 103.560653)),
    "fused silica": ((0.6961663, 0.4079426, 0.8974794), (0.0684043**2, 0.1162414**2, 9.896161**2)),
    "sapphire": ((1.4313493, 0.65054713, 5.3414021), (0.0726631**2, 0.1193242**2, 18.028251**2)),
}
"""Coefficients B (plain numbers) and C (µm²) of materials whose index follows the wavelength.

N-BK7: the glass's data sheet; fused silica: Malitson 1965; sapphire, ordinary ray: Malitson and Dodge.
"""

FIXED_INDEX = {"water": 1.3334, "PMMA": 1.492, "acrylic": 1.492, "polycarbonate": 1.585}
"""Index at 588 nm, taken at every wavelength. Water at 20 °C: Daimon and Masumura 2007; plastics ± 0.002."""

MATERIALS = (*SELLMEIER, *FIXED_INDEX)
"""The names that `refractive_index` knows."""


def refractive_index(material: str, wavelength_mm: Numbers) -> Numbers:
    """Refractive index of one of MATERIALS; KeyError for any other.

    >>> float(round(refractive_index("N-BK7", 587.5618e-6), 4))
    1.5168
    """
    if material in SELLMEIER:
        return sellmeier(wavelength_mm, *SELLMEIER[material])
    return np.full(np.shape(wavelength_mm), FIXED_INDEX[material])[()]


def sellmeier(
    wavelength_mm: Numbers, strengths: tuple[float, float, float], resonances: tuple[float, float, float]
) -> Numbers:
    """Index after Sellmeier, n² = 1 + Σ B λ²/(λ² − C), C in µm²; NaN where the formula gives none."""
    square = np.square(np.multiply(wavelength_mm, 1e3))
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.sqrt(1 + sum(b * square / (square - c) for b, c in zip(strengths, resonances)))


def refraction_angle(angle: Numbers, index: Numbers, index_before: Numbers = 1.0) -> Numbers:
    """Angle to the normal after refraction (Snell), rad; NaN where all light is reflected."""
    with np.errstate(invalid="ignore"):
        return np.arcsin(np.sin(angle) * index_before / index)


def plate_shift(thickness: Numbers, index: Numbers) -> Numbers:
    """How much nearer a plane-parallel layer brings what lies behind it, t (1 − 1/n), mm: paraxial."""
    return thickness * (1 - 1 / index)


def plate_shift_at(thickness: Numbers, index: Numbers, angle: Numbers) -> Numbers:
    """The same for a ray at `angle` to the normal, exact: t (1 − cosθ/√(n² − sin²θ)), mm (Smith, section 7.8)."""
    return thickness * (1 - np.cos(angle) / np.sqrt(np.square(index) - np.square(np.sin(angle))))


def lateral_error(thickness: Numbers, index: Numbers, angle: Numbers) -> Numbers:
    """How far off the axis a ray at `angle` meets the part beside the paraxial place, mm."""
    return (plate_shift_at(thickness, index, angle) - plate_shift(thickness, index)) * np.tan(angle)


def apparent_depth(thickness: Numbers, index: Numbers) -> Numbers:
    """How deep a layer looks from air, square on, t/n, mm."""
    return thickness / index


def mirror_footprint(
    field_along: Numbers,
    field_across: Numbers,
    pupil_diameter: Numbers,
    pupil_to_field: Numbers,
    pupil_to_mirror: Numbers,
    angle: Numbers = np.pi / 4,
) -> tuple[Numbers, Numbers]:
    """Least size of a fold mirror: what the light from the whole field to the entrance pupil covers on it, mm.

    Parameters
    ----------
    field_along, field_across : sides of the field in the plane of the fold and square to it [mm]
    pupil_diameter : of the entrance pupil, f/N [mm]
    pupil_to_field, pupil_to_mirror : along the axis, as if unfolded [mm]
    angle : between the axis and the mirror's normal [rad]

    Returns
    -------
    tuple
        Length down the mirror's slope and width across it. The length's middle lies `mirror_offset` off the axis.
        NaN where a mirror of that size would reach through the pupil or the field.
    """
    rise, fall = _slope_ends(field_along, pupil_diameter, pupil_to_field, pupil_to_mirror, angle)
    cos, sin, radius, edge = np.cos(angle), np.sin(angle), np.divide(pupil_diameter, 2), np.divide(field_across, 2)
    reach = []
    # The plane through a corner of the field and a line down the slope touches the pupil where that line is the edge.
    for corner in (np.divide(field_along, 2), np.divide(field_along, -2)):
        lean = cos * pupil_to_field - sin * corner
        ahead = lean - cos * pupil_to_mirror
        with np.errstate(divide="ignore", invalid="ignore"):
            touch = radius * np.sqrt(lean**2 + sin**2 * (edge**2 - radius**2)) - lean * edge
            reach.append(edge + ahead * touch / (lean**2 - sin**2 * radius**2))
    return rise + fall, np.where(np.isnan(rise), np.nan, 2 * np.maximum(*reach))[()]


def mirror_offset(
    field_along: Numbers,
    pupil_diameter: Numbers,
    pupil_to_field: Numbers,
    pupil_to_mirror: Numbers,
    angle: Numbers = np.pi / 4,
) -> Numbers:
    """How far down the slope, away from the lens, the middle of `mirror_footprint` lies off the axis, mm."""
    rise, fall = _slope_ends(field_along, pupil_diameter, pupil_to_field, pupil_to_mirror, angle)
    return (rise - fall) / 2


def _slope_ends(
    side: Numbers, pupil: Numbers, to_field: Numbers, to_mirror: Numbers, angle: Numbers
) -> tuple[Numbers, Numbers]:
    """Where the light's edges meet the slope, from the axis away from the lens and towards it."""
    opening = np.divide(np.subtract(side, pupil), 2 * np.asarray(to_field))
    half = np.divide(pupil, 2) + opening * to_mirror
    cos, sin = np.cos(angle), np.sin(angle)
    with np.errstate(divide="ignore", invalid="ignore"):
        rise, fall = half / (cos - opening * sin), half / (cos + opening * sin)
        room = (rise >= 0) & (fall >= 0) & (rise * sin <= to_field - to_mirror) & (fall * sin <= to_mirror)
        return np.where(room, rise, np.nan)[()], np.where(room, fall, np.nan)[()]
