"""An axis of a chart: from values to positions, with ticks at round numbers."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from builder.views.drawing.shape import Tick, rounded
from builder.views.number_text import tick_text

_MOST_TICKS = 5


@dataclass(frozen=True)
class Axis:
    """A linear axis from `low` to `high`, drawn from `start` to `end` (SVG units)."""

    low: float
    high: float
    start: float
    end: float
    ticks: tuple[Tick, ...]

    def at(self, value: float) -> float:
        """Return the position of a value, held within the axis."""
        share = (value - self.low) / (self.high - self.low)
        return rounded(self.start + min(max(share, 0.0), 1.0) * (self.end - self.start))


def axis_for(values: Iterable[float], start: float, end: float, *, from_zero: bool = False) -> Axis:
    """
    Return an axis that holds all the values, ending at ticks.

    Raises ValueError if there is no value.
    """
    # Imported here: it costs 0.4 s, and only charts need it.
    from matplotlib.ticker import MaxNLocator  # noqa: PLC0415

    found = list(values)
    low, high = min(found), max(found)
    if from_zero:
        low = min(low, 0.0)
    if low == high:
        low, high = low - (abs(low) or 1.0) * 0.05, high + (abs(high) or 1.0) * 0.05
    locator = MaxNLocator(nbins=_MOST_TICKS, steps=[1, 2, 2.5, 5, 10])
    places = [float(place) for place in locator.tick_values(low, high)]
    axis = Axis(places[0], places[-1], start, end, ())
    ticks = tuple(Tick(axis.at(place), tick_text(place, places[1] - places[0])) for place in places)
    return Axis(axis.low, axis.high, start, end, ticks)
