"""README.md and DEVELOPERS.md against the program as it is."""

import json
import re
import shlex
import tomllib

import pytest

from tests.documents import DOCUMENTS, ROOT, generated, parts
from visionplan.cli import COMMANDS, run

TEXTS = {name: (ROOT / name).read_text(encoding="utf-8") for name in DOCUMENTS}
README, DEVELOPERS = TEXTS["README.md"], TEXTS["DEVELOPERS.md"]
PARTS = [part for text in TEXTS.values() for part in parts(text)]


def first_cells(text, heading):
    """What stands in the first column of the table that follows a heading or a sentence."""
    table = re.search(r"(?:^\|.*\n)+", text[text.index(heading) :], re.M)[0].splitlines()[2:]
    return [row.split("|")[1].strip() for row in table]


def test_two_one_line_shell_blocks_after_one_paragraph():
    blocks = re.findall(r"^```(?:sh|bash|shell|console)\n(.*?)^```$", README, re.M | re.S)
    assert len(blocks) == 2
    assert all(block.count("\n") == 1 for block in blocks)
    assert all("python3 -m venv .venv && " in block for block in blocks)
    assert "visionplan rank" in blocks[0]
    assert "pytest" in blocks[1]
    before = README[: README.index("```sh")].strip().split("\n\n")
    assert len(before) == 3  # the name, the job, what the first block does


def test_the_first_command_ranks(monkeypatch, capsys):
    command = re.search(r"\.venv/bin/visionplan (rank .*)", README)[1]
    monkeypatch.chdir(ROOT)
    assert run(shlex.split(command)) == 0
    assert capsys.readouterr().out


@pytest.mark.parametrize(("what", "stands"), PARTS, ids=[what for what, _ in PARTS])
def test_generated_parts_are_up_to_date(what, stands):
    # spaces apart: Python's versions break the lines of a usage in their own ways
    assert stands.split() == generated(what).split(), "stale: python -m tests.documents"


def test_the_help_of_every_command_stands_there(capsys):
    run(["--help"])
    names = re.findall(r"^    (\w+)", capsys.readouterr().out.split("COMMAND\n")[1].split("exit status")[0], re.M)
    assert len(names) == len(COMMANDS)
    shown = {what.split()[1] for what, _ in PARTS if what.startswith("visionplan") and what.endswith("--help")}
    assert shown - {"--help"} == set(names)


def test_every_key_of_the_json_is_told(monkeypatch, capsys):
    monkeypatch.chdir(ROOT)
    run(["rank", "catalogs_demo/briefs/jar-lids.toml", "--format", "json", "--top", "1"])
    found = json.loads(capsys.readouterr().out)
    told = first_cells(README, "## JSON for scripts") + first_cells(README, "Of each rig:")
    keys = [key for cell in told for key in cell.split(", ")]
    assert keys == [*found, *found["rigs"][0]]
    section = README[README.index("## JSON for scripts") :]
    for key in (*found["brief"], *found["catalogue"], *found["rigs"][0]["contrast"], *found["rigs"][0]["demands"][0]):
        assert f"`{key}`" in section


def test_the_map_is_whole():
    told = {cell.strip("`/") for cell in first_cells(DEVELOPERS, "## Map")}
    package = ROOT / "visionplan"
    modules = {f"visionplan/{path.name}" for path in package.glob("*.py")} - {"visionplan/__init__.py"}
    folders = {f"visionplan/{path.parent.name}" for path in package.glob("*/__init__.py")}
    assert told == modules | folders | {"catalogs_demo", "tests"}


def test_every_dependency_has_its_reason():
    with open(ROOT / "pyproject.toml", "rb") as file:
        project = tomllib.load(file)["project"]
    extras = project["optional-dependencies"]
    wanted = {
        re.match(r"[\w-]+", one)[0] for one in [*project["dependencies"], *(o for e in extras.values() for o in e)]
    }
    told = [name for cell in first_cells(DEVELOPERS, "## Dependencies") for name in cell.split(", ")]
    assert sorted(told) == sorted(wanted)
