"""Column maps that are none."""

import pytest

from tests.catalogue.intake.conftest import MAP
from visionplan.catalogue.intake.columnmap import EMPTY, read_map
from visionplan.faults import InputError


def faults(intake, text):
    with pytest.raises(InputError) as error:
        read_map(intake.map(text))
    return error.value.faults


def test_what_a_map_says(intake):
    (lenses,) = read_map(intake.map(MAP)).values()
    assert (lenses.item, lenses.heading, lenses.delimiter, lenses.decimal, lenses.thousands) == (
        "lenses",
        1,
        ";",
        ",",
        ".",
    )
    assert lenses.empty == EMPTY
    blende = lenses.sources[3]
    assert (blende.heading, [column.name for column in blende.columns]) == ("Blende", ["f-number min", "f-number max"])
    assert (lenses.sources[4].unit, lenses.sources[4].factor) == ("m", 1)


def test_a_line_that_takes_nothing(intake):
    (lenses,) = read_map(intake.map(MAP + '"Bemerkung" = ""\n')).values()
    assert "Bemerkung" not in [source.heading for source in lenses.sources]


@pytest.mark.parametrize(
    ("before", "after", "key", "found"),
    [
        ("[lenses]", "[lense]", "lense", "no item"),
        ("decimal =", "decimals =", "lenses.decimals", "is 'decimal' meant?"),
        ('","', '";"', "lenses.decimal", "won't do"),
        ("[lenses]", "[lenses]\nheading = 0", "lenses.heading", "won't do"),
        ("[lenses]", "[lenses]\nheading = true", "lenses.heading", "won't do"),
        ("[lenses]", '[lenses]\nempty = "-"', "lenses.empty", "won't do"),
        ('delimiter = ";"', 'delimiter = ";;"', "lenses.delimiter", "won't do"),
        ('thousands = "."', 'thousands = ","', "lenses.thousands", "decimal sign"),
        ("[lenses]", '[lenses]\nfixed = { mont = "C" }', "lenses.fixed", "is 'mount' meant?"),
        ("[lenses]", '[lenses]\nfixed = { mount = "C" }', "lenses.columns.Fassung", "taken from fixed already"),
        ('"stock"', '"stok"', "lenses.columns.Bestand", "is 'stock' meant?"),
        ('"stock"', '"mount"', "lenses.columns.Bestand", "taken from 'Fassung' already"),
        ('"stock"', '["stock", "stock"]', "lenses.columns.Bestand", "taken from 'Bestand' already"),
        ('"stock"', "7", "lenses.columns.Bestand", "no such line"),
        ('"stock"', "{ is = 7 }", "lenses.columns.Bestand", "names no column"),
        ('"stock"', '{ is = "stock", units = "" }', "lenses.columns.Bestand", "no such line"),
        ('unit = "mm"', 'unit = "furlung"', "lenses.columns.Brennweite (mm)", "is not known"),
        ('unit = "mm"', 'unit = "kg"', "lenses.columns.Brennweite (mm)", "wrong dimension"),
        ('unit = "mm"', "unit = 5", "lenses.columns.Brennweite (mm)", "won't do"),
        ('unit = "mm"', 'unit = "mm", factor = 0', "lenses.columns.Brennweite (mm)", "won't do"),
        ('unit = "mm"', 'unit = "mm", factor = nan', "lenses.columns.Brennweite (mm)", "won't do"),
        ('unit = "mm"', 'unit = "mm", factor = "2"', "lenses.columns.Brennweite (mm)", "won't do"),
        ('unit = "mm"', 'unit = "mm", words = ["a"]', "lenses.columns.Brennweite (mm)", "won't do"),
        ('"mount"', '{ is = "mount", unit = "mm" }', "lenses.columns.Fassung", "has no unit"),
        ('unit = "EUR"', 'unit = "mm"', "lenses.columns.Preis [EUR]", "no place here"),
    ],
)
def test_each_fault_with_its_line(intake, before, after, key, found):
    text = MAP.replace(before, after, 1)
    first = faults(intake, text)[0]
    assert first.column == key
    assert found in first.found
    assert first.expected
    last = key.split(".")[-1]
    assert last in text.splitlines()[first.line - 1]


def test_all_faults_at_once(intake):
    text = (
        MAP.replace('"stock"', '"stok"')
        .replace('unit = "m"', 'unit = "kg"')
        .replace("[lenses]", "[lenses]\nheading = 0")
    )
    assert len(faults(intake, text)) == 3


@pytest.mark.parametrize(
    ("text", "found"),
    [("", "empty"), ("lenses = 1", "no section"), ("[lenses]", "maps no column"), (b"\xff\xfea", "UTF-8")],
)
def test_maps_that_say_nothing(intake, text, found):
    assert found in faults(intake, text)[0].found


def test_no_toml(intake):
    (fault,) = faults(intake, "[lenses]\nheading 3\n")
    assert (fault.line, fault.expected) == (2, "valid TOML")
    (fault,) = faults(intake, MAP + '"Bestand" = "mass"\n')
    assert fault.line


def test_missing(intake):
    with pytest.raises(InputError) as error:
        read_map(str(intake.folder / "nowhere.toml"))
    assert "can't be read" in error.value.faults[0].found
