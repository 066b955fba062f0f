"""
Control charts and sample sizes, by second routes: simulation, written-out sums, scipy.stats, statsmodels.
"""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import stats
from statsmodels.stats.power import TTestPower

from builder.engine import (
    DomainError,
    ewma_chart,
    individuals_chart,
    prediction_factor,
    runs_to_see,
    sigma_upper_factor,
    tolerance_factor_one_sided,
    tolerance_factor_two_sided,
    zero_failures_upper,
)

VALUES = st.lists(st.floats(-10, 10), min_size=2, max_size=20)
SETTINGS = settings(max_examples=60, deadline=None, derandomize=True)


@given(VALUES, st.floats(0.05, 1))
@SETTINGS
def test_ewma_is_its_weighted_sum_written_out(values: list[float], weight: float) -> None:
    """
    Second route: (1 - w)^n target + w sum (1 - w)^(n - i) x_i; the limits from the variance of that sum.
    """
    last = ewma_chart(values, 1.0, 2.0, weight, 3.0)[-1]
    n = len(values)
    weights = [weight * (1 - weight) ** (n - 1 - i) for i in range(n)]
    total = (1 - weight) ** n + math.fsum(w * x for w, x in zip(weights, values, strict=True))
    assert last.value == pytest.approx(total, abs=1e-9)
    assert last.upper - 1 == pytest.approx(3 * 2 * math.sqrt(math.fsum(w * w for w in weights)), rel=1e-9)
    assert last.outside == (abs(last.value - 1) > last.upper - 1)


def test_three_sigma_limits_of_long_steady_series_hold_as_often_as_stated() -> None:
    """Simulation (seeded, 100,000 values): 0.27 % lie outside, as 1 in 370.4 says."""
    values = np.random.default_rng(800).standard_normal(100_000)
    chart = individuals_chart(values.tolist())
    outside = ((values > chart.upper) | (values < chart.lower)).mean()
    assert outside == pytest.approx(0.0027, abs=0.0005)
    assert (np.abs(np.diff(values)) > chart.moving_range_upper).mean() == pytest.approx(0.009, abs=0.002)


@pytest.mark.parametrize("n", [2, 3, 6, 20])
def test_prediction_factor_holds_the_next_value(n: int) -> None:
    """Simulation (seeded, 200,000): 95 % of next values lie within factor times s."""
    rng = np.random.default_rng(801)
    x = rng.standard_normal((200_000, n + 1))
    within = np.abs(x[:, n] - x[:, :n].mean(1)) <= prediction_factor(n, 0.95) * x[:, :n].std(1, ddof=1)
    assert within.mean() == pytest.approx(0.95, abs=0.0016)


@pytest.mark.parametrize(("n", "content", "confidence"), [(3, 0.95, 0.95), (10, 0.9, 0.99), (30, 0.95, 0.9)])
def test_tolerance_factors_hold_their_content_as_often_as_stated(
    n: int, content: float, confidence: float
) -> None:
    """Simulation (seeded, 200,000): one-sided exact; two-sided by Howe within 0.5 %."""
    rng = np.random.default_rng(802)
    means, deviations = (
        rng.standard_normal(200_000) / math.sqrt(n),
        np.sqrt(rng.chisquare(n - 1, 200_000) / (n - 1)),
    )
    one = stats.norm.cdf(means + tolerance_factor_one_sided(n, content, confidence) * deviations) >= content
    half = tolerance_factor_two_sided(n, content, confidence) * deviations
    two = stats.norm.cdf(means + half) - stats.norm.cdf(means - half) >= content
    assert one.mean() == pytest.approx(confidence, abs=0.0022)
    assert two.mean() == pytest.approx(confidence, abs=0.005)


def test_upper_bound_of_the_deviation_holds() -> None:
    """Simulation (seeded, 200,000): the true deviation lies below the bound in 95 %."""
    s = np.sqrt(np.random.default_rng(803).chisquare(4, 200_000) / 4)
    assert (s * sigma_upper_factor(5, 0.95) >= 1).mean() == pytest.approx(0.95, abs=0.0016)


@pytest.mark.parametrize("n", [1, 5, 59, 300])
def test_bound_without_failures_is_clopper_pearson(n: int) -> None:
    """Second route: the beta quantile of Clopper & Pearson."""
    assert zero_failures_upper(n, 0.95) == pytest.approx(stats.beta.ppf(0.95, 1, n), rel=1e-9)


@pytest.mark.parametrize("effect", [0.4, 0.7, 1.0, 2.0])
def test_number_of_runs_has_the_power_asked_for(effect: float) -> None:
    """
    Second route: the exact one-sided t power of statsmodels; the quantile formula is within one run of
    it.
    """
    n = runs_to_see(effect, 1.0, 0.05, 0.10)
    power = TTestPower()
    assert power.power(effect, n + 1, 0.05, alternative="larger") >= 0.90
    assert power.power(effect, max(2, n - 2), 0.05, alternative="larger") < 0.90


@given(st.floats(0.3, 3), st.floats(1.01, 2))
@SETTINGS
def test_smaller_shifts_need_more_runs(shift: float, factor: float) -> None:
    """A larger shift, a steadier tool or a bolder risk never needs more runs."""
    n = runs_to_see(shift, 1.0, 0.05, 0.10)
    assert runs_to_see(shift * factor, 1.0, 0.05, 0.10) <= n
    assert runs_to_see(shift, factor, 0.05, 0.10) >= n
    assert runs_to_see(shift, 1.0, 0.05 * factor, 0.10) <= n


def test_factors_tend_to_the_normal_quantiles() -> None:
    """With very many runs all factors are those of a known distribution."""
    assert prediction_factor(10**6, 0.95) == pytest.approx(1.95996, rel=1e-4)
    assert tolerance_factor_two_sided(10**6, 0.95, 0.95) == pytest.approx(1.95996, rel=2e-3)
    assert sigma_upper_factor(10**6, 0.95) == pytest.approx(1, rel=2e-3)


def test_impossible_factors_are_refused() -> None:
    """One run has no scatter; a confidence of 1 has no bound; a shift of 0 is never seen."""
    for call in (
        lambda: prediction_factor(1, 0.95),
        lambda: sigma_upper_factor(1, 0.95),
        lambda: tolerance_factor_one_sided(1, 0.9, 0.9),
        lambda: tolerance_factor_two_sided(1, 0.9, 0.9),
        lambda: zero_failures_upper(0, 0.95),
        lambda: zero_failures_upper(3, 1.0),
        lambda: runs_to_see(0, 1, 0.05, 0.1),
        lambda: individuals_chart([1.0]),
        lambda: ewma_chart([1.0], 0, 1, 0, 3),
        lambda: ewma_chart([1.0], 0, 0, 0.3, 3),
    ):
        with pytest.raises(DomainError):
            call()
