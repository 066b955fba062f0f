"""Textbook pooling by a second route: statsmodels."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import stats
from statsmodels.stats.meta_analysis import combine_effects

from builder.engine import (
    DegreesRule,
    DomainError,
    dersimonian_laird,
    fixed_effect,
    hartung_knapp_safe_se,
    hartung_knapp_se,
    paule_mandel,
    plain_interval,
    prediction_interval,
)

RUNS = st.integers(2, 12).flatmap(
    lambda n: st.tuples(
        st.lists(st.floats(50, 150), min_size=n, max_size=n),
        st.lists(st.floats(0.5, 10), min_size=n, max_size=n),
    )
)
SETTINGS = settings(max_examples=60, deadline=None, derandomize=True)


@pytest.mark.parametrize("count", range(3, 13))
def test_pooled_means_agree_with_statsmodels(count: int) -> None:
    """
    Fixed effect, DerSimonian-Laird, Paule-Mandel, Hartung-Knapp: statsmodels finds the same (seeded
    runs).
    """
    rng = np.random.default_rng(300 + count)
    # Spread well above the uncertainties: statsmodels lets tau^2 fall below 0, we do not.
    values, u = 100 + 12 * rng.standard_normal(count), rng.uniform(1, 4, count)
    by_moments = combine_effects(values, u**2, method_re="dl")
    by_equation = combine_effects(values, u**2, method_re="iterated")
    ours, fixed = dersimonian_laird(values.tolist(), u.tolist()), fixed_effect(values.tolist(), u.tolist())
    assert [fixed.mean, fixed.se, fixed.q] == pytest.approx(
        [by_moments.mean_effect_fe, by_moments.sd_eff_w_fe, by_moments.q], rel=1e-9
    )
    assert ours.tau2 == pytest.approx(by_moments.tau2, rel=1e-9)
    assert ours.mean == pytest.approx(by_moments.mean_effect_re, rel=1e-9)
    assert hartung_knapp_se(values.tolist(), u.tolist(), ours.tau2) == pytest.approx(
        by_moments.sd_eff_w_re_hksj, rel=1e-9
    )
    assert paule_mandel(values.tolist(), u.tolist()).tau2 == pytest.approx(by_equation.tau2, rel=1e-4)


@given(RUNS)
@SETTINGS
def test_paule_mandel_solves_its_own_equation(runs: tuple[list[float], list[float]]) -> None:
    """
    With the estimate put in, the weighted scatter is k - 1; else it is 0 and the scatter is already less.
    """
    found = paule_mandel(runs[0], runs[1])
    values, weight = np.asarray(runs[0]), 1 / (np.square(runs[1]) + found.tau2)
    q = (weight * (values - np.average(values, weights=weight)) ** 2).sum()
    if found.tau2 > 0:
        assert q == pytest.approx(len(values) - 1, rel=1e-6)
    else:
        assert q <= len(values) - 1


@given(RUNS)
@SETTINGS
def test_the_safe_uncertainty_is_never_smaller_than_either(runs: tuple[list[float], list[float]]) -> None:
    """Runs that agree by luck do not make the mean better than their uncertainties allow."""
    found = paule_mandel(runs[0], runs[1])
    safe = hartung_knapp_safe_se(runs[0], runs[1], found.tau2)
    assert safe >= found.se * (1 - 1e-12)
    assert safe >= hartung_knapp_se(runs[0], runs[1], found.tau2)


@given(RUNS, st.floats(0.001, 1000))
@SETTINGS
def test_units_do_not_matter(runs: tuple[list[float], list[float]], unit: float) -> None:
    """Mean, uncertainty and tau scale with the unit; I2 does not."""
    one = paule_mandel(runs[0], runs[1])
    other = paule_mandel([v * unit for v in runs[0]], [v * unit for v in runs[1]])
    assert other.mean == pytest.approx(one.mean * unit, rel=1e-9)
    assert other.tau2 == pytest.approx(one.tau2 * unit**2, rel=1e-6, abs=1e-9 * unit**2)
    assert other.i2 == pytest.approx(one.i2, rel=1e-6, abs=1e-9)


@given(st.lists(st.floats(-5, 5), min_size=2, max_size=12, unique=True), st.floats(0.5, 0.99))
@SETTINGS
def test_plain_interval_agrees_with_scipy_stats(values: list[float], confidence: float) -> None:
    """Second route: the t interval of scipy.stats with the scale of a further value."""
    x = np.asarray(values)
    n = len(x)
    scale = x.std(ddof=1) * np.sqrt(1 + 1 / n)
    theirs = stats.t.interval(confidence, n - 1, loc=x.mean(), scale=scale)
    ours = plain_interval(values, confidence)
    assert [ours.lo, ours.hi] == pytest.approx(theirs, rel=1e-6, abs=1e-9)


def test_equal_runs_leave_no_spread() -> None:
    """Runs that agree have no tau and no heterogeneity, by any method."""
    for method in (fixed_effect, dersimonian_laird, paule_mandel):
        pooled = method([100.0, 100.0, 100.0], [2.0, 2.0, 2.0])
        assert pooled.tau2 == 0
        assert pooled.i2 == 0
        assert pooled.se == pytest.approx(2 / np.sqrt(3), rel=1e-12)


def test_what_cannot_be_pooled_is_refused() -> None:
    """One run, unequal lengths, an uncertainty of 0, too few runs for the rule."""
    for values, u in (([1.0], [1.0]), ([1.0, 2.0], [1.0]), ([1.0, 2.0], [1.0, 0.0])):
        with pytest.raises(DomainError):
            fixed_effect(values, u)
    two = paule_mandel([1.0, 2.0], [0.1, 0.1])
    with pytest.raises(DomainError, match="k = 2"):
        prediction_interval(two, 0.9)
    assert prediction_interval(two, 0.9, DegreesRule.K_MINUS_1).hi > 2
    with pytest.raises(DomainError):
        plain_interval([1.0], 0.9)
