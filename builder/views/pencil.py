"""Arithmetic on printed numbers: each result is what the numbers on paper give, rounded once and printed."""

from __future__ import annotations

import ast
import math
import operator
import re
from collections.abc import Callable
from dataclasses import dataclass

from builder.views.number_text import as_recorded, fixed_text, plain_number

_SIGNS = {"−": "-", "×": "*", "÷": "/", "²": "**2", "√": "sqrt", "e^": "exp"}
_FUNCTIONS: dict[str, Callable[[float], float]] = {"sqrt": math.sqrt, "exp": math.exp, "ln": math.log}
_OPERATIONS: dict[type[ast.operator], Callable[[float, float], float]] = {
    ast.Add: operator.add,
    ast.Sub: operator.sub,
    ast.Mult: operator.mul,
    ast.Div: operator.truediv,
    ast.Pow: operator.pow,
}
_TYPED = re.compile("|".join(map(re.escape, _SIGNS)))


@dataclass(frozen=True)
class Value:
    """A number as it is printed; `number` is what is printed, not what it was before. `sum` gave it."""

    text: str
    number: float
    sum: str = ""


@dataclass(frozen=True)
class Pencil:
    """Prints with so many digits: logarithms with as many decimal places, other results significant ones."""

    digits: int

    def given(self, number: float) -> Value:
        """Return a number of a record, with all its digits."""
        return _printed(as_recorded(number))

    def quoted(self, number: float) -> Value:
        """Return a number that is read from somewhere, to the pencil's digits."""
        return _printed(self._text(number))

    def log(self, number: float) -> Value:
        """Return a logarithm, to a fixed place: its digits after the point are those of the rate."""
        return _printed(fixed_text(number, self.digits))

    def work(self, sum_: str) -> Value:
        """Return the result of a sum of printed numbers, to the pencil's digits."""
        return _printed(self._text(worked_out(sum_)), sum_)

    def work_log(self, sum_: str) -> Value:
        """Return the result of a sum that is a logarithm."""
        return _printed(fixed_text(worked_out(sum_), self.digits), sum_)

    def _text(self, number: float) -> str:
        # Never coarser than units: a rounded ten looks as if it were known to the unit.
        return (
            fixed_text(number, 0) if abs(number) >= 10.0**self.digits else plain_number(number, self.digits)
        )

    def work_exactly(self, sum_: str, places: int) -> Value:
        """Return the result of a sum to a fixed place."""
        return _printed(fixed_text(worked_out(sum_), places), sum_)


def worked_out(sum_: str) -> float:
    """
    Return what a printed sum gives: numbers, + − × ÷, brackets, ², √(), e^(), ln().

    Raises
    ------
    ValueError
        The sum holds anything else.
    """
    typed = _TYPED.sub(lambda match: _SIGNS[match[0]], sum_)
    return _worth(ast.parse(typed, mode="eval").body)


def _worth(node: ast.expr) -> float:
    if isinstance(node, ast.Constant) and isinstance(node.value, (int, float)):
        return float(node.value)
    if isinstance(node, ast.UnaryOp) and isinstance(node.op, ast.USub):
        return -_worth(node.operand)
    if isinstance(node, ast.BinOp):
        return _OPERATIONS[type(node.op)](_worth(node.left), _worth(node.right))
    if isinstance(node, ast.Call) and isinstance(node.func, ast.Name) and len(node.args) == 1:
        return _FUNCTIONS[node.func.id](_worth(node.args[0]))
    raise ValueError(f"no sum: {ast.unparse(node)}")


def _printed(text: str, sum_: str = "") -> Value:
    return Value(text, float(text.replace("\u2212", "-")), sum_)
