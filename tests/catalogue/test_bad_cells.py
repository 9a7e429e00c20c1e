"""Cells and rows at fault: each with line, column and what was expected, all at once; and what skipping them leaves."""

import numpy as np
import pytest

from visionplan.catalogue.ledger import MOST_OF_A_COLUMN

TELECENTRIC = "id,mount,kind,magnification,working distance [mm],f-number min,f-number max"


@pytest.mark.parametrize(
    ("heading", "cell", "found", "expected"),
    [
        ("length [mm]", "-5", "'-5' is out of range", "a length such as '50 mm', more than 0"),
        ("length [mm]", "0", "'0' is out of range", "more than 0"),
        ("length [mm]", "-0.0", "out of range", "more than 0"),
        ("length", "-5 mm", "'-5 mm' is out of range", "more than 0"),
        ("length [mm]", "nan", "'nan' is no quantity", "a length"),
        ("length [mm]", "NaN mm", "no quantity", "a length"),
        ("length [mm]", "inf", "'inf' is no quantity", "a length"),
        ("length [mm]", "-Infinity", "no quantity", "a length"),
        ("length [mm]", "1e400", "'1e400' is too great", "a length"),
        ("length [mm]", "1e300", "beyond every length", "a length"),
        ("length [mm]", "1e-300", "beyond every length", "a length"),
        ("length [mm]", "1_000", "'1_000' does not begin with a plain decimal number", "a length"),
        ("length [mm]", '"1,5"', "'1,5' does not begin with a plain decimal number", "a length"),
        ("length [mm]", "1.2.3", "plain decimal number", "a length"),
        ("length [mm]", "--5", "no quantity", "a length"),
        ("length [mm]", "٣", "no quantity", "a length"),
        ("length [mm]", "n/a", "'n/a' is no quantity", "a length"),
        ("length [mm]", "5 kg", "the unit 'kg' is of the wrong dimension", "a length"),
        ("length [mm]", "5 foo", "the unit 'foo' is not known", "a length"),
        ("length [mm]", "5 mm**9999999**99", "is not known", "a length"),
        ("length [mm]", "5 m" + "*m" * 500_000, "no quantity", "a length"),
        ("length [mm]", "\x1b[31m5", "no quantity", "a length"),
        ("length", "5", "'5' has no unit, nor has the heading", "a length such as '50 mm'"),
        ("mass", "5", "has no unit, nor has the heading", "a mass such as '600 g'"),
        ("detail limit", "120", "has no unit, nor has the heading", "'120 lp/mm'"),
        ("telecentricity", "0.1", "has no unit, nor has the heading", "an angle"),
        ("telecentricity [deg]", "90", "out of range", "at most"),
        ("transmittance [%]", "101", "out of range", "at most 100 %"),
        ("transmittance", "90", "out of range", "at most 100 %"),
        ("transmittance [%]", "0", "out of range", "more than 0"),
        ("price", "-1", "out of range", "not less than 0"),
        ("price", "12 EUR", "has no place here", "a plain number"),
        ("pupil ratio", "0", "out of range", "more than 0"),
        ("pupil ratio", "5 %", "has no place here", "a plain number"),
        ("stock", "1.5", "'1.5' is no whole number", "a whole number"),
        ("stock", "-1", "out of range", "not less than 0"),
        ("kind", "zoom", "'zoom' is no such word", "'entocentric' or 'telecentric'"),
        ("stops", "2.8 4 x", "'x' is no plain decimal number", "f-numbers parted by spaces"),
        ("stops", "0 4", "out of range", "more than 0"),
        ("stops", '"2.8, 4"', "plain decimal number", "parted by spaces"),
    ],
)
def test_cells(works, heading, cell, found, expected):
    fault = works.fault(lenses=works.lens(heading, cell))
    assert (fault.line, fault.column) == (2, heading)
    assert found in fault.found
    assert expected in fault.expected
    assert fault.file.endswith("lenses.csv")
    assert str(fault).isprintable()
    assert len(str(fault)) < 400


@pytest.mark.parametrize("column", ["id", "mount", "pixels wide", "pixels high", "pixel pitch [µm]"])
@pytest.mark.parametrize("empty", ["", "  "])
def test_required_cells(works, column, empty):
    top, first = works.cameras.splitlines()
    cells = [empty if heading == column else cell for heading, cell in zip(top.split(","), first.split(","))]
    fault = works.fault(cameras=f"{top}\n{','.join(cells)}\n")
    assert (fault.line, fault.column, fault.found) == (2, column, "nothing is stated")
    assert fault.expected


@pytest.mark.parametrize(
    ("top", "row", "column"),
    [
        (None, "L,C,,2.8,16,300", "focal length [mm]"),
        (None, "L,C,25,,16,300", "f-number min"),
        (None, "L,C,25,2.8,,300", "f-number max"),
        (None, "L,C,25,2.8,16,", "nearest object [mm]"),
        (TELECENTRIC, "L,C,telecentric,,100,4,", "magnification"),
        (TELECENTRIC, "L,C,telecentric,0.5,,4,", "working distance [mm]"),
        (TELECENTRIC, "L,C,telecentric,0.5,100,,", "f-number min"),
    ],
)
def test_what_a_kind_of_lens_has_to_state(works, top, row, column):
    fault = works.fault(lenses=f"{top}\n\n\n{row}\n" if top else works.lenses + row)
    assert (fault.line, fault.column) == (4, column)
    assert "nothing is stated" in fault.found


def test_a_cell_at_fault_is_not_told_twice(works):
    fault = works.fault(lenses=works.lenses + "L,C,wide,2.8,16,300\n")
    assert "'wide'" in fault.found


def test_duplicate_ids(works):
    faults = works.faults(cameras=works.cameras + "A,C,1,1,3\nK5,C,1,1,3\n K5 ,C,2,2,4\n")
    assert [(fault.line, fault.found) for fault in faults] == [
        (4, "'K5' stands in line 2 already"),
        (5, "'K5' stands in line 2 already"),
    ]
    works.read(lenses=works.lenses.replace("L25", "K5"))  # a lens may be called like a camera


def test_f_numbers_the_wrong_way_round(works):
    fault = works.fault(lenses=works.lenses + "L,C,25,16,2.8,300\n")
    assert (fault.line, fault.column) == (4, "f-number max")
    assert "2.8 is less than f-number min 16" in fault.found
    works.read(lenses=works.lenses + "L,C,25,4,4,300\n")


def test_a_nearest_object_within_the_focal_length(works):
    # Hand-worked: the object plane must lie beyond the front focal point, 50 mm before the front principal plane.
    top = works.lenses.splitlines()[0] + ",front principal [mm],nearest magnification\n"
    row = "L,C,50,2,16,{},{},{}\n".format
    for nearest, principal, near in [("30", "10", ""), ("30", "20", ""), ("60", "-10", ""), ("30", "10", "0.5")]:
        fault = works.fault(lenses=top + row(nearest, principal, near))
        assert (fault.line, fault.column) == (2, "nearest object [mm]")
        assert "focal length 50 mm" in fault.found
    for nearest, principal, near in [("30", "20.1", ""), ("30", "", ""), ("30", "", "0.5"), ("60", "-9.9", "")]:
        works.read(lenses=top + row(nearest, principal, near))


def test_all_faults_of_all_files_at_once_by_line(works):
    faults = works.faults(
        lenses=works.lenses + "M,C,-1,0,16,x\nL25,,1,2,1,300\n",
        cameras=works.cameras + "A,C,1\nB,C,0.5,2048,3.5\n",
        spacers="id,mount,length [foo]\nS,C,5\nS,,5\n",
    )
    assert [(fault.file.rsplit("/")[-1], fault.line, fault.column) for fault in faults] == [
        ("lenses.csv", 4, "focal length [mm]"),
        ("lenses.csv", 4, "f-number min"),
        ("lenses.csv", 4, "nearest object [mm]"),
        ("lenses.csv", 5, "id"),
        ("lenses.csv", 5, "mount"),
        ("lenses.csv", 5, "f-number max"),
        ("cameras.csv", 3, ""),
        ("cameras.csv", 4, "pixels wide"),
        ("spacers.csv", 1, "length [foo]"),
        ("spacers.csv", 3, "id"),
        ("spacers.csv", 3, "mount"),
    ]


def test_a_column_without_a_unit_is_told_once(works):
    first, more = works.faults(lenses=works.lens("length", "5", rows=700))
    assert first.line == 2
    assert more.found.startswith("699 more rows")
    assert more.column == "length"


def test_very_many_faults_are_counted_beyond_the_first(works):
    faults = works.faults(lenses=works.lens("length [mm]", "none", rows=MOST_OF_A_COLUMN + 500))
    assert len(faults) == MOST_OF_A_COLUMN + 1
    assert "500 more rows" in str(faults[-1])


def test_skipping_keeps_the_good_rows_and_says_what_it_left_out(works):
    text = works.lenses + "A,C,wide,2.8,16,300\nB,C,35,2.8,16,300\nL25,C,35,2.8,16,300\nC,C\nD,C,12,1.4,16,100\n"
    catalogue = works.read(skip_bad=True, lenses=text)
    lenses = catalogue.lenses
    assert lenses["id"] == ["L25", "L50", "B", "D"]
    assert lenses["focal length"].tolist() == [25, 50, 35, 12]
    assert list(lenses.lines) == [2, 3, 5, 8]
    assert lenses.index == {"L25": 0, "L50": 1, "B": 2, "D": 3}
    assert all(len(column) == 4 for column in lenses.values.values())
    *skipped, total = catalogue.warnings
    assert [warning.split(":")[2].split()[0] for warning in skipped] == ["4", "6", "7"]
    assert total.endswith("lenses.csv: 3 rows skipped in all")
    assert np.isnan(lenses["length"]).all()


def test_skipping_every_row_is_an_error(works):
    faults = works.faults(skip_bad=True, cameras=works.cameras.replace("2448", "wide"))
    assert "'wide'" in faults[0].found


def test_skipping_tells_only_so_much(works):
    text = works.lens("length [mm]", "none", rows=900) + "G,C,25,1.8,16,200,5\n"
    catalogue = works.read(skip_bad=True, lenses=text)
    assert catalogue.lenses["id"] == ["G"]
    assert len(catalogue.warnings) < 60
    assert catalogue.warnings[-1].endswith("900 rows skipped in all")
