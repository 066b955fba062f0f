"""Series and trends, against scipy.stats and by simulation."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import stats

from builder.engine import (
    DomainError,
    RunRate,
    Spread,
    current_series,
    find_trend,
    predict_in_series,
    predict_next_run,
    split_at_events,
    trend_adjusted,
    von_neumann_ratio,
)

LAB = Spread(0.06, 6, 20, from_prior=False)
LOGS = st.lists(st.floats(-2, 2), min_size=4, max_size=15, unique=True)
SETTINGS = settings(max_examples=80, deadline=None, derandomize=True)


@given(LOGS)
@SETTINGS
def test_trend_agrees_with_scipy_stats(logs: list[float]) -> None:
    """Second route: scipy.stats.linregress, with its own t interval."""
    x = np.arange(len(logs), dtype=float) * 3 + 5
    theirs = stats.linregress(x, logs)
    ours = find_trend(x.tolist(), logs)
    assert ours is not None
    half = stats.t.ppf(0.975, len(logs) - 2) * theirs.stderr
    assert ours.slope == pytest.approx(theirs.slope, rel=1e-6, abs=1e-9)
    assert ours.slope_hi - ours.slope_lo == pytest.approx(2 * half, rel=1e-5, abs=1e-9)
    assert ours.log_end == pytest.approx(theirs.intercept + theirs.slope * x[-1], abs=1e-8)


def test_steady_tools_raise_a_trend_once_in_twenty() -> None:
    """
    Without drift a slope is called significant in 5 % of series (seeded; three standard errors are 1 %).
    """
    rng = np.random.default_rng(500)
    found = [find_trend(list(range(8)), rng.standard_normal(8).tolist()) for _ in range(4_000)]
    share = sum(trend is not None and trend.significant for trend in found) / 4_000
    assert share == pytest.approx(0.05, abs=0.0104)


@given(LOGS, st.floats(0.5, 0.99))
@SETTINGS
def test_a_trend_never_narrows(logs: list[float], confidence: float) -> None:
    """The interval with a trend is at least as wide as without, and centred on the end of the line."""
    runs = [RunRate(log, 0.0) for log in logs]
    plain = predict_next_run(runs, LAB, confidence)
    found, trend = predict_in_series(runs, list(range(len(runs))), LAB, confidence)
    assert plain.log_lo is not None
    assert found.log_lo is not None
    assert found.log_hi - found.log_lo >= (plain.log_hi - plain.log_lo) * (1 - 1e-12)
    if trend is not None and trend.significant:
        assert found.log_mid == trend.log_end
    else:
        assert found == plain


def test_drifting_tool_is_predicted_better_with_its_trend() -> None:
    """
    A tool that drifts by one spread a run: 90 % promised (seeded, 1,500 series of 10 runs).

    The plain interval about the mean misses most next runs; with the trend at least 90 % fall inside.
    """
    rng = np.random.default_rng(501)
    plain_hits = trend_hits = 0
    for _ in range(1_500):
        logs = 0.06 * (rng.standard_normal(11) + np.arange(11))
        runs = [RunRate(float(log), 0.0) for log in logs[:10]]
        plain = predict_next_run(runs, LAB, 0.90)
        found, _ = predict_in_series(runs, list(range(10)), LAB, 0.90)
        assert plain.log_lo is not None
        assert found.log_lo is not None
        plain_hits += plain.log_lo <= logs[10] <= plain.log_hi
        trend_hits += found.log_lo <= logs[10] <= found.log_hi
    assert trend_hits / 1_500 >= 0.90
    assert plain_hits / 1_500 < 0.60


def test_line_half_width_agrees_with_statsmodels_style_prediction() -> None:
    """With nothing borrowed (d0 near 0) the width is that of a further point on the line, plus one step."""
    x, logs = list(range(6)), [0.0, 0.11, 0.19, 0.32, 0.41, 0.48]
    line = stats.linregress(x, logs)
    residual = np.asarray(logs) - line.intercept - line.slope * np.asarray(x)
    s = math.sqrt((residual**2).sum() / 4)
    half = stats.t.ppf(0.95, 4) * s * math.sqrt(1 + 1 / 6 + (6 - 2.5) ** 2 / 17.5) + line.slope
    found = trend_adjusted(x, logs, 0.2, 0.3, 0.90, Spread(0.06, 1e-9, 0, from_prior=True))
    assert found.applied
    assert (found.log_hi - found.log_lo) / 2 == pytest.approx(half, rel=1e-5)


def test_waiting_longer_widens_a_drifting_series() -> None:
    """The farther the next run, the more drift is still to come."""
    logs = [0.0, 0.1, 0.22, 0.29, 0.41]
    widths = []
    for later in (4, 6, 12):
        found = trend_adjusted([0, 1, 2, 3, 4], logs, 0.0, 0.4, 0.90, LAB, later)
        widths.append(found.log_hi - found.log_lo)
    assert widths == sorted(widths)
    assert widths[0] < widths[-1]


def test_with_limits_among_the_runs_a_trend_only_widens() -> None:
    """The ends are then the outer ones of both intervals."""
    runs = [*[RunRate(0.1 * i, 0.0) for i in range(5)], RunRate(None, limit_nm_per_s=9.0)]
    plain = predict_next_run(runs, LAB, 0.90)
    found, trend = predict_in_series(runs, list(range(6)), LAB, 0.90)
    assert trend is not None
    assert found.log_hi >= plain.log_hi >= math.log(9.0)


def test_events_split_the_runs() -> None:
    """By hand: events before runs 3 and 5 of seven make three series; an event after all leaves none."""
    assert split_at_events(7, [5, 3]) == (range(3), range(3, 5), range(5, 7))
    assert current_series(7, [3, 5]) == range(5, 7)
    assert split_at_events(3, [0, 3, 3]) == (range(3), range(3, 3))
    assert len(current_series(3, [3])) == 0
    assert current_series(4, []) == range(4)
    with pytest.raises(DomainError, match="events"):
        split_at_events(3, [4])


def test_the_mean_von_neumann_ratio_of_independent_runs_is_two() -> None:
    """von Neumann 1941 (from memory): the mean is 2 n / (n - 1) x (n - 1) / n = 2 without drift (seeded)."""
    rng = np.random.default_rng(502)
    ratios = [von_neumann_ratio(rng.standard_normal(12).tolist()) for _ in range(4_000)]
    assert np.mean(ratios) == pytest.approx(2, abs=0.03)


def test_too_short_or_flat_series_have_no_trend() -> None:
    """Three runs, or rates that are all equal, say nothing of a slope."""
    assert find_trend([0, 1, 2], [0.0, 0.1, 0.2]) is None
    assert find_trend([0, 1, 2, 3], [0.1] * 4) is None
    found, trend = predict_in_series([RunRate(0.0, 0.0)] * 3, [0, 1, 2], LAB, 0.90)
    assert trend is None
    assert found == predict_next_run([RunRate(0.0, 0.0)] * 3, LAB, 0.90)


def test_impossible_series_are_refused() -> None:
    """Positions that do not rise, unequal lengths, a next run in the past, equal values."""
    for call in (
        lambda: find_trend([0, 1, 1, 2], [0.0, 0.1, 0.2, 0.3]),
        lambda: find_trend([0, 1], [0.0]),
        lambda: trend_adjusted([0, 1, 2, 3], [0.0, 0.1, 0.2, 0.3], 1.0, 0.0, 0.9, LAB),
        lambda: trend_adjusted([0, 1, 2, 3], [0.0, 0.1, 0.21, 0.3], 0.0, 1.0, 0.9, LAB, 2),
        lambda: predict_in_series([RunRate(0.0)], [0, 1], LAB, 0.9),
        lambda: von_neumann_ratio([1.0, 1.0]),
        lambda: von_neumann_ratio([1.0]),
    ):
        with pytest.raises(DomainError):
            call()
