"""What is read from good files: values, units, lines, notes."""

import csv
import io
import math
import tracemalloc

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from visionplan.catalogue.items import COLUMNS
from visionplan.catalogue.ledger import Ledger
from visionplan.catalogue.read import read_table
from visionplan.catalogue.rows import CHUNK

TOP = "id,mount,pixels wide,pixels high,pixel pitch [µm]"


def camera(heading, *cells):
    rows = "".join(f"K{k},C,2448,2048,3.5,{cell}\n" for k, cell in enumerate(cells))
    return f"{TOP},{heading}\n{rows}"


def test_columns_are_in_core_units_and_what_is_left_out_is_not_stated(works):
    catalogue = works.read(spacers="id,mount,length [cm]\nS,C,0.5\n")
    lenses, cameras, spacers = catalogue.lenses, catalogue.cameras, catalogue.spacers
    assert lenses["id"] == ["L25", "L50"]
    assert lenses["focal length"].tolist() == [25, 50]
    assert cameras["pixel pitch"].tolist() == [0.0035]
    assert spacers["length"].tolist() == [5]
    assert np.isnan(lenses["front principal"]).all()
    assert lenses["maker"] == ["", ""]
    assert lenses["stops"] == [(), ()]
    assert (len(lenses), len(cameras), len(spacers)) == (2, 1, 1)
    assert lenses.index == {"L25": 0, "L50": 1}
    assert list(lenses.lines) == [2, 3]
    assert catalogue.warnings == ()
    for item, columns in COLUMNS.items():
        table = getattr(catalogue, item)
        assert {column.name for column in columns} == set(table.values)
        assert all(len(table[column.name]) == len(table) for column in columns)


def test_spacers_may_be_left_out(works):
    assert len(works.read().spacers) == 0


@pytest.mark.parametrize(
    ("heading", "cell", "name", "value"),
    [
        ("length [m]", "0.04", "length", 40),
        ("length [in]", "2", "length", 50.8),
        ("length [yard]", "1", "length", 914.4),
        ("length", "40 mm", "length", 40),
        ("length [cm]", "40 mm", "length", 40),
        ("length [cm]", " 4 ", "length", 40),
        ("length [mm]", "4e1", "length", 40),
        ("Length  [mm]", "40", "length", 40),
        ("length[mm]", "40", "length", 40),
        ("mass [kg]", "0.2", "mass", 200),
        ("frame rate [Hz]", "30", "frame rate", 30),
        ("frame rate [1/min]", "30", "frame rate", 0.5),
        ("frame rate [fps]", "30", "frame rate", 30),
        ("line rate", "20 kHz", "line rate", 20_000),
        ("shortest exposure [\u00b5s]", "20", "shortest exposure", 20e-6),
        ("shortest exposure [\u03bcs]", "20", "shortest exposure", 20e-6),
        ("shortest exposure [us]", "20", "shortest exposure", 20e-6),
        ("quantum efficiency [%]", "64", "quantum efficiency", 0.64),
        ("quantum efficiency", "0.64", "quantum efficiency", 0.64),
        ("quantum efficiency", "64 %", "quantum efficiency", 0.64),
        ("dark noise [e-]", "0", "dark noise", 0),
        ("saturation capacity [ke-]", "10.6", "saturation capacity", 10_600),
        ("power [mW]", "3200", "power", 3.2),
        ("cable limit [m]", "100", "cable limit", 100_000),
        ("price", "640", "price", 640),
        ("price [EUR]", "640.50", "price", 640.5),
        ("price", "0", "price", 0),
        ("stock", "0", "stock", 0),
        ("bit depth", "12", "bit depth", 12),
        ("bit depth [bit]", "12", "bit depth", 12),
    ],
)
def test_any_unit_of_the_right_dimension(works, heading, cell, name, value):
    assert works.read(cameras=camera(heading, cell)).cameras[name] == pytest.approx([value], rel=1e-14)


@pytest.mark.parametrize(
    ("heading", "cell", "name", "value"),
    [
        ("detail limit [lp/mm]", "120", "detail limit", 120),
        ("detail limit", "1200 lp/cm", "detail limit", 120),
        ("distortion [%]", "-0.5", "distortion", -0.005),
        ("front principal [mm]", "-3", "front principal", -3),
        ("front principal [mm]", "0", "front principal", 0),
        ("telecentricity [°]", "0.1", "telecentricity", math.radians(0.1)),
        ("transmittance [%]", "100", "transmittance", 1),
        ("pupil ratio", ".8", "pupil ratio", 0.8),
        ("focal tolerance [%]", "5", "focal tolerance", 0.05),
    ],
)
def test_quantities_of_lenses(works, heading, cell, name, value):
    assert works.read(lenses=works.lens(heading, cell)).lenses[name] == pytest.approx([value], rel=1e-14)


def test_words_and_stops(works):
    text = "id,mount,focal length [mm],f-number min,f-number max,nearest object [mm],kind,stops\n"
    text += "L,C,25,1.8,16,200, Entocentric ,8 2.8 5.6\nM,C,25,1.8,16,200,,\n"
    lenses = works.read(lenses=text).lenses
    assert lenses["kind"] == ["entocentric", ""]
    assert lenses["stops"] == [(2.8, 5.6, 8.0), ()]


def test_a_telecentric_lens_states_other_columns(works):
    text = "id,mount,kind,magnification,working distance [mm],f-number min\nT,C,telecentric,0.5,110,8\n"
    lenses = works.read(lenses=text).lenses
    assert lenses["magnification"].tolist() == [0.5]
    assert np.isnan(lenses["focal length"]).all()


def test_cells_with_and_without_units_side_by_side(works):
    cameras = works.read(cameras=camera("length [mm]", "40", "4 cm", "", "1.5 in", "40.5")).cameras
    assert cameras["length"] == pytest.approx([40, 40, np.nan, 38.1, 40.5], nan_ok=True)


def test_byte_order_mark_carriage_returns_and_blank_lines(works):
    text = "\ufeff\r\n" + camera("maker", "a", "b").replace("\n", "\r\n") + "\r\n,,,,,\r\nZ,C,1,1,3.5,c\r\n\r\n"
    cameras = works.read(cameras=text).cameras
    assert cameras["id"] == ["K0", "K1", "Z"]
    assert list(cameras.lines) == [3, 4, 7]
    assert works.read(cameras=camera("maker", "a", "b").replace("\n", "\r")).cameras["maker"] == ["a", "b"]


def test_quoted_line_breaks_commas_and_quotes_keep_the_lines_right(works):
    text = camera("maker", '"two\nlines, and ""quotes"""', '"three\r\n\r\nlines"', "one")
    cameras = works.read(cameras=text).cameras
    assert cameras["maker"] == ['two\nlines, and "quotes"', "three\r\n\r\nlines", "one"]
    assert list(cameras.lines) == [2, 4, 7]
    fault = works.fault(cameras=text + "K9,C,-1,2048,3.5,late\n")
    assert fault.line == 8


def test_unknown_columns_are_kept_as_notes_and_told_once(works):
    catalogue = works.read(cameras=f"{TOP},IP class,lenght [mm],,IP class,\nK,C,10,10,3.5,67,40,,x,y\n")
    cameras = catalogue.cameras
    assert cameras.notes == ("IP class", "lenght [mm]", "IP class (column 9)", "(column 10)")
    assert [cameras[note] for note in cameras.notes] == [["67"], ["40"], ["x"], ["y"]]
    (warning,) = catalogue.warnings
    assert "cameras.csv" in warning
    assert "'lenght [mm]' (is 'length' meant?)" in warning


def test_hostile_names_are_kept_as_data(works):
    names = ["\x1b[31mred\x1b[0m", "[bold]x[/bold]", "a|b", "=1+1", "../../etc", "\u202egnirts", "検査", "a\tb"]
    cameras = works.read(cameras=TOP + "\n" + "".join(f"{name},C,10,10,3.5\n" for name in names)).cameras
    assert cameras["id"] == names


def test_a_megabyte_in_one_cell_is_data_where_text_stands(works):
    text = "x" * 1_000_000
    assert works.read(cameras=camera("maker", text)).cameras["maker"] == [text]
    fault = works.fault(cameras=camera("length [mm]", "4" * 1_000_000))
    assert (fault.line, fault.column) == (2, "length [mm]")
    assert len(str(fault)) < 300


def test_the_fingerprint_follows_the_bytes(works):
    first = works.read().fingerprint
    assert first.startswith("sha256:")
    assert len(first) == 7 + 64
    assert works.read().fingerprint == first
    assert works.read(spacers="id,mount,length [mm]\n").fingerprint != first
    (works.folder / "spacers.csv").unlink()
    (works.folder / "unrelated.csv").write_text("x")
    assert works.read().fingerprint == first
    assert works.read(cameras=camera("maker", "x")).fingerprint != first


@pytest.mark.parametrize("rows", [1, CHUNK - 2, CHUNK - 1, CHUNK, CHUNK + 1, 2 * CHUNK - 1, 2 * CHUNK + 5])
def test_rows_at_the_seams_of_chunks(rows):
    data = camera("length [mm]", *map(str, range(1, rows + 1))).encode()
    ledger = Ledger("cameras.csv")
    table = read_table(data, "cameras", ledger)
    assert ledger.faults() == []
    assert table["length"].tolist() == list(range(1, rows + 1))
    assert list(table.lines) == list(range(2, rows + 2))


def test_memory_follows_the_table_and_not_the_cells():
    heading = "length [mm],mass [g],cable limit [mm],power [W],frame rate [Hz],line rate [Hz],maker"
    rows = "".join(f"K{k},C,2448,2048,3.5,{k + 1},{k + 1},{k + 1},{k + 1},{k + 1},{k + 1},M\n" for k in range(40_000))
    data = f"{TOP},{heading}\n{rows}".encode()
    tracemalloc.start()
    table = read_table(data, "cameras", Ledger("cameras.csv"))
    kept, peak = tracemalloc.get_traced_memory()
    tracemalloc.stop()
    assert len(table) == 40_000
    # 40,000 rows of 12 cells are 25 MB as strings; the columns of numbers are put together once from their chunks.
    assert peak - kept < 2 * len(data) + 4_000_000


@given(
    st.lists(
        st.tuples(st.text(st.characters(exclude_characters="\0", codec="utf-8")), st.integers(1, 10**6)), min_size=1
    ),
    st.sampled_from(["\n", "\r\n"]),
)
def test_whatever_csv_writes_is_read_back(rows, end):
    sheet = io.StringIO()
    writer = csv.writer(sheet, lineterminator=end, quoting=csv.QUOTE_ALL)
    writer.writerow(["id", "mount", "pixels wide", "pixels high", "pixel pitch [mm]", "remark"])
    writer.writerows([f"K{k}", "C", count, 1, 0.01, text] for k, (text, count) in enumerate(rows))
    ledger = Ledger("cameras.csv")
    table = read_table(sheet.getvalue().encode(), "cameras", ledger)
    assert ledger.faults() == []
    assert table["pixels wide"].tolist() == [count for _, count in rows]
    assert table["remark"] == [text for text, _ in rows]
