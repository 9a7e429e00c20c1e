import csv
import io

import pytest
from openpyxl import Workbook

from visionplan.catalogue.folder import read_catalogue
from visionplan.catalogue.intake.take import take
from visionplan.faults import InputError

LENSES = [
    ["Artikel", "Fassung", "Brennweite (mm)", "Blende", "MOD [m]", "Preis [EUR]", "Bestand"],
    ["A16", "C", "16", "1,4 - 16", "0,1", "1.234,50", "5"],
    ["A25", "CS", "25", "1,8 - 22", "0,15", "399,00", "-"],
]
MAP = """\
[lenses]
delimiter = ";"
decimal = ","
thousands = "."
[lenses.columns]
"Artikel" = "id"
"Fassung" = "mount"
"Brennweite (mm)" = { is = "focal length", unit = "mm" }
"Blende" = ["f-number min", "f-number max"]
"MOD [m]" = { is = "nearest object", unit = "m" }
"Preis [EUR]" = { is = "price", unit = "EUR" }
"Bestand" = "stock"
"""


def csv_bytes(rows, delimiter=";", encoding="utf-8"):
    text = io.StringIO()
    csv.writer(text, delimiter=delimiter).writerows(rows)
    return text.getvalue().encode(encoding)


class Intake:
    """A sheet, its map and the catalogue's folder, in a folder of their own."""

    def __init__(self, folder):
        self.folder, self.parts = folder, folder / "parts"

    def sheet(self, rows=LENSES, **how):
        """A CSV file; its path."""
        path = self.folder / "sheet.csv"
        path.write_bytes(rows if isinstance(rows, bytes) else csv_bytes(rows, **how))
        return str(path)

    def workbook(self, rows=LENSES, work=lambda sheet: None, **more):
        """A workbook, each cell typed as the test has it, with further worksheets; its path."""
        book = Workbook()
        book.active.title = "Linsen"
        for name, table in {"Linsen": rows, **more}.items():
            sheet = book[name] if name in book.sheetnames else book.create_sheet(name)
            for row in table:
                sheet.append(row)
        work(book.active)
        path = self.folder / "sheet.xlsx"
        book.save(path)
        return str(path)

    def map(self, text=MAP):
        path = self.folder / "map.toml"
        path.write_bytes(text if isinstance(text, bytes) else text.encode())
        return str(path)

    def take(self, sheet, map=MAP, **how):
        return take(sheet, self.map(map), str(self.parts), **how)

    def refused(self, sheet, map=MAP, **how):
        """The faults; nothing may be written."""
        before = self.files()
        with pytest.raises(InputError) as error:
            self.take(sheet, map, **how)
        assert error.value.faults
        assert self.files() == before
        return error.value.faults

    def files(self):
        """What stands in the catalogue's folder."""
        if not self.parts.exists():
            return None
        return {path.name: path.read_bytes() for path in self.parts.iterdir() if path.is_file()}

    def lenses(self):
        """The lenses as the program reads them, with a camera put beside them."""
        (self.parts / "cameras.csv").write_text(
            "id,mount,pixels wide,pixels high,pixel pitch [mm]\nK,C,100,100,0.005\n"
        )
        return read_catalogue(self.parts).lenses


@pytest.fixture
def intake(tmp_path):
    return Intake(tmp_path)
