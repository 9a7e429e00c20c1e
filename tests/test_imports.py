"""What is loaded when: in fresh processes, so that nothing else has loaded it."""

import os
import subprocess
import sys
from pathlib import Path

import pytest

import visionplan
from visionplan.demo import demo_folder

ROOT = Path(visionplan.__file__).parents[1]
JAR_LIDS = str(demo_folder() / "briefs" / "jar-lids.toml")
HEAVY = {"numpy", "pint", "rich", "textual", "tomlkit", "shtab"}
HELP = [
    ("--help",),
    ("--version",),
    (),
    ("rank", "--help"),
    ("explain", "--help"),
    ("concede", "--help"),
    ("catalogue", "--help"),
    ("catalogue", "check", "--help"),
    ("catalogue", "map", "--help"),
    ("catalogue", "take", "--help"),
    ("new", "--help"),
    ("completion", "--help"),
    ("polish",),
]


def loaded(code):
    """Names of the modules loaded once the code has run."""
    code = f"{code}\nimport sys\nprint(*sys.modules, file=sys.stderr)"
    env = os.environ | {"PYTHONPATH": str(ROOT)}
    done = subprocess.run([sys.executable, "-c", code], env=env, capture_output=True, text=True, check=True)
    return set(done.stderr.splitlines()[-1].split())


def after(*arguments):
    return loaded(f"from visionplan.cli import run; run({arguments!r})")


@pytest.mark.parametrize("arguments", HELP)
def test_help_starts_at_once(arguments):
    modules = after(*arguments)
    assert "visionplan.cli" in modules
    assert not modules & HEAVY


def test_commands_load_what_they_need():
    assert after("completion", "bash") & HEAVY == {"shtab"}
    for arguments in (("rank", JAR_LIDS), ("rank", JAR_LIDS, "--format", "json"), ("concede", JAR_LIDS)):
        assert after(*arguments) & HEAVY == {"numpy"}
    assert after("explain", JAR_LIDS, "area-3.1-gige-mono", "plain-16", "--at", "400 mm") & HEAVY == {"numpy"}
    assert not after("new", "/nowhere/brief.toml") & HEAVY


def headless():
    """Every module but those of the interface and of the command line."""
    for path in sorted((ROOT / "visionplan").rglob("*.py")):
        module = ".".join(path.relative_to(ROOT).with_suffix("").parts).removesuffix(".__init__")
        if not module.startswith(("visionplan.tui", "visionplan.__main__", "visionplan.catalogs_demo")):
            yield module


def test_only_the_interface_loads_textual():
    modules = list(headless())
    assert "visionplan.report.explain" in modules
    assert not loaded("\n".join(f"import {module}" for module in modules)) & {"textual", "rich", "pint", "tomlkit"}


def test_optics_knows_no_catalogue_and_the_solver_no_report():
    optics = loaded("\n".join(f"import {module}" for module in headless() if module.startswith("visionplan.optics")))
    ours = {module for module in optics if module.startswith("visionplan.")}
    assert ours
    assert all(module.startswith("visionplan.optics") for module in ours)
    solve = loaded("\n".join(f"import {module}" for module in headless() if module.startswith("visionplan.solve")))
    assert "visionplan.solve.search" in solve
    assert not {module for module in solve if module.startswith(("visionplan.report", "visionplan.commands"))}
