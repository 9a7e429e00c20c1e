import pytest

from visionplan.catalogue.folder import read_catalogue
from visionplan.faults import InputError

LENSES = """\
id,mount,focal length [mm],f-number min,f-number max,nearest object [mm]
L25,C,25,1.8,16,200
L50,C,50,2.8,22,300
"""
CAMERAS = """\
id,mount,pixels wide,pixels high,pixel pitch [µm]
K5,C,2448,2048,3.5
"""


class Works:
    """A catalogue to be written and read: two good lenses, one good camera, unless told otherwise."""

    lenses, cameras = LENSES, CAMERAS

    def __init__(self, folder):
        self.folder = folder

    def lens(self, heading, cell, rows=1):
        """Lenses with one more column."""
        top, first, *_ = LENSES.splitlines()
        return "\n".join([f"{top},{heading}"] + [f"L{k}{first[3:]},{cell}" for k in range(rows)]) + "\n"

    def write(self, lenses=LENSES, cameras=CAMERAS, spacers=None):
        for item, text in (("lenses", lenses), ("cameras", cameras), ("spacers", spacers)):
            if text is not None:
                data = text if isinstance(text, bytes) else text.encode()
                (self.folder / f"{item}.csv").write_bytes(data)
        return self

    def read(self, skip_bad=False, **files):
        self.write(**files)
        return read_catalogue(self.folder, skip_bad)

    def faults(self, skip_bad=False, **files):
        with pytest.raises(InputError) as refused:
            self.read(skip_bad, **files)
        assert refused.value.faults
        return refused.value.faults

    def fault(self, **files):
        (fault,) = self.faults(**files)
        return fault


@pytest.fixture
def works(tmp_path):
    return Works(tmp_path)
