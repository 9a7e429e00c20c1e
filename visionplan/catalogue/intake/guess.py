"""Guess a column map from headings, units and what the cells hold."""

import re
from collections.abc import Sequence
from dataclasses import dataclass, field, replace
from itertools import islice

from visionplan.catalogue.heading import CURRENCY
from visionplan.catalogue.intake.columnmap import EMPTY, SheetMap, Source
from visionplan.catalogue.intake.convert import CODES, converter
from visionplan.catalogue.intake.sheet import Row, Sheet, read_sheets, tidy
from visionplan.catalogue.intake.signs import find_signs
from visionplan.catalogue.intake.synonyms import PAIRS, SYNONYMS, USUAL_UNITS, WORDS
from visionplan.catalogue.intake.wording import MONEY, is_unit, likeness, plain, split
from visionplan.catalogue.items import COLUMNS, REQUIRED_OF_KIND, Column
from visionplan.faults import Fault, InputError
from visionplan.text import quoted
from visionplan.units import UnitError, factor, parse

_TOP, _SAMPLE = 30, 200
_NOTHING = tuple(dict.fromkeys((*EMPTY, "n.a.", "na", "k.a.", "tbd", "?", "none", "--", "...")))
_SURE, _ENOUGH = 0.95, 0.65


@dataclass(frozen=True)
class Theirs:
    """A column of the sheet."""

    heading: str
    words: str
    """The heading without its unit, in plain letters."""
    unit: str
    cells: tuple[str, ...]
    """Different things that some rows hold, but what stands for nothing."""


@dataclass(frozen=True)
class Guess:
    """A map, and what there is to say about it."""

    sheet: Sheet
    map: SheetMap
    theirs: tuple[Theirs, ...]
    unsure: dict[str, str] = field(default_factory=dict)
    """By heading: what to look at."""

    @property
    def taken(self) -> set[str]:
        """The columns of ours that have one of theirs."""
        return {column.name for source in self.map.sources for column in source.columns}

    @property
    def left(self) -> list[Theirs]:
        """Columns of theirs that go nowhere."""
        used = {source.heading for source in self.map.sources}
        return [one for one in self.theirs if one.heading not in used]

    @property
    def lacking(self) -> list[str]:
        """Columns of ours that must be stated and have none of theirs."""
        needed = [column.name for column in COLUMNS[self.map.item] if column.required]
        if self.map.item == "lenses" and "kind" not in self.taken:
            needed += REQUIRED_OF_KIND["entocentric"]
        return [name for name in needed if name not in self.taken]


def guess(sheet: Sheet, item: str = "", heading: int = 0) -> Guess:
    """Guess the map of a sheet.

    Parameters
    ----------
    item : str
        lenses, cameras or spacers; the likeliest when empty.
    heading : int
        The row with the headings; the likeliest when 0.

    Raises
    ------
    InputError
        Where the sheet has no rows, or no such row.
    """
    rows = list(islice(sheet.rows(), _TOP + _SAMPLE))
    tops = [at for at, row in enumerate(rows[: None if heading else _TOP]) if heading in (0, row.number)]
    if not tops:
        found = f"nothing stands in row {heading}" if rows else "the sheet is empty"
        raise InputError([Fault(sheet.file, found, "a row with headings, and rows below it")])
    items = [item] if item else list(COLUMNS)
    known = {at: max(_known(rows[at], one) for one in items) for at in tops}
    top = max(known, key=lambda at: (known[at], -at))
    units = _units_below(rows[top + 1 : top + 2])
    below = rows[top + 1 + bool(units) :]
    theirs, nothing = _columns(sheet, rows[top], units, below)
    decimal, thousands = find_signs(tidy(cell) for row in below for cell in row.cells if type(cell) is str)
    settings = SheetMap(
        "",
        (),
        rows[top].number,
        below[0].number if units and below else 0,
        sheet.worksheet,
        "",
        sheet.delimiter,
        decimal,
        thousands,
        nothing,
    )
    guesses = {one: _guess(sheet, replace(settings, item=one), theirs) for one in items}
    best = max(guesses, key=lambda one: guesses[one][0])
    return guesses[best][1]


def guess_file(
    path: str,
    item: str | None = None,
    heading: int = 0,
    worksheet: str | None = None,
    encoding: str = "",
    delimiter: str = "",
) -> list[Guess]:
    """Guess the maps of a file: one, or of a workbook that of each worksheet that looks like items.

    Parameters
    ----------
    worksheet : str, optional
        Only this one of a workbook.
    encoding, delimiter : str
        Of a CSV file; found out where they are empty.

    Raises
    ------
    InputError
        Where the file can't be read or has no rows.
    """
    if len(delimiter) > 1 or delimiter in tuple('"\r\n\0'):
        raise InputError([Fault(path, f"{quoted(delimiter)} is no delimiter", "one character such as ';'")])
    sheets = [sheet for sheet in read_sheets(path, encoding, delimiter) if worksheet in (None, sheet.worksheet)]
    if not sheets:
        raise InputError([Fault(path, f"has no worksheet {quoted(str(worksheet))}", "the name of one")])
    guesses: dict[str, Guess] = {}
    faults: list[Fault] = []
    for sheet in sheets:
        try:
            found = guess(sheet, item or "", heading)
        except InputError as error:
            faults += error.faults
            continue
        found = replace(found, map=replace(found.map, encoding=encoding))
        before = guesses.setdefault(found.map.item, found)
        if len(before.map.sources) < len(found.map.sources):
            guesses[found.map.item] = found
    if not guesses:
        raise InputError(faults)
    best = max(guesses.values(), key=lambda one: len(one.map.sources))
    return [one for one in guesses.values() if one is best or len(one.map.sources) > 2]


def _known(row: Row, item: str) -> int:
    """How many cells of a row are headings of an item."""
    words = [split(tidy(cell))[0] for cell in row.cells if cell]
    names = {plain(name).replace(" ", "") for names, synonyms in _targets(item) for name in (*names, *synonyms)}
    return sum(word.replace(" ", "") in names for word in words)


def _units_below(rows: Sequence[Row]) -> dict[int, str]:
    """By place: the units of a row that holds nothing else."""
    cells = {at: tidy(cell).strip("[]()") for row in rows for at, cell in enumerate(row.cells) if cell.strip()}
    return cells if all(map(is_unit, cells.values())) else {}


def _columns(
    sheet: Sheet, top: Row, units: dict[int, str], below: Sequence[Row]
) -> tuple[tuple[Theirs, ...], tuple[str, ...]]:
    """The columns that hold anything, and what stands for nothing in them."""
    theirs, nothing = [], dict.fromkeys(EMPTY)
    for at, (name, cell) in enumerate(zip(sheet.headings(top.cells), top.cells)):
        cells = dict.fromkeys(row.cells[at] for row in below if at < len(row.cells) and row.cells[at].strip())
        if cells or cell.strip():
            nothing |= {word: None for word in map(str.casefold, map(tidy, cells)) if word in _NOTHING}
            stated = tuple(cell for cell in cells if tidy(cell).casefold() not in _NOTHING)
            words, unit = split(tidy(cell))
            theirs.append(Theirs(name, words, unit or units.get(at, ""), stated))
    return tuple(theirs), tuple(nothing)


def _targets(item: str) -> list[tuple[tuple[str, ...], tuple[str, ...]]]:
    """What a column may be: two of ours in one, or one of ours; and what it is called then."""
    names = [column.name for column in COLUMNS[item]]
    pairs = [(pair, called) for pair, called in PAIRS.items() if set(pair) <= set(names)]
    return [*pairs, *(((name,), (name, *SYNONYMS.get(name, ()))) for name in names)]


def _guess(sheet: Sheet, settings: SheetMap, theirs: tuple[Theirs, ...]) -> tuple[float, Guess]:
    """How likely the sheet holds this item, and its map."""
    ours = {column.name: column for column in COLUMNS[settings.item]}
    offers = []
    for one in theirs:
        for names, called in _targets(settings.item):
            like = likeness(one.words, called)
            like += 0.05 * (one.words == plain(names[0]) and len(names) == 1)  # our own name goes first
            columns = tuple(ours[name] for name in names)
            if like and (suits := _suits(one, columns, settings)):
                offers.append((like + suits, one, columns))
    sources: dict[str, Source] = {}
    unsure: dict[str, str] = {}
    taken: set[str] = set()
    score = 0.0
    for value, one, columns in sorted(offers, key=lambda offer: offer[0], reverse=True):
        wanted = {column.name for column in columns}
        if value >= _ENOUGH and one.heading not in sources and not taken & wanted:
            taken |= wanted
            score += value
            source, notes = _source(one, columns)
            sources[one.heading] = source
            if value < _SURE:
                notes.insert(0, "only alike")
            if notes:
                unsure[one.heading] = "; ".join(notes)
    kept = tuple(sources[one.heading] for one in theirs if one.heading in sources)
    score += sum(1 if column.name in taken else -1 for column in ours.values() if column.required)
    return score, Guess(sheet, replace(settings, sources=kept), theirs, unsure)


def _suits(theirs: Theirs, columns: tuple[Column, ...], settings: SheetMap) -> float:
    """How well unit and cells suit; 0 where they say that it is something else."""
    column = columns[0]
    if theirs.unit and not _is_unit_of(theirs.unit, column):
        return 0.0
    bonus = 0.3 if theirs.unit else 0.1
    source = Source(theirs.heading, columns, theirs.unit)
    if column.kind == "text" or not theirs.cells:
        return bonus if len(columns) == 1 else 0.0
    good = sum(
        bool(_our_word(cell, column)) if column.kind == "choice" else _is_good(cell, source, settings)
        for cell in theirs.cells
    )
    if good * 2 < len(theirs.cells):
        return 0.0
    return bonus + 0.3 * (len(columns) > 1)


def _is_unit_of(unit: str, column: Column) -> bool:
    if column.currency:
        return bool(CURRENCY.fullmatch(unit))
    try:
        factor(unit, column.unit)
    except UnitError:
        return False
    return column.kind in ("number", "count")


def _is_good(cell: str, source: Source, settings: SheetMap) -> bool:
    try:
        for text, column in zip(converter(source, settings)(cell), source.columns):
            for word in text.split() if column.kind == "stops" else [text]:
                parse(word, column.unit, 1.0)
    except UnitError:
        return False
    return True


def _source(theirs: Theirs, columns: tuple[Column, ...]) -> tuple[Source, list[str]]:
    """The line of the map, and what to look at in it."""
    column, unit, notes = columns[0], theirs.unit, []
    if not unit and column.kind == "number" and column.unit and not any(map(_carries_unit, theirs.cells)):
        unit = _usual_unit(column, theirs.cells)
        notes += ["the heading names no unit"]
    if not unit and column.currency:
        named = {match[0] for cell in theirs.cells if (match := MONEY.search(cell))}
        unit = named.pop() if len(named) == 1 else ""
    unit = CODES.get(unit, unit)
    words = {}
    if column.kind == "choice":
        words = {tidy(cell): _our_word(cell, column) for cell in theirs.cells}
        notes += [f"'{word}' is no word of ours" for word, ours in words.items() if not ours][:3]
        words = {word: ours for word, ours in words.items() if ours and word.casefold() != ours}
    return Source(theirs.heading, columns, unit, 1.0, words), notes


def _carries_unit(cell: str) -> bool:
    return bool(re.search(r"\d\s*(?:[^\W\d]|[%°])", cell))


def _usual_unit(column: Column, cells: Sequence[str]) -> str:
    if column.unit != "1":
        return USUAL_UNITS.get(column.name, column.unit)
    above_one = any(re.match(r"[<≤±+−-]*\s*(?:0*[1-9]\d*[.,]0*[1-9]|0*[2-9]|0*1\d)", cell) for cell in cells)
    return "%" if above_one else ""


def _our_word(cell: str, column: Column) -> str:
    words = plain(cell)
    called = {ours: [plain(word) for word in (ours, *WORDS.get(ours, ()))] for ours in column.choices}
    exact = [ours for ours, names in called.items() if words in names]
    within = [ours for ours, names in called.items() if any(len(n) > 2 and f" {n} " in f" {words} " for n in names)]
    found = exact or within
    return found[0] if len(found) == 1 else ""
