"""Cells of a sheet as our files have them."""

import math
import re
from collections.abc import Callable

from visionplan.catalogue.heading import CURRENCY
from visionplan.catalogue.intake.columnmap import SheetMap, Source
from visionplan.catalogue.intake.sheet import Figure, tidy
from visionplan.catalogue.items import Column
from visionplan.text import csv_cell, quoted
from visionplan.units import UnitError

PARTS = re.compile(r"\s*(?:[x×*;…–—/]|\.\.+|\b(?:to|bis)\b|(?<=\d)\s*-)\s*")
"""What parts two values in one cell: 2448 x 2048, 1.4 – 16."""
F_NUMBERS = ("f-number min", "f-number max", "stops")
_BOUNDS = ("distortion", "focal tolerance", "working distance tolerance", "telecentricity", "dark noise")
_F = re.compile(r"\b(?:f\s*/?\s*|1\s*:\s*)(?=\d)", re.IGNORECASE)
_AXIS = re.compile(r"\s*\([hv]\)", re.IGNORECASE)
_BOUND = re.compile(r"^(?:<|≤|<=|±|\+/-|\+-)\s*")
_NUMBER = re.compile(r"([+-]?[\d.,'’ ]*\d[.,]?(?:[eE][+-]?\d+)?)\s*(.*)", re.ASCII)
_MONEY = re.compile(r"(?P<before>[A-Z]{3}|[$€£¥])?\s*(?P<number>[^A-Z$€£¥]*?)\s*(?P<after>[A-Z]{3}|[$€£¥])?")


CODES = {"€": "EUR", "£": "GBP"}
"""Signs of one currency alone."""
_SHARED_SIGNS = {"$": ("USD", "AUD", "CAD", "HKD", "MXN", "NZD", "SGD", "TWD"), "¥": ("JPY", "CNY")}


def converter(source: Source, sheet_map: SheetMap) -> Callable[[str], tuple[str, ...]]:
    """Make what turns a cell of a column into a cell for each of our columns; raises UnitError."""

    def convert(cell: str) -> tuple[str, ...]:
        text = tidy(cell)
        if text.casefold() in sheet_map.empty:
            text = ""
        text = source.words.get(text.casefold(), text)
        if not text:
            return ("",) * len(source.columns)
        if any(column.name in F_NUMBERS for column in source.columns):
            text = _F.sub("", text)
        parts = PARTS.split(_AXIS.sub("", text)) if len(source.columns) > 1 else [text]
        if len(parts) != len(source.columns):
            names = " and ".join(column.name for column in source.columns)
            raise UnitError(f"{quoted(text)} is not {len(source.columns)} values", f"{names}, parted by x, – or /")
        plain = isinstance(cell, Figure)
        return tuple(_convert(part, column, source, sheet_map, plain) for part, column in zip(parts, source.columns))

    return convert


def _convert(text: str, column: Column, source: Source, sheet_map: SheetMap, plain: bool) -> str:
    if column.kind == "stops":
        return " ".join(_decimal(word, sheet_map, plain) for word in re.split(r"[\s;/]+", text) if word)
    if column.kind not in ("number", "count"):
        word = text.casefold()
        return word if word in column.choices else csv_cell(text)
    if column.currency:
        text = _without_currency(text, source.unit)
    if column.name in _BOUNDS:
        text = _BOUND.sub("", text)
    match = _NUMBER.fullmatch(text.replace("−", "-"))
    if match is None:
        return text  # the reader says what was expected
    number = _decimal(match[1], sheet_map, plain)
    if source.factor != 1:
        number = _scaled(number, source.factor)
    return f"{number} {match[2]}".rstrip()


def _decimal(text: str, sheet_map: SheetMap, plain: bool) -> str:
    """Write a number with a decimal point and nothing between its digits."""
    if plain:
        return text
    decimal, thousands = re.escape(sheet_map.decimal), re.escape(sheet_map.thousands)
    if thousands and re.fullmatch(rf"[+-]?\d{{1,3}}(?:{thousands}\d{{3}})+(?:{decimal}\d*)?", text):
        text = text.replace(sheet_map.thousands, "")
    other = "," if sheet_map.decimal == "." else "."
    if other in text:
        sign = {",": "a comma", ".": "a point"}[other]
        expected = f"a number with decimal '{sheet_map.decimal}', as the map says, and thousands "
        expected += f"parted by '{sheet_map.thousands}'" if thousands else "not parted"
        raise UnitError(f"{quoted(text)} has {sign}", expected)
    return text.replace(sheet_map.decimal, ".")


def _scaled(number: str, factor: float) -> str:
    try:
        value = float(number) * factor
    except ValueError:
        return number
    return f"{value:.15g}" if math.isfinite(value) else number


def _without_currency(text: str, unit: str) -> str:
    match = _MONEY.fullmatch(text)
    named = match and (match["before"] or match["after"])
    if not match or not named:
        return text
    same = CODES.get(named, named) == CODES.get(unit, unit) or unit in _SHARED_SIGNS.get(named, ())
    if not same or (match["before"] and match["after"]):
        expected = f"a price in {unit}, as the map says" if CURRENCY.fullmatch(unit) else "the unit said in the map"
        raise UnitError(f"{quoted(text)} names the currency {named}", expected)
    return match["number"]
