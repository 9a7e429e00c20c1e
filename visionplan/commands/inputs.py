"""What the commands have in common: the brief, its catalogue, and values typed as arguments."""

import argparse
import os
import re
from typing import TYPE_CHECKING

from visionplan.faults import Fault, InputError

if TYPE_CHECKING:
    from visionplan.brief.model import Brief
    from visionplan.catalogue.items import Catalogue


def add_inputs(parser: argparse.ArgumentParser) -> None:
    """Declare the arguments that `read_inputs` takes."""
    parser.add_argument("brief", metavar="BRIEF", help="what the cell asks for, a TOML file; - for standard input")
    parser.add_argument(
        "--catalogue",
        metavar="DIR",
        action="append",
        help="folder with lenses.csv, cameras.csv and perhaps spacers.csv, several if given again; the brief's own "
        "folder, or the one above it, where that holds them",
    )
    parser.add_argument("--skip-bad", action="store_true", help="leave out rows of the catalogue that are at fault")
    parser.add_argument("--units", choices=("mm", "inch"), help="what to show lengths in; the brief's own if not said")


def add_rig(parser: argparse.ArgumentParser, at: bool = True) -> None:
    """Declare the arguments that name one rig, and what it is set to."""
    parser.add_argument("camera", metavar="CAMERA", help="id of the camera")
    parser.add_argument("lens", metavar="LENS", help="id of the lens")
    if at:
        parser.add_argument("--at", metavar="LENGTH", type=length, help='working distance it stands at, "300 mm"')
    parser.add_argument("--stop", metavar="N", type=f_number, help="f-number it is set to")
    parser.add_argument("--rings", metavar="ID,ID", type=ids, help='ids of its spacer rings, "" for none')
    parser.add_argument("--orientation", choices=("landscape", "portrait"), help="how the camera is turned")


def read_inputs(args: argparse.Namespace) -> tuple["Brief", "Catalogue"]:
    """The brief, in the units to show, and the catalogue; what was skipped in it is told.

    Raises
    ------
    InputError
        With everything that is wrong with both.
    """
    from dataclasses import replace

    from visionplan.brief.read import read_brief
    from visionplan.catalogue.folder import read_catalogues
    from visionplan.commands.console import complain

    brief = catalogue = None
    faults: list[Fault] = []
    try:
        brief = read_brief(args.brief)
    except InputError as error:
        faults += error.faults
        if args.brief != "-" and not os.path.isfile(args.brief):
            raise
    try:
        catalogue = read_catalogues(args.catalogue or [_nearby(args.brief)], args.skip_bad)
    except InputError as error:
        faults += error.faults
    if brief is None or catalogue is None:
        raise InputError(faults)
    complain(*catalogue.warnings)
    return replace(brief, units=args.units or brief.units), catalogue


def _nearby(brief: str) -> str:
    """The catalogue that lies with a brief; of standard input with the folder one is in."""
    beside = os.path.dirname(os.path.abspath(brief))
    for folder in (beside, os.path.dirname(beside)):
        if all(os.path.isfile(os.path.join(folder, file)) for file in ("lenses.csv", "cameras.csv")):
            return folder
    found = "no catalogue lies in its folder or the one above"
    raise InputError([Fault(brief, found, "--catalogue DIR, a folder with lenses.csv and cameras.csv")])


def count(text: str) -> int:
    """A whole number from 1, as an argument."""
    if not re.fullmatch("[1-9][0-9]{0,8}", text):
        raise argparse.ArgumentTypeError(f"{_quoted(text)} is no whole number from 1")
    return int(text)


def any_length(text: str) -> float:
    """A length of either sign with its unit, as an argument, mm."""
    from visionplan.units import UnitError, parse

    try:
        return parse(text, "mm")
    except UnitError as error:
        raise argparse.ArgumentTypeError(f"{error.found}; expected {error.expected}") from None


def length(text: str) -> float:
    """A length with its unit, as an argument, mm."""
    value = any_length(text)
    if value <= 0:
        raise argparse.ArgumentTypeError(f"{_quoted(text)} is no length greater than 0")
    return value


def pixels(text: str) -> float:
    """A number of pixels, as an argument."""
    from visionplan.units import UnitError, parse

    try:
        value = parse(text, "px")
    except UnitError as error:
        raise argparse.ArgumentTypeError(f"{error.found}; expected {error.expected}") from None
    if value <= 0:
        raise argparse.ArgumentTypeError(f"{_quoted(text)} is no number of pixels greater than 0")
    return value


def f_number(text: str) -> float:
    """An f-number, as an argument."""
    from visionplan.units import UnitError, number

    try:
        value = number(text)
    except UnitError:
        value = 0.0
    if not 0.1 <= value <= 1000:
        raise argparse.ArgumentTypeError(f"{_quoted(text)} is no f-number, such as 5.6")
    return value


def ids(text: str) -> list[str]:
    """Ids parted by commas, as an argument; none of them for an empty one."""
    return [name.strip() for name in text.split(",") if name.strip()]


def _quoted(text: str) -> str:
    from visionplan.text import quoted

    return quoted(text)
