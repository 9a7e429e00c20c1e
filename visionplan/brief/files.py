"""A brief's text from its file, and to it so that nothing is ever lost."""

import errno
import os
import stat
import sys
from contextlib import suppress
from os import PathLike

from visionplan.faults import Fault, InputError

LONGEST = 64 * 1024
"""Bytes: more is no brief."""


def name_of(path: str | PathLike[str]) -> str:
    """The file's name in messages."""
    return "standard input" if path == "-" else os.fspath(path)


def read_text(path: str | PathLike[str]) -> str:
    """Read a brief's text as it stands, without a byte order mark.

    Raises
    ------
    InputError
        Where it can't be read, is far too long or isn't UTF-8.
    """
    name = name_of(path)
    try:
        data = _bytes(path)
    except OSError as error:
        raise InputError([Fault(name, f"can't be read: {error.strerror}", "a brief (TOML)")]) from None
    except ValueError:
        raise InputError([Fault(name, "no file can have this name", "the name of a brief (TOML)")]) from None
    if len(data) > LONGEST:
        raise InputError([Fault(name, "the file is far too long for a brief", f"at most {LONGEST // 1024} KiB")])
    try:
        return data.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        raise InputError([Fault(name, "the file isn't UTF-8 text", "a brief saved as UTF-8", line)]) from None


def _bytes(path: str | PathLike[str]) -> bytes:
    if path != "-":
        with open(path, "rb") as file:
            return file.read(LONGEST + 1)
    if sys.stdin is None:
        raise OSError(0, "it is closed")
    return sys.stdin.buffer.read(LONGEST + 1)


def write_atomically(path: str | PathLike[str], text: str) -> None:
    """Write a text so that the file holds, whatever happens, all of the old text or all of the new.

    An existing file keeps its permissions, and a link stays a link.

    Raises
    ------
    InputError
        Where it can't be written; the file is then as it was.
    """
    name = os.fspath(path)
    try:
        _replace(os.path.realpath(name), text.encode())
    except UnicodeEncodeError:
        raise InputError([Fault(name, "the text has half a character in it", "whole characters")]) from None
    except OSError as error:
        found = f"can't be written: {error.strerror}"
        raise InputError([Fault(name, found, "a file in a folder that can be written to")]) from None
    except ValueError:
        raise InputError([Fault(name, "no file can have this name", "the name of a file")]) from None


def _replace(path: str, data: bytes) -> None:
    """Write beside the file, then put it in its place."""
    from secrets import token_hex  # takes longer to load than a brief to read

    folder = os.path.dirname(path)
    before = _status(path)
    beside = os.path.join(folder, f".{token_hex(8)}.tmp")
    handle = os.open(beside, os.O_WRONLY | os.O_CREAT | os.O_EXCL | getattr(os, "O_BINARY", 0), 0o666)
    try:
        with os.fdopen(handle, "wb") as file:
            file.write(data)
            file.flush()
            os.fsync(file.fileno())
        if before is not None:
            # Only root may give a file away; for anyone else it is theirs already.
            with suppress(OSError, AttributeError):
                os.chown(beside, before.st_uid, before.st_gid)
            os.chmod(beside, stat.S_IMODE(before.st_mode))
        os.replace(beside, path)
    except BaseException:
        with suppress(OSError):
            os.unlink(beside)
        raise
    # The new name itself is safe on disk only once its folder is; not every system can tell a folder so.
    with suppress(OSError):
        handle = os.open(folder, os.O_RDONLY)
        try:
            os.fsync(handle)
        finally:
            os.close(handle)


def _status(path: str) -> os.stat_result | None:
    """The file that is there, if one is; it must be one that may be written."""
    try:
        status = os.stat(path)
    except FileNotFoundError:
        return None
    if not stat.S_ISREG(status.st_mode):
        raise OSError(errno.EINVAL, "it is no plain file")
    if not os.access(path, os.W_OK):
        raise PermissionError(errno.EACCES, os.strerror(errno.EACCES))
    return status
