"""What the word `format` in a schema asks of a text: a quantity, a bare number, a date, a CAS number."""

from __future__ import annotations

import datetime
import functools
import re
from collections.abc import Sequence
from dataclasses import dataclass

from builder.records.quantities import (
    ALL_FORMS,
    Dimension,
    Form,
    Quantity,
    QuantityFault,
    Sign,
    example_unit,
    parse_number,
    parse_quantity,
)

_DATE = re.compile(r"[0-9]{4}-[0-9]{2}-[0-9]{2}")
_CAS = re.compile(r"([0-9]{2,7})-([0-9]{2})-([0-9])")
_UNITS_SHOWN = 4
"""Units named in a hint where many dimensions are allowed."""


@dataclass(frozen=True)
class _QuantityFormat:
    """`quantity:length|time positive any-form`, taken apart; without `any-form`, one number only."""

    dimensions: tuple[Dimension, ...]
    sign: Sign | None
    forms: frozenset[Form]
    is_below_one: bool


@functools.lru_cache(maxsize=16384)
def format_fault(form: str, text: str) -> QuantityFault | None:
    """
    Return why a text is not of the format, or None if it is.

    Formats are `quantity:DIMENSION|...` with the words `positive` (more than zero), `any-form` (a
    range or a limit too) and `below-one` (less than 100 %), `number:SIGN`, `date` and `cas`.

    Raises
    ------
    ValueError
        A schema names a format that does not exist.
    """
    family, _, rest = form.partition(":")
    if family == "quantity":
        return _quantity_fault(_quantity_format(rest), text)
    if family == "number":
        number = parse_number(text, sign=Sign(rest))
        return number if isinstance(number, QuantityFault) else None
    if form == "date":
        return _date_fault(text)
    if form == "cas":
        return _cas_fault(text)
    raise ValueError(f"no such format: {form}")


@functools.cache
def _quantity_format(rest: str) -> _QuantityFormat:
    names, *words = rest.split(" ")
    if unknown := set(words) - {"positive", "any-form", "below-one"}:
        raise ValueError(f"no such word in a format: {min(unknown)}")
    return _QuantityFormat(
        dimensions=tuple(Dimension(name) for name in names.split("|")),
        sign=Sign.POSITIVE if "positive" in words else None,
        forms=ALL_FORMS if "any-form" in words else frozenset({Form.VALUE}),
        is_below_one="below-one" in words,
    )


def _quantity_fault(form: _QuantityFormat, text: str) -> QuantityFault | None:
    faults: list[QuantityFault] = []
    for dimension in form.dimensions:
        result = parse_quantity(text, dimension, forms=form.forms, sign=form.sign)
        if isinstance(result, Quantity):
            if form.is_below_one and result.number >= 1:
                return QuantityFault("out-of-range", f'"{text}" must be less than 100 %')
            return None
        faults.append(result)
    return faults[0] if len(faults) == 1 else _telling_fault(faults, form.dimensions, text)


def _telling_fault(
    faults: Sequence[QuantityFault], dimensions: Sequence[Dimension], text: str
) -> QuantityFault:
    """Return the fault that helps most, of those that each dimension gave."""
    for fault in faults:
        if not fault.rule.startswith("unit-"):
            return fault
    units = ", ".join(f'"{example_unit(dimension)}"' for dimension in dimensions[:_UNITS_SHOWN])
    if faults[0].rule == "unit-missing":
        return QuantityFault("unit-missing", f'"{text}" needs a unit', f"for example {units}")
    for fault in faults:
        if fault.hint.startswith("did you mean"):
            return fault
    return QuantityFault(faults[0].rule, f'"{text}" has a unit that is not allowed here', f"try {units}")


def _date_fault(text: str) -> QuantityFault | None:
    try:
        if _DATE.fullmatch(text):
            datetime.date.fromisoformat(text)
            return None
    except ValueError:
        return QuantityFault("not-a-date", f'there is no day "{text}"')
    return QuantityFault("not-a-date", f'"{text}" is not a date', 'for example "2026-03-01"')


def _cas_fault(text: str) -> QuantityFault | None:
    match = _CAS.fullmatch(text)
    if match is None:
        return QuantityFault("not-a-cas-number", f'"{text}" is not a CAS number', 'for example "7664-39-3"')
    digits = reversed(match[1] + match[2])
    # The last digit is the sum of the others, each times its place from the right, modulo 10.
    check = sum(place * int(digit) for place, digit in enumerate(digits, start=1)) % 10
    if check != int(match[3]):
        words = f'"{text}" is mistyped: its check digit should be {check}'
        return QuantityFault("cas-check-digit", words, "compare it with the label")
    return None
