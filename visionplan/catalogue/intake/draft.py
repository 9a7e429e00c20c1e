"""The text of a column map that was guessed, for a person to look over."""

import json
from collections.abc import Iterable, Sequence

from visionplan.catalogue.intake.columnmap import EMPTY, Source
from visionplan.catalogue.intake.guess import Guess, Theirs
from visionplan.catalogue.intake.sheet import tidy
from visionplan.catalogue.items import COLUMNS
from visionplan.text import clean, pad, shorten, width

_HEAD = """\
# A column map: their headings and our columns. Look it over, see to what is lacking, and then:
#   visionplan catalogue take SHEET MAP DIR
# A line may also say { is = "our column", unit = "mm", factor = 0.01, words = { theirs = "ours" } }. A cell's own unit
# goes before; numbers are multiplied by the factor; is = ["pixels wide", "pixels high"] parts "2448 x 2048".
"""
_WIDEST = 60


def map_text(guesses: Sequence[Guess]) -> str:
    """Write maps of one file's sheets as TOML, with what the columns hold and what is left as comments."""
    return "\n".join([_HEAD, *(_section(guess) for guess in guesses)])


def summary(guess: Guess) -> list[str]:
    """Tell in a few sentences what was guessed and what is left."""
    item, sheet = guess.map.item, guess.sheet
    told = [f"{sheet.file}: {sheet.told}"] if sheet.told else []
    found = f"{len(guess.map.sources)} of {len(guess.theirs)} columns guessed"
    told.append(f"{sheet.file}: {item}, headings in row {guess.map.heading}, {found}")
    if guess.unsure:
        told.append(f"to check: {_listed(f'{heading} ({note})' for heading, note in guess.unsure.items())}")
    if guess.left:
        told.append(f"left: {_listed(one.heading for one in guess.left)}")
    if guess.lacking:
        told.append(f"lacking, though every row must state it: {', '.join(guess.lacking)}")
    return told


def _listed(names: Iterable[str]) -> str:
    shown = [shorten(name, _WIDEST) for name in names]
    return ", ".join(shown[:12]) + (f" and {len(shown) - 12} more" if len(shown) > 12 else "")


def _section(guess: Guess) -> str:
    settings, item = guess.map, guess.map.item
    lines = [f"[{item}]"]
    if settings.worksheet:
        lines.append(f"worksheet = {_quoted(settings.worksheet)}")
    lines.append(f"heading = {settings.heading}  # the row with the headings")
    if settings.first:
        lines.append(f"first = {settings.first}  # the row where the items begin")
    if settings.encoding:
        lines.append(f"encoding = {_quoted(settings.encoding)}")
    if settings.delimiter:
        lines.append(f"delimiter = {_quoted(settings.delimiter)}")
    lines.append(f"decimal = {_quoted(settings.decimal)}")
    lines.append(f"thousands = {_quoted(settings.thousands)}  # between the digits of large numbers")
    lines.append(f"empty = [{', '.join(map(_quoted, settings.empty or EMPTY))}]  # stand for nothing")
    if guess.lacking:
        lines.append(f"# lacking, though every row must state it: {', '.join(guess.lacking)}")
        lines.append(f'# where all rows have the same: fixed = {{ {_quoted(guess.lacking[0])} = "…" }}')
    lines += ["", f"[{item}.columns]"]
    held = {one.heading: one for one in guess.theirs}
    lines += _aligned([(_line(source), _comment(held[source.heading], guess.unsure)) for source in settings.sources])
    if guess.left:
        lines += ["", "# left, not taken:"]
        lines += _aligned([(f'# {_quoted(one.heading)} = ""', _comment(one, {})) for one in guess.left])
    unused = [column.name for column in COLUMNS[item] if column.name not in guess.taken]
    lines += ["", f"# columns of ours without one of theirs: {', '.join(unused)}"] if unused else []
    return "\n".join(lines) + "\n"


def _line(source: Source) -> str:
    names = [_quoted(column.name) for column in source.columns]
    entry = names[0] if len(names) == 1 else f"[{', '.join(names)}]"
    if source.unit or source.words:
        unit = f", unit = {_quoted(source.unit)}" if source.unit else ""
        words = ", ".join(f"{_quoted(theirs)} = {_quoted(ours)}" for theirs, ours in source.words.items())
        entry = f"{{ is = {entry}{unit}{f', words = {{ {words} }}' if words else ''} }}"
    return f"{_quoted(source.heading)} = {entry}"


def _comment(theirs: Theirs, unsure: dict[str, str]) -> str:
    held = "; ".join(shorten(tidy(cell), 24) for cell in theirs.cells[:3])
    check = unsure.get(theirs.heading, "")
    return f"  # {held or 'no cell is filled'}" + (f"  <- to check: {check}" if check else "")


def _aligned(lines: Sequence[tuple[str, str]]) -> list[str]:
    widest = min(max(width(line) for line, _ in lines), _WIDEST) if lines else 0
    return [pad(line, widest) + clean(comment) for line, comment in lines]


def _quoted(text: str) -> str:
    """Quote a text for TOML."""
    return json.dumps(text, ensure_ascii=False).replace("\x7f", "\\u007f")
