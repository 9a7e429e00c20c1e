"""Guessing a map: from sheets as the trade writes them, and back from the text of the map."""

import csv

import pytest

from tests.catalogue.intake.conftest import LENSES, csv_bytes
from visionplan.catalogue.folder import read_catalogue
from visionplan.catalogue.intake.columnmap import read_map
from visionplan.catalogue.intake.draft import map_text, summary
from visionplan.catalogue.intake.guess import guess_file
from visionplan.catalogue.intake.synonyms import PAIRS, SYNONYMS, USUAL_UNITS, WORDS
from visionplan.catalogue.intake.take import take
from visionplan.catalogue.intake.wording import split
from visionplan.catalogue.items import COLUMNS
from visionplan.demo import demo_folder
from visionplan.faults import InputError
from visionplan.units import factor

CAMERAS = [
    [
        "Model",
        "Lens mount",
        "Resolution",
        "Pixel size",
        "Sensor",
        "Shutter type",
        "Mono/Color",
        "fps",
        "Weight [g]",
        "Price (EUR)",
    ],
    ["K5m", "C", "2448 x 2048", "3.45", "big", "Global shutter", "Monochrome", "75", "90", "1,234.50"],
    ["K5c", "C", "2448 x 2048", "3.45", "big", "Global shutter", "Color", "75", "90", "1,250.00"],
    ["K2m", "CS", "1600 x 1200", "4.5", "small", "Rolling", "Mono", "60", "80", "n/a"],
]


def mapping(guess):
    """By heading: our columns and the unit."""
    return {s.heading: ("+".join(column.name for column in s.columns), s.unit) for s in guess.map.sources}


def test_a_german_price_list(intake):
    (guess,) = guess_file(intake.sheet([["Preisliste"], [], *LENSES]))
    assert (guess.map.item, guess.map.heading, guess.map.decimal, guess.map.thousands) == ("lenses", 3, ",", ".")
    assert mapping(guess) == {
        "Artikel": ("id", ""),
        "Fassung": ("mount", ""),
        "Brennweite (mm)": ("focal length", "mm"),
        "Blende": ("f-number min+f-number max", ""),
        "MOD [m]": ("nearest object", "m"),
        "Preis [EUR]": ("price", "EUR"),
        "Bestand": ("stock", ""),
    }
    assert (guess.left, guess.lacking) == ([], [])


def test_an_english_list_of_cameras(intake):
    (guess,) = guess_file(intake.sheet(CAMERAS, delimiter=","))
    assert (guess.map.item, guess.map.decimal, guess.map.thousands) == ("cameras", ".", ",")
    assert mapping(guess) == {
        "Model": ("id", ""),
        "Lens mount": ("mount", ""),
        "Resolution": ("pixels wide+pixels high", ""),
        "Pixel size": ("pixel pitch", "µm"),
        "Shutter type": ("shutter", ""),
        "Mono/Color": ("colour", ""),
        "fps": ("frame rate", "1/s"),
        "Weight [g]": ("mass", "g"),
        "Price (EUR)": ("price", "EUR"),
    }
    assert [one.heading for one in guess.left] == ["Sensor"]
    assert "names no unit" in guess.unsure["Pixel size"]
    told = "\n".join(summary(guess))
    assert "9 of 10 columns" in told
    assert "left: Sensor" in told


def test_what_is_guessed_can_be_taken(intake):
    sheet = intake.sheet(CAMERAS, delimiter=",")
    take(sheet, intake.map(map_text(guess_file(sheet))), str(intake.parts))
    take(sheet := intake.sheet(), intake.map(map_text(guess_file(sheet))), str(intake.parts))
    cameras = read_catalogue(intake.parts, skip_bad=True).cameras
    assert cameras["pixels high"].tolist() == [2048, 2048, 1200]
    assert cameras["shutter"] == ["global", "global", "rolling"]
    assert cameras["colour"] == ["mono", "colour", "mono"]
    assert cameras["price"][:2].tolist() == [1234.5, 1250]


@pytest.mark.parametrize("item", ["lenses", "cameras", "spacers"])
def test_our_own_headings_are_known(item):
    path = demo_folder() / f"{item}.csv"
    (guess,) = guess_file(str(path))
    with path.open(newline="", encoding="utf-8") as file:
        top, *rows = csv.reader(file)
    stated = {heading for at, heading in enumerate(top) if any(row[at] for row in rows)}
    assert guess.map.item == item
    for heading, (name, unit) in mapping(guess).items():
        assert heading.partition(" [")[0] == name
        assert unit in (heading.partition(" [")[2].removesuffix("]"), "")
    assert stated <= set(mapping(guess))
    assert guess.lacking == []


@pytest.mark.parametrize(
    ("heading", "words", "unit"),
    [
        ("Focal length (mm)", "focal length", "mm"),
        ("Focal length / mm", "focal length", "mm"),
        ("Focal length, in", "focal length", "in"),
        ("Brennweite in mm", "brennweite", "mm"),
        ("Min. object distance (MOD) [m]", "min object distance mod", "m"),
        ("Pixels (H)", "pixels h", ""),
        ("Preis €", "preis", "€"),
        ("Mono/Color", "mono color", ""),
        ("Sättigung (ke⁻)", "sattigung", "ke⁻"),
    ],
)
def test_words_and_units_of_headings(heading, words, unit):
    assert split(heading) == (words, unit)


def test_units_in_a_row_of_their_own(intake):
    rows = [["Article", "Mount", "Length", "Price"], [], ["", "", "[cm]", "EUR"], ["R5", "C", "0.5", "7"]]
    (guess,) = guess_file(sheet := intake.sheet(rows), "spacers")
    assert mapping(guess)["Length"] == ("length", "cm")
    assert guess.map.first == 4
    ((merged,), _) = take(sheet, intake.map(map_text([guess])), str(intake.parts))
    assert merged.table["length"].tolist() == [5]
    assert merged.table.currency == "EUR"


def test_units_that_do_not_suit_rule_a_column_out(intake):
    rows = [["Article", "Mount", "Length (g)", "Weight (mm)"], ["R", "C", "5", "6"]]
    (guess,) = guess_file(intake.sheet(rows), "spacers")
    assert [one.heading for one in guess.left] == ["Length (g)", "Weight (mm)"]
    assert guess.lacking == ["length"]


def test_the_text_of_a_map_says_what_was_guessed(intake):
    strange = [
        ['Wo"rt', "\x1b[2JArticle", "Price\n(EUR)", "Price\n(EUR)", "", "Mount", "Length (mm)"],
        ["x # y", "\x1b[31mA", "1", "2", "loose", "C\x85", "5"],
    ]
    (guess,) = guess_file(intake.sheet(strange, delimiter="\t"))
    text = map_text([guess])
    assert read_map(intake.map(text)) == {guess.map.item: guess.map}
    assert all(line.isprintable() for line in text.splitlines())
    assert "lacking, though" not in text
    assert [one.heading for one in guess.left][-1] == "(column 5)"


def test_what_is_lacking_is_said(intake):
    (guess,) = guess_file(intake.sheet([["Article", "Brennweite (mm)"], ["A", "16"]]))
    assert guess.lacking == ["mount", "f-number min", "f-number max", "nearest object"]
    assert "lacking, though every row must state it: mount" in map_text([guess])


def test_a_workbook_with_a_sheet_for_each_item(intake):
    guesses = guess_file(intake.workbook([["nothing here"]], Lenses=LENSES, Cameras=CAMERAS))
    assert {guess.map.item: guess.map.worksheet for guess in guesses} == {"lenses": "Lenses", "cameras": "Cameras"}
    (guess,) = guess_file(intake.workbook(LENSES, Cameras=CAMERAS), worksheet="Cameras")
    assert guess.map.item == "cameras"


def test_a_sheet_of_something_else(intake):
    (guess,) = guess_file(intake.sheet([["Zutat", "Menge"], ["Mehl", "500 g"]]), "lenses")
    assert guess.lacking
    text = map_text([guess])
    assert '# "Zutat" = ""' in text


@pytest.mark.parametrize(
    ("how", "found"),
    [
        ({"heading": 9}, "nothing stands in row 9"),
        ({"delimiter": ";;"}, "no delimiter"),
        ({"worksheet": "x"}, "no worksheet"),
        ({"encoding": "x"}, "no encoding"),
    ],
)
def test_what_can_not_be_guessed(intake, how, found):
    with pytest.raises(InputError) as error:
        guess_file(intake.sheet(), **how)
    assert found in error.value.faults[0].found


def test_an_empty_workbook(intake):
    with pytest.raises(InputError) as error:
        guess_file(intake.workbook([]))
    assert "empty" in error.value.faults[0].found


def test_a_hundred_thousand_rows_are_not_all_read_for_a_guess(intake):
    sheet = intake.sheet(csv_bytes([*LENSES, *(LENSES[1:] * 50_000)]))
    (guess,) = guess_file(sheet)
    assert guess.map.item == "lenses"


def test_the_words_are_those_of_our_columns():
    columns = {column.name: column for item in COLUMNS.values() for column in item}
    assert {name for pair in PAIRS for name in pair} | SYNONYMS.keys() | USUAL_UNITS.keys() == set(columns)
    assert WORDS.keys() == {word for item in COLUMNS.values() for column in item for word in column.choices}
    for name, unit in USUAL_UNITS.items():
        assert factor(unit, columns[name].unit)
