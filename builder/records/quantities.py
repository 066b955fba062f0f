"""Quantities as people write them, `500 nm +/- 10 nm`, to numbers in canonical units; both are kept."""

from __future__ import annotations

import enum
import math
import re
import unicodedata
from dataclasses import dataclass

from builder.records.amounts import (
    AMOUNT,
    NUMBER,
    UNIT,
    FaultError,
    QuantityFault,
    amount,
    canonical,
    example_unit,
    not_a_number,
    number_of,
    unit_of,
)
from builder.records.unit_table import SIGNED, Dimension, find_unit, normal_spelling

__all__ = [
    "ALL_FORMS",
    "Dimension",
    "Form",
    "Quantity",
    "QuantityFault",
    "Sign",
    "example_unit",
    "parse_number",
    "parse_quantity",
]

_MAX_LENGTH = 80
"""Longest text looked at; a quantity is far shorter."""

_LIMIT = re.compile(r"(<=|>=|<|>)\s*(.*)")
_PLUS_MINUS = re.compile(r"\s*(?:\+/-|\+-|±)\s*")
_RANGE = re.compile(rf"({NUMBER})\s*({UNIT})??\s*(?:\.\.|(?<![eE])-|\bto\b)\s*({NUMBER})\s*({UNIT})?")
_RAISED = re.compile(r"[0-9][⁰¹²³⁴-⁹₀-₉½¼¾⅓⅔⅛]|[½¼¾⅓⅔⅛]")
"""Raised, lowered and broken digits beside digits: normalising would make 102 of 10²."""

_FRACTIONS = frozenset(
    {Dimension.PERCENT, Dimension.MASS_FRACTION, Dimension.VOLUME_FRACTION, Dimension.ATOMIC_FRACTION}
)


class Form(enum.StrEnum):
    """How a quantity is given."""

    VALUE = "value"  # one number, perhaps with +/-
    RANGE = "range"  # lowest and highest
    BELOW = "below"  # "< 5 nm/min": less than `high`
    ABOVE = "above"  # "> 5 nm/min": more than `low`


class Sign(enum.StrEnum):
    """Which numbers are allowed. A temperature is compared with absolute zero."""

    ANY = "any"
    NOT_NEGATIVE = "not-negative"
    POSITIVE = "positive"


ALL_FORMS = frozenset(Form)
_FORM_WORDS = {
    Form.VALUE: "a single number",
    Form.RANGE: "a range",
    Form.BELOW: "a limit",
    Form.ABOVE: "a limit",
}


@dataclass(frozen=True)
class Quantity:
    """
    A quantity as written and as numbers in the canonical unit of its dimension.

    `value` is set for one number, `low` and `high` for a range, `high` alone for "less than", `low`
    alone for "more than"; what is not stated is None, never 0. `half_width` (canonical unit, > 0) is
    what follows `+/-`: a standard uncertainty (k = 1) in runs and rates, a tolerance on a sample.
    `unit` is the symbol of the unit it was written in.
    """

    text: str
    dimension: Dimension
    unit: str
    form: Form
    value: float | None = None
    half_width: float | None = None
    low: float | None = None
    high: float | None = None

    @property
    def number(self) -> float:
        """
        Return the value of a quantity that the schema has admitted as one number only.

        Raises
        ------
        ValueError
            The quantity is a range or a limit; no single number stands for it.
        """
        if self.value is None:
            raise ValueError(f'"{self.text}" is a {self.form}, not one number')
        return self.value


def parse_quantity(
    text: str, dimension: Dimension, *, forms: frozenset[Form] = ALL_FORMS, sign: Sign | None = None
) -> Quantity | QuantityFault:
    """
    Return the quantity a text states, or why it states none.

    Taken are `500 nm`, `500 nm +/- 10 nm`, `500 +/- 10 nm`, `500 nm ± 2 %`, `3.5 - 6.5 nm/min`,
    `3.5..6.5 nm/min`, `3.5 to 6.5 nm/min`, `< 5 nm/min`, `> 1000 A/min`. A range whose ends both
    carry units may mix them.

    Parameters
    ----------
    text:
        As written by a person; kept in `Quantity.text`.
    dimension:
        What is asked for; its canonical unit is that of the numbers returned.
    forms:
        The forms allowed, all by default.
    sign:
        The numbers allowed; by default any for the dimensions in `unit_table.SIGNED`, others not
        negative. Temperatures are held to 0 K.

    Source
    ------
    `records/unit_table.py`. Text and canonical value are checked against pint in the tests.
    """
    if sign is None:
        sign = Sign.ANY if dimension in SIGNED else Sign.NOT_NEGATIVE
    try:
        quantity = _parse(text, dimension)
        if quantity.form not in forms:
            message = f'"{text}": {_FORM_WORDS[quantity.form]} is not allowed here'
            raise FaultError("form-not-allowed", message, "give a single number with its unit")
        _check_sign(quantity, sign)
    except FaultError as error:
        return error.fault
    return quantity


def parse_number(text: str, *, sign: Sign = Sign.ANY) -> float | QuantityFault:
    """
    Return a bare decimal number, for table columns whose name ends in the unit (`before_nm`).

    Digits, one point, an exponent; no unit, no decimal comma, nothing else.
    """
    try:
        value = number_of(text.strip().replace("\N{MINUS SIGN}", "-"), text)
    except FaultError as error:
        return error.fault
    if value < 0 and sign is not Sign.ANY:
        return QuantityFault("negative", f'"{text}" is below zero')
    if value == 0 and sign is Sign.POSITIVE:
        return QuantityFault("not-positive", f'"{text}" must be more than zero')
    return value


def _parse(text: str, dimension: Dimension) -> Quantity:
    simple = AMOUNT.fullmatch(text)
    if simple and simple[2] and (unit := find_unit(simple[2], dimension)):
        value = canonical(number_of(simple[1], text), unit, text)
        return Quantity(text, dimension, unit.symbol, Form.VALUE, value=value)
    plain = _normal_text(text)
    if limit := _LIMIT.fullmatch(plain):
        value, unit = amount(limit[2], dimension, text)
        if limit[1].startswith("<"):
            return Quantity(text, dimension, unit.symbol, Form.BELOW, high=value)
        return Quantity(text, dimension, unit.symbol, Form.ABOVE, low=value)
    parts = _PLUS_MINUS.split(plain)
    if len(parts) > 2:
        raise not_a_number(plain, text)
    if len(parts) == 2:
        return _with_tolerance(parts[0], parts[1], dimension, text)
    if match := _RANGE.fullmatch(plain):
        return _range(match, dimension, text)
    value, unit = amount(plain, dimension, text)
    return Quantity(text, dimension, unit.symbol, Form.VALUE, value=value)


def _normal_text(text: str) -> str:
    if len(text) > _MAX_LENGTH:
        raise FaultError("not-a-number", f'"{text[:_MAX_LENGTH]}..." is too long for a quantity')
    if _RAISED.search(text):
        raise FaultError("not-a-number", f'"{text}" holds raised or broken digits', 'write "1e2" or "0.5"')
    plain = unicodedata.normalize("NFKC", text.replace("º", "°"))
    for dash in "\N{MINUS SIGN}\N{EN DASH}\N{HYPHEN}":
        plain = plain.replace(dash, "-")
    return plain.replace("≤", "<=").replace("≥", ">=").strip()


def _range(match: re.Match[str], dimension: Dimension, text: str) -> Quantity:
    high_unit = unit_of(match[4], dimension, text)
    low_unit = high_unit if match[2] is None else unit_of(match[2], dimension, text)
    low = canonical(number_of(match[1], text), low_unit, text)
    high = canonical(number_of(match[3], text), high_unit, text)
    if low > high:
        raise FaultError("range-reversed", f'"{text}" starts above its end')
    return Quantity(text, dimension, high_unit.symbol, Form.RANGE, low=low, high=high)


def _with_tolerance(before: str, after: str, dimension: Dimension, text: str) -> Quantity:
    tolerance = AMOUNT.fullmatch(after)
    bare = re.fullmatch(NUMBER, before)
    if tolerance is None:
        raise not_a_number(after, text)
    spelling = tolerance[2]
    if bare and spelling is not None:
        unit = unit_of(spelling, dimension, text)
        value = canonical(number_of(before, text), unit, text)
    else:
        value, unit = amount(before, dimension, text)
    half_width = _half_width(number_of(tolerance[1], text), spelling, value, dimension, text)
    if not math.isfinite(half_width) or half_width <= 0:
        # A zero would claim exactness; who does not know the uncertainty leaves it out.
        raise FaultError("tolerance-not-positive", f'"{text}" needs a number above zero after +/-')
    return Quantity(text, dimension, unit.symbol, Form.VALUE, value=value, half_width=half_width)


def _half_width(number: float, spelling: str | None, value: float, dimension: Dimension, text: str) -> float:
    if spelling is not None and normal_spelling(spelling) == "%" and dimension is not Dimension.PERCENT:
        if dimension in _FRACTIONS or dimension is Dimension.TEMPERATURE:
            hint = f'give it in "{example_unit(dimension)}"'
            message = f'"{text}": a percentage of this can be read in two ways'
            raise FaultError("unit-mismatch", message, hint)
        return abs(value) * number / 100
    if dimension is Dimension.TEMPERATURE:
        dimension = Dimension.TEMPERATURE_DIFFERENCE
    return canonical(number, unit_of(spelling, dimension, text), text)


def _check_sign(quantity: Quantity, sign: Sign) -> None:
    if sign is Sign.ANY and quantity.dimension is not Dimension.TEMPERATURE:
        return
    numbers = [number for number in (quantity.value, quantity.low, quantity.high) if number is not None]
    if min(numbers) < 0:
        floor = "absolute zero" if quantity.dimension is Dimension.TEMPERATURE else "zero"
        raise FaultError("negative", f'"{quantity.text}" is below {floor}')
    # "Less than nothing" would claim that nothing at all was there: no measurement can say so.
    if quantity.high == 0 or (sign is Sign.POSITIVE and min(numbers) == 0):
        raise FaultError("not-positive", f'"{quantity.text}" must be more than zero')
