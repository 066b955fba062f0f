"""The trigamma function and its inverse, which turn degrees of freedom into a variance of ln(variance)."""

from __future__ import annotations

import math

from scipy import special

from builder.engine.constants import TRIGAMMA_LARGE, TRIGAMMA_MAX_STEPS, TRIGAMMA_SMALL, TRIGAMMA_TOLERANCE
from builder.engine.errors import DomainError


def log_variance_of(df: float) -> float:
    """
    Variance of ln(s^2) for a variance with `df` > 0 degrees of freedom; 0 for infinitely many.

    Source: trigamma(df / 2); Smyth 2004, Stat. Appl. Genet. Mol. Biol. 3, article 3 (from memory).
    """
    if not df > 0:
        raise DomainError("df", df, "df > 0")
    return 0.0 if math.isinf(df) else float(special.polygamma(1, df / 2))


def log_bias_of(df: float) -> float:
    """Mean of ln(s^2 / sigma^2), <= 0, for `df` > 0 degrees of freedom: digamma(df / 2) - ln(df / 2)."""
    if not df > 0:
        raise DomainError("df", df, "df > 0")
    return 0.0 if math.isinf(df) else float(special.psi(df / 2)) - math.log(df / 2)


def degrees_for(log_variance: float) -> float:
    """
    Degrees of freedom whose ln(s^2) has this variance; infinite for a variance of 0.

    Raises
    ------
    DomainError
        A negative variance.

    Source
    ------
    Newton's method of Smyth 2004, appendix (from memory); tests go back through `log_variance_of`.
    """
    if not log_variance >= 0:
        raise DomainError("log_variance", log_variance, "log_variance >= 0")
    if log_variance == 0:
        return math.inf
    if log_variance > TRIGAMMA_LARGE:
        return 2 / math.sqrt(log_variance)
    if log_variance < TRIGAMMA_SMALL:
        return 2 / log_variance
    # 1/trigamma is convex and nearly linear: Newton's steps on it never overshoot.
    half = 1 / 2 + 1 / log_variance
    for _ in range(TRIGAMMA_MAX_STEPS):
        value = float(special.polygamma(1, half))
        step = value * (1 - value / log_variance) / float(special.polygamma(2, half))
        half += step
        if -step < TRIGAMMA_TOLERANCE * half:
            break
    return 2 * half
