"""What the interface costs: time to the first ranking, bytes on the line, time from a key to the new ranking.

Run it as python -m tests.bench.interface [folder of a catalogue and a brief beside it, brief.toml].
"""

import os
import re
import statistics
import sys
import tempfile
import time
from pathlib import Path

from tests.bench.line import Line, interface

DOWN, PAGE = "\x1b[B", "\x1b[6~"
BARE = """
import numpy
from textual.app import App
from textual.widgets import Static
class Bare(App):
    def compose(self):
        yield Static("bare app paints")
Bare().run()
"""
RUNS = 5
COUNT = re.compile(rb"\x1b\[1;(?!1H)\d+H")
"""What the first row is written with; every painting ends in its first cell."""


def first_paint(make, words: bytes) -> float:
    """Seconds from the start to the words on the screen, the median of some runs."""
    times = []
    for _ in range(RUNS):
        line = make(Path(tempfile.mkdtemp()))
        line.until(lambda sent: words in sent)
        times.append(line.stamps[-1][0] - line.began)
        line.close()
    return statistics.median(times)


def answered(line: Line, keys: str, done) -> float:
    """Seconds from a key to what it has to bring about."""
    begin = time.perf_counter()
    os.write(line.handle, keys.encode())
    line.until(done)
    return line.stamps[-1][0] - begin


def main() -> None:
    """Print everything."""
    given = [str(Path(sys.argv[1]) / "brief.toml"), "--catalogue", sys.argv[1]] if len(sys.argv) > 1 else []
    bare = first_paint(lambda home: Line([sys.executable, "-c", BARE], home), b"bare app paints")
    ours = first_paint(lambda home: interface(home, *given), b"pairs fit")
    print(
        f"first ranking on the screen: {ours:.2f} s; a bare app with numpy paints in {bare:.2f} s: x {ours / bare:.2f}"
    )

    line = interface(Path(tempfile.mkdtemp()), *given)
    line.until(lambda sent: b"pairs fit" in sent)
    line.rest(5.0)
    print(f"bytes: start-up {len(line.received):,}", end="")
    print(f", at rest {len(line.read(2.0))}", end="")
    print(f", cursor {max(len(line.press(DOWN, 0.5)) for _ in range(5))}", end="")
    print(f", page {len(line.press(PAGE, 1.0)):,}", end="")
    print(f", another view {len(line.press('1', 1.0)):,}")

    line.press(DOWN + "\r\x15", 1.0)
    # Each value leaves another number of pairs, so that the count at the right of the first row changes with it.
    counted, echoed = [], []
    for keys in ("90 mm, 70 mm", "\x15", "80 mm, 60 mm", "\x15", "60 mm, 50 mm", "\x15", "100 mm, 80 mm"):
        begin, before = time.perf_counter(), len(line.received)
        os.write(line.handle, keys.encode())
        line.until(lambda sent: len(sent) > 0)
        echoed.append(line.stamps[-1][0] - begin)
        line.read(3.0)
        sent = [(stamp, line.received[before:count]) for stamp, count in line.stamps if count > before]
        last = [stamp for stamp, some in sent if len(COUNT.findall(some)) == len(COUNT.findall(sent[-1][1]))]
        if len(keys) > 1:
            counted.append(last[0] - begin)
    print(f"a key is answered within {1000 * max(echoed):.0f} ms at most")
    print("a changed value's ranking is on the screen after", ", ".join(f"{1000 * one:.0f}" for one in counted), "ms")
    line.close()


if __name__ == "__main__":
    main()
