"""The help of each view: its keys, in words, and what its signs mean."""

from collections.abc import Iterable

from visionplan.tui.rows import Row, cell, paragraph

TEXTS = {
    "Brief": (
        "What the cell asks for, a line a demand. Lines that are not asked stand dimmed; Enter asks one.",
        "The toll of a line is how many more pairs would fit without it: what a demand costs. While it is worked out "
        "anew the old number stands dimmed.",
        "Values are typed as you would say them: 120 x 90 mm, 250..450 mm, 5 ms, 20 %, N-BK7 6 mm. An empty line drops "
        "the demand. The ranking follows as you type.",
    ),
    "Rigs": (
        "One row a pair of camera and lens, at its best stop, distance and rings. The percentage is the latitude: how "
        "far focal length, distance or sensor may be off together before the picture breaks a demand. The two names "
        "after it are the pinch, the two demands that leave no more room.",
        "When nothing fits, the concessions stand on top: each the smallest change of one demand that lets a rig fit. "
        "Enter takes one into the brief, u takes it back. Under them the nearest misses, and what each misses.",
        "◆ marks what is on the shortlist.",
    ),
    "Rig": (
        "Each demand is a bar over the magnification: where it holds. The span under them is where all hold at once, "
        "the line through them the working point. The thick bars pinch.",
        "The elevation lies on its side, camera left, part right, to one scale in both directions.",
        "What if: move the camera, turn the stop, change the rings; bars and verdicts follow.",
    ),
    "Shortlist": (
        "The marked rigs side by side; the best of a row has a star, what is alike in all stands dimmed.",
        "y copies the shortlist as Markdown into the clipboard of the terminal you sit at, also over SSH (OSC 52); "
        "where a terminal refuses that, or it is too long, x exports it to a file.",
    ),
    "As built": (
        "A target of known length in the picture, in focus, and how many pixels it spans from end to end: that tells "
        "where the rig stands, what is off, and what to move by how much. It is about the rig that view 3 or 4 was "
        "at; n and b go to the others.",
        "A second target tells the tilt: one at each end of a side, laid alike, or one along each side. A taped "
        "distance tells a wrong distance from a wrong lens. Empty values count as what stands there dimmed.",
        "What was measured is kept with the work, a rig at a time.",
    ),
}
PARAGRAPHS = (
    "Every change is on disk at once; the next start goes on where this one was left. Saving writes the brief's own "
    "file.",
)


def help_rows(
    view: str, keys: Iterable[tuple[str, str]], everywhere: Iterable[tuple[str, str]], width: int
) -> list[Row]:
    """The help of a view."""
    rows: list[Row] = []
    for text in TEXTS[view]:
        rows += [*paragraph(text, width - 4, "", "  "), []]
    rows.append([(f"  Keys in {view}", "head")])
    rows += _keys(keys)
    rows += [[], [("  Keys everywhere", "head")], *_keys(everywhere), []]
    for text in PARAGRAPHS:
        rows += paragraph(text, width - 4, "", "  ")
    return rows


def _keys(keys: Iterable[tuple[str, str]]) -> list[Row]:
    return [[("    ", ""), cell(key, 24, "key"), (label, "")] for key, label in keys]
