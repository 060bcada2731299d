"""The functions a formula may call: one name for floats, arrays, symbols and quantities.

A float goes through Python alone and comes out a float; an array goes through numpy and agrees
with the floats bit for bit; a sympy expression or a forallpeople quantity goes through its own.
"""

from __future__ import annotations

import math
from typing import Any

_PLAIN = (float, int)


def _symbolic(value: Any) -> bool:
    return type(value).__module__.partition(".")[0] == "sympy"


def _is_array(value: Any) -> bool:
    return type(value).__module__.partition(".")[0] == "numpy"


def minimum(*args: Any) -> Any:
    """The least of the arguments."""
    return _extreme(args, min, "minimum", "Min")


def maximum(*args: Any) -> Any:
    """The greatest of the arguments."""
    return _extreme(args, max, "maximum", "Max")


def _extreme(args: tuple[Any, ...], plain: Any, array: str, symbol: str) -> Any:
    if all([type(value) in _PLAIN for value in args]):
        # NaN must not hide behind the order of the arguments.
        for value in args:
            if value != value:
                return math.nan
        return plain(args)
    if any([_symbolic(value) for value in args]):
        import sympy

        return getattr(sympy, symbol)(*args)
    if any([_is_array(value) for value in args]):
        import numpy as np

        out = args[0]
        for value in args[1:]:
            out = getattr(np, array)(out, value)
        return out
    return plain(args)


def square(value: Any) -> Any:
    """The square, as a product: a power differs in the last bit between Python and numpy."""
    return value * value


def sqrt(value: Any) -> Any:
    """The square root; NaN below zero."""
    if type(value) in _PLAIN:
        return math.sqrt(value) if value >= 0 else math.nan
    return _function("sqrt", value)


def sin(value: Any) -> Any:
    """The sine of an angle in radians."""
    return _function("sin", value)


def cos(value: Any) -> Any:
    """The cosine of an angle in radians."""
    return _function("cos", value)


def tan(value: Any) -> Any:
    """The tangent of an angle in radians."""
    return _function("tan", value)


def absolute(value: Any) -> Any:
    """The size without the sign."""
    return abs(value)


def _function(name: str, value: Any) -> Any:
    if _symbolic(value):
        import sympy

        return getattr(sympy, name)(value)
    if hasattr(value, "dimensions") and name == "sqrt":
        return value.sqrt()
    import numpy as np

    # numpy for floats too: the C library's sine may differ from numpy's in the last bit.
    found = getattr(np, name)(value)
    return found if _is_array(value) else float(found)
