"""A widget that shows rows of text and sends, when they change, only the cells that did."""

from collections.abc import Sequence

from rich.segment import Segment as Piece
from textual.geometry import Region
from textual.strip import Strip
from textual.widget import Widget

from visionplan.report.lines import to_ascii
from visionplan.tui.looks import style
from visionplan.tui.rows import Row, fit

_PLAIN = str.maketrans("▸◆━┿┯┷├┤┼─│╪╞╡═◂┊×▪↑↓←→", ">*=+++|||-|#[]=<:x#^v<>")
"""Signs of the views in ASCII."""


class Lines(Widget):
    """Draws what `rows` returns; `redraw` compares it with what stands on the screen."""

    DEFAULT_CSS = "Lines { height: 1; }"

    def __init__(self, **more) -> None:
        super().__init__(**more)
        self._shown: list[Row] = []
        self._look: object = None

    def rows(self, width: int, height: int) -> Sequence[Row]:
        """What stands in the widget now: at most `height` rows."""
        raise NotImplementedError

    def redraw(self) -> None:
        """Show what has changed."""
        width, height = self.size
        if not (width and height and self.is_mounted and self.display):
            return
        if self._look != self._now():
            self.anew()
            return
        before, fresh = self._shown, self._drawn()
        self._shown = fresh
        regions = [
            Region(start, y, end - start, 1)
            for y, (old, new) in enumerate(zip(before, fresh))
            if old != new
            for start, end in [_changed(old, new, width)]
            if end > start
        ]
        if regions:
            self.refresh(*regions)

    def anew(self) -> None:
        """Draw everything the next time the screen is painted."""
        self._look = None
        self.refresh()

    def _now(self) -> tuple:
        """What the whole of the widget depends on."""
        return self.app.palette, self.app.ascii, *self.size  # type: ignore[attr-defined]

    def _drawn(self) -> list[Row]:
        width, height = self.size
        rows = [self._fitted(row, width) for row in list(self.rows(width, height))[:height]]
        return rows + [fit([], width)] * (height - len(rows))

    def _fitted(self, row: Row, width: int) -> Row:
        fitted = fit(row, width)
        if self.app.ascii:  # type: ignore[attr-defined]
            fitted = fit([(to_ascii(text.translate(_PLAIN)), role) for text, role in fitted], width)
        return fitted

    def on_resize(self) -> None:
        """Draw at the new size, unless that has been painted already."""
        self.redraw()

    def render_line(self, y: int) -> Strip:
        """Give one row to Textual; at a new size, or after `anew`, all rows are drawn first."""
        if self._look != self._now():
            self._shown, self._look = self._drawn(), self._now()
        palette = self.app.palette  # type: ignore[attr-defined]
        if y >= len(self._shown):
            return Strip([Piece(" " * self.size.width, style(palette, ""))], self.size.width)
        pieces = [Piece(text, style(palette, role)) for text, role in self._shown[y]]
        return Strip(pieces, self.size.width)


def _changed(old: Row, new: Row, width: int) -> tuple[int, int]:
    """From which cell to which two rows differ."""
    before, after = _cells(old), _cells(new)
    if len(before) != width or len(after) != width:  # characters wider than a cell
        return 0, width
    differ = [place for place, (one, other) in enumerate(zip(before, after)) if one != other]
    return (differ[0], differ[-1] + 1) if differ else (0, 0)


def _cells(row: Row) -> list[tuple[str, str]]:
    return [(character, role) for text, role in row for character in text]
