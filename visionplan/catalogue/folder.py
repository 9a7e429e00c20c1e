"""Read a catalogue: a folder with lenses.csv, cameras.csv and, where there are any, spacers.csv."""

import hashlib
from pathlib import Path

from visionplan.catalogue.heading import nearest
from visionplan.catalogue.items import COLUMNS, Catalogue, Table
from visionplan.catalogue.ledger import Ledger
from visionplan.catalogue.read import read_table
from visionplan.faults import Fault, InputError
from visionplan.text import quoted

_OPTIONAL = ("spacers",)
_NO_SPACERS = b"id,mount,length [mm]\n"
_MOST_TOLD = 50


def read_catalogue(folder: Path | str, skip_bad: bool = False) -> Catalogue:
    """Read and check a catalogue.

    Parameters
    ----------
    folder : Path or str
        Holds lenses.csv and cameras.csv; spacers.csv may be missing.
    skip_bad : bool
        Leave out the rows at fault and say so in the catalogue's warnings, where otherwise they are errors.

    Raises
    ------
    InputError
        Everything that is wrong with all files. With `skip_bad` only what leaving out rows does not cure: a file
        that is missing or can't be read, a heading at fault, a file with no good row.
    """
    folder = Path(folder)
    _check_folder(folder)
    ledgers = {item: Ledger(str(folder / f"{item}.csv")) for item in COLUMNS}
    digest = hashlib.sha256()
    tables: dict[str, Table] = {}
    for item, ledger in ledgers.items():
        data = _read_bytes(Path(ledger.file), ledger, item in _OPTIONAL)
        if data is not None:
            digest.update(f"{item}.csv {len(data)}\n".encode())
            digest.update(data)
        if not ledger.fatal:
            table = read_table(_NO_SPACERS if data is None else data, item, ledger)
            if table is not None:
                tables[item] = table
    _check_currencies(tables, ledgers)
    for item, table in tables.items():
        if not len(table) and ledgers[item].bad and item not in _OPTIONAL:
            ledgers[item].fatal = True
    faults = [fault for ledger in ledgers.values() if ledger.fatal or not skip_bad for fault in ledger.faults()]
    if faults:
        raise InputError(faults)
    warnings = [warning for item in tables for warning in (*_skipped(ledgers[item]), *_noted(tables[item]))]
    return Catalogue(**tables, fingerprint=f"sha256:{digest.hexdigest()}", warnings=tuple(warnings))


def _check_folder(folder: Path) -> None:
    try:
        if folder.is_dir():
            return
        found = "a file stands here" if folder.exists() else "there is no such folder"
    except OSError as error:
        found = f"the folder can't be read: {error.strerror}"
    raise InputError([Fault(str(folder), found, "a folder with lenses.csv and cameras.csv")])


def _read_bytes(path: Path, ledger: Ledger, optional: bool) -> bytes | None:
    expected = "a comma-separated file"
    try:
        if path.is_file():
            return path.read_bytes()
        if path.exists():
            ledger.of_file("this is no file", expected)
        elif not optional:
            ledger.of_file("the file is missing", expected)
    except OSError as error:
        ledger.of_file(f"the file can't be read: {error.strerror}", expected)
    return None


def _check_currencies(tables: dict[str, Table], ledgers: dict[str, Ledger]) -> None:
    named = {item: table.currency for item, table in tables.items() if table.currency}
    for item, currency in list(named.items())[1:]:
        first = next(iter(named))
        if currency != named[first]:
            found = f"prices are in {currency}, those of {first}.csv in {named[first]}"
            ledgers[item].of_file(found, "one currency in all files", column="price")


def _skipped(ledger: Ledger) -> list[str]:
    if not ledger.bad:
        return []
    faults = ledger.faults()
    told = [f"row skipped: {fault}" for fault in faults[:_MOST_TOLD]]
    count = len(ledger.bad)
    return [*told, f"{ledger.file}: {count:,} {'rows' if count > 1 else 'row'} skipped in all"]


def _noted(table: Table) -> list[str]:
    if not table.notes:
        return []
    ours = [column.name for column in COLUMNS[table.item]]
    names = []
    for note in table.notes[:_MOST_TOLD]:
        meant = nearest(note, ours)
        names.append(quoted(note) + (f" (is '{meant}' meant?)" if meant else ""))
    return [f"{table.file}: unknown columns kept as notes: {', '.join(names)}"]
