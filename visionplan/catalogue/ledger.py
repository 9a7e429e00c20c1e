"""What is wrong with one file: its faults, and the rows that they spoil."""

from collections import Counter

from visionplan.faults import Fault

MOST_OF_A_COLUMN = 1000
"""Faults listed for one column; the others are counted, so that one bad column cannot fill the memory."""


class Ledger:
    """Faults as they are found, in any order."""

    def __init__(self, file: str):
        self.file = file
        self.fatal = False
        """Whether something is wrong that leaving out rows does not cure."""
        self.bad: set[int] = set()
        """The lines where spoilt rows begin."""
        self.order: dict[str, int] = {}
        """Where each column stands, to list the faults of a row in."""
        self._faults: list[Fault] = []
        self._cells: set[tuple[int, str]] = set()
        self._count: Counter[tuple[str, bool]] = Counter()

    def of_file(self, found: str, expected: str = "", line: int | None = None, column: str = "") -> None:
        """Note a fault of the file itself, or of its heading."""
        self.fatal = True
        self._faults.append(Fault(self.file, found, expected, line, column))

    def of_row(self, line: int, found: str, expected: str = "", column: str = "", once: bool = False) -> None:
        """Note a fault of the row that begins at a line; `once` lists only the first of the column's and counts on."""
        self.bad.add(line)
        self._count[column, once] += 1
        if self._count[column, once] <= (1 if once else MOST_OF_A_COLUMN):
            self._faults.append(Fault(self.file, found, expected, line, column))
            self._cells.add((line, column))

    def knows(self, line: int, column: str) -> bool:
        """Tell whether a fault of that cell is listed."""
        return (line, column) in self._cells

    def faults(self) -> list[Fault]:
        """List the faults by line and column, and last what was only counted."""
        listed = sorted(self._faults, key=lambda fault: (fault.line or 0, self.order.get(fault.column, -1)))
        for (column, once), count in self._count.items():
            if more := count - min(count, 1 if once else MOST_OF_A_COLUMN):
                listed.append(Fault(self.file, f"{more:,} more rows are at fault like that", column=column))
        return listed
