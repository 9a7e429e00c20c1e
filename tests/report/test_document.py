"""The shortlist as a document, parsed back."""

import difflib
from dataclasses import replace
from itertools import pairwise

import pytest
from markdown_it import MarkdownIt

from tests.solve.traced import BRIEF, CAMERA, LENS, RINGS, catalogue
from visionplan.brief.forms import value_text
from visionplan.report.document import comparison_document, shortlist_document
from visionplan.report.shortlist import Entry
from visionplan.solve import judge_one, rank
from visionplan.text import clean

HOSTILE = [
    "a|b",
    "`x`",
    "```",
    "<img src=x>",
    "[l](http://e.org)",
    "*b*",
    "\x1b[31m",
    "# h",
    "a\nb",
    "- x",
    "www.e.org",
]


def shortlist(name="lens", note="", brief=BRIEF, top=2):
    lenses = [{**LENS, "id": name}, {**LENS, "id": f"{name} 2", "focal length": 17.0, "price": None}]
    works = catalogue(lenses, [{**CAMERA, "id": f"camera {name}"}], RINGS)
    ranking = rank(brief, works, top=top)
    return ranking, [Entry(rig, note) for rig in ranking.rigs]


def document(*given, date="2031-02-03", system="mm", **more):
    return shortlist_document(*shortlist(*given, **more), date, system)


def headings(text, tag):
    tokens = MarkdownIt("gfm-like", {"linkify": False}).parse(text)
    return [
        tokens[n + 1].content for n, token in enumerate(tokens) if token.type == "heading_open" and token.tag == tag
    ]


def tables(text):
    """Cells as they are shown, table by table."""
    found, tokens = [], MarkdownIt("gfm-like", {"linkify": False}).parse(text)
    for before, token in pairwise(tokens):
        if token.type == "table_open":
            found.append([])
        elif token.type == "tr_open":
            found[-1].append([])
        elif before.type in ("th_open", "td_open"):
            found[-1][-1].append("".join(child.content for child in token.children))
    return found


def test_everything_that_was_asked_chosen_from_and_chosen_stands_there():
    text = document(
        brief=replace(BRIEF, title="Lids", stated=frozenset({"scene.field", "title"})), note="ask for stock"
    )
    assert text.startswith("# Lids: shortlist\n")
    for words in ("2031-02-03", "sha256:by hand", "ask for stock", "Gaussian conjugates", "Rayleigh criterion"):
        assert words in text
    assert headings(text, "h2") == [
        *("Brief", "Comparison", "1. camera lens with lens", "2. camera lens with lens 2", "Assumptions", "Sources")
    ]
    assert headings(text, "h3")[:3] == ["Span", "Bill of materials", "Set-up sheet: camera lens with lens"]
    asked = tables(text)[0]
    assert ["scene.field", "120 mm, 90 mm", "Width and height that must be in the picture"] in asked
    fences = [t for t in MarkdownIt().parse(text) if t.type == "fence"]
    assert len(fences) == 4


def test_the_bill_counts_every_piece_and_adds_up():
    wide = replace(BRIEF, field=(400.0, 60.0), max_count=4)
    ranking, _ = shortlist(brief=wide)
    rig = judge_one(wide, ranking.catalogue, "camera lens", "lens", rings=["R0.5", "R0.5"])
    assert rig.grid[0] > 1
    entries = [Entry(rig)]
    bill = tables(shortlist_document(ranking, entries, "today"))[-1]
    cost = {row[1]: (int(row[2]), float(row[3]), float(row[4])) for row in bill[1:-1]}
    count = rig.grid[0] * rig.grid[1]
    assert cost["camera lens"] == (count, 500, 500 * count)
    assert cost["lens"] == (count, 200, 200 * count)
    assert {ring: entry[0] for ring, entry in cost.items() if ring[0] == "R"} == {
        ring: count * rig.spacers.count(ring) for ring in rig.spacers
    }
    assert sum(entry[2] for entry in cost.values()) == pytest.approx(float(bill[-1][4])) == pytest.approx(rig.price)


def test_a_price_that_is_not_stated_leaves_the_total_open():
    bill = tables(document())[-1]
    assert bill[-1][-1] == "not stated"
    assert "nan" not in document()


@pytest.mark.parametrize("name", HOSTILE)
def test_names_stay_text(name):
    brief = replace(BRIEF, title=name, stated=frozenset({"title"}), source=name)
    text = document(name, name, brief=brief, date=name)
    plain = document("plain", "plain", brief=replace(brief, title="plain", source="plain"), date="plain")
    kinds = lambda text: [token.type for token in MarkdownIt("gfm-like", {"linkify": False}).parse(text)]  # noqa: E731
    assert kinds(text) == kinds(plain)
    tokens = MarkdownIt("gfm-like", {"linkify": False}).parse(text)
    inline = {child.type for token in tokens for child in token.children or []}
    assert inline <= {"text", "strong_open", "strong_close", "text_special", "softbreak"}
    asked = {row[0]: row[1] for row in tables(text)[0]}
    assert asked["title"] == clean(value_text(brief, "title"))


def test_the_same_work_gives_the_same_lines_and_a_change_only_its_own():
    assert document() == document()
    before, after = document(note="first").split("\n"), document(note="second").split("\n")
    changed = [line for line in difflib.ndiff(before, after) if line[0] in "+-"]
    assert len(changed) == 4
    assert all("note" in line.lower() or "first" in line or "second" in line for line in changed)


def test_inches():
    assert " in " in document(system="inch")


@pytest.mark.parametrize("name", HOSTILE)
def test_comparison_alone_is_the_documents_table_with_the_notes_under_it(name):
    ranking, entries = shortlist(name, note=name)
    (alone,) = tables(comparison_document(ranking, entries))
    assert alone[:-1] in tables(shortlist_document(ranking, entries, "today"))
    assert len(alone[-1]) == len(alone[0])
    plain = tables(comparison_document(ranking, [Entry(entry.rig) for entry in entries]))
    assert plain == [alone[:-1]]
