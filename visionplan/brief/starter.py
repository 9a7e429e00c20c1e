"""A brief to start from: every line with what it means, the optional ones commented out."""

from visionplan.brief.fields import LINES, SECTIONS, Line

_COLUMN = 46
"""Where explanations begin, if the line leaves room."""


def _row(line: Line) -> str:
    row = f"{'' if line.required else '# '}{line.name} = {line.example}"
    return f"{row:<{_COLUMN}}  # {line.doc}" if len(row) <= _COLUMN else f"# {line.doc}\n{row}"


def _section(section: str, doc: str) -> str:
    rows = [_row(line) for line in LINES if line.section == section]
    return "\n".join([f"[{section}]  # {doc}", *rows] if section else rows)


STARTER = (
    "# What the cell asks for. A line that begins with # asks nothing: take the # away and put your own value in.\n"
    '# Quantities carry their unit, whichever you like: "0.4 mm", "12 in", "5 ms", "20 klx".\n\n'
    + "\n\n".join(_section(section, doc) for section, doc in SECTIONS.items())
    + "\n"
)
"""The text of a new brief."""
