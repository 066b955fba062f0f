"""
The promise of the planning interval, measured: 90 % of next runs fall inside, for every number of runs.

Simulated labs of known truth, seeded; `python -m bench.coverage --full` prints the whole table.
The bins are judged by the mean chance of the next run to fall inside. Its standard uncertainty is asserted to
be small against the width of the band, so that an estimator two points off fails; two such are shown to fail.
"""

from __future__ import annotations

import math
from collections.abc import Sequence

import numpy as np
import pytest
from scipy import stats

from bench.coverage import FACTOR, HALF_WIDTH_AT_TWO, LARGE_BAND, SMALL_BAND
from bench.lab_simulation import MOST_RUNS, Scenario, Tally, simulate
from builder.engine import RunRate, Spread, SpreadPrior, sample_variance
from builder.engine.trigamma import degrees_for, log_bias_of, log_variance_of

RUN_COUNTS = range(1, MOST_RUNS + 1)
MOST_U = 0.004
"""Largest standard uncertainty of a bin: a fifth of the distance from 90 % to either end of the band."""

# Where the prior misleads most: too narrow a prior for unlike recipes, too wide a one for alike recipes.
LOW_CORNER = Scenario("low", 20, 4.0, 1 / FACTOR)
HIGH_CORNER = Scenario("high", 20, 10.0, FACTOR)


def outside(tally: Tally, band: tuple[float, float]) -> list[int]:
    """The run counts whose share of next runs leaves the band."""
    return [k for k in RUN_COUNTS if tally.tried[k] and not band[0] <= tally.mean_chance(k) <= band[1]]


@pytest.fixture(scope="module")
def low_corner() -> Tally:
    """1,800 labs of 20 recipes in the low corner."""
    return simulate(LOW_CORNER, 1_800, np.random.default_rng(11))


def test_large_labs_hold_88_to_92_percent_with_a_narrow_prior(low_corner: Tally) -> None:
    """20 recipes, prior s0 a third too low: every bin of 1 to 12 runs keeps the band."""
    assert max(low_corner.u_mean_chance(k) for k in RUN_COUNTS) < MOST_U
    assert outside(low_corner, LARGE_BAND) == []


def test_large_labs_hold_88_to_92_percent_with_a_wide_prior() -> None:
    """20 recipes, prior s0 half too high."""
    tally = simulate(HIGH_CORNER, 1_200, np.random.default_rng(12))
    assert max(tally.u_mean_chance(k) for k in RUN_COUNTS) < MOST_U
    assert outside(tally, LARGE_BAND) == []


def test_counted_hits_agree_with_the_chances(low_corner: Tally) -> None:
    """Second route: next runs drawn and counted; each bin within four binomial standard errors."""
    for k in RUN_COUNTS:
        p = low_corner.mean_chance(k)
        assert low_corner.coverage(k) == pytest.approx(
            p, abs=4 * math.sqrt(p * (1 - p) / low_corner.tried[k])
        )


@pytest.mark.parametrize("recipes", [6, 9, 14])
@pytest.mark.parametrize(("d0", "ratio"), [(4.0, 1 / FACTOR), (10.0, FACTOR)])
def test_small_labs_hold_85_to_95_percent(recipes: int, d0: float, ratio: float) -> None:
    """Labs of 4 to 19 recipes, prior within a factor of 1.5: every bin keeps the wider band."""
    tally = simulate(Scenario("small", recipes, d0, ratio), 2_400 // recipes, np.random.default_rng(13))
    assert max(tally.u_mean_chance(k) for k in RUN_COUNTS) < (SMALL_BAND[1] - SMALL_BAND[0]) / 6
    assert outside(tally, SMALL_BAND) == []


def test_two_runs_need_at_most_half_the_width_of_the_plain_interval(low_corner: Tally) -> None:
    """What borrowing gains at two runs; and it never costs width at any number of runs."""
    assert low_corner.relative_width(2) <= HALF_WIDTH_AT_TWO
    assert low_corner.relative_mean_width(2) <= HALF_WIDTH_AT_TWO
    assert all(low_corner.relative_mean_width(k) <= 1 for k in range(2, MOST_RUNS + 1))


def _plug_in(
    variances: Sequence[float], dfs: Sequence[float], prior: SpreadPrior
) -> tuple[Sequence[Spread], Spread]:
    """Smyth's moments taken as exact, the prior as four further recipes that show it without scatter."""
    s2 = [*variances, *[prior.s0**2] * 4]
    df = [*dfs, *[prior.d0] * 4]
    e = np.array([math.log(v) - log_bias_of(d) for v, d in zip(s2, df, strict=True)])
    excess = float(e.var(ddof=1)) - float(np.mean([log_variance_of(d) for d in df]))
    d0 = degrees_for(max(excess, 1e-6))
    found = Spread(math.exp((float(e.mean()) + log_bias_of(d0)) / 2), d0, len(variances), from_prior=False)
    return [found] * len(variances), found


def test_a_plug_in_of_the_spread_fails_the_same_test() -> None:
    """Taking s0 and d0 as known falls short where the prior is too narrow: the test above can fail."""
    tally = simulate(LOW_CORNER, 1_800, np.random.default_rng(11), fit=_plug_in)
    failed = outside(tally, LARGE_BAND)
    assert len(failed) >= 3
    assert min(tally.mean_chance(k) + 2 * tally.u_mean_chance(k) for k in failed) < LARGE_BAND[0]


def _interval_of_the_mean(runs: Sequence[RunRate], spread: Spread) -> tuple[float, float]:
    """The t interval of the mean of the logarithms; with one run, the spread of the lab."""
    logs = [run.log_rate for run in runs if run.log_rate is not None]
    s2 = sample_variance(logs)
    df = len(logs) - 1 if s2 is not None else spread.d0
    half = float(stats.t.ppf(0.95, df)) * math.sqrt((s2 if s2 is not None else spread.s0**2) / len(logs))
    middle = math.fsum(logs) / len(logs)
    return middle - half, middle + half


def test_the_interval_of_a_mean_fails_the_same_test() -> None:
    """Read as a forecast it misses most next runs, the more the more runs there are."""
    tally = simulate(LOW_CORNER, 100, np.random.default_rng(11), interval=_interval_of_the_mean)
    assert set(range(3, MOST_RUNS + 1)) <= set(outside(tally, LARGE_BAND))
    assert tally.mean_chance(12) < 0.5
