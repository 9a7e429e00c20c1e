"""Screens of a small works as plain text, to be looked over when they change.

python -m tests.tui.screens writes them anew.
"""

import asyncio
import os
import tempfile
from pathlib import Path

from tests.tui.desk import sit_down

HERE = Path(__file__).parent
WORKS = HERE / "works"
TARGET = (
    *("enter", *"50", "space", *"mm", "enter", *"725", "enter", "down", "down"),
    *("enter", *"325", "space", *"mm", "enter", "down", "enter", *"3", "space", *"mm", "enter"),
)
"""A target in the focus plane measured and the distance taped, the rig 8 mm too far."""
SCREENS = {
    "brief": ((80, 24), ("1",)),
    "rigs": ((80, 24), ("down", "space")),
    "rig": ((80, 24), ("enter",)),
    "shortlist": ((80, 24), ("space", "down", "space", "4")),
    "together": ((140, 45), ()),
    "as_built": ((80, 24), ("space", "5", *TARGET)),
    "as_built_wide": ((140, 45), ("space", "5", *TARGET)),
}
"""Name → size and keys."""


def file_of(name: str) -> Path:
    """Where a screen is kept."""
    return HERE / "screens" / f"{name}.txt"


async def taken(name: str) -> str:
    """A screen as it is now."""
    size, keys = SCREENS[name]
    async with sit_down(WORKS / "brief.toml", size=size, folder=str(WORKS)) as desk:
        await desk.press("question_mark", "escape", *keys)
        await desk.rest()
        desk.app.message = None
        desk.app.redraw()
        await desk.pilot.pause(0.05)
        return desk.text + "\n"


def main() -> None:
    """Write every screen anew."""
    for name in SCREENS:
        with tempfile.TemporaryDirectory() as home:
            os.environ["XDG_STATE_HOME"] = home
            file_of(name).write_text(asyncio.run(taken(name)))


if __name__ == "__main__":
    main()
