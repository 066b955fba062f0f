"""Whether a setting stays within the limits of a tool."""

from __future__ import annotations

from builder.records.quantities import Form, Quantity
from builder.records.tools import SettingLimit

_ROUNDING = 1e-9
"""Relative; 150 mTorr and 0.15 Torr differ in the last bit."""


def limit_breach(setting: Quantity, limit: SettingLimit) -> str | None:
    """Return in words how a setting leaves the limit, or None if it stays within."""
    lowest, highest = limit.min, limit.max
    if lowest is not None and _is_below(setting, lowest.number):
        return f'"{setting.text}" is below the lowest the tool takes, {lowest.text}'
    if highest is not None and _is_above(setting, highest.number):
        return f'"{setting.text}" is above the highest the tool takes, {highest.text}'
    return None


def _is_below(setting: Quantity, floor: float) -> bool:
    low = setting.low if setting.value is None else setting.value
    # "Less than" has no lower end of its own: what it may reach at the top decides.
    low = setting.high if low is None else low
    return low is not None and low < floor - _ROUNDING * abs(floor)


def _is_above(setting: Quantity, ceiling: float) -> bool:
    high = setting.high if setting.value is None else setting.value
    # "More than" has no upper end, so it reaches beyond every limit.
    return setting.form is Form.ABOVE or (high is not None and high > ceiling + _ROUNDING * abs(ceiling))


def is_of_other_kind(setting: Quantity, limit: SettingLimit) -> bool:
    """Tell whether a setting and its limit measure different things and cannot be compared."""
    ends = [end for end in (limit.min, limit.max) if end is not None]
    return any(end.dimension is not setting.dimension for end in ends)
