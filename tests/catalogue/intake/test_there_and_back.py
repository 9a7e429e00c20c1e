"""A copy of the demo works, permuted, renamed, in other units and with decimal commas, comes back value by value."""

import csv
import io
import json
import re
import tempfile
from decimal import Decimal
from pathlib import Path

import numpy as np
from hypothesis import given, settings
from hypothesis import strategies as st
from openpyxl import Workbook

from visionplan.catalogue.folder import read_catalogue
from visionplan.catalogue.intake.take import take
from visionplan.demo import demo_folder

ITEMS = ("lenses", "cameras", "spacers")
DEMO = read_catalogue(demo_folder())
# How many of the second unit one of the first is: worked by hand.
UNITS = {
    "mm": [("mm", "1"), ("cm", "0.1"), ("µm", "1000"), ("m", "0.001")],
    "µm": [("µm", "1"), ("um", "1"), ("nm", "1000"), ("mm", "0.001")],
    "m": [("m", "1"), ("cm", "100"), ("mm", "1000")],
    "g": [("g", "1"), ("kg", "0.001"), ("mg", "1000")],
    "%": [("%", "1"), ("", "0.01"), ("ppm", "10000")],
    "µs": [("µs", "1"), ("μs", "1"), ("ms", "0.001"), ("ns", "1000")],
    "1/s": [("1/s", "1"), ("Hz", "1"), ("kHz", "0.001"), ("fps", "1")],
    "W": [("W", "1"), ("mW", "1000")],
    "e-": [("e-", "1"), ("ke-", "0.001")],
    "deg": [("deg", "1"), ("°", "1"), ("arcmin", "60")],
    "lp/mm": [("lp/mm", "1"), ("lp/cm", "10")],
}
NUMBER = re.compile(r"[+-]?\d+(\.\d+)?")
WORDS = ("area", "line", "mono", "colour", "global", "rolling", "entocentric", "telecentric")


def demo_rows(item):
    with (demo_folder() / f"{item}.csv").open(newline="", encoding="utf-8") as file:
        return list(csv.reader(file))


def is_text(name):
    return name in ("id", "mount", "maker", "interface")


class Strange:
    """One item's rows as somebody else writes them, and the map that undoes it."""

    def __init__(self, item, draw, decimal):
        self.item, self.decimal = item, decimal
        (top, *rows) = demo_rows(item)
        self.order = draw(st.permutations(range(len(top))))
        self.rows = draw(st.permutations(rows))
        self.columns = []
        for at in self.order:
            name, _, unit = top[at].removesuffix("]").partition(" [")
            heading = f"Spalte {draw(st.integers(0, 9))}.{at} „{name[::-1]}“"
            theirs, times = draw(st.sampled_from(UNITS[unit])) if unit else ("", "1")
            factor = draw(st.sampled_from([1, 10, 0.5])) if unit else 1
            self.columns.append((at, name, heading, theirs, Decimal(times) / Decimal(str(factor)), factor))

    def number(self, text, times):
        """A cell's number in the other unit; None where it is no number."""
        return Decimal(text) * times if NUMBER.fullmatch(text) else None

    def word(self, name, text):
        return text.upper()[::-1] if name in ("kind", "colour", "shutter") else text

    def cell(self, name, text, times):
        number = None if is_text(name) else self.number(text, times)
        if number is not None:
            return format(number, "f").replace(".", self.decimal)
        if name == "stops":
            return text.replace(".", self.decimal)
        return self.word(name, text)

    def table(self):
        headings = [heading for _, _, heading, *_ in self.columns]
        body = [[self.cell(name, row[at], times) for at, name, _, _, times, _ in self.columns] for row in self.rows]
        return [headings, *body]

    def typed(self):
        """The same with numbers as numbers, as a workbook has them."""
        headings = [heading for _, _, heading, *_ in self.columns]
        body = [
            [self.typed_cell(name, row[at], times) for at, name, _, _, times, _ in self.columns] for row in self.rows
        ]
        return [headings, *body]

    def typed_cell(self, name, text, times):
        number = None if is_text(name) else self.number(text, times)
        return float(number) if number is not None else self.cell(name, text, times)

    def section(self, settings):
        quoted = json.dumps
        words = ", ".join(f"{quoted(word.upper()[::-1])} = {quoted(word)}" for word in WORDS)
        lines = [f"[{self.item}]", *settings, f"decimal = {quoted(self.decimal)}", f"[{self.item}.columns]"]
        for _, name, heading, unit, _, factor in self.columns:
            lines.append(
                f"{quoted(heading)} = {{ is = {quoted(name)}, unit = {quoted(unit)}, factor = {factor}, "
                f"words = {{ {words} }} }}"
            )
        return "\n".join(lines) + "\n"


def assert_like_the_demo(folder):
    there = read_catalogue(folder)
    for item in ITEMS:
        back, before = getattr(there, item), getattr(DEMO, item)
        assert set(back.index) == set(before.index)
        order = [back.index[name] for name in before["id"]]
        for name, values in before.values.items():
            if isinstance(values, np.ndarray):
                np.testing.assert_allclose(back[name][order], values, rtol=1e-12, err_msg=name)
            else:
                assert [back[name][row] for row in order] == values, name


@settings(max_examples=12, deadline=None)
@given(st.data())
def test_csv(data):
    draw = data.draw
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        for item in ITEMS:
            strange = Strange(item, draw, draw(st.sampled_from(".,")))
            delimiter = draw(st.sampled_from(";\t|~" if strange.decimal == "," else ";,\t|~"))
            encoding = draw(st.sampled_from(["utf-8", "utf-8-sig", "utf-16", "utf-16-le"]))
            text = io.StringIO()
            csv.writer(text, delimiter=delimiter).writerows([[], ["our prices"], [], *strange.table()])
            (folder / "sheet.csv").write_bytes(text.getvalue().encode(encoding))
            settings = ["heading = 4", f"delimiter = {json.dumps(delimiter)}"]
            (folder / "map.toml").write_text(strange.section(settings), encoding="utf-8")
            take(str(folder / "sheet.csv"), str(folder / "map.toml"), str(folder / "parts"))
        assert_like_the_demo(folder / "parts")


@settings(max_examples=4, deadline=None)
@given(st.data())
def test_workbook(data):
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        book, text = Workbook(), ""
        for item in ITEMS:
            strange = Strange(item, data.draw, ",")
            sheet = book.create_sheet(f"Blatt {item}")
            for row in [["our prices"], *strange.typed()]:
                sheet.append(row)
            text += strange.section([f'worksheet = "Blatt {item}"', "heading = 2"])
        book.save(folder / "sheet.xlsx")
        (folder / "map.toml").write_text(text, encoding="utf-8")
        take(str(folder / "sheet.xlsx"), str(folder / "map.toml"), str(folder / "parts"))
        assert_like_the_demo(folder / "parts")
