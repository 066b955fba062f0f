"""A number with its unit, the smallest part of a quantity: to a value in the canonical unit, or a fault."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass

from builder.problems import did_you_mean
from builder.records.unit_table import (
    CANONICAL,
    Dimension,
    Unit,
    dimensions_of,
    find_unit,
    normal_spelling,
    spellings_of,
)

NUMBER = r"[-+]?(?:[0-9]+(?:\.[0-9]*)?|\.[0-9]+)(?:[eE][-+]?[0-9]+)?"
"""Pattern of a decimal number."""
UNIT = r"[A-Za-zÅ°º%μµ][^<>=±:,;]*?"
"""Pattern of what may be a unit; the table decides."""
AMOUNT = re.compile(rf"({NUMBER})\s*({UNIT})?")

_NUMBER = re.compile(NUMBER)
_NOT_FINITE = re.compile(r"[-+]?\.?(?:nan|inf|infinity|∞)(?![A-Za-z]).*", re.IGNORECASE)
_THOUSANDS = re.compile(r"[0-9],[0-9]")
_USUAL = {Dimension.TEMPERATURE: "degC", Dimension.RATE: "nm/min", Dimension.PRESSURE: "mTorr"}
"""Units to propose where the canonical one is not the usual one at the bench."""


@dataclass(frozen=True)
class QuantityFault:
    """
    Why a text is no quantity of the dimension asked for.

    `rule` is one of: unit-missing, unit-unknown, unit-mismatch, not-a-number, not-finite, negative,
    not-positive, range-reversed, tolerance-not-positive, form-not-allowed.
    """

    rule: str
    message: str
    hint: str = ""


class FaultError(Exception):
    """Carries a fault out of the parts of the parser; caught in `quantities`."""

    def __init__(self, rule: str, message: str, hint: str = "") -> None:
        super().__init__(message)
        self.fault = QuantityFault(rule, message, hint)


def amount(plain: str, dimension: Dimension, text: str) -> tuple[float, Unit]:
    """Return the value in the canonical unit, and the unit, of a number with its unit."""
    match = AMOUNT.fullmatch(plain)
    if match is None:
        raise not_a_number(plain, text)
    number = number_of(match[1], text)
    unit = unit_of(match[2], dimension, text)
    return canonical(number, unit, text), unit


def unit_of(spelling: str | None, dimension: Dimension, text: str) -> Unit:
    """Return the unit of the dimension that is spelled so."""
    if spelling is None:
        hint = f'for example "{example_unit(dimension)}"'
        raise FaultError("unit-missing", f'"{text}" needs a unit of {_words(dimension)}', hint)
    unit = find_unit(spelling, dimension)
    if unit is not None:
        return unit
    elsewhere = dimensions_of(spelling)
    if elsewhere:
        kinds = " or ".join(_words(other) for other in elsewhere)
        message = f'"{text}": {spelling.strip()} is a unit of {kinds}, not of {_words(dimension)}'
        raise FaultError("unit-mismatch", message, f'for example "{example_unit(dimension)}"')
    guess = did_you_mean(normal_spelling(spelling), spellings_of(dimension))
    hint = f'did you mean "{guess}"?' if guess else f'for example "{example_unit(dimension)}"'
    raise FaultError("unit-unknown", f'"{text}": there is no unit "{spelling.strip()}"', hint)


def canonical(number: float, unit: Unit, text: str) -> float:
    """Return a number of a unit in the canonical unit, refusing what floats cannot hold."""
    value = unit.to_canonical(number)
    if not math.isfinite(value) or (value == 0 and number != 0 and unit.offset == 0):
        raise FaultError("not-finite", f'"{text}" is out of the range of numbers')
    return value


def number_of(plain: str, text: str) -> float:
    """Return the decimal number a text states; `text` is the whole quantity, for the message."""
    if not _NUMBER.fullmatch(plain):
        raise not_a_number(plain, text)
    value = float(plain)
    if not math.isfinite(value) or (value == 0 and re.search(r"[1-9]", re.split("[eE]", plain)[0])):
        raise FaultError("not-finite", f'"{text}" is out of the range of numbers')
    return value


def not_a_number(plain: str, text: str) -> FaultError:
    """Return the fault of a text that states no number."""
    if _NOT_FINITE.fullmatch(plain):
        return FaultError("not-finite", f'"{text}" is not a finite number', "leave it out if unknown")
    hint = "write a decimal point, and no mark between thousands" if _THOUSANDS.search(plain) else ""
    return FaultError("not-a-number", f'"{text}" is not a number', hint)


def example_unit(dimension: Dimension) -> str:
    """Return the unit that a message or a form proposes for the dimension, as it may be written."""
    if dimension in _USUAL:
        return _USUAL[dimension]
    unit = CANONICAL.get(dimension)
    return spellings_of(dimension)[0] if unit is None else unit.spellings[0]


def _words(dimension: Dimension) -> str:
    return dimension.value.replace("_", " ")
