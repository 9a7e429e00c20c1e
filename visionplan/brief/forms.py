"""Values of the brief as a person types them in an interface, and as an interface shows them."""

import re
import tomllib
from collections.abc import Callable
from typing import Any

from visionplan.brief import toml
from visionplan.brief.fields import BY_KEY, Line
from visionplan.brief.model import Brief
from visionplan.brief.values import Wrong, describe, give, take
from visionplan.faults import Fault, InputError
from visionplan.units import UnitError, number

_BETWEEN = {"pair": re.compile(r"\s*[,x×]\s*"), "range": re.compile(r"\s*(?:,|\.{2,})\s*")}
_LAYER = re.compile(r"(.+?)\s+([\d.]+\s*[^\W\d]\w*)")
_FOLD = re.compile(r"([^,]+?)(?:\s*,\s*(\d+)(?:\s*mirrors?)?)?")
_YES = {"yes": True, "true": True, "no": False, "false": False}


def parse_value(key: str, text: str) -> Any:
    """Read what a person typed for a line, as the file would hold it.

    Takes plain forms, `120 mm, 90 mm` or `120 x 90 mm`, `250..450 mm`, `20 %`, `C, CS`, `yes`,
    `N-BK7 6 mm, 1.333 20 mm` (layers), `120 mm, 1 mirror` (fold), and the file's own, `["C", "CS"]`.

    Raises
    ------
    InputError
        Where the line doesn't take it, with no file or line of a file.
    """
    line = BY_KEY[key]
    try:
        raw = _typed(line, text)
        take(line, raw)
    except Wrong as wrong:
        example = _shown(line, _loaded(line.example))
        faults = [
            (found, expected.replace(f"such as {line.example}", f"such as {example}"))
            for found, expected in wrong.faults
        ]
        raise InputError([Fault("", found, expected, column=key) for found, expected in faults]) from None
    return raw


def value_texts(text: str) -> dict[str, str]:
    """By key, what the lines of a brief's text say, in the form that `parse_value` takes."""
    data, _ = toml.load(text)
    texts = {}
    for key, line in BY_KEY.items():
        section = (data or {}).get(line.section, {}) if line.section else data or {}
        if isinstance(section, dict) and line.name in section:
            texts[key] = _shown(line, section[line.name])
    return texts


def value_text(source: Brief | str, key: str) -> str:
    """What a line says, in the form that `parse_value` takes.

    Of a brief's text as it stands there, "" where it doesn't; of a `Brief` the value that holds, to 12 digits, "" for
    none.

    >>> value_text('[scene]\\nfield = ["120 mm", "90 mm"]', "scene.field")
    '120 mm, 90 mm'
    """
    if isinstance(source, str):
        return value_texts(source).get(key, "")
    raw = give(BY_KEY[key], source)
    return "" if raw is None else _shown(BY_KEY[key], raw)


def item(raw: Any) -> Any:
    """A value as a TOML item, on one line."""
    import tomlkit

    if isinstance(raw, list):
        array = tomlkit.array()
        for element in raw:
            array.append(item(element))
        return array
    if isinstance(raw, dict):
        table = tomlkit.inline_table()
        table.update({name: item(value) for name, value in raw.items()})
        return table
    return tomlkit.item(raw)


def _typed(line: Line, text: str) -> Any:
    """What was typed as the file would hold it; what makes no sense for the line as it is, for `take` to refuse."""
    text = text.strip()
    if text.startswith(('"', "'") if line.kind == "text" else ('"', "'", "[", "{")):
        try:
            return _loaded(text)
        except (ValueError, RecursionError):
            pass
    return _FORMS[line.kind](text) if line.kind in _FORMS else text


def _loaded(text: str) -> Any:
    """The value that one TOML expression stands for; ValueError where it isn't one."""
    data = tomllib.loads(f"value = {text}")
    if len(data) != 1:
        raise ValueError(text)
    return data["value"]


def _number(text: str) -> int | float | str:
    try:
        value = number(text)
    except UnitError:
        return text
    return int(value) if value.is_integer() and text.isdecimal() else value


def _pair(text: str, between: re.Pattern) -> list[str] | str:
    parts = between.split(text)
    if len(parts) != 2:
        return text
    # In 120 x 90 mm the unit belongs to both.
    unit = parts[1].lstrip("+-.0123456789 ")
    return [f"{parts[0]} {unit}".rstrip() if isinstance(_number(parts[0]), int | float) else parts[0], parts[1]]


def _yes(text: str) -> bool:
    if text.lower() not in _YES:
        raise Wrong((describe(text), "yes or no"))
    return _YES[text.lower()]


def _names(text: str) -> list[str]:
    return [name.strip() for name in text.split(",")]


def _layers(text: str) -> list[dict] | str:
    layers = []
    for part in text.split(","):
        match = _LAYER.fullmatch(part.strip())
        if match is None:
            return text
        name = _number(match[1])
        layers.append({"material" if isinstance(name, str) else "index": name, "thickness": match[2]})
    return layers


def _fold(text: str) -> dict | str:
    match = _FOLD.fullmatch(text)
    return {"from_lens": match[1]} | ({"mirrors": int(match[2])} if match[2] else {}) if match else text


_FORMS: dict[str, Callable[[str], Any]] = {
    "fraction": _number,
    "number": _number,
    "count": _number,
    "yes": _yes,
    "names": _names,
    "pair": lambda text: _pair(text, _BETWEEN["pair"]),
    "range": lambda text: _pair(text, _BETWEEN["range"]),
    "layers": _layers,
    "fold": _fold,
}


def _shown(line: Line, raw: Any) -> str:
    """The plain form of a value, where typing that gives the value back, else the file's own."""
    text = _plain(line, raw)
    try:
        if text.isprintable() and text == text.strip() and _typed(line, text) == raw:
            return text
    except Wrong:
        pass
    try:
        return item(raw).as_string()
    except ValueError:
        return str(raw)


def _plain(line: Line, raw: Any) -> str:
    if isinstance(raw, bool):
        return "yes" if raw else "no"
    if isinstance(raw, float):
        return f"{raw:.12g}"
    if isinstance(raw, list):
        return ", ".join(_plain(line, element) for element in raw)
    if isinstance(raw, dict) and line.kind == "layers":
        return f"{_plain(line, raw.get('material', raw.get('index')))} {raw.get('thickness')}"
    if isinstance(raw, dict) and line.kind == "fold":
        mirrors = raw.get("mirrors", 1)
        return f"{raw.get('from_lens')}, {mirrors} mirror{'' if mirrors == 1 else 's'}"
    return str(raw)
