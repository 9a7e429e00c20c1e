"""Tolls: how many more pairs would fit if a line of the brief were dropped."""

from dataclasses import replace

from visionplan.brief.model import Brief
from visionplan.catalogue.items import Catalogue
from visionplan.solve.choose import Items
from visionplan.solve.gates import ASKED
from visionplan.solve.problem import Problem
from visionplan.solve.survey import survey


def tolls(brief: Brief, catalogue: Catalogue) -> dict[str, int]:
    """Line (section.key) → how many more pairs would fit without what it alone asks.

    Only the lines that ask something by themselves. Without its `mounts` a brief still asks for equal threads.
    """
    problem = Problem(brief, catalogue)
    fitting = fitting_without(problem)
    found = {}
    for line, names in _lines().items():
        if line not in brief.stated:
            continue
        if line == "choose.mounts":
            found[line] = fitting_without(Problem(replace(brief, mounts=None), catalogue)) - fitting
        else:
            asked = frozenset(name for name, asks in names.items() if asks(problem.ask))
            found[line] = fitting_without(problem, asked) - fitting if asked else 0
    return found


def fitting_without(problem: Problem, drop: frozenset[str] = frozenset()) -> int:
    """How many pairs fit without some demands and gates."""
    return survey(problem, Items.of(problem, drop), drop=drop).count()


def _lines() -> dict[str, dict]:
    lines: dict[str, dict] = {}
    for asked in ASKED:
        for line in asked.lines:
            lines.setdefault(line, {})[asked.name] = asked.asks
    return lines
