"""A ranking as JSON: the contract for scripts. Lengths in mm, ratios as fractions, unknown numbers null."""

import json
import math
from typing import Any

from visionplan.solve.rig import Concession, Ranking, Rig, Verdict


def ranking_json(ranking: Ranking) -> str:
    """One JSON document, a rig a line; the same bytes for the same ranking, floats of 10 significant digits."""
    catalogue = ranking.catalogue
    document = {
        "brief": {"title": ranking.brief.title},
        "catalogue": {
            "lenses": len(catalogue.lenses),
            "cameras": len(catalogue.cameras),
            "spacers": len(catalogue.spacers),
            "fingerprint": catalogue.fingerprint,
        },
        "pairs": ranking.pairs,
        "fitting": ranking.fitting,
        "rigs": [_rig(rig) for rig in ranking.rigs],
        "concessions": [_concession(given) for given in ranking.concessions or ()],
    }
    return "{\n" + ",\n".join(f"{_line(key)}: {_lines(value)}" for key, value in document.items()) + "\n}\n"


def _lines(value: Any) -> str:
    """A list one item a line, anything else on one."""
    return "[\n" + ",\n".join(map(_line, value)) + "\n]" if isinstance(value, list) and value else _line(value)


def _line(value: Any) -> str:
    # With an indent json would take its slow encoder, written in Python.
    return json.dumps(_plain(value), allow_nan=False)


def _rig(rig: Rig) -> dict[str, Any]:
    contrast = rig.contrast
    return {
        "rank": rig.rank,
        "camera": rig.camera,
        "lens": rig.lens,
        "spacers": rig.spacers,
        "extension_mm": rig.extension,
        "orientation": rig.orientation,
        "grid": rig.grid,
        "stop": rig.stop,
        "stops": rig.stops,
        "fits": rig.fits,
        "grade": rig.grade,
        "unknown": rig.unknown,
        "span": rig.span,
        "latitude": rig.latitude if rig.fits else 0.0,
        "shortfall": rig.shortfall,
        "pinch": rig.pinch,
        "held": rig.held,
        "magnification": rig.magnification,
        "working_distance_mm": rig.working_distance,
        "sampling_mm": rig.sampling,
        "field_mm": rig.field,
        "depth_mm": rig.depth,
        "exposure_s": rig.exposure,
        "snr": rig.snr,
        "snr_corner": rig.snr_corner,
        "needed_illuminance_lx": rig.needed_illuminance,
        "contrast": {plane: contrast and getattr(contrast, plane) for plane in ("focus", "above", "below")},
        "hyperfocal_mm": rig.hyperfocal,
        "length_mm": rig.length,
        "price": rig.price,
        "demands": [_verdict(verdict) for verdict in rig.demands],
        "assumptions": rig.assumptions,
    }


def _verdict(verdict: Verdict) -> dict[str, Any]:
    names = ("name", "lo", "hi", "asked", "got", "unit", "verdict")
    return {name: getattr(verdict, name) for name in names}


def _concession(given: Concession) -> dict[str, Any]:
    names = ("demand", "asked", "needed", "unit", "end", "camera", "lens")
    return {name: getattr(given, name) for name in names}


def _plain(value: Any) -> Any:
    """Only what JSON has: no NaN, no infinity, no negative zero, no more digits than are meant."""
    if value is None or isinstance(value, str):
        return value
    if isinstance(value, float):
        return float(f"{value:.10g}") + 0.0 if math.isfinite(value) else None
    if isinstance(value, dict):
        return {key: _plain(own) for key, own in value.items()}
    if isinstance(value, (list, tuple)):
        return [_plain(own) for own in value]
    return value
