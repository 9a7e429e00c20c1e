"""One walk from end to end in a real terminal: the work of a field engineer, left and found again."""

import os
import shutil
import subprocess
import sys
import time

import pytest

from tests.bench.line import ROOT

pytestmark = pytest.mark.skipif(shutil.which("tmux") is None, reason="needs tmux")


class Terminal:
    """A terminal of 80 × 24 in tmux."""

    def __init__(self, folder):
        self.socket = f"walk{os.getpid()}"
        self.folder = folder

    def tmux(self, *arguments):
        return subprocess.run(
            ["tmux", "-L", self.socket, *arguments], capture_output=True, text=True, check=False
        ).stdout

    def run(self, *arguments):
        settings = ["env", "TERM=screen", "LANG=C.UTF-8", "LC_ALL=", f"XDG_STATE_HOME={self.folder}/state"]
        settings += ["-u", "COLORTERM", "-u", "NO_COLOR", f"PYTHONPATH={ROOT}"]
        command = [settings[0], *settings[5:9], *settings[1:5], settings[9], sys.executable, "-m", "visionplan"]
        start = ["-f", "/dev/null", "new-session", "-d", "-x", "80", "-y", "24", "-c", str(self.folder)]
        self.tmux(*start, *command, *arguments)

    def press(self, *keys):
        for key in keys:
            self.tmux("send-keys", key)

    def type(self, text):
        self.tmux("send-keys", "-l", text)

    @property
    def text(self):
        return self.tmux("capture-pane", "-p")

    def shows(self, *words, gone=()):
        end = time.monotonic() + 60
        while True:
            text = " ".join(self.text.split())
            if all(word in text for word in words) and not any(word in text for word in gone):
                return text
            assert time.monotonic() < end, f"no {words} in\n{self.text}"
            time.sleep(0.05)

    def ended(self):
        end = time.monotonic() + 30
        while self.tmux("list-sessions"):
            assert time.monotonic() < end, self.text
            time.sleep(0.05)


def fitting(text):
    """How many pairs fit, as the screen says."""
    return text.partition(" pairs fit")[0].rpartition(" of ")[0].split()[-1]


@pytest.fixture
def terminal(tmp_path):
    terminal = Terminal(tmp_path)
    yield terminal
    terminal.tmux("kill-server")


def test_a_walk(terminal, tmp_path):
    terminal.run()
    before = fitting(terminal.shows("Jar lids on the capping belt", "pairs fit"))
    terminal.press("1")
    terminal.shows("▸ field")
    terminal.press("Enter", "C-u")
    terminal.type("100 x 80 mm")
    terminal.shows("was 130 mm, 110 mm")
    terminal.press("Enter")
    after = fitting(terminal.shows("not saved", "100 mm, 80 mm", "pairs fit ├", gone=("was 130 mm", f" {before} of ")))
    terminal.press("2", "Space", "Down", "Space")
    terminal.shows("4 Shortlist 2")
    terminal.press("4")
    terminal.shows("best of its row", "comfortable")
    terminal.press("n")
    terminal.type("take this one")
    terminal.press("Enter")
    terminal.shows("take this one")
    terminal.press("x")
    terminal.shows("Export the shortlist as")
    terminal.press("m")
    terminal.shows("Export to")
    terminal.press("Enter")
    terminal.shows("Exported to")
    exported = (tmp_path / "shortlist.md").read_text()
    assert "take this one" in exported
    terminal.press("q")
    terminal.shows("Quit?")
    terminal.press("q")
    terminal.ended()

    terminal.run()
    terminal.shows("Jar lids on the capping belt", "4 Shortlist 2", "not saved", f" {after} of ")
    terminal.press("1")
    terminal.shows("100 mm, 80 mm")
    terminal.press("u", "u", "u", "u")
    terminal.shows("130 mm, 110 mm", gone=("not saved",))
    terminal.press("U", "U", "U", "U")
    terminal.press("4")
    terminal.shows("take this one")


def test_impossible_brief_to_a_shortlist_in_the_clipboard(terminal, tmp_path):
    """Without help and without the mouse: take a concession, compare two rigs, read why, copy."""
    from visionplan.demo import demo_folder

    terminal.run("open", str(demo_folder() / "briefs" / "rim-cracks.toml"))
    terminal.tmux("set-option", "-s", "set-clipboard", "on")
    terminal.shows("Nothing fits.", "Enter take it")
    terminal.press("Enter")
    terminal.shows("Taken:", "pairs fit")
    terminal.press("Space", "Down", "Space", "4")
    terminal.shows("best of its row", "Best here in")
    terminal.press("y")
    terminal.shows("sent to the clipboard")
    end = time.monotonic() + 10
    while "shortlist" not in (copied := terminal.tmux("show-buffer")):
        assert time.monotonic() < end, copied
        time.sleep(0.1)
    assert copied.startswith("# Hair cracks in the rim, as first asked: shortlist")
    assert "span" in copied


def test_what_was_measured_outlives_the_line(terminal):
    terminal.run()
    terminal.shows("Jar lids on the capping belt", "pairs fit ├")
    terminal.press("Space", "5")
    terminal.shows("Lay a ruler")
    terminal.press("Enter")
    terminal.type("50 mm")
    terminal.press("Enter")
    terminal.type("550")
    terminal.press("Enter")
    found = terminal.shows("550 px", "To set it right", "Move the camera")
    terminal.tmux("kill-session")
    terminal.ended()
    terminal.run()
    terminal.shows("4 Shortlist 1", "pairs fit ├")
    terminal.press("5")
    again = terminal.shows("550 px", "To set it right", "Move the camera")
    move = "Move the camera "
    assert again.partition(move)[2].split()[:4] == found.partition(move)[2].split()[:4]
