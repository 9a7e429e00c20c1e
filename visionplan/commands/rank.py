"""rank: the rigs that fit a brief, best first."""

import argparse
from typing import TYPE_CHECKING

from visionplan.commands import console, inputs

if TYPE_CHECKING:
    from visionplan.solve.rig import Ranking

ORDERS = ("value", "latitude", "depth", "snr", "price", "sampling", "yield", "length")
"""The solver's, named here so that help and completion needn't load it."""
FORMATS = ("table", "json", "csv", "markdown")


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "rank",
        help="the rigs that fit a brief, best first",
        description="Rank the rigs of a catalogue that fit a brief, one row a pair of camera and lens. Where fewer fit "
        "than rows are asked for, the nearest misses follow; where none fits, what would have to give.",
    )
    inputs.add_inputs(parser)
    parser.add_argument("--order", choices=ORDERS, default="value", help="what comes first; value if not said")
    parser.add_argument("--top", metavar="K", type=inputs.count, default=20, help="how many rigs; 20 if not said")
    parser.add_argument("--format", choices=FORMATS, default="table", help="how to print them; a table if not said")
    parser.add_argument("--concessions", action="store_true", help="tell what would have to give in any case")
    parser.set_defaults(run=run)


def run(args: argparse.Namespace) -> int:
    """0 when something fits, else 1."""
    brief, catalogue = inputs.read_inputs(args)
    from visionplan.solve import rank

    ranking = rank(brief, catalogue, args.order, args.top, True if args.concessions else None)
    if args.format == "table":
        console.results(_table(ranking))
    else:
        console.complain(*ranking.notes)
        console.data(_file(ranking, args.format))
    return 0 if ranking.fitting else 1


def _table(ranking: "Ranking") -> str:
    from visionplan.report.table import rank_table

    screen = console.screen()
    lines = rank_table(ranking, screen.columns, ranking.brief.units, screen.colour, screen.ascii)
    return "".join(f"{line}\n" for line in lines)


def _file(ranking: "Ranking", format: str) -> str:
    if format == "json":
        from visionplan.report.json import ranking_json

        return ranking_json(ranking)
    if format == "csv":
        from visionplan.report.csv import ranking_csv

        return ranking_csv(ranking, ranking.brief.units)
    from visionplan.report.markdown import ranking_markdown

    return ranking_markdown(ranking, ranking.brief.units)
