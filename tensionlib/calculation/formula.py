"""A clause formula: one plain function, read as number, array, symbol and picture."""

from __future__ import annotations

import ast
import inspect
import operator
import textwrap
from collections.abc import Callable
from dataclasses import dataclass, field
from functools import cached_property
from typing import TYPE_CHECKING, Any

from tensionlib.calculation.symbols import Notation, Symbol
from tensionlib.errors import InputError
from tensionlib.quantities import Role, format_value, latex_value, parse

if TYPE_CHECKING:
    from tensionlib.calculation.templates import Template


class Constant(float):
    """A number of a clause that has a unit of its own, such as the 4000 mm of a long joint.

    It computes as a float in internal units, prints with its unit, and is rescaled with the
    inputs when a formula is proven homogeneous.
    """

    role: Role
    latex: str
    text: str

    def __new__(cls, text: str) -> Constant:
        parsed = parse(text)
        constant = super().__new__(cls, parsed.internal)
        constant.role = parsed.role
        constant.text = format_value(parsed.internal, parsed.role)
        constant.latex = latex_value(parsed.internal, parsed.role)
        return constant

    def __reduce__(self) -> tuple[type[Constant], tuple[str]]:
        return (Constant, (self.text,))


@dataclass(frozen=True, eq=False)
class Formula:
    """A formula of a clause or of the user, made by the `formula` decorator.

    Calling it evaluates the function on floats, arrays of shape (n,), sympy symbols or
    forallpeople quantities alike. The picture comes from the function's own source.
    """

    function: Callable[..., Any]
    gives: Symbol
    notation: Notation
    clause: str
    title: str
    known: str
    parameters: tuple[str, ...] = field(init=False)

    def __post_init__(self) -> None:
        names = tuple(inspect.signature(self.function).parameters)
        for name in names:
            if name not in self.notation:
                raise InputError(
                    f"formula {self.function.__name__}: parameter {name!r} is not in the notation"
                    f" of {self.notation.source.short}; add a Symbol for it"
                )
        object.__setattr__(self, "parameters", names)
        self.__dict__["__doc__"] = self.function.__doc__

    @property
    def name(self) -> str:
        return self.function.__name__

    @cached_property
    def symbols(self) -> tuple[Symbol, ...]:
        """The symbols of the parameters, in order."""
        return tuple(self.notation[name] for name in self.parameters)

    @cached_property
    def constants(self) -> dict[str, Constant]:
        """The clause's numbers with a unit that the function reads by name."""
        return _constants(self.function)

    @cached_property
    def template(self) -> Template:
        """The picture, built on first show. Raises InputError for a body that has none."""
        from tensionlib.calculation.templates import build

        return build(self.function)

    def __call__(self, *args: Any) -> Any:
        return self.function(*args)

    def __reduce__(self) -> tuple[Any, tuple[str, str]]:
        # By name: the function's own pickle would find the formula in its place.
        return (_by_name, (self.function.__module__, self.function.__qualname__))


def _constants(function: Callable[..., Any]) -> dict[str, Constant]:
    names = inspect.getclosurevars(function).globals
    return {name: value for name, value in names.items() if isinstance(value, Constant)}


def _by_name(module: str, name: str) -> Any:
    from importlib import import_module

    return operator.attrgetter(name)(import_module(module))


def formula(
    gives: str, notation: Notation, *, title: str, clause: str = "", known: str = ""
) -> Callable[[Callable[..., Any]], Formula]:
    """Make a clause formula of a function with one return expression.

    Parameters
    ----------
    gives : str
        The symbol of the result, in `notation`.
    notation : Notation
        Holds every parameter of the function as a symbol.
    title : str
        What the line is, one phrase in lower case: "net area".
    clause : str
        The clause number as the standard prints it.
    known : str
        How the library knows the formula; the notation's own statement unless given.

    Raises
    ------
    InputError
        For a parameter that the notation does not hold.
    """

    def decorate(function: Callable[..., Any]) -> Formula:
        return Formula(
            function, notation[gives], notation, clause, title, known or notation.source.known
        )

    return decorate


# A comparison's sign and the sign of its opposite, each as text and as LaTeX.
_SIGNS: dict[type[ast.cmpop], tuple[tuple[str, str], tuple[str, str]]] = {
    ast.LtE: (("≤", r"\leq"), (">", ">")),
    ast.Lt: (("<", "<"), ("≥", r"\geq")),
    ast.GtE: (("≥", r"\geq"), ("<", "<")),
    ast.Gt: ((">", ">"), ("≤", r"\leq")),
}


@dataclass(frozen=True, eq=False)
class Condition:
    """What a clause tests before it takes one way or the other: one comparison of two names."""

    function: Callable[..., Any]
    notation: Notation
    clause: str
    title: str
    parameters: tuple[str, ...] = field(init=False)
    left: str = field(init=False)
    right: str = field(init=False)
    sign: tuple[str, str] = field(init=False)
    opposite: tuple[str, str] = field(init=False)

    def __post_init__(self) -> None:
        tree = ast.parse(textwrap.dedent(inspect.getsource(self.function))).body[0]
        last = tree.body[-1] if isinstance(tree, ast.FunctionDef) else None
        compare = last.value if isinstance(last, ast.Return) else None
        if not (
            isinstance(compare, ast.Compare)
            and len(compare.ops) == 1
            and type(compare.ops[0]) in _SIGNS
            and isinstance(compare.left, ast.Name)
            and isinstance(compare.comparators[0], ast.Name)
        ):
            raise InputError(
                f"condition {self.function.__name__}: its body must be one comparison of two"
                " names, for example 'return L_j <= L_300'"
            )
        sign, opposite = _SIGNS[type(compare.ops[0])]
        for name, value in (
            ("parameters", tuple(inspect.signature(self.function).parameters)),
            ("left", compare.left.id),
            ("right", compare.comparators[0].id),
            ("sign", sign),
            ("opposite", opposite),
        ):
            object.__setattr__(self, name, value)

    @cached_property
    def constants(self) -> dict[str, Constant]:
        """The clause's numbers with a unit that the comparison reads by name."""
        return _constants(self.function)

    def __call__(self, *args: Any) -> Any:
        return self.function(*args)


def condition(
    notation: Notation, *, title: str, clause: str = ""
) -> Callable[[Callable[..., Any]], Condition]:
    """Make a condition of a function whose body is one comparison of two names.

    A name is a parameter or a `Constant` of the module. Raises InputError for anything else:
    an expression to be tested is a line of its own first.
    """

    def decorate(function: Callable[..., Any]) -> Condition:
        return Condition(function, notation, clause, title)

    return decorate
