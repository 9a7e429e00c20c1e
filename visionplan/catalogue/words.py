"""The columns of words and of stops, and those that are none of ours."""

from collections.abc import Sequence

from visionplan.catalogue import cells
from visionplan.catalogue.heading import Heading, unnamed
from visionplan.catalogue.ledger import Ledger


class Words:
    """Takes rows chunk by chunk and keeps the columns of kinds text, choice and stops, and the notes."""

    def __init__(self, heading: Heading, ledger: Ledger):
        self.fields = [field for field in heading.fields if field.column.kind in ("text", "choice", "stops")]
        self.ledger = ledger
        self._kept: list[list] = [[] for _ in self.fields]
        self._memos = [cells.Memo.of(field) for field in self.fields]
        self._notes: list[tuple[int, str, list[str]]] = [(at, name, []) for at, name in heading.notes]

    def take(self, columns: Sequence[Sequence[str]], lines: Sequence[int]) -> None:
        """Read and check the cells of a chunk, given by column of the file."""
        for field, memo, kept in zip(self.fields, self._memos, self._kept):
            texts = columns[field.at]
            unlike = field.column.name == "id"
            words = list(map(str.strip, texts)) if unlike else memo.read(texts, lines, self.ledger)
            if field.column.required and "" in words:
                cells.require(field, texts, lines, self.ledger)
            kept += words
        for at, _, kept in self._notes:
            kept += columns[at]

    def values(self) -> dict[str, list]:
        """Give what is kept, by column."""
        return {field.column.name: kept for field, kept in zip(self.fields, self._kept)}

    def notes(self) -> dict[str, list[str]]:
        """Give the columns that are none of ours by heading, without those that have neither heading nor content."""
        return {name: kept for at, name, kept in self._notes if name != unnamed(at) or any(kept)}
