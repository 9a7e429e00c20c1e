"""Rank 50 million pairs, as whole processes, beside a DuckDB query that gives the same answer from the same files.

`python -m tests.bench.rank_market [--lenses N] [--cameras N] [--sensors N] [--times N]`
"""

import argparse
import json
from pathlib import Path

from tests.bench import cells, measure

TOP = 100


def main() -> None:
    """Measure, hold the answers together, and print."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--lenses", type=int, default=5000)
    parser.add_argument("--cameras", type=int, default=10_000)
    parser.add_argument("--sensors", type=int, default=200)
    parser.add_argument("--times", type=int, default=7)
    args = parser.parse_args()
    measure.in_folder(lambda folder: _compare(folder, args))


def _compare(folder: Path, args: argparse.Namespace) -> None:
    sizes = {"lenses": args.lenses, "cameras": args.cameras, "sensors": args.sensors}
    market = measure.market(folder / "market", **sizes)
    ringed = measure.market(folder / "ringed", **sizes, spacers=20)
    brief = folder / "lids.toml"
    brief.write_text(cells.LIDS, "utf-8")
    rank = [measure.VISIONPLAN, "rank", str(brief), "--top", str(TOP), "--format", "json", "--catalogue"]
    duck = [measure.PYTHON, "-m", "tests.bench.duck", str(market)]
    costs = measure.in_turn(
        {
            "visionplan rank": [*rank, str(market)],
            "DuckDB, all threads": duck,
            "DuckDB, one thread": [*duck, "--threads", "1"],
            "DuckDB, one thread, every cell typed": [*duck, "--threads", "1", "--load"],
            "python -c 'import numpy'": [measure.PYTHON, "-c", "import numpy"],
            "visionplan rank, 20 spacer rings": [*rank, str(ringed)],
        },
        args.times,
    )
    solves = [json.loads(measure.run(measure.solve(brief, market, TOP)).output) for _ in range(args.times)]
    ranking = json.loads(costs["visionplan rank"][0].output)
    print(f"{ranking['pairs']:,} pairs, {ranking['fitting']:,} fit")
    print(measure.table(costs, "visionplan rank"))
    seconds, cpu = (min(solve[name] for solve in solves) for name in ("seconds", "cpu"))
    whole = min(cost.cpu for cost in costs["visionplan rank"])
    print(f"the solve alone: {seconds:.3f} s, {cpu:.3f} s CPU, {cpu / whole:.0%} of the CPU time of the whole process")
    _hold_together(ranking, costs)


def _hold_together(ranking: dict, costs: dict[str, list[measure.Cost]]) -> None:
    """Every query must find as many fitting pairs, and the same pairs first, in the same order."""
    ours = ranking["fitting"], [[rig["camera"], rig["lens"]] for rig in ranking["rigs"] if rig["fits"]]
    for name, runs in costs.items():
        for cost in runs if name.startswith("DuckDB") else ():
            theirs = json.loads(cost.output)
            if ours != (theirs["fitting"], theirs["rigs"]):
                raise SystemExit(
                    f"{name} answers otherwise: {theirs['fitting']:,} fit, {theirs['rigs'][:3]} come first"
                )
    print(f"the queries give the same count and the same {len(ours[1])} pairs in the same order")


if __name__ == "__main__":
    main()
