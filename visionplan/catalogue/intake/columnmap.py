"""The column map: which of a sheet's columns is which of ours, in what unit; reading it from its file (TOML)."""

import re
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

from visionplan.catalogue.heading import CURRENCY, nearest
from visionplan.catalogue.items import COLUMNS, Column
from visionplan.faults import Fault, InputError
from visionplan.text import quoted
from visionplan.units import UnitError, factor

EMPTY = ("-", "–", "—", "n/a")
"""What stands for nothing in a cell, unless the map says otherwise."""


@dataclass(frozen=True)
class Source:
    """One column of the sheet."""

    heading: str
    columns: tuple[Column, ...]
    """Ours; with more than one the cell is parted into as many values, as "2448 x 2048"."""
    unit: str = ""
    """Of numbers that carry none; of a price its currency."""
    factor: float = 1.0
    """Numbers are multiplied by it."""
    words: Mapping[str, str] = field(default_factory=dict)
    """Their words, in small letters → ours; "" for not stated."""


@dataclass(frozen=True)
class SheetMap:
    """How to read one item's rows."""

    item: str
    """lenses, cameras or spacers."""
    sources: tuple[Source, ...]
    heading: int = 1
    """The row, or the line, with the headings."""
    first: int = 0
    """The row, or the line, where the items begin; 0 for the one after the headings."""
    worksheet: str = ""
    encoding: str = ""
    delimiter: str = ""
    decimal: str = "."
    thousands: str = ""
    empty: tuple[str, ...] = EMPTY
    fixed: Mapping[str, str] = field(default_factory=dict)
    """By our column: a cell that all rows have, where the sheet has no such column."""


def read_map(path: str) -> dict[str, SheetMap]:
    """Read a column map, by item.

    Raises
    ------
    InputError
        Everything that is wrong with it.
    """
    expected = "a column map (TOML), as 'visionplan catalogue map' starts it"
    try:
        text = Path(path).read_bytes().decode("utf-8-sig")
        document = tomllib.loads(text)
    except OSError as error:
        raise InputError([Fault(path, f"can't be read: {error.strerror}", expected)]) from None
    except UnicodeDecodeError:
        raise InputError([Fault(path, "is not UTF-8 text", expected)]) from None
    except (ValueError, RecursionError) as error:
        place = re.search(r" \(at line (\d+), column \d+\)", str(error))
        found = str(error)[: place.start()] if place else str(error)
        raise InputError([Fault(path, found, "valid TOML", int(place[1]) if place else None)]) from None
    reader = _Reader(path, text)
    maps = reader.read(document)
    if reader.faults:
        raise InputError(reader.faults)
    return maps


class _Reader:
    """Collects the faults of one map."""

    def __init__(self, path: str, text: str):
        self.path, self.faults = path, list[Fault]()
        self._rows = text.splitlines()

    def line(self, key: str) -> int | None:
        """Where a key first stands at the beginning of a line."""
        starts = tuple(f"{quote}{key}{quote}" for quote in ('"', "'", ""))
        return next((at for at, row in enumerate(self._rows, 1) if row.lstrip("[ \t").startswith(starts)), None)

    def fault(self, key: str, found: str, expected: str) -> None:
        self.faults.append(Fault(self.path, found, expected, self.line(key.rpartition(".")[2]), key))

    def read(self, document: dict[str, Any]) -> dict[str, SheetMap]:
        for item in document.keys() - COLUMNS.keys():
            self.fault(item, f"{quoted(item)} is no item", "one of [lenses], [cameras] and [spacers]")
        maps = {item: self._item(item, document[item]) for item in COLUMNS if item in document}
        if not maps and not self.faults:
            self.faults.append(Fault(self.path, "the map is empty", "one of [lenses], [cameras] and [spacers]"))
        return maps

    def _item(self, item: str, table: Any) -> SheetMap:
        if not isinstance(table, dict):
            self.fault(item, "is no section", f"[{item}]")
            return SheetMap(item, ())
        settings: dict[str, Any] = {}
        for key, value in table.items():
            if key == "columns":
                continue
            if key not in _SETTINGS:
                meant = nearest(key, _SETTINGS)
                hint = f" (is '{meant}' meant?)" if meant else ""
                self.fault(f"{item}.{key}", f"{quoted(key)} is no setting{hint}", f"one of {', '.join(_SETTINGS)}")
            elif not _SETTINGS[key][0](value):
                self.fault(f"{item}.{key}", f"{quoted(str(value))} won't do", _SETTINGS[key][1])
            else:
                settings[key] = tuple(word.casefold() for word in value) if key == "empty" else value
        if settings.get("thousands") and settings["thousands"] == settings.get("decimal", "."):
            self.fault(f"{item}.thousands", "is the decimal sign too", "two different signs")
        return SheetMap(item, self._sources(item, table.get("columns", {}), settings.get("fixed", {})), **settings)

    def _sources(self, item: str, entries: Any, fixed: dict[str, str]) -> tuple[Source, ...]:
        if not isinstance(entries, dict) or not entries:
            self.fault(item, "maps no column", f"[{item}.columns] with a line a column: \"their heading\" = 'ours'")
            return ()
        ours = {column.name: column for column in COLUMNS[item]}
        taken: dict[str, str] = {}
        for name in fixed:
            self._take(name, "fixed", f"{item}.fixed", ours, taken)
        sources = []
        for heading, entry in entries.items():
            key = f"{item}.columns.{heading}"
            entry = {"is": entry} if isinstance(entry, (str, list)) else entry
            if not isinstance(entry, dict) or not entry.keys() <= {"is", *_OF_COLUMN}:
                self.fault(
                    key, "is no such line", '"column", or { is = "column", unit = "mm", factor = 1, words = {} }'
                )
                continue
            names = entry.get("is", "")
            names = [names] * (names != "") if isinstance(names, str) else names
            if not isinstance(names, list) or not all(isinstance(name, str) for name in names):
                self.fault(key, "'is' names no column", "a column of ours, or several in a list")
                continue
            bad = [name for name, (fits, _) in _OF_COLUMN.items() if name in entry and not fits(entry[name])]
            for name in bad:
                self.fault(key, f"{name} {quoted(str(entry[name]))} won't do", _OF_COLUMN[name][1])
            known = [ours[name] for name in names if self._take(name, quoted(heading), key, ours, taken)]
            if known and not bad:
                sources.append(self._source(key, heading, known, entry))
        return tuple(sources)

    def _take(self, name: str, by: str, key: str, ours: dict[str, Column], taken: dict[str, str]) -> bool:
        """Whether a column is ours and not taken yet."""
        if name not in ours:
            meant = nearest(name, ours)
            hint = f" (is '{meant}' meant?)" if meant else ""
            self.fault(key, f"{quoted(name)} is no column of ours{hint}", f"one of {', '.join(ours)}")
        elif name in taken:
            self.fault(key, f"'{name}' is taken from {taken[name]} already", "each column of ours once")
        else:
            taken[name] = by
            return True
        return False

    def _source(self, key: str, heading: str, columns: list[Column], entry: dict[str, Any]) -> Source:
        unit = entry.get("unit", "").strip()
        for column in columns:
            if not unit or (column.currency and CURRENCY.fullmatch(unit)):
                continue
            try:
                if column.kind not in ("number", "count"):
                    raise UnitError(f"'{column.name}' has no unit", "no unit")
                factor(unit, column.unit)
            except UnitError as error:
                expected = f"the unit of {error.expected}" if column.unit else "none here"
                self.fault(key, error.found, expected)
        words = {theirs.strip().casefold(): word for theirs, word in entry.get("words", {}).items()}
        return Source(heading, tuple(columns), unit, float(entry.get("factor", 1.0)), words)


def _is_text(value: Any) -> bool:
    return isinstance(value, str) and bool(value.strip())


def _is_row(value: Any) -> bool:
    return isinstance(value, int) and not isinstance(value, bool) and value > 0


def _is_sign(value: Any) -> bool:
    return isinstance(value, str) and len(value) == 1 and value not in '"\r\n\0'


def _is_factor(value: Any) -> bool:
    return isinstance(value, (int, float)) and not isinstance(value, bool) and 1e-12 <= abs(value) <= 1e12


def _are_words(value: Any) -> bool:
    return isinstance(value, dict) and all(isinstance(word, str) for word in value.values())


_SETTINGS = {
    "heading": (_is_row, "the row with the headings, such as 1"),
    "first": (_is_row, "the row where the items begin, such as 3"),
    "worksheet": (_is_text, "the name of a worksheet"),
    "encoding": (_is_text, "an encoding such as 'windows-1252'"),
    "delimiter": (_is_sign, "one character such as ';'"),
    "decimal": (lambda value: value in (".", ","), "'.' or ','"),
    "thousands": (
        lambda value: value == "" or (_is_sign(value) and not value.isdigit()),
        "one character such as '.', or '' for none",
    ),
    "empty": (
        lambda value: isinstance(value, list) and all(isinstance(word, str) for word in value),
        "a list of words that stand for nothing, such as ['-', 'n/a']",
    ),
    "fixed": (_are_words, "a table of our columns with the cell that all rows have, such as { mount = 'C' }"),
}
_OF_COLUMN = {
    "unit": (lambda value: isinstance(value, str), "a unit in quotes, such as 'mm'"),
    "factor": (_is_factor, "a number other than 0, such as 0.01"),
    "words": (_are_words, "a table of their words with ours, such as { Farbe = 'colour' }"),
}
