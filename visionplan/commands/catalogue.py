"""catalogue: check one, start a column map of a sheet from elsewhere, take such a sheet in."""

import argparse
from collections.abc import Sequence
from typing import TYPE_CHECKING

from visionplan.commands.inputs import count

if TYPE_CHECKING:
    from visionplan.catalogue.intake.merge import Change, Merged

ITEMS = ("lenses", "cameras", "spacers")
"""The catalogue's, named here so that help and completion needn't load it."""
_MOST_TOLD = 20


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "catalogue",
        help="check a catalogue, take other sheets into it",
        description="Work on a catalogue, a folder of CSV files.",
    )
    actions = parser.add_subparsers(title="actions", metavar="ACTION", required=True)
    _add_check(actions)
    _add_map(actions)
    _add_take(actions)


def _add_check(actions) -> None:
    check = actions.add_parser(
        "check",
        help="read a catalogue and tell everything that is wrong with it",
        description="Read a catalogue and tell everything that is wrong with it, with file, line and column.",
    )
    check.add_argument(
        "folders",
        metavar="DIR",
        nargs="+",
        help="folder with lenses.csv, cameras.csv and perhaps spacers.csv; several make one catalogue",
    )
    check.set_defaults(run=run_check)


def _add_map(actions) -> None:
    parser = actions.add_parser(
        "map",
        help="start the column map of a sheet that has headings of its own",
        description="Guess which columns of a sheet are which of ours, by heading, unit and what they hold, and print "
        "the map: visionplan catalogue map SHEET > MAP. Look it over before you take the sheet in.",
    )
    parser.add_argument("sheet", metavar="SHEET", help="a CSV file or an XLSX workbook")
    parser.add_argument("--item", choices=ITEMS, help="what the rows are; guessed if not said")
    parser.add_argument("--heading", metavar="ROW", type=count, default=0, help="row of the headings; guessed")
    parser.add_argument("--worksheet", metavar="NAME", help="sheet of the workbook; all that look like items")
    parser.add_argument("--encoding", metavar="NAME", default="", help="of a CSV file, such as windows-1250; found out")
    parser.add_argument("--delimiter", metavar="SIGN", default="", help="of a CSV file, such as ';' or tab; found out")
    parser.set_defaults(run=run_map)


def _add_take(actions) -> None:
    parser = actions.add_parser(
        "take",
        help="take a sheet into a catalogue through its map",
        description="Take a sheet into a catalogue through its column map. New ids are added; of known ones price, "
        "stock and quantity are updated, and what else differs is told. All files are written or none.",
    )
    parser.add_argument("sheet", metavar="SHEET", help="a CSV file or an XLSX workbook")
    parser.add_argument("map", metavar="MAP", help="its column map, as 'catalogue map' starts it")
    parser.add_argument("folder", metavar="DIR", help="the catalogue's folder; made if there is none")
    parser.add_argument("--all", action="store_true", help="update everything that the sheet states of known ids")
    parser.add_argument("--skip-bad", action="store_true", help="leave out rows of the sheet that are at fault")
    parser.set_defaults(run=run_take)


def run_check(args: argparse.Namespace) -> int:
    """0 when nothing is wrong; what is wrong is raised."""
    from visionplan.catalogue.folder import read_catalogues
    from visionplan.commands.console import complain, results
    from visionplan.text import clean

    catalogue = read_catalogues(args.folders)
    complain(*catalogue.warnings)
    tables = (catalogue.lenses, catalogue.cameras, catalogue.spacers)
    counts = ", ".join(f"{len(table):,} {table.item}" for table in tables)
    results(f"{clean(', '.join(args.folders))}: {counts}, nothing wrong\n{catalogue.fingerprint}\n")
    return 0


def run_map(args: argparse.Namespace) -> int:
    """0; the map goes to standard output, what was guessed and what is left to standard error."""
    from visionplan.catalogue.intake.draft import map_text, summary
    from visionplan.catalogue.intake.guess import guess_file
    from visionplan.commands.console import complain, data

    delimiter = "\t" if args.delimiter in ("tab", "\\t") else args.delimiter
    guesses = guess_file(args.sheet, args.item, args.heading, args.worksheet, args.encoding, delimiter)
    for guess in guesses:
        complain(*summary(guess))
    data(map_text(guesses))
    return 0


def run_take(args: argparse.Namespace) -> int:
    """0 when it is in; what is wrong is raised, and then nothing is written."""
    from visionplan.catalogue.intake.take import take
    from visionplan.commands.console import complain, results

    merged, skipped = take(args.sheet, args.map, args.folder, args.all, args.skip_bad)
    complain(*(f"row skipped: {fault}" for fault in skipped[:50]))
    if len(skipped) > 50:
        complain(f"{len(skipped) - 50:,} more faults like these")
    results("".join(f"{line}\n" for one in merged for line in _told(one)))
    return 0


def _told(merged: "Merged") -> list[str]:
    from visionplan.text import clean

    updated = len({change.id for change in merged.updated})
    counts = f"{len(merged.added):,} added, {updated:,} updated, {merged.same:,} the same"
    absent = f", {merged.absent:,} not in the sheet and left as they are" if merged.absent else ""
    lines = [f"{clean(merged.file)}: {counts}{absent}"]
    lines += _changes(merged.updated, " → ")
    if merged.kept:
        lines.append(
            f"{len({change.id for change in merged.kept}):,} differ otherwise and were left; --all updates them too:"
        )
        lines += _changes(merged.kept, ", in the sheet ")
    return lines


def _changes(changes: Sequence["Change"], between: str) -> list[str]:
    from visionplan.text import clean

    lines = [
        f"  {clean(one.id)}: {one.column} {clean(one.before) or 'not stated'}{between}{clean(one.after)}"
        for one in changes[:_MOST_TOLD]
    ]
    more = len(changes) - _MOST_TOLD
    return [*lines, f"  and {more:,} more"] if more > 0 else lines
