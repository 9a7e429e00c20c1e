"""The journal: the work on disk after every change, and a lock so that no two interfaces write the same one.

One file a work in the user's state folder. It is replaced as a whole, written beside and synced first, so that a
process may die at any moment. The lock is the kernel's: it ends with the process, however that ends.
"""

import hashlib
import json
import os
import time
from contextlib import suppress
from pathlib import Path
from typing import Any

from visionplan.brief.files import write_atomically

try:
    import fcntl
except ImportError:  # no such locks on this system: every interface may write
    fcntl = None  # type: ignore[assignment]

FORMAT = 1
MOST_JOURNALS = 50
OLDEST = 180 * 24 * 3600
"""Seconds after which a journal is thrown away."""
_LEFT_OVER = 3600
"""Seconds after which a file that was being written when its process died is thrown away."""


def state_folder() -> Path:
    """Where the journals lie: XDG_STATE_HOME, by default ~/.local/state."""
    named = os.environ.get("XDG_STATE_HOME", "")
    base = Path(named) if os.path.isabs(named) else Path(os.path.expanduser("~")) / ".local" / "state"
    return base / "visionplan"


def key_of(path: str) -> str:
    """The name of the journal of a brief's file; of a brief without one, "unnamed"."""
    if not path:
        return "unnamed"
    return hashlib.sha256(os.path.realpath(path).encode("utf-8", "surrogateescape")).hexdigest()[:24]


def newest(folder: Path) -> str | None:
    """The name of the journal written last."""
    times = _times(folder)
    return max(times, key=lambda key: times[key]) if times else None


def prune(folder: Path, now: float | None = None) -> None:
    """Throw away journals that are old or too many, and what dead processes left; none that is open."""
    now = time.time() if now is None else now
    times = _times(folder)
    kept = sorted(times, key=lambda key: times[key], reverse=True)[:MOST_JOURNALS]
    for key, written in times.items():
        if key in kept and now - written < OLDEST:
            continue
        journal = Journal(folder, key)
        if journal.lock() and not journal.problem:
            journal.discard()
        journal.close()
    with suppress(OSError):
        for left in folder.glob(".*.tmp"):
            with suppress(OSError):
                if now - left.stat().st_mtime > _LEFT_OVER:
                    left.unlink()


def _times(folder: Path) -> dict[str, float]:
    times = {}
    with suppress(OSError):
        for file in folder.glob("*.json"):
            with suppress(OSError):
                times[file.stem] = file.stat().st_mtime
    return times


class Journal:
    """One work's file and lock."""

    def __init__(self, folder: Path, key: str):
        self.file = folder / f"{key}.json"
        self.problem = ""
        """Why nothing can be kept, in words; "" while all is well."""
        self.holder = ""
        """Who holds the lock, in words, where it isn't us."""
        self._lock_file = folder / f"{key}.lock"
        self._lock: int | None = None

    def lock(self) -> bool:
        """Try to become the one that writes; False where another interface is. A folder that can't be written to is
        no obstacle: that is told in `problem`."""
        if fcntl is None or self._lock is not None:
            return True
        try:
            self.file.parent.mkdir(mode=0o700, parents=True, exist_ok=True)
            while True:
                handle = os.open(self._lock_file, os.O_RDWR | os.O_CREAT | os.O_CLOEXEC, 0o600)
                try:
                    fcntl.flock(handle, fcntl.LOCK_EX | fcntl.LOCK_NB)
                except BlockingIOError:
                    self.holder = _words(os.pread(handle, 200, 0))
                    os.close(handle)
                    return False
                except OSError:  # a file system without locks
                    os.close(handle)
                    return True
                if _is(handle, self._lock_file):
                    break
                os.close(handle)  # pruned between opening and locking
            self._lock = handle
            with suppress(OSError):
                os.ftruncate(handle, 0)
                os.pwrite(handle, f"{os.getpid()} {time.strftime('%Y-%m-%d %H:%M')}".encode(), 0)
        except OSError as error:
            self.problem = error.strerror or str(error)
        return True

    def read(self) -> dict[str, Any] | None:
        """What was written last; None where nothing was, or nothing that can be read. That is set aside."""
        try:
            data = json.loads(self.file.read_bytes())
            if isinstance(data, dict) and data.get("format") == FORMAT:
                return data
        except OSError:
            return None
        except (ValueError, RecursionError):
            pass
        with suppress(OSError):
            os.replace(self.file, self.file.with_suffix(".unreadable"))
        return None

    def write(self, data: dict[str, Any]) -> None:
        """Put it on disk, all or nothing; where that fails, `problem` tells why and the file is as it was."""
        from visionplan.faults import InputError

        try:
            self.file.parent.mkdir(mode=0o700, parents=True, exist_ok=True)
            write_atomically(self.file, json.dumps({"format": FORMAT} | data, ensure_ascii=True))
        except InputError as error:
            self.problem = error.faults[0].found.removeprefix("can't be written: ")
        except OSError as error:
            self.problem = error.strerror or str(error)
        else:
            self.problem = ""

    def discard(self) -> None:
        """Take the file away, and the lock's with it."""
        for file in (self.file, self._lock_file):
            with suppress(OSError):
                file.unlink()

    def close(self) -> None:
        """Let another interface write."""
        if self._lock is not None:
            os.close(self._lock)
            self._lock = None


def _is(handle: int, path: Path) -> bool:
    try:
        return os.path.samestat(os.fstat(handle), os.stat(path))
    except OSError:
        return False


def _words(holder: bytes) -> str:
    number, _, since = holder.decode("ascii", "replace").partition(" ")
    return f"process {number} since {since}" if number.isdecimal() else "another process"
