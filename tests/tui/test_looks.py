"""Palettes: contrast by the formula of WCAG 2.1 (luminance as in sRGB, from memory); no role without one."""

import itertools

import pytest

from visionplan.tui.looks import COLOURS, PALETTES, ROLES, style

AA = 4.5
"""Least contrast of text at level AA."""


def luminance(triplet):
    linear = [c / 12.92 if c <= 0.04045 else ((c + 0.055) / 1.055) ** 2.4 for c in (v / 255 for v in triplet)]
    return 0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2]


def contrast(one, other):
    light, dark = sorted((luminance(one), luminance(other)), reverse=True)
    return (light + 0.05) / (dark + 0.05)


def test_contrast_of_black_and_white():
    assert contrast((0, 0, 0), (255, 255, 255)) == pytest.approx(21)
    assert contrast((0x77, 0x77, 0x77), (255, 255, 255)) == pytest.approx(4.48, abs=0.01)


@pytest.mark.parametrize("palette", COLOURS)
def test_every_role_is_readable_also_under_the_cursor(palette):
    for role, under in itertools.product(ROLES, ("", "cursor", "here")):
        look = style(palette, f"{role} {under}".strip())
        assert contrast(look.color.triplet, look.bgcolor.triplet) >= AA, (role, under)


@pytest.mark.parametrize("palette", [*PALETTES, "plain"])
def test_every_role_has_a_look(palette):
    for role in ROLES:
        style(palette, role)


def test_plain_has_no_colour():
    for role in ROLES:
        look = style("plain", role)
        assert look.color is None
        assert look.bgcolor is None


def test_terminal_palette_is_of_the_terminals_own_colours():
    for role in ROLES:
        for colour in (style("terminal", role).color, style("terminal", role).bgcolor):
            assert colour is None or colour.number < 16


def test_roles_of_chart_and_drawing_have_a_look():
    from visionplan.brief.read import read_brief
    from visionplan.catalogue.folder import read_catalogue
    from visionplan.demo import demo_folder
    from visionplan.report.elevation import elevation_rows
    from visionplan.report.spanchart import span_rows
    from visionplan.solve import rank

    catalogue = read_catalogue(demo_folder())
    for name in ("jar-lids", "rim-cracks", "leak-bath", "terminal-pins"):
        for rig in rank(read_brief(demo_folder() / "briefs" / f"{name}.toml"), catalogue, top=3).rigs:
            for row in [*span_rows(rig, 80), *elevation_rows(rig, 80, 14)]:
                assert {role for _, role in row} <= set(ROLES)
