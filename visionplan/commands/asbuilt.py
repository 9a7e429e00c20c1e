"""asbuilt: what targets in the picture tell of a rig that stands, and how to set it right."""

import argparse
import re

from visionplan.commands import inputs
from visionplan.faults import Fault, InputError

_TARGET = """\
targets:
  "50 mm"                       along the width, in the middle of the picture
  "50 mm, height"               along the height
  "50 mm, height, left"         along the height, at the left edge of the picture
  "50 mm, height, left 60 mm"   the same, its middle 60 mm left of the picture's

  Each --target has its --pixels, in the same order. One at each end of the field
  (left and right, or bottom and top), or one along each side, also tells the tilt.
"""


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "asbuilt",
        help="from a target in the picture to what is off and what to move",
        description="Tell from a target of known length and the pixels it spans where a rig stands, what is off, and "
        "the move that sets it right.",
        epilog=_TARGET,
    )
    inputs.add_inputs(parser)
    inputs.add_rig(parser, at=False)
    parser.add_argument(
        "--target", metavar="LENGTH[, SIDE[, END]]", action="append", required=True, help="a target, see below"
    )
    parser.add_argument(
        "--pixels", metavar="K", action="append", required=True, type=inputs.pixels, help="how many pixels it spans"
    )
    parser.add_argument(
        "--distance", metavar="LENGTH", type=inputs.length, help="working distance as taped: lens front to reference"
    )
    parser.add_argument(
        "--height",
        metavar="LENGTH",
        type=inputs.any_length,
        default=0.0,
        help="of the targets over the reference plane",
    )
    parser.set_defaults(run=run)


def run(args: argparse.Namespace) -> int:
    """0 when the rig fits as it stands, else 1."""
    targets = _targets(args.target, args.pixels)
    brief, catalogue = inputs.read_inputs(args)
    from visionplan.commands.console import results
    from visionplan.report.asbuilt import asbuilt_text
    from visionplan.solve import judge_one
    from visionplan.solve.asbuilt import as_built

    planned = judge_one(
        brief, catalogue, args.camera, args.lens, stop=args.stop, rings=args.rings, orientation=args.orientation
    )
    built = as_built(planned, targets, args.distance, args.height)
    results(asbuilt_text(built, brief.units))
    return 0 if built.found.fits else 1


def _targets(texts: list[str], pixels: list[float]):
    """Every target with its pixels; everything wrong with them at once."""
    from visionplan.solve.target import ENDS, Target
    from visionplan.text import quoted
    from visionplan.units import UnitError, parse

    faults, targets = [], []
    if len(texts) != len(pixels):
        found = f"{len(texts)} --target and {len(pixels)} --pixels"
        faults.append(Fault("", found, "one --pixels for each --target", column="--pixels"))
    for text, count in zip(texts, pixels):
        length, *words = (word.strip() for word in text.split(","))
        side = words.pop(0) if words and words[0] in ("width", "height") else "width"
        end, _, off = re.sub(r"\s+", " ", words.pop(0)).partition(" ") if words else ("centre", "", "")
        try:
            if words or end not in ("centre", *ENDS) or (end == "centre" and off):
                wanted = f"width or height, then one of centre, {', '.join(ENDS)}, such as '50 mm, height, left'"
                raise UnitError(f"{quoted(text)} is no target", wanted)
            targets.append(Target(parse(length, "mm"), count, side, end, parse(off, "mm") if off else None))
        except UnitError as error:
            faults.append(Fault("", error.found, error.expected, column="--target"))
    if faults:
        raise InputError(faults)
    return targets
