"""A ranking as CSV: a row a rig, units in the headings' brackets, no cell that a spreadsheet takes for a formula."""

import csv
import io
import math
from collections.abc import Callable

from visionplan.report.figures import contrast, currency, grid
from visionplan.report.words import misses
from visionplan.solve.rig import Ranking, Rig
from visionplan.text import csv_cell, figure

Value = float | int | str | None


def ranking_csv(ranking: Ranking, system: str = "mm") -> str:
    """All rigs of a ranking, the misses too; lengths in mm or inch, numbers of 10 significant digits."""
    columns = _columns(system, currency(ranking.catalogue))
    text = io.StringIO()
    writer = csv.writer(text, lineterminator="\n")
    writer.writerow(map(csv_cell, columns))
    for rig in ranking.rigs:
        writer.writerow([_cell(value(rig)) for value in columns.values()])
    return text.getvalue()


def _columns(system: str, prices: str) -> dict[str, Callable[[Rig], Value]]:
    unit, scale = ("in", 25.4) if system == "inch" else ("mm", 1.0)

    def lengths(**values: Callable[[Rig], float | None]) -> dict[str, Callable[[Rig], Value]]:
        return {f"{name.replace('_', ' ')} [{unit}]": _scaled(value, 1 / scale) for name, value in values.items()}

    return {
        "rank": lambda rig: rig.rank,
        "camera": lambda rig: rig.camera,
        "lens": lambda rig: rig.lens,
        "spacer rings": lambda rig: " + ".join(rig.spacers),
        **lengths(ring_length=lambda rig: rig.extension),
        "orientation": lambda rig: rig.orientation,
        "cameras": grid,
        "stop": lambda rig: rig.stop,
        "stops that fit": lambda rig: " ".join(map(figure, rig.stops)),
        "fits": lambda rig: "yes" if rig.fits else "no",
        "grade": lambda rig: rig.grade,
        "latitude [%]": _scaled(lambda rig: rig.latitude, 100),
        "shortfall [%]": _scaled(lambda rig: rig.shortfall, 100),
        "pinch low": lambda rig: rig.pinch and rig.pinch[0],
        "pinch high": lambda rig: rig.pinch and rig.pinch[1],
        "held": lambda rig: rig.held,
        "misses": lambda rig: "; ".join(misses(rig, system)),
        "unknown": lambda rig: ", ".join(rig.unknown),
        "span low": lambda rig: rig.span and rig.span[0],
        "span high": lambda rig: rig.span and rig.span[1],
        "magnification": lambda rig: rig.magnification,
        **lengths(
            working_distance=lambda rig: rig.working_distance,
            sampling=lambda rig: rig.sampling,
            field_width=lambda rig: rig.field[0],
            field_height=lambda rig: rig.field[1],
            depth_towards_the_lens=lambda rig: rig.depth[0],
            depth_away_from_it=lambda rig: rig.depth[1],
            hyperfocal_distance=lambda rig: rig.hyperfocal,
            length_to_the_camera_back=lambda rig: rig.length,
        ),
        "exposure [s]": lambda rig: rig.exposure,
        "signal to noise": lambda rig: rig.snr,
        "signal to noise in the corner": lambda rig: rig.snr_corner,
        "illuminance needed [lx]": lambda rig: rig.needed_illuminance,
        "contrast in focus [%]": _scaled(contrast("focus"), 100),
        "contrast nearest [%]": _scaled(contrast("above"), 100),
        "contrast farthest [%]": _scaled(contrast("below"), 100),
        f"price [{prices}]" if prices else "price": lambda rig: rig.price,
        "assumptions": lambda rig: " ".join(rig.assumptions),
    }


def _scaled(value: Callable[[Rig], float | None], factor: float) -> Callable[[Rig], float | None]:
    def scaled(rig: Rig) -> float | None:
        own = value(rig)
        return None if own is None else own * factor

    return scaled


def _cell(value: Value) -> str:
    if isinstance(value, str):
        return csv_cell(value)
    if value is None or not math.isfinite(value):
        return ""
    return f"{value + 0.0:.10g}"
