"""Several folders as one catalogue."""

import numpy as np
import pytest

from tests.catalogue.conftest import CAMERAS, LENSES
from visionplan.catalogue.folder import read_catalogue, read_catalogues
from visionplan.faults import InputError

OTHERS = LENSES.replace("L25", "M25").replace("L50", "M50")


@pytest.fixture
def folders(tmp_path):
    """Folder A with lenses and a camera, folder B with other lenses alone."""
    for name, files in {"A": {"lenses": LENSES, "cameras": CAMERAS}, "B": {"lenses": OTHERS}}.items():
        (tmp_path / name).mkdir()
        for item, text in files.items():
            (tmp_path / name / f"{item}.csv").write_text(text)
    return tmp_path / "A", tmp_path / "B"


def refused(folders):
    with pytest.raises(InputError) as error:
        read_catalogues(folders)
    return error.value.faults


def test_rows_of_all_folders_with_their_values(folders):
    both = read_catalogues(folders)
    assert both.lenses["id"] == ["L25", "L50", "M25", "M50"]
    assert both.lenses["focal length"].tolist() == [25, 50, 25, 50]
    assert both.lenses.index == {"L25": 0, "L50": 1, "M25": 2, "M50": 3}
    assert both.cameras["id"] == ["K5"]
    assert len(both.lenses) == len(both.lenses["mass"]) == len(both.lenses["maker"]) == 4


def test_one_folder_is_what_it_is_alone(folders):
    alone, listed = read_catalogue(folders[0]), read_catalogues(folders[:1])
    assert alone.fingerprint == listed.fingerprint != read_catalogues(folders).fingerprint
    assert np.array_equal(alone.lenses["focal length"], listed.lenses["focal length"])


def test_a_clash_of_ids_names_both_files(folders):
    (folders[1] / "lenses.csv").write_text(OTHERS.replace("M50", "L50"))
    (fault,) = refused(folders)
    assert (fault.file, fault.line, fault.column) == (str(folders[1] / "lenses.csv"), 3, "id")
    assert f"{folders[0] / 'lenses.csv'}:3" in fault.found
    kept = read_catalogues(folders, skip_bad=True)
    assert kept.lenses["id"] == ["L25", "L50", "M25"]
    assert "'L50'" in kept.warnings[0]


def test_notes_are_empty_where_a_folder_lacks_them(folders):
    shelved = [f"{line},{'shelf' if not at else 'A7'}" for at, line in enumerate(OTHERS.splitlines())]
    (folders[1] / "lenses.csv").write_text("\n".join(shelved))
    both = read_catalogues(folders)
    assert both.lenses["shelf"] == ["", "", "A7", "A7"]
    assert both.lenses.notes == ("shelf",)


def test_one_currency_in_all_folders(folders):
    for folder, text, currency in ((folders[0], LENSES, "EUR"), (folders[1], OTHERS, "USD")):
        top, *rows = text.splitlines()
        (folder / "lenses.csv").write_text("\n".join([f"{top},price [{currency}]", *(f"{row},90" for row in rows)]))
    (fault,) = refused(folders)
    assert "USD" in fault.found
    assert str(folders[0] / "lenses.csv") in fault.found


def test_folders_that_are_none(folders, tmp_path):
    (tmp_path / "empty").mkdir()
    found = [
        str(fault) for fault in refused([*folders, tmp_path / "nowhere", tmp_path / "empty", tmp_path / "A" / "."])
    ]
    assert len(found) == 3
    assert "no such folder" in found[0]
    assert "holds no catalogue" in found[1]
    assert "same folder" in found[2]


def test_each_file_somewhere(folders):
    (folders[0] / "cameras.csv").unlink()
    (fault,) = refused(folders)
    assert fault.file == str(folders[0] / "cameras.csv")
    assert "missing" in fault.found
