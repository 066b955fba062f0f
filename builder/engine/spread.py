"""The spread of a method's run rates from one run to the next, learned over all recipes of the lab."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from builder.engine.constants import (
    LEAVE_ONE_OUT_BELOW,
    MIN_FITTED_RECIPES,
    MIN_VARIANCE_FRACTION,
    PSEUDO_RECIPE_DF,
    PSEUDO_RECIPES,
    SPREAD_PASSES,
    SPREAD_UNCERTAINTY,
    WEIGHT_VARIANCE_FLOOR,
)
from builder.engine.errors import DomainError
from builder.engine.trigamma import degrees_for, log_bias_of, log_variance_of

FloatArray = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class SpreadPrior:
    """
    What a lab believes before it has runs: a relative spread `s0` (of ln rate) worth `d0` degrees of freedom.

    Raises DomainError unless s0 > 0 and d0 > 0 (d0 may be infinite).
    """

    s0: float
    d0: float

    def __post_init__(self) -> None:
        _require_spread(self.s0, self.d0)


@dataclass(frozen=True, slots=True)
class Spread:
    """
    The spread a recipe's own scatter is moderated with.

    `s0`: typical standard deviation of ln(rate) between runs. `d0`: what it is worth, in degrees of
    freedom, with the uncertainty of s0 and d0 themselves already taken off; may be infinite when set
    by hand. `recipes`: how many recipes (of two or more runs) it was fitted to. `from_prior`: it is
    the prior, unchanged.
    """

    s0: float
    d0: float
    recipes: int
    from_prior: bool

    def __post_init__(self) -> None:
        _require_spread(self.s0, self.d0)


@dataclass(frozen=True, slots=True)
class _LogMoments:
    mean: float
    variance: float


def fit_spread(
    variances: Sequence[float],
    dfs: Sequence[float],
    prior: SpreadPrior,
    pseudo_recipes: int = PSEUDO_RECIPES,
    min_recipes: int = MIN_FITTED_RECIPES,
) -> Spread:
    """
    Typical spread of a method and its worth, from the sample variances of its recipes.

    The true variance of a recipe is taken as scaled inverse chi-squared about s0^2 with d0 degrees of
    freedom. The mean and the variance of ln(s^2) over the recipes, each freed of its sampling part,
    give s0 and d0. Recipes weigh by the precision of their ln(s^2). The prior enters as
    `pseudo_recipes` further recipes, each worth a recipe of two runs. A plug-in of s0 and d0 would
    take them as known; the variance of ln(sigma^2) is therefore raised by 2 / (recipes + pseudo-recipes),
    which lowers d0.

    Parameters
    ----------
    variances:
        Sample variances of ln(rate), one a recipe, each >= 0.
    dfs:
        Their degrees of freedom (runs less 1), each > 0.
    prior:
        The lab's setting.
    pseudo_recipes:
        Weight of the prior, >= 0.
    min_recipes:
        With fewer recipes the prior is returned as it stands.

    Raises
    ------
    DomainError
        Lengths differ, a variance is negative or not finite, or a df is not finite and > 0.

    Source
    ------
    After Smyth 2004, Stat. Appl. Genet. Mol. Biol. 3, article 3 (from memory): log-variance moment estimator;
    weights, prior and correction are ours, measured by bench/coverage.py. Cases: tests/engine/test_spread.py.
    """
    s2, df = _checked(variances, dfs, pseudo_recipes)
    if len(s2) < min_recipes:
        return Spread(prior.s0, prior.d0, len(s2), from_prior=True)
    return _fit(s2, df, prior, pseudo_recipes)


def leave_one_out(
    variances: Sequence[float],
    dfs: Sequence[float],
    prior: SpreadPrior,
    pseudo_recipes: int = PSEUDO_RECIPES,
    min_recipes: int = MIN_FITTED_RECIPES,
    below: int = LEAVE_ONE_OUT_BELOW,
) -> tuple[Spread, ...]:
    """
    The spread to moderate each recipe with, in the order given.

    In a small lab (fewer than `below` recipes) a recipe's own scatter would count twice, in the spread
    and beside it: each is then fitted without itself. In a larger lab all get the common fit.
    A recipe with a single run is in no fit and takes `fit_spread` of all. Parameters and errors as there.
    """
    common = fit_spread(variances, dfs, prior, pseudo_recipes, min_recipes)
    count = len(variances)
    if common.from_prior or count >= below:
        return (common,) * count
    s2, df = _checked(variances, dfs, pseudo_recipes)
    return tuple(_fit(np.delete(s2, i), np.delete(df, i), prior, pseudo_recipes) for i in range(count))


def moderated(s2: float | None, df: float, spread: Spread) -> tuple[float, float]:
    """
    A recipe's variance of ln(rate), drawn towards the lab's, and its degrees of freedom.

    Parameters
    ----------
    s2:
        The recipe's own sample variance, >= 0; None with a single run.
    df:
        Its degrees of freedom, >= 0; 0 with a single run.

    Returns
    -------
    :
        (d0 s0^2 + df s2) / (d0 + df) and d0 + df; s0^2 and infinity when d0 is infinite.

    Raises
    ------
    DomainError
        df < 0, s2 < 0, or s2 missing while df > 0.

    Source
    ------
    Smyth 2004, as in `fit_spread`.
    """
    if not df >= 0:
        raise DomainError("df", df, "df >= 0")
    if df == 0:
        return spread.s0**2, spread.d0
    if s2 is None or not s2 >= 0:
        raise DomainError("s2", s2, "s2 >= 0 where df > 0")
    if math.isinf(spread.d0):
        return spread.s0**2, math.inf
    total = spread.d0 + df
    return (spread.d0 * spread.s0**2 + df * s2) / total, total


def _fit(s2: FloatArray, df: FloatArray, prior: SpreadPrior, pseudo_recipes: int) -> Spread:
    moments = _log_moments(s2, df, prior, pseudo_recipes)
    total = len(s2) + pseudo_recipes
    d0 = degrees_for(max(moments.variance, 0.0) + SPREAD_UNCERTAINTY / total)
    s0 = math.exp((moments.mean + log_bias_of(d0)) / 2)
    return Spread(s0, d0, len(s2), from_prior=False)


def _log_moments(s2: FloatArray, df: FloatArray, prior: SpreadPrior, pseudo_recipes: int) -> _LogMoments:
    """Mean and variance of ln(sigma^2) over the recipes, the prior's pseudo-recipes among them."""
    logs = np.log(np.maximum(s2, MIN_VARIANCE_FRACTION * prior.s0**2))
    logs = logs - np.array([log_bias_of(d) for d in df])
    sampling = np.array([log_variance_of(d) for d in df])
    prior_log = 2 * math.log(prior.s0) - log_bias_of(prior.d0)
    prior_variance = log_variance_of(prior.d0)
    pseudo_sampling = log_variance_of(PSEUDO_RECIPE_DF)
    total = len(s2) + pseudo_recipes
    correction = total / (total - 1) if total > 1 else 1.0
    mean, variance = prior_log, prior_variance
    for _ in range(SPREAD_PASSES):
        between = max(variance, WEIGHT_VARIANCE_FLOOR)
        weight = 1 / (between + sampling)
        pseudo_weight = 1 / (between + pseudo_sampling)
        mass = float(weight.sum()) + pseudo_recipes * pseudo_weight
        mean = (float((weight * logs).sum()) + pseudo_recipes * pseudo_weight * prior_log) / mass
        # The squared residual of a recipe scatters as the square of its variance: hence the squared weights.
        own = float((weight**2 * ((logs - mean) ** 2 * correction - sampling)).sum())
        of_prior = pseudo_weight**2 * ((prior_log - mean) ** 2 * correction + prior_variance)
        mass2 = float((weight**2).sum()) + pseudo_recipes * pseudo_weight**2
        variance = (own + pseudo_recipes * of_prior) / mass2
    return _LogMoments(mean, variance)


def _checked(
    variances: Sequence[float], dfs: Sequence[float], pseudo_recipes: int
) -> tuple[FloatArray, FloatArray]:
    if len(variances) != len(dfs):
        raise DomainError("lengths", (len(variances), len(dfs)), "equal lengths")
    for s2 in variances:
        if not 0 <= s2 < math.inf:
            raise DomainError("variances", s2, "finite and >= 0")
    for df in dfs:
        if not 0 < df < math.inf:
            raise DomainError("dfs", df, "finite and > 0")
    if pseudo_recipes < 0:
        raise DomainError("pseudo_recipes", pseudo_recipes, "pseudo_recipes >= 0")
    return np.asarray(variances, dtype=np.float64), np.asarray(dfs, dtype=np.float64)


def _require_spread(s0: float, d0: float) -> None:
    if not 0 < s0 < math.inf:
        raise DomainError("s0", s0, "finite and > 0")
    if not d0 > 0:
        raise DomainError("d0", d0, "d0 > 0")
