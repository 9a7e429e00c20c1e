from hypothesis import given
from hypothesis import strategies as st

from visionplan.report.lines import to_ascii, wrap
from visionplan.text import width

WORDS = st.text("ab漢é-", max_size=30).map(str.strip)


@given(st.lists(WORDS, max_size=12), st.integers(8, 40), st.sampled_from(["", "    "]), st.sampled_from(["", "a "]))
def test_wrapped_lines_fit_and_lose_nothing(words, cells, indent, first):
    lines = wrap(" ".join(words), cells, indent, first)
    assert all(width(line) <= cells for line in lines)
    assert lines[0].startswith(first)
    assert all(line.startswith(indent) for line in lines[1:])
    kept = "".join([lines[0][len(first) :], *(line[len(indent) :] for line in lines[1:])])
    assert kept.replace(" ", "") == "".join(words)


def test_breaks_at_spaces():
    assert wrap("one two three four", 9, "  ") == ["one two", "  three", "  four"]


@given(st.text(max_size=40))
def test_ascii_keeps_columns(line):
    plain = to_ascii(line)
    assert plain.isascii()
    assert len(plain) == len(line)


def test_ascii_keeps_meaning_where_it_can():
    assert to_ascii("2 × 1 — 5 µm … −3") == "2 x 1 - 5 um ~ -3"
