"""What is worked out behind the keys: one thread, of the requests waiting the newest, the most urgent first.

A ranking goes before the shortlist, the shortlist before the tolls. A request that a newer one overtakes is dropped;
tolls are worked out line by line, so that nothing waits for them.
"""

from collections.abc import Callable, Sequence
from dataclasses import dataclass, field, replace
from functools import cache
from threading import Condition, Thread
from time import monotonic
from typing import TYPE_CHECKING

from visionplan import units
from visionplan.brief.model import Brief
from visionplan.brief.read import parse_brief
from visionplan.catalogue.items import Catalogue
from visionplan.faults import InputError
from visionplan.solve import concede, judge_one, rank, tolls
from visionplan.solve.rig import Concession, Ranking, Rig
from visionplan.solve.take import Taken, take
from visionplan.solve.variant import variant
from visionplan.tui.measuring import Measures
from visionplan.tui.work import Mark

if TYPE_CHECKING:
    from visionplan.solve.asbuilt import AsBuilt

_TELL = 0.4
"""Seconds between two tellings of how much is done."""
URGENCY = ("take", "rank", "judge", "built", "concede", "marks", "more", "tolls")
"""Kinds of requests, the most urgent first; of each kind only the newest waits."""


@dataclass(frozen=True)
class Request:
    """What is asked of the solver."""

    kind: str
    generation: int
    """Of the brief it is about."""
    brief: Brief
    catalogue: Catalogue
    order: str = "value"
    top: int = 20
    marks: Sequence[Mark] = ()
    """For marks all of the shortlist; for judge the one that is looked at."""
    rig: Rig | None = None
    """For judge: the rig as planned, to be set otherwise; for built: as it was to be built."""
    measures: Measures | None = None
    """For built."""
    text: str = ""
    concession: Concession | None = None


@dataclass(frozen=True)
class Answer:
    """What came out."""

    request: Request
    ranking: Ranking | None = None
    concessions: tuple[Concession, ...] | None = None
    rigs: dict[Mark, Rig | str] = field(default_factory=dict)
    """By mark (without its note) its rig, or why it can't be judged."""
    tolls: dict[str, int] | None = None
    """All lines worked out so far."""
    taken: Taken | None = None
    built: "AsBuilt | str | None" = None
    """What the measures tell, or why they can't."""
    fault: str = ""
    share: float | None = None
    """How much is done, where that is all there is to tell yet."""


class Stopped(Exception):
    """What is being worked out isn't wanted any more."""


class Solver:
    """The thread and what waits for it."""

    def __init__(self, answered: Callable[[Answer], None]):
        self._answered = answered
        """Called on the solver's thread."""
        self._waiting: dict[str, Request] = {}
        self._change = Condition()
        self._closed = False
        self._doing: Request | None = None
        self._stop = False
        """Whether what is being done was given up."""
        self._thread = Thread(target=self._run, name="solver", daemon=True)
        self._thread.start()

    def ask(self, request: Request) -> None:
        """Put a request in the place of an older one of its kind."""
        with self._change:
            self._waiting[request.kind] = request
            self._change.notify()

    def drop(self, *kinds: str) -> None:
        """Forget requests that wait."""
        with self._change:
            for kind in kinds:
                self._waiting.pop(kind, None)

    def give_up(self) -> None:
        """Stop what is being worked out, at the next place where that can be done."""
        with self._change:
            self._stop = self._doing is not None

    @property
    def under_way(self) -> frozenset[str]:
        """The kinds of requests that wait or are being worked out."""
        with self._change:
            return frozenset(self._waiting) | ({self._doing.kind} if self._doing else set())

    def close(self) -> None:
        """Let the thread end after what it is doing."""
        with self._change:
            self._closed = True
            self._waiting.clear()
            self._change.notify()

    def _run(self) -> None:
        while True:
            with self._change:
                self._doing, self._stop = None, False
                self._change.wait_for(lambda: self._waiting or self._closed)
                if self._closed:
                    return
                kind = next(kind for kind in URGENCY if kind in self._waiting)
                request = self._doing = self._waiting.pop(kind)
            try:
                self._do(request)
            except Stopped:
                pass
            except InputError as error:
                self._answer(Answer(request, fault=error.faults[0].found))
            except MemoryError:
                self._answer(Answer(request, fault="there is not enough memory to work this out"))
            except Exception as error:  # a fault of the solver must not end the interface, and must be seen
                self._answer(Answer(request, fault=f"fault of the program: {type(error).__name__}: {error}"))

    def _answer(self, answer: Answer) -> None:
        if not self._closed:
            self._answered(answer)

    def _watch(self, request: Request) -> Callable[[float], None]:
        """Stops work that was given up or that a newer ranking overtakes; tells now and then how much is done."""
        told = monotonic()

        def watch(share: float) -> None:
            nonlocal told
            with self._change:
                if self._closed or self._stop or "rank" in self._waiting:
                    raise Stopped
            if request.kind == "rank" and monotonic() - told > _TELL:
                told = monotonic()
                self._answer(Answer(request, share=share))

        return watch

    def _do(self, request: Request) -> None:
        brief, catalogue = request.brief, request.catalogue
        if request.kind in ("rank", "more"):
            watch = self._watch(request)
            self._answer(Answer(request, ranking=rank(brief, catalogue, request.order, request.top, False, watch)))
        elif request.kind == "concede":
            self._answer(Answer(request, concessions=concede(brief, catalogue, self._watch(request))))
        elif request.kind == "judge":
            self._answer(Answer(request, rigs={mark: moved(request.rig, mark) for mark in request.marks}))
        elif request.kind == "marks":
            self._answer(
                Answer(request, rigs={replace(m, note=""): judged(brief, catalogue, m) for m in request.marks})
            )
        elif request.kind == "built":
            self._answer(Answer(request, built=diagnosed(request.rig, request.measures)))
        elif request.kind == "take":
            assert request.concession
            taken = take(request.text, brief.source, catalogue, request.concession)
            ranking = rank(parse_brief(taken.text, brief.source), catalogue, request.order, request.top, False)
            self._answer(Answer(request, ranking=ranking, taken=taken))
        elif request.kind == "tolls":
            self._tolls(request)

    def _tolls(self, request: Request) -> None:
        found: dict[str, int] = {}
        for line in sorted(request.brief.stated):
            with self._change:
                if self._closed or self._waiting:
                    self._waiting.setdefault("tolls", request)
                    return
            found |= tolls(replace(request.brief, stated=frozenset({line})), request.catalogue)
        self._answer(Answer(request, tolls=found))
        _warm()


def judged(brief: Brief, catalogue: Catalogue, mark: Mark) -> Rig | str:
    """The rig of a mark, or why there is none."""
    try:
        rings = None if mark.rings is None else list(mark.rings)
        return judge_one(brief, catalogue, mark.camera, mark.lens, mark.at, mark.stop, rings, mark.orientation)
    except InputError as error:
        return error.faults[0].found


def moved(rig: Rig | None, mark: Mark) -> Rig | str:
    """A rig set as a mark says, or why it can't be."""
    assert rig
    try:
        return variant(rig, None, mark.at, mark.stop, mark.rings, mark.orientation)
    except InputError as error:
        return error.faults[0].found


@cache
def _warm() -> None:
    """Import what the first typed value would else wait for: the editor of TOML, and rarer units."""
    import tomlkit  # noqa: F401

    units.parse("1 furlong", "mm")


def diagnosed(planned: Rig | None, measured: Measures | None) -> "AsBuilt | str":
    """What the measures tell of a rig, or why they can't."""
    from visionplan.solve.asbuilt import as_built

    assert planned
    assert measured
    try:
        return as_built(planned, measured.targets, measured.distance, measured.height)
    except InputError as error:
        fault = error.faults[0]
        return f"{fault.found}; expected {fault.expected}" if fault.expected else fault.found
