"""Invented labs whose true spreads are known, to count how often the next run falls in its interval."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, field
from enum import StrEnum

import numpy as np

from builder.engine.next_run import predict_next_run
from builder.engine.pooling import plain_interval
from builder.engine.run_rate import RunRate
from builder.engine.series import predict_in_series
from builder.engine.spread import Spread, SpreadPrior, fit_spread, leave_one_out

TRUE_S0 = 0.06
PRIOR_D0 = 4.0
MOST_RUNS = 12
CONFIDENCE = 0.90


class Errors(StrEnum):
    """Shape of the run-to-run errors."""

    NORMAL = "normal"
    HEAVY = "t with 3 degrees of freedom"


class Spreads(StrEnum):
    """How the true spread varies from recipe to recipe."""

    CHI = "scaled inverse chi-squared"
    BIMODAL = "half the recipes at s0/2, half at 2 s0"


class Counts(StrEnum):
    """How many runs the recipes have."""

    EVEN = "2 to 12, all alike"
    FEW = "mostly 2 to 4"


@dataclass(frozen=True)
class Scenario:
    """
    One kind of lab: `recipes` with two or more runs, and a few more with one run each.

    `prior_ratio`: prior s0 over the true one. `drift`: change of ln(rate) a run, in s0.
    `u_range`: relative measurement uncertainties are drawn evenly between these, in s0.
    """

    name: str
    recipes: int = 20
    d0: float = 6.0
    prior_ratio: float = 1.0
    counts: Counts = Counts.EVEN
    errors: Errors = Errors.NORMAL
    spreads: Spreads = Spreads.CHI
    drift: float = 0.0
    u_range: tuple[float, float] | None = None
    series: bool = False


@dataclass
class Tally:
    """Next runs and hits by run count, and interval widths, moderated and plain."""

    tried: dict[int, int] = field(default_factory=lambda: dict.fromkeys(range(1, MOST_RUNS + 1), 0))
    hits: dict[int, int] = field(default_factory=lambda: dict.fromkeys(range(1, MOST_RUNS + 1), 0))
    widths: dict[int, list[float]] = field(default_factory=lambda: {k: [] for k in range(1, MOST_RUNS + 1)})
    plain_widths: dict[int, list[float]] = field(
        default_factory=lambda: {k: [] for k in range(2, MOST_RUNS + 1)}
    )

    def coverage(self, runs: int) -> float:
        """Share of next runs inside the interval, 0 to 1."""
        return self.hits[runs] / self.tried[runs]

    def relative_width(self, runs: int) -> float:
        """Median width over the median width of the plain t interval."""
        return float(np.median(self.widths[runs]) / np.median(self.plain_widths[runs]))

    def relative_mean_width(self, runs: int) -> float:
        """Mean width over the mean width of the plain t interval."""
        return float(np.mean(self.widths[runs]) / np.mean(self.plain_widths[runs]))


def simulate(scenario: Scenario, labs: int, rng: np.random.Generator, draws: int = 1) -> Tally:
    """Simulate `labs` labs; `draws` next runs are drawn for each interval."""
    tally = Tally()
    for _ in range(labs):
        _one_lab(scenario, rng, draws, tally)
    return tally


def _one_lab(scenario: Scenario, rng: np.random.Generator, draws: int, tally: Tally) -> None:
    counts = _run_counts(scenario, rng)
    sigmas = _true_spreads(scenario, rng, len(counts))
    recipes = [_runs(scenario, rng, sigma, count) for sigma, count in zip(sigmas, counts, strict=True)]
    for runs, sigma, spread in zip(recipes, sigmas, spreads_for(scenario, recipes), strict=True):
        future = _future(scenario, rng, sigma, len(runs), draws)
        _count(scenario, runs, spread, future, tally)


def spreads_for(scenario: Scenario, recipes: Sequence[Sequence[RunRate]]) -> list[Spread]:
    """The spread each recipe is moderated with, as the product fits it."""
    prior = SpreadPrior(TRUE_S0 * scenario.prior_ratio, PRIOR_D0)
    fitted = [[run.log_rate for run in runs if run.log_rate is not None] for runs in recipes if len(runs) > 1]
    variances = [float(np.var(logs, ddof=1)) for logs in fitted]
    dfs = [len(logs) - 1 for logs in fitted]
    common = fit_spread(variances, dfs, prior)
    own = iter(leave_one_out(variances, dfs, prior))
    return [next(own) if len(runs) > 1 else common for runs in recipes]


def _run_counts(scenario: Scenario, rng: np.random.Generator) -> list[int]:
    if scenario.counts is Counts.EVEN:
        fitted = rng.integers(2, MOST_RUNS + 1, scenario.recipes)
    else:
        fitted = np.minimum(1 + rng.geometric(0.4, scenario.recipes), MOST_RUNS)
    return [*fitted.tolist(), *[1] * max(2, scenario.recipes // 10)]


def _true_spreads(scenario: Scenario, rng: np.random.Generator, count: int) -> list[float]:
    if scenario.spreads is Spreads.BIMODAL:
        return (TRUE_S0 * rng.choice([0.5, 2.0], count)).tolist()
    return (TRUE_S0 * np.sqrt(scenario.d0 / rng.chisquare(scenario.d0, count))).tolist()


def _errors(scenario: Scenario, rng: np.random.Generator, count: int) -> np.ndarray:
    if scenario.errors is Errors.NORMAL:
        return rng.standard_normal(count)
    return rng.standard_t(3, count) / math.sqrt(3)


def _measured(
    scenario: Scenario, rng: np.random.Generator, logs: np.ndarray
) -> tuple[np.ndarray, np.ndarray]:
    if scenario.u_range is None:
        return logs, np.zeros(len(logs))
    u = TRUE_S0 * rng.uniform(*scenario.u_range, len(logs))
    return logs + u * rng.standard_normal(len(logs)), u


def _runs(scenario: Scenario, rng: np.random.Generator, sigma: float, count: int) -> list[RunRate]:
    logs = sigma * _errors(scenario, rng, count) + scenario.drift * TRUE_S0 * np.arange(count)
    seen, u = _measured(scenario, rng, logs)
    return [RunRate(float(x), float(v)) for x, v in zip(seen, u, strict=True)]


def _future(scenario: Scenario, rng: np.random.Generator, sigma: float, count: int, draws: int) -> np.ndarray:
    logs = sigma * _errors(scenario, rng, draws) + scenario.drift * TRUE_S0 * count
    return _measured(scenario, rng, logs)[0]


def _count(
    scenario: Scenario, runs: Sequence[RunRate], spread: Spread, future: np.ndarray, tally: Tally
) -> None:
    if scenario.series:
        found, _ = predict_in_series(runs, list(range(len(runs))), spread, CONFIDENCE)
    else:
        found = predict_next_run(runs, spread, CONFIDENCE)
    assert found.log_lo is not None
    n = len(runs)
    tally.tried[n] += len(future)
    tally.hits[n] += int(((future >= found.log_lo) & (future <= found.log_hi)).sum())
    tally.widths[n].append(found.log_hi - found.log_lo)
    if n > 1:
        plain = plain_interval([run.log_rate for run in runs if run.log_rate is not None], CONFIDENCE)
        tally.plain_widths[n].append(plain.hi - plain.lo)
