"""Read a brief: the whole of it, or everything that is wrong with it."""

from functools import cached_property
from os import PathLike
from types import SimpleNamespace
from typing import Any

from visionplan.brief import toml
from visionplan.brief.fields import BY_KEY, LINES, SECTIONS, TASKS
from visionplan.brief.files import name_of, read_text
from visionplan.brief.layers import settle
from visionplan.brief.model import Brief, Fold
from visionplan.brief.rules import check
from visionplan.brief.values import Wrong, describe, did_you_mean, nearest, shown, take
from visionplan.faults import Fault, InputError

MOST_SUGGESTIONS = 20
"""Looking for the word that was meant takes a while, and a file with more unknown words is no brief."""


def read_brief(path: str | PathLike[str]) -> Brief:
    """Read a brief from a file, or from standard input for "-".

    Raises
    ------
    InputError
        With everything that is wrong with it.
    """
    return parse_brief(read_text(path), name_of(path))


def parse_brief(text: str, name: str) -> Brief:
    """Read a brief from its text; `name` is the file's, for messages.

    Raises
    ------
    InputError
        With everything that is wrong with it.
    """
    reading = _Reading(text, name)
    raws = reading.raws()
    values = reading.values(raws)
    reading.rules(values, raws)
    if reading.faults:
        raise InputError(sorted(reading.faults, key=lambda fault: (fault.line is None, fault.line or 0)))
    if "task" in values:
        values["pixels_per_feature"] = float(TASKS[values["task"]])
    if "layers" in values:
        values["layers"] = settle(values["layers"], values.get("wavelength", Brief.wavelength))
    if "fold" in values:
        values["fold"] = Fold(**values["fold"])
    return Brief(**values, stated=frozenset(raws), source=name)


class _Reading:
    """A brief on its way from text to values, and what is wrong with it so far."""

    def __init__(self, text: str, name: str):
        self.text = text
        self.name = name
        self.faults: list[Fault] = []
        self.bad: set[str] = set()
        """Keys that have a fault, or that a misspelt one was perhaps meant for."""

    @cached_property
    def lines(self) -> dict[str, int]:
        return toml.lines(self.text)

    def fault(self, key: str, found: str, expected: str, line: int | None = None) -> None:
        self.bad.add(key)
        line = line or self.lines.get(key) or self.lines.get(key.rpartition(".")[0])
        self.faults.append(Fault(self.name, found, expected, line, shown(key)))

    def raws(self) -> dict[str, Any]:
        """The values in the file by key, of any type, of the lines that a brief has."""
        if not self.text.strip():
            needed = ", ".join(line.key for line in LINES if line.required)
            raise InputError([Fault(self.name, "the file is empty", f"a brief with at least {needed}")])
        data, faults = toml.load(self.text)
        for wrong in faults:
            self.fault(wrong.key, wrong.found, wrong.expected or _form(wrong.key), wrong.line)
        if data is None:
            raise InputError(self.faults)
        raws: dict[str, Any] = {}
        for name, raw in data.items():
            if name in BY_KEY and not BY_KEY[name].section:
                raws[name] = raw
                continue
            section = self.section(name, raw)
            for inner, value in raw.items() if section else ():
                key = f"{section}.{inner}"
                if key in BY_KEY:
                    raws[key] = value
                else:
                    self.unknown(section, inner, name)
        return raws

    def section(self, name: str, raw: Any) -> str:
        """The section that a name at the top level stands for; "" where none does."""
        known = [section for section in SECTIONS if section]
        if name in known:
            if isinstance(raw, dict):
                return name
            self.fault(name, describe(raw), f"a section [{name}]")
            self.bad |= {line.key for line in LINES if line.section == name}
            return ""
        if not isinstance(raw, dict):
            self.unknown("", name, "")
            return ""
        meant = self.meant(name, known)
        names = ", ".join(f"[{section}]" for section in known)
        self.fault(name, f"[{shown(name)}] is no section of a brief", f"one of {names}{did_you_mean(meant)}")
        if meant:
            own = {key: line for key, line in self.lines.items() if key == name or key.startswith(f"{name}.")}
            self.lines.update({meant + key[len(name) :]: line for key, line in own.items()})
        return meant

    def unknown(self, section: str, name: str, written: str) -> None:
        """Complain of a line that the brief doesn't have, in a section as written."""
        own = [line.name for line in LINES if line.section == section]
        others = [line.section for line in LINES if line.name == name]
        meant = "" if others else self.meant(name, own)
        if others:
            expected = " or ".join(f"it in [{other}]" if other else "it before the first section" for other in others)
        else:
            expected = f"one of {', '.join(own)}{did_you_mean(meant)}"
        self.bad |= {line.key for line in LINES if line.name in (name, meant)}
        place = f"in [{shown(written)}]" if written else "before the first section"
        self.fault(f"{written}.{name}".lstrip("."), f"{shown(name)} is not known {place}", expected)

    def meant(self, word: str, words: list[str]) -> str:
        """The word that was perhaps meant; "" for none, or where there are too many faults to look."""
        return nearest(word, words) if len(self.faults) < MOST_SUGGESTIONS else ""

    def values(self, raws: dict[str, Any]) -> dict[str, Any]:
        """The values in core units by attribute, of the lines that could be read."""
        values = {}
        for key, raw in raws.items():
            try:
                values[BY_KEY[key].attribute] = take(BY_KEY[key], raw)
            except Wrong as wrong:
                for found, expected in wrong.faults:
                    self.fault(key, found, expected)
        for line in LINES:
            if line.required and line.key not in raws and line.key not in self.bad:
                self.fault(line.key, f"{line.name} is missing", f"{line.name} = {line.example} in [{line.section}]")
        return values

    def rules(self, values: dict[str, Any], raws: dict[str, Any]) -> None:
        """Complain of what contradicts what."""
        brief = SimpleNamespace(**{line.attribute: line.default for line in LINES} | values)
        bad = frozenset(self.bad)
        for key, found, expected in check(brief, raws.keys(), lambda *keys: bad.isdisjoint(keys)):
            self.fault(key, found, expected)


def _form(key: str) -> str:
    if key in BY_KEY:
        return f"{BY_KEY[key].name} = {BY_KEY[key].example}"
    return 'name = value, words and quantities in quotes: speed = "300 mm/s"'
