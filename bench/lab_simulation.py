"""Invented labs whose true spreads are known, to count how often the next run falls in its interval."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field
from enum import StrEnum

import numpy as np
from numpy.typing import NDArray
from scipy import special

from builder.engine import (
    NextRun,
    RunRate,
    Spread,
    SpreadPrior,
    fit_spread,
    leave_one_out,
    plain_interval,
    predict_in_series,
    predict_next_run,
)

FloatArray = NDArray[np.float64]

IntervalOf = Callable[[Sequence[RunRate], Spread], tuple[float, float]]
"""Low and high end of ln(rate) for the next run, from a recipe's runs and the lab's spread."""

FitOf = Callable[[Sequence[float], Sequence[float], SpreadPrior], tuple[Sequence[Spread], Spread]]
"""The spread for each recipe of two or more runs, and the one for recipes with a single run."""

TRUE_S0 = 0.06
PRIOR_D0 = 4.0
MOST_RUNS = 12
CONFIDENCE = 0.90
TAIL_DF = 3
"""Degrees of freedom of the heavy-tailed errors: the least with a finite variance."""


class Errors(StrEnum):
    """Shape of the run-to-run errors."""

    NORMAL = "normal"
    HEAVY = "t with 3 degrees of freedom"


class Spreads(StrEnum):
    """How the true spread varies from recipe to recipe."""

    CHI = "scaled inverse chi-squared"
    HEAVY = "log-normal with a heavy tail: one recipe in ten at 4 s0"
    BIMODAL = "half the recipes at s0/2, half at 2 s0"


class Counts(StrEnum):
    """How many runs the recipes have."""

    EVEN = "2 to 12, all alike"
    FEW = "mostly 2 to 4"


@dataclass(frozen=True)
class Scenario:
    """
    One kind of lab: `recipes` with two or more runs, and a few more with one run each.

    `d0` of the true spreads; infinite: all recipes spread alike. `prior_ratio`: prior s0 over the true
    one. `drift`: change of ln(rate) a run, in s0. `u_range`: relative measurement uncertainties are
    drawn evenly between these, in s0. `series`: look for a trend.
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


def _bins() -> dict[int, list[float]]:
    return {k: [] for k in range(1, MOST_RUNS + 1)}


@dataclass
class Tally:
    """
    Next runs and hits by run count, and interval widths, moderated and plain.

    `chances`: the chance of a hit given the truth, one an interval; its mean estimates the same share as
    hits over next runs, with less scatter. Empty where the next run is not simply normal.
    """

    tried: dict[int, int] = field(default_factory=lambda: dict.fromkeys(range(1, MOST_RUNS + 1), 0))
    hits: dict[int, int] = field(default_factory=lambda: dict.fromkeys(range(1, MOST_RUNS + 1), 0))
    chances: dict[int, list[float]] = field(default_factory=_bins)
    widths: dict[int, list[float]] = field(default_factory=_bins)
    plain_widths: dict[int, list[float]] = field(default_factory=_bins)

    def coverage(self, runs: int) -> float:
        """Share of next runs inside the interval, 0 to 1."""
        return self.hits[runs] / self.tried[runs]

    def mean_chance(self, runs: int) -> float:
        """Mean chance of the next run to fall inside, 0 to 1."""
        return float(np.mean(self.chances[runs]))

    def u_mean_chance(self, runs: int) -> float:
        """Standard uncertainty of `mean_chance`, the intervals taken as independent."""
        return float(np.std(self.chances[runs], ddof=1)) / math.sqrt(len(self.chances[runs]))

    def relative_width(self, runs: int) -> float:
        """Median width over the median width of the plain t interval."""
        return float(np.median(self.widths[runs]) / np.median(self.plain_widths[runs]))

    def relative_mean_width(self, runs: int) -> float:
        """Mean width over the mean width of the plain t interval."""
        return float(np.mean(self.widths[runs]) / np.mean(self.plain_widths[runs]))


def planning_interval(runs: Sequence[RunRate], spread: Spread) -> tuple[float, float]:
    """The product's interval for the next run."""
    return _ends(predict_next_run(runs, spread, CONFIDENCE))


def planning_interval_in_series(runs: Sequence[RunRate], spread: Spread) -> tuple[float, float]:
    """The product's interval for the next run of a series, a trend taken in."""
    found, _ = predict_in_series(runs, list(range(len(runs))), spread, CONFIDENCE)
    return _ends(found)


def planning_fit(
    variances: Sequence[float], dfs: Sequence[float], prior: SpreadPrior
) -> tuple[Sequence[Spread], Spread]:
    """The spreads as the product fits them."""
    return leave_one_out(variances, dfs, prior), fit_spread(variances, dfs, prior)


def simulate(
    scenario: Scenario,
    labs: int,
    rng: np.random.Generator,
    draws: int = 1,
    *,
    fit: FitOf = planning_fit,
    interval: IntervalOf | None = None,
) -> Tally:
    """Simulate `labs` labs; `draws` next runs are drawn for each interval."""
    tally = Tally()
    chosen = interval or (planning_interval_in_series if scenario.series else planning_interval)
    for _ in range(labs):
        _one_lab(scenario, rng, draws, tally, fit, chosen)
    return tally


def _one_lab(
    scenario: Scenario, rng: np.random.Generator, draws: int, tally: Tally, fit: FitOf, interval: IntervalOf
) -> None:
    counts = _run_counts(scenario, rng)
    sigmas = _true_spreads(scenario, rng, len(counts))
    recipes = [_runs(scenario, rng, sigma, count) for sigma, count in zip(sigmas, counts, strict=True)]
    for runs, sigma, spread in zip(recipes, sigmas, _spreads_for(scenario, recipes, fit), strict=True):
        low, high = interval(runs, spread)
        future = _future(scenario, rng, sigma, len(runs), draws)
        tally.tried[len(runs)] += len(future)
        tally.hits[len(runs)] += int(((future >= low) & (future <= high)).sum())
        tally.widths[len(runs)].append(high - low)
        _add_chance(scenario, sigma, len(runs), (low, high), tally)
        if len(runs) > 1:
            plain = plain_interval(_log_rates(runs), CONFIDENCE)
            tally.plain_widths[len(runs)].append(plain.hi - plain.lo)


def _add_chance(
    scenario: Scenario, sigma: float, count: int, ends: tuple[float, float], tally: Tally
) -> None:
    if scenario.errors is not Errors.NORMAL or scenario.u_range is not None:
        return
    centre = scenario.drift * TRUE_S0 * count
    inside = special.ndtr((ends[1] - centre) / sigma) - special.ndtr((ends[0] - centre) / sigma)
    tally.chances[count].append(float(inside))


def _spreads_for(scenario: Scenario, recipes: Sequence[Sequence[RunRate]], fit: FitOf) -> list[Spread]:
    prior = SpreadPrior(TRUE_S0 * scenario.prior_ratio, PRIOR_D0)
    fitted = [_log_rates(runs) for runs in recipes if len(runs) > 1]
    each, common = fit([float(np.var(x, ddof=1)) for x in fitted], [len(x) - 1 for x in fitted], prior)
    own = iter(each)
    return [next(own) if len(runs) > 1 else common for runs in recipes]


def _log_rates(runs: Sequence[RunRate]) -> list[float]:
    return [run.log_rate for run in runs if run.log_rate is not None]


def _ends(found: NextRun) -> tuple[float, float]:
    assert found.log_lo is not None
    return found.log_lo, found.log_hi


def _run_counts(scenario: Scenario, rng: np.random.Generator) -> list[int]:
    if scenario.counts is Counts.EVEN:
        fitted = rng.integers(2, MOST_RUNS + 1, scenario.recipes)
    else:
        fitted = np.minimum(1 + rng.geometric(0.4, scenario.recipes), MOST_RUNS)
    return [*fitted.tolist(), *[1] * max(2, scenario.recipes // 10)]


def _true_spreads(scenario: Scenario, rng: np.random.Generator, count: int) -> list[float]:
    if scenario.spreads is Spreads.BIMODAL:
        relative = rng.choice([0.5, 2.0], count)
    elif scenario.spreads is Spreads.HEAVY:
        relative = rng.choice([1.0, 4.0], count, p=[0.9, 0.1]) * np.exp(0.3 * rng.standard_normal(count))
    elif math.isinf(scenario.d0):
        relative = np.ones(count)
    else:
        relative = np.sqrt(scenario.d0 / rng.chisquare(scenario.d0, count))
    return [float(TRUE_S0 * value) for value in relative]


def _errors(scenario: Scenario, rng: np.random.Generator, count: int) -> FloatArray:
    if scenario.errors is Errors.NORMAL:
        return rng.standard_normal(count)
    return rng.standard_t(TAIL_DF, count) / math.sqrt(TAIL_DF / (TAIL_DF - 2))


def _measured(
    scenario: Scenario, rng: np.random.Generator, logs: FloatArray
) -> tuple[FloatArray, FloatArray]:
    if scenario.u_range is None:
        return logs, np.zeros(len(logs))
    u = TRUE_S0 * rng.uniform(*scenario.u_range, len(logs))
    return logs + u * rng.standard_normal(len(logs)), u


def _runs(scenario: Scenario, rng: np.random.Generator, sigma: float, count: int) -> list[RunRate]:
    logs = sigma * _errors(scenario, rng, count) + scenario.drift * TRUE_S0 * np.arange(count)
    seen, u = _measured(scenario, rng, logs)
    return [RunRate(float(x), float(v)) for x, v in zip(seen, u, strict=True)]


def _future(scenario: Scenario, rng: np.random.Generator, sigma: float, count: int, draws: int) -> FloatArray:
    logs = sigma * _errors(scenario, rng, draws) + scenario.drift * TRUE_S0 * count
    return _measured(scenario, rng, logs)[0]
