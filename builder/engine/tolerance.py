"""How many test runs: prediction and tolerance factors, and bounds from small samples."""

from __future__ import annotations

import math

from builder.engine.errors import DomainError
from builder.engine.quantiles import chi_squared, noncentral_t, normal, student_t, two_sided_t


def prediction_factor(n: int, confidence: float) -> float:
    """
    Half-width of a plain prediction interval for the next run, in sample standard deviations.

    `n` runs, >= 2; `confidence` two-sided. The gain flattens beyond five or six runs.

    Source: Hahn & Meeker, Statistical Intervals (from memory). Cases: tests/cases/tolerance.json.
    """
    _require_runs(n)
    return two_sided_t(confidence, n - 1) * math.sqrt(1 + 1 / n)


def tolerance_factor_one_sided(n: int, content: float, confidence: float) -> float:
    """
    Factor k such that mean + k s exceeds a part `content` of all runs, at `confidence`; exact.

    Source: noncentral t. Cases: tests/cases/tolerance.json.
    """
    _require_runs(n)
    return noncentral_t(confidence, n - 1, normal(content) * math.sqrt(n)) / math.sqrt(n)


def tolerance_factor_two_sided(n: int, content: float, confidence: float) -> float:
    """
    Factor k such that mean +- k s holds a part `content` of all runs, at `confidence`.

    Howe's approximation: within 0.4 % of exact from five runs, 2 % wide at three.

    Source: Howe 1969 (from memory). Cases: tests/cases/tolerance.json.
    """
    _require_runs(n)
    z = normal((1 + content) / 2)
    return z * math.sqrt((n - 1) * (1 + 1 / n) / chi_squared(1 - confidence, n - 1))


def sigma_upper_factor(n: int, confidence: float) -> float:
    """One-sided upper bound of the true standard deviation over that of `n` >= 2 runs."""
    _require_runs(n)
    return math.sqrt((n - 1) / chi_squared(1 - confidence, n - 1))


def zero_failures_upper(n: int, confidence: float) -> float:
    """Upper bound of the chance of a failure when `n` >= 1 trials showed none: 1 - (1 - confidence)^(1/n)."""
    if n < 1:
        raise DomainError("n", n, "n >= 1")
    if not 0 < confidence < 1:
        raise DomainError("confidence", confidence, "0 < confidence < 1")
    return float(1 - (1 - confidence) ** (1 / n))


def runs_to_see(shift: float, sigma: float, alpha: float, beta: float) -> int:
    """
    Runs needed to see a shift of the mean to one side.

    `alpha` is the risk of a false alarm, `beta` that of missing the shift; for a shift to either side
    pass half of `alpha`. `shift` and `sigma` > 0 in one unit. The smallest number that is enough with
    t quantiles.

    Raises
    ------
    DomainError
        `shift` or `sigma` not > 0.

    Source
    ------
    NIST/SEMATECH e-Handbook, sample sizes (from memory).
    """
    if not (shift > 0 and sigma > 0):
        raise DomainError("shift, sigma", (shift, sigma), "> 0")
    ratio2 = (sigma / shift) ** 2
    n = max(2, math.ceil(ratio2 * (normal(1 - alpha) + normal(1 - beta)) ** 2))
    # t needs more runs than the normal at every n, and falls with n: step up to the first n that is enough.
    while ratio2 * (student_t(1 - alpha, n - 1) + student_t(1 - beta, n - 1)) ** 2 > n:
        n += 1
    return n


def _require_runs(n: int) -> None:
    if n < 2:
        raise DomainError("n", n, "n >= 2")
