"""Several files: all or none."""

import os

import pytest

from visionplan.catalogue.intake.writing import write_all
from visionplan.faults import InputError


def held(folder):
    return {path.name: path.read_bytes() for path in folder.iterdir() if path.is_file()}


def test_files_are_made_and_replaced(tmp_path):
    (tmp_path / "a").write_bytes(b"old")
    (tmp_path / "a").chmod(0o640)
    write_all(str(tmp_path), {"a": b"new", "b": b"more"})
    assert held(tmp_path) == {"a": b"new", "b": b"more"}
    assert (tmp_path / "a").stat().st_mode & 0o777 == 0o640
    write_all(str(tmp_path / "made"), {"a": b"new"})
    assert held(tmp_path / "made") == {"a": b"new"}


def test_a_link_stays_a_link(tmp_path):
    (tmp_path / "real").mkdir()
    (tmp_path / "real" / "a").write_bytes(b"old")
    (tmp_path / "folder").mkdir()
    (tmp_path / "folder" / "a").symlink_to(tmp_path / "real" / "a")
    write_all(str(tmp_path / "folder"), {"a": b"new"})
    assert (tmp_path / "folder" / "a").is_symlink()
    assert held(tmp_path / "real") == {"a": b"new"}


def test_what_was_put_in_place_is_put_back(tmp_path, monkeypatch):
    (tmp_path / "a").write_bytes(b"old")
    real = os.replace

    def replace(source, place):
        if place.endswith("/c") and source.endswith(".new"):
            raise OSError(28, "No space left on device")
        real(source, place)

    monkeypatch.setattr(os, "replace", replace)
    with pytest.raises(InputError) as error:
        write_all(str(tmp_path), {"a": b"new", "b": b"more", "c": b"last"})
    assert "nothing was: No space left on device" in error.value.faults[0].found
    assert held(tmp_path) == {"a": b"old"}


def test_a_folder_stands_in_a_file_s_place(tmp_path):
    (tmp_path / "a").write_bytes(b"old")
    (tmp_path / "b").mkdir()
    with pytest.raises(InputError):
        write_all(str(tmp_path), {"a": b"new", "b": b"more"})
    assert held(tmp_path) == {"a": b"old"}


def test_a_folder_that_was_made_goes_again(tmp_path):
    with pytest.raises(InputError):
        write_all(str(tmp_path / "made"), {"x" * 300: b""})
    assert not (tmp_path / "made").exists()
    for name in ("a\0b", str(tmp_path / "no" / "folder")):
        with pytest.raises(InputError):
            write_all(name, {"a": b""})
