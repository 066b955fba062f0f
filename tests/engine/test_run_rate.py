"""One run: a rate, a limit or nothing; never a made-up zero."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from builder.engine import DomainError, fit_line, rate_of_line, run_rate

SETTINGS = settings(max_examples=100, deadline=None, derandomize=True)


def test_uncertainty_of_the_log_rate_agrees_with_monte_carlo() -> None:
    """JCGM 101: readings of 500 and 380 nm with 3 and 4 nm (seeded, 200,000 trials)."""
    rng = np.random.default_rng(104)
    before = 500 + 3 * rng.standard_normal(200_000)
    after = 380 + 4 * rng.standard_normal(200_000)
    logs = np.log((before - after) / 60)
    found = run_rate(500, 380, 60, 3, 4)
    assert found.log_rate == pytest.approx(logs.mean(), abs=1.5e-3)
    assert found.u_log == pytest.approx(logs.std(), rel=0.01)


def test_the_limit_is_exceeded_once_in_twenty() -> None:
    """A true loss equal to the limit would read lower than what was read in 5 % of runs (seeded)."""
    rng = np.random.default_rng(105)
    limit = run_rate(500, 498, 60, 3, 4).limit_nm_per_s
    assert limit is not None
    readings = limit * 60 + 5 * rng.standard_normal(400_000)
    assert (readings < 2).mean() == pytest.approx(0.05, abs=0.0015)


@given(
    st.floats(0, 1000), st.floats(0, 1000), st.floats(1, 1e4), st.none() | st.floats(0, 50), st.floats(0, 50)
)
@SETTINGS
def test_a_run_says_one_thing(
    before: float, after: float, time: float, u_before: float | None, u_after: float
) -> None:
    """Either a rate, or an upper limit, or nothing; a rate is positive and never clipped from a gain."""
    found = run_rate(before, after, time, u_before, u_after)
    assert found.log_rate is None or found.limit_nm_per_s is None
    if after >= before:
        assert found.log_rate is None
    if found.limit_nm_per_s is not None:
        assert found.limit_nm_per_s > 0
        assert found.limit_nm_per_s >= (before - after) / time
    if u_before is None:
        assert found.u_log is None
        assert found.limit_nm_per_s is None


@given(st.floats(1, 400), st.floats(0.1, 20), st.floats(0.001, 1000), st.floats(0.01, 100))
@SETTINGS
def test_units_do_not_matter(loss: float, u: float, length: float, time: float) -> None:
    """The same run in other units gives the same relative uncertainty and the scaled rate or limit."""
    one = run_rate(500, 500 - loss, 60, u, u)
    other = run_rate(500 * length, (500 - loss) * length, 60 * time, u * length, u * length)
    for mine, theirs in (
        (one.rate_nm_per_s, other.rate_nm_per_s),
        (one.limit_nm_per_s, other.limit_nm_per_s),
    ):
        assert (mine is None) == (theirs is None)
        if mine is not None and theirs is not None:
            assert theirs == pytest.approx(mine * length / time, rel=1e-9)


@given(st.floats(-50, 50), st.floats(0.1, 20), st.floats(1.01, 5))
@SETTINGS
def test_a_worse_gauge_never_lowers_what_the_rate_could_be(loss: float, u: float, factor: float) -> None:
    """The greatest rate the reading allows rises with the uncertainty of the reading."""
    fine, coarse = run_rate(500, 500 - loss, 60, u, 0), run_rate(500, 500 - loss, 60, u * factor, 0)
    ends = [
        run.limit_nm_per_s
        if run.log_rate is None
        else math.exp(run.log_rate) * (1 + 1.645 * (run.u_log or 0.0))
        for run in (fine, coarse)
    ]
    assert ends[0] is not None
    assert ends[1] is not None
    assert ends[1] >= ends[0] * (1 - 1e-12)


@pytest.mark.parametrize(
    ("before", "after", "time", "u", "induction"),
    [
        (-1, 0, 60, 1, 0),
        (500, -1, 60, 1, 0),
        (500, 400, 0, 1, 0),
        (500, 400, 10, 1, 10),
        (500, 400, 60, -1, 0),
        (math.nan, 400, 60, 1, 0),
        (500, 400, math.inf, 1, 0),
    ],
)
def test_impossible_runs_are_refused(
    before: float, after: float, time: float, u: float, induction: float
) -> None:
    """A negative thickness, no time, a negative uncertainty, a number that is none."""
    with pytest.raises(DomainError):
        run_rate(before, after, time, u, u, induction)


def test_a_depth_series_gives_its_slope() -> None:
    """The rate of a series is the slope of its line, not depth over time."""
    times = [60.0, 120.0, 180.0]
    series = rate_of_line(fit_line(times, [2 * (t - 30) for t in times], [2.0] * 3), 180)
    assert series.rate_nm_per_s == pytest.approx(2, rel=1e-12)
    # By hand: u of the slope = 2 / sqrt(2 x 60^2).
    assert series.u_log == pytest.approx(2 / math.sqrt(7200) / 2, rel=1e-12)


def test_a_depth_series_without_a_slope_gives_a_limit() -> None:
    """A slope below its decision limit is an upper limit, by hand (0 + 1.645 x 2 / sqrt(7200)) nm/s."""
    flat = rate_of_line(fit_line([60.0, 120.0, 180.0], [1.0, 1.0, 1.0], [2.0] * 3), 180)
    assert flat.log_rate is None
    assert flat.limit_nm_per_s == pytest.approx(1.645 * 2 / math.sqrt(7200), rel=1e-12)
    with pytest.raises(DomainError, match="longest_s"):
        rate_of_line(fit_line([60.0, 120.0, 180.0], [1.0, 1.0, 1.0], [2.0] * 3), 0)
