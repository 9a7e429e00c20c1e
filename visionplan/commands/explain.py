"""explain: every number of one rig."""

import argparse

from visionplan.commands import inputs


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "explain",
        help="every number of one rig: law, values, result, source",
        description="Explain one camera with one lens: every demand with its law, the values put in, the result and "
        "the source. As planned, or with the options as a rig that stands already.",
    )
    inputs.add_inputs(parser)
    inputs.add_rig(parser)
    parser.set_defaults(run=run)


def run(args: argparse.Namespace) -> int:
    """0 when the rig fits, else 1."""
    brief, catalogue = inputs.read_inputs(args)
    from visionplan.commands.console import results
    from visionplan.report.explain import explain
    from visionplan.solve import judge_one

    rig = judge_one(brief, catalogue, args.camera, args.lens, args.at, args.stop, args.rings, args.orientation)
    results(explain(rig, brief.units))
    return 0 if rig.fits else 1
