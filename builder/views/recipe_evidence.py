"""The evidence charts of a recipe: rates over time, and depth over time where a series was run."""

from __future__ import annotations

from builder.engine import LineFit
from builder.findings.own_rates import OwnRate, OwnRun
from builder.views.drawing.charts import (
    Chart,
    DepthPoint,
    Event,
    RunPoint,
    depth_time,
    rates_over_time,
)
from builder.views.number_text import NO_BREAK, plain_number, rate_text, time_text
from builder.views.recipe_standing import runs_text

_SECONDS_A_MINUTE = 60.0
_MICRON = 1000.0


def rate_chart(own: OwnRate | None) -> Chart | None:
    """Return the rates of the runs over time with the next-run band; None without a run that says any."""
    if own is None:
        return None
    scale, unit = _rate_unit(own)
    points = [point for run in own.runs if (point := _run_point(run, scale)) is not None]
    if not points:
        return None
    next_run = None
    if own.next_run is not None:
        next_run = (own.next_run.lo_nm_per_s * scale, own.next_run.hi_nm_per_s * scale)
    events = [Event(day, words) for day, words in own.events]
    return rates_over_time(points, events, next_run, unit=unit, description=_rates_in_words(own))


def depth_charts(own: OwnRate | None) -> tuple[Chart, ...]:
    """Return a chart of the newest depth series in use, if there is one."""
    if own is None:
        return ()
    series = [run for run in own.used if run.fit is not None]
    return tuple(_depth_chart(run, run.fit) for run in series[-1:] if run.fit is not None)


def _rate_unit(own: OwnRate) -> tuple[float, str]:
    high = max([own.next_run.hi_nm_per_s] if own.next_run else [0.0])
    known = [run.rate.rate_nm_per_s or run.rate.limit_nm_per_s or 0.0 for run in own.runs]
    if max([high, *known]) * _SECONDS_A_MINUTE >= _MICRON:
        return _SECONDS_A_MINUTE / _MICRON, "µm/min"
    return _SECONDS_A_MINUTE, "nm/min"


def _run_point(run: OwnRun, scale: float) -> RunPoint | None:
    rate = run.rate.rate_nm_per_s
    value = rate if rate is not None else run.rate.limit_nm_per_s
    if value is None:
        return None
    std = None if rate is None or run.rate.u_log is None else rate * run.rate.u_log * scale
    shown = rate_text(None, rate, None if rate is not None else run.rate.limit_nm_per_s).with_unit
    return RunPoint(
        day=run.date,
        rate=value * scale,
        std=std,
        is_limit=rate is None,
        in_series=run.left_out is None,
        title=f"{run.date.isoformat()}, {run.rows[0].wafer}: {shown}",
    )


def _rates_in_words(own: OwnRate) -> str:
    used = [run for run in own.used if run.rate.rate_nm_per_s is not None]
    rates = [run.rate.rate_nm_per_s or 0.0 for run in used]
    parts = [f"{runs_text(len(own.runs))}, {len(own.used)} of them in the current series."]
    if rates:
        spread = rate_text(min(rates), None, max(rates))
        parts.append(f"Their rates span {spread.with_unit}." if len(rates) > 1 else "")
    parts += [f"{words.capitalize()} on {day.isoformat()}." for day, words in own.events]
    if own.next_run is not None:
        shown = rate_text(own.next_run.lo_nm_per_s or None, None, own.next_run.hi_nm_per_s)
        parts.append(f"The band is where the next run is expected: {shown.with_unit}.")
    if own.trend is not None and own.trend.significant:
        parts.append("The rate drifts " + ("up." if own.trend.slope > 0 else "down."))
    return " ".join(part for part in parts if part)


def _depth_chart(run: OwnRun, fit: LineFit) -> Chart:
    depths = [row.before_nm - row.after_nm for row in run.rows]
    in_microns = max(depths) >= _MICRON
    size, depth_unit = (_MICRON, "µm") if in_microns else (1.0, "nm")
    in_minutes = max(row.time_s for row in run.rows) >= 3 * _SECONDS_A_MINUTE
    step, time_unit = (_SECONDS_A_MINUTE, "min") if in_minutes else (1.0, "s")
    points = [
        DepthPoint(
            row.time_s / step,
            depth / size,
            row.u_nm * 2**0.5 / size,
            f"{time_text(row.time_s)}: {plain_number(depth / size)}{NO_BREAK}{depth_unit}",
        )
        for row, depth in zip(run.rows, depths, strict=True)
    ]
    return depth_time(
        points,
        slope=fit.slope_nm_per_s * step / size,
        induction=fit.induction_s / step,
        time_unit=time_unit,
        depth_unit=depth_unit,
        description=_line_in_words(run, fit),
    )


def _line_in_words(run: OwnRun, fit: LineFit) -> str:
    slope = rate_text(None, fit.slope_nm_per_s, None).with_unit
    return (
        f"{len(run.rows)} depths of {run.rows[0].wafer}, {run.date.isoformat()}. Their line rises by {slope} "
        f"and {induction_words(fit.induction_s)}. {_fit_words(fit)}"
    )


def induction_words(induction_s: float) -> str:
    """Return what an induction time means."""
    size = time_text(abs(induction_s))
    if induction_s < 0:
        return f"meets zero {size} before the clock: etching goes on on the way to the rinse"
    return f"meets zero at {size}: so long nothing is etched"


def _fit_words(fit: LineFit) -> str:
    if fit.rescaled:
        return "The scatter about the line stands in for the uncertainties, which are not stated."
    shown = plain_number(fit.reduced_chi2, 2)
    verdict = "twice or more of what the uncertainties allow" if fit.reduced_chi2 > 2 else "as expected"
    return f"Reduced chi-squared {shown}: the scatter is {verdict}."
