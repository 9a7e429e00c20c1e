"""Files that can't be read, headings at fault, rows out of shape: each with its place and what was expected."""

from pathlib import Path

import pytest
from hypothesis import example, given
from hypothesis import strategies as st

from visionplan.catalogue.folder import read_catalogue
from visionplan.catalogue.ledger import Ledger
from visionplan.catalogue.read import read_table
from visionplan.faults import InputError

NAMES = ("lenses.csv", "cameras.csv")


def test_no_such_folder(tmp_path):
    with pytest.raises(InputError, match="no such folder"):
        read_catalogue(tmp_path / "nowhere")


def test_a_file_for_a_folder(tmp_path):
    file = tmp_path / "catalogue.csv"
    file.write_text("x")
    with pytest.raises(InputError, match="a file stands here; expected a folder"):
        read_catalogue(file)


@pytest.mark.parametrize("skip_bad", [False, True])
def test_missing_files_are_named_together(works, skip_bad):
    faults = works.faults(skip_bad, lenses=None, cameras=None)
    assert [Path(fault.file).name for fault in faults] == ["lenses.csv", "cameras.csv"]
    assert {fault.found for fault in faults} == {"the file is missing"}


def test_a_folder_for_a_file(works):
    (works.folder / "lenses.csv").mkdir()
    assert works.fault(lenses=None).found == "this is no file"


def test_no_permission(works, monkeypatch):
    works.write()

    def refuse(self):
        raise PermissionError(13, "Permission denied", str(self))

    monkeypatch.setattr(Path, "read_bytes", refuse)
    faults = works.faults()
    assert [fault.found for fault in faults] == ["the file can't be read: Permission denied"] * 2


def test_no_permission_to_look_into_the_folder(works, monkeypatch):
    works.write()

    def refuse(self, **_):
        raise PermissionError(13, "Permission denied", str(self))

    monkeypatch.setattr(Path, "is_dir", refuse)
    with pytest.raises(InputError, match="Permission denied"):
        read_catalogue(works.folder)


@pytest.mark.parametrize("skip_bad", [False, True])
@pytest.mark.parametrize("text", ["", "\ufeff", "\n\n", " \r\n,,\n"])
def test_empty(works, text, skip_bad):
    (fault,) = works.faults(skip_bad, cameras=text)
    assert fault.found == "the file is empty"


@pytest.mark.parametrize("skip_bad", [False, True])
def test_a_heading_only(works, skip_bad):
    (fault,) = works.faults(skip_bad, cameras=works.cameras.splitlines()[0])
    assert "no row" in fault.found
    assert len(works.read(spacers="id,mount,length [mm]\n").spacers) == 0


@pytest.mark.parametrize("text", ["a;b;c\n1;2;3\n", "id;mount;pixels wide\nK;C;5\n", "colour\tx\n", "x,y\n1,2\n", "{}"])
@pytest.mark.parametrize("skip_bad", [False, True])
def test_no_heading_that_is_known(works, text, skip_bad):
    (fault,) = works.faults(skip_bad, cameras=text)
    assert fault.found.startswith("no heading is known")
    assert "id, mount, pixels wide" in fault.expected
    assert fault.line == 1


@pytest.mark.parametrize("skip_bad", [False, True])
def test_missing_columns_are_named_with_what_may_be_meant(works, skip_bad):
    faults = works.faults(skip_bad, cameras="id,pixels wide,pixels hihg,pixel pitch [um]\nK,5,5,3\n")
    assert [(fault.column, fault.line) for fault in faults] == [("mount", 1), ("pixels high", 1)]
    assert "'pixels hihg' is no heading of ours" in faults[1].found
    assert faults[0].expected == "a heading 'mount'"


def test_missing_columns_that_only_some_lenses_need(works):
    text = "id,mount,kind,magnification,working distance [mm],f-number min\n"
    text += "T,C,telecentric,0.5,110,8\nE,C,,,,2.8\nF,C,entocentric,,,2.8\n"
    faults = works.faults(lenses=text)
    assert [fault.column for fault in faults] == ["focal length", "f-number max", "nearest object"]
    assert faults[0].expected == "a heading 'focal length [mm]'"


@pytest.mark.parametrize("again", ["pixel pitch [µm]", "pixel pitch [mm]", "Pixel  pitch", "PIXEL PITCH [nm]"])
@pytest.mark.parametrize("skip_bad", [False, True])
def test_two_columns_that_mean_the_same(works, again, skip_bad):
    (fault,) = works.faults(
        skip_bad, cameras=works.cameras.replace("[µm]\n", f"[µm],{again}\n").replace("3.5\n", "3.5,3.5\n")
    )
    assert (fault.line, fault.column) == (1, again)
    assert "means the same as 'pixel pitch [µm]'" in fault.found


@pytest.mark.parametrize(
    ("unit", "says"),
    [
        ("furlongs per week", "not known"),
        ("foo", "not known"),
        ("kg", "wrong dimension"),
        ("W", "wrong dimension"),
        ("mm**9999999**99", "not known"),
        ("m" + "*m" * 100_000, "not known"),
        ("\x1b[31m", "not known"),
        (" " * 1_000_000 + "[", "not known"),
    ],
)
@pytest.mark.parametrize("skip_bad", [False, True])
def test_units_of_headings(works, unit, says, skip_bad):
    (fault,) = works.faults(skip_bad, cameras=works.cameras.replace("[µm]", f"[{unit}]"))
    assert fault.line == 1
    assert says in fault.found
    assert fault.expected.startswith("the unit of a length such as")
    assert str(fault).isprintable()
    assert len(str(fault)) < 400


@pytest.mark.parametrize(
    "heading", ["maker [mm]", "stops [mm]", "pupil ratio [mm]", "stock [m]", "kind [x]", "price [mm]"]
)
def test_units_where_none_has_a_place(works, heading):
    top, first, second = works.lenses.splitlines()
    (fault,) = works.faults(lenses=f"{top},{heading}\n{first},\n{second},\n")
    assert fault.column == heading
    assert "has no place here" in fault.found


def test_very_many_columns(works):
    names = ",".join(f"n{k}" for k in range(50_000))
    catalogue = works.read(cameras=works.cameras.replace("\n", f",{names}\n"))
    assert len(catalogue.cameras.notes) == 50_000
    assert len(catalogue.warnings[0]) < 2000
    faults = works.faults(cameras=f"id,{names}\n")
    assert "mount" in {fault.column for fault in faults}


def test_prices_in_two_currencies(works):
    text = works.cameras.replace("[µm]\n", "[µm],price [EUR]\n").replace("3.5\n", "3.5,100\n")
    assert works.read(cameras=text).cameras.currency == "EUR"
    (fault,) = works.faults(cameras=text, spacers="id,mount,length [mm],price [USD]\nS,C,5,9\n")
    assert "USD" in fault.found
    assert "EUR" in fault.found


def test_rows_too_short_or_too_long(works):
    faults = works.faults(cameras=works.cameras + "A,C,1,1\nB,C,1,1,3,\nD\n")
    assert [(fault.line, fault.found) for fault in faults] == [
        (3, "the row has 4 cells, the heading 5"),
        (4, "the row has 6 cells, the heading 5"),
        (5, "the row has 1 cells, the heading 5"),
    ]


def test_an_unclosed_quotation_mark(works):
    text = works.cameras + 'A,"C,1,1,3\nB,C,1,1,3\n'
    (fault,) = works.faults(cameras=text)
    assert fault.line == 3
    assert "from line 3 on" in fault.found
    assert works.read(skip_bad=True, cameras=text).cameras["id"] == ["K5"]


def test_text_after_a_quotation_mark_spoils_its_own_lines_only(works):
    text = works.cameras + 'A,"C" 1,1,1,3\nB,C,1,1,-3\n'
    assert [fault.line for fault in works.faults(cameras=text)] == [3, 4]
    assert works.read(skip_bad=True, cameras=text + "D,C,1,1,3\n").cameras["id"] == ["K5", "D"]


def test_a_quotation_mark_within_a_cell_is_text(works):
    assert works.read(cameras=works.cameras + 'A 8",C,1,1,3\n').cameras["id"] == ["K5", 'A 8"']


@pytest.mark.parametrize("skip_bad", [False, True])
def test_an_unclosed_quotation_mark_in_the_heading(works, skip_bad):
    (fault,) = works.faults(skip_bad, cameras='id,"mount\n' + works.cameras)
    assert fault.line == 1


def test_rows_that_are_not_utf8(works):
    data = works.cameras.encode() + "A,C,1,1,3\nMüller,C,1,1,3\n".encode("latin-1") + b"B,C,1,1,3\n"
    (fault,) = works.faults(cameras=data)
    assert fault.line == 4
    assert "UTF-8" in fault.found
    assert works.read(skip_bad=True, cameras=data).cameras["id"] == ["K5", "A", "B"]


@pytest.mark.parametrize("skip_bad", [False, True])
def test_headings_that_are_not_utf8(works, skip_bad):
    faults = works.faults(skip_bad, cameras=works.cameras.encode("latin-1"))
    assert {fault.line for fault in faults} == {1}
    assert "UTF-8" in faults[0].found
    str(faults).encode()


@pytest.mark.parametrize("encoding", ["utf-16", "utf-16-le", "utf-16-be", "utf-32"])
@pytest.mark.parametrize("skip_bad", [False, True])
def test_other_unicode(works, encoding, skip_bad):
    faults = works.faults(skip_bad, cameras=works.cameras.encode(encoding))
    assert all("UTF-16" in fault.found or "NUL" in fault.found or "UTF-8" in fault.found for fault in faults)


def test_bytes_of_any_kind_are_refused_in_words(works):
    for data in (
        bytes(range(256)),
        b"\x89PNG\r\n\x1a\n\0\0\0\rIHDR",
        b"PK\3\4\0\0" * 50,
        b'"' * 999,
        b"\r" * 99 + b"\0",
    ):
        for fault in works.faults(cameras=data):
            str(fault).encode()


def test_nul_bytes(works):
    text = works.cameras + "A\0,C,1,1,3\nB,C,1,1,3\n"
    (fault,) = works.faults(cameras=text)
    assert (fault.line, fault.found) == (3, "a NUL byte stands here")
    assert works.read(skip_bad=True, cameras=text).cameras["id"] == ["K5", "B"]


TOP = "id,mount,focal length [mm],f-number min,f-number max,nearest object [mm],price,stops,kind,length,stock\n"
CELL = st.text(max_size=6) | st.sampled_from(
    ["", "C", "5", "5 mm", "-1", "1e9", "telecentric", '"', '"a"', "\r", "4 8"]
)


@given(st.lists(st.lists(CELL, min_size=9, max_size=12).map(",".join), max_size=4).map("\n".join))
@example('"')
@example("a,b\n\n")
def test_any_text_ends_in_a_table_or_in_faults(text):
    ledger = Ledger("lenses.csv")
    table = read_table((TOP + text).encode("utf-8", "surrogatepass"), "lenses", ledger)
    lengths = {len(table[column]) for column in table.values}
    assert lengths == {len(table)}
    assert all(line > 1 for line in ledger.bad)
    for fault in ledger.faults():
        assert str(fault).isprintable()


@given(st.binary(max_size=60), st.integers(0, 200), st.integers(0, 20))
def test_any_bytes_end_in_a_table_or_in_faults(bytes_, at, cut):
    good = (TOP + "L,C,25,1.8,16,200,9,2.8 4,,40 mm,3\n" * 3).encode()
    ledger = Ledger("lenses.csv")
    table = read_table(good[:at] + bytes_ + good[at + cut :], "lenses", ledger)
    assert table is not None or ledger.fatal
    for fault in ledger.faults():
        str(fault).encode()
