"""Run commands as whole processes, in turn, and say what each took: wall and processor time, and memory.

Other work on the machine makes wall times longer; the least processor time of several runs is what to compare.
"""

import os
import subprocess
import sys
import tempfile
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from pathlib import Path
from statistics import median
from time import perf_counter

PYTHON = sys.executable
VISIONPLAN = str(Path(PYTHON).with_name("visionplan"))
ROOT = Path(__file__).parents[2]


@dataclass(frozen=True)
class Cost:
    """What one run took. Its memory is no less than that of the process that started it: keep that small."""

    wall: float
    """s"""
    cpu: float
    """User and system, s."""
    memory: float
    """Peak resident, MiB."""
    output: str
    status: int


def run(command: Sequence[str], statuses: Sequence[int] = (0,)) -> Cost:
    """Run a command once.

    Raises
    ------
    SystemExit
        With what it said, where its exit status is none of those expected.
    """
    with tempfile.TemporaryFile("w+") as said:
        begin = perf_counter()
        process = subprocess.Popen(command, cwd=ROOT, stdout=subprocess.PIPE, stderr=said, text=True)
        assert process.stdout
        with process.stdout:
            output = process.stdout.read()
        _, ended, usage = os.wait4(process.pid, 0)
        wall = perf_counter() - begin
        process.returncode = status = os.waitstatus_to_exitcode(ended)
        if status not in statuses:
            said.seek(0)
            raise SystemExit(f"{' '.join(command)}: exit status {status}\n{said.read()}")
    return Cost(wall, usage.ru_utime + usage.ru_stime, usage.ru_maxrss / 1024, output, status)


def in_turn(commands: dict[str, Sequence[str]], times: int, statuses: Sequence[int] = (0,)) -> dict[str, list[Cost]]:
    """Run all commands, then all again, so that what else the machine does falls on all alike."""
    costs: dict[str, list[Cost]] = {name: [] for name in commands}
    for _ in range(times):
        for name, command in commands.items():
            costs[name].append(run(command, statuses))
    return costs


def table(costs: dict[str, list[Cost]], base: str) -> str:
    """A row a command: least and median wall time, least and median processor time and its ratio to that of `base`,
    memory."""
    least = min(cost.cpu for cost in costs[base])
    width = max(map(len, costs))
    rows = [f"{'':{width}}   wall min     med    CPU min     med   CPU ratio   peak MiB"]
    for name, runs in costs.items():
        wall, cpu = [cost.wall for cost in runs], [cost.cpu for cost in runs]
        rows.append(
            f"{name:{width}}   {min(wall):8.3f}{median(wall):8.3f}   {min(cpu):8.3f}{median(cpu):8.3f}"
            f"   {min(cpu) / least:9.2f}   {max(cost.memory for cost in runs):8.0f}"
        )
    return "\n".join(rows)


def solve(brief: Path, folder: Path, top: int = 100) -> list[str]:
    """The command that prints what the solve alone took."""
    return [PYTHON, "-m", "tests.bench.solve", str(brief), str(folder), str(top)]


def market(folder: Path, **sizes: int) -> Path:
    """A market in a folder, written by a process of its own, which gives its memory back."""
    given = ", ".join(f"{name}={value}" for name, value in sizes.items())
    run([PYTHON, "-c", f"from tests.bench.market import write_market; write_market({str(folder)!r}, {given})"])
    return folder


def in_folder(work: Callable[[Path], None]) -> None:
    """Do something in a folder that goes away afterwards."""
    with tempfile.TemporaryDirectory() as folder:
        work(Path(folder))
