"""The two evidence charts of a recipe: rates over time, and depth over time."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import date

from builder.views.drawing.axis import Axis, axis_for
from builder.views.drawing.shape import Tick, rounded

WIDTH, HEIGHT = 480.0, 210.0
_LEFT, _RIGHT, _TOP, _BOTTOM = 56.0, 466.0, 22.0, 168.0
_BAND_RIGHT = 452.0
_DAY_LABELS = 4
LIMIT_CLASS = "ew-limit"


@dataclass(frozen=True)
class RunPoint:
    """One run: date, rate and standard uncertainty in the chart's unit; a limit is only an upper bound."""

    day: date
    rate: float
    std: float | None
    is_limit: bool
    in_series: bool
    title: str


@dataclass(frozen=True)
class Event:
    """Something that started a new series: a clean, a new bath, a repair."""

    day: date
    text: str


@dataclass(frozen=True)
class Band:
    """An interval drawn across the whole plot."""

    top: float
    height: float


@dataclass(frozen=True)
class Mark:
    """A point with its error bar, in SVG units; `css` is its class in the style sheet."""

    x: float
    y: float
    y_low: float
    y_high: float
    css: str
    is_limit: bool
    title: str


@dataclass(frozen=True)
class Chart:
    """A chart ready to be drawn: axes, marks, an optional band and line, event lines."""

    width: float
    height: float
    left: float
    right: float
    top: float
    bottom: float
    plot_width: float
    x_ticks: tuple[Tick, ...]
    y_ticks: tuple[Tick, ...]
    x_label: str
    y_label: str
    marks: tuple[Mark, ...]
    events: tuple[Tick, ...]
    band: Band | None
    line: str
    title: str
    description: str


def rates_over_time(
    points: Sequence[RunPoint],
    events: Sequence[Event],
    next_run: tuple[float, float] | None,
    *,
    unit: str,
    description: str,
) -> Chart:
    """
    Return the chart of run rates by date, with the interval of the next run as a band.

    Needs at least one point. Runs outside the current series are drawn hollow, limits as a caret.
    """
    spread = [point.rate + sign * (point.std or 0.0) for point in points for sign in (-1.0, 1.0)]
    vertical = axis_for([*spread, *(next_run or ())], _BOTTOM, _TOP)
    days = [point.day.toordinal() for point in points] + [event.day.toordinal() for event in events]
    horizontal = _day_axis(days)
    return Chart(
        **_frame(),
        x_ticks=_day_ticks(days, horizontal),
        y_ticks=vertical.ticks,
        x_label="date of the run",
        y_label=f"rate, {unit}",
        marks=tuple(_run_mark(point, horizontal, vertical) for point in points),
        events=tuple(Tick(horizontal.at(event.day.toordinal()), event.text) for event in events),
        band=None if next_run is None else _band(vertical.at(next_run[1]), vertical.at(next_run[0])),
        line="",
        title="Rates of the runs over time",
        description=description,
    )


@dataclass(frozen=True)
class DepthPoint:
    """A depth after a time, with its standard uncertainty, in the chart's units."""

    time: float
    depth: float
    std: float | None
    title: str


def depth_time(
    points: Sequence[DepthPoint],
    *,
    slope: float,
    induction: float,
    time_unit: str,
    depth_unit: str,
    description: str,
) -> Chart:
    """
    Return the chart of depth over time with its fitted line, which meets zero depth at `induction`.

    Needs at least one point; the induction time may be negative.
    """
    horizontal = axis_for([0.0, induction, *(point.time for point in points)], _LEFT, _RIGHT)
    spread = [point.depth + sign * (point.std or 0.0) for point in points for sign in (-1.0, 1.0)]
    vertical = axis_for(spread, _BOTTOM, _TOP, from_zero=True)
    last = max(point.time for point in points)
    start = (horizontal.at(induction), vertical.at(0.0))
    end = (horizontal.at(last), vertical.at(slope * (last - induction)))
    return Chart(
        **_frame(),
        x_ticks=horizontal.ticks,
        y_ticks=vertical.ticks,
        x_label=f"time, {time_unit}",
        y_label=f"depth, {depth_unit}",
        marks=tuple(_depth_mark(point, horizontal, vertical) for point in points),
        events=(),
        band=None,
        line=f"M{start[0]:g} {start[1]:g}L{end[0]:g} {end[1]:g}",
        title="Depth over time",
        description=description,
    )


def _frame() -> dict[str, float]:
    return {
        "width": WIDTH,
        "height": HEIGHT,
        "left": _LEFT,
        "right": _RIGHT,
        "top": _TOP,
        "bottom": _BOTTOM,
        "plot_width": _RIGHT - _LEFT,
    }


def _band(top: float, bottom: float) -> Band:
    return Band(top, rounded(bottom - top))


def _day_axis(days: Sequence[int]) -> Axis:
    low, high = min(days), max(days)
    pad = max((high - low) * 0.04, 3.0)
    return Axis(low - pad, high + pad, _LEFT, _BAND_RIGHT, ())


def _day_ticks(days: Sequence[int], axis: Axis) -> tuple[Tick, ...]:
    low, high = min(days), max(days)
    count = min(_DAY_LABELS, high - low + 1)
    steps = [low + round(index * (high - low) / max(count - 1, 1)) for index in range(count)]
    return tuple(Tick(axis.at(day), date.fromordinal(day).isoformat()) for day in steps)


def _run_mark(point: RunPoint, horizontal: Axis, vertical: Axis) -> Mark:
    css = LIMIT_CLASS if point.is_limit else "ew-point" if point.in_series else "ew-point-old"
    return _mark(horizontal.at(point.day.toordinal()), point.rate, point.std, vertical, css, point.title)


def _depth_mark(point: DepthPoint, horizontal: Axis, vertical: Axis) -> Mark:
    return _mark(horizontal.at(point.time), point.depth, point.std, vertical, "ew-point", point.title)


def _mark(x: float, value: float, std: float | None, vertical: Axis, css: str, title: str) -> Mark:
    reach = std or 0.0
    return Mark(
        x,
        vertical.at(value),
        rounded(vertical.at(value - reach)),
        rounded(vertical.at(value + reach)),
        css,
        css == LIMIT_CLASS,
        title,
    )
