"""Text for the clipboard of the terminal at the user's end: OSC 52, wrapped where a multiplexer stands between."""

import base64
from collections.abc import Mapping

MOST = 74_000
"""Characters of the sequence: what many terminals take at most (common practice)."""
_CHUNK = 500
"""What GNU screen passes on at a time, with room to spare."""


def sequence(text: str, environment: Mapping[str, str]) -> str | None:
    """The control sequence that copies a text; None where it is too long for a terminal to take.

    Within tmux it is sent twice: as it is, which tmux takes over where set-clipboard is on, and wrapped, which it
    passes on where allow-passthrough is on.
    """
    coded = base64.b64encode(text.encode()).decode()
    if len(coded) > MOST:
        return None
    plain = f"\x1b]52;c;{coded}\x07"
    if environment.get("TMUX"):
        inner = plain.replace("\x1b", "\x1b\x1b")
        return plain + f"\x1bPtmux;{inner}\x1b\\"
    if environment.get("STY"):
        chunks = (plain[at : at + _CHUNK] for at in range(0, len(plain), _CHUNK))
        return "".join(f"\x1bP{chunk}\x1b\\" for chunk in chunks)
    return plain


def advice(environment: Mapping[str, str], instead: str = "export to a file instead (x)") -> str:
    """What to do where nothing arrives."""
    if environment.get("TMUX"):
        return "If pasting gives nothing: tmux set -g set-clipboard on"
    return f"If pasting gives nothing, the terminal refuses it: {instead}"
