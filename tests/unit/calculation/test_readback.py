"""Pictures read back as what they are pictures of, and planted errors are found."""

from __future__ import annotations

import ast
import linecache
import math
import random
import threading

import pytest

from tensionlib.calculation import templates
from tensionlib.calculation.readback import ReadbackError, check_line, evaluate
from tensionlib.calculation.templates import Template, build
from tensionlib.errors import InputError
from tensionlib.quantities import format_number

NAMES = "abcdef"


def _function(expression: str, name: str = "planted"):
    """A function of a to f made of source text, as a notebook cell makes one."""
    source = f"def {name}({', '.join(NAMES)}):\n    return {expression}\n"
    file = f"<test {hash(source)}>"
    linecache.cache[file] = (len(source), None, source.splitlines(True), file)
    scope: dict = {}
    exec(compile(source, file, "exec"), _CALLS | scope, scope)
    return scope[name]


from tensionlib.calculation import dispatch  # noqa: E402

_CALLS = {
    name: getattr(dispatch, name)
    for name in ("minimum", "maximum", "sqrt", "square", "absolute", "sin", "cos", "tan")
}


def _random(rng: random.Random, depth: int) -> str:
    if depth == 0 or rng.random() < 0.15:
        if rng.random() < 0.25:
            return rng.choice(["2", "0.85", "3", "1.075", "12"])
        return rng.choice(NAMES)
    kind = rng.random()
    one = _random(rng, depth - 1)
    if kind < 0.08:
        return f"(-({one}))"
    if kind < 0.16:
        return f"square({one})"
    if kind < 0.22:
        return f"sqrt(absolute({one}))"
    if kind < 0.32:
        return f"{rng.choice(['minimum', 'maximum'])}({one}, {_random(rng, depth - 1)})"
    return f"({one}) {rng.choice(['+', '-', '*', '*', '/'])} ({_random(rng, depth - 1)})"


def _value(rng: random.Random) -> float:
    return round(rng.choice([-1, 1, 1, 1]) * rng.uniform(0.2, 60.0), 2)


def test_random_expressions_read_back():
    """1500 random expressions: both sides of the picture give what the function gives."""
    rng = random.Random(1997)
    proven = 0
    for _ in range(1500):
        expression = ast.unparse(ast.parse(_random(rng, 4)))
        function = _function(expression)
        values = {name: _value(rng) for name in NAMES}
        try:
            expected = function(**values)
        except ZeroDivisionError:
            continue
        if not math.isfinite(expected) or not 1e-6 < abs(expected) < 1e9:
            continue
        template = build(function)
        shown = {name: format_number(value) for name, value in values.items()}
        numeric = template.numeric(shown)
        assert evaluate(numeric, {}).value == pytest.approx(expected, rel=1e-9), expression
        symbols = {name: rf"{name}_{{1}}" for name in NAMES}
        symbolic = template.symbolic(symbols)
        by_symbol = {symbols[name]: value for name, value in values.items()}
        assert evaluate(symbolic, {}, by_symbol).value == pytest.approx(expected, rel=1e-9)
        proven += 1
    assert proven > 1200


def test_text_reads_back_as_python():
    """The plain text keeps Python's brackets: read as Python it gives the same number."""
    rng = random.Random(4100)
    for _ in range(400):
        function = _function(ast.unparse(ast.parse(_random(rng, 4))))
        values = {name: _value(rng) for name in NAMES}
        try:
            expected = function(**values)
        except ZeroDivisionError:
            continue
        text = build(function).text_numeric({n: repr(v) for n, v in values.items()})
        python = text.replace("²", " ** 2").replace("·", " * ").replace("√", "sqrt")
        found = eval(python.replace("; ", ", "), {**_CALLS, "abs": abs})
        assert found == pytest.approx(expected, rel=1e-9), text


@pytest.mark.parametrize(
    ("expression", "dropped", "instead"),
    [
        ("a * (b - c)", r"\left( b - c \right)", "b - c"),
        ("a / (b + c)", r"\frac{a}{b + c}", r"\frac{a}{b} + c"),
        ("square(a + b)", r"\left(a + b\right)^{2}", "a + b^{2}"),
    ],
)
def test_a_dropped_bracket_is_found(expression, dropped, instead):
    template = build(_function(expression))
    shown = template.symbolic({n: n for n in NAMES})
    assert dropped.replace(" ", "") in shown.replace(" ", "")
    values = {"a": 3.0, "b": 7.0, "c": 2.0}
    result = format_number(_function(expression)(**values, d=0.0, e=0.0, f=0.0))
    numbers = {n: format_number(v) for n, v in values.items()}
    check_line(template.numeric(numbers | {"d": "0", "e": "0", "f": "0"}), result, {})
    broken = "".join(numbers.get(c, c) if c in "abc" else c for c in instead.replace(r"\frac", "@"))
    with pytest.raises(ReadbackError, match="does not hold"):
        check_line(broken.replace("@", r"\frac"), result, {})


def test_units_and_bands():
    units = {r"\text{mm}": 1.0, r"\text{mm}^{2}": 1.0, r"\text{kN}": 1000.0, r"\text{MPa}": 1.0}
    read = evaluate(r"0.9 \cdot 1810\ \text{mm}^{2} \cdot 320\ \text{MPa}", units)
    assert read.value == pytest.approx(521280.0)
    alone = evaluate(r"1234.5\ \text{mm}", units)
    assert alone.band == pytest.approx(0.05)
    product = evaluate(r"1234.5\ \text{mm} \cdot 2", units)
    assert product.band == pytest.approx(0.05 * 2 + 0.5e-4 * 1234.5)
    check_line(r"0.9 \cdot 1810\ \text{mm}^{2} \cdot 320\ \text{MPa}", r"521.28\ \text{kN}", units)
    with pytest.raises(ReadbackError, match=r"gives? 521280"):
        check_line(
            r"0.9 \cdot 1810\ \text{mm}^{2} \cdot 320\ \text{MPa}", r"521.38\ \text{kN}", units
        )


@pytest.mark.parametrize("latex", ["2 3", r"\foo{2}", r"\frac{2}{", "2 +", r"\left(2", "", "2 & 3"])
def test_what_is_not_printed_is_refused(latex):
    with pytest.raises(ReadbackError):
        evaluate(latex, {})


def test_squares_and_negatives_are_bracketed_once():
    template = build(_function("square(a) - b * c"))
    assert template.symbolic({n: f"{n}_{{g}}" for n in NAMES}) == r"a_{g}^{2} - b_{g} \cdot c_{g}"
    shown = template.numeric({"a": r"12\ \text{mm}", "b": "-3", "c": "4"})
    assert shown == r"\left(12\ \text{mm}\right)^{2} - \left(-3\right) \cdot 4"


@pytest.mark.parametrize(
    ("expression", "says"),
    [
        ("a if b else c", "has no picture"),
        ("a ** 2", "differs between Python and numpy"),
        ("a // b", "has no picture"),
        ("a % b", "has no picture"),
        ("min(a, b)", "has no picture"),
        ("a.real", "has no picture"),
        ("minimum(a, b, key=c)", "has no picture"),
        ("(lambda x: x)(a)", "has no picture"),
        ("a[0]", "has no picture"),
        ("a < b", "has no picture"),
        ("'a'", "has no picture"),
        ("True", "has no picture"),
        ("sqrt(a, b)", "takes one argument"),
        ("a * unknown", "neither a parameter nor a Constant"),
    ],
)
def test_what_has_no_picture_is_refused_by_name(expression, says):
    with pytest.raises(InputError, match=f"formula planted, line 2: .*{says}"):
        build(_function(expression))


def test_body_must_be_one_return():
    def two_lines(a):
        b = a * 2
        return b

    with pytest.raises(InputError, match="one return expression"):
        build(two_lines)


def test_source_must_be_had():
    scope: dict = {}
    exec("def nowhere(a):\n    return a * 2\n", scope)
    with pytest.raises(InputError, match="its source cannot be had"):
        build(scope["nowhere"])


def test_threads_build_the_same():
    functions = [_function(f"a * ({i} + b) / (c - {i})", f"threaded_{i}") for i in range(3, 15)]
    made: list[list[Template]] = [[], []]

    def work(out):
        out.extend(build(function) for function in functions)

    threads = [threading.Thread(target=work, args=(out,)) for out in made]
    for thread in threads:
        thread.start()
    for thread in threads:
        thread.join()
    assert made[0] == made[1]
    assert len(made[0]) == len(functions)


def test_users_handcalcs_options_stay():
    import handcalcs.global_config as config

    before = dict(config._config)
    templates._rendered.cache_clear()
    build(_function("a * b + 17 * c", "fresh"))
    assert config._config == before
