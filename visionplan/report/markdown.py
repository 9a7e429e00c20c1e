"""A ranking as GitHub-flavoured Markdown: a table, and beneath it what limits, what is assumed, what could give."""

from collections.abc import Callable, Sequence

from visionplan.report.alike import Row, fold
from visionplan.report.figures import BY_NAME, setup, short
from visionplan.report.remarks import Paragraph, Remark, assumed, beneath, counts, marks, unknowns
from visionplan.report.words import misses
from visionplan.solve.rig import Ranking
from visionplan.text import markdown


def ranking_markdown(ranking: Ranking, system: str = "mm") -> str:
    """The same text for the same ranking, line by line: no times and no dates in it."""
    rows = fold(ranking.rigs)
    remarks = [*unknowns(rows), *assumed(rows)]
    blocks = [f"# {markdown(ranking.brief.title or 'Ranking')}", markdown(f"{counts(ranking)}.")]
    for fits in (True, False):
        some = [row for row in rows if row.rig.fits == fits]
        if some:
            blocks.append(_table(some, remarks, system))
    blocks += [_paragraph(paragraph) for paragraph in beneath(ranking, rows, remarks, system)]
    return "\n\n".join(blocks) + "\n"


def _table(rows: Sequence[Row], remarks: Sequence[Remark], system: str) -> str:
    def own(name: str) -> Callable[[Row], str]:
        return lambda row: BY_NAME[name].text(row.rig, system)

    def escaped(cell: Callable[[Row], str]) -> Callable[[Row], str]:
        return lambda row: markdown(cell(row))

    def outcome(row: Row) -> str:
        return short(row.rig.shortfall) if row.rig.shortfall else "misses a gate"

    columns: dict[str, Callable[[Row], str]] = {
        "#": lambda row: str(row.rig.rank),
        "camera": escaped(lambda row: row.rig.camera + (f" +{len(row.folded)}" if row.folded else "")),
        "lens": escaped(lambda row: row.rig.lens),
        "stop": own("stop"),
        "rings, setting": escaped(lambda row: setup(row.rig)),
        "working distance": own("working distance"),
        "sampling": own("sampling"),
    }
    if rows[0].rig.fits:
        columns |= {"latitude": own("latitude"), "grade": own("grade"), "pinch": own("pinch")}
    else:
        columns |= {"short by": outcome, "misses": escaped(lambda row: "; ".join(misses(row.rig, system)))}
    columns |= {"price": escaped(own("price")), "notes": lambda row: marks(row.rig.rank, remarks)}
    cells = {head: [cell(row) for row in rows] for head, cell in columns.items()}
    cells = {head: column for head, column in cells.items() if any(column)}
    lines = [list(cells), ["---"] * len(cells), *zip(*cells.values())]
    return "\n".join(f"| {' | '.join(line)} |" for line in lines)


def _paragraph(paragraph: Paragraph) -> str:
    """Sentences a line each; those with a mark as a list."""
    return "\n".join(
        f"- **{markdown(mark.strip())}** {markdown(text)}" if mark else markdown(text) for mark, text in paragraph
    )
