"""The edge where text leaves the program: results to standard output, everything else to standard error."""

import codecs
import io
import os
import sys
from contextlib import suppress
from typing import NamedTuple

from visionplan.faults import Fault, InputError
from visionplan.text import clean

_PLAIN = str.maketrans(
    {
        "µ": "u",
        "−": "-",
        "–": "-",
        "—": "-",
        "→": "->",
        "×": "x",
        "·": "*",
        "≥": ">=",
        "≤": "<=",
        "√": "sqrt",
        "Σ": "sum",
        "…": "~",
        "²": "^2",
        "³": "^3",
        "⁴": "^4",
        "⁻": "^-",
        "¹": "1",
        "½": "1/2",
        "±": "+-",
        "∞": "inf",
        "°": "deg",
        "β": "beta",
        "η": "eta",
        "θ": "theta",
        "κ": "kappa",
        "λ": "lambda",
        "ρ": "rho",
        "σ": "sigma",
        "τ": "tau",
    }
)
"""What a terminal that lacks a sign shows instead; what isn't here becomes a question mark."""


def prepare() -> None:
    """Let no sign that the terminal lacks end the program."""
    codecs.register_error("visionplan", _replaced)
    for stream in (sys.stdout, sys.stderr):
        if isinstance(stream, io.TextIOWrapper):
            stream.reconfigure(errors="visionplan")


def _replaced(error: UnicodeError) -> tuple[str, int]:
    assert isinstance(error, UnicodeEncodeError)
    plain = error.object[error.start : error.end].translate(_PLAIN)
    return plain.encode("ascii", "replace").decode(), error.end


def results(text: str) -> None:
    """Write a result for people to standard output.

    Raises
    ------
    BrokenPipeError
        Where nobody reads it any longer.
    InputError
        Where it can't be written.
    """
    _write(text, None)


def data(text: str) -> None:
    """Write a result that programs read: UTF-8 in every locale, but on a terminal what that can show."""
    _write(text, None if sys.stdout is not None and sys.stdout.isatty() else "utf-8")


def _write(text: str, encoding: str | None) -> None:
    if sys.stdout is None:
        raise InputError([Fault("standard output", "is closed", "a terminal, a file or a pipe")])
    try:
        if encoding is None:
            sys.stdout.write(text)
        else:
            sys.stdout.flush()
            sys.stdout.buffer.write(text.encode(encoding, "replace"))
        sys.stdout.flush()
    except BrokenPipeError:
        _abandon()
        raise
    except OSError as error:
        _abandon()
        raise InputError([Fault("standard output", f"can't be written: {error.strerror}")]) from None


def _abandon() -> None:
    """Send what is left in the buffer nowhere, or the interpreter would complain of it on its way out."""
    with suppress(OSError):
        nowhere = os.open(os.devnull, os.O_WRONLY)
        os.dup2(nowhere, sys.stdout.fileno())
        os.close(nowhere)


def complain(*messages: str) -> None:
    """Tell something on standard error, a line each."""
    if sys.stderr is not None:
        with suppress(OSError):
            sys.stderr.write("".join(f"visionplan: {clean(message.strip())}\n" for message in messages))
            sys.stderr.flush()


class Screen(NamedTuple):
    """What standard output can show."""

    columns: int
    colour: bool
    ascii: bool


def screen() -> Screen:
    """COLUMNS, else the terminal's width, else 80; colour on a terminal without NO_COLOR."""
    import shutil

    out = sys.stdout
    terminal = out is not None and out.isatty()
    colour = terminal and not os.environ.get("NO_COLOR") and os.environ.get("TERM") != "dumb"
    return Screen(max(40, shutil.get_terminal_size().columns), colour, _lacks_signs(getattr(out, "encoding", None)))


def _lacks_signs(encoding: str | None) -> bool:
    try:
        "…×·→β".encode(encoding or "ascii")
    except UnicodeEncodeError:
        return True
    return False
