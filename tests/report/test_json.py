import json
import math
from dataclasses import replace

import pytest

from tests.report.rankings import demo, small
from visionplan.report.json import ranking_json

CONTRACT = json.loads("""
{"brief": {"title": "…"}, "catalogue": {"lenses": 0, "cameras": 0, "spacers": 0, "fingerprint": "sha256:…"},
 "pairs": 0, "fitting": 0,
 "rigs": [{"rank": 1, "camera": "id", "lens": "id", "spacers": ["id"], "extension_mm": 0.0, "orientation": "landscape",
   "grid": [1, 1], "stop": 5.6, "stops": [4, 5.6, 8], "fits": true, "grade": "comfortable", "unknown": [],
   "span": [0.10, 0.13], "latitude": 0.3, "shortfall": 0.0,
   "pinch": ["sampling", "cover"], "held": null, "magnification": 0.114, "working_distance_mm": 0.0, "sampling_mm": 0.0,
   "field_mm": [0.0, 0.0], "depth_mm": [0.0, 0.0], "exposure_s": null, "snr": null, "snr_corner": null,
   "needed_illuminance_lx": null,
   "contrast": {"focus": 0.0, "above": 0.0, "below": 0.0}, "hyperfocal_mm": 0.0, "length_mm": null, "price": null,
   "demands": [{"name": "cover", "lo": null, "hi": 0.13, "asked": 1.0, "got": 1.1, "unit": "x", "verdict": "met"}],
   "assumptions": ["…"]}],
 "concessions": [{"demand": "sampling", "asked": 0.0, "needed": 0.0, "unit": "mm", "end": null, "camera": "id",
   "lens": "id"}]}
""")
"""The keys that scripts rely on, in their order."""


def keys(document):
    """Every key of a document with those beneath it, of a list by its first item."""
    if isinstance(document, dict):
        return [(key, keys(value)) for key, value in document.items()]
    if isinstance(document, list) and document and isinstance(document[0], dict):
        return keys(document[0])
    return None


def strict(text):
    def refuse(constant):
        raise AssertionError(f"{constant} is no JSON")

    return json.loads(text, parse_constant=refuse)


def numbers(document):
    if isinstance(document, float):
        yield document
    elif isinstance(document, dict | list):
        for value in document.values() if isinstance(document, dict) else document:
            yield from numbers(value)


def test_keys_are_the_contracts():
    assert keys(strict(ranking_json(demo("rim-cracks", 12)))) == keys(CONTRACT)


def test_values_are_the_rankings(each_demo):
    document = strict(ranking_json(each_demo))
    assert document["pairs"] == len(each_demo.catalogue.cameras) * len(each_demo.catalogue.lenses)
    assert document["fitting"] == each_demo.fitting
    assert len(document["rigs"]) == len(each_demo.rigs)
    for told, rig in zip(document["rigs"], each_demo.rigs):
        assert told["working_distance_mm"] == pytest.approx(rig.working_distance, rel=1e-9)
        assert told["span"] == pytest.approx(rig.span, rel=1e-9)
        assert told["stops"] == list(rig.stops)
        assert told["latitude"] == (pytest.approx(rig.latitude, rel=1e-9) if rig.fits else 0)
        assert [verdict["name"] for verdict in told["demands"]] == [verdict.name for verdict in rig.demands]
        asked = {verdict["name"]: verdict["asked"] for verdict in told["demands"]}
        assert asked["reach"] == pytest.approx(list(each_demo.brief.working_distance))


def test_same_bytes_for_the_same_ranking(each_random):
    text = ranking_json(each_random)
    assert text == ranking_json(replace(each_random, seconds=each_random.seconds + 1))
    assert text.isascii()
    assert text.endswith("}\n")


def test_gaps_and_infinities_are_null_and_digits_ten(each_random):
    for value in numbers(strict(ranking_json(each_random))):
        assert math.isfinite(value)
        assert value == float(f"{value:.10g}")
        assert str(value) != "-0.0"


def test_no_magnification_no_figures():
    rig = small(brief=replace(small().brief, feature=0.0005)).rigs[0]
    told = strict(ranking_json(replace(small(), rigs=(rig,))))["rigs"][0]
    assert told["span"] is told["pinch"] is told["magnification"] is told["working_distance_mm"] is None
    assert told["contrast"] == {"focus": None, "above": None, "below": None}
    assert told["field_mm"] == told["depth_mm"] == [None, None]
    assert (told["grade"], told["latitude"], told["shortfall"]) == (None, 0, 1)


def test_nan_infinity_and_negative_zero():
    rig = replace(small().rigs[0], snr=math.nan, exposure=math.inf, extension=-0.0, price=1 / 3)
    text = ranking_json(replace(small(), rigs=(rig,)))
    told = strict(text)["rigs"][0]
    assert told["snr"] is told["exposure_s"] is None
    assert '"extension_mm": 0.0,' in text
    assert '"price": 0.3333333333,' in text


def test_text_of_files_stays_as_it_is_but_escaped():
    ranking = small(cameras=[{"id": 'K\x1b[31m"\u2028\ud800漢'}])
    text = ranking_json(ranking)
    assert text.isascii()
    assert "\x1b" not in text
    assert strict(text)["rigs"][0]["camera"] == ranking.rigs[0].camera


def test_no_concessions_is_an_empty_list():
    assert strict(ranking_json(small()))["concessions"] == []
