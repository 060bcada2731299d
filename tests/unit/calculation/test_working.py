"""The working, the sheet it writes, and the calculation it becomes."""

from __future__ import annotations

import math
import pickle

import numpy as np
import pytest

import tensionlib as tl
from tensionlib.calculation.result import Calculation, Heading
from tensionlib.calculation.sheet import utilisation
from tensionlib.calculation.tables import Band, ThresholdTable
from tensionlib.calculation.working import Working
from tensionlib.errors import DataNotFoundError, InputError, UnitError
from tensionlib.quantities import AREA, COUNT, FACTOR, FORCE, LENGTH, STRESS, US

OWN = tl.project_notation(
    tl.Symbol("b", "b", LENGTH, "width"),
    tl.Symbol("t", "t", LENGTH, "thickness"),
    tl.Symbol("A", "A", AREA, "area"),
    tl.Symbol("f", "f", STRESS, "stress"),
    tl.Symbol("n", "n", COUNT, "number"),
    tl.Symbol("k", "k", FACTOR, "factor"),
    tl.Symbol("N", "N", FORCE, "capacity"),
    tl.Symbol("N_2", "N_{2}", FORCE, "other capacity"),
    tl.Symbol("N_least", r"N_{\min}", FORCE, "least capacity"),
    tl.Symbol("N_star", "N^{*}", FORCE, "force", "N*"),
)
LIMIT = tl.Constant("20 mm")
STRENGTHS = ThresholdTable(
    "strength by thickness",
    "a table of the test's own",
    {"plain": (Band(10.0, False, 300.0), Band(20.0, True, 280.0), Band(50.0, True, 260.0))},
)


@tl.formula("A", OWN, title="area")
def area(b, t):
    """Area."""
    return b * t


@tl.formula("N", OWN, title="capacity", clause="1.1")
def capacity(A, f):
    """Capacity."""
    return 0.9 * A * f


@tl.formula("N", OWN, title="reduced capacity", clause="1.2")
def reduced(A, f, k):
    """Capacity, reduced."""
    return k * A * f


@tl.condition(OWN, title="is it thin", clause="1.3")
def thin(t):
    return t <= LIMIT


def _written(t="12 mm", force="100 kN") -> tuple[Working, dict]:
    work = Working("Plate", OWN)
    e = {"b": work.given("b", "100 mm"), "t": work.given("t", t)}
    e["N_star"] = work.given("N_star", force)
    e["A"] = work.step(area, e["b"], e["t"])
    e["f"] = work.upto(STRENGTHS, "plain", "f", e["t"])
    if work.holds(thin, e["t"], yes="no reduction", no="reduced"):
        e["N"] = work.step(capacity, e["A"], e["f"])
    else:
        e["N"] = work.step(reduced, e["A"], e["f"], work.fixed("k", 0.5, "T1", note="thick"))
    work.check("tension", e["N_star"], e["N"], "1.1")
    return work, e


def _calculation(**changes) -> Calculation:
    work, e = _written(**changes)
    return Calculation.of(work, Heading("P1", "plate", "100x12", force=e["N_star"].index))


def test_values_checks_and_verdict():
    calc = _calculation()
    assert calc.value("A").internal == 1200.0
    assert calc.value("f").internal == 280.0
    assert calc.capacity.internal == 0.9 * 1200.0 * 280.0
    check = calc["tension"]
    assert check.utilisation == pytest.approx(100e3 / 302400.0)
    assert calc.passes
    assert calc.word == "PASS"
    assert "P1: 100x12, N* = 100 kN: PASS, governed by plate: tension (1.1)" in calc.headline


@pytest.mark.parametrize(
    ("t", "f"),
    [("9.99 mm", 300.0), ("10 mm", 280.0), ("20 mm", 280.0), ("20.01 mm", 260.0), ("50 mm", 260.0)],
)
def test_threshold_limits_both_sides(t, f):
    assert _calculation(t=t).value("f").internal == f


def test_threshold_beyond_the_table_is_refused():
    with pytest.raises(InputError, match="got 50.1 mm; the table ends at 50 mm"):
        _written(t="50.1 mm")


def test_condition_takes_the_printed_way():
    assert _calculation(t="20 mm").value("N").internal == 0.9 * 2000.0 * 280.0
    thick = _calculation(t="25 mm")
    assert thick.value("N").internal == 0.5 * 2500.0 * 260.0
    tested = [
        line
        for part in thick.record()["parts"]
        for line in part["lines"]
        if line["kind"] == "holds"
    ]
    assert tested[0]["text"] == "t = 25 mm > 20 mm"
    assert tested[0]["note"] == "reduced"


def test_sheet_filled_with_arrays_equals_scalars_bit_for_bit():
    work, _ = _written()
    sheet = work.sheet()
    rng = np.random.default_rng(5)
    n = 500
    inputs = {
        "b": rng.uniform(90.0, 300.0, n),
        "t": rng.uniform(5.0, 40.0, n),
        "N_star": rng.uniform(0.0, 900e3, n),
    }
    filled = sheet.fill(inputs)
    assert filled.follows.any()
    assert not filled.follows.all()
    used = filled.utilisations()
    assert used.shape == (1, n)
    for row in range(n):
        again = _calculation(
            t=f"{inputs['t'][row]!r} mm".replace("np.float64(", "").replace(")", ""),
        )
        follows = again.sheet == sheet
        assert follows == filled.follows[row]
        if follows:
            one = sheet.evaluate({k: float(v[row]) for k, v in inputs.items()})
            assert one[-1] == used[0][row]


def test_fill_refuses_missing_unknown_and_uneven_inputs():
    sheet = _written()[0].sheet()
    good = {"b": 100.0, "t": 12.0, "N_star": 1e5}
    with pytest.raises(InputError, match="missing t"):
        sheet.fill({"b": 100.0, "N_star": 1e5})
    with pytest.raises(InputError, match="unknown x"):
        sheet.fill({**good, "x": 1.0})
    with pytest.raises(InputError, match="different shapes"):
        sheet.fill({**good, "b": np.ones(3), "t": np.ones(4)})


def test_entry_refuses_arithmetic_and_truth():
    work = Working("Plate", OWN)
    b = work.given("b", "100 mm")
    for attempt in (lambda: b * 2, lambda: b + b, lambda: bool(b), lambda: b > b, lambda: float(b)):
        with pytest.raises(InputError, match="b: an entry has no arithmetic and no truth value"):
            attempt()


def test_wrong_role_count_and_owner_are_refused():
    work, e = _written()
    with pytest.raises(InputError, match="area: t is a length, got f, a stress"):
        work.step(area, e["b"], e["f"])
    with pytest.raises(InputError, match="area: got 1 entries; 2 are due: b, t"):
        work.step(area, e["b"])
    with pytest.raises(InputError, match="area: t got 3.0; an entry is due"):
        work.step(area, e["b"], 3.0)
    other = Working("Other", OWN)
    with pytest.raises(InputError, match="belongs to another working"):
        other.step(area, e["b"], e["t"])
    with pytest.raises(InputError, match="check 'tension' stands twice"):
        work.check("tension", e["N_star"], e["N"], "1.1")
    with pytest.raises(InputError, match="demand b is a length, capacity N a force"):
        work.check("odd", e["b"], e["N"], "1.1")
    with pytest.raises(UnitError, match="t"):
        work.given("t", "12 kN", key="t2")
    with pytest.raises(InputError, match="stands twice"):
        work.given("t", "12 mm")
    with pytest.raises(DataNotFoundError, match="symbol: 'bb' is not in the notation"):
        work.given("bb", "12 mm")


def test_least_and_greatest_name_the_one_that_rules():
    work, e = _written()
    other = work.given("N_2", "50 kN")
    low = work.least("N_least", e["N"], other, title="least")
    assert work.values[low.index] == 50e3
    line = Calculation.of(work, Heading("P1", "", "")).record()["parts"][0]["lines"][-1]
    assert line["note"] == "what rules: other capacity"
    assert line["ruling"] == "N_2"
    assert line["steps"][0] == r"\min\left(N,\ N_{2}\right)"
    assert line["text"] == "N_least = min(N; N_2) = min(302.4 kN; 50 kN) = 50 kN"


@pytest.mark.parametrize(
    ("demand", "capacity_", "expected"),
    [
        (10.0, 20.0, 0.5),
        (0.0, 20.0, 0.0),
        (0.0, 0.0, 0.0),
        (10.0, 0.0, math.inf),
        (10.0, -5.0, math.inf),
        (0.0, -5.0, math.inf),
    ],
)
def test_utilisation_rules(demand, capacity_, expected):
    assert utilisation(demand, capacity_) == expected
    assert utilisation(np.array([demand]), np.array([capacity_]))[0] == expected


def test_nan_never_passes():
    assert math.isnan(utilisation(math.nan, 1.0))
    work, e = _written()
    work.values[e["N"].index] = math.nan
    work.values[-1] = utilisation(1e5, math.nan)
    calc = Calculation.of(work, Heading("P1", "", ""))
    assert calc.word == "FAIL"
    check = calc.record()["checks"][0]
    assert check["verdict"] == "fail"
    assert check["note"] == "a number is missing, so the check fails"


def test_zero_capacity_says_why():
    work, e = _written()
    none = work.given_number("N_2", 0.0, "given", "N_2")
    work.check("nothing there", e["N_star"], none, "1.1")
    check = Calculation.of(work, Heading("P1", "", "")).record()["checks"][-1]
    assert check["verdict"] == "fail"
    assert check["note"] == "the capacity is zero or less, so the check fails"


def test_zero_force_says_no_demand():
    calc = _calculation(force="0 kN")
    assert calc["tension"].verdict == "no demand"
    assert calc.passes


def test_not_covered_is_never_a_pass():
    work, _ = _written()
    work.not_covered("tear-out", "nobody knows", "9.9")
    calc = Calculation.of(work, Heading("P1", "", ""))
    assert not calc.passes
    assert calc.word == "NOT COVERED"
    assert calc.record()["checks"][-1]["verdict"] == "not covered"


def test_advice_does_not_decide():
    work, e = _written()
    small = work.given_number("N_2", 1.0, "given", "N_2")
    work.check("advised", e["N_star"], small, "practice", kind="advice")
    calc = Calculation.of(work, Heading("P1", "", ""))
    assert calc["advised"].verdict == "advice"
    assert calc.passes


def test_lookup_errors_help():
    calc = _calculation()
    with pytest.raises(DataNotFoundError, match="Did you mean 'tension'"):
        calc["tensoin"]
    with pytest.raises(DataNotFoundError, match="symbol: 'Q' is not in the calculation"):
        calc.value("Q")


def test_fork_leaves_the_first_working_as_it_was():
    work, e = _written()
    count = len(work.lines)
    other = work.fork(OWN)
    other.check("again", other.adopt(e["N_star"]), other.adopt(e["N"]), "1.1")
    assert len(work.lines) == count
    assert len(other.lines) == count + 1


def test_views_change_units_not_verdicts():
    calc = _calculation()
    us = calc.shown_in(US)
    assert us["tension"].utilisation == calc["tension"].utilisation
    assert us.record()["checks"][0]["unit"] == "kip"
    assert us.value("A").internal == calc.value("A").internal


def test_same_inputs_same_hash():
    assert _calculation().inputs_hash == _calculation().inputs_hash
    assert _calculation().inputs_hash != _calculation(t="13 mm").inputs_hash


def test_formula_and_constant_pickle_by_name():
    assert pickle.loads(pickle.dumps(area)) is area
    again = pickle.loads(pickle.dumps(LIMIT))
    assert again == 20.0
    assert again.role is LENGTH


def test_notation_refuses_two_meanings():
    with pytest.raises(InputError, match="one symbol has one meaning"):
        tl.project_notation(tl.Symbol("a", "a", LENGTH, "one"), tl.Symbol("a2", "a", LENGTH, "two"))
    with pytest.raises(InputError, match="A Python identifier|a Python identifier"):
        tl.Symbol("N*", "N^{*}", FORCE, "force")


def test_formula_needs_its_parameters_in_the_notation():
    with pytest.raises(InputError, match="parameter 'q' is not in the notation"):

        @tl.formula("A", OWN, title="odd")
        def odd(q):
            return q * q


def test_condition_must_be_one_comparison():
    with pytest.raises(InputError, match="one comparison of two names"):

        @tl.condition(OWN, title="odd")
        def odd(t, b):
            return t <= 2 * b


def test_a_threshold_says_which_band_held():
    def note(t):
        lines = _calculation(t=t).record()["parts"][0]["lines"]
        return next(line["note"] for line in lines if line["kind"] == "upto")

    assert note("9 mm") == "plain: at 9 mm, under 10 mm (a table of the test's own)"
    assert note("10 mm") == "plain: at 10 mm, from 10 mm, up to 20 mm (a table of the test's own)"
    assert note("21 mm") == "plain: at 21 mm, over 20 mm, up to 50 mm (a table of the test's own)"
