"""Beside a user's own forallpeople environment and handcalcs cells."""

import subprocess
import sys
import textwrap

import pytest

USE = """
from tensionlib.quantities import METRIC, US, door, parse, FORCE, LENGTH
from tensionlib.units import kN, mm, MPa, kip, inch
force = door("N", "285 kN", FORCE)
stress = force / (1860*mm**2)
out = [str(force), f"{stress:.3fL}", str(force.to("kip")), stress._repr_latex_(), str(2*inch)]
"""
EXPECTED = ["285 kN", r"153.23\ \text{MPa}", "64.071 kip", r"$153.23\ \text{MPa}$", "50.8 mm"]

SNAPSHOT = """
import builtins, forallpeople as si
def snapshot():
    env = si.environment
    return (dict(vars(builtins)), dict(vars(si)), dict(vars(env)), dict(env.units_by_dimension()),
            dict(env.units_by_factor()), str(5*si.m), repr(3.2*si.kg*si.m/si.s**2))
"""


def run(code: str) -> str:
    done = subprocess.run(
        [sys.executable, "-c", textwrap.dedent(code)], capture_output=True, text=True, timeout=120
    )
    assert done.returncode == 0, done.stderr
    return done.stdout


@pytest.mark.parametrize(
    "load",
    ["", "si.environment('structural')", "si.environment('structural', top_level=True)"],
    ids=["none", "structural", "structural at top level"],
)
def test_import_and_use_leave_the_users_environment_alone(load: str) -> None:
    out = run(f"{SNAPSHOT}\n{load}\nbefore = snapshot()\n{USE}\n"
              "assert snapshot() == before\nprint(out)")  # fmt: skip
    assert out.strip() == str(EXPECTED)


def test_the_snapshot_would_notice_a_loaded_environment() -> None:
    out = run(
        f"{SNAPSHOT}\nbefore = snapshot()\nsi.environment('structural', top_level=True)\n"
        "print(snapshot() == before)"
    )
    assert out.strip() == "False"


def test_an_environment_loaded_afterwards_works_and_changes_nothing_of_ours() -> None:
    out = run(f"""
{USE}
import forallpeople as si
si.environment('structural')
again = [str(force), f"{{stress:.3fL}}", str(force.to("kip")), stress._repr_latex_(), str(2*inch)]
assert again == out
assert str(5*si.kN) == "5.000 kN", str(5*si.kN)
assert str(door("length", 3*si.ft, LENGTH)) == "914.4 mm"
assert str(5*si.kN + force) == str(force + 5*si.kN) == "290 kN"
assert str(door("N", 10*si.kip, FORCE).to("kip")) == "10 kip"
print(out)
""")
    assert out.strip() == str(EXPECTED)


@pytest.mark.filterwarnings("ignore::DeprecationWarning")
def test_a_handcalcs_block_with_both_kinds_of_value() -> None:
    handcalcs = pytest.importorskip("handcalcs.handcalcs")
    import forallpeople as si

    from tensionlib.quantities import parse

    scope = {
        "A_g": parse("1860 mm2"),
        "N": parse("-285 kN"),
        "f_y": parse("300 MPa"),
        "w": 0.1 * si.m,
        "phi": 0.9,
    }
    source = "\n".join(
        [
            "sigma = N / A_g",
            "N_t = phi * A_g * f_y",
            "A_2 = A_g + w * w",
            "u = N / N_t",
            "b = w + A_g / w",
            "q = A_g ** 2",
        ]
    )
    exec(source, scope)
    limit = sys.getrecursionlimit()
    latex = handcalcs.LatexRenderer(
        source, scope, {"override": "", "precision": 3, "sci_not": None}
    ).render()
    sys.setrecursionlimit(limit)
    rows = [" ".join(row.replace("&", "").split()) for row in latex.splitlines() if "&" in row]
    minus = r"\left(-285\ \text{kN}\right)"
    area = r"1860\ \text{mm}^{2}"
    metre = r"100.000\ \mathrm{mm}"  # forallpeople's own way with its own value
    assert rows == [
        rf"\sigma = \frac{{ N }}{{ A_{{g}} }} = \frac{{ {minus} }}{{ {area} }} "
        r"= \left(-153.23\ \text{MPa}\right)",
        rf"N_{{t}} = \phi \cdot A_{{g}} \cdot f_{{y}} = 0.900 \cdot {area} \cdot 300\ \text{{MPa}} "
        r"= 502.2\ \text{kN}",
        rf"A_{{2}} = A_{{g}} + w \cdot w = {area} + {metre} \cdot {metre} "
        r"= 11860\ \text{mm}^{2}",
        rf"u = \frac{{ N }}{{ N_{{t}} }} = \frac{{ {minus} }}{{ 502.2\ \text{{kN}} }} = -0.568",
        rf"b = w + \frac{{ A_{{g}} }}{{ w }} = {metre} + \frac{{ {area} }}{{ {metre} }} "
        r"= 118.6\ \text{mm}",
        rf"q = \left( A_{{g}} \right) ^{{ 2 }} = \left( {area} \right) ^{{ 2 }} "
        r"= 3.4596 \cdot 10^{6}\ \text{mm}^{4}",
    ]


def test_a_render_cell_in_a_shell() -> None:
    pytest.importorskip("handcalcs")
    pytest.importorskip("IPython")
    out = run("""
import warnings
warnings.simplefilter("ignore")
from IPython.core.interactiveshell import InteractiveShell
from IPython.utils.capture import capture_output
shell = InteractiveShell.instance()
shell.run_cell("import handcalcs.render\\nimport forallpeople as si")
shell.run_cell("from tensionlib.units import kN, mm, MPa\\nN = 285*kN\\nA_g = 1860*mm**2")
shell.run_cell("w = 0.1*si.m")
with capture_output() as captured:
    result = shell.run_cell("%%render\\nsigma = N / A_g\\nA_2 = A_g + w*w")
assert result.success
print("".join(o.data["text/latex"] for o in captured.outputs))
print(str(shell.user_ns["sigma"]), shell.user_ns["A_2"].internal)
""")
    assert r"\frac{ 285\ \text{kN} }{ 1860\ \text{mm}^{2} }" in out
    assert r"153.23\ \text{MPa}" in out
    assert r"11860\ \text{mm}^{2}" in out
    assert out.strip().endswith("153.23 MPa 11860.0")


def test_importing_stays_light() -> None:
    out = run("""
import sys
import tensionlib.quantities, tensionlib.units
heavy = {"numpy", "sympy", "handcalcs", "pandas", "pydantic", "IPython", "matplotlib"}
print(sorted(heavy & set(sys.modules)))
""")
    assert out.strip() == "[]"
