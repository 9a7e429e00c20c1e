"""new: a starter brief, the demo works; nothing overwritten."""

import errno
import filecmp
import io
import os

import pytest


def test_a_brief_that_ranks_as_it_is(command):
    status, out, err = command("new", "cell.toml")
    assert (status, out) == (0, "")
    assert "cell.toml" in err
    assert command("concede", "cell.toml", "--catalogue", command.demo)[0] in (0, 1)


def test_nothing_is_overwritten(command, tmp_path):
    command.brief("mine", "cell.toml")
    assert "cell.toml: is there already" in command.refused("new", "cell.toml")
    assert (tmp_path / "cell.toml").read_text() == "mine"
    (tmp_path / "link.toml").symlink_to("nowhere.toml")
    assert "is there already" in command.refused("new", "link.toml")
    (tmp_path / "works").mkdir()
    assert "works: is there already" in command.refused("new", "--demo", "works")
    assert not list((tmp_path / "works").iterdir())


def test_where_nothing_can_be_written(command, tmp_path):
    assert "nowhere/cell.toml: can't be written: No such file" in command.refused("new", "nowhere/cell.toml")
    assert "nowhere/works: can't be written: No such file" in command.refused("new", "--demo", "nowhere/works")
    assert "can't be written" in command.refused("new", "n" * 5000)


@pytest.mark.parametrize("arguments", [("cell.toml",), ("--demo", "works")])
def test_a_full_disk_leaves_nothing_behind(command, tmp_path, monkeypatch, arguments):
    class Full(io.FileIO):
        def __init__(self, path, mode, **_):
            super().__init__(path, mode)

        def write(self, _):
            raise OSError(errno.ENOSPC, os.strerror(errno.ENOSPC))

    monkeypatch.setattr("visionplan.commands.new.open", Full, raising=False)
    assert "No space left" in command.refused("new", *arguments)
    assert not list(tmp_path.iterdir())


def test_the_demo_works(command, tmp_path):
    status, out, err = command("new", "--demo", "works")
    assert (status, out) == (0, "")
    names = [str(path.relative_to(command.demo)) for path in command.demo.rglob("*") if path.is_file()]
    assert len(names) > 3
    assert filecmp.cmpfiles(command.demo, tmp_path / "works", names, shallow=False) == (names, [], [])
    told = err.split("visionplan rank ")[1].strip()
    assert command("concede", told)[0] == 0
