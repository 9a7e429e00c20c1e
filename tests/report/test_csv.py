import csv
import io
import re
from dataclasses import replace

import pytest

from tests.report.rankings import small
from visionplan.report.csv import ranking_csv


def read(text):
    return list(csv.DictReader(io.StringIO(text, newline="")))


def test_a_row_a_rig_with_its_numbers(each_demo):
    rows = read(ranking_csv(each_demo))
    assert len(rows) == len(each_demo.rigs)
    for row, rig in zip(rows, each_demo.rigs):
        assert (row["camera"], row["lens"], int(row["rank"])) == (rig.camera, rig.lens, rig.rank)
        assert float(row["working distance [mm]"]) == pytest.approx(rig.working_distance, rel=1e-9)
        assert float(row["latitude [%]"]) == pytest.approx(100 * rig.latitude, rel=1e-9)
        assert row["fits"] == ("yes" if rig.fits else "no")
        assert (row["pinch low"], row["pinch high"]) == rig.pinch
        assert [float(stop) for stop in row["stops that fit"].split()] == list(rig.stops)


def test_every_heading_once_and_every_row_as_long():
    rows = list(csv.reader(io.StringIO(ranking_csv(small([{}, {"id": "K6", "price": 510.0}])), newline="")))
    assert len(set(rows[0])) == len(rows[0])
    assert {len(row) for row in rows} == {len(rows[0])}


def test_inches_are_in_the_headings():
    ranking = small()
    mm, inch = (read(ranking_csv(ranking, system))[0] for system in ("mm", "inch"))
    for heading in mm:
        if heading.endswith("[mm]"):
            other = inch[heading.replace("[mm]", "[in]")]
            assert (float(mm[heading]) if mm[heading] else "") == (pytest.approx(25.4 * float(other)) if other else "")
    assert not any("[mm]" in heading for heading in inch)


def test_gaps_are_empty_cells(each_random):
    text = ranking_csv(each_random)
    assert not re.search(r"\b(nan|inf|None)\b", text)


@pytest.mark.parametrize("name", ["=1+1", "+1", "-1", "@x", "\t=1", "＝1"])
def test_no_text_cell_starts_a_formula(name):
    ranking = small([{"id": name}], [{"id": f'{name}", =2'}])
    text = ranking_csv(ranking)
    row = read(text)[0]
    assert row["camera"].startswith("'")
    assert row["lens"].startswith("'")
    for cell in row.values():
        assert not cell.startswith(("=", "+", "@", "\t", "＝"))


def test_numbers_stay_numbers():
    rig = replace(small().rigs[0], contrast=small().rigs[0].contrast._replace(above=-0.25))
    row = read(ranking_csv(replace(small(), rigs=(rig,))))[0]
    assert float(row["contrast nearest [%]"]) == -25


def test_text_breaks_no_row():
    ranking = small([{"id": 'a\n"b",\x1b[0m\r\nc'}])
    text = ranking_csv(ranking)
    assert text.count("\n") == 2
    assert "\x1b" not in text
    assert read(text)[0]["camera"] == 'a␊"b",␛[0m␍␊c'


def test_currency_in_the_heading():
    ranking = small()
    catalogue = replace(ranking.catalogue, cameras=replace(ranking.catalogue.cameras, currency="EUR"))
    assert float(read(ranking_csv(replace(ranking, catalogue=catalogue)))[0]["price [EUR]"]) == 600
