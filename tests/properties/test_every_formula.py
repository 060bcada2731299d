"""Every formula of every standard, in all its readings: proven on random numbers, seeded.

The library's formulas are found by walking the package, so that a new one is proven without
being listed here.
"""

from __future__ import annotations

import pkgutil
import random
import types
from importlib import import_module

import numpy as np
import pytest

import tensionlib.standards
from tensionlib.calculation.formula import Condition, Constant, Formula
from tensionlib.calculation.readback import check_line, evaluate
from tensionlib.quantities import METRIC, US, Quantity, Role, latex_value, quantity


def _found(kind: type) -> list:
    found = {}
    for module in pkgutil.walk_packages(tensionlib.standards.__path__, "tensionlib.standards."):
        for name, value in vars(import_module(module.name)).items():
            if isinstance(value, kind):
                found.setdefault(id(value), (f"{value.function.__module__}.{name}", value))
    return [
        pytest.param(value, id=name) for name, value in sorted(found.values(), key=lambda x: x[0])
    ]


FORMULAS = _found(Formula)
CONDITIONS = _found(Condition)
ROUNDS = 20

RANGES = {
    "length": (1.0, 900.0),
    "area": (100.0, 20000.0),
    "force": (1e3, 2e6),
    "stress": (200.0, 900.0),
    "weld strength": (100.0, 3000.0),
    "factor": (0.3, 1.5),
    "moment": (1e5, 1e8),
    "section modulus": (1e4, 1e6),
    "inertia": (1e6, 1e9),
    "weight per length": (0.05, 5.0),
    "force per length": (50.0, 3000.0),
    "elastic modulus": (1.9e5, 2.1e5),
    "angle": (0.1, 1.4),
}


# Symbols that stay real only in a range of their own: of the column curve, where ξλ exceeds 90.
OWN_RANGES = {"xi": (4.0, 6.0), "lambda_c": (30.0, 200.0), "lambda_n": (20.0, 200.0)}


def _value(role: Role, rng: random.Random) -> float:
    if role.name == "count":
        return float(rng.randint(1, 12))
    low, high = RANGES[role.name]
    return rng.uniform(low, high)


def _values(formula: Formula, rng: random.Random) -> list[float]:
    return [
        rng.uniform(*OWN_RANGES[symbol.name])
        if symbol.name in OWN_RANGES
        else _value(symbol.role, rng)
        for symbol in formula.symbols
    ]


def _with_constants(formula: Formula | Condition, change) -> types.FunctionType:
    """The same function with each Constant it reads by name put through `change`."""
    function = formula.function
    changed = {name: change(value) for name, value in formula.constants.items()}
    return types.FunctionType(
        function.__code__, {**function.__globals__, **changed}, function.__name__
    )


def _scale(role: Role, force: float, length: float) -> float:
    return force**role.force * length**role.length


def test_there_are_formulas_and_conditions():
    assert len(FORMULAS) > 50
    assert len(CONDITIONS) > 5


@pytest.mark.parametrize("formula", FORMULAS)
def test_homogeneous(formula: Formula):
    """Lengths and forces in other units: the result scales as its role says."""
    rng = random.Random(formula.name)
    for _ in range(ROUNDS):
        values = _values(formula, rng)
        force, length = rng.uniform(0.1, 9.0), rng.uniform(0.1, 9.0)
        scaled = [
            v * _scale(s.role, force, length) for v, s in zip(values, formula.symbols, strict=True)
        ]
        function = _with_constants(
            formula, lambda c, f=force, le=length: float(c) * _scale(c.role, f, le)
        )
        expected = formula(*values) * _scale(formula.gives.role, force, length)
        assert function(*scaled) == pytest.approx(expected, rel=1e-9, abs=1e-9 * abs(expected))


def test_homogeneity_catches_a_hidden_unit():
    """The rescaling finds a bare number that hides a unit."""
    from tensionlib.standards.common_as_nzs import bolts

    def planted(L_j):
        return 1.075 - L_j / 4000.0

    assert planted(600.0 * 2.0) != pytest.approx(bolts.long_joint_factor(600.0))
    scaled = _with_constants(bolts.long_joint_factor, lambda c: float(c) * 2.0)
    assert scaled(600.0 * 2.0) == pytest.approx(bolts.long_joint_factor(600.0))


@pytest.mark.parametrize("formula", FORMULAS)
def test_runs_on_quantities(formula: Formula):
    """On forallpeople quantities the result has the role's dimension and the same value."""
    rng = random.Random(formula.name)
    values = _values(formula, rng)

    def with_unit(value: float, role: Role):
        return value if role.dimensionless else quantity(value, role)

    function = _with_constants(formula, lambda c: with_unit(float(c), c.role))
    result = function(*[with_unit(v, s.role) for v, s in zip(values, formula.symbols, strict=True)])
    if formula.gives.role.dimensionless:
        assert not isinstance(result, Quantity)
        assert float(result) == pytest.approx(formula(*values), rel=1e-9)
    else:
        assert result.role.exponents == formula.gives.role.exponents
        assert result.internal == pytest.approx(formula(*values), rel=1e-9)


@pytest.mark.parametrize("view", [METRIC, US], ids=["metric", "US"])
@pytest.mark.parametrize("formula", FORMULAS)
def test_reads_back(formula: Formula, view):
    """The substituted picture, read back, lies in the line's own rounding band."""
    rng = random.Random(formula.name)
    roles = [s.role for s in formula.symbols] + [c.role for c in formula.constants.values()]
    units = {view.unit(role).latex: view.unit(role).size for role in [*roles, formula.gives.role]}
    for _ in range(ROUNDS):
        values = _values(formula, rng)
        shown = {
            name: latex_value(value, symbol.role, view)
            for name, symbol, value in zip(formula.parameters, formula.symbols, values, strict=True)
        }
        shown |= {n: latex_value(float(c), c.role, view) for n, c in formula.constants.items()}
        result = latex_value(formula(*values), formula.gives.role, view)
        check_line(formula.template.numeric(shown), result, units)


@pytest.mark.parametrize("formula", FORMULAS)
def test_array_equals_scalar_bit_for_bit(formula: Formula):
    rng = random.Random(formula.name)
    rows = [_values(formula, rng) for _ in range(200)]
    columns = [np.array(column) for column in zip(*rows, strict=True)]
    array = formula(*columns)
    scalars = [formula(*row) for row in rows]
    assert all(type(value) is float for value in scalars)
    assert np.array_equal(array, np.array(scalars))


@pytest.mark.parametrize("formula", FORMULAS)
def test_symbol_equals_number(formula: Formula):
    import sympy

    rng = random.Random(formula.name)
    values = _values(formula, rng)
    symbols = sympy.symbols(formula.parameters, positive=True)
    expression = formula(*symbols)
    found = float(expression.subs(dict(zip(symbols, values, strict=True))))
    assert found == pytest.approx(formula(*values), rel=1e-12)


@pytest.mark.parametrize("formula", FORMULAS)
def test_docstring_tells_what_it_gives(formula: Formula):
    assert formula.__doc__
    assert formula.__doc__.strip()
    assert formula.known


@pytest.mark.parametrize("condition", CONDITIONS)
def test_condition_scales(condition: Condition):
    """A condition answers alike whatever units the lengths are counted in."""
    rng = random.Random(condition.function.__name__)
    symbols = [condition.notation[name] for name in condition.parameters]
    answers = set()
    for _ in range(300):
        values = [10.0 ** rng.uniform(-0.3, 4.0) for _ in symbols]
        length = rng.uniform(0.1, 9.0)
        scaled = [v * _scale(s.role, 1.0, length) for v, s in zip(values, symbols, strict=True)]
        function = _with_constants(condition, lambda c, le=length: _scaled(c, le))
        answers.add(condition(*values))
        assert function(*scaled) == condition(*values)
    assert answers == {True, False}


def _scaled(constant: Constant, length: float) -> float:
    return float(constant) * _scale(constant.role, 1.0, length)


def test_evaluate_is_the_reader_used():
    """The reader itself gives a known number, so that the tests above prove something."""
    units = {r"\text{mm}": 1.0, r"\text{kN}": 1000.0}
    value = evaluate(r"2 \cdot \left(3\ \text{mm} + 4\ \text{mm}\right)", units)
    assert value.value == 14.0
