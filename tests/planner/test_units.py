"""Quantities and numbers are read and shown alike in Python and in the browser."""

from __future__ import annotations

import json
import math
import random
from typing import Any

import pytest
from playwright.sync_api import Page

from builder.records.quantities import QuantityFault, parse_quantity
from builder.records.unit_table import Dimension, unit_table_json
from builder.views.number_text import (
    Rounding,
    length_text,
    plain_number,
    rate_text,
    temperature_text,
    time_text,
)
from tests.browser import ROOT

_TABLE = json.loads((ROOT / "tests" / "cases" / "quantities.json").read_text(encoding="utf-8"))
_CASES: list[dict[str, Any]] = _TABLE["cases"]
_PARSE = """([table, cases]) => cases.map((one) => {
  try {
    const found = etchwright.units.parse(etchwright.units.tableOf(table), one.text, one.dimension);
    const {form, value, halfWidth, low, high, unit} = found;
    return {form, value, half_width: halfWidth, low, high, unit};
  } catch (error) {
    if (!(error instanceof etchwright.units.QuantityError)) throw error;
    return {fault: error.rule};
  }
})"""
_ROUNDINGS = {"nearest": Rounding.NEAREST, "down": Rounding.DOWN, "up": Rounding.UP}


def _agree(case: dict[str, Any], found: dict[str, Any]) -> bool:
    if "fault" in case or "fault" in found:
        return case.get("fault") == found.get("fault")
    numbers = [(case.get(name), found[name]) for name in ("value", "half_width", "low", "high")]
    return (
        case["form"] == found["form"]
        and case["unit"] == found["unit"]
        and all(
            wanted is got is None
            or (None not in (wanted, got) and math.isclose(wanted, got, rel_tol=_TABLE["relative_tolerance"]))
            for wanted, got in numbers
        )
    )


def _in_python(case: dict[str, Any]) -> dict[str, Any]:
    found = parse_quantity(case["text"], Dimension(case["dimension"]))
    if isinstance(found, QuantityFault):
        return {"fault": found.rule}
    return {
        "form": str(found.form),
        "unit": found.unit,
        **{name: getattr(found, name) for name in ("value", "half_width", "low", "high")},
    }


def test_python_reads_the_table() -> None:
    """Every text of the table is read as the table says, or refused by the rule it names."""
    found = [(case, _in_python(case)) for case in _CASES]
    assert [pair for pair in found if not _agree(*pair)] == []
    assert len(found) >= 90


def test_the_browser_reads_the_table(model: Page) -> None:
    """The planner reads the same texts the same way, by the table of units that comes with its data."""
    found = model.evaluate(_PARSE, [json.loads(unit_table_json()), _CASES])
    assert [pair for pair in zip(_CASES, found, strict=True) if not _agree(*pair)] == []


def _random_numbers(count: int) -> list[float]:
    source = random.Random(7)
    numbers = [source.choice((1.0, 9.995, 0.5)) * 10 ** source.uniform(-4, 8) for _ in range(count)]
    return [0.0, 1.0, 0.1 + 0.2, 999.95, 1e3, 59.5, 119.5, 599.9, 3599.0, 3600.0, 1e6, *numbers]


@pytest.mark.parametrize("kind", ["length", "rate"])
def test_intervals_are_shown_alike(model: Page, kind: str) -> None:
    """Value, interval and unit of thousands of lengths and rates are the same text in both languages."""
    numbers = _random_numbers(600)
    triples = [
        sorted((one, one * 1.17, one * 1.01)) if place % 3 else [0.0, one / 3, one]
        for place, one in enumerate(numbers)
    ]
    triples += [[None, one, None] for one in numbers] + [[one, None, None] for one in numbers]
    triples += [[None, None, one] for one in numbers] + [[one / 7, None, one] for one in numbers]
    show = length_text if kind == "length" else rate_text
    texts = [show(*triple) for triple in triples]
    python = [[text.value, text.unit, text.interval, text.full] for text in texts]
    browser = model.evaluate(
        "([kind, all]) => all.map((one) => etchwright.numbers[kind](...one))"
        ".map((text) => [text.value, text.unit, text.interval, etchwright.numbers.full(text)])",
        [kind, triples],
    )
    differing = [pair for pair in zip(triples, python, browser, strict=True) if pair[1] != pair[2]]
    assert differing == []


@pytest.mark.parametrize("rounding", _ROUNDINGS)
def test_times_are_shown_alike(model: Page, rounding: str) -> None:
    """A timer is set to the same text in both languages, whichever way it is rounded."""
    numbers = [one for one in _random_numbers(800) if one < 1e6]
    python = [time_text(one, _ROUNDINGS[rounding]) for one in numbers]
    browser = model.evaluate(
        "([way, all]) => all.map((one) => etchwright.numbers.time(one, way))", [rounding, numbers]
    )
    assert [pair for pair in zip(numbers, python, browser, strict=True) if pair[1] != pair[2]] == []


def test_plain_numbers_and_temperatures_are_shown_alike(model: Page) -> None:
    """Areas and temperatures are the same text in both languages."""
    numbers = _random_numbers(400)
    python = [[plain_number(one), temperature_text(one)] for one in numbers]
    browser = model.evaluate(
        "(all) => all.map((one) => [etchwright.numbers.plain(one), etchwright.numbers.temperature(one)])",
        numbers,
    )
    assert [pair for pair in zip(numbers, python, browser, strict=True) if pair[1] != pair[2]] == []
