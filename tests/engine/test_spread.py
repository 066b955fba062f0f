"""
The spread learned over a lab: Smyth's estimator by another route, its limits, and what it must never do.
"""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import optimize, special, stats

from builder.engine import DomainError, Spread, SpreadPrior, fit_spread, leave_one_out, moderated
from builder.engine.trigamma import degrees_for, log_bias_of, log_variance_of

PRIOR = SpreadPrior(0.06, 4)
LABS = st.integers(4, 25).flatmap(
    lambda n: st.tuples(
        st.lists(st.floats(1e-6, 0.1), min_size=n, max_size=n),
        st.lists(st.integers(1, 11), min_size=n, max_size=n),
    )
)
SETTINGS = settings(max_examples=60, deadline=None, derandomize=True)


@pytest.mark.parametrize("df", [0.5, 1, 3, 10, 200])
def test_moments_of_the_log_variance_agree_with_scipy_stats(df: float) -> None:
    """Second route: mean and variance of the logarithm of a chi-squared variable by quadrature."""
    chi = stats.loggamma(df / 2)
    assert log_variance_of(df) == pytest.approx(chi.var(), rel=1e-6)
    assert log_bias_of(df) == pytest.approx(chi.mean() - math.log(df / 2), rel=1e-6)


@given(st.floats(1e-9, 1e9))
@SETTINGS
def test_degrees_go_back_through_the_log_variance(log_variance: float) -> None:
    """The inverse is an inverse over eighteen decades, where the leading terms take over included."""
    assert log_variance_of(degrees_for(log_variance)) == pytest.approx(log_variance, rel=1e-5)


def test_infinitely_many_degrees_have_no_scatter() -> None:
    """The limits: no variance, no bias, and back."""
    assert log_variance_of(math.inf) == 0
    assert log_bias_of(math.inf) == 0
    assert degrees_for(0) == math.inf


def _smyth_by_root_finding(variances: list[float], df: float) -> tuple[float, float]:
    """s0 and d0 of Smyth 2004 (from memory) for equal df, the excess found by a root finder of scipy."""
    n = len(variances)
    e = np.log(variances) - special.psi(df / 2) + math.log(df / 2)
    excess = e.var(ddof=1) - special.polygamma(1, df / 2) + 2 / n
    d0 = optimize.brentq(lambda d: special.polygamma(1, d / 2) - excess, 1e-3, 1e6)
    return math.exp((e.mean() + special.psi(d0 / 2) - math.log(d0 / 2)) / 2), d0


def test_equal_labs_give_smyths_estimate() -> None:
    """
    Smyth 2004 (from memory) by a root finder, for recipes of equal df and no prior weight.

    The term 2 / n is the engine's own addition for the uncertainty of s0 and d0 (docs/methods/next-run.md).
    """
    rng = np.random.default_rng(2004)
    sigma2 = 0.0036 * 6 / rng.chisquare(6, 30)
    variances = (sigma2 * rng.chisquare(4, 30) / 4).tolist()
    s0, d0 = _smyth_by_root_finding(variances, 4)
    found = fit_spread(variances, [4] * 30, PRIOR, pseudo_recipes=0)
    assert found.s0 == pytest.approx(s0, rel=1e-9)
    assert found.d0 == pytest.approx(d0, rel=1e-9)


@pytest.mark.parametrize(("s0", "d0"), [(0.06, 4.0), (0.02, 10.0), (0.3, 6.0)])
def test_a_very_large_lab_finds_the_truth(s0: float, d0: float) -> None:
    """With 20,000 recipes of 2 to 12 runs the prior and the correction vanish (seeded)."""
    rng = np.random.default_rng(7)
    df = rng.integers(1, 12, 20_000)
    variances = s0**2 * d0 / rng.chisquare(d0, 20_000) * rng.chisquare(df) / df
    found = fit_spread(variances.tolist(), df.tolist(), PRIOR)
    assert found.s0 == pytest.approx(s0, rel=0.02)
    assert found.d0 == pytest.approx(d0, rel=0.08)


def test_taking_the_fit_as_exact_would_claim_more_degrees() -> None:
    """The uncertainty of s0 and d0 lowers d0: always below the plug-in, and less so in a larger lab."""
    rng = np.random.default_rng(8)
    ratios = []
    for n in (20, 200):
        variances = (0.0036 * 6 / rng.chisquare(6, n) * rng.chisquare(4, n) / 4).tolist()
        s0, d0 = _smyth_by_root_finding(variances, 4)
        plug_in = degrees_for(log_variance_of(d0) - 2 / n)
        found = fit_spread(variances, [4] * n, PRIOR, pseudo_recipes=0)
        assert found.d0 < plug_in
        assert found.s0 < s0 * 1.05
        ratios.append(found.d0 / plug_in)
    assert ratios[0] < ratios[1] < 1


@pytest.mark.parametrize("count", [0, 1, 2, 3])
def test_with_few_recipes_the_prior_stands_alone(count: int) -> None:
    """Below four recipes of two or more runs nothing is fitted."""
    found = fit_spread([0.5] * count, [3] * count, PRIOR)
    assert (found.s0, found.d0, found.from_prior, found.recipes) == (0.06, 4, True, count)


def test_the_prior_weighs_less_in_a_larger_lab() -> None:
    """
    Recipes that all spread by 12 % pull a prior of 6 % towards themselves, the more the more they are.

    By hand: the mean of ln(s^2) lies 1 - gamma - ln 2 below ln(sigma^2) for 4 df, so the limit is 0.12
    exp(0.1352).
    """
    pulled = [fit_spread([0.0144] * n, [4] * n, PRIOR).s0 for n in (4, 8, 16, 64, 512)]
    assert pulled == sorted(pulled)
    assert 0.06 < pulled[0] < 0.12
    assert pulled[-1] == pytest.approx(0.12 * math.exp(0.1352), rel=0.01)


@given(LABS, st.floats(0.01, 100))
@SETTINGS
def test_scaling_all_spreads_scales_s0_and_keeps_d0(
    lab: tuple[list[float], list[int]], factor: float
) -> None:
    """A lab twice as unsteady, with a prior twice as wide, has twice the s0 and the same d0."""
    one = fit_spread(lab[0], lab[1], PRIOR)
    other = fit_spread([s2 * factor**2 for s2 in lab[0]], lab[1], SpreadPrior(0.06 * factor, 4))
    assert other.s0 == pytest.approx(one.s0 * factor, rel=1e-8)
    assert other.d0 == pytest.approx(one.d0, rel=1e-6)


@given(LABS, st.randoms(use_true_random=False))
@SETTINGS
def test_order_of_recipes_does_not_matter(lab: tuple[list[float], list[int]], random: object) -> None:
    """The recipes may be listed in any order."""
    order = list(range(len(lab[0])))
    random.shuffle(order)  # type: ignore[attr-defined]
    one, other = (
        fit_spread(*lab, PRIOR),
        fit_spread([lab[0][i] for i in order], [lab[1][i] for i in order], PRIOR),
    )
    assert other.s0 == pytest.approx(one.s0, rel=1e-9)
    assert other.d0 == pytest.approx(one.d0, rel=1e-6)


def test_equal_readings_do_not_take_over() -> None:
    """A recipe of two equal readings has variance 0; it must not pull the spread to 0."""
    others = [0.0036, 0.004, 0.003, 0.005, 0.0025]
    with_zero = fit_spread([0.0, *others], [1] + [5] * 5, PRIOR)
    assert with_zero.s0 > 0.8 * fit_spread(others, [5] * 5, PRIOR).s0


def test_small_labs_leave_a_recipe_out_of_its_own_spread() -> None:
    """Below ten recipes each is moderated by the others; a wild one then widens all but itself."""
    variances, dfs = [0.09, 0.0036, 0.0036, 0.0036, 0.0036], [4] * 5
    each = leave_one_out(variances, dfs, PRIOR)
    assert each[0].s0 == fit_spread(variances[1:], dfs[1:], PRIOR).s0
    assert all(other.s0 > each[0].s0 for other in each[1:])
    large = leave_one_out([0.0036] * 10, [4] * 10, PRIOR)
    assert set(large) == {fit_spread([0.0036] * 10, [4] * 10, PRIOR)}


def test_moderation_by_hand() -> None:
    """By hand: (4 x 0.0036 + 2 x 0.009) / 6 = 0.0054 with 6 degrees of freedom."""
    lab = Spread(0.06, 4, 20, from_prior=False)
    assert moderated(0.009, 2, lab) == pytest.approx((0.0054, 6))
    assert moderated(None, 0, lab) == pytest.approx((0.0036, 4))
    assert moderated(0.009, 2, Spread(0.06, math.inf, 0, from_prior=True)) == pytest.approx(
        (0.0036, math.inf)
    )


@given(st.floats(0, 0.1), st.integers(1, 40), st.floats(0.01, 0.3), st.floats(0.1, 200))
@SETTINGS
def test_a_moderated_variance_lies_between_its_two_sources(s2: float, df: int, s0: float, d0: float) -> None:
    """It is never outside the recipe's own and the lab's, and never loses degrees of freedom."""
    value, total = moderated(s2, df, Spread(s0, d0, 20, from_prior=False))
    assert min(s2, s0**2) * (1 - 1e-9) <= value <= max(s2, s0**2) * (1 + 1e-9)
    assert total > df


def test_impossible_spreads_are_refused() -> None:
    """Zero, negative or missing spreads, degrees and variances."""
    for call in (
        lambda: SpreadPrior(0, 4),
        lambda: SpreadPrior(0.06, 0),
        lambda: Spread(math.nan, 4, 1, from_prior=True),
        lambda: fit_spread([0.1], [1, 2], PRIOR),
        lambda: fit_spread([-0.1] * 4, [1] * 4, PRIOR),
        lambda: fit_spread([0.1] * 4, [0] * 4, PRIOR),
        lambda: fit_spread([0.1] * 4, [1] * 4, PRIOR, pseudo_recipes=-1),
        lambda: moderated(0.1, -1, Spread(0.06, 4, 1, from_prior=True)),
        lambda: moderated(None, 2, Spread(0.06, 4, 1, from_prior=True)),
        lambda: degrees_for(-1),
        lambda: log_variance_of(0),
        lambda: log_bias_of(-1),
    ):
        with pytest.raises(DomainError):
            call()
