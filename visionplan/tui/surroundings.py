"""What the terminal can show, and where it stands: found from the environment."""

import os
from collections.abc import Mapping
from pathlib import Path


def speaks_utf8(environment: Mapping[str, str] | None = None) -> bool:
    """Whether the locale is one of UTF-8: the first of LC_ALL, LC_CTYPE, LANG that is set decides."""
    environment = _first_environment() if environment is None else environment
    locale = next(filter(None, (environment.get(name) for name in ("LC_ALL", "LC_CTYPE", "LANG"))), "")
    return "utf8" in locale.lower().replace("-", "")


def _first_environment() -> Mapping[str, str]:
    """The environment the process was started with: Python itself sets LC_CTYPE where the locale is C."""
    try:
        entries = Path("/proc/self/environ").read_bytes().decode("utf-8", "replace").split("\0")
        return dict(entry.split("=", 1) for entry in entries if "=" in entry)
    except OSError:
        return os.environ


def palette(environment: Mapping[str, str], colours: int) -> str:
    """The palette to begin with, of a terminal that has so many colours."""
    if environment.get("NO_COLOR"):
        return "plain"
    if colours <= 16:
        return "terminal"
    background = environment.get("COLORFGBG", "").rpartition(";")[2]
    return "daylight" if background in ("7", "15") else "dusk"


def colours(environment: Mapping[str, str]) -> int:
    """How many colours the terminal says it has."""
    if environment.get("COLORTERM", "").strip().lower() in ("truecolor", "24bit"):
        return 1 << 24
    term = environment.get("TERM", "").lower()
    if term.endswith("-direct") or term == "xterm-kitty":
        return 1 << 24
    return 256 if term.endswith("256color") else 16


def remote(environment: Mapping[str, str]) -> bool:
    """Whether the terminal is at the far end of a line."""
    return any(environment.get(name) for name in ("SSH_CONNECTION", "SSH_CLIENT", "SSH_TTY"))
