"""Write several files of a folder so that all of them change or none."""

import os
import secrets
import shutil
from collections.abc import Mapping
from contextlib import suppress
from pathlib import Path

from visionplan.faults import Fault, InputError


def write_all(folder: str, files: Mapping[str, bytes]) -> None:
    """Write files into a folder, which is made if need be.

    Each is written beside its place first and then put into it; where one can't be, those before it are put back.

    Raises
    ------
    InputError
        Where something can't be written; the folder is then as it was.
    """
    made = not os.path.isdir(folder)
    try:
        if made:
            os.mkdir(folder)
        try:
            _write(Path(folder), files)
        except BaseException:
            if made:
                os.rmdir(folder)
            raise
    except OSError as error:
        found = f"can't be written, and nothing was: {error.strerror}"
        raise InputError([Fault(folder, found, "a folder that can be written to")]) from None
    except ValueError:
        raise InputError([Fault(folder, "no folder can have this name", "the name of a folder")]) from None


def _write(folder: Path, files: Mapping[str, bytes]) -> None:
    mark = secrets.token_hex(8)
    places = {os.path.realpath(folder / name): data for name, data in files.items()}
    replaced: list[str] = []
    try:
        for place, data in places.items():
            with open(f"{place}.{mark}.new", "xb") as file:
                file.write(data)
                file.flush()
                os.fsync(file.fileno())
            if os.path.lexists(place):
                if not os.access(place, os.W_OK):
                    raise PermissionError(13, os.strerror(13))
                os.chmod(f"{place}.{mark}.new", os.stat(place).st_mode & 0o7777)
                _keep(place, f"{place}.{mark}.old")
        for place in places:
            os.replace(f"{place}.{mark}.new", place)
            replaced.append(place)
    except BaseException:
        for place in replaced:
            if os.path.lexists(f"{place}.{mark}.old"):
                os.replace(f"{place}.{mark}.old", place)
            else:
                os.unlink(place)
        raise
    finally:
        for place in places:
            for left in (f"{place}.{mark}.new", f"{place}.{mark}.old"):
                with suppress(OSError):
                    os.unlink(left)


def _keep(place: str, copy: str) -> None:
    try:
        os.link(place, copy)
    except OSError:  # not every file system has links
        shutil.copy2(place, copy)
