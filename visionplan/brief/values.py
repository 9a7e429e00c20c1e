"""One value of the brief: from what stands in the file to core units, and back."""

from collections.abc import Callable, Iterable
from typing import Any

from visionplan.brief.fields import Line, expected
from visionplan.brief.model import Brief
from visionplan.text import clean, shorten
from visionplan.units import UnitError, factor, parse


class Wrong(ValueError):
    """A value that isn't what its line takes."""

    def __init__(self, *faults: tuple[str, str]):
        self.faults = faults
        """What was found and what was expected, once for each thing wrong."""


def take(line: Line, raw: Any) -> Any:
    """Read a value of any type, as it stands in the file, in core units.

    Layers and fold come as dicts of their parts: a layer's index may depend on the wavelength.

    Raises
    ------
    Wrong
        With everything that is wrong with it.
    """
    return _TAKE[line.kind](line, raw)


def describe(raw: Any) -> str:
    """Tell a value of any type in few words, safe to show."""
    if isinstance(raw, bool):
        return str(raw).lower()
    if isinstance(raw, str):
        return f'"{shown(raw)}"'
    if isinstance(raw, int) and abs(raw) >= 10**15:
        return "a number out of all bounds"
    if isinstance(raw, int | float):
        return str(raw)
    if isinstance(raw, list):
        return f"a list of {len(raw)}" if raw else "an empty list"
    return "a table" if isinstance(raw, dict) else "a date or time"


def shown(word: str) -> str:
    """A word from the file, safe to show and not too long."""
    return shorten(clean(word), 60)


def nearest(word: Any, words: Iterable[str]) -> str:
    """Find the word that was perhaps meant; "" where none is near."""
    from difflib import get_close_matches

    plain = {candidate.lower(): candidate for candidate in words}
    close = get_close_matches(str(word).lower()[:60], plain, 1, 0.7)
    return plain[close[0]] if close else ""


def did_you_mean(word: str) -> str:
    """Suggest a word at the end of a sentence; "" for none."""
    return f' (did you mean "{word}"?)' if word else ""


def _refuse(line: Line, raw: Any) -> Wrong:
    return Wrong((describe(raw), expected(line)))


def _number(line: Line, raw: Any) -> float:
    if isinstance(raw, bool) or not isinstance(raw, int if line.kind == "count" else int | float):
        raise _refuse(line, raw)
    # Compared before it becomes a float, which a whole number may be too great for.
    if not line.limits.low <= raw <= line.limits.high:
        raise _refuse(line, raw)
    return raw if line.kind == "count" else float(raw)


def _quantity(line: Line, raw: Any) -> float:
    if isinstance(raw, int | float) and not isinstance(raw, bool):
        if line.kind == "fraction":
            return _number(line, raw)
        raise Wrong((f"{describe(raw)} has no unit", expected(line)))
    if not isinstance(raw, str):
        raise _refuse(line, raw)
    try:
        value = parse(raw, line.limits.unit)
    except UnitError as error:
        raise Wrong((clean(error.found), expected(line))) from None
    if not line.limits.low <= value <= line.limits.high:
        raise _refuse(line, raw)
    return value


def _pair(line: Line, raw: Any) -> tuple[float, ...]:
    if not isinstance(raw, list) or len(raw) != 2:
        raise _refuse(line, raw)
    pair = tuple(_each(lambda item: _quantity(line, item), raw))
    if line.kind == "range" and pair[0] > pair[1]:
        raise Wrong((f"{describe(raw[0])} is greater than {describe(raw[1])}", expected(line)))
    return pair


def _each(read: Callable[[Any], Any], raws: Iterable) -> list:
    """Read them all and gather what is wrong with any."""
    values: list = []
    faults: list[tuple[str, str]] = []
    for raw in raws:
        try:
            values.append(read(raw))
        except Wrong as wrong:
            faults += wrong.faults
    if faults:
        raise Wrong(*faults)
    return values


def _yes(line: Line, raw: Any) -> bool:
    if not isinstance(raw, bool):
        raise _refuse(line, raw)
    return raw


def _text(line: Line, raw: Any) -> str:
    if not isinstance(raw, str):
        raise _refuse(line, raw)
    return raw


def _choice(line: Line, raw: Any) -> str:
    if raw not in line.choices:
        raise Wrong((describe(raw), expected(line) + did_you_mean(nearest(raw, line.choices))))
    return raw


def _names(line: Line, raw: Any) -> tuple[str, ...]:
    if not isinstance(raw, list) or not raw:
        raise _refuse(line, raw)
    names: dict[str, None] = {}
    faults = []
    for item in raw:
        name = item.strip() if isinstance(item, str) else ""
        if not name or (line.choices and name not in line.choices):
            faults.append((f"{describe(item)} in the list", expected(line) + did_you_mean(nearest(name, line.choices))))
        elif name in names:
            faults.append((f"{describe(item)} stands twice in the list", "each name once"))
        names[name] = None
    if faults:
        raise Wrong(*faults)
    return tuple(names)


def _plane(line: Line, raw: Any) -> float | None:
    if raw == "middle":
        return None
    return 0.0 if raw == "reference" else _quantity(line, raw)


def _layers(line: Line, raw: Any) -> list[dict]:
    if not isinstance(raw, list) or not raw:
        raise _refuse(line, raw)
    return _each(lambda numbered: _layer(line, numbered[1], f"layer {numbered[0]}"), enumerate(raw, 1))


def _layer(line: Line, raw: Any, name: str) -> dict:
    layer = _table(line, raw, name)
    if ("material" in layer) == ("index" in layer):
        found = "both material and index" if "index" in layer else "neither material nor index"
        raise Wrong((f"{name}: {found}", "one of the two"))
    return layer


def _material(line: Line, raw: Any) -> str:
    # Brings numpy in, which a brief without materials has no need of.
    from visionplan.optics.media import MATERIALS

    if raw not in MATERIALS:
        known = f"one of {', '.join(MATERIALS)}{did_you_mean(nearest(raw, MATERIALS))}, or an index instead"
        raise Wrong((f"{describe(raw)} is not known", known))
    return raw


def _table(line: Line, raw: Any, name: str = "") -> dict:
    """Read a table of the line's parts; faults begin with its name and the part's."""
    place = name + ": " if name else ""
    if not isinstance(raw, dict):
        raise Wrong((place + describe(raw), expected(line)))
    parts = {part.name: part for part in line.parts}
    values, faults = {}, []
    for word, item in raw.items():
        if word not in parts:
            faults.append(
                (
                    f"{place}{describe(word)} is not known",
                    f"one of {', '.join(parts)}{did_you_mean(nearest(word, parts))}",
                )
            )
            continue
        try:
            values[word] = take(parts[word], item)
        except Wrong as wrong:
            faults += [(f"{place}{word}: {found}", wanted) for found, wanted in wrong.faults]
    faults += [
        (f"{place}{word} is missing", f"{word} = {part.example}")
        for word, part in parts.items()
        if part.required and word not in raw
    ]
    if faults:
        raise Wrong(*faults)
    return values


_TAKE: dict[str, Callable[[Line, Any], Any]] = {
    "quantity": _quantity,
    "fraction": _quantity,
    "number": _number,
    "count": _number,
    "yes": _yes,
    "text": _text,
    "material": _material,
    "choice": _choice,
    "names": _names,
    "pair": _pair,
    "range": _pair,
    "plane": _plane,
    "layers": _layers,
    "fold": _table,
}


def give(line: Line, brief: Brief) -> Any:
    """The line's value of a brief as a file would hold it, quantities to 12 digits; None where there is none.

    Lengths and speeds of a brief in inches come in inches.
    """
    value = getattr(brief, line.attribute)
    if line.kind == "plane":
        words = {None: "middle", 0.0: "reference"}
        return words[value] if value in words else _written(line, value, brief)
    if value is None or value == ():
        return None
    if line.kind in ("quantity", "fraction"):
        return _written(line, value, brief)
    if line.kind in ("pair", "range"):
        return [_written(line, item, brief) for item in value]
    if line.kind == "names":
        return list(value)
    if line.kind == "layers":
        thickness = line.parts[-1]
        return [
            ({"material": layer.material} if layer.material else {"index": layer.index})
            | {"thickness": _written(thickness, layer.thickness, brief)}
            for layer in value
        ]
    if line.kind == "fold":
        return {"from_lens": _written(line.parts[0], value.from_lens, brief), "mirrors": value.mirrors}
    return value


def _written(line: Line, value: float, brief: Brief) -> str:
    unit = line.limits.written or line.limits.unit
    if brief.units == "inch" and unit in ("mm", "mm/s"):
        unit = unit.replace("mm", "in")
    return f"{value / factor(unit, line.limits.unit):.12g} {unit}"
