"""Units at the edges of the program: what people write into core units, and back into words.

Everyday units are a small table, so that pint, slow to import, is loaded only for the others.
"""

import math
import re
from functools import cache, lru_cache

from visionplan.text import figure, quoted

_SPEEDS = {"mm/s": 1.0, "cm/s": 10.0, "m/s": 1e3, "mm/min": 1 / 60, "m/min": 1e3 / 60, "in/s": 25.4, "ft/min": 5.08}
EVERYDAY: dict[str, dict[str, float]] = {
    "mm": {"mm": 1.0, "um": 1e-3, "nm": 1e-6, "cm": 10.0, "m": 1e3, "km": 1e6, "in": 25.4, "inch": 25.4, "ft": 304.8},
    "s": {"s": 1.0, "ms": 1e-3, "us": 1e-6, "ns": 1e-9, "min": 60.0, "h": 3600.0},
    "rad": {"rad": 1.0, "mrad": 1e-3, "deg": math.pi / 180, "°": math.pi / 180, "arcmin": math.pi / 10800},
    "g": {"g": 1.0, "kg": 1e3, "mg": 1e-3, "lb": 453.59237, "oz": 28.349523125},
    "lx": {"lx": 1.0, "klx": 1e3, "lux": 1.0},
    "W/m^2": {"W/m^2": 1.0, "kW/m^2": 1e3, "W/cm^2": 1e4, "mW/cm^2": 10.0, "uW/cm^2": 1e-2, "mW/mm^2": 1e3},
    "1/s": {"1/s": 1.0, "Hz": 1.0, "kHz": 1e3, "MHz": 1e6, "1/min": 1 / 60, "1/h": 1 / 3600, "fps": 1.0},
    "mm/s": _SPEEDS,
    "lp/mm": {"lp/mm": 1.0, "lp/cm": 0.1, "lp/m": 1e-3, "lp/um": 1e3, "1/mm": 1.0},
    "e": {"e-": 1.0, "ke-": 1e3, "e": 1.0, "ke": 1e3, "electron": 1.0, "electrons": 1.0},
    "W": {"W": 1.0, "mW": 1e-3, "kW": 1e3},
    "1": {"1": 1.0, "%": 1e-2, "percent": 1e-2, "ppm": 1e-6},
    "px": {"px": 1.0, "pixel": 1.0, "pixels": 1.0},
    "bit": {"bit": 1.0, "bits": 1.0},
    "": {},
}
"""By core unit: the unit as written, with u for µ, and how many core units it is."""

EXPECTED = {
    "mm": "a length such as '50 mm'",
    "s": "a time such as '5 ms'",
    "rad": "an angle such as '1 deg'",
    "g": "a mass such as '600 g'",
    "lx": "an illuminance such as '20 klx'",
    "W/m^2": "an irradiance such as '30 W/m^2'",
    "1/s": "a rate such as '4 / s'",
    "mm/s": "a speed such as '300 mm/s'",
    "lp/mm": "a spatial frequency such as '120 lp/mm'",
    "e": "a number of electrons such as '8.2 ke-'",
    "W": "a power such as '3.5 W'",
    "1": "a fraction such as '20 %' or 0.2",
    "px": "a number of pixels such as 2448",
    "bit": "a number of bits such as 12",
    "": "a plain number such as 2.8",
}
"""By core unit: what is expected where a text is no such quantity, in words."""

_BARE = ("", "1", "px", "bit")
"""Core units that a number needs not carry."""
_LONGEST = 80
_NUMBER = re.compile(r"[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?", re.ASCII)
_NO_UNIT = re.compile(r"(?!1 */)[\d,._']")
_FACTOR = re.compile(r"([*/]?)(1|%|°|[^\W\d]\w*)(?:\^(-?\d))?")


class UnitError(ValueError):
    """A text that is no such number, unit or quantity."""

    def __init__(self, found: str, expected: str):
        super().__init__(f"{found}; expected {expected}")
        self.found = found
        """What is wrong with it, in a sentence without a full stop."""
        self.expected = expected


def number(text: str) -> float:
    """Read a finite decimal number.

    Raises
    ------
    UnitError
        Not a plain decimal number (underscores, hex, NaN, infinity, a comma), or too great for a float.
    """
    return _number(text.strip(), "a plain decimal number such as 2.8")


def _number(text: str, expected: str) -> float:
    if len(text) > _LONGEST or not _NUMBER.fullmatch(text):
        raise UnitError(f"{quoted(text)} is no plain decimal number" if text else "nothing stands here", expected)
    return _finite(float(text), text, expected)


def _finite(value: float, text: str, expected: str) -> float:
    if math.isinf(value):
        raise UnitError(f"{quoted(text)} is too great", expected)
    return value


def parse(text: str, unit: str, bare: float | None = None) -> float:
    """Read a quantity: a number and its unit.

    Parameters
    ----------
    text : str
        '50 mm', '4 / s', '20 %'; a bare number only where `unit` is "1", "" or a count (px, bit).
    unit : str
        The core unit: one of `EVERYDAY`.
    bare : float, optional
        How many core units a number without a unit counts: a column's unit, say. When left out, see `text`.

    Returns
    -------
    float
        The magnitude in `unit`.

    Raises
    ------
    UnitError
        No number, no unit where one is needed, an unknown unit, a unit of another dimension.

    >>> parse("0.05 mm", "mm"), parse("2 in", "mm"), parse("20 %", "1")
    (0.05, 50.8, 0.2)
    """
    text, expected = text.strip(), EXPECTED[unit]
    start = _NUMBER.match(text) if len(text) <= _LONGEST else None
    if start is None:
        raise UnitError(f"{quoted(text)} is no quantity" if text else "nothing stands here", expected)
    value, rest = _number(start[0], expected), text[start.end() :].strip()
    if _NO_UNIT.match(rest):
        raise UnitError(f"{quoted(text)} does not begin with a plain decimal number", expected)
    if rest:
        return _finite(convert(value, factor(rest, unit)), text, expected)
    if bare is None and unit not in _BARE:
        raise UnitError(f"{quoted(text)} has no unit", expected)
    return value if bare is None else _finite(convert(value, bare), text, expected)


def convert(value: float, factor: float) -> float:
    """Multiply by a unit's factor, see `ratio`."""
    times, over = ratio(factor)
    return value * times / over


def ratio(factor: float) -> tuple[float, float]:
    """Split a unit's factor into a multiplier and a divisor, one of them 1.

    A division by 100 is exact where a product with 0.01 is not: 7 % is 0.07.
    """
    inverse = 1 / factor
    whole = round(inverse)
    return (1.0, float(whole)) if whole > 1 and math.isclose(inverse, whole, rel_tol=1e-14) else (factor, 1.0)


@lru_cache(maxsize=1024)
def factor(unit_text: str, unit: str) -> float:
    """Tell how many core units a written unit is.

    Raises
    ------
    UnitError
        An unknown unit, or one of another dimension.

    >>> factor("µm", "mm")
    0.001
    """
    written = _canonical(unit_text) if len(unit_text) <= _LONGEST else ""
    if (known := EVERYDAY[unit].get(written)) is not None:
        return known
    expected = EXPECTED[unit]
    if unit in ("", "px", "bit"):
        raise UnitError(f"the unit {quoted(unit_text)} has no place here", expected)
    other = any(written in table for table in EVERYDAY.values())
    if not other:
        pairs = unit == "lp/mm"
        found = _by_pint(re.sub(r"^lp\b", "1", written) if pairs else written)
        wanted = _by_pint("1/mm" if pairs else unit)
        if found and wanted and found[1] == wanted[1]:
            return float(f"{found[0] / wanted[0]:.15g}")
        other = found is not None
    fault = "is of the wrong dimension" if other else "is not known"
    raise UnitError(f"the unit {quoted(unit_text)} {fault}", expected)


def _canonical(text: str) -> str:
    """Write one unit one way: u for µ, ^ for powers, no spaces around an operator, * for the others, 1/s for / s."""
    text = text.replace("\u00b5", "u").replace("\u03bc", "u").replace("**", "^").strip()
    text = text.replace("e\u207b", "e-").translate(str.maketrans("·−", "*-"))
    text = re.sub("⁻?[¹²³]", lambda power: "^" + power[0].translate(str.maketrans("⁻¹²³", "-123")), text)
    text = re.sub(r"\s+", "*", re.sub(r"\s*([*/^])\s*", r"\1", text))
    return "1" + text if text.startswith("/") else text


def _by_pint(written: str) -> tuple[float, dict[str, int]] | None:
    """Resolve a product of powers of single units, never a whole expression: that could take for ever to work out."""
    dimension: dict[str, int] = {}
    value, at = 1.0, 0
    while at < len(written):
        match = _FACTOR.match(written, at)
        if match is None or (at == 0) != (match[1] == ""):
            return None
        root = (1.0, {}) if match[2] == "1" else _root(match[2])
        if root is None:
            return None
        power = int(match[3] or 1) * (-1 if match[1] == "/" else 1)
        value *= root[0] ** power
        for name, exponent in root[1].items():
            dimension[name] = dimension.get(name, 0) + exponent * power
        at = match.end()
    known = at > 0 and 0 < value < math.inf
    return (value, {name: power for name, power in dimension.items() if power}) if known else None


@cache
def _registry():
    import pint

    return pint.UnitRegistry()


@lru_cache(maxsize=1024)
def _root(name: str) -> tuple[float, dict[str, int]] | None:
    """Tell a unit's size and powers in pint's root units, in which angles and counts keep a dimension of their own."""
    units = _registry()
    try:
        one, two = (units.Quantity(value, units.UnitsContainer({name: 1})).to_root_units() for value in (1.0, 2.0))
    except Exception:  # pint raises many kinds, from AttributeError to its parser's own
        return None
    if two.magnitude != 2 * one.magnitude:  # decibels, degrees Celsius: no plain factor
        return None
    return one.magnitude, dict(one.unit_items())


def show(value: float | None, unit: str, system: str = "mm", digits: int = 4, percent: bool = False) -> str:
    """Write a quantity for people.

    Parameters
    ----------
    value : float or None
        In the core unit; None and NaN are "not stated".
    unit : str
        The core unit, or any word, which is then shown as it is.
    system : str
        "mm" or "inch", for lengths and speeds.
    percent : bool
        Whether a fraction (unit "1") is told in percent.

    >>> show(312.44, "mm"), show(312.44, "mm", "inch"), show(0.0052, "s"), show(0.2, "1", percent=True)
    ('312.4 mm', '12.3 in', '5.2 ms', '20 %')
    """
    if value is None or math.isnan(value):
        return "not stated"
    factor, word = _shown(abs(value), unit, system, percent)
    return f"{figure(value * factor, digits)} {word}".rstrip()


def _shown(size: float, unit: str, system: str, percent: bool) -> tuple[float, str]:
    if unit == "mm" and 0 < size < 1e-3:
        return 1e6, "nm"
    if unit in ("mm", "mm/s") and system == "inch":
        return 1 / 25.4, unit.replace("mm", "in")
    if unit == "s":
        return next(((scale, word) for scale, word in _TIMES if size * scale >= 1 or size == 0), _TIMES[-1])
    if unit == "lx" and size >= 1e4:
        return 1e-3, "klx"
    if unit == "rad":
        return 180 / math.pi, "deg"
    if unit == "1":
        return (100.0, "%") if percent else (1.0, "")
    return 1.0, {"e": "e-", "W/m^2": "W/m²", "1/s": "/s"}.get(unit, unit)


_TIMES = ((1.0, "s"), (1e3, "ms"), (1e6, "µs"), (1e9, "ns"))
