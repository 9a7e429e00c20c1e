"""Cells as sheets have them and as our files should; each pair written by hand."""

import pytest

from visionplan.catalogue.intake.columnmap import EMPTY, SheetMap, Source
from visionplan.catalogue.intake.convert import converter
from visionplan.catalogue.intake.sheet import Figure
from visionplan.catalogue.items import COLUMNS
from visionplan.units import UnitError

GERMAN = SheetMap("lenses", (), decimal=",", thousands=".", empty=EMPTY)
ENGLISH = SheetMap("lenses", (), decimal=".", thousands=",", empty=EMPTY)
PLAIN = SheetMap("lenses", (), decimal=",")


def convert(cell, names, sheet_map=GERMAN, **more):
    columns = {column.name: column for item in COLUMNS.values() for column in item}
    return converter(Source("x", tuple(columns[name] for name in names.split("+")), **more), sheet_map)(cell)


@pytest.mark.parametrize(
    ("cell", "column", "sheet_map", "expected"),
    [
        ("16", "focal length", GERMAN, "16"),
        ("16,50", "focal length", GERMAN, "16.50"),
        (" 16,5\u00a0mm ", "focal length", GERMAN, "16.5 mm"),
        ("1.234,5 mm", "focal length", GERMAN, "1234.5 mm"),
        ("1,234.5", "focal length", ENGLISH, "1234.5"),
        ("1,234", "stock", ENGLISH, "1234"),
        ("12.345.678", "stock", GERMAN, "12345678"),
        ("−0,5 %", "distortion", GERMAN, "-0.5 %"),
        ("< 0,1%", "distortion", GERMAN, "0.1 %"),
        ("± 3 %", "focal tolerance", GERMAN, "3 %"),
        ("F/1,4", "f-number min", GERMAN, "1.4"),
        ("1:2,8", "f-number min", GERMAN, "2.8"),
        ("f 2,8 / 4 / 5,6", "stops", GERMAN, "2.8 4 5.6"),
        ("12,50 €", "price", GERMAN, "12.50"),
        ("EUR 1.250,00", "price", GERMAN, "1250.00"),
        ("2,3e-2", "distortion", GERMAN, "2.3e-2"),
        ("34 ke-", "saturation capacity", GERMAN, "34 ke-"),
        ("N/A", "mass", GERMAN, ""),
        ("–", "maker", GERMAN, ""),
        ("Two\nlines", "maker", GERMAN, "Two lines"),
        ("@x", "maker", GERMAN, "'@x"),
        ("Global", "shutter", GERMAN, "global"),
    ],
)
def test_one_value(cell, column, sheet_map, expected):
    assert convert(cell, column, sheet_map, unit="EUR" if column == "price" else "") == (expected,)


@pytest.mark.parametrize(
    ("cell", "columns", "expected"),
    [
        ("F1,4 - F16", "f-number min+f-number max", ("1.4", "16")),
        ("1,8–22", "f-number min+f-number max", ("1.8", "22")),
        ("f/2 … f/8", "f-number min+f-number max", ("2", "8")),
        ("2 bis 8", "f-number min+f-number max", ("2", "8")),
        ("2448 x 2048", "pixels wide+pixels high", ("2448", "2048")),
        ("2.448 (H) × 2.048 (V)", "pixels wide+pixels high", ("2448", "2048")),
        ("-", "pixels wide+pixels high", ("", "")),
    ],
)
def test_two_values_in_one_cell(cell, columns, expected):
    assert convert(cell, columns) == expected


@pytest.mark.parametrize(
    ("cell", "column", "sheet_map"),
    [
        ("16.5", "focal length", GERMAN),
        ("16.500", "focal length", PLAIN),
        ("1,23,456", "stock", ENGLISH),
        ("16,5", "focal length", ENGLISH),
        ("5 USD", "price", GERMAN),
        ("$ 5 €", "price", GERMAN),
        ("1,4", "f-number min+f-number max", GERMAN),
        ("1 x 2 x 3", "pixels wide+pixels high", GERMAN),
    ],
)
def test_what_could_mean_something_else_is_refused(cell, column, sheet_map):
    with pytest.raises(UnitError):
        convert(cell, column, sheet_map, unit="EUR" if column == "price" else "")


def test_dollars_and_yen_are_of_several_countries():
    assert convert("$ 5", "price", unit="CAD") == convert("5 $", "price", unit="$") == ("5",)
    assert convert("¥ 5", "price", unit="CNY") == ("5",)
    with pytest.raises(UnitError):
        convert("£ 5", "price", unit="CAD")


def test_a_number_s_own_cell_has_a_decimal_point():
    assert convert(Figure("16.5"), "focal length") == ("16.5",)
    assert convert(Figure("1.234"), "focal length") == ("1.234",)


def test_factor_and_words():
    assert convert("3,5", "focal length", factor=0.01) == ("0.035",)
    assert convert("3,5 cm", "focal length", factor=2) == ("7 cm",)
    assert convert("auf Anfrage", "price", unit="EUR", words={"auf anfrage": ""}) == ("",)
    assert convert("S/W", "colour", words={"s/w": "mono"}) == ("mono",)
