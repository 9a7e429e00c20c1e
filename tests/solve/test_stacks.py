"""Spacer stacks: rings, adapters and helicoids, against stacks found by trying every choice of rings."""

from itertools import combinations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from tests.reference.random_parts import table
from tests.solve.works import catalogue
from visionplan.brief.model import Brief
from visionplan.solve import judge_one, rank
from visionplan.solve.stacks import stacks_between

RINGS = st.lists(
    st.fixed_dictionaries(
        {
            "mount": st.sampled_from(["C", "CS", "F"]),
            "camera mount": st.sampled_from(["", "", "C", "F"]),
            "length": st.sampled_from([0.5, 1.0, 1.5, 5.0, 10.0]),
            "travel": st.sampled_from([np.nan, np.nan, 4.0]),
            "price": st.sampled_from([10.0, 12.0, np.nan]),
            "quantity": st.sampled_from([np.nan, 0.0, 1.0, 2.0, 5.0]),
        }
    ),
    max_size=5,
)


def by_trying(rings, camera, lens, cameras):
    """Length and travel → (rings, price, ids) of the best stack, from every set of up to three single rings."""
    of = {"C": "C", "CS": "C", "F": "F"}
    single = []
    for ring in rings:
        sides = of[ring["mount"]], of[ring["camera mount"] or ring["mount"]]
        count = 3 if np.isnan(ring["quantity"]) else int(ring["quantity"] // cameras)
        single += [(ring, sides)] * min(3, count)
    best = {}
    for count in range(4):
        for chosen in combinations(single, count):
            adapters = [sides for _, sides in chosen if sides[0] != sides[1]]
            plain = [sides[0] for _, sides in chosen if sides[0] == sides[1]]
            if adapters != ([] if camera == lens else [(lens, camera)]) or not set(plain) <= {camera, lens}:
                continue
            key = tuple(round(sum(np.nan_to_num(ring[name]) for ring, _ in chosen), 6) for name in ("length", "travel"))
            prices = [np.inf if np.isnan(ring["price"]) else ring["price"] for ring, _ in chosen]
            stack = count, sum(prices), tuple(sorted(ring["id"] for ring, _ in chosen))
            best[key] = min(best.get(key, stack), stack)
    return best


@given(rings=RINGS, camera=st.sampled_from("CF"), lens=st.sampled_from("CF"), cameras=st.integers(1, 2))
@settings(max_examples=150, deadline=None)
def test_stacks_are_the_best_of_every_choice_of_rings(rings, camera, lens, cameras):
    rings = [ring | {"id": f"ring-{i}"} for i, ring in enumerate(rings)]
    stacks = stacks_between(table("spacers", rings), camera, lens, cameras)
    found = {
        (round(float(length), 6), round(float(travel), 6)): (int(count), np.inf if np.isnan(price) else price, ids)
        for length, travel, count, price, joins, ids in zip(
            stacks.length, stacks.travel, stacks.rings, stacks.price, stacks.joins, stacks.ids
        )
        if joins
    }
    expected = by_trying(rings, camera, lens, cameras)
    assert found == expected
    assert list(stacks.length) == sorted(stacks.length)


BRIEF = Brief(field=(100.0, 75.0), feature=1.0, working_distance=(200.0, 600.0))


def test_an_adapter_lets_a_lens_of_another_thread_focus():
    # 46.5 mm flange on a 17.526 mm camera: 28.974 mm are missing, and the adapter is just as long
    adapter = {"id": "f-to-c", "mount": "F", "camera mount": "C", "length": 28.974}
    lens = {"mount": "F", "flange distance": 46.5, "focal length": 50.0, "nearest object": 300.0}
    with_adapter = catalogue([lens], spacers=[adapter])
    rig = rank(BRIEF, with_adapter).rigs[0]
    assert rig.fits
    assert rig.spacers == ("f-to-c",)
    least, greatest = next(verdict.asked for verdict in rig.demands if verdict.name == "travel")
    assert least == pytest.approx(0, abs=1e-12)
    assert greatest == pytest.approx(50**2 / (300 + 10 - 50))
    without = rank(BRIEF, catalogue([lens]))
    assert not without.fitting
    assert without.rigs[0].missed_gates == ("mount",)


def test_a_helicoid_adds_its_travel_to_the_focus_ring():
    # the ring alone reaches 25²/(1000 + 10 − 25) = 0.635 mm; at m = 0.1 the lens stands 2.5 mm out
    lens = {"nearest object": 1000.0}
    helicoid = {"id": "screw", "mount": "C", "length": 1.0, "travel": 2.0, "quantity": 1.0}
    brief = Brief(field=(90.0, 70.0), feature=0.25, working_distance=(240.0, 260.0))
    rig = rank(brief, catalogue([lens], spacers=[helicoid])).rigs[0]
    assert rig.fits
    assert rig.spacers == ("screw",)
    travel = next(verdict for verdict in rig.demands if verdict.name == "travel")
    assert travel.asked == pytest.approx((1.0, 1.0 + 625 / 985 + 2.0))
    plain = helicoid | {"travel": np.nan}
    assert not rank(brief, catalogue([lens], spacers=[plain])).fitting


def test_a_rig_with_rings_of_the_wrong_thread_is_refused():
    from visionplan.faults import InputError

    ring = {"id": "m42-ring", "mount": "M42", "length": 5.0}
    with pytest.raises(InputError, match="m42-ring joins M42 to M42; expected rings between C"):
        judge_one(BRIEF, catalogue(spacers=[ring]), "camera", "lens", rings=["m42-ring"])
