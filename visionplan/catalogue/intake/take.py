"""Take a sheet into a catalogue folder through its column map."""

import os
from pathlib import Path

from visionplan.catalogue.folder import check_currencies
from visionplan.catalogue.intake.columnmap import SheetMap, read_map
from visionplan.catalogue.intake.incoming import Incoming, read_incoming
from visionplan.catalogue.intake.merge import Merged, merge
from visionplan.catalogue.intake.sheet import Sheet, read_sheets
from visionplan.catalogue.intake.writing import write_all
from visionplan.catalogue.items import COLUMNS, Table
from visionplan.catalogue.ledger import Ledger
from visionplan.catalogue.read import read_table
from visionplan.faults import Fault, InputError
from visionplan.text import clean, quoted


def take(
    sheet_file: str, map_file: str, folder: str, everything: bool = False, skip_bad: bool = False
) -> tuple[list[Merged], tuple[Fault, ...]]:
    """Bring a sheet's rows into a catalogue's folder: all files are written or none.

    Parameters
    ----------
    everything : bool
        Update all that the sheet states of known ids; otherwise price, stock and quantity.
    skip_bad : bool
        Leave out the sheet's rows at fault, where otherwise they are errors.

    Returns
    -------
    list of Merged, tuple of Fault
        What became of each file, and what is wrong with the rows left out.

    Raises
    ------
    InputError
        Everything that is wrong; nothing is written then.
    """
    maps = read_map(map_file)
    faults: list[Fault] = []
    arrived: list[Incoming] = []
    for sheet_map in maps.values():
        try:
            arrived.append(read_incoming(_sheet(sheet_file, sheet_map, map_file), sheet_map, map_file))
        except InputError as error:
            faults += error.faults
    spoilt = tuple(fault for incoming in arrived for fault in incoming.faults)
    if faults or (spoilt and not skip_bad):
        raise InputError([*faults, *spoilt])
    before = _read_folder(folder)
    merged = []
    for incoming in arrived:
        item = incoming.table.item
        try:
            merged.append(merge(incoming, before.get(item), os.path.join(folder, f"{item}.csv"), everything))
        except InputError as error:
            faults += error.faults
    if faults:
        raise InputError(faults)
    _check_folder(before, merged, folder)
    data = {f"{one.table.item}.csv": one.data for one in merged if one.data is not None}
    if data:
        write_all(folder, data)
    return merged, spoilt


def _sheet(file: str, sheet_map: SheetMap, map_file: str) -> Sheet:
    sheets = read_sheets(file, sheet_map.encoding, sheet_map.delimiter)
    if not sheet_map.worksheet or not sheets[0].worksheet:
        return sheets[0]
    for sheet in sheets:
        if sheet.worksheet == sheet_map.worksheet:
            return sheet
    found = f"{clean(file)} has no worksheet {quoted(sheet_map.worksheet)}"
    expected = f"one of {', '.join(quoted(sheet.worksheet) for sheet in sheets)}"
    raise InputError([Fault(map_file, found, expected, column=f"{sheet_map.item}.worksheet")])


def _read_folder(folder: str) -> dict[str, bytes]:
    """What the folder's files hold now, by item."""
    try:
        files = {item: Path(folder, f"{item}.csv") for item in COLUMNS}
        return {item: path.read_bytes() for item, path in files.items() if os.path.lexists(path)}
    except OSError as error:
        raise InputError([Fault(error.filename, f"can't be read: {error.strerror}", "a catalogue's file")]) from None
    except ValueError:
        raise InputError([Fault(folder, "no folder can have this name", "the name of a folder")]) from None


def _check_folder(before: dict[str, bytes], merged: list[Merged], folder: str) -> None:
    """Prices of the files that change and of those that stay must be in one currency."""
    read: list[tuple[Table, Ledger]] = []
    changed = {one.table.item: one for one in merged}
    for item in before.keys() - changed.keys():
        ledger = Ledger(os.path.join(folder, f"{item}.csv"))
        table = read_table(before[item], item, ledger)
        if table is not None:
            read.append((table, ledger))
    ledgers = [Ledger(one.file) for one in merged]
    check_currencies([*read, *((one.table, ledger) for one, ledger in zip(merged, ledgers))])
    faults = [fault for ledger in ledgers for fault in ledger.faults()]
    if faults:
        raise InputError(faults)
