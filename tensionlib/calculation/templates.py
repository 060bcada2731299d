"""A formula's picture: its return expression as a template, made once through handcalcs.

handcalcs loses brackets in some nested expressions, so it is only ever given flat ones: each
sum or product, each fraction, each call on opaque names, one at a time, and the pieces are put
together here. Symbols and numbers are filled in later as plain text, so that no rule about names
ever fires.
"""

from __future__ import annotations

import ast
import inspect
import sys
import textwrap
import threading
import warnings
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from functools import cache
from typing import Any, NoReturn

from tensionlib.errors import InputError

CALLS = {
    "minimum": "min",
    "maximum": "max",
    "sqrt": "sqrt",
    "sin": "sin",
    "cos": "cos",
    "tan": "tan",
}
_ACCEPTED = (
    "+ - * /, brackets, numbers, and minimum, maximum, sqrt, square, sin, cos, tan, absolute"
)
_LOCK = threading.RLock()


@dataclass(frozen=True)
class Slot:
    """A place for a name. `bracketed` tells that it stands alone inside brackets or a fraction;
    `base` that it is raised to a power."""

    name: str
    bracketed: bool = False
    base: bool = False


Pieces = tuple[str | Slot, ...]


@dataclass(frozen=True)
class Template:
    """The picture of one formula, with slots for its parameters and constants."""

    latex: Pieces
    plain: Pieces

    def symbolic(self, symbols: Mapping[str, str]) -> str:
        """LaTeX with each name's symbol."""
        return "".join(
            piece
            if isinstance(piece, str)
            else _braced(symbols[piece.name])
            if piece.base
            else symbols[piece.name]
            for piece in self.latex
        )

    def numeric(self, values: Mapping[str, str]) -> str:
        """LaTeX with each name's value; a negative is bracketed once."""
        return "".join(
            piece if isinstance(piece, str) else _bracketed(piece, values[piece.name])
            for piece in self.latex
        )

    def text_symbolic(self, symbols: Mapping[str, str]) -> str:
        """Plain text with each name's symbol."""
        return "".join(p if isinstance(p, str) else symbols[p.name] for p in self.plain)

    def text_numeric(self, values: Mapping[str, str]) -> str:
        """Plain text with each name's value; a negative or a base is bracketed."""
        return "".join(
            p
            if isinstance(p, str)
            else f"({values[p.name]})"
            if p.base or values[p.name].startswith("-")
            else values[p.name]
            for p in self.plain
        )


def _braced(symbol: str) -> str:
    return rf"\left({symbol}\right)" if "^" in symbol else symbol


def _bracketed(slot: Slot, value: str) -> str:
    if slot.base or (value.startswith("-") and not slot.bracketed):
        return rf"\left({value}\right)"
    return value


@cache
def build(function: Callable[..., Any]) -> Template:
    """The template of a formula function.

    Raises
    ------
    InputError
        For a body that is not one return expression of what `dispatch` offers, naming the line,
        and for a function whose source cannot be had.
    """
    expression = _Reader(function).expression()
    with _LOCK:
        latex = _Writer().pieces(expression, alone=True)
    return Template(_joined(latex), _plain(expression))


# Reading ----------------------------------------------------------------------------------


class _Reader:
    """Takes the return expression out of a function's source and refuses what has no picture."""

    def __init__(self, function: Callable[..., Any]) -> None:
        self.function = function
        self.name = function.__name__
        try:
            lines, self.first = inspect.getsourcelines(function)
        except (OSError, TypeError):
            raise InputError(
                f"formula {self.name}: its source cannot be had, so it has no picture; define it"
                " in a file or a notebook cell"
            ) from None
        self.tree = ast.parse(textwrap.dedent("".join(lines))).body[0]

    def expression(self) -> ast.expr:
        tree = self.tree
        if not isinstance(tree, ast.FunctionDef):
            self._refuse(tree, "it is not a def with one return")
        body = list(tree.body)
        if body and isinstance(body[0], ast.Expr) and isinstance(body[0].value, ast.Constant):
            body = body[1:]
        if len(body) != 1 or not isinstance(body[0], ast.Return) or body[0].value is None:
            self._refuse(tree, "its body must be one return expression")
        self.parameters = {arg.arg for arg in tree.args.args}
        expression = body[0].value
        self._check(expression)
        return expression

    def _check(self, node: ast.expr) -> None:
        match node:
            case ast.BinOp(
                left=left, op=ast.Add() | ast.Sub() | ast.Mult() | ast.Div(), right=right
            ):
                self._check(left)
                self._check(right)
            case ast.UnaryOp(op=ast.USub(), operand=operand):
                self._check(operand)
            case ast.Call(func=ast.Name(id=name), args=args, keywords=[]) if (
                name in CALLS or name in ("square", "absolute")
            ):
                if name not in ("minimum", "maximum") and len(args) != 1:
                    self._refuse(node, f"{name} takes one argument")
                for arg in args:
                    self._check(arg)
            case ast.Name(id=name):
                if name not in self.parameters:
                    self._check_global(node, name)
            case ast.Constant(value=value) if type(value) in (int, float):
                pass
            case ast.BinOp(op=ast.Pow()):
                self._refuse(node, "** differs between Python and numpy; write square(x)")
            case _:
                self._refuse(node, f"{ast.unparse(node)!r} has no picture")

    def _check_global(self, node: ast.Name, name: str) -> None:
        value = inspect.getclosurevars(self.function).globals.get(name)
        if not (isinstance(value, float) and type(value) is not float):
            self._refuse(
                node,
                f"{name!r} is neither a parameter nor a Constant; write the number, or make it a"
                " Constant with its unit",
            )

    def _refuse(self, node: ast.AST, why: str) -> NoReturn:
        line = self.first + getattr(node, "lineno", 1) - 1
        raise InputError(f"formula {self.name}, line {line}: {why}; accepted are {_ACCEPTED}")


# Writing ----------------------------------------------------------------------------------

_SUMS = (ast.Add, ast.Sub, ast.Mult)


class _Writer:
    """Writes an expression as LaTeX, one flat piece at a time."""

    def pieces(self, node: ast.expr, *, alone: bool = False) -> list[str | Slot]:
        """`alone`: nothing stands beside it that a sign could run into."""
        match node:
            case ast.Name(id=name):
                return [Slot(name, bracketed=alone)]
            case ast.Constant(value=value):
                return [repr(value)]
            case ast.UnaryOp(operand=operand):
                inner = self._factor(operand)
                return ["-", *inner] if alone else [r"\left(-", *inner, r"\right)"]
            case ast.BinOp(op=ast.Div(), left=left, right=right):
                return self._render(
                    "A / B",
                    {"A": self.pieces(left, alone=True), "B": self.pieces(right, alone=True)},
                )
            case ast.BinOp():
                return self._flat(node)
            case ast.Call(func=ast.Name(id="square"), args=[arg]):
                return self._square(arg)
            case ast.Call(func=ast.Name(id="absolute"), args=[arg]):
                return [r"\left|", *self.pieces(arg, alone=True), r"\right|"]
            case ast.Call(func=ast.Name(id=name), args=args):
                letters = [chr(ord("A") + i) for i in range(len(args))]
                parts = {
                    letter: self.pieces(arg, alone=True)
                    for letter, arg in zip(letters, args, strict=True)
                }
                return self._render(f"{CALLS[name]}({', '.join(letters)})", parts)
        raise AssertionError(ast.dump(node))

    def _factor(self, node: ast.expr) -> list[str | Slot]:
        inner = self.pieces(node)
        if isinstance(node, ast.BinOp) and isinstance(node.op, ast.Add | ast.Sub):
            return [r"\left(", *self.pieces(node, alone=True), r"\right)"]
        return inner

    def _square(self, arg: ast.expr) -> list[str | Slot]:
        if isinstance(arg, ast.Name):
            return [Slot(arg.id, base=True), "^{2}"]
        return [r"\left(", *self.pieces(arg, alone=True), r"\right)", "^{2}"]

    def _flat(self, node: ast.BinOp) -> list[str | Slot]:
        """A tree of sums and products: its leaves get names, its brackets are handcalcs'."""
        leaves: dict[str, list[str | Slot]] = {}

        def named(part: ast.expr) -> ast.expr:
            if isinstance(part, ast.BinOp) and isinstance(part.op, _SUMS):
                return ast.BinOp(named(part.left), part.op, named(part.right))
            name = f"L{len(leaves)}"
            leaves[name] = self.pieces(part)
            return ast.Name(name)

        return self._render(ast.unparse(named(node)), leaves)

    def _render(self, source: str, parts: Mapping[str, list[str | Slot]]) -> list[str | Slot]:
        names = tuple(parts)
        out: list[str | Slot] = []
        for piece in _rendered(source, names):
            out += [piece] if isinstance(piece, str) else parts[names[piece]]
        return out


@cache
def _rendered(source: str, names: tuple[str, ...]) -> tuple[str | int, ...]:
    """A flat expression through handcalcs: LaTeX pieces, and indices where the names stand."""
    tokens = {name: f"zq{i}z" for i, name in enumerate(names)}

    class Rename(ast.NodeTransformer):
        def visit_Name(self, node: ast.Name) -> ast.Name:
            return ast.Name(tokens.get(node.id, node.id))

    line = "zqrz = " + ast.unparse(Rename().visit(ast.parse(source, mode="eval")).body)
    scope = {token: _Mark(str(i)) for i, token in enumerate(tokens.values())} | {"zqrz": _Mark("r")}
    limit = sys.getrecursionlimit()
    with warnings.catch_warnings():
        # handcalcs uses names that newer pyparsing versions warn of.
        warnings.simplefilter("ignore")
        from handcalcs.handcalcs import LatexRenderer

        try:
            shown = LatexRenderer(
                line, scope, {"override": "", "precision": 3, "sci_not": None}
            ).render(config_options=_OPTIONS.copy())
        finally:
            sys.setrecursionlimit(limit)
    # Symbolic, numeric and result side stand on one row or, from some length on, on three.
    numeric = shown.replace("\\\\&=", "=").replace("&=", "=").split("=")[-2]
    pieces: list[str | int] = []
    for i, piece in enumerate(numeric.replace("⟦", "⟧").split("⟧")):
        if i % 2:
            pieces.append(int(piece))
        elif text := _tidy(piece):
            pieces.append(text)
    if sorted(p for p in pieces if isinstance(p, int)) != list(range(len(names))):
        raise InputError(f"formula: {source!r} did not come back whole from rendering: {shown!r}")
    return tuple(pieces)


_OPTIONS = {
    "decimal_separator": ".",
    "latex_block_start": "$$",
    "latex_block_end": "$$",
    "math_environment_start": "aligned",
    "math_environment_end": "aligned",
    "line_break": "\\\\",
    "use_scientific_notation": False,
    "display_precision": 3,
    "underscore_subscripts": True,
    "greek_exclusions": [],
    "param_columns": 3,
    "preferred_string_formatter": "L",
    "custom_symbols": {},
    "custom_brackets": {},
}


class _Mark:
    """A value that prints as its own place."""

    def __init__(self, place: str) -> None:
        self.place = place

    def __format__(self, spec: str) -> str:
        return f"⟦{self.place}⟧"

    __str__ = __repr__ = _repr_latex_ = lambda self: f"⟦{self.place}⟧"


def _tidy(latex: str) -> str:
    """Single blanks, none inside braces; the names of functions as LaTeX has them."""
    for before, after in (
        (r"\operatorname{min}", r"\min"),
        (r"\operatorname{max}", r"\max"),
        (r"\ ", "\0"),
    ):
        latex = latex.replace(before, after)
    text = " ".join(latex.split())
    lead = " " if latex[:1].isspace() and text[:1] not in ("}", "\0") else ""
    tail = " " if latex[-1:].isspace() and text[-1:] != "{" else ""
    for before, after in (("{ ", "{"), (" }", "}"), (" {", "{"), (" ,", ","), ("\0", r"\ ")):
        text = text.replace(before, after)
    text = text.replace(r"\left( ", r"\left(").replace(r" \right)", r"\right)")
    return lead + text + tail if text else ""


def _joined(pieces: list[str | Slot]) -> Pieces:
    out: list[str | Slot] = []
    for piece in pieces:
        if isinstance(piece, str) and out and isinstance(out[-1], str):
            out[-1] += piece
        else:
            out.append(piece)
    return tuple(out)


# Plain text -------------------------------------------------------------------------------


def _plain(expression: ast.expr) -> Pieces:
    """The expression as one line of text: Python's own brackets, a dot for a product."""
    slots: dict[str, Slot] = {}

    class Marks(ast.NodeTransformer):
        def visit_Name(self, node: ast.Name) -> ast.Name:
            return self._mark(Slot(node.id))

        def visit_Call(self, node: ast.Call) -> ast.expr:
            assert isinstance(node.func, ast.Name)
            name = node.func.id
            if name == "square":
                (arg,) = node.args
                base = (
                    self._mark(Slot(arg.id, base=True))
                    if isinstance(arg, ast.Name)
                    else self.visit(arg)
                )
                return ast.BinOp(base, ast.Pow(), ast.Constant(2))
            shown = {"absolute": "abs", "sqrt": "√"}.get(name) or CALLS[name]
            return ast.Call(ast.Name(shown), [self.visit(arg) for arg in node.args], [])

        def _mark(self, slot: Slot) -> ast.Name:
            name = f"⟦{len(slots)}⟧"
            slots[name] = slot
            return ast.Name(name)

    text = ast.unparse(Marks().visit(ast.parse(ast.unparse(expression), mode="eval")).body)
    text = text.replace(" ** 2", "²").replace(" * ", "·").replace(", ", "; ")
    pieces: list[str | Slot] = []
    for i, piece in enumerate(text.replace("⟦", "⟧").split("⟧")):
        if i % 2:
            pieces.append(slots[f"⟦{piece}⟧"])
        elif piece:
            pieces.append(piece)
    return tuple(pieces)
