"""Numbers to text: the only rounding in the project, always decided by the interval."""

from __future__ import annotations

import enum
import math
import re
from collections.abc import Sequence
from dataclasses import dataclass
from decimal import ROUND_CEILING, ROUND_FLOOR, ROUND_HALF_EVEN, Decimal

NO_BREAK = "\u00a0"
# A line may break after a dash, even before a space that does not break; the word joiner forbids it.
TO = f"{NO_BREAK}–\u2060{NO_BREAK}"
_AT_ONCE = f"0{NO_BREAK}s"
_SPAN_TO = f" –\u2060{NO_BREAK}"
UNKNOWN = "unknown"

_READ_UNITS = {"degC": "°C", "um": "µm", "μm": "µm"}
# Only right after a number: "um" alone is a word of other languages.
_TYPED_UNIT = re.compile(r"(?<=\d)[ \u00a0](degC|um|μm)\b")

_FEWEST_DIGITS = 2
_MOST_DIGITS = 3
_WIDTH_DIGITS = 2
"""Digits of an interval's width that are worth showing."""


class Rounding(enum.Enum):
    """Which way a number may move when it is shortened."""

    NEAREST = ROUND_HALF_EVEN
    DOWN = ROUND_FLOOR
    UP = ROUND_CEILING


@dataclass(frozen=True)
class NumberText:
    """
    One number ready to be shown: `value` and `interval` carry no unit, `unit` goes with both.

    `value` is a number, "at most 5", "at least 5" or "unknown"; `interval` is "80 – 125" or empty.
    """

    value: str
    unit: str
    interval: str = ""

    @property
    def is_known(self) -> bool:
        """Tell whether there is a number at all."""
        return self.value != UNKNOWN

    @property
    def with_unit(self) -> str:
        """The number and its unit, joined so that no line break parts them."""
        return _joined(self.value, self.unit) if self.is_known else UNKNOWN

    @property
    def interval_with_unit(self) -> str:
        """The interval and its unit, or empty."""
        return _joined(self.interval, self.unit) if self.interval else ""

    @property
    def full(self) -> str:
        """The number with its interval in brackets, as running text."""
        return f"{self.with_unit} ({self.interval_with_unit})" if self.interval else self.with_unit


@dataclass(frozen=True)
class _Unit:
    """A unit to show a quantity in, from `least` of the base unit upwards."""

    name: str
    size: float
    least: float


_LENGTHS = (_Unit("mm", 1e6, 1e6), _Unit("µm", 1e3, 1e3), _Unit("nm", 1.0, 0.0))
_RATES = (_Unit("µm/min", 1e3, 1e3), _Unit("nm/min", 1.0, 0.0))
_SECONDS_A_MINUTE = 60.0


def length_text(low_nm: float | None, mid_nm: float | None, high_nm: float | None) -> NumberText:
    """Return a length given in nm (None where unknown), shown in nm, µm or mm by its size."""
    return _in_unit(_LENGTHS, low_nm, mid_nm, high_nm)


def rate_text(low: float | None, mid: float | None, high: float | None) -> NumberText:
    """Return a rate given in nm/s (None where unknown), shown in nm/min or µm/min by its size."""
    per_minute = [None if rate is None else rate * _SECONDS_A_MINUTE for rate in (low, mid, high)]
    return _in_unit(_RATES, *per_minute)


def number_text(low: float | None, mid: float | None, high: float | None, unit: str) -> NumberText:
    """Return a number in the unit it is given in; None where unknown."""
    return _in_unit((_Unit(unit, 1.0, 0.0),), low, mid, high)


def percent_text(fraction: float | None) -> str:
    """Return a fraction as percent with two digits, or "unknown"."""
    return UNKNOWN if fraction is None else _joined(_significant(fraction * 100.0, _FEWEST_DIGITS), "%")


def share_text(fraction: float) -> str:
    """Return a fraction that somebody wrote down as percent, with all its digits."""
    shown = (Decimal(repr(fraction)) * 100).normalize()
    return _joined(format(shown, "f"), "%")


def fixed_text(value: float, places: int) -> str:
    """Return a number to so many decimal places."""
    return _placed(value, places, Rounding.NEAREST)


def temperature_text(temperature_k: float | None) -> str:
    """Return a temperature given in K as whole degrees Celsius, or "unknown"."""
    if temperature_k is None:
        return UNKNOWN
    return _joined(_placed(temperature_k - 273.15, 0, Rounding.NEAREST), "°C")


def ratio_text(low: float | None, mid: float | None, high: float | None) -> NumberText:
    """Return a ratio (a selectivity), written as "25 : 1"."""
    return _in_unit((_Unit(": 1", 1.0, 0.0),), low, mid, high)


def time_text(time_s: float | None, rounding: Rounding = Rounding.NEAREST) -> str:
    """
    Return a time given in s (>= 0) as people set timers: "5 min 40 s"; "unknown" for None.

    Below 10 s to 0.1 s, below 2 min to 1 s, below 10 min to 5 s, below 1 h to 10 s, above to 1 min.
    """
    if time_s is None:
        return UNKNOWN
    step = _timer_step(time_s)
    if time_s > 0.0 and step < 1.0:
        text = _placed(time_s, 1, rounding)
        return _joined("0" if text == "0.0" else text, "s")
    whole = int(_to_whole(time_s / step, rounding)) * int(step)
    return _clock(whole)


def times_text(times_s: Sequence[float | None]) -> str:
    """Return a span of times, the earliest rounded down and the latest rounded up."""
    first, last = times_s[0], times_s[-1]
    earliest = time_text(first, Rounding.DOWN)
    return f"{'at once' if earliest == _AT_ONCE else earliest}{_SPAN_TO}{time_text(last, Rounding.UP)}"


def plain_number(value: float, digits: int = _MOST_DIGITS) -> str:
    """Return a number without an interval, to so many significant digits, never in powers of ten."""
    return _significant(value, digits)


def as_recorded(value: float) -> str:
    """Return a number of a record with all its digits: what somebody wrote down is not rounded."""
    return format(Decimal(repr(value)).normalize(), "f").replace("-", "\u2212")


def as_written(text: str) -> str:
    """Return a quantity as somebody wrote it, with the signs that people read and no break inside."""
    for typed, read in (("degC", "°C"), ("cm3", "cm³"), ("cm2", "cm²"), ("+/-", "±"), (" ", NO_BREAK)):
        text = text.replace(typed, read)
    text = re.sub(r"\b(?:um|μm)\b", "µm", text)
    return re.sub(r"\bA(?=/(?:min|s|h)\b)", "Å", text)


def in_words(text: str) -> str:
    """Return running text with the signs of units as people read them: "at 80 degC" is "at 80 °C"."""
    return _TYPED_UNIT.sub(lambda match: NO_BREAK + _READ_UNITS[match[1]], text)


def tick_text(value: float, step: float) -> str:
    """Return the label of an axis tick, with just the decimal places its step needs."""
    places = max(0, -Decimal(f"{step:.6g}").normalize().as_tuple().exponent)  # type: ignore[operator]
    return _placed(value, places, Rounding.NEAREST)


def _timer_step(time_s: float) -> float:
    for bound, step in ((10.0, 0.1), (120.0, 1.0), (600.0, 5.0), (3600.0, 10.0)):
        if time_s < bound:
            return step
    return 60.0


def _clock(seconds: int) -> str:
    minutes, seconds = divmod(seconds, 60)
    hours, minutes = divmod(minutes, 60)
    parts = [(hours, "h"), (minutes, "min"), (seconds, "s")]
    shown = [_joined(str(count), name) for count, name in parts if count]
    return NO_BREAK.join(shown) if shown else _joined("0", "s")


def _in_unit(units: Sequence[_Unit], low: float | None, mid: float | None, high: float | None) -> NumberText:
    for value in (low, mid, high):
        if value is not None and not math.isfinite(value):
            raise ValueError("a number to show must be finite; unknown is None")
    leading = next((value for value in (mid, high, low) if value is not None), None)
    if leading is None:
        return NumberText(UNKNOWN, "")
    unit = next((unit for unit in units if abs(leading) >= unit.least), units[-1])
    low, mid, high = (None if value is None else value / unit.size for value in (low, mid, high))
    return _bounded(low, mid, high, unit.name)


def _bounded(low: float | None, mid: float | None, high: float | None, unit: str) -> NumberText:
    if mid is None and low is not None and high is not None:
        return NumberText(_interval(low, high), unit)
    if mid is None:
        return _one_sided(low, high, unit)
    step = None if low is None or high is None else _step(low, high)
    value = _shortened(mid, step, Rounding.NEAREST)
    if low is None or high is None:
        return NumberText(value, unit)
    return NumberText(value, unit, _interval(low, high))


def _one_sided(low: float | None, high: float | None, unit: str) -> NumberText:
    if high is not None:
        return NumberText(f"at most {_shortened(high, None, Rounding.UP)}", unit)
    assert low is not None
    return NumberText(f"at least {_shortened(low, None, Rounding.DOWN)}", unit)


def _interval(low: float, high: float) -> str:
    """Both ends, moved outwards, so that the interval shown never promises more than was computed."""
    step = _step(low, high)
    places = [_places(end, step) for end in (low, high) if end != 0.0]
    shared = min(places, default=0)
    # Both ends to the same place ("0.98 – 1.03"), unless that costs the small one its digits.
    if low != 0.0 and shared < _FEWEST_DIGITS - 1 - _exponent(low):
        shown = [_shortened(low, step, Rounding.DOWN), _shortened(high, step, Rounding.UP)]
    else:
        shown = [_at(low, shared, Rounding.DOWN), _at(high, shared, Rounding.UP)]
    return TO.join(shown)


def _step(low: float, high: float) -> int | None:
    """Decimal places that show the interval's width to two digits; None for no width."""
    width = abs(high - low)
    return None if width == 0.0 else _WIDTH_DIGITS - 1 - _exponent(width)


def _places(value: float, wanted: int | None) -> int:
    """Decimal places that leave the value two or three significant digits."""
    fewest, most = _FEWEST_DIGITS - 1 - _exponent(value), _MOST_DIGITS - 1 - _exponent(value)
    return fewest if wanted is None else min(max(wanted, fewest), most)


def _shortened(value: float, wanted: int | None, rounding: Rounding) -> str:
    return "0" if value == 0.0 else _placed(value, _places(value, wanted), rounding)


def _at(value: float, places: int, rounding: Rounding) -> str:
    return "0" if value == 0.0 else _placed(value, places, rounding)


def _significant(value: float, digits: int) -> str:
    return "0" if value == 0.0 else _placed(value, digits - 1 - _exponent(value), Rounding.NEAREST)


def _exponent(value: float) -> int:
    return Decimal(value).adjusted()


def _placed(value: float, places: int, rounding: Rounding) -> str:
    # repr() first: 0.1 + 0.2 style noise in the last bit would push an outward rounding one step too far.
    shown = Decimal(f"{value:.12g}").quantize(Decimal(1).scaleb(-places), rounding=rounding.value)
    text = format(shown if shown else abs(shown), "f")
    return text.replace("-", "\u2212")


def _to_whole(value: float, rounding: Rounding) -> Decimal:
    return Decimal(f"{value:.12g}").to_integral_value(rounding=rounding.value)


def _joined(number: str, unit: str) -> str:
    return f"{number}{NO_BREAK}{unit}" if unit else number
