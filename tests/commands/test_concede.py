"""concede: what gives, and what each line costs."""

import re
from pathlib import Path

from tests.commands.conftest import BRIEF


def test_where_something_fits(command):
    status, out, err = command("concede", command.jar_lids)
    assert (status, err) == (0, "")
    fitting, pairs = (int(n.replace(",", "")) for n in re.match(r"([\d,]+) of ([\d,]+) pairs fit:", out).groups())
    assert 0 < fitting < pairs == command.rows("cameras") * command.rows("lenses")
    # without its budget as many more fit as the brief without that line has fitting pairs more
    toll = int(re.search(r"([+-]\d+)  choose.max_price", out)[1])
    brief = re.sub(r"(?m)^max_price.*$", "", Path(command.jar_lids).read_text(encoding="utf-8"))
    _, out, _ = command("concede", command.brief(brief), "--catalogue", command.demo)
    assert int(re.match(r"(\d+) of", out)[1]) == fitting + toll


def test_a_concession_taken_lets_a_rig_fit(command):
    text = """
        strict = true
        [scene]
        field = ["120 mm", "90 mm"]
        feature = "0.5 mm"
        [station]
        working_distance = ["250 mm", "450 mm"]
        [choose]
        max_price = {}
    """
    status, out, _ = command("concede", command.brief(text.format(50)), "--catalogue", command.demo)
    assert status == 1
    assert re.match(r"None of [\d,]+ pairs fits\.", out)
    price = float(re.search(r"a price of ([\d.]+)", out)[1])
    assert price > 50
    assert command("concede", command.brief(text.format(price)), "--catalogue", command.demo)[0] == 0
    assert command("concede", command.brief(text.format(price * 0.999)), "--catalogue", command.demo)[0] == 1


def test_contradictions_are_told_on_standard_error(command):
    brief = BRIEF.replace('"0.5 mm"', '"0.02 mm"\nabove = "20 mm"')
    status, _, err = command("concede", command.brief(brief), "--catalogue", command.demo)
    assert status == 1
    assert "contradict" in err


def test_inches(command):
    brief = BRIEF.replace('"0.5 mm"', '"0.05 mm"')
    status, out, _ = command("concede", command.brief(brief), "--catalogue", command.demo, "--units", "inch")
    assert status == 1
    assert " mm" not in out
    assert " in " in out or " in:" in out
