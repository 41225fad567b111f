"""The few functions that a formula needs, for single numbers, under numpy's names.

A formula written against ``xp`` runs on plain floats with ``xp=scalars`` and on arrays with
``xp=numpy``: one formula, two speeds of start. Plain floats need no numpy, whose import is most
of what a phone waits for.
"""

from math import asin, atan, atan2, cos, exp, hypot, inf, isnan, log, nan, pi, sin, sqrt, tan
from typing import Any

Value = Any
"""A float, or with ``xp=numpy`` an array; arrays broadcast against each other."""

Namespace = Any
"""Where a formula takes its functions from: this module, or numpy."""

__all__ = [
    "Namespace",
    "Value",
    "all",
    "any",
    "asin",
    "atan",
    "atan2",
    "cos",
    "exp",
    "hypot",
    "inf",
    "isnan",
    "log",
    "logical_and",
    "logical_not",
    "logical_or",
    "maximum",
    "minimum",
    "nan",
    "pi",
    "sin",
    "sqrt",
    "tan",
    "where",
]


def where(condition: bool, if_true: float, if_false: float) -> float:
    """``if_true`` where the condition holds, else ``if_false``; both have been evaluated."""
    return if_true if condition else if_false


def maximum(a: float, b: float) -> float:
    """The larger of two numbers."""
    return a if a >= b else b


def minimum(a: float, b: float) -> float:
    """The smaller of two numbers."""
    return a if a <= b else b


def logical_and(a: bool, b: bool) -> bool:
    """Both."""
    return a and b


def logical_or(a: bool, b: bool) -> bool:
    """Either."""
    return a or b


def logical_not(a: bool) -> bool:
    """Neither more nor less than ``not``."""
    return not a


def all(condition: bool) -> bool:
    """A single condition is all of its conditions."""
    return condition


def any(condition: bool) -> bool:
    """A single condition is any of its conditions."""
    return condition
