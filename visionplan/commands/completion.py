"""completion: a script with which a shell completes commands, options and file names."""

import argparse

_SHELLS = ("bash", "zsh", "fish", "tcsh", "powershell")


def add(commands) -> None:
    """Declare the command."""
    parser = commands.add_parser(
        "completion",
        help="print a script that completes commands in a shell",
        description="Print a script with which a shell completes commands, options and file names.",
        epilog='bash: eval "$(visionplan completion bash)" in ~/.bashrc\n'
        "zsh:  visionplan completion zsh > DIR/_visionplan, with a DIR of $fpath\n"
        "fish: visionplan completion fish > ~/.config/fish/completions/visionplan.fish",
    )
    parser.add_argument("shell", metavar="SHELL", choices=_SHELLS, help=f"one of {', '.join(_SHELLS)}")
    parser.set_defaults(run=run)


def run(args: argparse.Namespace) -> int:
    """0."""
    import shtab

    from visionplan.commands.console import results

    files = {"BRIEF": shtab.FILE, "FILE": shtab.FILE, "SHEET": shtab.FILE, "MAP": shtab.FILE, "DIR": shtab.DIRECTORY}
    for action in _actions(args.parser):
        if action.metavar in files:
            action.complete = files[action.metavar]
    results(shtab.complete(args.parser, args.shell) + "\n")
    return 0


def _actions(parser: argparse.ArgumentParser):
    """Every argument of a parser and of the commands below it."""
    for action in parser._actions:
        yield action
        if isinstance(action, argparse._SubParsersAction):
            for below in action.choices.values():
                yield from _actions(below)
