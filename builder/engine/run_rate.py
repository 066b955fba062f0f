"""One monitor run: thickness before and after, and a time, to a rate or to an upper limit of a rate."""

from __future__ import annotations

import math
from dataclasses import dataclass

from builder.engine.constants import DETECTION_QUANTILE
from builder.engine.errors import DomainError
from builder.engine.line_fit import LineFit


@dataclass(frozen=True, slots=True)
class RunRate:
    """
    What one run says of a rate: a value, an upper limit, or nothing.

    `log_rate` is ln(nm/s); None when the run gives a limit or nothing. `u_log` is the standard
    uncertainty of ln(rate) from the measurement alone; None when unknown, never 0 for unknown.
    `limit_nm_per_s` is a one-sided 95 % upper limit; None when the run gives a value or nothing.
    `loss_nm` is the thickness lost, `exposure_s` the time it took, less the induction time.
    """

    log_rate: float | None
    u_log: float | None = None
    limit_nm_per_s: float | None = None
    loss_nm: float | None = None
    exposure_s: float | None = None

    @property
    def rate_nm_per_s(self) -> float | None:
        """The rate, nm/s; None when the run gives none."""
        return None if self.log_rate is None else math.exp(self.log_rate)


def run_rate(
    before_nm: float,
    after_nm: float,
    time_s: float,
    u_before_nm: float | None,
    u_after_nm: float | None,
    induction_s: float = 0.0,
) -> RunRate:
    """
    Rate of one run from the thickness before and after.

    A loss that is not above its decision limit (1.645 u) is an upper limit, not a rate: its logarithm
    would be meaningless. Without known uncertainties a positive loss is a rate of unknown uncertainty,
    and a loss of zero or less says nothing at all.

    Parameters
    ----------
    before_nm, after_nm:
        Thickness, nm, >= 0; after may exceed before.
    time_s:
        Time in the etch, s.
    u_before_nm, u_after_nm:
        Standard uncertainty of each reading, nm, >= 0; None when unknown.
    induction_s:
        Time before etching starts, s; may be negative.

    Raises
    ------
    DomainError
        A value not finite, a thickness or uncertainty < 0, or time_s not > induction_s.

    Source
    ------
    Decision limit: Currie 1968, Anal. Chem. 40, 586 (from memory). Cases: tests/cases/run_rate.json.
    """
    for name, value in (("before_nm", before_nm), ("after_nm", after_nm)):
        _require_not_negative(name, value)
    exposure = time_s - induction_s
    if not (math.isfinite(exposure) and exposure > 0):
        raise DomainError("time_s", time_s, f"time_s > induction_s = {induction_s}")
    u_loss = _u_difference(u_before_nm, u_after_nm)
    return _from_loss(before_nm - after_nm, u_loss, exposure)


def rate_of_line(fit: LineFit, longest_s: float) -> RunRate:
    """
    Rate of one run from its depth series (several times, one wafer or one lot): the slope of the line.

    A slope not above 1.645 u is an upper limit. `longest_s` is the longest time of the series, s, > 0.

    Raises
    ------
    DomainError
        `longest_s` not > 0.
    """
    if not longest_s > 0:
        raise DomainError("longest_s", longest_s, "longest_s > 0")
    slope, u = fit.slope_nm_per_s, fit.u_slope_nm_per_s
    if slope > DETECTION_QUANTILE * u:
        return RunRate(math.log(slope), u / slope, exposure_s=longest_s)
    limit = max(slope, 0.0) + DETECTION_QUANTILE * u
    return RunRate(None, limit_nm_per_s=limit if limit > 0 else None, exposure_s=longest_s)


def _from_loss(loss: float, u_loss: float | None, exposure: float) -> RunRate:
    if u_loss is None or u_loss == 0:
        # A stated uncertainty of 0 makes a loss of 0 a limit of 0, which nobody can measure.
        log_rate = math.log(loss / exposure) if loss > 0 else None
        u_log = 0.0 if u_loss == 0 and loss > 0 else None
        return RunRate(log_rate, u_log, loss_nm=loss, exposure_s=exposure)
    if loss > DETECTION_QUANTILE * u_loss:
        return RunRate(math.log(loss / exposure), u_loss / loss, loss_nm=loss, exposure_s=exposure)
    limit = (max(loss, 0.0) + DETECTION_QUANTILE * u_loss) / exposure
    return RunRate(None, limit_nm_per_s=limit, loss_nm=loss, exposure_s=exposure)


def _u_difference(u_before: float | None, u_after: float | None) -> float | None:
    for name, value in (("u_before_nm", u_before), ("u_after_nm", u_after)):
        if value is not None:
            _require_not_negative(name, value)
    if u_before is None or u_after is None:
        return None
    return math.hypot(u_before, u_after)


def _require_not_negative(name: str, value: float) -> None:
    if not (math.isfinite(value) and value >= 0):
        raise DomainError(name, value, f"{name} >= 0 and finite")
