"""Numbers as pages show them: no digit that misleads, no end of an interval moved inwards."""

from __future__ import annotations

import re

import pytest
from hypothesis import given
from hypothesis import strategies as st

from builder.views.number_text import (
    UNKNOWN,
    Rounding,
    as_recorded,
    length_text,
    number_text,
    percent_text,
    rate_text,
    temperature_text,
    tick_text,
    time_text,
    times_text,
)

_UNITS_NM = {"nm": 1.0, "µm": 1e3, "mm": 1e6}
_SECONDS = {"h": 3600.0, "min": 60.0, "s": 1.0}
positive = st.floats(min_value=1e-4, max_value=1e8, allow_nan=False)


def _triple(values: list[float]) -> tuple[float, float, float]:
    low, mid, high = sorted(values)
    return low, mid, high


def _plain(text: str) -> str:
    return text.replace("\u00a0", " ").replace("\u2060", "")


def _significant_digits(text: str) -> int:
    return len(re.sub(r"[^0-9]", "", text).lstrip("0"))


def _seconds(text: str) -> float:
    parts = _plain(text).split(" ")
    return sum(float(parts[i]) * _SECONDS[parts[i + 1]] for i in range(0, len(parts), 2))


@pytest.mark.parametrize(
    ("low", "mid", "high", "expected"),
    [
        (80.3, 100.0, 124.6, "100 nm (80 – 125 nm)"),
        (980.4, 1000.0, 1025.0, "1.00 µm (0.98 – 1.03 µm)"),
        (0.0, 0.4, 1.2, "0.40 nm (0 – 1.2 nm)"),
        (None, None, 5.0, "at most 5.0 nm"),
        (3.0, None, None, "at least 3.0 nm"),
        (None, None, None, "unknown"),
        (4.5e5, 5.25e5, 5.3e5, "525 µm (450 – 530 µm)"),
    ],
)
def test_length_by_hand(low: float | None, mid: float | None, high: float | None, expected: str) -> None:
    """A length shows the digits its interval allows, in the unit its size asks for."""
    assert _plain(length_text(low, mid, high).full) == expected


@given(st.lists(positive, min_size=3, max_size=3))
def test_shown_interval_holds_the_computed_one(values: list[float]) -> None:
    """Rounding an interval never moves an end inwards."""
    low, mid, high = _triple(values)
    shown = length_text(low, mid, high)
    size = _UNITS_NM[shown.unit]
    ends = [float(end) * size for end in _plain(shown.interval).split(" – ")]
    assert ends[0] <= low * (1 + 1e-9)
    assert ends[1] >= high * (1 - 1e-9)


@given(st.lists(positive, min_size=3, max_size=3))
def test_value_has_two_or_three_digits_and_stays_near(values: list[float]) -> None:
    """The middle keeps two or three significant digits, so it moves by no more than 5 %."""
    low, mid, high = _triple(values)
    shown = length_text(low, mid, high)
    assert _significant_digits(shown.value) >= 2 or mid >= 1e6
    assert abs(float(shown.value) * _UNITS_NM[shown.unit] - mid) <= 0.05 * mid


@given(positive)
def test_a_limit_is_never_shown_better_than_it_is(bound: float) -> None:
    """ "At most" is rounded up and "at least" down."""
    most, least = number_text(None, None, bound, ""), number_text(bound, None, None, "")
    assert float(most.value.removeprefix("at most ")) >= bound * (1 - 1e-9)
    assert float(least.value.removeprefix("at least ")) <= bound * (1 + 1e-9)


@given(st.floats(min_value=1e-3, max_value=1e6))
def test_time_is_what_a_timer_can_be_set_to(time_s: float) -> None:
    """A time is shown within 5 % (half a step), rounded the way asked for."""
    assert abs(_seconds(time_text(time_s)) - time_s) <= max(0.05 * time_s, 0.05) + 1e-9
    assert _seconds(time_text(time_s, Rounding.DOWN)) <= time_s * (1 + 1e-9)
    assert _seconds(time_text(time_s, Rounding.UP)) >= time_s * (1 - 1e-9)


@pytest.mark.parametrize(
    ("time_s", "expected"),
    [(0.0, "0 s"), (4.26, "4.3 s"), (59.9, "1 min"), (341.0, "5 min 40 s"), (45_000.0, "12 h 30 min")],
)
def test_time_by_hand(time_s: float, expected: str) -> None:
    """Times read as people set timers."""
    assert _plain(time_text(time_s)) == expected


def test_unknown_is_a_word_and_never_zero() -> None:
    """What is None is "unknown" in every function."""
    assert {
        time_text(None),
        percent_text(None),
        temperature_text(None),
        rate_text(None, None, None).with_unit,
    } == {UNKNOWN}


def test_a_number_that_is_not_finite_is_refused() -> None:
    """Infinity is no way to say unknown."""
    with pytest.raises(ValueError, match="finite"):
        length_text(0.0, 1.0, float("inf"))


def test_units_never_part_from_their_numbers() -> None:
    """No breakable space stands in a number with its unit, interval or time."""
    shown = rate_text(80 / 60, 100 / 60, 125 / 60)
    texts = (shown.with_unit, shown.interval_with_unit, time_text(341.0), percent_text(0.03))
    assert [text for text in texts if " " in text] == []
    assert _plain(shown.full) == "100 nm/min (80 – 125 nm/min)"


def test_no_line_ends_after_the_dash_of_an_interval() -> None:
    """A word joiner follows the dash: Unicode's line breaking lets a line end after a bare dash."""
    texts = (length_text(80.3, 100.0, 124.6).full, times_text((341.0, 400.0)))
    assert [re.findall("–(.)", text) for text in texts] == [["\u2060"], ["\u2060"]]


def test_other_quantities_by_hand() -> None:
    """Percent, temperature, ticks and recorded numbers."""
    assert _plain(percent_text(0.03)) == "3.0 %"
    assert _plain(temperature_text(353.15)) == "80 °C"
    assert [tick_text(value, 2.5) for value in (-2.5, 0.0, 2.5)] == ["\u22122.5", "0.0", "2.5"]
    assert [as_recorded(value) for value in (1234.0, 0.0005, 1.457)] == ["1234", "0.0005", "1.457"]
