"""Files read, or refused; written whole, or not at all."""

import errno
import os
import stat
import sys

import pytest

from visionplan.brief.files import LONGEST, read_text, write_atomically
from visionplan.faults import InputError


def unread(path):
    with pytest.raises(InputError) as caught:
        read_text(path)
    (fault,) = caught.value.faults
    return fault


def test_reading_missing(tmp_path):
    fault = unread(tmp_path / "none.toml")
    assert fault.file == str(tmp_path / "none.toml")
    assert "No such file" in fault.found


def test_reading_a_folder(tmp_path):
    assert "directory" in unread(tmp_path).found


def test_reading_a_name_that_no_file_can_have():
    assert "name" in unread("a\0b").found
    assert "name too long" in unread("a" * 5000).found


@pytest.mark.skipif(not hasattr(os, "geteuid") or os.geteuid() == 0, reason="root may read everything")
def test_reading_permission_denied(tmp_path):
    path = tmp_path / "brief.toml"
    path.write_text("")
    path.chmod(0)
    assert "Permission denied" in unread(path).found


def test_reading_permission_denied_as_the_system_reports_it(tmp_path, monkeypatch):
    def refuse(*_):
        raise PermissionError(13, "Permission denied")

    monkeypatch.setattr("builtins.open", refuse)
    assert "Permission denied" in unread(tmp_path / "brief.toml").found


def test_reading_far_too_long(tmp_path):
    path = tmp_path / "brief.toml"
    path.write_bytes(b"#" * (LONGEST + 1))
    assert "too long" in unread(path).found


@pytest.mark.skipif(not os.path.exists("/dev/zero"), reason="no endless file here")
def test_reading_without_end():
    assert "too long" in unread("/dev/zero").found


@pytest.mark.parametrize("data", ["title = 1".encode("utf-16"), b"title = 'x'\n# caf\xe9\n"])
def test_reading_not_utf8(tmp_path, data):
    path = tmp_path / "brief.toml"
    path.write_bytes(data)
    fault = unread(path)
    assert "UTF-8" in fault.expected
    assert fault.line == (1 if data.startswith(b"\xff") else 2)


def test_reading_standard_input_is_closed(monkeypatch):
    monkeypatch.setattr(sys, "stdin", None)
    fault = unread("-")
    assert (fault.file, "closed" in fault.found) == ("standard input", True)


def refused(path, text="new"):
    with pytest.raises(InputError) as caught:
        write_atomically(path, text)
    (fault,) = caught.value.faults
    assert fault.file == str(path)
    return fault.found


def test_a_new_file_with_the_permissions_that_any_new_file_has(tmp_path):
    (tmp_path / "other").touch()
    write_atomically(tmp_path / "brief.toml", "ä\r\nb\n")
    assert (tmp_path / "brief.toml").read_bytes() == "ä\r\nb\n".encode()
    assert (tmp_path / "brief.toml").stat().st_mode == (tmp_path / "other").stat().st_mode


@pytest.mark.parametrize("mode", [0o600, 0o644, 0o664])
def test_an_old_file_keeps_its_permissions(tmp_path, mode):
    path = tmp_path / "brief.toml"
    path.write_text("old")
    path.chmod(mode)
    write_atomically(str(path), "new")
    assert path.read_text() == "new"
    assert stat.S_IMODE(path.stat().st_mode) == mode
    assert os.listdir(tmp_path) == ["brief.toml"]


def test_a_link_stays_a_link(tmp_path):
    (tmp_path / "real.toml").write_text("old")
    (tmp_path / "link.toml").symlink_to("real.toml")
    write_atomically(tmp_path / "link.toml", "new")
    assert (tmp_path / "link.toml").is_symlink()
    assert (tmp_path / "real.toml").read_text() == "new"


def test_a_name_as_long_as_the_system_takes(tmp_path):
    path = tmp_path / ("b" * 255)
    write_atomically(path, "new")
    assert path.read_text() == "new"


def test_in_the_working_folder(tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)
    write_atomically("brief.toml", "new")
    assert (tmp_path / "brief.toml").read_text() == "new"


@pytest.mark.parametrize("step", ["fsync", "replace", "chmod"])
def test_a_full_disk_leaves_the_old_text_and_nothing_beside_it(tmp_path, monkeypatch, step):
    path = tmp_path / "brief.toml"
    path.write_text("old")

    def full(*_):
        raise OSError(errno.ENOSPC, os.strerror(errno.ENOSPC))

    with monkeypatch.context() as patch:
        patch.setattr(os, step, full)
        assert os.strerror(errno.ENOSPC) in refused(path)
    assert path.read_text() == "old"
    assert os.listdir(tmp_path) == ["brief.toml"]


def test_an_interrupt_leaves_the_old_text_and_nothing_beside_it(tmp_path, monkeypatch):
    path = tmp_path / "brief.toml"
    path.write_text("old")

    def interrupt(*_):
        raise KeyboardInterrupt

    monkeypatch.setattr(os, "fsync", interrupt)
    with pytest.raises(KeyboardInterrupt):
        write_atomically(path, "new")
    assert path.read_text() == "old"
    assert os.listdir(tmp_path) == ["brief.toml"]


def test_where_nothing_can_be_written(tmp_path):
    assert "No such file" in refused(tmp_path / "none" / "brief.toml")
    assert "no plain file" in refused(tmp_path)
    assert "no file can have this name" in refused("a\0b")
    assert "too long" in refused(tmp_path / ("b" * 256))


@pytest.mark.skipif(not os.path.exists("/dev/null"), reason="no devices here")
def test_a_device_is_never_replaced():
    assert "no plain file" in refused("/dev/null")
    assert stat.S_ISCHR(os.stat("/dev/null").st_mode)


def test_a_file_that_may_not_be_written_is_not_replaced(tmp_path, monkeypatch):
    path = tmp_path / "brief.toml"
    path.write_text("old")
    path.chmod(0o444)
    monkeypatch.setattr(os, "access", lambda path, mode: False)  # as it is for anyone but root
    assert "Permission denied" in refused(path)
    assert path.read_text() == "old"


def test_half_a_character(tmp_path):
    assert "half a character" in refused(tmp_path / "brief.toml", "\ud800")
    assert os.listdir(tmp_path) == []
