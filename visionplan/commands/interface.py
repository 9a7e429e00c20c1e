"""open: the terminal interface, on a brief or on the work left off."""

import argparse
import gc
import os
import sys

from visionplan.faults import Fault, InputError


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "open",
        help="shape a brief, read rigs and keep a shortlist in the terminal",
        description="Open the terminal interface: the brief with its ranking, one rig in full, a shortlist, what to "
        "move on a rig that was built. Without a brief it goes on with the work left off last, at first with the demo "
        "works; so does visionplan without any command. ? lists the keys.",
    )
    parser.add_argument("brief", metavar="BRIEF", nargs="?", help="a TOML file; the work left off last if not said")
    parser.add_argument("--catalogue", metavar="DIR", help="folder with lenses.csv and cameras.csv")
    parser.add_argument("--skip-bad", action="store_true", help="leave out rows of the catalogue that are at fault")
    parser.add_argument("--ascii", action="store_true", help="draw with ASCII alone, as in a locale without UTF-8")
    parser.set_defaults(run=run)


def run(args: argparse.Namespace) -> int:
    """0 when it was left in peace."""
    if not interactive():
        found = "standard input or output is no terminal"
        raise InputError([Fault("open", found, "a terminal; for pipes there are rank, explain and concede")])
    # A collection of garbage amid so many imports finds none and costs a tenth of the start; `start` turns it on again.
    gc.disable()
    os.environ.setdefault("TEXTUAL_ANIMATIONS", "none")
    from visionplan.tui.start import start

    return start(args.brief, args.catalogue, args.ascii, args.skip_bad)


def interactive() -> bool:
    """Whether a person sits at both ends."""
    return bool(sys.stdin and sys.stdin.isatty() and sys.stdout and sys.stdout.isatty())
