"""The shortlist as one Markdown document: what was asked and chosen from, each rig with its sheet, what to buy.

One line an entry and nothing that changes by itself, so that two versions of it differ only where the work does.
"""

from collections import Counter
from collections.abc import Iterable, Iterator, Sequence

from visionplan import __version__
from visionplan.brief.fields import LINES
from visionplan.brief.forms import value_text
from visionplan.report.figures import currency
from visionplan.report.page import block
from visionplan.report.sheet import sheet
from visionplan.report.shortlist import Entry, compared
from visionplan.report.spanchart import span_chart
from visionplan.report.words import limits
from visionplan.solve.demands import DEMANDS
from visionplan.solve.rig import Ranking, Rig
from visionplan.text import figure, markdown

WIDTH = 80
"""Terminal cells of the drawings."""
_BOLD = "Bold: the best of a row."


def shortlist_document(ranking: Ranking, entries: Sequence[Entry], date: str, system: str = "mm") -> str:
    """The document; `date` is told as it is given."""
    blocks = [
        _title(ranking),
        *_head(ranking, date),
        "## Brief",
        _table(("line", "value", "what it is"), _brief(ranking)),
        "## Comparison",
        _BOLD,
        _comparison(entries, system),
    ]
    for number, entry in enumerate(entries, 1):
        blocks += _rig(number, entry, system)
    blocks += [
        "## Assumptions",
        _points(dict.fromkeys(told for entry in entries for told in entry.rig.assumptions)),
        "## Sources",
        _points(_sources(ranking)),
    ]
    return "\n\n".join(filter(None, blocks)) + "\n"


def comparison_document(ranking: Ranking, entries: Sequence[Entry], system: str = "mm") -> str:
    """The comparison table alone, the notes in its last row."""
    table = _comparison(entries, system)
    if any(entry.note for entry in entries):
        table += f"\n| note | {' | '.join(markdown(entry.note) for entry in entries)} |"
    return "\n\n".join([_title(ranking), _BOLD, table]) + "\n"


def _title(ranking: Ranking) -> str:
    return f"# {markdown(ranking.brief.title or 'Shortlist')}: shortlist"


def _head(ranking: Ranking, date: str) -> Iterator[str]:
    catalogue = ranking.catalogue
    counts = (f"{len(table):,} {table.item}" for table in (catalogue.cameras, catalogue.lenses, catalogue.spacers))
    yield _points(
        [
            f"Date: {date}",
            f"Brief: {ranking.brief.source or 'not from a file'}",
            f"Catalogue: {', '.join(counts)}; {catalogue.fingerprint}",
            f"{ranking.fitting:,} of {ranking.pairs:,} pairs fit",
            f"visionplan {__version__}",
        ]
    )
    yield _points(ranking.notes)


def _brief(ranking: Ranking) -> Iterator[tuple[str, str, str]]:
    brief = ranking.brief
    for line in LINES:
        if line.key in brief.stated or (line.required and not brief.stated):
            yield line.key, value_text(brief, line.key), line.doc


def _comparison(entries: Sequence[Entry], system: str) -> str:
    names = [_name(entry.rig) for entry in entries]
    rows = [["", *map(markdown, names)]]
    for name, texts, top in compared(entries, system):
        rows.append(
            [
                markdown(name),
                *(f"**{markdown(text)}**" if n in top else markdown(text) for n, text in enumerate(texts)),
            ]
        )
    return _rows(rows)


def _rig(number: int, entry: Entry, system: str) -> Iterator[str]:
    rig = entry.rig
    yield f"## {number}. {markdown(_name(rig))}"
    told = [
        f"Note: {entry.note}" if entry.note else "",
        "Set otherwise than planned." if entry.moved else "",
        f"{limits(rig)}." if limits(rig) else "",
    ]
    yield _points(filter(None, told))
    yield "### Span"
    yield block(span_chart(rig, WIDTH, system=system))
    yield "### Bill of materials"
    yield _table(("item", "id", "count", "price each", "price"), _materials(rig))
    yield sheet(rig, system, as_markdown=True, level=3).rstrip("\n")


def _materials(rig: Rig) -> Iterator[tuple[str, ...]]:
    """What to buy for one rig, and what it comes to; "not stated" where a price is missing."""
    catalogue = rig.case.problem.catalogue
    cameras, money = rig.grid[0] * rig.grid[1], currency(catalogue)
    wanted = [(catalogue.cameras, "camera", rig.camera, cameras), (catalogue.lenses, "lens", rig.lens, cameras)]
    wanted += [(catalogue.spacers, "ring", ring, cameras * each) for ring, each in Counter(rig.spacers).items()]
    for table, item, id, count in wanted:
        price = float(table["price"][table["id"].index(id)])
        yield item, id, str(count), _price(price, money), _price(count * price, money)
    yield "all", "", "", "", _price(rig.price, money)


def _price(value: float | None, money: str) -> str:
    told = figure(value, 6)
    return told if told == "not stated" else f"{told} {money}".rstrip()


def _sources(ranking: Ranking) -> Iterator[str]:
    """Of every demand that is asked."""
    rigs = {verdict.name for rig in ranking.rigs for verdict in rig.demands if verdict.verdict != "not asked"}
    for demand in DEMANDS:
        if demand.name in rigs:
            yield f"{demand.name}: {demand.law}; {demand.source}"


def _name(rig: Rig) -> str:
    return f"{rig.camera} with {rig.lens}"


def _points(texts: Iterable[str]) -> str:
    return "\n".join(f"- {markdown(text)}" for text in texts)


def _table(head: Sequence[str], rows: Iterable[Sequence[str]]) -> str:
    return _rows([[markdown(cell) for cell in row] for row in (head, *rows)])


def _rows(rows: Sequence[Sequence[str]]) -> str:
    first, *rest = (f"| {' | '.join(row)} |" for row in rows)
    return "\n".join([first, f"| {' | '.join(['---'] * len(rows[0]))} |", *rest])
