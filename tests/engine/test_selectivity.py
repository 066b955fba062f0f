"""Ratios of two films, and contradictions between two intervals."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from builder.engine import (
    DomainError,
    RunRate,
    Spread,
    fieller_ratio,
    intervals_conflict,
    normal,
    paired_selectivity,
    predict_next_run,
)

LAB = Spread(0.06, 6, 20, from_prior=False)
SETTINGS = settings(max_examples=80, deadline=None, derandomize=True)
END = st.none() | st.floats(-5, 5)


def test_fieller_limits_agree_with_monte_carlo() -> None:
    """
    JCGM 101 (seeded, 400,000 trials): correlated estimates, denominator known to 12 %.

    Fieller's set is the set of ratios S for which a - S b is compatible with 0: each limit is met in 2.5 %.
    """
    rng = np.random.default_rng(700)
    covariance = [[4.0, 1.0], [1.0, 1.44]]
    found = fieller_ratio(200.0, 10.0, 4.0, 1.44, 1.0, normal(0.975))
    assert found.lo is not None
    assert found.hi is not None
    at_low = rng.multivariate_normal([found.lo * 10, 10], covariance, 400_000)
    assert ((at_low[:, 0] - found.lo * at_low[:, 1]) >= 200 - found.lo * 10).mean() == pytest.approx(
        0.025, abs=0.001
    )
    at_high = rng.multivariate_normal([found.hi * 10, 10], covariance, 400_000)
    assert ((at_high[:, 0] - found.hi * at_high[:, 1]) <= 200 - found.hi * 10).mean() == pytest.approx(
        0.025, abs=0.001
    )


@given(st.floats(1, 1000), st.floats(1, 100), st.floats(0.001, 2), st.floats(0.001, 2), st.floats(0.5, 3))
@SETTINGS
def test_fieller_limits_enclose_the_ratio(
    a: float, b: float, u_a: float, u_b: float, quantile: float
) -> None:
    """Bounded limits lie about the ratio; unbounded exactly when the denominator may be 0 (g >= 1)."""
    found = fieller_ratio(a, b, u_a**2, u_b**2, 0.0, quantile)
    assert found.bounded == (found.g < 1)
    if found.lo is not None:
        assert found.lo <= found.ratio * (1 + 1e-9)
    if found.hi is not None:
        assert found.hi >= found.ratio * (1 - 1e-9)


@given(st.floats(0.001, 1000), st.floats(0.5, 3))
@SETTINGS
def test_units_of_a_ratio_cancel(unit: float, quantile: float) -> None:
    """Both films in another unit leave the selectivity as it is."""
    one = fieller_ratio(200, 20, 16, 4, 2, quantile)
    other = fieller_ratio(200 * unit, 20 * unit, 16 * unit**2, 4 * unit**2, 2 * unit**2, quantile)
    assert [other.lo, other.hi] == pytest.approx([one.lo, one.hi], rel=1e-9)


def test_pairing_takes_out_what_the_films_share() -> None:
    """A chamber that runs fast or slow moves both films: the paired ratio does not notice."""
    steady = [RunRate(2.0, 0.0), RunRate(2.0, 0.0), RunRate(2.0, 0.0)]
    shared = [0.3, -0.2, 0.1]
    moved = [RunRate(2.0 + s, 0.0) for s in shared]
    mask = [RunRate(-1.0, 0.0)] * 3
    moved_mask = [RunRate(-1.0 + s, 0.0) for s in shared]
    one, other = (
        paired_selectivity(steady, mask, LAB, 0.90),
        paired_selectivity(moved, moved_mask, LAB, 0.90),
    )
    assert [other.lo, other.mid, other.hi] == pytest.approx([one.lo, one.mid, one.hi], rel=1e-9)
    assert one.mid == pytest.approx(math.exp(3), rel=1e-12)


def test_selectivity_is_the_inverse_ratio_turned_over() -> None:
    """The low end of the selectivity is the high end of mask over target."""
    target, mask = [RunRate(2.0, 0.03), RunRate(2.1, 0.03)], [RunRate(0.0, 0.05), RunRate(0.2, 0.05)]
    u = math.hypot(0.03, 0.05)
    ratio = predict_next_run([RunRate(-2.0, u), RunRate(-1.9, u)], LAB, 0.90)
    found = paired_selectivity(target, mask, LAB, 0.90)
    assert ratio.log_lo is not None
    assert [found.lo, found.hi] == pytest.approx(
        [math.exp(-ratio.log_hi), math.exp(-ratio.log_lo)], rel=1e-12
    )


def test_a_mask_without_loss_gives_only_a_lower_bound() -> None:
    """Nothing seen is a lower bound of the selectivity, neither a number nor infinity."""
    found = paired_selectivity([RunRate(2.0, 0.0)], [RunRate(None, limit_nm_per_s=0.01)], LAB, 0.90)
    assert found.mid is None
    assert found.hi is None
    assert 0 < found.lo < math.exp(2) / 0.01


@given(st.lists(st.tuples(st.floats(-2, 3), st.floats(-5, 1)), min_size=1, max_size=8))
@SETTINGS
def test_a_pair_without_a_target_rate_says_nothing(pairs: list[tuple[float, float]]) -> None:
    """Such a pair is left out and changes nothing."""
    target, other = [RunRate(t, 0.0) for t, _ in pairs], [RunRate(o, 0.0) for _, o in pairs]
    one = paired_selectivity(target, other, LAB, 0.90)
    two = paired_selectivity([RunRate(None), *target], [RunRate(9.0, 0.0), *other], LAB, 0.90)
    assert one == two


def test_impossible_ratios_are_refused() -> None:
    """A denominator of 0, impossible variances, unequal lengths, nothing to pair."""
    for call in (
        lambda: fieller_ratio(1, 0, 1, 1, 0, 1.96),
        lambda: fieller_ratio(1, 1, -1, 1, 0, 1.96),
        lambda: fieller_ratio(1, 1, 1, 1, 2, 1.96),
        lambda: fieller_ratio(1, 1, 1, 1, 0, 0),
        lambda: paired_selectivity([RunRate(1.0)], [], LAB, 0.9),
        lambda: paired_selectivity([RunRate(None)], [RunRate(1.0)], LAB, 0.9),
    ):
        with pytest.raises(DomainError):
            call()


def test_a_numerator_that_may_be_zero_has_not_even_a_lower_limit() -> None:
    """With both estimates near 0 nothing at all is known of the ratio."""
    found = fieller_ratio(1.0, 1.0, 4.0, 4.0, 0.0, 1.96)
    assert found.lo is None
    assert found.hi is None


@given(END, END, END, END)
@SETTINGS
def test_conflict_means_no_common_point(
    a: float | None, b: float | None, c: float | None, d: float | None
) -> None:
    """Symmetric; never from an unknown end; exactly when no number lies in both intervals."""
    own = (a, b) if a is None or b is None or a <= b else (b, a)
    published = (c, d) if c is None or d is None or c <= d else (d, c)
    conflict = intervals_conflict(own, published)
    assert conflict == intervals_conflict(published, own)
    low = max((end for end in (own[0], published[0]) if end is not None), default=-math.inf)
    high = min((end for end in (own[1], published[1]) if end is not None), default=math.inf)
    assert conflict == (low > high)


def test_touching_intervals_agree() -> None:
    """A shared end is a common point."""
    assert not intervals_conflict((0.0, 1.0), (1.0, 2.0))
    assert intervals_conflict((0.0, 1.0), (1.0001, 2.0))
    assert not intervals_conflict((None, None), (1.0, 2.0))
