"""One cell at a time: what the bulk reader does not take, and words."""

from collections.abc import Callable, Sequence
from typing import Any

from visionplan.catalogue.heading import Field
from visionplan.catalogue.items import Column
from visionplan.catalogue.ledger import Ledger
from visionplan.text import quoted
from visionplan.units import EXPECTED, UnitError, number, parse, show

SMALLEST, GREATEST = 1e-12, 1e12
"""No quantity of a catalogue lies beyond these, in core units; squares and quotients of them are still floats."""
_REMEMBERED = 100_000


class Memo(dict):
    """Cell texts of a column and what they mean, each worked out once."""

    def __init__(self, field: Field, work_out: Callable[[str], Any], nothing: Any):
        super().__init__()
        self._field, self._work_out, self._nothing = field, work_out, nothing
        self._faults: dict[str, UnitError] = {}

    @classmethod
    def of(cls, field: Field) -> "Memo":
        """Make what reads a column: floats, words or tuples of stops."""
        column = field.column
        if column.kind == "stops":
            return cls(field, _stops, ())
        if column.kind == "choice":
            return cls(field, lambda text: _choice(text, column), "")
        if column.kind == "text":
            return cls(field, str, "")
        return cls(field, lambda text: _quantity(text, field), float("nan"))

    def __missing__(self, text: str) -> Any:
        try:
            value = self._work_out(text.strip())
        except UnitError as error:
            self._faults[text], value = error, self._nothing
        self[text] = value
        return value

    def read(self, texts: Sequence[str], lines: Sequence[int], ledger: Ledger) -> list:
        """Read a chunk of the column; the ledger gets the cells that mean nothing."""
        if len(self) > _REMEMBERED:
            self.clear()
            self._faults.clear()
        values = list(map(self.__getitem__, texts))
        if self._faults:
            for text, line in zip(texts, lines):
                if error := self._faults.get(text):
                    bare = self._field.factor is None and _is_number(text)
                    found = f"{error.found}, nor has the heading" if bare else error.found
                    ledger.of_row(line, found, error.expected, self._field.heading, once=bare)
        return values


def require(field: Field, texts: Sequence[str], lines: Sequence[int], ledger: Ledger) -> None:
    """Note the cells that state nothing."""
    for text, line in zip(texts, lines):
        if not text.strip():
            ledger.of_row(line, "nothing is stated", expected(field.column), field.heading)


def expected(column: Column) -> str:
    """Say what a cell of the column has to be."""
    if column.kind == "choice":
        return " or ".join(map(repr, column.choices))
    if column.kind == "text":
        return column.doc.rstrip(".").lower()
    what = "a whole number such as 12" if column.kind == "count" else EXPECTED[column.unit]
    least = "" if column.low == -float("inf") else ", more than 0" if column.open_low else ", not less than 0"
    most = "" if column.high == float("inf") else f", at most {show(column.high, column.unit, percent=True)}"
    return what + least + most


def out_of_range(text: str, value: float, column: Column) -> str:
    """Say why a number is refused."""
    if column.kind == "count" and value % 1:
        return f"{quoted(text)} is no whole number"
    if abs(value) > GREATEST or 0 < abs(value) < SMALLEST:
        return f"{quoted(text)} is beyond every {column.name} there is"
    return f"{quoted(text)} is out of range"


def _quantity(text: str, field: Field) -> float:
    if not text:
        return float("nan")
    try:
        return parse(text, field.column.unit, field.factor)
    except UnitError as error:
        raise UnitError(error.found, expected(field.column)) from None


def _is_number(text: str) -> bool:
    try:
        number(text)
    except UnitError:
        return False
    return True


def _choice(text: str, column: Column) -> str:
    word = text.casefold()
    if word and word not in column.choices:
        raise UnitError(f"{quoted(text)} is no such word", expected(column))
    return word


def _stops(text: str) -> tuple[float, ...]:
    try:
        stops = sorted({number(word) for word in text.split()})
    except UnitError as error:
        raise UnitError(error.found, "f-numbers parted by spaces, such as '2.8 4 5.6'") from None
    if stops and not SMALLEST < stops[0] <= stops[-1] < GREATEST:
        raise UnitError(f"{quoted(text)} is out of range", "f-numbers more than 0")
    return tuple(stops)
