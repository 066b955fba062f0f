"""The interval of the next run: Monte Carlo, limits of the formula, and laws that hold for any runs."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from builder.engine import (
    DomainError,
    NextRun,
    NextRunKind,
    RunRate,
    Spread,
    plain_interval,
    predict_next_run,
    sample_variance,
)

LAB = Spread(0.06, 6, 20, from_prior=False)
KNOWN = Spread(0.06, math.inf, 0, from_prior=True)
RATES = st.lists(st.floats(-3, 3), min_size=1, max_size=12)
MEASURED = st.lists(
    st.builds(RunRate, st.floats(-3, 3), st.none() | st.floats(0, 0.3)), min_size=1, max_size=12
)
LIMITS = st.lists(st.floats(1e-4, 20).map(lambda v: RunRate(None, limit_nm_per_s=v)), max_size=4)
SPREADS = st.builds(
    lambda s0, d0: Spread(s0, d0, 20, from_prior=False), st.floats(0.01, 0.4), st.floats(0.5, 100)
)
SETTINGS = settings(max_examples=80, deadline=None, derandomize=True)


def _runs(logs: list[float], u: float | None = 0.0) -> list[RunRate]:
    return [RunRate(log, u) for log in logs]


def _width(found: NextRun) -> float:
    assert found.log_lo is not None
    return found.log_hi - found.log_lo


@pytest.mark.parametrize("n", [1, 2, 5, 12])
def test_interval_agrees_with_monte_carlo_for_known_prior(n: int) -> None:
    """
    JCGM 101: with the true s0 and d0 the interval holds exactly 90 % (seeded, 20,000 recipes).

    Three standard errors of a binomial share are 0.64 %.
    """
    rng = np.random.default_rng(400 + n)
    hits = 0
    for sigma in 0.06 * np.sqrt(6 / rng.chisquare(6, 20_000)):
        logs = sigma * rng.standard_normal(n + 1)
        found = predict_next_run(_runs(logs[:n].tolist()), LAB, 0.90)
        assert found.log_lo is not None
        hits += found.log_lo <= logs[n] <= found.log_hi
    assert hits / 20_000 == pytest.approx(0.90, abs=0.0065)


def test_each_end_fails_on_its_own_side_once_in_twenty() -> None:
    """A worst case is a one-sided 95 % end (seeded, 20,000 recipes; three standard errors are 0.46 %)."""
    rng = np.random.default_rng(410)
    above = below = 0
    for sigma in 0.06 * np.sqrt(6 / rng.chisquare(6, 20_000)):
        logs = sigma * rng.standard_normal(4)
        found = predict_next_run(_runs(logs[:3].tolist()), LAB, 0.90)
        assert found.log_lo is not None
        above += logs[3] > found.log_hi
        below += logs[3] < found.log_lo
    assert above / 20_000 == pytest.approx(0.05, abs=0.0047)
    assert below / 20_000 == pytest.approx(0.05, abs=0.0047)


def test_unequal_measurements_agree_with_monte_carlo() -> None:
    """Known spread, uncertainties of 1 to 8 %: the next observed rate falls inside 90 % (seeded, 20,000)."""
    rng = np.random.default_rng(411)
    u = np.array([0.01, 0.04, 0.08, 0.02, 0.05])
    total = Spread(math.sqrt(0.06**2 + float((u**2).mean())), math.inf, 0, from_prior=True)
    hits = 0
    for _ in range(20_000):
        seen = 0.06 * rng.standard_normal(5) + u * rng.standard_normal(5)
        later = 0.06 * rng.standard_normal() + rng.choice(u) * rng.standard_normal()
        runs = [RunRate(float(x), float(v)) for x, v in zip(seen, u, strict=True)]
        found = predict_next_run(runs, total, 0.90)
        assert found.log_lo is not None
        hits += found.log_lo <= later <= found.log_hi
    assert hits / 20_000 == pytest.approx(0.90, abs=0.0065)


def test_the_shared_gauge_error_is_never_averaged() -> None:
    """However many runs there are, the interval stays as wide as the gauge alone makes it."""
    many = predict_next_run(_runs([0.0, 1e-9] * 500), Spread(1e-6, 1e6, 0, from_prior=True), 0.90, 0.05)
    assert _width(many) / 2 == pytest.approx(1.645 * 0.05, rel=2e-3)


@given(st.lists(st.floats(-3, 3), min_size=2, max_size=12))
@SETTINGS
def test_without_a_lab_it_is_the_plain_t_interval(logs: list[float]) -> None:
    """As d0 goes to 0 nothing is borrowed: mean +- t s sqrt(1 + 1/n)."""
    assume((sample_variance(logs) or 0) > 1e-6)
    found = predict_next_run(_runs(logs), Spread(0.06, 1e-9, 0, from_prior=True), 0.90)
    plain = plain_interval(logs, 0.90)
    assert [found.log_lo, found.log_hi] == pytest.approx([plain.lo, plain.hi], rel=1e-5, abs=1e-6)


@given(RATES)
@SETTINGS
def test_with_a_known_spread_it_is_the_normal_interval(logs: list[float]) -> None:
    """As d0 goes to infinity the lab decides alone: mean +- 1.645 s0 sqrt(1 + 1/n)."""
    found = predict_next_run(_runs(logs), KNOWN, 0.90)
    half = 1.6448536 * 0.06 * math.sqrt(1 + 1 / len(logs))
    assert _width(found) / 2 == pytest.approx(half, rel=1e-6)
    assert found.share_lab == 1


@given(RATES, SPREADS, st.floats(0.5, 0.99))
@SETTINGS
def test_it_is_never_the_interval_of_a_mean(logs: list[float], lab: Spread, confidence: float) -> None:
    """The next run spreads by at least the moderated spread, however many runs there are."""
    found = predict_next_run(_runs(logs), lab, confidence)
    from_mean = _width(found) / math.sqrt(1 + len(logs))
    assert _width(found) > from_mean * math.sqrt(len(logs)) * (1 - 1e-9)


@given(MEASURED, LIMITS, SPREADS, st.floats(0.5, 0.98), st.floats(0.001, 0.019), st.floats(0, 0.2))
@SETTINGS
def test_more_confidence_never_narrows(
    measured: list[RunRate], limits: list[RunRate], lab: Spread, confidence: float, more: float, gauge: float
) -> None:
    """A higher confidence, or a worse gauge, gives ends that lie outside."""
    inner = predict_next_run([*measured, *limits], lab, confidence, gauge)
    for outer in (
        predict_next_run([*measured, *limits], lab, confidence + more, gauge),
        predict_next_run([*measured, *limits], lab, confidence, gauge + more),
    ):
        assert outer.log_hi >= inner.log_hi
        # A wider interval may reach below a limit that contradicted the narrower one.
        if outer.log_lo is not None and inner.log_lo is not None:
            assert outer.log_lo <= inner.log_lo


@given(MEASURED, SPREADS, st.floats(-5, 5))
@SETTINGS
def test_units_of_rate_do_not_matter(measured: list[RunRate], lab: Spread, shift: float) -> None:
    """Rates in another unit shift all three logarithms alike and nothing else."""
    one = predict_next_run(measured, lab, 0.90)
    moved = [RunRate(r.log_rate + shift, r.u_log) for r in measured if r.log_rate is not None]
    other = predict_next_run(moved, lab, 0.90)
    assert other.log_hi == pytest.approx(one.log_hi + shift, abs=1e-9)
    assert other.log_mid == pytest.approx((one.log_mid or 0) + shift, abs=1e-9)
    assert other.s_tilde == pytest.approx(one.s_tilde, rel=1e-9)


@given(MEASURED, LIMITS, SPREADS)
@SETTINGS
def test_order_of_runs_does_not_matter(measured: list[RunRate], limits: list[RunRate], lab: Spread) -> None:
    """The runs may be listed in any order."""
    one = predict_next_run([*measured, *limits], lab, 0.90)
    other = predict_next_run([*limits, *reversed(measured)], lab, 0.90)
    assert other.log_hi == pytest.approx(one.log_hi, abs=1e-9)
    assert (other.log_lo is None) == (one.log_lo is None)
    assert other.kind is one.kind


@given(MEASURED, LIMITS, st.floats(1e-4, 20), SPREADS)
@SETTINGS
def test_a_further_limit_never_lowers_the_high_end(
    measured: list[RunRate], limits: list[RunRate], further: float, lab: Spread
) -> None:
    """Beside measured runs "none seen" may widen the interval; it never makes a film look slower to lose."""
    before = predict_next_run([*measured, *limits], lab, 0.90)
    after = predict_next_run([*measured, *limits, RunRate(None, limit_nm_per_s=further)], lab, 0.90)
    assert after.log_hi >= before.log_hi
    assert after.log_hi >= math.log(further)
    if after.log_lo is not None:
        assert after.log_lo == before.log_lo


@given(st.lists(st.floats(1e-4, 20), min_size=1, max_size=5), SPREADS)
@SETTINGS
def test_only_limits_have_no_low_end_and_no_middle(limits: list[float], lab: Spread) -> None:
    """Unknown is None, never 0; the smallest limit is widened, so that one lucky run does not decide."""
    found = predict_next_run([RunRate(None, limit_nm_per_s=v) for v in limits], lab, 0.90)
    assert found.kind is NextRunKind.LIMITS
    assert found.log_lo is None
    assert found.log_mid is None
    assert found.log_hi > math.log(min(limits))


def test_a_run_that_says_nothing_takes_the_low_end_away() -> None:
    """
    A run without any visible loss and without a limit contradicts a low end; it is counted, not dropped.
    """
    found = predict_next_run([*_runs([0.0, 0.05]), RunRate(None)], LAB, 0.90)
    assert found.log_lo is None
    assert found.n_unknown == 1
    assert found.kind is NextRunKind.MIXED


def test_unknown_measurement_is_not_zero_measurement() -> None:
    """A run of unknown uncertainty counts as an average one, not as an exact one."""
    exact = predict_next_run([RunRate(0.0, 0.05), RunRate(0.3, 0.0)], KNOWN, 0.90)
    unknown = predict_next_run([RunRate(0.0, 0.05), RunRate(0.3, None)], KNOWN, 0.90)
    assert unknown.log_mid == pytest.approx(0.15, abs=1e-9)
    assert (exact.log_mid or 0) > 0.15
    assert predict_next_run(_runs([0.0, 0.3], None), LAB, 0.90).mean_u2 is None


def test_two_exact_equal_runs_keep_the_spread_of_the_lab() -> None:
    """Two runs that agree to the last digit are luck, not a perfect tool."""
    found = predict_next_run(_runs([0.1, 0.1]), LAB, 0.90)
    assert _width(found) > 0.8 * _width(predict_next_run(_runs([0.07, 0.13]), LAB, 0.90))


def test_rates_are_the_exponentials_and_unknown_stays_unknown() -> None:
    """In nm/s: no low end reads as 0, since a rate is never negative; no middle stays None."""
    both = predict_next_run(_runs([0.0, 0.2]), LAB, 0.90)
    assert both.mid_nm_per_s == pytest.approx(math.exp(0.1), rel=1e-12)
    assert both.log_lo is not None
    assert [both.lo_nm_per_s, both.hi_nm_per_s] == pytest.approx(
        [math.exp(both.log_lo), math.exp(both.log_hi)]
    )
    limit = predict_next_run([RunRate(None, limit_nm_per_s=0.01)], LAB, 0.90)
    assert limit.lo_nm_per_s == 0
    assert limit.mid_nm_per_s is None


def test_impossible_questions_are_refused() -> None:
    """No run at all, a confidence outside 0 to 1, numbers that are none."""
    for runs, confidence, gauge in (
        ([], 0.9, 0.0),
        ([RunRate(None)], 0.9, 0.0),
        (_runs([0.0]), 0.0, 0.0),
        (_runs([0.0]), 1.0, 0.0),
        (_runs([0.0]), 0.9, -0.1),
        (_runs([math.nan]), 0.9, 0.0),
        (_runs([0.0], -0.1), 0.9, 0.0),
        ([RunRate(None, limit_nm_per_s=0.0)], 0.9, 0.0),
    ):
        with pytest.raises(DomainError):
            predict_next_run(runs, LAB, confidence, gauge)
