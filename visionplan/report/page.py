"""A page of sections, as plain text for a terminal or as Markdown: the same words in both."""

import re
from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from visionplan.report.lines import wrap
from visionplan.text import clean, markdown, pad, width

LABEL = 18
"""Terminal cells of the labels in plain text."""


@dataclass(frozen=True)
class Section:
    """A heading and what stands under it; a section without anything is left out."""

    title: str
    rows: Sequence[tuple[str, str]] = ()
    """Label and text."""
    steps: Sequence[str] = ()
    """In their order."""
    points: Sequence[str] = ()
    drawing: Sequence[str] = ()
    """Lines to be shown as they are."""

    def __bool__(self) -> bool:
        return bool(self.rows or self.steps or self.points or self.drawing)


def page_text(title: str, sections: Iterable[Section], cells: int = 80) -> str:
    """The page in lines of at most so many terminal cells."""
    lines = [*wrap(clean(title), cells)]
    lines.append("=" * max(map(width, lines)))
    for section in filter(None, sections):
        lines += ["", section.title.upper()]
        for label, text in section.rows:
            lines += wrap(clean(text), cells, " " * LABEL, pad(f"{label} ", LABEL))
        for number, step in enumerate(section.steps, 1):
            lines += wrap(clean(step), cells, "    ", f"{number:2}. ")
        for point in section.points:
            lines += wrap(clean(point), cells, "  ", "- ")
        lines += section.drawing
    return "\n".join(lines) + "\n"


def page_markdown(title: str, sections: Iterable[Section], level: int = 1) -> str:
    """The page as GitHub-flavoured Markdown under a heading of that level, one line an entry."""
    blocks = [f"{'#' * level} {markdown(title)}"]
    for section in filter(None, sections):
        blocks.append(f"{'#' * (level + 1)} {markdown(section.title)}")
        blocks += [
            "\n".join(group)
            for group in (
                [f"- **{markdown(label)}**: {markdown(text)}" for label, text in section.rows],
                [f"{number}. {markdown(step)}" for number, step in enumerate(section.steps, 1)],
                [f"- {markdown(point)}" for point in section.points],
            )
            if group
        ]
        if section.drawing:
            blocks.append(block(section.drawing))
    return "\n\n".join(blocks) + "\n"


def block(lines: Sequence[str]) -> str:
    """Lines as a fenced block that none of them can end."""
    fence = "`" * max(3, 1 + max((len(run) for line in lines for run in re.findall("`+", line)), default=0))
    return "\n".join([f"{fence}text", *(clean(line) for line in lines), fence])
