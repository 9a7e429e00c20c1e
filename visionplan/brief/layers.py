"""The layers of a brief: their index at its wavelength."""

from collections.abc import Iterable

from visionplan.brief.model import Layer
from visionplan.units import show

FITTED = {"N-BK7": (310e-6, 2325e-6), "fused silica": (210e-6, 3710e-6), "sapphire": (200e-6, 5000e-6)}
"""Wavelengths, mm, that the Sellmeier formulas were fitted to (from memory of their sources)."""


def out_of_range(layers: Iterable[dict], wavelength: float) -> list[tuple[str, str]]:
    """Tell which layers' materials have no index at the wavelength, mm: what was found and what was expected."""
    faults = []
    for place, layer in enumerate(layers, 1):
        low, high = FITTED.get(layer.get("material", ""), (wavelength, wavelength))
        if not low <= wavelength <= high:
            found = f"layer {place}: the index of {layer['material']} at {nanometres(wavelength)} is not known"
            span = f"from {nanometres(low)} to {nanometres(high)}"
            faults.append((found, f"a wavelength {span}, or the layer's index"))
    return faults


def settle(layers: Iterable[dict], wavelength: float) -> tuple[Layer, ...]:
    """Look up the materials' indices at the wavelength, mm."""
    return tuple(
        Layer(
            layer["thickness"],
            layer["index"] if "index" in layer else _index(layer["material"], wavelength),
            layer.get("material", ""),
        )
        for layer in layers
    )


def nanometres(wavelength: float) -> str:
    """Write a wavelength, mm, for people."""
    return show(wavelength * 1e6, "nm")


def _index(material: str, wavelength: float) -> float:
    # Brings numpy in, which a brief without materials has no need of.
    from visionplan.optics.media import refractive_index

    return float(refractive_index(material, wavelength))
