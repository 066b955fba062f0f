"""Losses too small to see: by simulation, by direct likelihood, and what must never be lost on the way."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import optimize, stats

from builder.engine import DomainError, currie, feldman_cousins_upper, left_censored_normal, run_limit

SETTINGS = settings(max_examples=80, deadline=None, derandomize=True)


def test_currie_risks_are_five_percent_each() -> None:
    """
    Simulation (seeded, 400,000): no loss is called one, and a loss at the detection limit missed, in 5 %.
    """
    rng = np.random.default_rng(600)
    limits = currie(1.0, paired=True)
    noise = rng.standard_normal(400_000) - rng.standard_normal(400_000)
    assert (noise > limits.decision).mean() == pytest.approx(0.05, abs=0.0011)
    assert (noise + limits.detection <= limits.decision).mean() == pytest.approx(0.05, abs=0.0011)


@pytest.mark.parametrize("true_value", [0.5, 1.5, 3.0])
def test_feldman_cousins_limits_hold_the_truth(true_value: float) -> None:
    """
    Feldman & Cousins 1998: by construction at least as often as stated (seeded, 3,000 readings).

    Only the upper limits are ours: a truth above them is missed in no more than 10 %, plus 1.7 % of three
    standard errors.
    """
    rng = np.random.default_rng(601)
    missed = [true_value > feldman_cousins_upper(r, 0.90) for r in true_value + rng.standard_normal(3_000)]
    assert np.mean(missed) <= 0.117


@given(st.floats(-6, 10), st.floats(0.5, 0.95), st.floats(0.001, 0.04), st.floats(0.001, 2))
@SETTINGS
def test_feldman_cousins_limit_is_positive_and_monotone(
    reading: float, confidence: float, more: float, step: float
) -> None:
    """Positive even far below zero; it rises with the reading and with the confidence."""
    upper = feldman_cousins_upper(reading, confidence)
    assert upper > 0
    assert feldman_cousins_upper(reading + step, confidence) >= upper * (1 - 1e-9)
    assert feldman_cousins_upper(reading, confidence + more) >= upper * (1 - 1e-9)


def test_feldman_cousins_tends_to_the_central_limit() -> None:
    """Far above zero the upper limit is the reading plus the two-sided normal quantile."""
    assert feldman_cousins_upper(8.0, 0.90) == pytest.approx(8 + stats.norm.ppf(0.95), abs=1e-6)


@pytest.mark.parametrize(("n_below", "seed"), [(1, 1), (4, 2), (9, 3)])
def test_censored_fit_agrees_with_a_direct_maximum(n_below: int, seed: int) -> None:
    """Second route: the Tobit likelihood written out and maximised by scipy."""
    observed = 2 + np.abs(np.random.default_rng(seed).standard_normal(6))

    def minus_log_likelihood(at: np.ndarray) -> float:
        mean, sd = at[0], np.exp(at[1])
        return -(stats.norm.logpdf(observed, mean, sd).sum() + n_below * stats.norm.logcdf(2, mean, sd))

    best = optimize.minimize(minus_log_likelihood, [2, 0], method="Nelder-Mead",
                             options={"xatol": 1e-9, "fatol": 1e-12, "maxiter": 5_000})  # fmt: skip
    found = left_censored_normal(observed.tolist(), n_below, 2.0)
    assert found.mean == pytest.approx(best.x[0], abs=1e-5)
    assert found.sd == pytest.approx(np.exp(best.x[1]), rel=1e-5)


def test_without_unseen_values_it_is_the_plain_fit() -> None:
    """By hand: mean and maximum-likelihood deviation of 1, 2, 3, 6 are 3 and sqrt(14 / 4)."""
    found = left_censored_normal([1.0, 2.0, 3.0, 6.0], 0, 0.5)
    assert (found.mean, found.sd) == pytest.approx((3, 3.5**0.5), rel=1e-9)


@given(st.integers(0, 12))
@SETTINGS
def test_more_unseen_values_lower_the_mean(n_below: int) -> None:
    """Every further value below the limit pulls the mean down."""
    observed = [2.5, 3.1, 2.2, 4.0]
    fewer, more = (left_censored_normal(observed, n, 2.0).mean for n in (n_below, n_below + 1))
    assert more < fewer


@given(st.floats(-100, 100), st.floats(0.01, 50), st.floats(1, 1e5))
@SETTINGS
def test_a_limit_is_never_zero(loss: float, u: float, time: float) -> None:
    """
    A gain is no evidence of growth: the limit stays at 1.645 u over the time, and longer tests lower it.
    """
    limit = run_limit(loss, u, time)
    assert limit >= 1.645 * u / time * (1 - 1e-12)
    assert limit >= loss / time
    assert run_limit(loss, u, 2 * time) == pytest.approx(limit / 2, rel=1e-12)
    assert run_limit(loss, 2 * u, time) > limit


def test_impossible_limits_are_refused() -> None:
    """An uncertainty or time of 0, a confidence of 1, too few values."""
    for call in (
        lambda: run_limit(0, 0, 60),
        lambda: run_limit(0, 1, 0),
        lambda: currie(0),
        lambda: feldman_cousins_upper(0, 1),
        lambda: feldman_cousins_upper(float("nan"), 0.9),
        lambda: left_censored_normal([1.0, 1.0], 1, 0.5),
        lambda: left_censored_normal([1.0, 2.0], -1, 0.5),
    ):
        with pytest.raises(DomainError):
            call()
