"""A person at the interface, for tests."""

import asyncio
from contextlib import asynccontextmanager
from pathlib import Path

from textual.events import Key

from visionplan.demo import demo_folder
from visionplan.tui.app import PlanApp
from visionplan.tui.state import State


def screen(app):
    """What stands on the screen, as text."""
    strips = app.screen._compositor.render_strips()
    return "\n".join("".join(segment.text for segment in strip).rstrip() for strip in strips)


async def settled(app, pilot, but=("tolls",)):
    """Wait until the catalogue is read and nothing is being worked out, but for some kinds of requests."""
    for _ in range(6000):
        await pilot.pause(0)
        if not _busy(app, but):
            await pilot.pause(0)
            await pilot.pause(0)
            if not _busy(app, but):
                return
        await asyncio.sleep(0.01)
    raise AssertionError("it does not come to rest")


def _busy(app, but):
    return app.reading or app.solver.under_way - set(but) or (app.state.catalogue is None and not app.screen_stack[1:])


class Desk:
    """A person at the interface: presses keys, waits, reads."""

    def __init__(self, app, pilot):
        self.app, self.pilot, self.state = app, pilot, app.state

    async def press(self, *keys):
        for key in keys:
            self.app.post_message(self.event(key))
            await self.pilot.pause(0)
        await settled(self.app, self.pilot)

    @staticmethod
    def event(key):
        character = key if len(key) == 1 else next((one for one, name in NAMES.items() if name == key), None)
        return Key(NAMES.get(key, key), character)

    async def type(self, text):
        await self.press(*(NAMES.get(character, character) for character in text))

    async def rest(self):
        """Wait until the tolls are there too."""
        await settled(self.app, self.pilot, ())

    @property
    def text(self):
        return screen(self.app)

    def says(self, words):
        """Whether the words stand on the screen, whatever the line breaks."""
        return words in " ".join(self.text.split())


# The pilot's own press waits for the processor to come to rest, which it doesn't while tolls are worked out.
NAMES = {
    " ": "space",
    ".": "full_stop",
    ",": "comma",
    "/": "slash",
    "-": "minus",
    "%": "percent_sign",
    "_": "underscore",
}


@asynccontextmanager
async def sit_down(brief=None, size=(80, 24), **more):
    """The interface on a demo brief, by its name, or on a file."""
    state = State()
    if brief is None:
        state.resume()
    else:
        path = Path(brief)
        state.open(
            str(path if path.is_absolute() else demo_folder() / "briefs" / f"{brief}.toml"), more.pop("folder", "")
        )
    app = PlanApp(state, **more)
    async with app.run_test(size=size) as pilot:
        desk = Desk(app, pilot)
        await settled(app, pilot)
        yield desk
    app.solver.close()
    state.close()
