"""Quantities as people write them, with pint as the oracle for every factor."""

from __future__ import annotations

import math

import pint
import pytest
from hypothesis import given
from hypothesis import strategies as st

from builder.records.quantities import (
    Dimension,
    Form,
    Quantity,
    QuantityFault,
    Sign,
    example_unit,
    parse_number,
    parse_quantity,
)
from builder.records.unit_table import CANONICAL, UNITS, Unit, find_unit

REGISTRY = pint.UnitRegistry()
PINT_NAMES = {
    "Å": "angstrom",
    "µm": "micrometer",
    "mil": "thou",
    "°C": "degC",
    "mTorr": "millitorr",
    "Torr": "torr",
    "µbar": "microbar",
    "Hz": "hertz",
    "rpm": "rpm",
    "in": "inch",
    "d": "day",
}
"""Where pint spells a unit otherwise."""
NO_PINT_UNIT = frozenset({"sccm", "slm", "wt%", "vol%", "at%", "ppm", "%"})
"""Flow at standard conditions and shares by kind are no units of the SI; tested by hand below."""
TORR_TOLERANCE = 2e-7
"""pint takes the torr through the millimetre of mercury, which differs by 1.4e-7 (NIST SP 811, B.8)."""


def quantity(text: str, dimension: Dimension) -> Quantity:
    """Return what a text states; fail with the fault if it states nothing."""
    found = parse_quantity(text, dimension)
    assert isinstance(found, Quantity), found
    return found


def fault(text: str, dimension: Dimension, **options: object) -> QuantityFault:
    """Return the fault of a text."""
    found = parse_quantity(text, dimension, **options)  # type: ignore[arg-type]
    assert isinstance(found, QuantityFault), found
    return found


def pint_unit(symbol: str) -> pint.Unit:
    """Return pint's unit for a symbol of ours, also for quotients."""
    plain = symbol.replace("²", "**2").replace("³", "**3").replace("/cycle", "")
    parts = [PINT_NAMES.get(part, part) for part in plain.split("/")]
    return REGISTRY.Unit("/".join(parts))


COMPARED = [unit for unit in UNITS if not NO_PINT_UNIT & set(unit.symbol.split("/"))]


@pytest.mark.parametrize("unit", COMPARED, ids=lambda unit: f"{unit.dimension}-{unit.symbol}")
def test_every_factor_is_that_of_pint(unit: Unit) -> None:
    """One number of the unit, in the canonical unit of its dimension."""
    if unit.dimension is Dimension.TEMPERATURE:
        expected = REGISTRY.Quantity(21.0, pint_unit(unit.symbol)).to("kelvin").magnitude
        assert unit.to_canonical(21.0) == pytest.approx(expected, rel=1e-12)
        return
    if unit.dimension is Dimension.TEMPERATURE_DIFFERENCE:
        assert unit.to_canonical(21.0) == 21.0
        return
    one = REGISTRY.Quantity(1.0, pint_unit(unit.symbol))
    if unit.dimension is Dimension.ENERGY and "mol" in unit.symbol:
        one = one / REGISTRY.avogadro_constant
    expected = one.to(pint_unit(CANONICAL[unit.dimension].symbol)).magnitude
    tolerance = TORR_TOLERANCE if "Torr" in unit.symbol else 1e-9
    assert unit.to_canonical(1.0) == pytest.approx(expected, rel=tolerance)


def test_the_comparison_covers_nearly_all_units() -> None:
    """A table that nothing compares would pass unseen."""
    assert len(COMPARED) >= len(UNITS) - 8


@pytest.mark.parametrize(
    ("text", "dimension", "value"),
    [
        ("5 %", Dimension.PERCENT, 0.05),
        ("30 wt%", Dimension.MASS_FRACTION, 0.3),
        ("10 vol%", Dimension.VOLUME_FRACTION, 0.1),
        ("50 ppm", Dimension.VOLUME_FRACTION, 5e-5),
        ("2 at%", Dimension.ATOMIC_FRACTION, 0.02),
        ("25 sccm", Dimension.FLOW, 25.0),
        ("1 slm", Dimension.FLOW, 1000.0),
        ("120 nm/min", Dimension.RATE, 2.0),
        ("1 um/h", Dimension.RATE, 1000 / 3600),
        ("3 A/cycle", Dimension.RATE_PER_CYCLE, 0.3),
    ],
)
def test_shares_flows_and_rates(text: str, dimension: Dimension, value: float) -> None:
    """What pint cannot judge, from the definition of percent and of sccm."""
    assert quantity(text, dimension).value == pytest.approx(value, rel=1e-15)


@pytest.mark.parametrize(
    ("text", "value", "half_width"),
    [
        ("500 nm +/- 10 nm", 500.0, 10.0),
        ("500 +/- 10 nm", 500.0, 10.0),
        ("500 nm ± 2 %", 500.0, 10.0),
        ("0.5 um +/- 10 nm", 500.0, 10.0),
        ("500nm+-10nm", 500.0, 10.0),
    ],
)
def test_what_follows_plus_minus_is_kept(text: str, value: float, half_width: float) -> None:
    """In the canonical unit, however it was written."""
    found = quantity(text, Dimension.LENGTH)
    assert (found.form, found.text) == (Form.VALUE, text)
    assert found.value == pytest.approx(value)
    assert found.half_width == pytest.approx(half_width)


@pytest.mark.parametrize(
    "text", ["3.5 - 6.5 nm/min", "3.5..6.5 nm/min", "3.5 to 6.5 nm/min", "35 A/min - 6.5 nm/min"]
)
def test_a_range_has_two_ends_and_no_value(text: str) -> None:
    """No middle is made up."""
    found = quantity(text, Dimension.RATE)
    assert (found.form, found.value) == (Form.RANGE, None)
    assert found.low == pytest.approx(3.5 / 60)
    assert found.high == pytest.approx(6.5 / 60)


def test_a_limit_has_one_end() -> None:
    """The other is unknown, never zero."""
    below, above = quantity("< 6 nm/min", Dimension.RATE), quantity(">= 6 nm/min", Dimension.RATE)
    assert (below.form, below.low, below.high, below.value) == (Form.BELOW, None, 0.1, None)
    assert (above.form, above.low, above.high, above.value) == (Form.ABOVE, 0.1, None, None)


def test_a_temperature_tolerance_is_a_difference() -> None:
    """21 +/- 0.5 degC is half a kelvin, not 273.65 K."""
    found = quantity("21 degC +/- 0.5 degC", Dimension.TEMPERATURE)
    assert found.value == pytest.approx(294.15)
    assert found.half_width == 0.5


@pytest.mark.parametrize(
    ("text", "dimension", "rule"),
    [
        ("500", Dimension.LENGTH, "unit-missing"),
        ("500 nmm", Dimension.LENGTH, "unit-unknown"),
        ("500 nm", Dimension.TIME, "unit-mismatch"),
        ("10:1", Dimension.LENGTH, "not-a-number"),
        ("1,000 nm", Dimension.LENGTH, "not-a-number"),
        ("1,5 nm", Dimension.LENGTH, "not-a-number"),
        ("ten nm", Dimension.LENGTH, "not-a-number"),
        ("", Dimension.LENGTH, "not-a-number"),
        ("10² nm", Dimension.LENGTH, "not-a-number"),
        ("5½ nm", Dimension.LENGTH, "not-a-number"),
        ("nan nm", Dimension.LENGTH, "not-finite"),
        ("inf nm", Dimension.LENGTH, "not-finite"),
        ("1e400 nm", Dimension.LENGTH, "not-finite"),
        ("1e-400 nm", Dimension.LENGTH, "not-finite"),
        ("-5 nm", Dimension.LENGTH, "negative"),
        ("-274 degC", Dimension.TEMPERATURE, "negative"),
        ("< 0 nm/min", Dimension.RATE, "not-positive"),
        ("6 - 3 nm", Dimension.LENGTH, "range-reversed"),
        ("5 nm +/- 0 nm", Dimension.LENGTH, "tolerance-not-positive"),
        ("5 nm +/- -1 nm", Dimension.LENGTH, "tolerance-not-positive"),
        ("5 % +/- 10 %", Dimension.MASS_FRACTION, "unit-mismatch"),
        ("21 degC +/- 5 %", Dimension.TEMPERATURE, "unit-mismatch"),
        ("5 nm/min", Dimension.RATE_PER_CYCLE, "unit-mismatch"),
    ],
)
def test_what_states_no_quantity_is_a_fault_with_a_name(text: str, dimension: Dimension, rule: str) -> None:
    """Never a guess: pint would read 10:1 as 10."""
    assert fault(text, dimension).rule == rule


def test_a_form_that_is_not_allowed_is_a_fault() -> None:
    """A thickness is one number."""
    assert fault("3 - 6 nm", Dimension.LENGTH, forms=frozenset({Form.VALUE})).rule == "form-not-allowed"


def test_zero_is_refused_where_more_is_asked_for() -> None:
    """A film of no thickness is no film."""
    assert fault("0 nm", Dimension.LENGTH, sign=Sign.POSITIVE).rule == "not-positive"
    assert quantity("0 nm", Dimension.LENGTH).value == 0


def test_a_bias_may_be_negative() -> None:
    """And a compressive stress."""
    assert quantity("-120 V", Dimension.VOLTAGE).value == -120
    assert quantity("−0.5 GPa", Dimension.STRESS).value == -500


def test_a_misspelt_unit_gets_a_suggestion() -> None:
    """The likeliest one."""
    assert 'did you mean "mTorr"' in fault("5 mTor", Dimension.PRESSURE).hint


def test_one_number_is_asked_for_and_a_range_has_none() -> None:
    """A silent middle would be invented."""
    assert quantity("5 nm", Dimension.LENGTH).number == 5
    with pytest.raises(ValueError, match="range"):
        _ = quantity("5 - 6 nm", Dimension.LENGTH).number


def test_no_spelling_stands_for_two_units_of_a_dimension() -> None:
    """And every spelling is found."""
    for dimension in Dimension:
        spellings = [spelling for unit in UNITS if unit.dimension is dimension for spelling in unit.spellings]
        assert len(spellings) == len(set(spellings))
        assert all(find_unit(spelling, dimension) for spelling in spellings)
        assert find_unit(example_unit(dimension), dimension) is not None


@pytest.mark.parametrize(
    ("text", "value"), [("5", 5.0), ("-1.5e3", -1500.0), (" 2 ", 2.0), ("−3", -3.0), ("+4", 4.0)]
)
def test_a_bare_number_of_a_table(text: str, value: float) -> None:
    """Columns whose name ends in the unit hold numbers alone."""
    assert parse_number(text) == value


@pytest.mark.parametrize("text", ["5 nm", "1,5", "1_000", "0x10", "nan", "inf", "", "5%", "٣", "1e999"])
def test_no_bare_number(text: str) -> None:
    """Python's own float takes some of these."""
    assert isinstance(parse_number(text), QuantityFault)


POSITIVE = st.floats(min_value=1e-6, max_value=1e9, allow_nan=False)
ANY_UNIT = st.sampled_from([unit for unit in UNITS if unit.offset == 0])


@given(POSITIVE, ANY_UNIT)
def test_a_number_survives_the_way_there_and_back(number: float, unit: Unit) -> None:
    """To the canonical unit and back, within the last bits of a float."""
    found = quantity(f"{number!r} {unit.spellings[0]}", unit.dimension)
    assert found.value is not None
    assert math.isclose(unit.from_canonical(found.value), number, rel_tol=1e-14)


@given(POSITIVE, ANY_UNIT, ANY_UNIT)
def test_the_unit_it_is_written_in_makes_no_difference(number: float, one: Unit, other: Unit) -> None:
    """The same length in nm and in mil is the same length."""
    if one.dimension is not other.dimension:
        return
    again = other.from_canonical(one.to_canonical(number))
    first = quantity(f"{number!r} {one.spellings[0]}", one.dimension)
    second = quantity(f"{again!r} {other.spellings[0]}", other.dimension)
    assert first.value is not None
    assert second.value is not None
    assert math.isclose(first.value, second.value, rel_tol=1e-13)


@given(POSITIVE, POSITIVE, ANY_UNIT)
def test_the_ends_of_a_range_keep_their_order(one: float, other: float, unit: Unit) -> None:
    """Low is never above high."""
    low, high = sorted((one, other))
    found = quantity(f"{low!r}..{high!r} {unit.spellings[0]}", unit.dimension)
    assert found.low is not None
    assert found.high is not None
    assert found.low <= found.high


@given(st.text(max_size=30), st.sampled_from(Dimension))
def test_no_text_ends_in_a_traceback(text: str, dimension: Dimension) -> None:
    """Any text is a quantity or a fault, and a quantity has a finite number."""
    found = parse_quantity(text, dimension)
    if isinstance(found, Quantity):
        numbers = [number for number in (found.value, found.low, found.high) if number is not None]
        assert numbers
        assert all(math.isfinite(number) for number in numbers)
    else:
        assert found.message
