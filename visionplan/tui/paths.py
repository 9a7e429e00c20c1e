"""Names of files as they are being typed: what there is, and how far a name is settled."""

import os
from pathlib import Path

MOST = 500
"""Names listed."""


def listing(typed: str, folders: bool = False, suffix: str = "") -> list[str]:
    """What in the folder of the typed path begins with its last part; folders, with a slash, first."""
    folder, start = os.path.split(os.path.expanduser(typed))
    found: list[tuple[bool, str]] = []
    try:
        with os.scandir(folder or ".") as entries:
            for entry in entries:
                if not entry.name.startswith(start) or (entry.name.startswith(".") and not start.startswith(".")):
                    continue
                is_folder = entry.is_dir()
                if is_folder or (not folders and entry.name.endswith(suffix)):
                    found.append((not is_folder, entry.name + ("/" if is_folder else "")))
                if len(found) >= MOST:
                    break
    except (OSError, ValueError):
        return []
    return [name for _, name in sorted(found)]


def complete(typed: str, names: list[str]) -> str:
    """The typed path, continued as far as all the names agree."""
    if not names:
        return typed
    folder = typed[: len(typed) - len(os.path.basename(typed))]
    first, last = min(names), max(names)
    agree = next((at for at, both in enumerate(zip(first, last)) if both[0] != both[1]), min(len(first), len(last)))
    return folder + first[:agree]


def free_name(folder: Path, stem: str, suffix: str) -> str:
    """A name in the folder that no file has yet."""
    candidates = [f"{stem}{suffix}", *(f"{stem}-{number}{suffix}" for number in range(2, 1000))]
    return str(next((folder / name for name in candidates if not (folder / name).exists()), folder / candidates[0]))
