"""catalogue check: whether a catalogue can be read, and what stands in it."""

import argparse


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "catalogue", help="check a catalogue", description="Work on a catalogue, a folder of CSV files."
    )
    actions = parser.add_subparsers(title="actions", metavar="ACTION", required=True)
    check = actions.add_parser(
        "check",
        help="read a catalogue and tell everything that is wrong with it",
        description="Read a catalogue and tell everything that is wrong with it, with file, line and column.",
    )
    check.add_argument("folder", metavar="DIR", help="folder with lenses.csv, cameras.csv and perhaps spacers.csv")
    check.set_defaults(run=run_check)


def run_check(args: argparse.Namespace) -> int:
    """0 when nothing is wrong; what is wrong is raised."""
    from visionplan.catalogue.folder import read_catalogue
    from visionplan.commands.console import complain, results
    from visionplan.text import clean

    catalogue = read_catalogue(args.folder)
    complain(*catalogue.warnings)
    tables = (catalogue.lenses, catalogue.cameras, catalogue.spacers)
    counts = ", ".join(f"{len(table):,} {table.item}" for table in tables)
    results(f"{clean(args.folder)}: {counts}, nothing wrong\n{catalogue.fingerprint}\n")
    return 0
