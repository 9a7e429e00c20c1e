"""The brief's file as TOML: its data, the line of each key, and all of its syntax faults at once."""

import re
import tomllib
from dataclasses import dataclass

_HEAD = re.compile(
    r"""[ \t]*(?:
        \[+(?P<header>[^\]\#\n]*)                # [section] or [[section]]
        | (?P<key>["'\w][^=\#\[\]{}\n]*)=       # key =
        | (?P<other>[^\W\d][^\s:]*)              # words that are neither
    )""",
    re.VERBOSE,
)
_MOST_DOTS = 20
_PLACE = re.compile(r"\s*\(at (?:line (\d+), column \d+|end of document)\)$")


@dataclass(frozen=True)
class Statement:
    """A section's heading or a key with its value."""

    line: int
    """The line where it begins, from 1."""
    key: str
    """section.key; of a heading the section."""
    heading: int
    """The line of the heading that it stands under, its own for a heading; 0 before the first."""
    rows: tuple[str, ...]
    """Up to the next statement."""


@dataclass(frozen=True)
class SyntaxFault:
    """A statement that isn't valid TOML."""

    line: int | None
    key: str
    found: str
    expected: str = ""


def statements(text: str) -> list[Statement]:
    """Cut the text into statements by how their first lines look, so also where it isn't valid TOML."""
    rows = text.split("\n")
    starts = [(at, head) for at, row in enumerate(rows) if (head := _HEAD.match(row))]
    found = []
    section, heading = "", 0
    for (at, head), end in zip(starts, [at for at, _ in starts[1:]] + [len(rows)]):
        name = ".".join(part.strip(" \t\"'") for part in head[head.lastgroup or 0].split("."))
        if head.lastgroup == "header":
            section, heading = name, at + 1
        key = section if head.lastgroup == "header" else f"{section}.{name}".lstrip(".")
        found.append(Statement(at + 1, key, heading, tuple(rows[at:end])))
    return found


def lines(text: str) -> dict[str, int]:
    """Tell the line of each key and section, and of the section and line that a longer dotted key implies."""
    found: dict[str, int] = {}
    for statement in statements(text):
        section, line, *_ = [*statement.key.split(".", 2), ""]
        for key in (section, f"{section}.{line}", statement.key):
            found.setdefault(key, statement.line)
    return found


def load(text: str) -> tuple[dict | None, list[SyntaxFault]]:
    """Parse TOML; where it has faults, find all of them, and the data of the statements that have none.

    The data is None where a faulty heading leaves open what belongs where.
    """
    text = text.replace("\r\n", "\n")
    if deep := _deep(text):
        return None, [deep]
    data, fault = _parse(text)
    if fault is None:
        return data, []
    if '"""' in text or "'''" in text:
        # What looks like a statement may lie within such a string.
        return None, [fault]
    rows, faults, sound = text.split("\n"), [], True
    seen: dict[tuple[int, str], int] = {}
    for statement in statements(text):
        wrong = _wrong(statement, seen)
        if wrong is not None:
            faults.append(wrong)
            rows[statement.line - 1 : statement.line - 1 + len(statement.rows)] = [""] * len(statement.rows)
            sound = sound and statement.heading != statement.line
    if not sound:
        return None, faults
    data, fault = _parse("\n".join(rows))
    return data, faults + ([fault] if fault else [])


def _deep(text: str) -> SyntaxFault | None:
    """Find a dotted key that tomllib would take gigabytes to parse."""
    for number, row in enumerate(text.split("\n"), 1):
        key, equals, _ = row.partition("=")
        if equals and "#" not in key and key.count(".") > _MOST_DOTS:
            return SyntaxFault(number, "", "a key of far too many parts")
    return None


def _wrong(statement: Statement, seen: dict[tuple[int, str], int]) -> SyntaxFault | None:
    """The fault within one statement; `seen` holds where each has stood before."""
    _, fault = _parse("\n".join(statement.rows))
    if fault is not None:
        return SyntaxFault(statement.line + (fault.line or 1) - 1, statement.key, fault.found)
    heading = statement.heading == statement.line
    if heading and statement.rows[0].lstrip().startswith("[["):
        return None
    first = seen.setdefault((0 if heading else statement.heading, statement.key), statement.line)
    if first == statement.line:
        return None
    name = f"[{statement.key}]" if heading else statement.key.rpartition(".")[2]
    return SyntaxFault(statement.line, statement.key, f"{name} stands twice, first on line {first}", "it once")


def _parse(text: str) -> tuple[dict | None, SyntaxFault | None]:
    try:
        return tomllib.loads(text), None
    except RecursionError:
        return None, SyntaxFault(None, "", "lists or tables nested far too deep")
    except tomllib.TOMLDecodeError as error:
        place = _PLACE.search(str(error))
        words = _PLACE.sub("", str(error))
        return None, SyntaxFault(
            int(place[1]) if place and place[1] else None, "", f"not valid TOML ({words[:1].lower()}{words[1:]})"
        )
    except ValueError:
        return None, SyntaxFault(None, "", "a number with far too many digits")
