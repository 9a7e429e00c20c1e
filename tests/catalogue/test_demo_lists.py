"""The demo works' lists hang together as real ones do: focusing, links, mounts."""

from functools import cache
from pathlib import Path

import numpy as np
import pytest

from visionplan.catalogue.folder import read_catalogue


@cache
def works():
    return read_catalogue(Path(__file__).parents[2] / "catalogs_demo")


def test_lenses_focus_where_they_say():
    """Nearest object, nearest magnification and front principal plane hang together: MOD + a = f (1 + 1/m)."""
    lenses = works().lenses
    focal, nearest, a = lenses["focal length"], lenses["nearest object"], lenses["front principal"]
    stated = ~np.isnan(a) & ~np.isnan(lenses["nearest magnification"])
    assert stated.sum() > 40
    near = focal * (1 + 1 / lenses["nearest magnification"])
    assert nearest[stated] + a[stated] == pytest.approx(near[stated], rel=1e-3)


def test_cameras_send_no_more_than_their_link_carries():
    """Bytes in a second against the links' figures, from memory of the open standards."""
    bytes_a_second = {
        "GigE Vision": 125e6,
        "USB3 Vision": 500e6,
        "CoaXPress": 4 * 12.5e9 * 0.8 / 8,
        "Camera Link": 850e6,
    }
    metres = {"GigE Vision": 100, "USB3 Vision": 5, "CoaXPress": 40, "Camera Link": 10}
    cameras = works().cameras
    rate = np.where(np.isnan(cameras["line rate"]), cameras["frame rate"], cameras["line rate"])
    sent = rate * cameras["pixels wide"] * cameras["pixels high"] * cameras["bit depth"] / 8
    carried = np.array([bytes_a_second[link] for link in cameras["interface"]])
    assert (sent <= carried).all()
    reach = np.array([metres[link] for link in cameras["interface"]]) * 1000
    assert (np.nan_to_num(cameras["cable limit"]) <= reach).all()


def test_lists_have_what_a_buyer_needs():
    lists = works()
    assert (len(lists.lenses), len(lists.cameras), len(lists.spacers)) == (91, 78, 22)
    assert not lists.warnings
    assert {"C", "CS", "F", "M42"} <= set(lists.lenses["mount"]) & set(lists.cameras["mount"])
    for table in (lists.lenses, lists.cameras):
        m42 = np.array([mount == "M42" for mount in table["mount"]])
        assert not np.isnan(table["flange distance"][m42]).any()
