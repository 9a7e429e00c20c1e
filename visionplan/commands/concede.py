"""concede: what would have to give, and what each line of the brief costs."""

import argparse

from visionplan.commands import inputs


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "concede",
        help="what would have to give when nothing fits, and what each line costs",
        description="When nothing fits, the smallest change of each one demand that lets a rig fit, least change "
        "first. And of every line of the brief how many more pairs would fit without it.",
    )
    inputs.add_inputs(parser)
    parser.set_defaults(run=run)


def run(args: argparse.Namespace) -> int:
    """0 when something fits, else 1."""
    brief, catalogue = inputs.read_inputs(args)
    from visionplan.commands.console import complain, results
    from visionplan.report.giving import giving
    from visionplan.solve import rank, tolls

    ranking = rank(brief, catalogue, top=1, concessions=True)
    complain(*ranking.notes)
    results(giving(ranking, tolls(brief, catalogue), brief.units))
    return 0 if ranking.fitting else 1
