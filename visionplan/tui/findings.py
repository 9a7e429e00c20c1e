"""What the measures of a rig as built tell, as rows: where it stands, what to move, how it is then, what is off."""

from collections.abc import Iterator
from typing import TYPE_CHECKING

from visionplan.report.lines import wrap
from visionplan.text import clean, pad
from visionplan.tui.measuring import Values, lacking, measures
from visionplan.tui.rows import Row, paragraph

if TYPE_CHECKING:
    from visionplan.report.page import Section
    from visionplan.solve.asbuilt import AsBuilt

_LABEL = 18
"""Terminal cells of the titles."""


def findings(built: "AsBuilt", width: int, ascii: bool, system: str) -> tuple[list[Row], list[Row]]:
    """What is told in words, and the span chart of the rig as it stands."""
    from visionplan.report.asbuilt import sections
    from visionplan.report.spanchart import span_rows

    # what was measured stands above; what to do comes before why, so that it is in view
    _, stands, off, right, after, granted = sections(built, system)
    holds = {"as it stands": built.found.fits, "judged": built.corrected.fits}
    words: list[Row] = []
    for section in filter(None, (stands, right, after, off, granted)):
        lines = [*_lines(section, width - _LABEL - 2, holds, ascii)]
        titles = [section.title, *[""] * (len(lines) - 1)]
        words += [[(f" {pad(title, _LABEL)}", "head"), line] for title, line in zip(titles, lines)]
    heading: Row = [("As it stands, over the magnification", "head")]
    return words, [heading, *span_rows(built.found, width - 1, ascii, system)]


def _lines(section: "Section", cells: int, holds: dict[str, bool], ascii: bool) -> Iterator[tuple[str, str]]:
    """Its texts broken into lines, each with its role."""
    texts = [(f"{label}: {text}", holds.get(label)) for label, text in section.rows]
    texts += [(f"{number}. {text}", None) for number, text in enumerate(section.steps, 1)]
    texts += [(text, None) for text in section.points]
    for text, good in texts:
        role = "" if good is None else "good" if good else "missed"
        # a plus or minus alone would be another number
        told = clean(text).replace("±", "+/-" if ascii else "±")
        yield from ((line, role) for line in wrap(told, cells, "   " if section.rows or section.steps else ""))


def nothing_yet(values: Values, planned: bool, width: int) -> list[Row]:
    """What stands there while nothing is told: what must be measured for it."""
    missing = [*lacking(values)]
    text = "Lay a ruler or a target of known length into the picture, focus, and type its length and how many pixels "
    text += "it spans: where the rig stands, what to move and what is off then stands here."
    if not planned:
        text = "No magnification meets what is asked of this rig, so nothing is planned that it could be held against."
    elif measures(values).targets:
        text = "working it out …"
    elif missing:
        text = " ".join(missing)
    return paragraph(text, width - 2, "dim", " ")
