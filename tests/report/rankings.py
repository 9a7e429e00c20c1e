"""Rankings to report: of the demo works, of random works, and of small works with hand-picked rows."""

from functools import cache
from pathlib import Path

from tests.reference.random_parts import table
from tests.reference.random_works import works as random_works
from visionplan.brief.model import Brief
from visionplan.brief.read import read_brief
from visionplan.catalogue.folder import read_catalogue
from visionplan.catalogue.items import Catalogue
from visionplan.solve import rank

WORKS = Path(__file__).parents[2] / "catalogs_demo"
BRIEFS = sorted(path.stem for path in WORKS.glob("briefs/*.toml"))
LENS = {
    "id": "L25",
    "mount": "C",
    "kind": "entocentric",
    "focal length": 25.0,
    "f-number min": 8.0,
    "f-number max": 8.0,
    "nearest object": 100.0,
    "front principal": 0.0,
    "pupil ratio": 1.0,
    "image circle": 12.0,
    "detail limit": 200.0,
    "length": 40.0,
    "diameter": 33.0,
    "price": 100.0,
    "flange distance": 17.526,
}
CAMERA = {
    "id": "K5",
    "mount": "C",
    "kind": "area",
    "pixels wide": 2000.0,
    "pixels high": 1500.0,
    "pixel pitch": 0.0035,
    "colour": "mono",
    "length": 50.0,
    "price": 500.0,
    "flange distance": 17.526,
}
BRIEF = Brief(field=(60.0, 45.0), feature=0.2, working_distance=(200.0, 400.0))
"""With K5 and L25: cover up to 5.25/45 = 0.1167, sampling from 0.0035/0.05 = 0.07."""


def small(cameras=({},), lenses=({},), rings=(), top=20, concessions=None, brief=BRIEF):
    """The ranking of cameras and lenses that differ from CAMERA and LENS in what is given."""
    tables = (
        table("lenses", [LENS | row for row in lenses]),
        table("cameras", [CAMERA | row for row in cameras]),
        table("spacers", list(rings)),
    )
    return rank(brief, Catalogue(*tables, "sha256:small"), top=top, concessions=concessions)


@cache
def demo(name, top):
    return rank(read_brief(WORKS / "briefs" / f"{name}.toml"), read_catalogue(WORKS), top=top)


@cache
def any_works(seed):
    return rank(*random_works(seed), top=8)
