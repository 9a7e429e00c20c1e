import re
from dataclasses import replace

import pytest

from tests.report.rankings import small
from visionplan.report.figures import BY_NAME, FIGURES, best, field, money, room, setup, short


@pytest.mark.parametrize(
    ("latitude", "text"),
    [(0.1999, "19 %"), (0.2, "20 %"), (0.2 - 1e-12, "20 %"), (0.0999, "9.9 %"), (0.0, "0 %"), (1.234, "123 %")],
)
def test_latitude_is_cut_and_not_rounded(latitude, text):
    assert room(latitude) == text


@pytest.mark.parametrize(
    ("shortfall", "text"), [(0.2, "20 %"), (0.2001, "21 %"), (1e-6, "0.1 %"), (0.0123, "1.3 %"), (1.0, "100 %")]
)
def test_shortfall_is_rounded_up(shortfall, text):
    assert short(shortfall) == text


def test_figures_of_a_rig_worked_by_hand():
    rig = small().rigs[0]
    # m = sqrt(0.07 * 0.11667), u = s = f (1/m + 1)
    m = (0.07 * 5.25 / 45) ** 0.5
    expected = {
        "magnification": f"{m:.5f}",
        "working distance": f"{25 * (1 + 1 / m):.1f} mm",
        "sampling": f"{0.0035 / m:.5f} mm a pixel",
        "field width": f"{7 / m:.2f} mm",
        "field height": f"{5.25 / m:.2f} mm",
        "price": "600",
        "stop": "8",
        "spacer rings": "none",
        "cameras": "1 × 1",
        "exposure": "–",
        "grade": "comfortable",
        "pinch": "sampling against cover",
        "unknown": "nothing",
    }
    assert {name: BY_NAME[name].text(rig) for name in expected} == expected
    assert BY_NAME["working distance"].text(rig, "inch") == f"{25 * (1 + 1 / m) / 25.4:.2f} in"


def test_every_figure_reads(each_random):
    for rig in each_random.rigs:
        for entry in FIGURES:
            for system in ("mm", "inch"):
                text = entry.text(rig, system)
                assert text
                assert not re.search(r"nan|None|inf\b", text)


def test_what_the_catalogue_leaves_out_is_said():
    rig = small(cameras=[{"price": None, "length": None}]).rigs[0]
    assert BY_NAME["price"].text(rig) == "not stated"
    assert BY_NAME["to the camera back"].text(rig) == "not stated"


def test_only_what_is_not_plain_is_told_of_a_setting():
    plain = small().rigs[0]
    assert setup(plain) == ""
    other = replace(plain, spacers=("r5", "r\x1b1"), orientation="portrait", grid=(2, 1))
    assert setup(other) == "r5 + r␛1, portrait, 2 × 1 cameras"


def test_field_across_the_row_of_a_line_scan_camera_is_left_out():
    rig = replace(small().rigs[0], field=(260.0, None))
    assert field(rig) == "260 mm"
    assert field(rig, "inch") == "10.24 in"
    assert BY_NAME["field height"].text(rig) == "–"


def test_prices_carry_the_catalogues_currency():
    catalogue = small().catalogue
    catalogue = replace(catalogue, lenses=replace(catalogue.lenses, currency="EUR"))
    assert money(1637.5, catalogue) == "1637.5 EUR"


def test_best_figures_are_marked_only_where_rigs_differ():
    rig = small().rigs[0]
    rigs = [replace(rig, price=price) for price in (300.0, 200.0, None, 200.0)]
    assert best(BY_NAME["price"], rigs) == {1, 3}
    assert best(BY_NAME["price"], [rigs[1], rigs[3]]) == frozenset()
    assert best(BY_NAME["price"], [rigs[2], rigs[2]]) == frozenset()
    assert best(BY_NAME["stop"], rigs) == frozenset()
    assert best(BY_NAME["latitude"], [replace(rig, latitude=0.1), rig]) == {1}
