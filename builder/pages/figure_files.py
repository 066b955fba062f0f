"""The figure of a recipe as a file for a talk or a report: SVG, PNG or PDF, the same bytes every time."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from builder.pages.figure_style import (
    ACCENT,
    FORMATS,
    INK,
    QUIET,
    empty_figure,
    figure_style,
    name_axes,
    saved,
)
from builder.views.figure_data import FigureBand, FigureData, FigureDepth, FigureEvent, FigureLine, FigureRun

if TYPE_CHECKING:
    from matplotlib.axes import Axes
    from matplotlib.figure import Figure

_WIDTH_IN = 6.6
_ROW_IN = 2.75
_HEAD_IN = 0.85
_FOOT_IN = 0.35
_AXIS_IN = 0.55
_LEFT, _RIGHT = 0.1, 0.965
_DAY_LABELS = 5
_DAYS_OF_AIR = 4


class FigureFormatError(ValueError):
    """The file's name ends in no format that figures can have."""


def write_figure(data: FigureData, path: Path) -> None:
    """
    Write the figure into a file; the end of its name says the format.

    Raises
    ------
    FigureFormatError
        The name ends in none of .svg, .png and .pdf.
    """
    file_format = path.suffix.lower().removeprefix(".")
    if file_format not in FORMATS:
        known = ", ".join(f".{name}" for name in FORMATS)
        raise FigureFormatError(f'"{path.name}" ends in no format of a figure; use one of {known}')
    path.write_bytes(figure_bytes(data, file_format))


def figure_bytes(data: FigureData, file_format: str) -> bytes:
    """Return the figure as the bytes of a file in one of `FORMATS`."""
    with figure_style():
        return saved(_drawn(data), file_format)


def _drawn(data: FigureData) -> Figure:
    rows = [bool(data.runs), bool(data.depths)].count(True)
    height = _HEAD_IN + rows * _ROW_IN + _FOOT_IN
    figure = empty_figure(_WIDTH_IN, height)
    _write(figure, 1.0 - 0.26 / height, data.title, 12.0, INK, "bold")
    _write(figure, 1.0 - 0.5 / height, data.subtitle, 9.0, QUIET, "normal")
    _write(figure, 0.12 / height, data.foot, 7.0, QUIET, "normal")
    top = height - _HEAD_IN
    for is_wanted, draw in ((data.runs, _draw_runs), (data.depths, _draw_depths)):
        if is_wanted:
            bottom = top - _ROW_IN + _AXIS_IN
            place = (_LEFT, bottom / height, _RIGHT - _LEFT, (_ROW_IN - _AXIS_IN - 0.25) / height)
            draw(figure.add_axes(place), data)
            top -= _ROW_IN
    return figure


def _write(figure: Figure, y: float, text: str, size: float, colour: str, weight: str) -> None:
    # A dollar sign of a record is no formula.
    figure.text(_LEFT / 3, y, text.replace("$", r"\$"), size=size, color=colour, weight=weight, va="center")


def _draw_runs(axes: Axes, data: FigureData) -> None:
    if data.band is not None:
        _draw_band(axes, data.band)
    for event in data.events:
        _draw_event(axes, event)
    for run in data.runs:
        _draw_run(axes, run)
    _days(axes, data)
    name_axes(axes, "", f"rate, {data.unit}")
    if all(run.rate >= 0.0 for run in data.runs):
        axes.set_ylim(bottom=0.0)
    if data.band is not None:
        axes.legend(loc="lower left", frameon=False, fontsize=8.0)


def _draw_band(axes: Axes, band: FigureBand) -> None:
    if band.high is not None:
        axes.axhspan(band.low or 0.0, band.high, color=ACCENT, alpha=0.16, lw=0, label=band.label)
    if band.mid is not None:
        axes.axhline(band.mid, color=ACCENT, lw=1.0, ls=(0, (4, 3)))


def _draw_event(axes: Axes, event: FigureEvent) -> None:
    axes.axvline(event.day.toordinal(), color=QUIET, lw=0.8, ls=(0, (2, 3)))
    axes.text(
        event.day.toordinal(), 0.99, f" {event.text}".replace("$", r"\$"), size=7.5, style="italic",
        color=QUIET, va="top", transform=axes.get_xaxis_transform(), clip_on=True,
    )  # fmt: skip


def _draw_run(axes: Axes, run: FigureRun) -> None:
    day, colour = run.day.toordinal(), ACCENT if run.in_series else QUIET
    if run.is_limit:
        axes.plot([day], [run.rate], marker="v", color=colour, mfc="none", ms=6.0)
        return
    axes.errorbar(
        [day], [run.rate], yerr=None if run.std is None else [run.std], fmt="o", ms=4.5, color=colour,
        mfc=colour if run.in_series else "none", elinewidth=1.0,
    )  # fmt: skip


def _days(axes: Axes, data: FigureData) -> None:
    days = [run.day for run in data.runs] + [event.day for event in data.events]
    first, last = min(days), max(days)
    count = min(_DAY_LABELS, (last - first).days + 1)
    step = (last - first) / max(count - 1, 1)
    shown = [first + index * step for index in range(count)]
    axes.set_xticks([day.toordinal() for day in shown], [day.isoformat() for day in shown])
    air = max((last - first).days * 0.04, _DAYS_OF_AIR)
    axes.set_xlim(first.toordinal() - air, last.toordinal() + air)


def _draw_depths(axes: Axes, data: FigureData) -> None:
    for depth in data.depths:
        _draw_depth(axes, depth)
    if data.line is not None:
        _draw_line(axes, data.line, max(depth.time for depth in data.depths))
    axes.axhline(0.0, color=QUIET, lw=0.8)
    name_axes(axes, f"time, {data.time_unit}", f"depth, {data.depth_unit}")


def _draw_depth(axes: Axes, depth: FigureDepth) -> None:
    error = None if depth.std is None else [depth.std]
    axes.errorbar([depth.time], [depth.depth], yerr=error, fmt="o", ms=4.5, color=ACCENT, elinewidth=1.0)


def _draw_line(axes: Axes, line: FigureLine, last: float) -> None:
    axes.plot([line.induction, last], [0.0, line.slope * (last - line.induction)], color=ACCENT, lw=1.4)
