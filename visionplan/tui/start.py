"""Starting the interface: the catalogue is read and Textual imported at the same time."""

import gc
import os
import sys
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
    remote = surroundings.remote(os.environ)
    if remote:
        os.environ.setdefault("TEXTUAL_FPS", "20")
    palette = surroundings.palette(os.environ, surroundings.colours(os.environ))
    from visionplan.tui.app import PlanApp

    gc.freeze()
    gc.enable()
    app = PlanApp(state, palette, ascii or not surroundings.speaks_utf8(), reading)
    app.run(mouse=not remote)
    state.close()
    if app.broken is not None:
        _tell(app.broken, state)
    return app.return_code or 0


def _tell(error: Exception, state: State) -> None:
    """Say that the program is at fault, and leave the details where they can be found."""
    import traceback

    details = state.folder / "fault.txt"
    try:
        details.write_text("".join(traceback.format_exception(error)))
        where = f"please report what stands in {details}"
    except OSError:
        where = f"please report it: {type(error).__name__}: {error}"
    print(f"visionplan: this is a fault of visionplan itself; the work is kept. {where}", file=sys.stderr)


def _read(folder: str, skip_bad: bool, reading: "Future[Catalogue]") -> None:
    try:
        reading.set_result(read_catalogue(folder, skip_bad))
    except BaseException as error:
        reading.set_exception(error)
