"""Runs pooled by the textbook methods, shown beside the planning interval so that a reader can compare."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from enum import IntEnum

import numpy as np
from numpy.typing import NDArray

from builder.engine.constants import BISECTION_STEPS
from builder.engine.errors import DomainError
from builder.engine.quantiles import two_sided_t

FloatArray = NDArray[np.float64]


class DegreesRule(IntEnum):
    """What is taken off the number of runs for the t quantile of a prediction interval."""

    K_MINUS_1 = 1
    K_MINUS_2 = 2


@dataclass(frozen=True, slots=True)
class Pooled:
    """
    A pooled mean and its standard uncertainty, in the unit of the values.

    `tau2` is the variance between runs (0 for the fixed-effect mean), `q` Cochran's Q of the
    fixed-effect mean over `k` runs.
    """

    mean: float
    se: float
    tau2: float
    q: float
    k: int

    @property
    def i2(self) -> float:
        """Part of the scatter that the stated uncertainties do not explain, 0 to 1."""
        return max(0.0, (self.q - (self.k - 1)) / self.q) if self.q > 0 else 0.0


@dataclass(frozen=True, slots=True)
class Interval:
    """A two-sided interval, in the unit of the values."""

    lo: float
    hi: float


def fixed_effect(values: Sequence[float], u: Sequence[float]) -> Pooled:
    """
    Inverse-variance mean; valid only if all runs share one true rate.

    Parameters
    ----------
    values, u:
        Run values and their standard uncertainties, each > 0; at least two.

    Raises
    ------
    DomainError
        Lengths differ, fewer than two values, or an uncertainty not > 0.

    Source
    ------
    Kacker 2004 for the example of tests/cases/pooling.json.
    """
    y, variance = _checked(values, u)
    return _pool(y, variance, 0.0)


def dersimonian_laird(values: Sequence[float], u: Sequence[float]) -> Pooled:
    """Random-effects mean with the moment estimate of DerSimonian & Laird; arguments as `fixed_effect`."""
    y, variance = _checked(values, u)
    weight = 1 / variance
    fixed = _pool(y, variance, 0.0)
    spare = float(weight.sum()) - float((weight**2).sum()) / float(weight.sum())
    return _pool(y, variance, max(0.0, (fixed.q - (len(y) - 1)) / spare))


def paule_mandel(values: Sequence[float], u: Sequence[float]) -> Pooled:
    """
    Random-effects mean with the estimate of Paule & Mandel, preferred when the uncertainties differ.

    tau^2 solves sum (y - mean)^2 / (u^2 + tau^2) = k - 1, by bisection; 0 when the left side is already
    below k - 1 at 0. Arguments as `fixed_effect`.
    """
    y, variance = _checked(values, u)
    target = len(y) - 1
    if _q_at(y, variance, 0.0) <= target:
        return _pool(y, variance, 0.0)
    low, high = 0.0, float(((y - y.mean()) ** 2).sum())
    for _ in range(BISECTION_STEPS):
        middle = (low + high) / 2
        if _q_at(y, variance, middle) > target:
            low = middle
        else:
            high = middle
    return _pool(y, variance, high)


def hartung_knapp_se(values: Sequence[float], u: Sequence[float], tau2: float) -> float:
    """
    Hartung-Knapp standard uncertainty of the random-effects mean at a given tau^2 >= 0, for t with k - 1.

    By luck it can fall below the plain 1 / sqrt(sum w): use `hartung_knapp_safe_se`.
    """
    y, variance = _checked(values, u)
    weight = 1 / (variance + tau2)
    total = float(weight.sum())
    mean = float((weight * y).sum()) / total
    return math.sqrt(float((weight * (y - mean) ** 2).sum()) / ((len(y) - 1) * total))


def hartung_knapp_safe_se(values: Sequence[float], u: Sequence[float], tau2: float) -> float:
    """The greater of the Hartung-Knapp and the plain standard uncertainty of the mean."""
    _, variance = _checked(values, u)
    plain = 1 / math.sqrt(float((1 / (variance + tau2)).sum()))
    return max(plain, hartung_knapp_se(values, u, tau2))


def prediction_interval(
    pooled: Pooled, confidence: float, rule: DegreesRule = DegreesRule.K_MINUS_2
) -> Interval:
    """
    Random-effects prediction interval for the next run.

    Parameters
    ----------
    pooled:
        A random-effects mean; its `se` may be replaced by a Hartung-Knapp one beforehand.
    confidence:
        Two-sided, in (0, 1).
    rule:
        Degrees of freedom k - 2 as first published, or k - 1 as in newer texts.

    Raises
    ------
    DomainError
        Too few runs for the rule.

    Source
    ------
    Higgins, Thompson & Spiegelhalter 2009, J. R. Stat. Soc. A 172, 137 (from memory).
    """
    df = pooled.k - int(rule)
    if df < 1:
        raise DomainError("k", pooled.k, f"at least {int(rule) + 1} runs")
    half = two_sided_t(confidence, df) * math.sqrt(pooled.tau2 + pooled.se**2)
    return Interval(pooled.mean - half, pooled.mean + half)


def mean_interval(mean: float, se: float, df: float, confidence: float) -> Interval:
    """Two-sided t interval of a mean (normal for infinite `df`); never to be read as the next run's."""
    half = two_sided_t(confidence, df) * se
    return Interval(mean - half, mean + half)


def plain_interval(values: Sequence[float], confidence: float) -> Interval:
    """
    Plain t prediction interval for the next of `values` (use ln(rate)): mean +- t s sqrt(1 + 1 / k).

    Raises
    ------
    DomainError
        Fewer than two values.

    Source
    ------
    Hahn & Meeker, Statistical Intervals (from memory).
    """
    k = len(values)
    if k < 2:
        raise DomainError("k", k, "at least 2 runs")
    y = np.asarray(values, dtype=np.float64)
    half = two_sided_t(confidence, k - 1) * float(y.std(ddof=1)) * math.sqrt(1 + 1 / k)
    return Interval(float(y.mean()) - half, float(y.mean()) + half)


def _pool(y: FloatArray, variance: FloatArray, tau2: float) -> Pooled:
    weight = 1 / (variance + tau2)
    total = float(weight.sum())
    mean = float((weight * y).sum()) / total
    return Pooled(mean, 1 / math.sqrt(total), tau2, _q_at(y, variance, 0.0), len(y))


def _q_at(y: FloatArray, variance: FloatArray, tau2: float) -> float:
    weight = 1 / (variance + tau2)
    mean = float((weight * y).sum() / weight.sum())
    return float((weight * (y - mean) ** 2).sum())


def _checked(values: Sequence[float], u: Sequence[float]) -> tuple[FloatArray, FloatArray]:
    if len(values) != len(u):
        raise DomainError("lengths", (len(values), len(u)), "equal lengths")
    if len(values) < 2:
        raise DomainError("k", len(values), "at least 2 runs")
    for value in u:
        if not 0 < value < math.inf:
            raise DomainError("u", value, "finite and > 0")
    return np.asarray(values, dtype=np.float64), np.asarray(u, dtype=np.float64) ** 2
