"""What is said about a ranking besides its rows: counts, why the first is first, what is unknown or assumed."""

import re
import string
from collections.abc import Callable, Sequence
from dataclasses import dataclass

from visionplan.report.alike import Row
from visionplan.report.concession import concession_change, concession_sentence
from visionplan.report.figures import BY_NAME, money, room
from visionplan.report.words import asked_words, lacking, limits, misses
from visionplan.solve.rig import Ranking, Rig
from visionplan.text import clean
from visionplan.units import show

ORDERS = {
    "value": "grade, what is fully known, price, latitude",
    "latitude": "most latitude",
    "depth": "most depth",
    "snr": "best signal to noise",
    "price": "least price",
    "sampling": "finest sampling",
    "length": "shortest to the camera back",
    "yield": "most builds within tolerance that fit",
}
_ORDER_FIGURES: dict[str, Callable[[Rig, str], str]] = {
    "latitude": lambda rig, system: f"{room(rig.latitude)} of room",
    "depth": lambda rig, system: show(sum(side or 0.0 for side in rig.depth), "mm", system),
    "snr": BY_NAME["signal to noise"].text,
    "price": BY_NAME["price"].text,
    "sampling": BY_NAME["sampling"].text,
    "yield": BY_NAME["yield"].text,
    "length": BY_NAME["to the camera back"].text,
}
_NUMBER = re.compile(r"\d+(?:\.\d+)?")


@dataclass(frozen=True)
class Remark:
    """A sentence about some rows of a table."""

    text: str
    ranks: tuple[int, ...]
    """Of the rows it holds of."""
    mark: str = ""
    """What marks those rows, a letter or "?"; "" where it holds of all of them."""


def counts(ranking: Ranking) -> str:
    """How many pairs were judged, how many fit, and in which order they stand."""
    fitting = f"{ranking.fitting:,} fit" if ranking.fitting else "nothing fits"
    return f"{ranking.pairs:,} pairs judged, {fitting}; ordered by {ranking.order} ({ORDERS[ranking.order]})"


def pair(camera: str, lens: str) -> str:
    """A camera and a lens by their ids, safe to show."""
    return f"{clean(camera)} with {clean(lens)}"


def lead(ranking: Ranking, rows: Sequence[Row], system: str = "mm") -> list[str]:
    """Sentences on the first rig: why it is first, what limits it, what holds it; or what the nearest one misses."""
    if not rows:
        return []
    first = rows[0].rig
    if not first.fits:
        missed = "; ".join(misses(first, system))
        told = [f"Nearest: {pair(first.camera, first.lens)}, which misses {missed}."]
    else:
        told = [f"First: {pair(first.camera, first.lens)}, {_reason(ranking, rows, system)}."]
    if bounds := limits(first):
        told.append(f"{bounds[0].upper()}{bounds[1:]}.")
    if first.held:
        asked = next(asked_words(verdict, system) for verdict in first.demands if verdict.name == first.held)
        told.append(f"It stands off the middle of these: {first.held} holds it there (asked {asked}).")
    return told


def _reason(ranking: Ranking, rows: Sequence[Row], system: str) -> str:
    first = rows[0].rig
    second = rows[1].rig if len(rows) > 1 and rows[1].rig.fits else None
    if ranking.fitting == 1:
        return f"the only pair that fits: {first.grade}, {room(first.latitude)} of room"
    if ranking.order == "value":
        return _best_value(first, second)
    words, text = ORDERS[ranking.order], _ORDER_FIGURES.get(ranking.order)
    if text is None:
        return words
    next_one = f", the next {text(second, system)}" if second else ""
    return f"{words}: {text(first, system)}{next_one}"


def _best_value(first: Rig, second: Rig | None) -> str:
    words = f"{first.grade}, {room(first.latitude)} of room"
    if second is None:
        return words
    if first.grade != second.grade:
        return f"{words}; the next is only {second.grade}"
    if bool(first.unknown) != bool(second.unknown):
        return f"{words}, and fully known; of the next {_listed(second.unknown)} is unknown"
    catalogue = first.case.problem.catalogue
    if first.price is not None and (second.price is None or second.price > first.price):
        other = "not stated" if second.price is None else money(second.price, catalogue)
        known = "fully known " if not first.unknown else ""
        return (
            f"{words}; the cheapest of the {known}{first.grade} ones: {money(first.price, catalogue)}, the next {other}"
        )
    if room(first.latitude) != room(second.latitude):
        return f"{words}; alike in price with the next, which has {room(second.latitude)}"
    return f"{words}; the next is its equal and comes after it by name"


def _listed(names: Sequence[str]) -> str:
    return " and ".join(filter(None, (", ".join(names[:-1]), names[-1])))


def unknowns(rows: Sequence[Row]) -> list[Remark]:
    """What can't be judged for what the catalogue leaves out, each once, with the rows."""
    found: dict[str, list[int]] = {}
    for row in rows:
        for verdict in row.rig.demands:
            if verdict.name in row.rig.unknown:
                found.setdefault(f"{verdict.name}: {lacking(row.rig, verdict)}", []).append(row.rig.rank)
    return [Remark(text, tuple(ranks), "?") for text, ranks in found.items()]


def assumed(rows: Sequence[Row]) -> list[Remark]:
    """Assumptions and warnings, each once; those that don't hold of all rows have a letter.

    Sentences that differ in one number alone are told as one, with the range of that number.
    """
    found: dict[str, list[tuple[str, int]]] = {}
    for row in rows:
        for text in row.rig.assumptions:
            found.setdefault(_NUMBER.sub("#", text), []).append((text, row.rig.rank))
    told: list[tuple[str, tuple[int, ...]]] = []
    for entries in found.values():
        texts = dict.fromkeys(text for text, _ in entries)
        merged = _merged(list(texts))
        for text in [merged] if merged else texts:
            told.append((text, tuple(rank for own, rank in entries if merged or own == text)))
    together: dict[tuple[int, ...], list[str]] = {}
    for text, ranks in told:
        together.setdefault(ranks, []).append(clean(text))
    everywhere = together.pop(tuple(row.rig.rank for row in rows), [])
    some = [Remark(" ".join(texts), ranks, _letter(place)) for place, (ranks, texts) in enumerate(together.items())]
    return [Remark(text, tuple(row.rig.rank for row in rows)) for text in everywhere] + some


def _merged(texts: list[str]) -> str | None:
    """One sentence for several that differ in one number; None where they differ in more."""
    numbers = [_NUMBER.findall(text) for text in texts]
    differ = [place for place, column in enumerate(zip(*numbers)) if len(set(column)) > 1]
    if not differ:
        return texts[0]
    if len(differ) > 1:
        return None
    column = sorted((row[differ[0]] for row in numbers), key=float)
    parts = _NUMBER.split(texts[0])
    filled = [f"{column[0]}–{column[-1]}" if place == differ[0] else own for place, own in enumerate(numbers[0])]
    return "".join(part + own for part, own in zip(parts, [*filled, ""]))


def _letter(place: int) -> str:
    letters = string.ascii_lowercase
    return letters[place] if place < len(letters) else letters[place // 26 - 1] + letters[place % 26]


def marks(rank: int, remarks: Sequence[Remark]) -> str:
    """What marks a row: "?" for something unknown, then letters."""
    found = dict.fromkeys(remark.mark for remark in remarks if rank in remark.ranks and remark.mark)
    return "".join(found) if all(len(mark) == 1 for mark in found) else " ".join(found)


def folded(row: Row) -> str:
    """Which rigs fold into a row, with what they differ in."""
    cameras = row.rig.case.problem.catalogue.cameras
    names = []
    for other in row.folded:
        price = "price not stated" if other.price is None else BY_NAME["price"].text(other)
        apart = [clean(cameras["interface"][other.case.cameras]), price]
        names.append(f"{clean(other.camera)} ({', '.join(filter(None, apart))})")
    return ", ".join(names)


def ranges(ranks: Sequence[int]) -> str:
    """Row numbers in short: "1–4, 7"."""
    runs: list[list[int]] = []
    for rank in sorted(ranks):
        if runs and rank == runs[-1][1] + 1:
            runs[-1][1] = rank
        else:
            runs.append([rank, rank])
    return ", ".join(str(a) if a == b else f"{a}–{b}" for a, b in runs)


Paragraph = list[tuple[str, str]]
"""Sentences, each with the mark that stands before it ("" for none)."""


def beneath(ranking: Ranking, rows: Sequence[Row], remarks: Sequence[Remark], system: str = "mm") -> list[Paragraph]:
    """What stands under the rows."""
    comfort, half = (show(part * ranking.brief.comfort, "1", percent=True) for part in (1, 0.5))
    first = [*lead(ranking, rows, system)]
    if ranking.fitting:
        first.append(f"Comfortable is {comfort} of room and more, fair {half}, tight less.")
    everywhere = [remark.text for remark in remarks if not remark.mark]
    paragraphs = [
        [("", note) for note in ranking.notes],
        [("", sentence) for sentence in first],
        [("", f"+{len(row.folded)} in row {row.rig.rank}: {folded(row)}.") for row in rows if row.folded],
        [(f"{remark.mark} ", f"{remark.text} ({_rows(remark.ranks)})") for remark in remarks if remark.mark],
        [("", " ".join(["In every row:", *everywhere]))] if everywhere else [],
        concession_lines(ranking, system),
    ]
    return [paragraph for paragraph in paragraphs if paragraph]


def concession_lines(ranking: Ranking, system: str = "mm") -> Paragraph:
    """What would have to give, least change first; nothing where something fits."""
    if ranking.fitting or ranking.concessions is None:
        return []
    if not ranking.concessions:
        return [("", "No change of one demand alone lets something fit.")]
    told = [
        (f"{concession_change(given):>8}  ", f"{sentence}: {pair(given.camera, given.lens)}")
        for given in ranking.concessions
        for sentence in [concession_sentence(ranking.brief, given, system)]
    ]
    return [("", "Any one of these would let something fit, all else as asked:"), *told]


def _rows(ranks: Sequence[int]) -> str:
    return f"row{'s' if len(ranks) > 1 else ''} {ranges(ranks)}"
