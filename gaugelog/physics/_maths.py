"""Sine, root, logarithm and their kin for floats, NumPy arrays and uncertain numbers alike.

The argument's own type says which library computes. Plain floats go to `math`, so that a command
that needs one figure loads neither NumPy nor uncertainties.
"""

from __future__ import annotations

import importlib
import math
from types import ModuleType
from typing import Any, TypeAlias

Number: TypeAlias = Any
"""A float, a NumPy array of floats, or an uncertain number (`uncertainties`).

No single type of the typing module describes the three; each formula is written with the
arithmetic they share and says in its docstring what goes in and comes out.
"""

_ARRAY_LIBRARIES = ("numpy", "uncertainties.unumpy")
_SCALAR_NAMES = {"arctan2": "atan2", "arctan": "atan", "arcsin": "asin", "arccos": "acos"}


def is_array(value: Number) -> bool:
    """Whether `value` is a NumPy array or NumPy scalar."""
    return type(value).__module__.partition(".")[0] == "numpy"


def is_uncertain(value: Number) -> bool:
    """Whether `value` is one uncertain number."""
    return type(value).__module__.partition(".")[0] == "uncertainties"


def is_zero(value: Number) -> bool:
    """Whether `value` is a plain zero, so that a term with it can be left out."""
    return isinstance(value, int | float) and value == 0


def nominal(value: Number) -> Number:
    """The value without its uncertainty: a float for an uncertain number, else as it came."""
    if is_uncertain(value):
        return value.nominal_value
    if is_array(value) and value.dtype == object:
        return importlib.import_module("uncertainties.unumpy").nominal_values(value)
    return value


def sin(angle: Number) -> Number:
    """Sine of an angle in radians."""
    return _apply("sin", angle)


def cos(angle: Number) -> Number:
    """Cosine of an angle in radians."""
    return _apply("cos", angle)


def tan(angle: Number) -> Number:
    """Tangent of an angle in radians."""
    return _apply("tan", angle)


def arcsin(value: Number) -> Number:
    """Angle in radians, −π/2 to π/2, whose sine is `value`."""
    return _apply("arcsin", value)


def arccos(value: Number) -> Number:
    """Angle in radians, 0 to π, whose cosine is `value`."""
    return _apply("arccos", value)


def arctan(value: Number) -> Number:
    """Angle in radians, −π/2 to π/2, whose tangent is `value`."""
    return _apply("arctan", value)


def arctan2(y: Number, x: Number) -> Number:
    """Angle in radians, −π to π, of the point (x, y): the quadrant is right."""
    return _apply("arctan2", y, x)


def hypot(x: Number, y: Number) -> Number:
    """Length of the vector (x, y)."""
    return _apply("hypot", x, y)


def sqrt(value: Number) -> Number:
    """Square root."""
    return _apply("sqrt", value)


def exp(value: Number) -> Number:
    """Natural exponential."""
    return _apply("exp", value)


def expm1(value: Number) -> Number:
    """Natural exponential less one, exact for small values."""
    return _apply("expm1", value)


def log(value: Number) -> Number:
    """Natural logarithm."""
    return _apply("log", value)


def log1p(value: Number) -> Number:
    """Natural logarithm of one plus the value, exact for small values."""
    return _apply("log1p", value)


def log10(value: Number) -> Number:
    """Decimal logarithm."""
    return _apply("log10", value)


def magnitude(value: Number) -> Number:
    """The value without its sign."""
    return where(nominal(value) < 0, -value, value)


def where(condition: Number, if_true: Number, if_false: Number) -> Number:
    """One of two values by a condition, element by element when the condition is an array."""
    if is_array(condition):
        return importlib.import_module("numpy").where(condition, if_true, if_false)
    return if_true if condition else if_false


def _apply(name: str, *values: Number) -> Number:
    library = _library(values)
    if library.__name__ not in _ARRAY_LIBRARIES:
        name = _SCALAR_NAMES.get(name, name)
    return getattr(library, name)(*values)


def _library(values: tuple[Number, ...]) -> ModuleType:
    if any(is_array(value) for value in values):
        if any(is_uncertain(value) or _holds_objects(value) for value in values):
            return importlib.import_module("uncertainties.unumpy")
        return importlib.import_module("numpy")
    if any(is_uncertain(value) for value in values):
        return importlib.import_module("uncertainties.umath")
    return math


def _holds_objects(value: Number) -> bool:
    return is_array(value) and value.dtype == object
