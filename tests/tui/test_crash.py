"""Processes that are killed while a person edits: every change that was accepted is found back.

The editing process reports each change after the call returned; what it reported last must be in the journal, whole.
"""

import json
import os
import random
import signal
import subprocess
import sys
import time

import pytest

from visionplan.tui.state import State

EDITOR = """
import random, sys
from visionplan.tui.state import State
state = State()
state.resume()
chance = random.Random(int(sys.argv[1]))
number = 0
while True:
    number += 1
    what = chance.randrange(4)
    if what == 0:
        state.set("scene.feature", f"{chance.randint(3, 9) / 10} mm")
    elif what == 1:
        state.toggle((f"camera {chance.randrange(4)}", "lens"))
    elif what == 2 and state.past:
        state.undo()
    else:
        state.set("title", f"title {number} " + "x" * chance.randrange(2000))
    marks = " ".join(sorted(mark.camera[7:] for mark in state.work.marks))
    print(f"{state.brief.title.split('x')[0].strip()}|{state.brief.feature}|{marks}", flush=True)
"""


def _told(state):
    marks = " ".join(sorted(mark.camera[7:] for mark in state.work.marks))
    return f"{state.brief.title.split('x')[0].strip()}|{state.brief.feature}|{marks}"


@pytest.mark.skipif(os.name != "posix", reason="needs signals")
@pytest.mark.parametrize("kill", [signal.SIGKILL, signal.SIGHUP, signal.SIGTERM])
@pytest.mark.parametrize("seed", range(2))
def test_killed_while_editing(state_home, kill, seed):
    command = [sys.executable, "-c", EDITOR, str(seed)]
    with subprocess.Popen(command, stdout=subprocess.PIPE, text=True) as editor:
        first = editor.stdout.readline()
        assert first
        time.sleep(random.Random(seed + kill).uniform(0, 0.15))
        editor.send_signal(kill)
        reported = [first, *editor.stdout.read().splitlines()]
    journal = next(state_home.glob("*.json"))
    json.loads(journal.read_text())  # whole, whatever happened
    state = State()
    state.resume()
    assert state.writable, "the lock of a dead process is none"
    found = _told(state)
    after = {found} if not state.past else {found, _told_before(state)}
    assert reported[-1].strip() in after, "at most the change that was under way is more than was reported"
    state.close()


def _told_before(state):
    """As it was before the change that may have been under way, an undo being one too."""
    if state.future:
        state.redo()
        return _told(state)
    state.undo()
    return _told(state)
