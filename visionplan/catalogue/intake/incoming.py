"""A sheet's rows as a table of ours, checked as if they stood in a file of ours."""

import csv
import io
import re
from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass

from visionplan.catalogue.heading import nearest
from visionplan.catalogue.intake.columnmap import SheetMap, Source
from visionplan.catalogue.intake.convert import converter
from visionplan.catalogue.intake.sheet import Figure, Row, Sheet
from visionplan.catalogue.items import COLUMNS, Table
from visionplan.catalogue.ledger import Ledger
from visionplan.catalogue.read import read_table, without
from visionplan.faults import Fault, InputError
from visionplan.text import quoted
from visionplan.units import UnitError


@dataclass(frozen=True)
class Incoming:
    """What a sheet brings."""

    table: Table
    """The good rows."""
    units: dict[str, str]
    """By column that the map names: the unit that a bare number has; in the order of our columns."""
    cells: dict[int, list[str]]
    """By line of the table: the cells of these columns."""
    faults: tuple[Fault, ...]
    """What is wrong with the other rows, with the sheet's own places."""


def read_incoming(sheet: Sheet, sheet_map: SheetMap, map_file: str) -> Incoming:
    """Read a sheet through its map.

    Raises
    ------
    InputError
        Where the map doesn't suit the sheet, or the sheet has no good row.
    """
    rows = sheet.rows()
    headings = _headings(rows, sheet, sheet_map, map_file)
    places = _places(headings, sheet, sheet_map, map_file)
    columns = [column.name for column in COLUMNS[sheet_map.item]]
    units = {column.name: source.unit for source in sheet_map.sources for column in source.columns}
    units = dict(sorted((units | dict.fromkeys(sheet_map.fixed, "")).items(), key=lambda pair: columns.index(pair[0])))
    ledger = Ledger(sheet.file)
    cells = dict(_converted(rows, sheet_map, places, units, len(headings), ledger))

    written = Ledger(sheet.file)
    table = read_table(_as_file(units, cells, sheet_map.heading), sheet_map.item, written)
    if table is None or written.fatal:
        raise InputError(_unsuited(written.faults(), sheet_map.item, map_file))
    theirs = {column.name: source.heading for source in sheet_map.sources for column in source.columns}
    _check_fixed(written.faults(), sheet_map, map_file)
    faults = ledger.faults()
    for fault in written.faults():
        heading = theirs.get(fault.column.partition(" [")[0], fault.column)
        if fault.line is None or not ledger.knows(fault.line, heading):
            faults.append(fault._replace(column=heading))
    faults = [_readdressed(fault, places, sheet) for fault in faults]
    faults.sort(key=lambda fault: fault.line or 2**31)
    table = without(ledger.bad, table)
    if faults and not len(table):
        raise InputError(faults)
    return Incoming(table, units, cells, tuple(faults))


def _check_fixed(faults: Sequence[Fault], sheet_map: SheetMap, map_file: str) -> None:
    """A fault of a cell that all rows have is the map's."""
    fixed = {fault.column: fault for fault in reversed(faults) if fault.column in sheet_map.fixed}
    if fixed:
        where = f"{sheet_map.item}.fixed"
        raise InputError(
            [Fault(map_file, one.found, one.expected, column=f"{where}.{name}") for name, one in fixed.items()]
        )


def _headings(rows: Iterator[Row], sheet: Sheet, sheet_map: SheetMap, map_file: str) -> list[str]:
    for row in rows:
        if row.number == sheet_map.heading:
            return sheet.headings(row.cells)
        if row.number > sheet_map.heading:
            break
    found = f"nothing stands in row {sheet_map.heading} of {sheet.file}"
    raise InputError([Fault(map_file, found, "the row with the headings", column=f"{sheet_map.item}.heading")])


def _places(headings: list[str], sheet: Sheet, sheet_map: SheetMap, map_file: str) -> dict[str, int]:
    """Where each heading that the map names stands."""
    faults = []
    for source in sheet_map.sources:
        if source.heading in headings:
            continue
        alike = [name for name in headings if re.fullmatch(re.escape(source.heading) + r" \(column \w+\)", name)]
        if alike:
            found = f"several columns of {sheet.file} have the heading {quoted(source.heading)}"
            expected = " or ".join(map(quoted, alike))
        else:
            meant = nearest(source.heading, headings)
            hint = f" (is {quoted(meant)} meant?)" if meant else ""
            found = f"{sheet.file} has no heading {quoted(source.heading)}{hint}"
            expected = f"one that stands in row {sheet_map.heading}"
        faults.append(Fault(map_file, found, expected, column=f"{sheet_map.item}.columns"))
    if faults:
        raise InputError(faults)
    return {source.heading: headings.index(source.heading) for source in sheet_map.sources}


def _converted(
    rows: Iterator[Row],
    sheet_map: SheetMap,
    places: dict[str, int],
    units: dict[str, str],
    count: int,
    ledger: Ledger,
) -> Iterator[tuple[int, list[str]]]:
    """The rows as cells of ours, those that can't be read left empty and noted."""
    order = {name: at for at, name in enumerate(units)}
    blank = [""] * len(order)
    for name, cell in sheet_map.fixed.items():
        blank[order[name]] = cell
    targets = [(source, places[source.heading], _Memo(source, sheet_map)) for source in sheet_map.sources]
    slots = [[order[column.name] for column in source.columns] for source in sheet_map.sources]
    for number, cells, spoilt in rows:
        if number < sheet_map.first:
            continue
        if len(cells) > count and any(map(str.strip, cells[count:])):
            ledger.of_row(number, f"the row has {len(cells)} cells, the heading {count}", f"{count} cells")
            continue
        cells += [""] * (count - len(cells))
        if not spoilt and not any(cells[at].strip() for _, at, _ in targets):
            continue
        row = list(blank)
        for (source, at, memo), slot in zip(targets, slots):
            if at in spoilt:
                ledger.of_row(number, *spoilt[at], source.heading)
                continue
            values = memo(cells[at])
            if isinstance(values, UnitError):
                ledger.of_row(number, values.found, values.expected, source.heading)
                continue
            for place, value in zip(slot, values):
                row[place] = value
        yield number, row


class _Memo:
    """Converts each text of a column once."""

    def __init__(self, source: Source, sheet_map: SheetMap):
        self._convert: Callable[[str], tuple[str, ...]] = converter(source, sheet_map)
        self._known: dict[tuple[str, bool], tuple[str, ...] | UnitError] = {}

    def __call__(self, cell: str) -> tuple[str, ...] | UnitError:
        key = cell, isinstance(cell, Figure)
        values = self._known.get(key)
        if values is None:
            try:
                values = self._convert(cell)
            except UnitError as error:
                values = error
            self._known[key] = values
        return values


def _as_file(units: dict[str, str], cells: dict[int, list[str]], heading: int) -> bytes:
    """Write the rows as a file of ours, each in the line of its number."""
    text = io.StringIO()
    writer = csv.writer(text, lineterminator="\n")
    text.write("\n" * (heading - 1))
    writer.writerow([titled(name, unit) for name, unit in units.items()])
    line = heading + 1
    for number, row in cells.items():
        text.write("\n" * (number - line))
        writer.writerow(row)
        line = number + 1
    return text.getvalue().encode("utf-8", "replace")


def titled(name: str, unit: str) -> str:
    """Write the heading of a column of ours."""
    return f"{name} [{unit}]" if unit else name


def _readdressed(fault: Fault, places: dict[str, int], sheet: Sheet) -> Fault:
    """Say the address of a workbook's cell, in place of its heading alone."""
    if not sheet.worksheet or not fault.line or fault.column not in places:
        return fault
    return fault._replace(column=f"{sheet.column(places[fault.column])}{fault.line} {fault.column}")


def _unsuited(faults: Sequence[Fault], item: str, map_file: str) -> list[Fault]:
    """Word the faults of the heading that the map makes."""
    worded = []
    for fault in faults:
        if "the column is missing" in fault.found:
            found = f"no column of the sheet is mapped to '{fault.column}'"
            fault = Fault(map_file, found, "a line for it, or a cell under 'fixed'", column=f"{item}.columns")
        worded.append(fault)
    return worded
