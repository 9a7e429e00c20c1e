"""Write catalogues of any size with every value stated. All values and names are invented, within what is usual."""

import csv
from pathlib import Path

import numpy as np

MOUNTS = ("C", "CS", "F", "M42")
FLANGES = (17.526, 12.526, 46.5, 45.46)
STOPS = "1.4 2 2.8 4 5.6 8 11 16"


def write_market(
    folder: Path | str,
    lenses: int = 5000,
    cameras: int = 10_000,
    sensors: int = 200,
    spacers: int = 0,
    seed: int = 1,
) -> None:
    """Write lenses.csv, cameras.csv and, where there are any, spacers.csv.

    Parameters
    ----------
    folder : Path or str
        Where to; made where it is missing.
    lenses, cameras, spacers : int
        Rows.
    sensors : int
        How many cameras differ in what the optics see: sensor, noise, rates; the others differ in name and price.
    seed : int
        The same seed writes the same files.
    """
    folder = Path(folder)
    folder.mkdir(parents=True, exist_ok=True)
    draw = np.random.default_rng(seed)
    _write(folder / "lenses.csv", _lenses(draw, lenses))
    _write(folder / "cameras.csv", _cameras(draw, cameras, sensors))
    if spacers:
        _write(folder / "spacers.csv", _spacers(draw, spacers))


def _lenses(draw: np.random.Generator, count: int) -> dict[str, list[str]]:
    mount = draw.choice(4, count, p=(0.8, 0.1, 0.06, 0.04))
    focal_length = 4 * 50 ** draw.random(count)
    f_number = draw.choice((1.4, 1.8, 2.0, 2.4, 2.8, 4.0), count)
    near = draw.uniform(0.01, 0.3, count)
    length = draw.uniform(20, 60, count) + focal_length / 2
    front_principal = draw.uniform(0.1, 0.6, count) * np.minimum(length, focal_length)
    return {
        "id": _names("L", count),
        "mount": [MOUNTS[k] for k in mount],
        "maker": _makers(draw, count),
        "kind": _choices(draw, count, ("entocentric", "telecentric"), (0.95, 0.05)),
        "focal length [mm]": _figures(focal_length),
        "f-number min": _figures(f_number),
        "f-number max": ["16"] * count,
        "nearest object [mm]": _figures(focal_length * (1 + 1 / near) - front_principal),
        "magnification": _figures(0.05 * 20 ** draw.random(count)),
        "working distance [mm]": _figures(draw.uniform(40, 300, count)),
        "nearest magnification": _figures(near),
        "stops": [" ".join(s for s in STOPS.split() if float(s) >= least) for least in f_number],
        "image circle [mm]": _figures(draw.uniform(6, 45, count)),
        "distortion [%]": _figures(draw.normal(0, 0.5, count)),
        "detail limit [lp/mm]": _figures(draw.uniform(60, 250, count)),
        "transmittance [%]": _figures(draw.uniform(70, 97, count)),
        "pupil ratio": _figures(draw.uniform(0.6, 2.0, count)),
        "front principal [mm]": _figures(front_principal),
        "length [mm]": _figures(length),
        "diameter [mm]": _figures(draw.uniform(25, 70, count)),
        "mass [g]": _figures(draw.uniform(30, 900, count)),
        "price": _figures(np.round(40 * 60 ** draw.random(count), 2), 8),
        "stock": _counts(draw.integers(0, 50, count)),
        "focal tolerance [%]": _figures(draw.uniform(0.5, 5, count)),
        "flange distance [mm]": _figures(np.take(FLANGES, mount)),
        "working distance tolerance [mm]": _figures(draw.uniform(0.5, 4, count)),
        "telecentricity [deg]": _figures(draw.uniform(0.01, 0.2, count)),
    }


def _cameras(draw: np.random.Generator, count: int, sensors: int) -> dict[str, list[str]]:
    sensors = min(sensors, count)
    which = np.concatenate([np.arange(sensors), draw.integers(0, sensors, count - sensors)])
    high = draw.integers(120, 1300, sensors) * 4
    line = draw.random(sensors) < 0.03
    mount = draw.choice(4, sensors, p=(0.85, 0.05, 0.06, 0.04))
    frame_rate = draw.uniform(5, 300, sensors)
    kinds = np.where(line, "line", "area")
    of_sensor = {
        "mount": [MOUNTS[k] for k in mount],
        "kind": kinds.tolist(),
        "pixels wide": _counts(np.where(line, 4096, high * 4 // 3)),
        "pixels high": _counts(np.where(line, 1, high)),
        "pixel pitch [µm]": _figures(draw.uniform(1.6, 9, sensors)),
        "colour": _choices(draw, sensors, ("mono", "colour"), (0.6, 0.4)),
        "shutter": _choices(draw, sensors, ("global", "rolling"), (0.7, 0.3)),
        "frame rate [Hz]": _figures(frame_rate),
        "line rate [kHz]": _figures(draw.uniform(10, 100, sensors)),
        "bit depth": _counts(draw.choice((8, 10, 12), sensors)),
        "shortest exposure [µs]": _figures(draw.uniform(1, 50, sensors)),
        "quantum efficiency [%]": _figures(draw.uniform(30, 75, sensors)),
        "dark noise [e-]": _figures(draw.uniform(1.5, 20, sensors)),
        "saturation capacity [ke-]": _figures(draw.uniform(4, 60, sensors)),
        "flange distance [mm]": _figures(np.take(FLANGES, mount)),
    }
    own = {
        "id": _names("C", count),
        "maker": _makers(draw, count),
        "interface": _choices(draw, count, ("GigE Vision", "USB3 Vision", "CoaXPress"), (0.5, 0.4, 0.1)),
        "cable limit [m]": _figures(draw.choice((3.0, 5.0, 40.0, 100.0), count)),
        "length [mm]": _figures(draw.uniform(25, 90, count)),
        "mass [g]": _figures(draw.uniform(30, 300, count)),
        "power [W]": _figures(draw.uniform(1.5, 12, count)),
        "price": _figures(np.round(150 * 20 ** draw.random(count), 2), 8),
        "stock": _counts(draw.integers(0, 50, count)),
    }
    return {name: own.get(name) or [of_sensor[name][k] for k in which] for name in ("id", *of_sensor, *list(own)[1:])}


def _spacers(draw: np.random.Generator, count: int) -> dict[str, list[str]]:
    return {
        "id": _names("S", count),
        "mount": _choices(draw, count, MOUNTS, (0.7, 0.1, 0.1, 0.1)),
        "length [mm]": _figures(draw.choice((0.5, 1.0, 2.0, 5.0, 10.0, 15.0, 20.0, 40.0), count)),
        "price": _figures(np.round(draw.uniform(5, 60, count), 2)),
        "quantity": _counts(draw.integers(1, 9, count)),
    }


def _names(letter: str, count: int) -> list[str]:
    return [f"{letter}{k:07d}" for k in range(count)]


def _makers(draw: np.random.Generator, count: int) -> list[str]:
    return [f"Invented maker {k}" for k in draw.integers(1, 40, count)]


def _choices(draw: np.random.Generator, count: int, words: tuple[str, ...], shares: tuple[float, ...]) -> list[str]:
    return [words[k] for k in draw.choice(len(words), count, p=shares)]


def _figures(values: np.ndarray, digits: int = 5) -> list[str]:
    return [f"{value:.{digits}g}" for value in values.tolist()]


def _counts(values: np.ndarray) -> list[str]:
    return [str(value) for value in values.tolist()]


def _write(path: Path, columns: dict[str, list[str]]) -> None:
    with path.open("w", encoding="utf-8", newline="") as file:
        sheet = csv.writer(file, lineterminator="\n")
        sheet.writerow(columns)
        sheet.writerows(zip(*columns.values()))
