"""The app's side of files: opening, saving, the catalogue, export and clipboard."""

import os
from collections.abc import Callable
from concurrent.futures import Future
from datetime import date
from pathlib import Path
from typing import TYPE_CHECKING, Any

from textual.message import Message

from visionplan.brief.files import write_atomically
from visionplan.catalogue.folder import read_catalogue
from visionplan.catalogue.items import Catalogue
from visionplan.demo import demo_folder
from visionplan.faults import Fault, InputError
from visionplan.text import clean
from visionplan.tui.beside import beside
from visionplan.tui.clipboard import advice, sequence
from visionplan.tui.faults_page import FaultsPage
from visionplan.tui.pages import PathPage, PickPage
from visionplan.tui.paths import free_name

FORMATS = {
    "markdown": (".md", "Markdown: comparison, sheets, bills of materials"),
    "csv": (".csv", "CSV: a row a rig, for a spreadsheet"),
    "json": (".json", "JSON: every number, for a script"),
}


class CatalogueRead(Message):
    """A catalogue has been read, or has faults."""

    def __init__(self, folder: str, catalogue: Catalogue | None, faults: tuple[Fault, ...]):
        super().__init__()
        self.folder = folder
        self.catalogue = catalogue
        self.faults = faults


class Filing:
    """Reads and writes for the app; a part of it."""

    if TYPE_CHECKING:
        app: Any
        state: Any
        show: Any
        tell: Any
        redraw: Any
        post_message: Any

    def __init__(self, reading: "Future[Catalogue] | None" = None) -> None:
        self.reading = ""
        """What is being read, in words; "" while nothing is."""
        self._early = reading

    # the catalogue

    def read(self, skip_bad: bool = False) -> None:
        """Read the work's catalogue behind the keys."""
        folder = self.state.catalogue_folder
        self.reading = f"reading {Path(folder).name} …"
        early, self._early = self._early, None

        def work() -> None:
            try:
                catalogue = early.result() if early else read_catalogue(folder, skip_bad)
            except InputError as error:
                self.post_message(CatalogueRead(folder, None, error.faults))
            except (OSError, MemoryError) as error:
                self.post_message(CatalogueRead(folder, None, (Fault(folder, str(error) or "not enough memory"),)))
            else:
                self.post_message(CatalogueRead(folder, catalogue, ()))

        self.run_worker(work, thread=True, exclusive=True, group="catalogue")  # type: ignore[attr-defined]

    def on_catalogue_read(self, message: CatalogueRead) -> None:
        """Rank over it, or show what is wrong with it."""
        if message.folder != self.state.catalogue_folder:
            return
        self.reading = ""
        if message.catalogue is None:
            self.show(FaultsPage(message.folder, message.faults), self._after_faults)
        else:
            self.state.loaded(message.catalogue)
            for warning in message.catalogue.warnings[-1:]:
                self.tell(warning, "warn")
            self.rank()  # type: ignore[attr-defined]
        self.redraw()

    def _after_faults(self, choice: str | None) -> None:
        if choice == "skip":
            self.read(skip_bad=True)
        elif choice == "again":
            self.read()
        else:
            self.action_catalogue()
        self.redraw()

    def action_catalogue(self) -> None:
        """Choose another catalogue."""
        here = os.path.join(self.state.catalogue_folder, "")
        intro = "A folder with lenses.csv and cameras.csv, perhaps spacers.csv. Empty the line for the demo works."
        self.show(PathPage("Which catalogue?", here, intro, folders=True, empty=True), self._choose_catalogue)

    def _choose_catalogue(self, folder: str | None) -> None:
        if folder is None or not self.may_change():  # type: ignore[attr-defined]
            return
        from dataclasses import replace

        folder = str(Path(folder).absolute()) if folder else ""
        folder = "" if folder == str(demo_folder()) else folder
        if folder == self.state.work.catalogue and self.state.catalogue is not None:
            return
        self.state.catalogue = None
        self.state.change("another catalogue", replace(self.state.work, catalogue=folder))
        self.read()
        self.redraw()

    # the brief

    def action_open(self) -> None:
        """Open another brief."""
        start = self.state.work.path or str(demo_folder() / "briefs" / "x")
        start = os.path.join(os.path.dirname(start), "")
        intro = "A brief, a TOML file. What is open now is kept as it is and offered again."
        self.show(PathPage("Which brief?", start, intro, suffix=".toml"), self._open)

    def _open(self, path: str | None) -> None:
        if path is None:
            return
        before = self.state.catalogue_folder
        try:
            self.state.open(path, beside(path))
        except InputError as error:
            self.show(FaultsPage(path, error.faults, catalogue=False), lambda _: self.redraw())
            return
        self.opened(before)

    def opened(self, before: str = "") -> None:
        """Show a work that has just been opened."""
        if self.state.catalogue is None or self.state.catalogue_folder != before:
            self.state.catalogue = None
            self.read()
        else:
            self.brief_changed()  # type: ignore[attr-defined]
        if told := self.state.told():
            self.tell(told, "warn")
        elif self.state.left_off:
            self._offer()
        elif self.state.work.path:
            self.tell(f"{self.state.work.path} is open.")
        self.redraw()

    def _offer(self) -> None:
        """Offer the work that was left off."""
        outside = " The file itself has been changed by someone since." if self.state.outside else ""
        intro = f"Changes to {clean(self.state.work.path)} were left off that the file doesn't hold.{outside}"
        options = [
            ("Go on with them", "as they were left off", "on"),
            ("File", "what the file says; u then brings the changes back", "file"),
        ]

        def chosen(choice: str | None) -> None:
            if choice == "file" and self.may_change():  # type: ignore[attr-defined]
                self.state.take_file()
                self.brief_changed()  # type: ignore[attr-defined]
            self.redraw()

        self.show(PickPage("Work left off", options, intro=intro, narrow=False), chosen)

    def action_save(self) -> None:
        """Write the brief to its file."""
        if self.state.work.path:
            self._save("")
        else:
            self.action_save_as()

    def action_save_as(self, then: Callable[[], None] | None = None) -> None:
        """Write the brief to another file."""
        start = self.state.work.path or free_name(Path.cwd(), "brief", ".toml")
        page = PathPage("Save the brief as", start, "A TOML file. It becomes the brief's own file.", suffix=".toml")
        self.show(page, lambda path: self._unless_there(path, lambda: self._save(path, then)))

    def _save(self, path: str, then: Callable[[], None] | None = None) -> None:
        if not path and not self.may_change():  # type: ignore[attr-defined]
            return
        try:
            self.state.save(path)
        except InputError as error:
            self.tell(f"{error.faults[0].found}; the brief is as it was. Save it under another name.", "warn")
        else:
            self.tell(f"Saved to {clean(self.state.work.path)}.")
            if then:
                then()
        self.redraw()

    def _unless_there(self, path: str | None, write: Callable[[], None]) -> None:
        """Write, but ask first where a file is there already; nothing where no name was given."""
        if not path:
            return
        if not os.path.lexists(path) or os.path.abspath(path) == self.state.work.path:
            write()
            return
        options = [
            ("Keep it", "write nothing", "keep"),
            ("Overwrite it", "what stands in it now is lost", "over"),
        ]

        def chosen(choice: str | None) -> None:
            if choice == "over":
                write()
            self.redraw()

        intro = f"{clean(path)} is there already."
        self.show(PickPage("Overwrite?", options, intro=intro, narrow=False), chosen)

    # the shortlist

    def shortlist_text(self, form: str) -> str | None:
        """The shortlist in a format; None where there is nothing to write yet."""
        ranking, entries = self.state.results.ranking, self.shortlist.listed()  # type: ignore[attr-defined]
        if not entries or ranking is None:
            marked = self.state.work.marks
            self.tell("The shortlist is still being judged." if marked else "Nothing is on the shortlist.", "warn")
            return None
        from visionplan.report.document import comparison_document, shortlist_document
        from visionplan.report.shortlist import shortlist_csv, shortlist_json

        system = self.state.brief.units
        if form == "csv":
            return shortlist_csv(ranking, entries, system)
        if form == "json":
            return shortlist_json(ranking, entries)
        if form == "table":
            return comparison_document(ranking, entries, system)
        return shortlist_document(ranking, entries, date.today().isoformat(), system)

    def export(self) -> None:
        """Ask for a format and a name, then write the shortlist."""
        if not self.state.work.marks:
            self.tell("Nothing is on the shortlist.", "warn")
            return
        options = [(form, words, form) for form, (_, words) in FORMATS.items()]
        self.show(PickPage("Export the shortlist as", options, narrow=False), self._export_as)

    def _export_as(self, form: str | None) -> None:
        if form is None:
            return
        suffix = FORMATS[form][0]
        folder = Path(self.state.work.path).parent if self.state.work.path else Path.cwd()
        page = PathPage("Export to", free_name(folder, "shortlist", suffix), "The file's name.", suffix=suffix)
        self.show(page, lambda path: self._unless_there(path, lambda: self._export(form, path)))

    def _export(self, form: str, path: str) -> None:
        text = self.shortlist_text(form)
        if text is None:
            return
        try:
            write_atomically(path, text)
        except InputError as error:
            self.tell(f"{error.faults[0].found}; nothing was written.", "warn")
        else:
            self.tell(f"Exported to {clean(path)}.")
        self.redraw()

    def copy(self, form: str) -> None:
        """Send the shortlist to the clipboard of the terminal; where it is too long for that, offer what isn't."""
        text = self.shortlist_text(form)
        if text is None or self.send(text, form):
            return
        options = [("Comparison", "the table alone", "table"), ("Export", "all of it, to a file", "export")]
        intro = f"The shortlist as {form} has {len(text):,} characters, more than terminals take into their clipboard."

        def chosen(choice: str | None) -> None:
            if choice == "export":
                self.export()
            elif choice:
                short = self.shortlist_text(choice)
                if short is not None and not self.send(short, choice):
                    self.tell("The table is too long for the clipboard too: export it (x in view 4).", "warn")
            self.redraw()

        self.show(PickPage("Too long to copy", options, intro=intro, narrow=False), chosen)

    def send(self, text: str, form: str, *instead: str) -> bool:
        """Send a text to the clipboard of the terminal; whether it isn't too long for that."""
        sent = sequence(text, os.environ)
        if sent is None:
            return False
        self.write_raw(sent)  # type: ignore[attr-defined]
        self.tell(f"{len(text):,} characters of {form} sent to the clipboard. {advice(os.environ, *instead)}.")
        return True
