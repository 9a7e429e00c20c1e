"""Change a line of a brief's text, keeping its comments and order."""

import re
from collections.abc import MutableMapping, MutableSequence
from typing import Any

from visionplan.brief.fields import BY_KEY
from visionplan.brief.forms import item, parse_value
from visionplan.faults import Fault, InputError


def set_line(text: str, key: str, value_text: str) -> str:
    """Set a line of a brief's text to what a person typed, as `parse_value` takes it.

    Raises
    ------
    InputError
        Where the line doesn't take the value, or the text isn't TOML.
    """
    line, raw = BY_KEY[key], parse_value(key, value_text)
    document = _document(text, key)
    if line.section and line.section not in document:
        import tomlkit

        document[line.section] = tomlkit.table()
    _put(_table(document, key), line.name, raw)
    return _text(document, text)


def drop_line(text: str, key: str) -> str:
    """Take an optional line out of a brief's text; the text itself where it hasn't got it.

    Raises
    ------
    InputError
        Where no brief can be without the line, or the text isn't TOML.
    """
    line = BY_KEY[key]
    if line.required:
        raise InputError(
            [Fault("", f"a brief can't be without {line.name}", f"a value such as {line.example}", column=key)]
        )
    document = _document(text, key)
    if line.section and line.section not in document:
        return text
    table = _table(document, key)
    if line.name not in table:
        return text
    del table[line.name]
    return _text(document, text)


def _document(text: str, key: str) -> MutableMapping:
    import tomlkit
    from tomlkit.exceptions import TOMLKitError

    try:
        return tomlkit.parse(text)
    except (TOMLKitError, ValueError, RecursionError):
        raise InputError([Fault("", "the brief's text has faults", "a text free of faults", column=key)]) from None


def _table(document: MutableMapping, key: str) -> MutableMapping:
    section = BY_KEY[key].section
    table = document[section] if section else document
    if not isinstance(table, MutableMapping):
        raise InputError([Fault("", f"{section} is no section", f"[{section}]", column=key)])
    return table


def _put(holder: Any, place: str | int, raw: Any) -> None:
    """Set one element, deep within what is there already, so that comments within lists and tables stay."""
    from tomlkit.items import AoT, InlineTable

    there = holder[place] if isinstance(place, int) or place in holder else None
    if isinstance(raw, dict) and isinstance(there, MutableMapping) and not isinstance(there, InlineTable):
        for name in [name for name in there if name not in raw]:
            del there[name]
        for name, value in raw.items():
            _put(there, name, value)
    elif isinstance(raw, list) and isinstance(there, MutableSequence):
        del there[len(raw) :]
        for number, element in enumerate(raw):
            if number < len(there):
                _put(there, number, element)
            else:
                there.append(element if isinstance(there, AoT) else item(element))
    elif there != raw:
        holder[place] = item(raw)


def _text(document: Any, before: str) -> str:
    text = document.as_string()
    return re.sub(r"\r?\n", "\r\n", text) if "\r\n" in before else text
