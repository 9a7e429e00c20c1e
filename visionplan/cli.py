"""The command line: its arguments, and what its exit status tells."""

import argparse
from collections.abc import Sequence
from typing import NoReturn

from visionplan import __version__
from visionplan.commands import asbuilt, catalogue, completion, concede, console, explain, interface, new, rank, sheet
from visionplan.faults import InputError
from visionplan.text import clean

COMMANDS = (interface, rank, explain, sheet, asbuilt, concede, catalogue, new, completion)
"""In the order that the help lists them; without any the interface opens, or off a terminal the help is printed."""

_STATUS = """\
exit status:
  0    something fits; the rig that is named fits; done
  1    nothing fits; the rig that is named does not fit
  2    bad input or usage
  130  Ctrl-C
"""


class Formatter(argparse.RawDescriptionHelpFormatter):
    """Leaves a text of several lines as it is, and wraps one of a single line."""

    def _fill_text(self, text: str, width: int, indent: str) -> str:
        fill = super()._fill_text if "\n" in text else super(argparse.RawDescriptionHelpFormatter, self)._fill_text
        return fill(text, width, indent)


class Parser(argparse.ArgumentParser):
    """Takes no abbreviations, which a later option could break, and shows arguments safely."""

    def __init__(self, **settings):
        super().__init__(allow_abbrev=False, formatter_class=Formatter, **settings)

    def error(self, message: str) -> NoReturn:
        """Complain of bad usage."""
        super().error(clean(message))


def parser() -> argparse.ArgumentParser:
    """The parser of all commands."""
    top = Parser(
        prog="visionplan",
        description="Find the camera, lens and spacer rings that meet everything a cell asks for.",
        epilog=_STATUS,
    )
    top.add_argument("--version", action="version", version=f"visionplan {__version__}")
    commands = top.add_subparsers(title="commands", metavar="COMMAND")
    for command in COMMANDS:
        command.add(commands)
    top.set_defaults(parser=top)
    return top


def run(arguments: Sequence[str]) -> int:
    """Run a command and return its exit status; whatever goes wrong is told on standard error."""
    console.prepare()
    try:
        return _run(arguments)
    except BrokenPipeError:
        return 0
    except InputError as error:
        console.complain(*map(str, error.faults))
    except OSError as error:
        console.complain(f"{error.filename or 'the system'}: {error.strerror}")
    except MemoryError:
        console.complain("out of memory: the catalogue is too large for this machine")
    except Exception:
        import traceback

        # Not 1, which Python would return: that means that nothing fits.
        console.complain("this is a fault of visionplan itself; please report what follows")
        traceback.print_exc()
    return 2


def _run(arguments: Sequence[str]) -> int:
    top = parser()
    if not arguments and interface.interactive():
        arguments = ["open"]
    try:
        args = top.parse_args(arguments)
    except SystemExit as end:
        console.results("")
        return int(end.code or 0)
    if "run" not in args:
        console.results(top.format_help())
        return 0
    return args.run(args)
