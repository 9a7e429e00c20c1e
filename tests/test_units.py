"""Units: the everyday table against pint, and what is refused."""

import contextlib
import math
import subprocess
import sys

import pint
import pytest
from hypothesis import given
from hypothesis import strategies as st

from visionplan.units import EVERYDAY, EXPECTED, UnitError, convert, factor, number, parse, show

OURS = {"e": EVERYDAY["e"], "px": EVERYDAY["px"], "bit": EVERYDAY["bit"]}
"""What pint doesn't know, or takes for something else."""
BESIDE_PINT = {("1/s", "fps"), ("1", "1")} | {("lp/mm", unit) for unit in EVERYDAY["lp/mm"]}


@pytest.fixture(scope="module")
def registry():
    return pint.UnitRegistry()


@pytest.mark.parametrize(
    ("unit", "written"),
    [
        (unit, written)
        for unit, table in EVERYDAY.items()
        for written in table
        if unit not in OURS and (unit, written) not in BESIDE_PINT
    ],
)
def test_the_table_agrees_with_pint(registry, unit, written):
    core = "dimensionless" if unit == "1" else unit
    assert EVERYDAY[unit][written] == pytest.approx(registry.Quantity(1, written).to(core).magnitude, rel=1e-13)


@pytest.mark.parametrize(
    ("text", "unit", "value"),
    [
        ("50 mm", "mm", 50),
        ("0.05mm", "mm", 0.05),
        ("2 in", "mm", 50.8),
        (" 30 m ", "mm", 30_000),
        ("1e-3 m", "mm", 1),
        ("20 klx", "lx", 20_000),
        ("4 / s", "1/s", 4),
        ("4 1/s", "1/s", 4),
        ("120 fps", "1/s", 120),
        ("30 / min", "1/s", 0.5),
        ("180 deg", "rad", math.pi),
        ("-0.3 %", "1", -0.003),
        ("7 %", "1", 0.07),
        ("0.2", "1", 0.2),
        ("600 g", "g", 600),
        ("5 ms", "s", 0.005),
        ("30 W/m^2", "W/m^2", 30),
        ("30 W/m²", "W/m^2", 30),
        ("30 W/m**2", "W/m^2", 30),
        ("30 W m^-2", "W/m^2", 30),
        ("3 mW/cm²", "W/m^2", 30),
        ("6 m/min", "mm/s", 100),
        ("120 lp/mm", "lp/mm", 120),
        ("1200 lp / cm", "lp/mm", 120),
        ("254 lp/in", "lp/mm", 10),
        ("120 1/mm", "lp/mm", 120),
        ("8.2 ke-", "e", 8200),
        ("7 e⁻", "e", 7),
        ("5e-", "e", 5),
        ("3 J·s⁻¹", "W", 3),
        ("1 yard", "mm", 914.4),
        ("2.8", "", 2.8),
        ("2448 px", "px", 2448),
        ("12", "bit", 12),
    ],
)
def test_quantities(text, unit, value):
    assert parse(text, unit) == pytest.approx(value, rel=1e-14)


@pytest.mark.parametrize("micro", ["\u00b5", "\u03bc", "u"])
def test_every_micro_sign_is_micro(micro):
    assert parse(f"3.45 {micro}m", "mm") == pytest.approx(0.00345, rel=1e-15)
    assert factor(f"{micro}s", "s") == 1e-6
    assert factor(f"{micro}in", "mm") == pytest.approx(25.4e-6, rel=1e-14)


@pytest.mark.parametrize(
    ("text", "unit", "says"),
    [
        ("3", "mm", "no unit"),
        ("", "mm", "nothing"),
        ("  ", "", "nothing"),
        ("mm", "mm", "no quantity"),
        ("3 foo", "mm", "not known"),
        ("3 kg", "mm", "wrong dimension"),
        ("3 stone", "mm", "wrong dimension"),
        ("3 deg", "1", "wrong dimension"),
        ("3 %", "rad", "wrong dimension"),
        ("3 mrad", "1", "wrong dimension"),
        ("3 bit", "1", "wrong dimension"),
        ("3 dB", "1", "not known"),
        ("3 dBm", "W", "not known"),
        ("3 lp/s", "1/s", "not known"),
        ("1 rpm", "1/s", "wrong dimension"),
        ("5 %", "", "no place"),
        ("5 mm", "px", "no place"),
        ("1_000 mm", "mm", "plain decimal"),
        ("1,5 mm", "mm", "plain decimal"),
        ("1 000 mm", "mm", "plain decimal"),
        ("5 1", "1", "plain decimal"),
        ("nan mm", "mm", "no quantity"),
        ("inf mm", "mm", "no quantity"),
        ("1e400 mm", "mm", "too great"),
        ("1e308 km", "mm", "too great"),
        ("0x10 mm", "mm", "not known"),
        ("٣ mm", "mm", "no quantity"),
        ("1 mm**9999999**99", "mm", "not known"),
        ("1 mm^9^9^9", "mm", "not known"),
        ("1 mm^99999999", "mm", "not known"),
        ("1 " + "m*" * 100_000 + "m", "mm", "no quantity"),
        ("1" * 1_000_000, "", "no quantity"),
        ("1 m/", "mm", "not known"),
        ("1 (m)", "mm", "not known"),
        ("1 os.system('x')", "mm", "not known"),
    ],
)
def test_refused_with_what_was_expected(text, unit, says):
    with pytest.raises(UnitError) as refused:
        parse(text, unit)
    assert says in refused.value.found
    assert refused.value.expected == EXPECTED[unit]
    assert len(str(refused.value)) < 250


@pytest.mark.parametrize(
    "text", ["1_000", "nan", "inf", "-Infinity", "1e400", "0x1F", "١", "1,5", "1 2", "", "+", "e5", "1e", "1" * 100]
)
def test_what_is_no_plain_number(text):
    with pytest.raises(UnitError):
        number(text)


@given(st.floats(allow_nan=False, allow_infinity=False))
def test_plain_numbers_are_read_exactly(value):
    assert number(repr(value)) == value


@given(st.text(max_size=40), st.sampled_from(sorted(EVERYDAY)))
def test_no_text_gets_past_as_anything_but_a_finite_number(text, unit):
    with contextlib.suppress(UnitError):
        assert math.isfinite(parse(text, unit))


@given(st.integers(-999_999, 999_999))
def test_percent_and_micrometres_convert_without_a_rounding_error(whole):
    assert parse(f"{whole} %", "1") == float(f"{whole}e-2")
    assert convert(float(whole), factor("µm", "mm")) == float(f"{whole}e-3")


@pytest.mark.parametrize(
    ("value", "unit", "options", "text"),
    [
        (312.44, "mm", {}, "312.4 mm"),
        (312.44, "mm", {"system": "inch"}, "12.3 in"),
        (254.0, "mm/s", {"system": "inch"}, "10 in/s"),
        (600.0, "g", {"system": "inch"}, "600 g"),
        (550e-6, "mm", {"system": "inch"}, "550 nm"),
        (0.00345, "mm", {}, "0.00345 mm"),
        (30_000, "mm", {}, "30000 mm"),
        (-0.0, "mm", {}, "0 mm"),
        (-0.4, "mm", {}, "-0.4 mm"),
        (0.0052, "s", {}, "5.2 ms"),
        (12e-6, "s", {}, "12 µs"),
        (3e-10, "s", {}, "0.3 ns"),
        (0.0, "s", {}, "0 s"),
        (20_000, "lx", {}, "20 klx"),
        (math.radians(1), "rad", {}, "1 deg"),
        (0.2, "1", {"percent": True}, "20 %"),
        (0.2, "1", {}, "0.2"),
        (5.6, "", {}, "5.6"),
        (None, "mm", {}, "not stated"),
        (math.nan, "", {}, "not stated"),
        (math.inf, "mm", {}, "∞ mm"),
        (1.1, "x", {}, "1.1 x"),
        (312.44, "mm", {"digits": 2}, "312 mm"),
    ],
)
def test_shown_for_people(value, unit, options, text):
    assert show(value, unit, **options) == text


def test_everyday_units_do_not_load_pint():
    code = (
        "import sys; from visionplan.units import *\n"
        "parse('3.45 µm', 'mm'); parse('20 klx', 'lx'); parse('8 ke-', 'e')\n"
        "try: parse('3 kg', 'mm')\n"
        "except UnitError: pass\n"
        "assert not {'pint', 'numpy', 'rich'} & set(sys.modules)"
    )
    subprocess.run([sys.executable, "-c", code], check=True)
