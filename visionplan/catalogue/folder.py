"""Read a catalogue: folders with lenses.csv, cameras.csv and, where there are any, spacers.csv."""

import hashlib
import os
from collections.abc import Sequence
from pathlib import Path

from visionplan.catalogue.heading import nearest
from visionplan.catalogue.items import COLUMNS, Catalogue, Table
from visionplan.catalogue.joining import check_clashes, join
from visionplan.catalogue.ledger import Ledger
from visionplan.catalogue.read import read_table, without
from visionplan.faults import Fault, InputError
from visionplan.text import quoted

_OPTIONAL = ("spacers",)
_NO_SPACERS = b"id,mount,length [mm]\n"
_MOST_TOLD = 50


def read_catalogue(folder: Path | str, skip_bad: bool = False) -> Catalogue:
    """Read and check the catalogue of one folder; see `read_catalogues`."""
    return read_catalogues([folder], skip_bad)


def read_catalogues(folders: Sequence[Path | str], skip_bad: bool = False) -> Catalogue:
    """Read and check a catalogue that lies in one or more folders.

    Parameters
    ----------
    folders : sequence of Path or str
        Hold lenses.csv and cameras.csv, each at least once in all of them; spacers.csv may be missing.
    skip_bad : bool
        Leave out the rows at fault and say so in the catalogue's warnings, where otherwise they are errors. Of two
        rows with the same id in two folders the later one is at fault.

    Raises
    ------
    InputError
        Everything that is wrong with all files. With `skip_bad` only what leaving out rows does not cure: a file
        that is missing or can't be read, a heading at fault, a file with no good row.
    """
    paths = [Path(folder) for folder in folders]
    _check_folders(paths)
    files = {item: [Ledger(str(path / f"{item}.csv")) for path in paths] for item in COLUMNS}
    digest = hashlib.sha256()
    tables: dict[str, list[tuple[Table, Ledger]]] = {item: [] for item in COLUMNS}
    for item, ledger in _present(files):
        data = _read_bytes(Path(ledger.file), ledger, item)
        if data is not None:
            digest.update(f"{item}.csv {len(data)}\n".encode())
            digest.update(data)
        if not ledger.fatal:
            table = read_table(_NO_SPACERS if data is None else data, item, ledger)
            if table is not None:
                tables[item].append((table, ledger))
    read = [pair for pairs in tables.values() for pair in pairs]
    check_currencies(read)
    for item, pairs in tables.items():
        check_clashes(pairs)
        tables[item] = pairs = [(without(ledger.bad, table), ledger) for table, ledger in pairs]
        for table, ledger in pairs:
            if not len(table) and ledger.bad and item not in _OPTIONAL:
                ledger.fatal = True
    ledgers = [ledger for several in files.values() for ledger in several]
    faults = [fault for ledger in ledgers if ledger.fatal or not skip_bad for fault in ledger.faults()]
    if faults:
        raise InputError(faults)
    warnings = [warning for table, ledger in read for warning in (*_skipped(ledger), *_noted(table))]
    joined = {item: join([table for table, _ in pairs]) for item, pairs in tables.items()}
    return Catalogue(**joined, fingerprint=f"sha256:{digest.hexdigest()}", warnings=tuple(warnings))


def _present(files: dict[str, list[Ledger]]) -> list[tuple[str, Ledger]]:
    """The files to read: of each item those that are there, or else the one that should be, in the first folder."""
    found = []
    for item, ledgers in files.items():
        there = [ledger for ledger in ledgers if os.path.lexists(ledger.file)]
        found += [(item, ledger) for ledger in there or ledgers[:1]]
    return found


def _check_folders(paths: Sequence[Path]) -> None:
    faults = [fault for path in paths for fault in _check_folder(path)]
    seen: dict[str, Path] = {}
    for path in paths:
        first = seen.setdefault(os.path.realpath(path), path)
        if first is not path:
            faults.append(Fault(str(path), f"is the same folder as {quoted(str(first))}", "each folder once"))
        elif len(paths) > 1 and path.is_dir() and not any((path / f"{item}.csv").exists() for item in COLUMNS):
            faults.append(
                Fault(str(path), "holds no catalogue", f"one of {', '.join(f'{item}.csv' for item in COLUMNS)}")
            )
    if faults:
        raise InputError(faults)


def _check_folder(folder: Path) -> list[Fault]:
    try:
        if folder.is_dir():
            return []
        found = "a file stands here" if folder.exists() else "there is no such folder"
    except OSError as error:
        found = f"the folder can't be read: {error.strerror}"
    return [Fault(str(folder), found, "a folder with lenses.csv and cameras.csv")]


def _read_bytes(path: Path, ledger: Ledger, item: str) -> bytes | None:
    expected = "a comma-separated file"
    try:
        if path.is_file():
            return path.read_bytes()
        if path.exists():
            ledger.of_file("this is no file", expected)
        elif item not in _OPTIONAL:
            ledger.of_file("the file is missing", expected)
    except OSError as error:
        ledger.of_file(f"the file can't be read: {error.strerror}", expected)
    return None


def check_currencies(read: Sequence[tuple[Table, Ledger]]) -> None:
    """Prices of all files are in one currency."""
    named = [(table, ledger) for table, ledger in read if table.currency]
    for table, ledger in named[1:]:
        first = named[0][0]
        if table.currency != first.currency:
            alone = os.path.dirname(first.file) == os.path.dirname(table.file)
            where = os.path.basename(first.file) if alone else first.file
            found = f"prices are in {table.currency}, those of {where} in {first.currency}"
            ledger.of_file(found, "one currency in all files", column="price")


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
