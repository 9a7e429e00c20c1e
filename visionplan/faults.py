"""What is wrong with an input, as data; only the edges of the program word it."""

from collections.abc import Sequence
from typing import NamedTuple


class Fault(NamedTuple):
    """One thing wrong with an input file."""

    file: str
    found: str
    """What stands there, or what is missing, in a sentence without a full stop."""
    expected: str = ""
    """What was expected instead, e.g. 'a length such as "50 mm"'."""
    line: int | None = None
    """Counted from 1; None where the whole file is meant."""
    column: str = ""
    """The column's heading, or the brief's section.key."""

    def __str__(self) -> str:
        place = ":".join(str(part) for part in (self.file, self.line) if part)
        if self.column:
            place += f" [{self.column}]"
        return f"{place}: {self.found}" + (f"; expected {self.expected}" if self.expected else "")


class InputError(Exception):
    """Bad input: everything that is wrong with it at once."""

    def __init__(self, faults: Sequence[Fault]):
        self.faults = tuple(faults)
        super().__init__("\n".join(str(fault) for fault in self.faults))
