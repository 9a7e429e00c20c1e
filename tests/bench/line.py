"""A pseudo-terminal with the interface in it: what is sent to the line, and when."""

import fcntl
import os
import pty
import re
import select
import signal
import struct
import sys
import termios
import time
from collections.abc import Callable, Mapping, Sequence
from contextlib import suppress
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
_MODE_QUERY = re.compile(rb"\x1b\[\?(\d+)\$p")
QUIET = 0.25
"""Seconds without a byte after which the screen is taken to be at rest."""


class Line:
    """A program on a terminal of its own."""

    def __init__(
        self, command: Sequence[str], state: Path, size=(80, 24), environment: Mapping[str, str] | None = None
    ):
        self.received = b""
        self.stamps: list[tuple[float, int]] = []
        """When bytes came, and how many had come by then."""
        settings = {"PATH": os.environ["PATH"], "HOME": str(state), "XDG_STATE_HOME": str(state), "TERM": "xterm"}
        settings |= {"LANG": "C.UTF-8", "PYTHONPATH": str(ROOT), "COLUMNS": "", "LINES": ""} | dict(environment or {})
        settings = {name: value for name, value in settings.items() if value}
        self.began = time.perf_counter()
        self.pid, self.handle = pty.fork()
        if self.pid == 0:
            os.execvpe(command[0], list(command), settings)
        self.resize(*size)

    def resize(self, columns: int, rows: int) -> None:
        """Give the terminal another size."""
        fcntl.ioctl(self.handle, termios.TIOCSWINSZ, struct.pack("HHHH", rows, columns, 0, 0))

    def read(self, seconds: float) -> bytes:
        """Take what comes within so many seconds after the last byte."""
        begin = len(self.received)
        while select.select([self.handle], [], [], seconds)[0]:
            try:
                data = os.read(self.handle, 1 << 16)
            except OSError:
                break
            if not data:
                break
            self.received += data
            self.stamps.append((time.perf_counter(), len(self.received)))
            for mode in _MODE_QUERY.findall(data):  # as a terminal that knows none of these modes
                os.write(self.handle, b"\x1b[?" + mode + b";0$y")
        return self.received[begin:]

    def until(self, done: Callable[[bytes], bool], seconds: float = 60.0) -> bytes:
        """Take what comes until it is what is waited for."""
        begin, end = len(self.received), time.perf_counter() + seconds
        while not done(self.received[begin:]):
            if time.perf_counter() > end:
                raise AssertionError(f"waited in vain; the last that came: {self.received[-500:]!r}")
            self.read(0.02)
        return self.received[begin:]

    def rest(self, seconds: float = QUIET) -> bytes:
        """Take what comes until nothing more does."""
        return self.read(seconds)

    def press(self, keys: str, seconds: float = QUIET) -> bytes:
        """Press keys, and take what that sends."""
        os.write(self.handle, keys.encode())
        return self.read(seconds)

    def close(self, how: int = signal.SIGKILL) -> int:
        """End the program, if it hasn't ended; its status."""
        with suppress(ProcessLookupError):
            os.kill(self.pid, how)
        self.read(0.5)
        status = os.waitpid(self.pid, 0)[1]
        os.close(self.handle)
        return status


def interface(state: Path, *arguments: str, **more) -> Line:
    """The interface on a terminal."""
    return Line([sys.executable, "-m", "visionplan", "open", *arguments], state, **more)
