"""The work: a brief with its catalogue and its shortlist, as plain data that can be undone and written down."""

from collections.abc import Mapping
from dataclasses import asdict, dataclass, fields
from typing import Any


@dataclass(frozen=True)
class Mark:
    """A rig on the shortlist: a pair, and its working point where that isn't the plan's."""

    camera: str
    lens: str
    at: float | None = None
    """Working distance it was moved to, mm; None for the plan's, and so below."""
    stop: float | None = None
    rings: tuple[str, ...] | None = None
    orientation: str | None = None
    note: str = ""

    @property
    def pair(self) -> tuple[str, str]:
        """The camera and the lens."""
        return self.camera, self.lens

    @property
    def planned(self) -> bool:
        """Whether it stands where the plan puts it."""
        return self.at is None and self.stop is None and self.rings is None and self.orientation is None


@dataclass(frozen=True)
class Measurement:
    """What was measured of a rig as built."""

    mark: Mark
    """The rig and how it is set, without its note."""
    values: tuple[tuple[str, str], ...]
    """What was typed, by key."""


@dataclass(frozen=True)
class Work:
    """Everything that a change may change."""

    text: str
    """The brief as TOML, free of faults."""
    path: str = ""
    """The brief's file; "" while it has none."""
    saved: str = ""
    """The text as its file holds it; where it has none, the text it began with."""
    catalogue: str = ""
    """The catalogue's folder; "" for the demo works."""
    marks: tuple[Mark, ...] = ()
    measured: tuple[Measurement, ...] = ()

    @property
    def changed(self) -> bool:
        """Whether the brief says something that its file doesn't."""
        return self.text != self.saved


@dataclass(frozen=True)
class Step:
    """The work as it was before a change, and what that change was called."""

    label: str
    work: Work


MOST_STEPS = 200
"""Changes that can be undone."""


def pack(work: Work, past: tuple[Step, ...], future: tuple[Step, ...]) -> dict[str, Any]:
    """The work and its history as JSON values; a text that comes again is held once."""
    texts: dict[str, int] = {}

    def number(text: str) -> int:
        return texts.setdefault(text, len(texts))

    def packed(one: Work) -> dict[str, Any]:
        return asdict(one) | {"text": number(one.text), "saved": number(one.saved)}

    def steps(some: tuple[Step, ...]) -> list[dict[str, Any]]:
        return [{"label": step.label, "work": packed(step.work)} for step in some[-MOST_STEPS:]]

    found = {"work": packed(work), "past": steps(past), "future": steps(future)}
    return found | {"texts": list(texts)}


def unpack(data: Mapping[str, Any]) -> tuple[Work, tuple[Step, ...], tuple[Step, ...]]:
    """What `pack` made.

    Raises
    ------
    ValueError, KeyError, TypeError, IndexError
        Where it isn't that.
    """
    texts = data["texts"]

    def work(packed: Mapping[str, Any]) -> Work:
        known = {field.name: packed[field.name] for field in fields(Work) if field.name != "measured"}
        measured = tuple(map(_measurement, packed.get("measured", ())))
        text, saved = (texts[packed[name]] for name in ("text", "saved"))
        if not all(isinstance(value, str) for value in (text, saved, known["path"], known["catalogue"])):
            raise ValueError("no text")
        return Work(
            **known | {"text": text, "saved": saved, "marks": tuple(map(_mark, known["marks"])), "measured": measured}
        )

    def steps(name: str) -> tuple[Step, ...]:
        return tuple(Step(str(step["label"]), work(step["work"])) for step in data[name])

    return work(data["work"]), steps("past"), steps("future")


def _mark(packed: Mapping[str, Any]) -> Mark:
    known = {field.name: packed[field.name] for field in fields(Mark)}
    rings = None if known["rings"] is None else tuple(known["rings"])
    return Mark(**known | {"rings": rings})


def _measurement(packed: Mapping[str, Any]) -> Measurement:
    values = tuple((key, text) for key, text in packed["values"])
    if not all(isinstance(one, str) for pair in values for one in pair):
        raise ValueError("no text")
    return Measurement(_mark(packed["mark"]), values)
