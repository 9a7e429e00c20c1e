"""Briefs and catalogues as the commands find and read them; bad ones."""

import io
import os
import shutil

import pytest

from tests.commands.conftest import BRIEF
from visionplan.commands import inputs

FILES = ("lenses.csv", "cameras.csv", "spacers.csv")


@pytest.fixture
def catalogue(command, tmp_path):
    """The demo's, in a folder of its own."""
    folder = tmp_path / "parts"
    folder.mkdir()
    for file in FILES:
        shutil.copy(command.demo / file, folder)
    return folder


def both(command, *arguments):
    """Of the two commands that read most alike."""
    told = {command.refused(name, *arguments) for name in ("rank", "concede")}
    assert len(told) == 1
    return told.pop()


def test_the_catalogue_beside_the_brief_or_one_folder_above(command, catalogue):
    assert command("concede", command.brief(name="parts/brief.toml"))[0] == 0
    (catalogue / "briefs" / "deep").mkdir(parents=True)
    assert command("concede", command.brief(name="parts/briefs/brief.toml"))[0] == 0
    err = command.refused("concede", command.brief(name="parts/briefs/deep/brief.toml"))
    assert "--catalogue DIR" in err
    assert "brief.toml" in err


def test_a_brief_named_from_its_own_folder(command, catalogue, monkeypatch):
    command.brief(name="parts/brief.toml")
    monkeypatch.chdir(catalogue)
    assert command("concede", "brief.toml")[0] == 0


def test_the_catalogue_that_is_named_wins(command, catalogue):
    brief = command.brief(name="parts/brief.toml")
    (catalogue / "lenses.csv").write_text("id\n")
    assert command("concede", brief, "--catalogue", command.demo)[0] == 0
    assert "lenses.csv" in command.refused("concede", brief)


def test_a_brief_from_standard_input(command, monkeypatch, catalogue):
    text = BRIEF.encode()
    monkeypatch.setattr("sys.stdin", io.TextIOWrapper(io.BytesIO(text)))
    assert command("concede", "-", "--catalogue", command.demo)[0] == 0
    monkeypatch.setattr("sys.stdin", io.TextIOWrapper(io.BytesIO(text)))
    monkeypatch.chdir(catalogue)  # the folder one is in stands for the brief's
    assert command("concede", "-")[0] == 0
    monkeypatch.setattr("sys.stdin", io.TextIOWrapper(io.BytesIO(b"[scene]\nfeature = 3\n")))
    assert "standard input:2" in command.refused("concede", "-")
    monkeypatch.setattr("sys.stdin", None)
    assert "standard input: can't be read" in command.refused("concede", "-")


@pytest.mark.parametrize(
    ("text", "place"),
    [
        (b"", "brief.toml: the file is empty"),
        (b"\xff\xfe\n", "brief.toml:1: the file isn't UTF-8"),
        (b"title = \n", "brief.toml:1"),
        (b"[scene]\nfield = 7\n", "brief.toml:2"),
        (b"\0\0", "brief.toml:1"),
        (b"[[" * 5000, "brief.toml"),
        (b"x" * 1_000_000, "brief.toml: the file is far too long"),
    ],
)
def test_a_bad_brief(command, text, place):
    assert place in both(command, command.brief(text), "--catalogue", command.demo)


def test_a_brief_that_cannot_be_read(command, tmp_path):
    assert "missing.toml: can't be read: No such file" in both(command, "missing.toml")
    assert f"{tmp_path}: can't be read: Is a directory" in both(command, tmp_path)
    assert "can't be read" in both(command, "brief.toml/brief.toml")
    assert "can't be read" in both(command, "n" * 5000)


@pytest.mark.skipif(not hasattr(os, "geteuid") or os.geteuid() == 0, reason="root may read everything")
def test_a_brief_that_may_not_be_read(command):
    brief = command.brief()
    os.chmod(brief, 0)
    assert "Permission denied" in both(command, brief)


def test_a_missing_brief_is_all_that_is_told_of(command):
    assert len(command.refused("concede", "missing.toml").splitlines()) == 1


def test_a_bad_catalogue(command, catalogue, tmp_path):
    brief = command.brief()
    assert "nowhere: there is no such folder" in both(command, brief, "--catalogue", "nowhere")
    assert "brief.toml: a file stands here" in both(command, brief, "--catalogue", brief)
    (catalogue / "cameras.csv").unlink()
    assert "cameras.csv: the file is missing" in both(command, brief, "--catalogue", catalogue)
    (catalogue / "cameras.csv").mkdir()
    assert "cameras.csv" in both(command, brief, "--catalogue", catalogue)
    (catalogue / "lenses.csv").write_bytes(b"\xff")
    err = both(command, brief, "--catalogue", catalogue)
    assert "lenses.csv" in err
    assert "cameras.csv" in err


def test_everything_that_is_wrong_with_both_is_told_at_once(command, catalogue):
    lenses = (catalogue / "lenses.csv").read_text().splitlines()
    lenses[3] = lenses[3].replace(",CS,", ",,")
    (catalogue / "lenses.csv").write_text("\n".join(lenses))
    err = both(command, command.brief("[scene]\nfeature = 1\n"), "--catalogue", catalogue)
    assert "brief.toml:2" in err
    assert "lenses.csv:4" in err
    assert all(line.startswith("visionplan: ") for line in err.splitlines())


def test_bad_rows_are_left_out_when_asked_and_told(command, catalogue):
    with (catalogue / "lenses.csv").open("a") as file:
        file.write("bad,C,Padderbury,entocentric,-3\n")
    brief, place = command.brief(), f"lenses.csv:{command.rows('lenses') + 2}"
    assert place in both(command, brief, "--catalogue", catalogue)
    status, out, err = command("concede", brief, "--catalogue", catalogue, "--skip-bad")
    assert status == 0
    assert "row skipped" in err
    assert place in err
    assert out.startswith(command("concede", brief, "--catalogue", command.demo)[1])


def test_names_from_files_cannot_steer_the_terminal(command):
    err = command.refused("concede", command.brief(name="\x1b[31m.toml", text="x = 1"), "--catalogue", command.demo)
    assert "\x1b" not in err
    err = command.refused("concede", "\udcff\x1b[31m")
    assert "\x1b" not in err
    assert "\x1b" not in command.refused("\x1b[31m")
    assert "\x1b" not in command.refused("new", "a", "\x1b[31m")


@pytest.mark.parametrize("text", ["0", "-1", "1.5", "1_0", "٣", "1e3", "", "9" * 5000, "x"])
def test_a_bad_count(command, text):
    err = command.refused("rank", command.jar_lids, f"--top={text}")
    assert "--top" in err
    assert len(err) < 2000


@pytest.mark.parametrize("text", ["30", "0 mm", "-3 mm", "x", "", "3 kg", "nan mm", "1e400 mm"])
def test_a_bad_length(command, text):
    assert "--at" in command.refused("explain", command.jar_lids, "c", "l", f"--at={text}")


@pytest.mark.parametrize("text", ["0", "-3", "f/4", "", "nan", "inf", "1e9"])
def test_a_bad_f_number(command, text):
    assert "--stop" in command.refused("explain", command.jar_lids, "c", "l", f"--stop={text}")


def test_values_of_arguments():
    assert inputs.length("12 in") == pytest.approx(304.8)
    assert inputs.f_number("5.6") == 5.6
    assert inputs.count("20") == 20
    assert inputs.ids("a, b") == ["a", "b"]
    assert inputs.ids("") == []


@pytest.mark.parametrize(
    "arguments",
    [
        ("rank",),
        ("rank", "a", "b"),
        ("rank", "a", "--order", "beauty"),
        ("rank", "a", "--format", "xml"),
        ("rank", "a", "--units", "furlong"),
        ("rank", "a", "--cat", "b"),
        ("explain", "a"),
        ("explain", "a", "b", "c", "--orientation", "up"),
        ("catalogue",),
        ("catalogue", "polish"),
        ("completion", "cmd"),
        ("new",),
        ("solve",),
        ("--colour",),
    ],
)
def test_bad_usage(command, arguments):
    assert "usage: visionplan" in command.refused(*arguments)
