"""The brief: what a cell asks for. Lengths in mm, times in s, angles in rad, everything else in the unit named."""

from dataclasses import dataclass


@dataclass(frozen=True)
class Layer:
    """A plane-parallel layer between lens and part."""

    thickness: float
    """mm"""
    index: float
    """Refractive index at the brief's wavelength."""
    material: str = ""
    """Its name, "" where the brief gives the index itself."""


@dataclass(frozen=True)
class Fold:
    """A mirror, or several, in the optical path."""

    from_lens: float
    """From the lens front to the mirror, mm."""
    mirrors: int = 1


@dataclass(frozen=True)
class Brief:
    """What a cell asks for; None where the brief says nothing."""

    field: tuple[float, float]
    """Width and height that must be in the picture, mm."""
    feature: float
    """Smallest feature that must be seen, mm."""
    working_distance: tuple[float, float]
    """Nearest and farthest reference plane from the lens front, mm."""
    title: str = ""
    comfort: float = 0.2
    """Latitude from which a rig is comfortable."""
    strict: bool = False
    """Whether what a catalogue leaves out counts as missed."""
    units: str = "mm"
    """mm or inch: what people read."""
    above: float = 0.0
    """How far the part rises over the reference plane, towards the lens, mm."""
    below: float = 0.0
    """How far it reaches below, mm."""
    pixels_per_feature: float = 4.0
    task: str | None = None
    max_perspective: float | None = None
    """Greatest change of scale between the part's farthest and nearest surface, a fraction."""
    placement: float = 0.0
    """How far off centre a part may lie, mm."""
    mosaic_factor: float | None = None
    headroom: float | None = None
    cable_room: float | None = None
    working_distance_tolerance: float = 0.0
    """± mm"""
    tilt: float = 0.0
    """rad"""
    layers: tuple[Layer, ...] = ()
    fold: Fold | None = None
    speed: float | None = None
    """mm/s"""
    along: str = "height"
    """The side of the field that the motion runs along: width or height."""
    motion_blur: float | None = None
    """[motion] blur: greatest motion blur on the part, mm."""
    motion_blur_pixels: float | None = None
    """[motion] blur_pixels: the same in pixels of the sampling asked for; 1 when neither is stated."""
    rate: float | None = None
    """Parts or pictures in a second, 1/s."""
    illuminance: float | None = None
    """On the part, lx."""
    irradiance: float | None = None
    """On the part, W/m²."""
    reflectance: float | None = None
    wavelength: float = 550e-6
    """mm"""
    snr: float | None = None
    max_exposure: float | None = None
    """s"""
    pulse: float | None = None
    """s"""
    focus_plane: float | None = None
    """[focus] plane: height over the reference plane, mm; None for the middle of the part, 0 for "reference"."""
    focus_blur: float | None = None
    """[focus] blur: greatest blur on the part, mm."""
    focus_blur_pixels: float | None = None
    """[focus] blur_pixels: the same in pixels of the sampling asked for; 1 when neither is stated."""
    min_contrast: float | None = None
    sensor: str = "any"
    """mono, colour or any."""
    mounts: tuple[str, ...] | None = None
    interfaces: tuple[str, ...] | None = None
    cable: float | None = None
    """mm"""
    max_distortion: float | None = None
    max_count: int = 1
    overlap: float = 0.0
    """mm"""
    max_price: float | None = None
    max_mass: float | None = None
    """g"""
    max_diameter: float | None = None
    """mm"""
    min_yield: float | None = None
    """Least share of the rigs built, within their tolerances, in which every demand must hold."""
    lens_kinds: tuple[str, ...] | None = None
    in_hand: bool = False
    cameras: tuple[str, ...] | None = None
    lenses: tuple[str, ...] | None = None
    stated: frozenset[str] = frozenset()
    """The lines the file has, as section.key: "scene.field", "title"."""
    source: str = ""
    """The file it was read from, for messages."""
