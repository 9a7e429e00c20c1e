"""The app's side of the solver: what is asked when, and what is done with the answers."""

from typing import TYPE_CHECKING, Any

from textual.message import Message

from visionplan.report.remarks import pair
from visionplan.solve.rig import Concession, Rig
from visionplan.tui.solver import Answer, Request, Solver
from visionplan.tui.state import Results
from visionplan.tui.work import Mark

FIRST, MORE = 20, 200
"""How many rigs are ranked at once, and at most."""
_SLOW = 0.3
"""Seconds after which a ranking is said to be under way."""


class Solved(Message):
    """An answer has come from the solver's thread."""

    def __init__(self, answer: Answer):
        super().__init__()
        self.answer = answer


class Solving:
    """Asks the solver and takes its answers; a part of the app."""

    if TYPE_CHECKING:
        app: Any

    def __init__(self) -> None:
        self.solver = Solver(lambda answer: self.post_message(Solved(answer)))  # type: ignore[attr-defined]
        self.top = FIRST
        self.slow = False
        """Whether a ranking takes long."""
        self.share: float | None = None
        """How much of it is done, once that is known."""
        self._ranked = -1
        """Generation of the ranking shown."""

    @property
    def order(self) -> str:
        """The order of the ranking."""
        return self.state.settings.get("order", "value")  # type: ignore[attr-defined]

    def _request(self, kind: str, **more) -> Request | None:
        state = self.state  # type: ignore[attr-defined]
        if state.catalogue is None:
            return None
        return Request(kind, state.generation, state.asked, state.catalogue, self.order, self.top, **more)

    def ask(self, kind: str, **more) -> None:
        """Ask the solver, once there is a catalogue."""
        if request := self._request(kind, **more):
            self.solver.ask(request)

    def rank(self) -> None:
        """Have the brief ranked, as it stands or is being typed."""
        self.top, self.share = FIRST, None
        self.solver.drop("more", "tolls", "marks", "concede")
        self.ask("rank")
        self.set_timer(_SLOW, self._mind)  # type: ignore[attr-defined]

    def _mind(self) -> None:
        state = self.state  # type: ignore[attr-defined]
        slow = self._ranked != state.generation and state.catalogue is not None and not state.results.fault
        if slow != self.slow:
            self.slow = slow
            self.redraw()  # type: ignore[attr-defined]

    def stop(self) -> None:
        """Give up the ranking that is under way; its answer is not waited for."""
        if self.slow:
            self.solver.give_up()
            self.solver.drop("rank", "concede", "marks", "tolls", "more")
            self._ranked, self.slow = self.state.generation, False  # type: ignore[attr-defined]
            self.state.results.fault = "stopped; Ctrl+R ranks anew"  # type: ignore[attr-defined]
            self.redraw()  # type: ignore[attr-defined]

    def more(self) -> None:
        """Have more of the ranking."""
        ranking = self.state.results.ranking  # type: ignore[attr-defined]
        if ranking and len(ranking.rigs) >= self.top and self.top < MORE:
            self.top = MORE
            self.ask("more")

    def judge(self, base: Rig, mark: Mark) -> None:
        """Judge a rig set by hand."""
        self.ask("judge", marks=(mark,), rig=base)

    def take(self, concession: Concession) -> None:
        """Put a concession into the brief."""
        if self.may_change():  # type: ignore[attr-defined]
            self.ask("take", text=self.state.work.text, concession=concession)  # type: ignore[attr-defined]

    def on_solved(self, message: Solved) -> None:
        """Take an answer, unless it is of a brief that is no more."""
        answer = message.answer
        request = answer.request
        state = self.state  # type: ignore[attr-defined]
        if request.generation != state.generation:
            return
        if answer.share is not None:
            self.share = answer.share
        elif answer.fault:
            self._failed(answer)
        elif request.kind == "rank":
            self._take_ranking(answer)
        elif request.kind == "more" and answer.ranking and answer.ranking.order == self.order:
            state.results.ranking = answer.ranking
        elif request.kind == "concede":
            state.results.concessions = answer.concessions
        elif request.kind == "tolls":
            state.results.tolls, state.results.tolls_of = answer.tolls, state.generation
        elif request.kind == "marks":
            state.results.rigs |= answer.rigs
        elif request.kind == "judge":
            for mark, rig in answer.rigs.items():
                self.rig_pane.judged(mark, rig)  # type: ignore[attr-defined]
        elif request.kind == "built":
            self.as_built.diagnosed(request.rig, request.measures, answer.built)  # type: ignore[attr-defined]
        elif request.kind == "take":
            self._take_concession(answer)
        self.redraw()  # type: ignore[attr-defined]

    def _take_ranking(self, answer: Answer) -> None:
        state = self.state  # type: ignore[attr-defined]
        self._ranked, self.slow = state.generation, False
        ranking = answer.ranking
        assert ranking
        before = state.results.ranking
        if before is None or bool(before.fitting) != bool(ranking.fitting):
            self.rigs.touched = False  # type: ignore[attr-defined]
        tolls, of = state.results.tolls, state.results.tolls_of
        state.results = Results(ranking, None if not ranking.fitting else (), tolls, of)
        if not ranking.fitting:
            self.ask("concede")
        self.follow()  # type: ignore[attr-defined]
        self.marks_changed()
        if state.typed is None:
            self.ask("tolls")

    def marks_changed(self) -> None:
        """Have the shortlist and what was measured judged, what of it isn't yet."""
        state = self.state  # type: ignore[attr-defined]
        if unknown := [mark for mark in state.kept() if mark not in state.results.rigs]:
            self.ask("marks", marks=tuple(unknown))
        self.redraw()  # type: ignore[attr-defined]

    def _failed(self, answer: Answer) -> None:
        if answer.request.kind in ("rank", "more"):
            self._ranked, self.slow = answer.request.generation, False
            self.state.results = Results(fault="could not be ranked")  # type: ignore[attr-defined]
        self.tell(f"{answer.fault[0].upper()}{answer.fault[1:]}.", "warn")  # type: ignore[attr-defined]

    def _take_concession(self, answer: Answer) -> None:
        taken, given = answer.taken, answer.request.concession
        assert taken
        assert given
        self.state.take(given, taken)  # type: ignore[attr-defined]
        lines = "; ".join(
            f"{key.rpartition('.')[2].replace('_', ' ')} {value or 'not asked'}" for key, value in taken.lines.items()
        )
        if not taken.fitting:
            told = f"Taken: {lines}. Still nothing fits, as the line serves other demands too; what is left to give:"
        else:
            further = f", {100 * taken.further:g} % further than needed by itself" if taken.further else ""
            count = (
                f"{taken.fitting:,} pairs fit"
                if taken.fitting > 1
                else f"1 pair fits: {pair(given.camera, given.lens)}"
            )
            told = f"Taken: {lines}{further}. Now {count}. u takes it back."
        self.tell(told)  # type: ignore[attr-defined]
        self._take_ranking(answer)
