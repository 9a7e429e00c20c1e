"""A sheet of terminal cells to draw on, each with a role that a screen may style."""

from itertools import groupby

Segment = tuple[str, str]
"""Text of one role, and the role."""
_BLANK = (" ", "")


class Canvas:
    """Rows of cells, one character each. What is drawn beyond the edges is lost."""

    def __init__(self, width: int, height: int):
        self.width = width
        self.height = height
        self._cells = [[_BLANK] * width for _ in range(height)]

    def put(self, row: int, column: int, text: str, role: str = "") -> None:
        """Write characters of one cell each."""
        for place, character in enumerate(text, column):
            if 0 <= row < self.height and 0 <= place < self.width:
                self._cells[row][place] = character, role

    def blank(self, row: int, start: int, end: int) -> bool:
        """Whether nothing stands in the cells from start up to, not including, end, and all of them are there."""
        return start >= 0 and end <= self.width and all(cell == _BLANK for cell in self._cells[row][start:end])

    def end(self, row: int) -> int:
        """The first cell behind everything in a row."""
        return len("".join(character for character, _ in self._cells[row]).rstrip())

    def segments(self) -> list[list[Segment]]:
        """The rows as segments; spaces at their ends left out."""
        rows = []
        for row, cells in enumerate(self._cells):
            groups = groupby(cells[: self.end(row)], key=lambda cell: cell[1])
            rows.append([("".join(character for character, _ in group), role) for role, group in groups])
        return rows


def join(rows: list[list[Segment]]) -> list[str]:
    """Rows of segments as lines of plain text."""
    return ["".join(text for text, _ in row) for row in rows]
