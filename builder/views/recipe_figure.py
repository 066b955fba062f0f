"""The figure of a recipe, from its runs: rates over time with the next run, and a depth series."""

from __future__ import annotations

import datetime
import math

from builder.engine import NextRun
from builder.findings.own_rates import LeftOut, OwnRate, OwnRun
from builder.records.lab import LabRecords
from builder.records.runs import Run
from builder.views.figure_data import FigureBand, FigureData, FigureDepth, FigureEvent, FigureLine, FigureRun
from builder.views.number_text import percent_text, rate_text

_SECONDS_A_MINUTE = 60.0


def recipe_figure(records: LabRecords, own: OwnRate, day: datetime.date) -> FigureData:
    """Return the figure of one film in a recipe; `own` must have an interval for the next run."""
    etch = records.etches[own.etch]
    assert own.next_run is not None
    series = next((run for run in reversed(own.used) if run.fit is not None), None)
    marker = "Invented demonstration data. " if records.settings.invented else ""
    return FigureData(
        title=etch.name,
        subtitle=f"{records.films[own.film].name}: {_count(own.next_run)}",
        foot=f"{marker}{records.settings.name}, as of {day.isoformat()}. Bars: standard uncertainty.",
        unit="nm/min",
        runs=tuple(run for item in own.runs if (run := _run(item)) is not None),
        events=tuple(FigureEvent(when, words) for when, words in own.events),
        band=_band(own.next_run, records.settings.confidence),
        depths=() if series is None else tuple(_depth(row) for row in series.rows),
        line=None if series is None or series.fit is None else FigureLine(
            series.fit.slope_nm_per_s, series.fit.induction_s
        ),
    )  # fmt: skip


def _run(item: OwnRun) -> FigureRun | None:
    in_series = item.left_out is None
    if item.left_out is LeftOut.SAYS_NOTHING:
        return None
    rate, limit = item.rate.rate_nm_per_s, item.rate.limit_nm_per_s
    if rate is not None:
        std = None if item.rate.u_log is None else item.rate.u_log * rate * _SECONDS_A_MINUTE
        return FigureRun(item.date, rate * _SECONDS_A_MINUTE, std, in_series)
    if limit is not None:
        return FigureRun(item.date, limit * _SECONDS_A_MINUTE, None, in_series, is_limit=True)
    return None


def _depth(row: Run) -> FigureDepth:
    return FigureDepth(row.time_s, row.before_nm - row.after_nm, math.hypot(row.u_nm, row.u_nm))


def _band(run: NextRun, confidence: float) -> FigureBand:
    shown = rate_text(run.lo_nm_per_s, run.mid_nm_per_s, run.hi_nm_per_s)
    mid = run.mid_nm_per_s
    return FigureBand(
        low=None if run.log_lo is None else run.lo_nm_per_s * _SECONDS_A_MINUTE,
        mid=None if mid is None else mid * _SECONDS_A_MINUTE,
        high=run.hi_nm_per_s * _SECONDS_A_MINUTE,
        label=f"next run, {percent_text(confidence)}: {shown.interval_with_unit or shown.with_unit}",
    )


def _count(run: NextRun) -> str:
    limits = f", {run.n_limits} without a loss to be seen" if run.n_limits else ""
    return f"{run.n_runs} measured runs{limits}"
