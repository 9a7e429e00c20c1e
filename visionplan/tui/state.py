"""The state of the interface: the work, its history, its journal and what was found out about it. Knows no Textual."""

from collections.abc import Mapping
from dataclasses import dataclass, field, replace
from pathlib import Path

from visionplan.brief.edit import drop_line, set_line
from visionplan.brief.fields import BY_KEY
from visionplan.brief.files import write_atomically
from visionplan.brief.forms import value_text
from visionplan.brief.model import Brief
from visionplan.brief.read import parse_brief, read_text
from visionplan.catalogue.items import Catalogue
from visionplan.demo import DEMO_BRIEF, demo_folder
from visionplan.faults import Fault, InputError
from visionplan.solve.rig import Concession, Ranking, Rig
from visionplan.solve.take import Taken
from visionplan.tui.journal import Journal, key_of, newest, prune, state_folder
from visionplan.tui.work import MOST_STEPS, Mark, Measurement, Step, Work, pack, unpack


class ReadOnly(Exception):
    """Another interface writes this work."""


@dataclass
class Results:
    """What is known of the brief as it stands, or is being typed."""

    ranking: Ranking | None = None
    concessions: tuple[Concession, ...] | None = None
    """None while they aren't worked out."""
    tolls: dict[str, int] | None = None
    tolls_of: int = -1
    """The generation that the tolls are of."""
    rigs: dict[Mark, Rig | str] = field(default_factory=dict)
    """By mark without its note."""
    fault: str = ""


class State:
    """One work, opened: every change goes through here and is on disk when the call returns."""

    def __init__(self, folder: Path | None = None):
        self.folder = state_folder() if folder is None else folder
        self.journal = Journal(self.folder, key_of(""))
        self.writable = True
        self.work = Work("")
        self.past: tuple[Step, ...] = ()
        self.future: tuple[Step, ...] = ()
        self.settings: dict[str, str] = {}
        """What a person set that is no part of the work: order, theme."""
        self.brief: Brief = None  # type: ignore[assignment]
        self.catalogue: Catalogue | None = None
        self.results = Results()
        self.generation = 0
        """Of the brief that the results are to be of; grows with every change, typed ones too."""
        self.typed: Brief | None = None
        """The brief with what is being typed, while that makes sense."""
        self.left_off = False
        """Whether the work opened is one left off with changes that its file doesn't hold."""
        self.outside = False
        """Whether its file has been changed by someone else since."""

    # opening

    def resume(self) -> None:
        """Open the work left off last, else the demo works."""
        key = newest(self.folder)
        data = Journal(self.folder, key).read() if key else None
        try:
            path = unpack(data)[0].path if data else ""
        except (ValueError, KeyError, TypeError, IndexError):
            path, data = "", None
        try:
            self.open(path) if path and data else self.open_unnamed()
        except InputError:  # its file has gone or become faulty: the journal still has the work
            self._enter(path, Work("", path))

    def open_unnamed(self) -> None:
        """Open the work without a file; the first time, or where there is none, the demo brief."""
        text = read_text(demo_folder() / DEMO_BRIEF)
        self._enter("", Work(text, saved=text))

    def open(self, path: str, catalogue: str = "") -> None:
        """Open a brief's file, with what was left off of it.

        Raises
        ------
        InputError
            Where the file can't be read or has faults; what was open stays so.
        """
        path = str(Path(path).absolute())
        text = read_text(path)
        parse_brief(text, path)
        self._enter(path, Work(text, path, text, catalogue), catalogue)

    def _enter(self, path: str, fresh: Work, catalogue: str = "") -> None:
        journal = self.journal if self.journal.file.stem == key_of(path) else Journal(self.folder, key_of(path))
        writable = journal.lock()
        data = journal.read()
        work, left_off, outside = fresh, False, False
        past: tuple[Step, ...] = ()
        future: tuple[Step, ...] = ()
        if data:
            try:
                old, past, future = unpack(data)
                brief = parse_brief(old.text, old.path)
            except (ValueError, KeyError, TypeError, IndexError, InputError):
                past, future = (), ()
            else:
                del brief
                work = replace(old, catalogue=catalogue or old.catalogue)
                left_off = bool(path) and work.changed
                outside = bool(fresh.text) and bool(path) and fresh.text != old.saved
                if outside and not left_off:
                    past = (*past, Step("the file as it was", work))
                    work, future = replace(work, text=fresh.text, saved=fresh.text), ()
                elif outside:
                    work = replace(work, saved=fresh.text)
                settings = data.get("settings")
                self.settings = dict(settings) if isinstance(settings, dict) else {}
        brief = parse_brief(work.text, work.path or "brief")
        if journal is not self.journal:
            self.journal.close()
        self.journal, self.writable = journal, writable
        self.work, self.past, self.future = work, past[-MOST_STEPS:], future
        self.left_off, self.outside = left_off, outside
        if self.work.catalogue != getattr(self, "_read", None):
            self.catalogue = None
        self._settle(brief)
        self.keep()
        if writable:
            prune(self.folder)

    def take_file(self) -> None:
        """Go back to what the work's file says; undo brings the changes back."""
        self.change("the file as it is", replace(self.work, text=self.work.saved))
        self.left_off = False

    def close(self) -> None:
        """Let another interface write this work."""
        self.journal.close()

    # changing

    def change(self, label: str, work: Work) -> None:
        """Make a change that can be undone, and put it on disk.

        Raises
        ------
        InputError
            Where the brief's lines then contradict each other.
        ReadOnly
            Where another interface writes this work.
        """
        if not self.writable:
            raise ReadOnly
        if work == self.work:
            return
        brief = self.brief if work.text == self.work.text else parse_brief(work.text, work.path or "brief")
        self.past = (*self.past, Step(label, self.work))[-MOST_STEPS:]
        self.future = ()
        self.work = work
        self._settle(brief)
        self.keep()

    def _settle(self, brief: Brief) -> None:
        if brief is not self.brief:
            self.brief = brief
            self.generation += 1
        self.typed = None

    def keep(self) -> None:
        """Put everything on disk; where that fails, `journal.problem` tells."""
        if self.writable:
            self.journal.write(pack(self.work, self.past, self.future) | {"settings": self.settings})

    def undo(self) -> str | None:
        """Take the last change back; what it was called, None where there is none."""
        return self._step("past", "future")

    def redo(self) -> str | None:
        """Make the change again that was taken back last."""
        return self._step("future", "past")

    def _step(self, source: str, target: str) -> str | None:
        if not self.writable:
            raise ReadOnly
        steps: tuple[Step, ...] = getattr(self, source)
        if not steps:
            return None
        step = steps[-1]
        # what the file holds is no change of ours, so it stays as it is
        work = replace(step.work, path=self.work.path, saved=self.work.saved)
        setattr(self, source, steps[:-1])
        setattr(self, target, (*getattr(self, target), Step(step.label, self.work)))
        self.work = work
        self._settle(parse_brief(work.text, work.path or "brief"))
        self.keep()
        return step.label

    # the brief

    def value(self, key: str) -> str:
        """What a line of the brief says, "" where it isn't there."""
        return value_text(self.work.text, key)

    def set(self, key: str, typed: str) -> None:
        """Set a line of the brief to what was typed; raises as `change`."""
        text = set_line(self.work.text, key, typed)
        self.change(f"{BY_KEY[key].name.replace('_', ' ')} {typed}", replace(self.work, text=text))

    def drop(self, key: str) -> None:
        """Drop a line of the brief; raises as `change`."""
        text = drop_line(self.work.text, key)
        self.change(f"{BY_KEY[key].name.replace('_', ' ')} not asked", replace(self.work, text=text))

    def type(self, key: str, typed: str) -> Fault | None:
        """Look at the brief with what is being typed; what is wrong with it, if something is."""
        try:
            text = set_line(self.work.text, key, typed)
            brief = parse_brief(text, self.work.path or "brief")
        except InputError as error:
            return error.faults[0]
        if brief != (self.typed or self.brief):
            self.typed = brief
            self.generation += 1
        return None

    def untype(self) -> None:
        """Forget what was being typed."""
        if self.typed is not None:
            self.typed = None
            self.generation += 1

    def take(self, concession: Concession, taken: Taken) -> None:
        """Put a concession into the brief; raises as `change`."""
        self.change(f"{concession.demand} conceded", replace(self.work, text=taken.text))

    def save(self, path: str = "") -> None:
        """Write the brief to its file, or to another one, which becomes its file.

        Raises
        ------
        InputError
            Where it can't be written, or another interface has that file open.
        ReadOnly
            Where another interface writes this work.
        """
        path = str(Path(path).absolute()) if path else self.work.path
        if not self.writable and path == self.work.path:
            raise ReadOnly
        journal = self.journal
        if key_of(path) != journal.file.stem:
            journal = Journal(self.folder, key_of(path))
            if not journal.lock():
                found = f"another interface has this brief open ({journal.holder})"
                raise InputError([Fault(path, found, "another name")])
        try:
            write_atomically(path, self.work.text)
        except InputError:
            if journal is not self.journal:
                journal.close()
            raise
        if journal is not self.journal:
            if self.writable:
                self.journal.discard()
            self.journal.close()
            self.journal, self.writable = journal, True
        self.work = replace(self.work, path=path, saved=self.work.text)
        self.left_off = self.outside = False
        self.keep()

    # the catalogue

    @property
    def catalogue_folder(self) -> str:
        """Where the catalogue lies."""
        return self.work.catalogue or str(demo_folder())

    def loaded(self, catalogue: Catalogue) -> None:
        """Take a catalogue that was read from the work's folder."""
        self.catalogue = catalogue
        self._read = self.work.catalogue
        self.generation += 1
        self.results = Results()

    # the shortlist

    def marked(self, pair: tuple[str, str]) -> bool:
        """Whether a pair is on the shortlist."""
        return any(mark.pair == pair for mark in self.work.marks)

    def mark(self, mark: Mark) -> None:
        """Put a rig on the shortlist, or take it off where it is there just so; raises as `change`."""
        known = [one for one in self.work.marks if replace(one, note="") == replace(mark, note="")]
        if known:
            marks = tuple(one for one in self.work.marks if one not in known)
            self.change(f"mark of {mark.camera} taken off", replace(self.work, marks=marks))
        else:
            self.change(f"{mark.camera} marked", replace(self.work, marks=(*self.work.marks, mark)))

    def toggle(self, pair: tuple[str, str]) -> bool:
        """Put a pair on the shortlist as planned, or take all its rigs off; whether it is on then. Raises as
        `change`."""
        if not self.marked(pair):
            self.mark(Mark(*pair))
            return True
        marks = tuple(mark for mark in self.work.marks if mark.pair != pair)
        self.change(f"mark of {pair[0]} taken off", replace(self.work, marks=marks))
        return False

    def note(self, place: int, note: str) -> None:
        """Write a note to a rig of the shortlist; raises as `change`."""
        marks = list(self.work.marks)
        marks[place] = replace(marks[place], note=note)
        self.change(f"note to {marks[place].camera}", replace(self.work, marks=tuple(marks)))

    # as built

    def measured(self, mark: Mark) -> dict[str, str]:
        """What was measured of a rig, as typed, by key."""
        return next((dict(one.values) for one in self.work.measured if one.mark == mark), {})

    def measure(self, mark: Mark, label: str, values: Mapping[str, str]) -> None:
        """Keep what was measured of a rig in the place of what was before; raises as `change`."""
        measured = {one.mark: one for one in self.work.measured}
        measured[mark] = Measurement(mark, tuple(values.items()))
        kept = tuple(one for one in measured.values() if one.values)
        self.change(f"{label} of {mark.camera}", replace(self.work, measured=kept))

    # what is told

    @property
    def asked(self) -> Brief:
        """The brief that results are to be of: with what is being typed."""
        return self.typed or self.brief

    def told(self) -> str:
        """What a person must know before all else: nothing is kept, or nothing can be changed; "" when all is well."""
        if not self.writable:
            return f"Read-only: this work is open elsewhere ({self.journal.holder})."
        if self.journal.problem:
            return f"Changes are not kept on disk: {self.journal.problem}. They live in this window; save the brief."
        return ""

    def kept(self) -> tuple[Mark, ...]:
        """The rigs of the shortlist and those measured, each once, without their notes."""
        marks = [*(replace(mark, note="") for mark in self.work.marks), *(one.mark for one in self.work.measured)]
        return tuple(dict.fromkeys(marks))

    def judged(self, mark: Mark) -> Rig | str | None:
        """The rig of a mark without its note, or why it can't be judged, or None while it isn't yet."""
        ranking = self.results.ranking
        rigs = ranking.rigs if ranking and mark.planned else ()
        ranked = next((rig for rig in rigs if (rig.camera, rig.lens) == mark.pair), None)
        return self.results.rigs.get(mark, ranked)

    def shortlist(self) -> list[tuple[Mark, Rig | str | None]]:
        """The marked rigs, each as `judged`."""
        return [(mark, self.judged(replace(mark, note=""))) for mark in self.work.marks]
