"""The shortlist compared, as CSV and as JSON: the rigs that a person marked, side by side, each with its note."""

import csv
import io
import json
from collections.abc import Sequence
from dataclasses import dataclass, replace

from visionplan.report.csv import ranking_csv
from visionplan.report.figures import FIGURES, best
from visionplan.report.json import ranking_json
from visionplan.report.words import misses
from visionplan.solve.rig import Ranking, Rig
from visionplan.text import csv_cell


@dataclass(frozen=True)
class Entry:
    """A rig of the shortlist."""

    rig: Rig
    note: str = ""
    moved: bool = False
    """Whether it stands where a person put it, not where the plan does."""


def compared(entries: Sequence[Entry], system: str = "mm") -> list[tuple[str, list[str], frozenset[int]]]:
    """Every figure with its value for each rig and the places of the best; figures that no rig has are left out."""
    rigs = [entry.rig for entry in entries]
    rows = []
    for figure in FIGURES:
        texts = [figure.text(rig, system) for rig in rigs]
        trivial = figure.name == "shortfall" and all(rig.fits for rig in rigs)
        if not trivial and any(figure.value(rig) not in (None, "") for rig in rigs):
            rows.append((figure.name, texts, best(figure, rigs)))
    missed = ["; ".join(misses(rig, system)) or "nothing" for rig in rigs]
    if set(missed) != {"nothing"}:
        rows.insert(1, ("misses", missed, frozenset()))
    return rows


def _listed(ranking: Ranking, entries: Sequence[Entry]) -> Ranking:
    """The ranking with these rigs alone, numbered in their order."""
    rigs = tuple(replace(entry.rig, rank=number) for number, entry in enumerate(entries, 1))
    return replace(ranking, rigs=rigs)


def shortlist_csv(ranking: Ranking, entries: Sequence[Entry], system: str = "mm") -> str:
    """A row a rig, as a ranking has, with its note in the last column."""
    rows = list(csv.reader(io.StringIO(ranking_csv(_listed(ranking, entries), system))))
    notes = ["note", *(csv_cell(entry.note) for entry in entries)]
    text = io.StringIO()
    csv.writer(text, lineterminator="\n").writerows([*row, note] for row, note in zip(rows, notes))
    return text.getvalue()


def shortlist_json(ranking: Ranking, entries: Sequence[Entry]) -> str:
    """A ranking's document with these rigs alone, each with its note."""
    document = json.loads(ranking_json(_listed(ranking, entries)))
    for rig, entry in zip(document["rigs"], entries):
        rig["note"] = entry.note
    return json.dumps(document, indent=2, allow_nan=False) + "\n"
