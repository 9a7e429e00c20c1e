"""sheet: the set-up sheet of one rig."""

import argparse

from visionplan.commands import inputs


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "sheet",
        help="the set-up sheet of one rig, with a check by ruler",
        description="What to mount in which order, what to set, and how to prove with a ruler that the rig is right. "
        "The working distance is rounded where the rig keeps its grade; with --at it is as you say.",
    )
    inputs.add_inputs(parser)
    inputs.add_rig(parser)
    parser.add_argument("--format", choices=("text", "markdown"), default="text", help="how to print it")
    parser.set_defaults(run=run)


def run(args: argparse.Namespace) -> int:
    """0 when the rig fits, else 1."""
    brief, catalogue = inputs.read_inputs(args)
    from visionplan.commands.console import results
    from visionplan.report.sheet import as_set, sheet
    from visionplan.solve import judge_one

    rig = judge_one(brief, catalogue, args.camera, args.lens, args.at, args.stop, args.rings, args.orientation)
    results(sheet(rig, brief.units, args.format == "markdown"))
    return 0 if as_set(rig).fits else 1
