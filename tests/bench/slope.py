"""How the cost grows with the pairs, from half a million to 450 million: `python -m tests.bench.slope [--times N]`."""

import argparse
import json
from itertools import pairwise
from math import log
from pathlib import Path
from statistics import linear_regression

from tests.bench import cells, measure

SIZES = ((500, 1000, 200), (1600, 3100, 290), (5000, 10_000, 415), (15_000, 30_000, 600))
"""Lenses, cameras, and sensors among these."""


def main() -> None:
    """Measure and print."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--times", type=int, default=5)
    args = parser.parse_args()
    measure.in_folder(lambda folder: _grow(folder, args.times))


def _grow(folder: Path, times: int) -> None:
    brief = folder / "lids.toml"
    brief.write_text(cells.LIDS, "utf-8")
    print("      pairs     fitting   solve s   solve CPU   process s   process CPU   peak MiB     (least of each)")
    rows = []
    for lenses, cameras, sensors in SIZES:
        market = measure.market(folder / str(lenses), lenses=lenses, cameras=cameras, sensors=sensors)
        rank = [measure.VISIONPLAN, "rank", str(brief), "--top", "100", "--format", "json", "--catalogue", str(market)]
        costs = measure.in_turn({"solve": measure.solve(brief, market), "rank": rank}, times)
        solves = [json.loads(cost.output) for cost in costs["solve"]]
        row = [
            solves[0]["pairs"],
            min(solve["seconds"] for solve in solves),
            min(solve["cpu"] for solve in solves),
            min(cost.wall for cost in costs["rank"]),
            min(cost.cpu for cost in costs["rank"]),
        ]
        memory = max(cost.memory for cost in costs["rank"])
        print(
            f"{row[0]:11,} {solves[0]['fitting']:11,}  {row[1]:8.3f}  {row[2]:10.3f}  {row[3]:10.3f}  {row[4]:12.3f}"
            f"  {memory:9.0f}"
        )
        rows.append(row)
    logs = [[log(value) for value in row] for row in rows]
    for at, name in ((2, "solve"), (4, "whole process")):
        steps = ", ".join(
            f"{(after[at] - before[at]) / (after[0] - before[0]):.2f}" for before, after in pairwise(logs)
        )
        whole = linear_regression([row[0] for row in logs], [row[at] for row in logs]).slope
        print(f"CPU time of the {name} grows as pairs to the power of {whole:.2f} (step by step {steps})")


if __name__ == "__main__":
    main()
