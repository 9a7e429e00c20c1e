"""rank: formats, orders, options, exit status."""

import csv
import io
import json
from pathlib import Path

import pytest

from tests.commands.conftest import BRIEF
from visionplan.commands.rank import ORDERS
from visionplan.solve.orders import ORDERS as SOLVED


def ranked(command, *arguments):
    """Exit status and the JSON."""
    status, out, err = command("rank", *arguments, "--format", "json")
    assert err == ""
    return status, json.loads(out)


def test_the_orders_are_the_solvers():
    assert tuple(SOLVED) == ORDERS


def test_rigs_that_fit(command):
    status, found = ranked(command, command.jar_lids)
    assert status == 0
    assert len(found["rigs"]) == 20
    assert [rig["rank"] for rig in found["rigs"]] == list(range(1, 21))
    assert all(rig["fits"] for rig in found["rigs"])
    assert found["pairs"] == command.rows("cameras") * command.rows("lenses")
    assert found["concessions"] == []


def test_nothing_fits(command):
    brief = command.brief(BRIEF.replace('"0.5 mm"', '"0.05 mm"'))
    status, found = ranked(command, brief, "--catalogue", command.demo)
    assert status == 1
    assert found["fitting"] == 0
    assert not any(rig["fits"] for rig in found["rigs"])
    assert found["concessions"]
    assert command("rank", brief, "--catalogue", command.demo)[0] == 1


@pytest.mark.parametrize(
    ("order", "figure", "sign"),
    [
        ("latitude", lambda rig: rig["latitude"], -1),
        ("depth", lambda rig: sum(rig["depth_mm"]), -1),
        ("snr", lambda rig: rig["snr"], -1),
        ("price", lambda rig: rig["price"], 1),
        ("sampling", lambda rig: rig["sampling_mm"], 1),
        ("length", lambda rig: rig["length_mm"], 1),
    ],
)
def test_orders(command, order, figure, sign):
    _, found = ranked(command, command.jar_lids, "--order", order, "--top", "7")
    figures = [sign * figure(rig) for rig in found["rigs"]]
    assert len(figures) == 7
    assert figures == sorted(figures)


def test_csv_has_a_row_a_rig(command):
    status, out, err = command("rank", command.jar_lids, "--format", "csv", "--top", "3")
    assert (status, err) == (0, "")
    heading, *rows = csv.reader(io.StringIO(out))
    assert len(rows) == 3
    assert {len(row) for row in rows} == {len(heading)}
    assert "working distance [mm]" in heading
    _, out, _ = command("rank", command.jar_lids, "--format", "csv", "--top", "3", "--units", "inch")
    inches = next(csv.DictReader(io.StringIO(out)))["working distance [in]"]
    assert float(inches) * 25.4 == pytest.approx(float(rows[0][heading.index("working distance [mm]")]))


def test_markdown_and_table(command):
    assert "\n| --- |" in command("rank", command.jar_lids, "--format", "markdown")[1]
    _, out, err = command("rank", command.jar_lids)
    assert err == ""
    assert "\x1b" not in out  # no terminal, no colour
    assert f"{ranked(command, command.jar_lids)[1]['fitting']} fit" in out


def test_the_width_is_the_readers(command, monkeypatch):
    for columns in (60, 80, 140):
        monkeypatch.setenv("COLUMNS", str(columns))
        out = command("rank", command.jar_lids)[1]
        assert max(map(len, out.splitlines())) <= columns
    for nonsense in ("0", "-5", "wide", ""):
        monkeypatch.setenv("COLUMNS", nonsense)
        assert command("rank", command.jar_lids)[0] == 0


def test_json_stays_in_millimetres(command):
    _, found = ranked(command, command.jar_lids)
    _, inches = ranked(command, command.jar_lids, "--units", "inch")
    assert inches == found


def test_the_units_of_the_brief_hold_where_none_are_said(command):
    _, found = ranked(command, command.jar_lids, "--top", "1")
    text = 'units = "inch"\n' + Path(command.jar_lids).read_text(encoding="utf-8")
    brief = command.brief(text)
    told = command("rank", brief, "--catalogue", command.demo, "--top", "1", "--format", "markdown")[1]
    assert f"{found['rigs'][0]['working_distance_mm'] / 25.4:.4g}" in told


def test_concessions_on_request(command):
    _, out, _ = command("rank", command.jar_lids, "--concessions", "--format", "json")
    assert json.loads(out)["concessions"] == []  # something fits already


@pytest.mark.parametrize("format", ["json", "csv", "markdown"])
def test_contradictions_are_told_beside_a_file(command, format):
    brief = command.brief(BRIEF.replace('"0.5 mm"', '"0.02 mm"\nabove = "20 mm"'))
    status, _, err = command("rank", brief, "--catalogue", command.demo, "--format", format)
    assert status == 1
    assert "contradict" in err
