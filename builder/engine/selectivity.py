"""How much of one film goes for each nanometre of another."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from builder.engine.errors import DomainError
from builder.engine.next_run import NextRun, predict_next_run
from builder.engine.run_rate import RunRate
from builder.engine.spread import Spread


@dataclass(frozen=True, slots=True)
class Selectivity:
    """
    Rate of the target over rate of the other film, a pure number.

    `mid` and `hi` are None when the other film showed no loss: there is then only a lower bound.
    `log_ratio` is the interval it came from, of the inverse ratio, with the shares of its spread.
    """

    lo: float
    mid: float | None
    hi: float | None
    log_ratio: NextRun


@dataclass(frozen=True, slots=True)
class FiellerRatio:
    """
    A ratio with Fieller's limits.

    `g` >= 1: the denominator is not distinguishable from 0 and there is no upper limit (`hi` None);
    `lo` is None when not even a lower limit exists.
    """

    ratio: float
    lo: float | None
    hi: float | None
    g: float

    @property
    def bounded(self) -> bool:
        """True when both limits are finite."""
        return self.hi is not None


def paired_selectivity(
    target: Sequence[RunRate], other: Sequence[RunRate], spread: Spread, confidence: float
) -> Selectivity:
    """
    Selectivity the next run will show, from films etched side by side.

    The logarithm of the ratio is taken within each pair, so what the two films share (bath, chamber,
    time) drops out; its spread is moderated as a rate's is. A pair whose other film showed no loss
    gives a lower bound of the selectivity.

    Parameters
    ----------
    target, other:
        Runs of the two films, pair by pair. Pairs in which the target has no rate say nothing and
        are left out.
    spread:
        Spread of ln(ratio) between runs.
    confidence:
        Two-sided, in (0, 1).

    Raises
    ------
    DomainError
        Lengths differ, or no pair says anything.

    Source
    ------
    The interval is that of `predict_next_run`; a limit divides by its own pair's target rate.
    """
    if len(target) != len(other):
        raise DomainError("lengths", (len(target), len(other)), "equal lengths")
    ratios = [
        _inverse_ratio(t.log_rate, t.u_log, o)
        for t, o in zip(target, other, strict=True)
        if t.log_rate is not None
    ]
    inverse = predict_next_run(ratios, spread, confidence)
    return Selectivity(
        lo=math.exp(-inverse.log_hi),
        mid=None if inverse.log_mid is None else math.exp(-inverse.log_mid),
        hi=None if inverse.log_lo is None else math.exp(-inverse.log_lo),
        log_ratio=inverse,
    )


def fieller_ratio(
    a: float, b: float, var_a: float, var_b: float, cov: float, quantile: float
) -> FiellerRatio:
    """
    Ratio a / b of two normal estimates, with its limits.

    Parameters
    ----------
    a, b:
        Estimates; b > 0.
    var_a, var_b, cov:
        Their variances, >= 0, and covariance.
    quantile:
        Two-sided quantile, > 0.

    Raises
    ------
    DomainError
        b not > 0, a negative variance, a covariance no two variances can have, or quantile not > 0.

    Source
    ------
    Fieller 1954 (from memory). Cases: tests/cases/selectivity.json.
    """
    if not b > 0:
        raise DomainError("b", b, "b > 0")
    if not (var_a >= 0 and var_b >= 0):
        raise DomainError("variance", min(var_a, var_b), "variance >= 0")
    if cov**2 > var_a * var_b:
        raise DomainError("cov", cov, "cov^2 <= var_a var_b")
    if not quantile > 0:
        raise DomainError("quantile", quantile, "quantile > 0")
    q2 = quantile**2
    g = q2 * var_b / b**2
    # The limits are the roots of (a - S b)^2 = q^2 (var_a - 2 S cov + S^2 var_b).
    square, half_linear, constant = b**2 - q2 * var_b, a * b - q2 * cov, a**2 - q2 * var_a
    inside = half_linear**2 - square * constant
    if square > 0:
        root = math.sqrt(max(inside, 0.0))
        return FiellerRatio(a / b, (half_linear - root) / square, (half_linear + root) / square, g)
    return FiellerRatio(a / b, _only_lower(square, half_linear, constant, inside), None, g)


def _only_lower(square: float, half_linear: float, constant: float, inside: float) -> float | None:
    """
    Lower limit where no upper one exists.

    The set is then two rays; the ratio of two rates is not negative, so the upper ray's end bounds it,
    provided the lower ray ends below 0.
    """
    if inside < 0 or constant <= 0 or half_linear <= 0:
        return None
    if square == 0:
        return constant / (2 * half_linear)
    # The stable form of the root: square is negative and may be tiny.
    return constant / (half_linear + math.sqrt(inside))


def _inverse_ratio(target_log: float, target_u: float | None, other: RunRate) -> RunRate:
    if other.log_rate is not None:
        u = None if target_u is None or other.u_log is None else math.hypot(target_u, other.u_log)
        return RunRate(other.log_rate - target_log, u)
    if other.limit_nm_per_s is not None:
        return RunRate(None, limit_nm_per_s=other.limit_nm_per_s / math.exp(target_log))
    return RunRate(None)
