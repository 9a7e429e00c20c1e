"""How soon a command starts, beside importing what it builds on: `python -m tests.bench.start [--times N]`."""

import argparse

from tests.bench import measure

DEMO = measure.ROOT / "catalogs_demo"
IMPORTS = "import numpy, rich, pint; pint.UnitRegistry(cache_folder=':auto:')"


def main() -> None:
    """Measure and print."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--times", type=int, default=9)
    args = parser.parse_args()
    measure.run([measure.PYTHON, "-c", IMPORTS])  # warms the registry's cache
    briefs = {
        f"visionplan rank {brief.name}": [measure.VISIONPLAN, "rank", str(brief)]
        for brief in sorted((DEMO / "briefs").glob("*.toml"))
    }
    imports = "import numpy, rich, pint; a warm registry"
    costs = measure.in_turn(
        {
            imports: [measure.PYTHON, "-c", IMPORTS],
            "import numpy": [measure.PYTHON, "-c", "import numpy"],
            **briefs,
        },
        args.times,
        statuses=(0, 1),
    )
    print(measure.table(costs, imports))
    print()
    nothing = "python -c pass"
    costs = measure.in_turn(
        {
            nothing: [measure.PYTHON, "-c", "pass"],
            "visionplan --help": [measure.VISIONPLAN, "--help"],
            "visionplan --version": [measure.VISIONPLAN, "--version"],
            "visionplan rank --help": [measure.VISIONPLAN, "rank", "--help"],
        },
        args.times,
    )
    print(measure.table(costs, nothing))


if __name__ == "__main__":
    main()
