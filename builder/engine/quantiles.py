"""Quantiles of the normal, Student t and chi-squared distributions; scipy.stats is slow to import."""

from __future__ import annotations

import math

from scipy import special

from builder.engine.errors import DomainError


def normal(p: float) -> float:
    """
    Quantile of the standard normal distribution.

    Parameters
    ----------
    p:
        Probability, 0 < p < 1.

    Raises
    ------
    DomainError
        p outside (0, 1).

    Source
    ------
    scipy.special.ndtri; tests compare with scipy.stats.
    """
    _require_probability(p)
    return float(special.ndtri(p))


def normal_cdf(z: float) -> float:
    """Probability below `z` of the standard normal distribution."""
    return float(special.ndtr(z))


def student_t(p: float, df: float) -> float:
    """
    Quantile of Student's t distribution.

    Parameters
    ----------
    p:
        Probability, 0 < p < 1.
    df:
        Degrees of freedom, > 0; need not be whole; infinity gives the normal quantile.

    Raises
    ------
    DomainError
        p outside (0, 1), or df not > 0.

    Source
    ------
    scipy.special.stdtrit; tests compare with scipy.stats and with the closed forms at df 1 and 2.
    """
    _require_probability(p)
    if not df > 0:
        raise DomainError("df", df, "df > 0")
    if math.isinf(df):
        return normal(p)
    return float(special.stdtrit(df, p))


def two_sided_t(confidence: float, df: float) -> float:
    """Half-width, in standard deviations, of a two-sided t interval at `confidence` (0 to 1)."""
    return student_t((1 + confidence) / 2, df)


def chi_squared(p: float, df: float) -> float:
    """
    Quantile of the chi-squared distribution with `df` > 0 at probability 0 < p < 1.

    Raises
    ------
    DomainError
        p outside (0, 1), or df not finite and > 0.
    """
    _require_probability(p)
    if not 0 < df < math.inf:
        raise DomainError("df", df, "0 < df < infinity")
    return float(special.chdtri(df, 1 - p))


def noncentral_t(p: float, df: float, shift: float) -> float:
    """
    Quantile of the noncentral t distribution with non-centrality `shift`, 0 < p < 1, df > 0.

    Raises
    ------
    DomainError
        p outside (0, 1), or df not finite and > 0.
    """
    _require_probability(p)
    if not 0 < df < math.inf:
        raise DomainError("df", df, "0 < df < infinity")
    return float(special.nctdtrit(df, shift, p))


def _require_probability(p: float) -> None:
    if not 0 < p < 1:
        raise DomainError("p", p, "0 < p < 1")
