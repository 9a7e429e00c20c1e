"""What the interface sends to a terminal, measured on a pty at 80 × 24 in 16 colours."""

import os
import re
import sys

import pytest

from tests.bench.line import Line, interface
from visionplan.demo import demo_folder

DOWN, UP, PAGE_DOWN, PAGE_UP = "\x1b[B", "\x1b[A", "\x1b[6~", "\x1b[5~"
SECOND = 1.0


@pytest.fixture
def opened(tmp_path):
    lines = []

    def on(*arguments, **more):
        line = interface(tmp_path / "home", *arguments, **more)
        lines.append(line)
        line.until(lambda sent: b"fit" in sent)
        line.rest(3 * SECOND)
        return line

    (tmp_path / "home").mkdir()
    yield on
    for line in lines:
        line.close()


def test_bytes_on_the_line(opened):
    line = opened()
    assert len(line.received) <= 20_000, "start-up"
    assert line.read(2 * SECOND) == b"", "nothing is sent at rest"
    for keys in (DOWN, DOWN, UP, DOWN):
        assert 0 < len(line.press(keys, SECOND)) <= 400
    for keys in (PAGE_DOWN, PAGE_UP):
        assert 0 < len(line.press(keys, SECOND)) <= 5_000
    line.press("1", 2 * SECOND)
    for keys in (DOWN, DOWN, DOWN, UP):
        assert 0 < len(line.press(keys, SECOND)) <= 400
    assert 0 < len(line.press(PAGE_DOWN, SECOND)) <= 5_000
    assert line.read(SECOND) == b""


def test_sixteen_colours_are_the_terminals_own(opened):
    line = opened()
    assert not re.search(rb"[;\[][34]8;[25];", line.received)
    assert re.search(rb"\x1b\[[0-9;]*3[1-7]m", line.received)


def test_no_color_is_obeyed(opened):
    line = opened(environment={"NO_COLOR": "1", "TERM": "xterm-256color", "COLORTERM": "truecolor"})
    line.press("3", SECOND)
    line.press("1", SECOND)
    for codes in re.findall(rb"\x1b\[([0-9;]*)m", line.received):
        numbers = {int(code) for code in codes.split(b";") if code}
        assert numbers <= {0, 1, 2, 4, 7}, codes


def test_a_locale_without_utf8_gets_ascii(opened):
    for more in ({"environment": {"LANG": "C"}}, {"environment": {"LANG": "", "LC_ALL": "POSIX"}}):
        line = opened(**more)
        for keys in ("1", "3", "4", "2"):
            line.press(keys, SECOND)
        assert line.received.isascii()


def test_the_flag_gets_ascii(opened):
    assert opened("--ascii", str(demo_folder() / "briefs" / "rim-cracks.toml")).received.isascii()


def test_it_leaves_the_terminal_as_it_was(opened):
    line = opened()
    line.press("q", SECOND)
    assert b"\x1b[?1049l" in line.received
    assert b"\x1b[?25h" in line.received
    assert b"Traceback" not in line.received


def test_a_fault_of_the_program_leaves_the_screen_and_the_work_in_order(tmp_path):
    script = """
from visionplan.cli import run
from visionplan.tui.rigs_pane import RigsPane
import sys
def broken(self):
    raise RuntimeError("broken on purpose")
RigsPane.action_order = broken
sys.exit(run(["open"]))
"""
    line = Line([sys.executable, "-c", script], tmp_path)
    line.until(lambda sent: b"pairs fit" in sent)
    line.press(" ", SECOND)
    said = line.press("o", 3 * SECOND)
    assert os.waitstatus_to_exitcode(line.close()) == 2
    assert b"Traceback" not in said
    assert b"the work is kept" in said
    assert "broken on purpose" in (tmp_path / "visionplan" / "fault.txt").read_text()
    again = interface(tmp_path)
    again.until(lambda sent: b"4 Shortlist 1" in sent)
    again.close()
