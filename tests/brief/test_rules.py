"""Lines that contradict each other."""

import pytest

from visionplan.brief.read import parse_brief
from visionplan.faults import InputError


def brief_text(scene="", station="", distance='["100 mm", "450 mm"]', **sections):
    others = "\n".join(f"[{name}]\n{rows}" for name, rows in sections.items())
    return (
        f'[scene]\nfield = ["12 mm", "9 mm"]\nfeature = "0.4 mm"\n{scene}\n'
        f"[station]\nworking_distance = {distance}\n{station}\n{others}"
    )


def columns(text):
    try:
        parse_brief(text, "b.toml")
    except InputError as error:
        return [fault.column for fault in error.faults]
    return []


@pytest.mark.parametrize(
    ("key", "bad", "good"),
    [
        ("station.working_distance", {"scene": 'above = "100 mm"'}, {"scene": 'above = "99.9 mm"'}),
        (
            "station.working_distance",
            {"station": 'layers = [{ index = 1.5, thickness = "60 mm" }, { index = 1.5, thickness = "40 mm" }]'},
            {"station": 'layers = [{ index = 1.5, thickness = "60 mm" }, { index = 1.5, thickness = "39 mm" }]'},
        ),
        (
            "station.fold",
            {"station": 'fold = { from_lens = "450 mm" }'},
            {"station": 'fold = { from_lens = "449 mm" }'},
        ),
        (
            "focus.plane",
            {"scene": 'above = "4 mm"\nbelow = "1 mm"', "focus": 'plane = "4.1 mm"'},
            {"scene": 'above = "4 mm"\nbelow = "1 mm"', "focus": 'plane = "4 mm"'},
        ),
        (
            "focus.plane",
            {"scene": 'above = "4 mm"\nbelow = "1 mm"', "focus": 'plane = "-1.1 mm"'},
            {"scene": 'above = "4 mm"\nbelow = "1 mm"', "focus": 'plane = "-1 mm"'},
        ),
        ("focus.plane", {"focus": 'plane = "1 mm"'}, {"focus": 'plane = "reference"'}),
        (
            "light.pulse",
            {"motion": 'rate = "4 / s"', "light": 'pulse = "250 ms"'},
            {"motion": 'rate = "4 / s"', "light": 'pulse = "249 ms"'},
        ),
        (
            "light.pulse",
            {"light": 'max_exposure = "5 ms"\npulse = "5 ms"'},
            {"light": 'max_exposure = "5 ms"\npulse = "4.9 ms"'},
        ),
        ("light.snr", {"light": "snr = 40"}, {"light": "snr = 40\nreflectance = 0.5"}),
        (
            "light.illuminance",
            {"light": 'illuminance = "20 klx"\nwavelength = "781 nm"'},
            {"light": 'illuminance = "20 klx"\nwavelength = "780 nm"'},
        ),
        (
            "light.illuminance",
            {"light": 'illuminance = "20 klx"\nwavelength = "379 nm"'},
            {"light": 'irradiance = "20 W/m^2"\nwavelength = "379 nm"'},
        ),
        ("scene.task", {"scene": 'task = "edge"\npixels_per_feature = 4'}, {"scene": 'task = "edge"'}),
        ("motion.blur", {"motion": 'blur = "1 mm"\nblur_pixels = 1'}, {"motion": 'blur = "1 mm"'}),
        ("focus.blur", {"focus": 'blur = "1 mm"\nblur_pixels = 1'}, {"focus": "blur_pixels = 1"}),
        (
            "light.irradiance",
            {"light": 'irradiance = "1 W/m^2"\nilluminance = "1 klx"'},
            {"light": 'illuminance = "1 klx"'},
        ),
        (
            "station.layers",
            {"station": 'layers = [{ material = "N-BK7", thickness = "1 mm" }]', "light": 'wavelength = "2.4 um"'},
            {"station": 'layers = [{ material = "sapphire", thickness = "1 mm" }]', "light": 'wavelength = "2.4 um"'},
        ),
        (
            "station.layers",
            {"station": 'layers = [{ material = "fused silica", thickness = "1 mm" }]', "light": 'wavelength = "4 um"'},
            {"station": 'layers = [{ material = "water", thickness = "1 mm" }]', "light": 'wavelength = "4 um"'},
        ),
    ],
)
def test_a_contradiction_is_refused_and_its_neighbour_is_not(key, bad, good):
    assert columns(brief_text(**bad)) == [key]
    assert columns(brief_text(**good)) == []


def test_an_snr_names_the_reflectance_it_lacks():
    with pytest.raises(InputError, match=r"reflectance = 0\.5"):
        parse_brief(brief_text(light="snr = 40"), "")


def test_invisible_light_names_the_irradiance():
    with pytest.raises(InputError, match=r"850 nm is invisible.*irradiance"):
        parse_brief(brief_text(light='illuminance = "1 klx"\nwavelength = "850 nm"'), "")


def test_lengths_are_told_in_the_briefs_units():
    with pytest.raises(InputError, match=r"3\.937 in.*above"):
        parse_brief('units = "inch"\n' + brief_text(scene='above = "100 mm"'), "")


def test_equal_ends_of_the_working_distance_are_one_distance():
    assert columns(brief_text(distance='["100 mm", "100 mm"]')) == []


def test_all_contradictions_at_once():
    text = brief_text(
        scene='above = "200 mm"\ntask = "edge"\npixels_per_feature = 4',
        light='snr = 40\npulse = "5 ms"\nmax_exposure = "5 ms"',
        focus='plane = "300 mm"',
    )
    assert columns(text) == ["scene.task", "station.working_distance", "light.snr", "light.pulse", "focus.plane"]


def test_no_contradiction_is_seen_in_what_could_not_be_read():
    assert columns(brief_text(scene='above = "200"', focus='plane = "300 mm"')) == ["scene.above"]
