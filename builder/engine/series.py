"""Runs in order of time: where a new series starts, and whether the current one drifts."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from builder.engine.constants import TREND_CONFIDENCE, TREND_MIN_RUNS
from builder.engine.errors import DomainError
from builder.engine.next_run import NextRun, predict_next_run
from builder.engine.quantiles import two_sided_t
from builder.engine.run_rate import RunRate
from builder.engine.spread import Spread, moderated


@dataclass(frozen=True, slots=True)
class Trend:
    """
    The slope of ln(rate) along a series, per unit of position, with its 95 % interval.

    `significant`: the interval excludes 0. `log_end` is the line at the last run, `s_residual` the
    scatter about the line. `von_neumann` is 2 on average without drift and smaller with it.
    """

    slope: float
    slope_lo: float
    slope_hi: float
    significant: bool
    log_end: float
    s_residual: float
    von_neumann: float


@dataclass(frozen=True, slots=True)
class TrendAdjusted:
    """An interval of ln(rate) after the trend was looked at; `trend` is None for too short a series."""

    log_lo: float
    log_mid: float
    log_hi: float
    trend: Trend | None
    applied: bool


def split_at_events(n_runs: int, events: Sequence[int]) -> tuple[range, ...]:
    """
    Series of run indices, oldest first. An event index is that of the first run after the event.

    Events at 0, repeated, or at `n_runs` (no run since) are allowed; the last makes the current series empty.

    Raises
    ------
    DomainError
        An event outside 0 to n_runs.
    """
    for event in events:
        if not 0 <= event <= n_runs:
            raise DomainError("events", event, f"0 to {n_runs}")
    starts = sorted({0, *events})
    return tuple(range(a, b) for a, b in zip(starts, [*starts[1:], n_runs], strict=True))


def current_series(n_runs: int, events: Sequence[int]) -> range:
    """Indices of the runs since the last event; empty when there are none yet."""
    return split_at_events(n_runs, events)[-1]


def von_neumann_ratio(values: Sequence[float]) -> float:
    """
    Sum of squared successive differences over the sum of squares about the mean.

    Raises
    ------
    DomainError
        Fewer than two values, or all equal.

    Source
    ------
    von Neumann 1941 (from memory).
    """
    x = np.asarray(values, dtype=np.float64)
    about_mean = float(((x - x.mean()) ** 2).sum()) if len(x) > 1 else 0.0
    if about_mean == 0:
        raise DomainError("values", list(values), "at least two different values")
    return float((np.diff(x) ** 2).sum()) / about_mean


def find_trend(positions: Sequence[float], log_rates: Sequence[float]) -> Trend | None:
    """
    Slope of ln(rate) against run index, days or chamber hours.

    Parameters
    ----------
    positions:
        Strictly rising, shape (n,).
    log_rates:
        ln(rate), shape (n,).

    Returns
    -------
    :
        The trend; None for fewer than 4 runs or for rates that are all equal.

    Raises
    ------
    DomainError
        Lengths differ, or positions do not rise.

    Source
    ------
    Ordinary least squares; tests compare with scipy.stats.linregress.
    """
    if len(positions) != len(log_rates):
        raise DomainError("lengths", (len(positions), len(log_rates)), "equal lengths")
    x, y = np.asarray(positions, dtype=np.float64), np.asarray(log_rates, dtype=np.float64)
    if not (np.diff(x) > 0).all():
        raise DomainError("positions", x.tolist(), "strictly rising")
    if len(x) < TREND_MIN_RUNS or float(np.ptp(y)) == 0:
        return None
    centred = x - x.mean()
    sum_xx = float((centred**2).sum())
    slope = float((centred * y).sum()) / sum_xx
    residual = y - y.mean() - slope * centred
    s_residual = math.sqrt(float((residual**2).sum()) / (len(x) - 2))
    half = two_sided_t(TREND_CONFIDENCE, len(x) - 2) * s_residual / math.sqrt(sum_xx)
    return Trend(
        slope=slope,
        slope_lo=slope - half,
        slope_hi=slope + half,
        significant=abs(slope) > half,
        log_end=float(y.mean() + slope * centred[-1]),
        s_residual=s_residual,
        von_neumann=von_neumann_ratio(y.tolist()),
    )


def trend_adjusted(
    positions: Sequence[float],
    log_rates: Sequence[float],
    log_lo: float,
    log_hi: float,
    confidence: float,
    spread: Spread,
    next_position: float | None = None,
) -> TrendAdjusted:
    """
    The next-run interval of a series, re-centred on the series' end when it drifts, and never narrower.

    Under a significant trend the new half-width is the greater of the given one and that of the line
    at the next position (its scatter moderated across the lab), plus the drift still to come.

    Parameters
    ----------
    positions, log_rates:
        The measured runs of the current series; positions strictly rising.
    log_lo, log_hi:
        The interval without a trend, ln(nm/s), log_lo <= log_hi.
    confidence:
        Two-sided, in (0, 1), the same the interval has.
    spread:
        The lab's spread for the method.
    next_position:
        Where the next run will be, beyond the last; None: one mean step on.

    Raises
    ------
    DomainError
        As `find_trend`; or log_lo > log_hi, or next_position before the last run.

    Source
    ------
    Prediction from a least-squares line; the rule "never narrower" is ours.
    """
    if not log_lo <= log_hi:
        raise DomainError("log_lo", log_lo, f"log_lo <= log_hi = {log_hi}")
    trend = find_trend(positions, log_rates)
    half, middle = (log_hi - log_lo) / 2, (log_lo + log_hi) / 2
    if trend is None or not trend.significant:
        return TrendAdjusted(log_lo, middle, log_hi, trend, applied=False)
    step = _next_step(positions, next_position)
    line = _line_half_width(positions, trend, step, confidence, spread)
    half = max(half, line + abs(trend.slope) * step)
    return TrendAdjusted(trend.log_end - half, trend.log_end, trend.log_end + half, trend, applied=True)


def predict_in_series(
    runs: Sequence[RunRate],
    positions: Sequence[float],
    spread: Spread,
    confidence: float,
    u_gauge_log: float = 0.0,
    next_position: float | None = None,
) -> tuple[NextRun, Trend | None]:
    """
    `predict_next_run` for the runs of one series, with the trend of its measured runs taken in.

    With limits among the runs a trend may only widen: the ends are then the outer ones of both
    intervals. Arguments and errors as `predict_next_run` and `trend_adjusted`.
    """
    if len(runs) != len(positions):
        raise DomainError("lengths", (len(runs), len(positions)), "equal lengths")
    plain = predict_next_run(runs, spread, confidence, u_gauge_log)
    measured = [(x, run.log_rate) for x, run in zip(positions, runs, strict=True) if run.log_rate is not None]
    if len(measured) < TREND_MIN_RUNS:
        return plain, None
    only_measured = predict_next_run(
        [r for r in runs if r.log_rate is not None], spread, confidence, u_gauge_log
    )
    assert only_measured.log_lo is not None
    adjusted = trend_adjusted(
        [x for x, _ in measured], [y for _, y in measured],
        only_measured.log_lo, only_measured.log_hi, confidence, spread, next_position,
    )  # fmt: skip
    if not adjusted.applied:
        return plain, adjusted.trend
    if len(measured) == len(runs):
        ends = replace(plain, log_lo=adjusted.log_lo, log_mid=adjusted.log_mid, log_hi=adjusted.log_hi)
        return ends, adjusted.trend
    low = None if plain.log_lo is None else min(plain.log_lo, adjusted.log_lo)
    outer = replace(plain, log_lo=low, log_mid=adjusted.log_mid, log_hi=max(plain.log_hi, adjusted.log_hi))
    return outer, adjusted.trend


def _next_step(positions: Sequence[float], next_position: float | None) -> float:
    if next_position is None:
        return (positions[-1] - positions[0]) / (len(positions) - 1)
    if not next_position >= positions[-1]:
        raise DomainError("next_position", next_position, f"at least {positions[-1]}")
    return next_position - positions[-1]


def _line_half_width(
    positions: Sequence[float], trend: Trend, step: float, confidence: float, spread: Spread
) -> float:
    x = np.asarray(positions, dtype=np.float64)
    s2, df = moderated(trend.s_residual**2, len(x) - 2, spread)
    leverage = (x[-1] + step - x.mean()) ** 2 / ((x - x.mean()) ** 2).sum()
    return two_sided_t(confidence, df) * math.sqrt(s2 * (1 + 1 / len(x) + float(leverage)))
