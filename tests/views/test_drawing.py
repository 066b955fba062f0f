"""Drawings: to scale where they say so, marked where not, and never outside their frame."""

from __future__ import annotations

import re
from datetime import date
from itertools import pairwise

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from builder.views.drawing.axis import axis_for
from builder.views.drawing.charts import (
    HEIGHT,
    WIDTH,
    DepthPoint,
    Event,
    RunPoint,
    depth_time,
    rates_over_time,
)
from builder.views.drawing.heights import drawn_heights
from builder.views.drawing.interval_bar import interval_bar
from builder.views.drawing.section import Role, SectionLayer, section

thickness = st.none() | st.floats(min_value=0.5, max_value=1e6)


def _layer(role: Role, thickness_nm: float | None, left: float | None, name: str = "x") -> SectionLayer:
    return SectionLayer(name, "oxide", role, thickness_nm, "some", left)


@given(st.lists(thickness, min_size=1, max_size=7))
def test_heights_keep_the_ratio_or_say_so(thicknesses: list[float | None]) -> None:
    """Layers drawn to scale share one scale; every layer can be seen."""
    drawn = drawn_heights(thicknesses, 124.0)
    scales = [d.height / t for d, t in zip(drawn, thicknesses, strict=True) if d.to_scale and t]
    assert all(scale == pytest.approx(scales[0]) for scale in scales)
    assert all(one.height >= 9.0 for one in drawn)
    assert all(not d.to_scale for d, t in zip(drawn, thicknesses, strict=True) if t is None)


def test_a_wafer_under_a_film_is_cut() -> None:
    """5 nm and 1 µm over 500 µm: the wafer has a break, the thin film is raised to what can be seen."""
    film, mask, wafer = drawn_heights([5.0, 1000.0, 5e5], 124.0)
    assert (film.to_scale, mask.to_scale, wafer.to_scale) == (False, True, False)
    both = drawn_heights([1400.0, 500.0, 5e5], 124.0)
    assert [one.to_scale for one in both] == [True, True, False]
    assert both[0].height / both[1].height == pytest.approx(2.8)


def _numbers(path: str) -> list[float]:
    return [float(number) for number in re.findall(r"-?[0-9.]+", path)]


@given(st.floats(min_value=0, max_value=1), st.floats(min_value=0, max_value=1), st.none() | st.floats(0, 3))
def test_section_stays_in_its_frame(mask_left: float, under_left: float, ratio: float | None) -> None:
    """No outline leaves the drawing, whatever is left of the films."""
    layers = [
        _layer(Role.MASK, 1400, mask_left),
        _layer(Role.TARGET, 500, 0),
        _layer(Role.UNDER, 5e5, under_left),
    ]
    drawing = section(layers, ratio, "words")
    assert all(
        -0.1 <= number <= drawing.height
        for shape in drawing.before + drawing.after
        for number in _numbers(shape.path)
    )


def test_labels_never_overlap() -> None:
    """Thin layers push their labels apart."""
    drawing = section([_layer(Role.UNDER, 3.0, 1.0, str(i)) for i in range(6)], None, "words")
    ys = [label.y for label in drawing.labels]
    assert all(later - earlier >= 16.9 for earlier, later in pairwise(ys))


@settings(deadline=None)  # the first call imports the tick finder
@given(st.lists(st.floats(min_value=-1e6, max_value=1e6), min_size=1, max_size=8))
def test_axis_holds_its_values(values: list[float]) -> None:
    """Every value lies between the first and the last tick."""
    axis = axis_for(values, 0.0, 100.0)
    assert axis.low <= min(values) + 1e-6 * max(map(abs, values))
    assert axis.high >= max(values) - 1e-6 * max(map(abs, values))
    assert 2 <= len(axis.ticks) <= 9


def test_interval_bar_with_unknown_ends() -> None:
    """An unknown end is open; nothing known is no bar at all."""
    assert interval_bar(None, None, None, limit=None, title="") is None
    upper_only = interval_bar(None, None, 5.0, limit=10.0, title="")
    lower_only = interval_bar(3.0, None, None, limit=None, title="")
    assert upper_only is not None and upper_only.is_open
    assert lower_only is not None and lower_only.start + lower_only.length == lower_only.width


def test_charts_place_marks_by_value() -> None:
    """Higher is higher, later is further right, and the band spans the next run."""
    days = [date(2026, 1, 1), date(2026, 3, 1)]
    points = [
        RunPoint(day, rate, 2.0, False, True, "") for day, rate in zip(days, (100.0, 110.0), strict=True)
    ]
    chart = rates_over_time(points, [Event(days[1], "clean")], (80.0, 125.0), unit="nm/min", description="")
    first, second = chart.marks
    assert second.y < first.y and second.x > first.x
    assert chart.band is not None
    assert chart.band.top < second.y and chart.band.top + chart.band.height > first.y
    assert chart.events[0].at == second.x


def test_depth_line_meets_zero_at_the_induction_time() -> None:
    """The fitted line starts on the axis of zero depth, also for a negative induction time."""
    points = [DepthPoint(time, 2.0 * (time + 5.0), 1.0, "") for time in (30.0, 60.0)]
    chart = depth_time(points, slope=2.0, induction=-5.0, time_unit="s", depth_unit="nm", description="")
    start_x, start_y, end_x, end_y = _numbers(chart.line)
    assert start_y == pytest.approx(chart.bottom)
    assert (end_x, end_y) == pytest.approx((chart.marks[1].x, chart.marks[1].y))
    assert start_x < chart.marks[0].x
    assert max(end_x, start_x) <= WIDTH and start_y <= HEIGHT
