"""The journal on disks that are full, closed or broken, and its pruning."""

import errno
import json
import os
import time

import pytest

from visionplan.tui import journal
from visionplan.tui.journal import Journal, key_of, newest, prune
from visionplan.tui.state import State


def test_what_is_written_is_read(tmp_path):
    one = Journal(tmp_path, "a")
    assert one.lock()
    one.write({"work": "µ \udcff"})
    assert one.read() == {"format": journal.FORMAT, "work": "µ \udcff"}


def test_one_writes_at_a_time(tmp_path):
    one, two = Journal(tmp_path, "a"), Journal(tmp_path, "a")
    assert one.lock()
    assert not two.lock()
    assert str(os.getpid()) in two.holder
    one.close()
    assert two.lock()


def test_stale_lock_file_is_no_obstacle(tmp_path):
    (tmp_path / "a.lock").write_text("999999 2020-01-01 10:00")
    assert Journal(tmp_path, "a").lock()


@pytest.mark.parametrize(
    "content",
    [b"", b"{", b"[]", b"\xff\x00", b'{"format": 99}', b"[" * 100000, b'{"format": 1, "work": 3}'],
)
def test_broken_journal_costs_nothing_but_itself(state_home, content):
    state_home.mkdir(parents=True)
    (state_home / f"{key_of('')}.json").write_bytes(content)
    state = State()
    state.resume()
    assert state.brief
    state.toggle(("a", "b"))
    state.close()
    again = State()
    again.resume()
    assert again.marked(("a", "b"))
    again.close()


def test_full_disk_is_told_and_survived(monkeypatch, state_home):
    state = State()
    state.resume()
    state.set("scene.feature", "0.6 mm")
    before = state.journal.file.read_bytes()

    def full(_):
        raise OSError(errno.ENOSPC, os.strerror(errno.ENOSPC))

    with monkeypatch.context() as patch:
        patch.setattr(os, "fsync", full)
        state.set("scene.feature", "0.7 mm")
        assert "No space left" in state.told()
        assert state.brief.feature == 0.7
        assert state.journal.file.read_bytes() == before
        assert not list(state_home.glob(".*.tmp"))
    state.set("scene.feature", "0.8 mm")
    assert not state.told()
    assert "0.8 mm" in state.journal.file.read_text()
    state.close()


def test_home_that_cannot_be_written_to(tmp_path, monkeypatch):
    (tmp_path / "file").write_text("")
    monkeypatch.setenv("XDG_STATE_HOME", str(tmp_path / "file"))  # a file where a folder is needed: refused to root too
    state = State()
    state.resume()
    assert state.writable
    assert "not kept" in state.told()
    state.set("scene.feature", "0.7 mm")
    assert state.brief.feature == 0.7
    state.save(str(tmp_path / "saved.toml"))
    assert (tmp_path / "saved.toml").exists()


def test_pruning_keeps_the_new_and_the_open(tmp_path):
    now = time.time()
    held = Journal(tmp_path, "held")
    held.lock()
    for number in range(60):
        Journal(tmp_path, f"{number:02}").write({})
        os.utime(tmp_path / f"{number:02}.json", (now - number, now - number))
    Journal(tmp_path, "held").write({})
    os.utime(tmp_path / "held.json", (1, 1))
    Journal(tmp_path, "old").write({})
    os.utime(tmp_path / "old.json", (1, 1))
    (tmp_path / ".dead.tmp").write_text("")
    os.utime(tmp_path / ".dead.tmp", (1, 1))
    (tmp_path / ".live.tmp").write_text("")
    prune(tmp_path)
    left = {file.stem for file in tmp_path.glob("*.json")}
    assert left == {f"{number:02}" for number in range(journal.MOST_JOURNALS)} | {"held"}
    assert {file.name for file in tmp_path.glob(".*.tmp")} == {".live.tmp"}
    assert newest(tmp_path) == "00"


def test_names_differ_by_file_and_not_by_spelling(tmp_path):
    assert key_of(str(tmp_path / "a.toml")) == key_of(str(tmp_path / "x" / ".." / "a.toml"))
    assert key_of(str(tmp_path / "a.toml")) != key_of(str(tmp_path / "b.toml"))


def test_journal_holds_a_text_once(state_home):
    state = State()
    state.resume()
    for number in range(30):
        state.toggle((f"camera {number}", "lens"))
    data = json.loads(state.journal.file.read_text())
    assert len(data["texts"]) == 1
    assert len(data["past"]) == 30
    state.close()
