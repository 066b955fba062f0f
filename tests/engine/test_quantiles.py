"""Quantiles against scipy.stats and against closed forms."""

from __future__ import annotations

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import stats

from builder.engine import DomainError, normal, normal_cdf, student_t, two_sided_t
from builder.engine.quantiles import chi_squared, noncentral_t

PROBABILITIES = st.floats(1e-4, 1 - 1e-4)
SETTINGS = settings(max_examples=60, deadline=None, derandomize=True)


@given(PROBABILITIES)
@SETTINGS
def test_normal_quantile_agrees_with_scipy_stats_and_goes_back(p: float) -> None:
    """Second route: scipy.stats; and the distribution function takes the quantile back."""
    assert normal(p) == pytest.approx(stats.norm.ppf(p), rel=1e-9, abs=1e-12)
    assert normal_cdf(normal(p)) == pytest.approx(p, rel=1e-10)


@given(PROBABILITIES, st.floats(0.3, 400))
@SETTINGS
def test_t_quantile_agrees_with_scipy_stats(p: float, df: float) -> None:
    """Second route: scipy.stats, whole and broken degrees of freedom."""
    assert student_t(p, df) == pytest.approx(stats.t.ppf(p, df), rel=1e-6, abs=1e-9)


@given(PROBABILITIES)
@SETTINGS
def test_t_quantile_has_its_closed_forms(p: float) -> None:
    """One degree of freedom is the Cauchy distribution; two have a square root."""
    assert student_t(p, 1) == pytest.approx(math.tan(math.pi * (p - 0.5)), rel=1e-7, abs=1e-9)
    two = (2 * p - 1) * math.sqrt(2 / (4 * p * (1 - p)))
    assert student_t(p, 2) == pytest.approx(two, rel=1e-7, abs=1e-9)


def test_t_quantile_tends_to_the_normal_one() -> None:
    """With ever more degrees of freedom t falls towards the normal quantile."""
    widths = [two_sided_t(0.9, df) for df in (1, 2, 5, 20, 100, 1e6, math.inf)]
    assert widths == sorted(widths, reverse=True)
    assert widths[-1] == normal(0.95)
    assert widths[-2] == pytest.approx(widths[-1], rel=1e-5)


@given(PROBABILITIES, st.floats(0.5, 200))
@SETTINGS
def test_chi_squared_quantile_agrees_with_scipy_stats(p: float, df: float) -> None:
    """Second route: scipy.stats."""
    assert chi_squared(p, df) == pytest.approx(stats.chi2.ppf(p, df), rel=1e-7)


def test_chi_squared_quantile_has_its_closed_form() -> None:
    """Two degrees of freedom are an exponential distribution with mean 2."""
    assert chi_squared(0.3, 2) == pytest.approx(-2 * math.log(0.7), rel=1e-12)


@pytest.mark.parametrize(("p", "df", "shift"), [(0.95, 9, 5.2), (0.9, 4, 0.0), (0.2, 30, 2.0)])
def test_noncentral_t_quantile_agrees_with_scipy_stats(p: float, df: float, shift: float) -> None:
    """Second route: the distribution function of scipy.stats takes the quantile back."""
    assert stats.nct.cdf(noncentral_t(p, df, shift), df, shift) == pytest.approx(p, abs=1e-6)


@pytest.mark.parametrize("p", [0.0, 1.0, -0.1, 1.1, math.nan])
def test_a_probability_outside_zero_to_one_is_refused(p: float) -> None:
    """The refusal names variable and value."""
    for call in (
        normal,
        lambda q: student_t(q, 3),
        lambda q: chi_squared(q, 3),
        lambda q: noncentral_t(q, 3, 1),
    ):
        with pytest.raises(DomainError, match="p = "):
            call(p)


@pytest.mark.parametrize("df", [0.0, -1.0, math.nan])
def test_degrees_of_freedom_have_to_be_positive(df: float) -> None:
    """No quantile without degrees of freedom."""
    for call in (student_t, chi_squared, lambda p, d: noncentral_t(p, d, 1.0)):
        with pytest.raises(DomainError, match="df"):
            call(0.9, df)
