"""Tolls and concessions on 50 million pairs, and what nothing fits: `python -m tests.bench.give [--times N]`."""

import argparse
from pathlib import Path

from tests.bench import cells, measure

MOST_SECONDS, MOST_MEMORY = 5.0, 500.0
"""What a row may take, in s of CPU time and MiB."""


def main() -> None:
    """Measure and print."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--times", type=int, default=1)
    args = parser.parse_args()
    measure.in_folder(lambda folder: _give(folder, args.times))


def _give(folder: Path, times: int) -> None:
    market = measure.market(folder / "market")
    rows = {
        "plenty fits: tolls of 5 lines": ("concede", cells.LIDS),
        "some fit: tolls of 17 lines": ("concede", cells.LIDS_IN_FULL),
        "nothing fits: tolls and concessions": ("concede", cells.PLATES),
        "nothing fits: nearest misses and concessions": ("rank", cells.PLATES),
        "headroom and mass asked: ranking": ("rank", cells.LIDS_UNDER_A_GANTRY),
        "headroom asked, nothing fits: ranking": ("rank", cells.PLATES_UNDER_A_GANTRY),
        "headroom and mass asked: tolls of 19 lines": ("concede", cells.LIDS_UNDER_A_GANTRY),
    }
    width = max(map(len, rows))
    print(f"{'':{width}}   wall min    CPU min   peak MiB")
    for number, (name, (command, text)) in enumerate(rows.items()):
        brief = folder / f"{number}.toml"
        brief.write_text(text, "utf-8")
        arguments = [measure.VISIONPLAN, command, str(brief), "--catalogue", str(market)]
        runs = measure.in_turn({name: arguments}, times, statuses=(0, 1))[name]
        cpu, memory = min(cost.cpu for cost in runs), max(cost.memory for cost in runs)
        over = "" if cpu <= MOST_SECONDS and memory <= MOST_MEMORY else "   over the limit"
        print(f"{name:{width}}   {min(cost.wall for cost in runs):8.2f}   {cpu:8.2f}   {memory:8.0f}{over}", flush=True)
    print(f"limits: {MOST_SECONDS:g} s of CPU time, {MOST_MEMORY:g} MiB")


if __name__ == "__main__":
    main()
