"""Starting the interface: the catalogue is read and Textual imported at the same time."""

import os
from concurrent.futures import Future
from threading import Thread

from visionplan.catalogue.folder import read_catalogue
from visionplan.catalogue.items import Catalogue
from visionplan.tui import surroundings
from visionplan.tui.state import State


def start(brief: str | None, catalogue: str | None = None, ascii: bool = False, skip_bad: bool = False) -> int:
    """Open the interface on a brief, else on the work left off last, and run it to its end.

    Raises
    ------
    InputError
        Where the brief can't be read or has faults.
    """
    state = State()
    if brief is None:
        state.resume()
    else:
        from visionplan.tui.beside import beside

        state.open(brief, os.path.abspath(catalogue) if catalogue else beside(brief))
    reading: Future[Catalogue] = Future()
    Thread(target=_read, args=(state.catalogue_folder, skip_bad, reading), daemon=True).start()
    os.environ.setdefault("TEXTUAL_ANIMATIONS", "none")
    remote = surroundings.remote(os.environ)
    if remote:
        os.environ.setdefault("TEXTUAL_FPS", "20")
    palette = surroundings.palette(os.environ, surroundings.colours(os.environ))
    from visionplan.tui.app import PlanApp

    app = PlanApp(state, palette, ascii or not surroundings.speaks_utf8(), reading)
    app.run(mouse=not remote)
    state.close()
    return app.return_code or 0


def _read(folder: str, skip_bad: bool, reading: "Future[Catalogue]") -> None:
    try:
        reading.set_result(read_catalogue(folder, skip_bad))
    except BaseException as error:
        reading.set_exception(error)
