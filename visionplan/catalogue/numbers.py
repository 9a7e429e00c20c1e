"""The columns of numbers: all together where they are plain decimals, one cell at a time where they aren't."""

from collections.abc import Sequence
from itertools import chain

import numpy as np

from visionplan.catalogue import cells
from visionplan.catalogue.decimals import read_decimals
from visionplan.catalogue.heading import Field
from visionplan.catalogue.ledger import Ledger
from visionplan.units import ratio


class Numbers:
    """Takes rows chunk by chunk and keeps the columns of kinds number and count, in core units."""

    def __init__(self, fields: Sequence[Field], ledger: Ledger):
        self.fields = [field for field in fields if field.column.kind in ("number", "count")]
        self.ledger = ledger
        self._blocks = [np.empty((len(self.fields), 0))]
        self._memos = [cells.Memo.of(field) for field in self.fields]
        self._ratios = np.array([ratio(field.factor or 1.0) for field in self.fields]).reshape(-1, 2, 1)
        columns = [field.column for field in self.fields]
        least = [cells.SMALLEST if column.open_low and column.low == 0 else column.low for column in columns]
        self._least = np.maximum(least, -cells.GREATEST).reshape(-1, 1)
        self._most = np.minimum([column.high for column in columns], cells.GREATEST).reshape(-1, 1)
        self._whole = [at for at, column in enumerate(columns) if column.kind == "count"]
        self._required = [at for at, column in enumerate(columns) if column.required]

    def take(self, columns: Sequence[Sequence[str]], lines: Sequence[int]) -> None:
        """Read and check the cells of a chunk, given by column of the file."""
        texts = [columns[field.at] for field in self.fields]
        units_known = all(field.factor for field in self.fields)
        values = read_decimals(list(chain.from_iterable(texts))) if units_known else None
        if values is None:
            read = [self._column(at, column, lines) for at, column in enumerate(texts)]
            block = np.array(read).reshape(len(texts), len(lines))
        else:
            block = values.reshape(len(texts), len(lines)) * self._ratios[:, 0] / self._ratios[:, 1]
        self._check(block, texts, lines)
        self._blocks.append(block)

    def _column(self, at: int, texts: Sequence[str], lines: Sequence[int]) -> Sequence[float] | np.ndarray:
        values = read_decimals(list(map(str.strip, texts))) if self.fields[at].factor else None
        if values is None:
            return self._memos[at].read(texts, lines, self.ledger)
        return values * self._ratios[at, 0] / self._ratios[at, 1]

    def _check(self, block: np.ndarray, texts: Sequence[Sequence[str]], lines: Sequence[int]) -> None:
        bad = (block < self._least) | (block > self._most)
        counts = block[self._whole]
        bad[self._whole] |= (counts != np.floor(counts)) & ~np.isnan(counts)
        if bad.any():
            for at, row in np.argwhere(bad):
                field = self.fields[at]
                found = cells.out_of_range(texts[at][row].strip(), block[at, row], field.column)
                self.ledger.of_row(lines[row], found, cells.expected(field.column), field.heading)
        if np.isnan(block[self._required]).any():
            for at in self._required:
                cells.require(self.fields[at], texts[at], lines, self.ledger)

    def values(self) -> dict[str, np.ndarray]:
        """Put the chunks together, by column."""
        table = np.concatenate(self._blocks, axis=1)
        return {field.column.name: row for field, row in zip(self.fields, table)}
