"""The line with an induction time, by second routes: statsmodels, Monte Carlo, limits and invariants."""

from __future__ import annotations

import math

import numpy as np
import pytest
import statsmodels.api as sm
from hypothesis import given, settings
from hypothesis import strategies as st

from builder.engine import DomainError, fit_line, mean_depth_at, new_depth_at, normal, time_to_depth

TIMES = [60.0, 120.0, 180.0, 240.0, 300.0]
DEPTHS = [95.0, 203.0, 301.0, 409.0, 512.0]
U = [3.0, 4.0, 5.0, 6.0, 7.0]
SETTINGS = settings(max_examples=60, deadline=None, derandomize=True)


def test_weighted_fit_agrees_with_statsmodels() -> None:
    """Second route: statsmodels WLS with fixed scale."""
    theirs = sm.WLS(DEPTHS, sm.add_constant(TIMES), 1 / np.square(U)).fit(cov_type="fixed scale")
    ours = fit_line(TIMES, DEPTHS, U)
    assert [ours.intercept_nm, ours.slope_nm_per_s] == pytest.approx(theirs.params, rel=1e-10)
    assert [ours.u_intercept_nm, ours.u_slope_nm_per_s] == pytest.approx(theirs.bse, rel=1e-10)
    assert ours.cov_nm2_per_s == pytest.approx(theirs.cov_params()[0, 1], rel=1e-10)


def test_unweighted_fit_agrees_with_statsmodels() -> None:
    """Second route: statsmodels OLS; unknown uncertainties come from the scatter."""
    theirs = sm.OLS(DEPTHS, sm.add_constant(TIMES)).fit()
    ours = fit_line(TIMES, DEPTHS, None)
    assert ours.rescaled
    assert [ours.u_intercept_nm, ours.u_slope_nm_per_s] == pytest.approx(theirs.bse, rel=1e-10)
    forecast = theirs.get_prediction([[1.0, 400.0]])
    assert mean_depth_at(ours, 400).u_nm == pytest.approx(forecast.se_mean[0], rel=1e-9)
    assert new_depth_at(ours, 400, ours.s_residual_nm).u_nm == pytest.approx(forecast.se_obs[0], rel=1e-9)


def test_stated_uncertainties_agree_with_monte_carlo() -> None:
    """JCGM 101: the scatter of fits to simulated depths is what the fit states (seeded, 20,000 trials)."""
    rng = np.random.default_rng(101)
    line = -8.0 + 1.735 * np.asarray(TIMES)
    fits = [fit_line(TIMES, line + U * rng.standard_normal(5), U) for _ in range(20_000)]
    slopes = np.array([fit.slope_nm_per_s for fit in fits])
    intercepts = np.array([fit.intercept_nm for fit in fits])
    assert slopes.std() == pytest.approx(fits[0].u_slope_nm_per_s, rel=0.025)
    assert intercepts.std() == pytest.approx(fits[0].u_intercept_nm, rel=0.025)
    assert np.cov(slopes, intercepts)[0, 1] == pytest.approx(fits[0].cov_nm2_per_s, rel=0.05)


def test_limits_of_the_time_hold_the_true_time_as_often_as_they_say() -> None:
    """Monte Carlo of the Fieller limits: 95 % within binomial error (seeded, 8,000 trials: 3 u = 0.73 %)."""
    rng = np.random.default_rng(102)
    true_time = (450 + 8.0) / 1.735
    line = -8.0 + 1.735 * np.asarray(TIMES)
    hits = 0
    for _ in range(8_000):
        found = time_to_depth(fit_line(TIMES, line + U * rng.standard_normal(5), U), 450, normal(0.975))
        hits += found.lo_s <= true_time <= found.hi_s
    assert hits / 8_000 == pytest.approx(0.95, abs=0.0075)


def test_spread_between_runs_enters_the_time_once() -> None:
    """Monte Carlo: rates that differ from run to run widen the time by the stated tau (seeded)."""
    rng = np.random.default_rng(103)
    fit = fit_line(TIMES, [2 * t for t in TIMES], [1e-6] * 5)
    times = 450 / (2 + 0.02 * rng.standard_normal(200_000))
    assert time_to_depth(fit, 450, 1.96, tau_nm_per_s=0.02).u_s == pytest.approx(times.std(), rel=0.01)


def test_induction_is_found_and_never_clipped() -> None:
    """A delay of 12 s, and etching 9 s before the clock, both come back exactly."""
    for induction in (12.0, -9.0):
        fit = fit_line(TIMES, [2 * (t - induction) for t in TIMES], None)
        assert fit.induction_s == pytest.approx(induction, abs=1e-9)
        assert fit.slope_nm_per_s == pytest.approx(2, rel=1e-12)


def test_forgetting_the_covariance_would_be_wrong() -> None:
    """JCGM 100 H.3 (from memory): without the covariance the mean's uncertainty would be far too large."""
    fit = fit_line(TIMES, DEPTHS, U)
    without = math.sqrt(fit.var_intercept_nm2 + 180**2 * fit.var_slope_nm2_per_s2)
    assert mean_depth_at(fit, 180).u_nm < 0.5 * without


@given(
    st.lists(st.floats(-50, 50), min_size=5, max_size=5),
    st.floats(0.01, 100),
    st.floats(0.001, 1000),
)
@SETTINGS
def test_units_do_not_matter(noise: list[float], time_unit: float, length_unit: float) -> None:
    """Other units of time and length scale slope, uncertainty and induction, and change nothing else."""
    depths = [2 * t + e for t, e in zip(TIMES, noise, strict=True)]
    one = fit_line(TIMES, depths, U)
    other = fit_line(
        [t * time_unit for t in TIMES], [d * length_unit for d in depths], [u * length_unit for u in U]
    )
    scale = length_unit / time_unit
    assert other.slope_nm_per_s == pytest.approx(one.slope_nm_per_s * scale, rel=1e-9)
    assert other.u_slope_nm_per_s == pytest.approx(one.u_slope_nm_per_s * scale, rel=1e-9)
    assert other.chi2 == pytest.approx(one.chi2, rel=1e-6, abs=1e-9)


@given(st.floats(0, 1e6))
@SETTINGS
def test_late_times_lose_no_digits(start: float) -> None:
    """Shifting the clock shifts the induction only (the textbook sums would lose the slope)."""
    fit = fit_line([t + start for t in TIMES], DEPTHS, U)
    assert fit.slope_nm_per_s == pytest.approx(fit_line(TIMES, DEPTHS, U).slope_nm_per_s, rel=1e-7)


@given(st.permutations(range(5)))
@SETTINGS
def test_order_of_points_does_not_matter(order: list[int]) -> None:
    """The points may be listed in any order."""
    fit = fit_line([TIMES[i] for i in order], [DEPTHS[i] for i in order], [U[i] for i in order])
    assert fit.slope_nm_per_s == pytest.approx(fit_line(TIMES, DEPTHS, U).slope_nm_per_s, rel=1e-12)


@given(st.floats(0.5, 2.5), st.floats(0.01, 0.5), st.floats(0, 20))
@SETTINGS
def test_more_confidence_or_scatter_never_narrows_the_time(
    quantile: float, more: float, u_new: float
) -> None:
    """Limits nest: a higher quantile or a less repeatable run gives wider limits about the same time."""
    fit = fit_line(TIMES, DEPTHS, U)
    inner = time_to_depth(fit, 450, quantile, u_new_nm=u_new)
    for outer in (
        time_to_depth(fit, 450, quantile + more, u_new_nm=u_new),
        time_to_depth(fit, 450, quantile, u_new_nm=u_new + more),
        time_to_depth(fit, 450, quantile, u_new_nm=u_new, tau_nm_per_s=more / 100),
    ):
        assert outer.lo_s <= inner.lo_s <= inner.time_s <= inner.hi_s <= outer.hi_s


@pytest.mark.parametrize(
    ("times", "depths", "u"),
    [
        ([0, 10], [0, 20], None),
        ([0, 10, 10], [0, 20, 21], None),
        ([0, 10, 20], [0, 20], None),
        ([0, 10, 20], [0, 20, 40], [1, 1, 0]),
        ([0, 10, 20], [0, 20, 40], [1, 1, -1]),
        ([0, 10, 20], [0, math.nan, 40], None),
        ([0, 10, math.inf], [0, 20, 40], None),
    ],
)
def test_what_is_no_line_is_refused(times: list[float], depths: list[float], u: list[float] | None) -> None:
    """Too few distinct times, unequal lengths, impossible uncertainties, numbers that are none."""
    with pytest.raises(DomainError):
        fit_line(times, depths, u)


def test_a_slope_that_may_be_zero_gives_no_time() -> None:
    """Without a slope clear of 0 there is no latest time, and none is made up."""
    flat = fit_line(TIMES, [3.0, -4.0, 5.0, -2.0, 6.0], [5.0] * 5)
    with pytest.raises(DomainError, match="slope"):
        time_to_depth(flat, 450, 1.96)
    with pytest.raises(DomainError, match="slope"):
        _ = fit_line(TIMES, [7.0] * 5, None).induction_s
    with pytest.raises(DomainError, match="u_new_nm"):
        new_depth_at(fit_line(TIMES, DEPTHS, U), 100, -1)
    with pytest.raises(DomainError, match="quantile"):
        time_to_depth(fit_line(TIMES, DEPTHS, U), 450, 0)
