"""Whatever a file holds, it is taken, or refused with faults; nothing else happens."""

import tempfile
import zipfile
from contextlib import suppress
from pathlib import Path

from hypothesis import given, settings
from hypothesis import strategies as st

from tests.catalogue.intake.conftest import LENSES, MAP, Intake, csv_bytes
from visionplan.catalogue.intake.draft import map_text, summary
from visionplan.catalogue.intake.guess import guess_file
from visionplan.faults import InputError

CELLS = st.sampled_from(
    [
        "",
        "-",
        "16",
        "1,4 - 16",
        "1.234,5",
        "C",
        "mm",
        "Brennweite (mm)",
        "id",
        "€ 5",
        "5 EUR",
        "1e999",
        "٣",
        "½",
        "−5 %",
    ]
) | st.text(max_size=8)


def refused_or_done(sheet, map, intake):
    """Guess, take through the guess, take through another map."""
    with suppress(InputError):
        guesses = guess_file(sheet)
        text = map_text(guesses)
        assert all(line.isprintable() for line in [*text.splitlines(), *(s for g in guesses for s in summary(g))])
        intake.take(sheet, text, skip_bad=True)
    with suppress(InputError):
        intake.take(sheet, map, skip_bad=True, everything=True)
    assert {path.suffix for path in intake.parts.glob("*")} <= {".csv"}


@settings(max_examples=60, deadline=None)
@given(st.binary(max_size=300) | st.lists(st.lists(CELLS, max_size=9), max_size=6), st.data())
def test_any_sheet(content, data):
    with tempfile.TemporaryDirectory() as name:
        intake = Intake(Path(name))
        if not isinstance(content, bytes):
            head = data.draw(st.sampled_from([[], LENSES[:1], LENSES]))
            content = csv_bytes([*head, *content])
        refused_or_done(intake.sheet(content), MAP, intake)


@settings(max_examples=60, deadline=None)
@given(st.integers(0, len(MAP)), st.integers(0, 20), st.text(st.sampled_from('[]{}"=,.\n #amu½'), max_size=6))
def test_any_map(at, cut, put):
    with tempfile.TemporaryDirectory() as name:
        intake = Intake(Path(name))
        refused_or_done(intake.sheet(), MAP[:at] + put + MAP[at + cut :], intake)


@settings(max_examples=40, deadline=None)
@given(st.data())
def test_any_workbook(data):
    with tempfile.TemporaryDirectory() as name:
        intake = Intake(Path(name))
        path = intake.workbook()
        with zipfile.ZipFile(path) as archive:
            parts = {part: archive.read(part) for part in archive.namelist()}
        part = data.draw(st.sampled_from(sorted(parts)))
        at = data.draw(st.integers(0, len(parts[part])))
        put = data.draw(
            st.sampled_from([b"", b"<", b'"', b">", b"9", b"\xff", b"</c>", b"<f>1</f>", b' t="e"', b' t="d"'])
        )
        parts[part] = parts[part][:at] + put + parts[part][at + data.draw(st.integers(0, 12)) :]
        with zipfile.ZipFile(path, "w") as archive:
            for part, content in parts.items():
                archive.writestr(part, content)
        refused_or_done(path, MAP, intake)
