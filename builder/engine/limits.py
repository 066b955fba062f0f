"""What a loss too small to see still says: decision and detection limits, upper limits, censored samples."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from scipy import special

from builder.engine.constants import (
    BISECTION_STEPS,
    CENSORED_MAX_STEPS,
    CENSORED_TOLERANCE,
    DETECTION_QUANTILE,
)
from builder.engine.errors import DomainError
from builder.engine.quantiles import normal_cdf


@dataclass(frozen=True, slots=True)
class DetectionLimits:
    """Decision limit (a reading above it is a loss) and detection limit (a loss that would be seen)."""

    decision: float
    detection: float


@dataclass(frozen=True, slots=True)
class CensoredFit:
    """Mean and standard deviation of a normal sample of which some values are only known to be low."""

    mean: float
    sd: float


def run_limit(loss_nm: float, u_loss_nm: float, time_s: float) -> float:
    """
    One-sided 95 % upper limit of a rate, nm/s: (max(loss, 0) + 1.645 u) / time.

    Parameters
    ----------
    loss_nm:
        Loss read, nm; may be negative (it then counts as 0, never as evidence of growth).
    u_loss_nm:
        Standard uncertainty of the loss, nm, > 0.
    time_s:
        Time, s, > 0. The limit says nothing beyond it.

    Raises
    ------
    DomainError
        u or time not > 0.

    Source
    ------
    Currie 1968 (from memory). Cases: tests/cases/limits.json.
    """
    _require_positive("u_loss_nm", u_loss_nm)
    _require_positive("time_s", time_s)
    return (max(loss_nm, 0.0) + DETECTION_QUANTILE * u_loss_nm) / time_s


def currie(u_zero: float, *, paired: bool = False) -> DetectionLimits:
    """
    Decision and detection limit at 5 % risks for a reading that scatters by `u_zero` > 0 at zero loss.

    `paired`: the zero is itself a reading of the same scatter, as in thickness before and after.

    Source: Currie 1968, Anal. Chem. 40, 586 (from memory). Cases: tests/cases/limits.json.
    """
    _require_positive("u_zero", u_zero)
    u_difference = u_zero * math.sqrt(2) if paired else u_zero
    return DetectionLimits(DETECTION_QUANTILE * u_difference, 2 * DETECTION_QUANTILE * u_difference)


def feldman_cousins_upper(reading: float, confidence: float) -> float:
    """
    Upper limit of a quantity that cannot be negative, from one normal reading, by the unified approach.

    Parameters
    ----------
    reading:
        The reading in units of its standard uncertainty; may be negative.
    confidence:
        In (0, 1).

    Returns
    -------
    :
        Upper limit, in the same units; positive even for a very negative reading.

    Source
    ------
    Feldman & Cousins 1998, Phys. Rev. D 57, 3873 (from memory). Cases: tests/cases/limits.json.
    """
    if not 0 < confidence < 1:
        raise DomainError("confidence", confidence, "0 < confidence < 1")
    if not math.isfinite(reading):
        raise DomainError("reading", reading, "finite")
    low = max(reading, 0.0)
    width = 1.0
    while _acceptance_from(reading, low + width) < confidence:
        width *= 2
    high = low + width
    for _ in range(BISECTION_STEPS):
        middle = (low + high) / 2
        if _acceptance_from(reading, middle) < confidence:
            low = middle
        else:
            high = middle
    return high


def left_censored_normal(observed: Sequence[float], n_below: int, limit: float) -> CensoredFit:
    """
    Maximum-likelihood normal fit with `n_below` further values known only to lie below `limit`.

    The limit, or half of it, in place of the unseen values biases the mean. For rates, pass logarithms.

    Parameters
    ----------
    observed:
        Values seen, at least two of them different.
    n_below:
        Count of values below the limit, >= 0.
    limit:
        The detection limit, unit of the values.

    Raises
    ------
    DomainError
        Fewer than two different observed values, or a negative count.

    Source
    ------
    Cohen 1959; Helsel 2012 (both from memory). By expectation-maximisation. Cases: tests/cases/limits.json.
    """
    if len(set(observed)) < 2:
        raise DomainError("observed", list(observed), "at least two different values")
    if n_below < 0:
        raise DomainError("n_below", n_below, "n_below >= 0")
    n = len(observed) + n_below
    total, squares = math.fsum(observed), math.fsum(x * x for x in observed)
    mean = total / len(observed)
    variance = squares / len(observed) - mean**2
    for _ in range(CENSORED_MAX_STEPS):
        first, second = _moments_below(mean, math.sqrt(variance), limit)
        new_mean = (total + n_below * first) / n
        new_variance = (squares + n_below * second) / n - new_mean**2
        moved = abs(new_mean - mean) + abs(new_variance - variance) / math.sqrt(variance)
        mean, variance = new_mean, new_variance
        if moved <= CENSORED_TOLERANCE * math.sqrt(variance):
            break
    return CensoredFit(mean, math.sqrt(variance))


def _acceptance_from(reading: float, true_value: float) -> float:
    """Probability between `reading` and the point of equal likelihood ratio above the true value."""
    if reading >= 0:
        upper = 2 * true_value - reading
    else:
        upper = true_value + math.sqrt(true_value**2 - 2 * reading * true_value)
    return normal_cdf(upper - true_value) - normal_cdf(reading - true_value)


def _moments_below(mean: float, sd: float, limit: float) -> tuple[float, float]:
    """First and second moment of a normal value given that it lies below the limit."""
    z = (limit - mean) / sd
    # Logarithms keep the ratio finite far below the mean, where both parts underflow.
    hazard = math.exp(-z * z / 2 - math.log(2 * math.pi) / 2 - float(special.log_ndtr(z)))
    first = mean - sd * hazard
    variance = sd**2 * (1 - z * hazard - hazard**2)
    return first, variance + first**2


def _require_positive(name: str, value: float) -> None:
    if not 0 < value < math.inf:
        raise DomainError(name, value, "finite and > 0")
