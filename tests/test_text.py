"""Text: safe for a terminal, Markdown and spreadsheets, and as wide as terminals draw it."""

import math
import unicodedata

import pytest
from hypothesis import given
from hypothesis import strategies as st
from markdown_it import MarkdownIt
from rich.cells import cell_len

from visionplan.text import clean, csv_cell, figure, markdown, pad, quoted, shorten, width

HOSTILE = [
    "\x1b[31mred\x1b[0m",
    "\x1b]0;title\x07",
    "\x9b31m",
    "a\nb\r\nc\td",
    "a\u202eb\u2066c",
    "nul\0del\x7f",
    "lone \ud800 surrogate",
    "line\u2028para\u2029nel\x85",
    "zero\u200bwidth\ufeff",
    "\U000e0041tag",
]


@pytest.mark.parametrize("text", HOSTILE)
def test_nothing_that_steers_a_terminal_is_left(text):
    shown = clean(text)
    assert shown.isprintable()
    assert not [character for character in shown if unicodedata.category(character)[0] == "C"]
    shown.encode()
    assert clean(shown) == shown


@given(st.text(st.characters()))
def test_cleaned_text_can_be_sent_and_is_as_it_was_where_harmless(text):
    shown = clean(text)
    shown.encode()
    assert not [c for c in shown if unicodedata.category(c) in ("Cc", "Cs", "Cn", "Zl", "Zp")]
    assert len(shown) == len(text)
    assert all(new == old for new, old in zip(shown, text) if old.isprintable())


def test_what_was_removed_can_still_be_seen():
    assert clean("A\x1b[1mB\nC\x7f\u202eD\u00a0E") == "A␛[1mB␊C␡\ufffdD E"
    assert clean("👩\u200d🔧 Ångström 検査") == "👩\u200d🔧 Ångström 検査"


@pytest.mark.parametrize(
    "text",
    ["plain", "", "Ångström", "A\u030angstro\u0308m", "検査機", "ｶﾒﾗ", "한국", "Ø µ Ω ×", "█▌─│", "…", "×😀", "हिन्दी"],
)
def test_width_is_what_rich_measures(text):
    assert width(text) == cell_len(text)


@given(st.text(st.characters(categories=["L", "N", "P", "Zs", "Mn"])), st.integers(0, 30))
def test_shortened_text_fits_and_says_that_it_was_cut(text, cells):
    short = shorten(text, cells)
    assert width(short) <= cells
    if width(text) <= cells:
        assert short == text
    elif cells:
        assert short.endswith("…")
        assert text.startswith(short[:-1])


def test_padding_counts_cells():
    assert pad("検", 4) == "検  "
    assert pad("12.5", 6, right=True) == "  12.5"
    assert pad("longer", 3) == "longer"
    assert len(quoted("x" * 10**6)) < 70


@pytest.mark.parametrize(
    ("value", "digits", "text"),
    [
        (312.44, 4, "312.4"),
        (312.0, 4, "312"),
        (12345.6, 4, "12346"),
        (0.00034567, 3, "0.000346"),
        (1e-7, 4, "0.0000001"),
        (1.5e-9, 4, "1.5e-9"),
        (2e20, 4, "2e20"),
        (9.9996, 4, "10"),
        (-0.0, 4, "0"),
        (-1e-300, 4, "-1e-300"),
        (None, 4, "not stated"),
        (math.nan, 4, "not stated"),
        (math.inf, 4, "∞"),
        (-math.inf, 4, "-∞"),
        (5, 4, "5"),
    ],
)
def test_figures(value, digits, text):
    assert figure(value, digits) == text


@given(st.floats(min_value=1e-7, max_value=9e14), st.integers(2, 8))
def test_figures_are_within_half_of_their_last_digit(value, digits):
    shown = figure(value, digits)
    assert "e" not in shown
    assert abs(float(shown) - value) <= 0.5000001 * 10.0 ** (math.floor(math.log10(value)) + 1 - digits)


MARKED = [
    "a|b",
    "*bold* _it_ **b** __c__ ~~d~~",
    "<script>alert(1)</script>",
    "<b>x</b> &amp; &lt;",
    "[link](http://example.com)",
    "![image](x.png)",
    "http://example.com/a?b=c",
    "www.example.com",
    "example.com//example.com ftp://example.com mailto:a@example.com",
    "someone@example.com",
    "`code` ``more``",
    "# heading",
    "- item",
    "+ item",
    "1. item",
    "2) item",
    "> quote",
    "back\\slash \\| pipe \\",
    "--- ",
    "===",
    "line\nbreak",
    "| --- |",
    "[ref]: http://example.com",
    "| a | b |\n|---|---|\n| <i> | `|` |",
    "$x$ $$y$$",
]


@pytest.fixture(scope="module")
def renderer():
    return MarkdownIt("gfm-like", {"html": True, "linkify": True})


def _shown(tokens) -> str:
    inner = [child for token in tokens for child in token.children or []]
    assert {child.type for child in inner} <= {"text", "html_inline", "text_special"}
    assert {child.content for child in inner if child.type == "html_inline"} <= {"<!-- -->"}
    return "".join(child.content for child in inner if child.type != "html_inline")


@pytest.mark.parametrize("text", MARKED)
def test_markdown_is_shown_as_typed(renderer, text):
    tokens = renderer.parse(markdown(text))
    assert [token.type for token in tokens] == ["paragraph_open", "inline", "paragraph_close"]
    assert _shown(tokens) == clean(text).strip()


@given(st.text(st.characters(max_codepoint=0x17F), min_size=1))
def test_no_text_breaks_a_markdown_table(text):
    table = f"| a | b |\n| --- | --- |\n| {markdown(text)} | end |\n"
    tokens = MarkdownIt("gfm-like", {"html": True, "linkify": True}).parse(table)
    cells = [tokens[at + 1] for at, token in enumerate(tokens) if token.type == "td_open"]
    assert len(cells) == 2
    assert _shown(cells[:1]) == clean(text).strip()
    assert cells[1].content == "end"


@pytest.mark.parametrize("text", ["=1+1", "+1", "-1+2", "@SUM(A1)", "\t=1", "\r=1", "＝1+1"])
def test_formulas_are_neutralised(text):
    assert csv_cell(text) == "'" + clean(text)


@pytest.mark.parametrize("text", ["25 mm", "a=b", "", "C-12", "x@y"])
def test_plain_text_stays(text):
    assert csv_cell(text) == text
