"""The generated parts of README.md and DEVELOPERS.md; `python -m tests.documents` writes them anew."""

import contextlib
import io
import os
import re
from collections.abc import Callable, Iterator
from pathlib import Path

ROOT = Path(__file__).parents[1]
DOCUMENTS = ("README.md", "DEVELOPERS.md")
_PART = re.compile(r"(<!-- generated: (.+?) -->\n).*?(<!-- end -->\n)", re.S)


def command(line: str) -> str:
    """What a command prints, 80 columns wide, the time that it took left out."""
    from visionplan.cli import run

    said = io.TextIOWrapper(io.BytesIO(), encoding="utf-8")
    before = os.environ.get("COLUMNS"), os.getcwd()
    os.environ["COLUMNS"] = "80"
    os.chdir(ROOT)
    try:
        with contextlib.redirect_stdout(said):
            run(line.split()[1:])
    finally:
        os.chdir(before[1])
        os.environ.pop("COLUMNS")
        if before[0] is not None:
            os.environ["COLUMNS"] = before[0]
    said.seek(0)
    text = re.sub(r"; \d[\d.e-]* (?:s|ms)$", "", said.read(), flags=re.M)
    return f"```text\n{text.rstrip()}\n```\n"


def columns(item: str) -> str:
    """The columns of one of a catalogue's files."""
    from visionplan.catalogue.items import COLUMNS, REQUIRED_OF_KIND

    rows = ["| column | unit | what it is |", "| --- | --- | --- |"]
    for column in COLUMNS[item]:
        needed = "; **required**" if column.required else ""
        for kind, names in REQUIRED_OF_KIND.items() if item == "lenses" else ():
            needed += f"; **required** of {kind} lenses" if column.name in names else ""
        doc = column.doc.rstrip(".") + (f": {', '.join(column.choices)}" if column.choices else "") + needed
        rows.append(f"| {column.name} | {_unit(column.unit)} | {doc} |")
    return "\n".join(rows) + "\n"


def symbols() -> str:
    """The nomenclature."""
    from visionplan.report.symbols import sign
    from visionplan.solve.case import SYMBOLS

    rows = ["| in code | in laws | unit | what it is |", "| --- | --- | --- | --- |"]
    rows += [f"| `{name}` | {sign(name)} | {_unit(unit)} | {doc} |" for name, (doc, unit) in SYMBOLS.items()]
    return "\n".join(rows) + "\n"


def demands() -> str:
    """The demands and their laws."""
    from visionplan.solve.demands import DEMANDS

    rows = ["| demand | holds when | bound |", "| --- | --- | --- |"]
    rows += [f"| {demand.name} | {demand.law} | {demand.bound_law} |" for demand in DEMANDS]
    return "\n".join(rows) + "\n"


def _unit(unit: str) -> str:
    return {"1": "fraction or %", "e": "e-", "W/m^2": "W/m²"}.get(unit, unit)


_GENERATORS: dict[str, Callable[[str], str]] = {
    "visionplan": command,
    "columns": lambda line: columns(line.split()[1]),
    "symbols": lambda line: symbols(),
    "demands": lambda line: demands(),
}


def parts(text: str) -> Iterator[tuple[str, str]]:
    """What each generated part is, and what stands there."""
    for part in _PART.finditer(text):
        yield part[2], part[0][len(part[1]) : -len(part[3])]


def generated(what: str) -> str:
    """What should stand there."""
    return _GENERATORS[what.split()[0]](what)


if __name__ == "__main__":
    for name in DOCUMENTS:
        text = (ROOT / name).read_text(encoding="utf-8")
        anew = _PART.sub(lambda part: part[1] + generated(part[2]) + part[3], text)
        (ROOT / name).write_text(anew, encoding="utf-8")
