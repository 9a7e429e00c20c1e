"""new: a brief to start from, or the demo works to try things on."""

import argparse
import os
from collections.abc import Iterator
from contextlib import contextmanager

from visionplan.commands.console import complain
from visionplan.demo import DEMO_BRIEF, demo_folder
from visionplan.faults import Fault, InputError


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "new",
        help="write a commented brief to start from",
        description="Write a brief to start from, every line of it with its meaning. Nothing is ever overwritten.",
    )
    parser.add_argument("path", metavar="FILE", help="the brief to write; with --demo the folder to make")
    parser.add_argument(
        "--demo",
        action="store_true",
        help="make a folder with the demo works instead: an invented catalogue, and briefs for its cells",
    )
    parser.set_defaults(run=run)


def run(args: argparse.Namespace) -> int:
    """0 when it is written."""
    if args.demo:
        _write_demo(args.path)
        told = f"the demo works; rank one of its briefs: visionplan rank {os.path.join(args.path, DEMO_BRIEF)}"
    else:
        _write_starter(args.path)
        told = "a brief to start from; a line that begins with # asks nothing"
    complain(f"{args.path}: {told}")
    return 0


def _write_starter(path: str) -> None:
    from visionplan.brief.starter import STARTER

    with _refused(path), open(path, "x", encoding="utf-8", newline="\n") as file:
        try:
            file.write(STARTER)
            file.flush()
        except BaseException:
            os.unlink(path)
            raise


def _write_demo(path: str) -> None:
    source = demo_folder()
    with _refused(path):
        os.mkdir(path)
        try:
            for file in sorted(source.rglob("*")):
                copy = os.path.join(path, file.relative_to(source))
                if file.is_dir():
                    os.mkdir(copy)
                else:
                    with open(copy, "xb") as new:
                        new.write(file.read_bytes())
        except BaseException:
            from shutil import rmtree

            rmtree(path, ignore_errors=True)
            raise


@contextmanager
def _refused(path: str) -> Iterator[None]:
    """Turn what the system refuses into a fault."""
    try:
        yield
    except FileExistsError:
        fault = Fault(path, "is there already, and nothing is overwritten", "a name that isn't taken")
        raise InputError([fault]) from None
    except OSError as error:
        fault = Fault(path, f"can't be written: {error.strerror}", "a name in a folder that can be written to")
        raise InputError([fault]) from None
