"""The Markdown as another reader sees it."""

import re
from dataclasses import replace

import pytest
from markdown_it import MarkdownIt

from tests.report.rankings import BRIEF, demo, small
from visionplan.report.markdown import ranking_markdown
from visionplan.text import clean

READER = MarkdownIt("gfm-like", {"html": True})
HOSTILE = [
    "a|b|c",
    "`code` ``x``",
    "<b>bold</b><script>alert(1)</script>",
    "[link](http://x.example) ![pic](y)",
    "http://x.example/a www.example.com me@example.com",
    "line\nbreak\r\n# heading\n- item",
    "\x1b[31mred\x1b[0m",
    "**bold** _it_ ~~gone~~ *",
    "\\| back\\slash \\",
    "&lt;b&gt; &amp; &#124;",
    "1. one",
    "---",
]


def tables(text):
    """Each table as rows of cells, and the kinds of inline tokens found in cells."""
    found, kinds = [], set()
    for token in READER.parse(text):
        if token.type == "table_open":
            found.append([])
        elif token.type == "tr_open":
            found[-1].append([])
        elif token.type == "inline" and found and found[-1] and len(found[-1][-1]) < 99 and token.level >= 4:
            found[-1][-1].append("".join(child.content for child in token.children or ()))
            kinds |= {child.type for child in token.children or ()}
    return found, kinds


def test_the_table_reads_back(each_demo):
    found, _ = tables(ranking_markdown(each_demo))
    assert len(found) == len({rig.fits for rig in each_demo.rigs})
    rows = [dict(zip(head, row)) for head, *body in found for row in body]
    assert [int(row["#"]) for row in rows] == [rig.rank for rig in each_demo.rigs]
    for row, rig in zip(rows, each_demo.rigs):
        assert (row["camera"], row["lens"]) == (rig.camera, rig.lens)
        assert float(row["working distance"].removesuffix(" mm")) == pytest.approx(rig.working_distance, rel=1e-3)


@pytest.mark.parametrize("name", HOSTILE)
def test_text_of_files_is_shown_as_typed_and_nothing_else(name):
    ranking = small([{"id": name, "interface": name}, {"id": "K9", "price": 900.0, "interface": name}], [{"id": name}])
    brief = replace(BRIEF, title=name)
    text = ranking_markdown(replace(ranking, brief=brief))
    found, kinds = tables(text)
    assert kinds <= {"text", "text_special", "html_inline"}
    row = found[0][1]
    shown = [re.sub("<!-- -->", "", cell) for cell in row]
    assert [shown[1].removesuffix(" +1"), shown[2]] == [clean(name).strip()] * 2
    assert {len(row) for row in found[0]} == {len(found[0][0])}
    everything = [token for token in READER.parse(text) if token.type == "inline"]
    inline = {child.type for token in everything for child in token.children or ()}
    assert inline <= {"text", "text_special", "html_inline", "strong_open", "strong_close", "softbreak"}
    comments = [child.content for token in everything for child in token.children or () if child.type == "html_inline"]
    assert set(comments) <= {"<!-- -->"}
    assert [token.tag for token in READER.parse(text) if token.type == "heading_open"] == ["h1"]
    assert "\x1b" not in text


def test_stable_line_by_line():
    ranking = demo("jar-lids", 12)
    text = ranking_markdown(ranking)
    assert text == ranking_markdown(replace(ranking, seconds=99.0))
    dearer = replace(ranking, rigs=(*ranking.rigs[:5], replace(ranking.rigs[5], price=9999.0), *ranking.rigs[6:]))
    changed = [one for one, other in zip(text.splitlines(), ranking_markdown(dearer).splitlines()) if one != other]
    assert len(changed) == 1


def test_concessions_and_notes_are_lists():
    ranking = demo("rim-cracks", 12)
    tokens = READER.parse(ranking_markdown(ranking))
    items = sum(token.type == "list_item_open" for token in tokens)
    assert items >= len(ranking.concessions) > 0
    assert "instead of 190 × 150 mm" in ranking_markdown(ranking)


def test_inches():
    found, _ = tables(ranking_markdown(demo("spout-gauge", 12), "inch"))
    column = found[0][0].index("working distance")
    assert all(row[column].endswith(" in") for row in found[0][1:])


def test_gaps_break_nothing(each_random):
    found, _ = tables(ranking_markdown(each_random))
    for table in found:
        assert {len(row) for row in table} == {len(table[0])}
