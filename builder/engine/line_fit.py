"""Depth against time: a straight line with an induction time, and the time to a depth."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from builder.engine.constants import LINE_MIN_TIMES
from builder.engine.errors import DomainError


@dataclass(frozen=True, slots=True)
class LineFit:
    """
    The line depth = intercept + slope * time, with its covariance (standard uncertainties, k = 1).

    `dof` is the number of points less 2. `rescaled`: the covariance rests on the scatter about the
    line instead of on stated uncertainties. `s_residual_nm` is that scatter (weighted points: of a
    point of unit weight, a pure number).
    """

    intercept_nm: float
    slope_nm_per_s: float
    var_intercept_nm2: float
    var_slope_nm2_per_s2: float
    cov_nm2_per_s: float
    chi2: float
    dof: int
    rescaled: bool
    s_residual_nm: float

    @property
    def u_intercept_nm(self) -> float:
        """Standard uncertainty of the intercept, nm."""
        return math.sqrt(self.var_intercept_nm2)

    @property
    def u_slope_nm_per_s(self) -> float:
        """Standard uncertainty of the slope, nm/s."""
        return math.sqrt(self.var_slope_nm2_per_s2)

    @property
    def induction_s(self) -> float:
        """
        Time at which the line crosses zero depth, s; negative when etching began before the clock.

        Never clipped: etching goes on while a wafer is carried to the rinse.
        """
        if self.slope_nm_per_s == 0:
            raise DomainError("slope_nm_per_s", 0.0, "a slope other than 0")
        return -self.intercept_nm / self.slope_nm_per_s

    @property
    def reduced_chi2(self) -> float:
        """Chi-squared over degrees of freedom; above about 2 the line or its uncertainties are wrong."""
        return self.chi2 / self.dof


@dataclass(frozen=True, slots=True)
class Prediction:
    """A predicted depth, nm, and its standard uncertainty, nm."""

    depth_nm: float
    u_nm: float


@dataclass(frozen=True, slots=True)
class TimeToDepth:
    """Time to a depth, s: value, first-order standard uncertainty, limits by inverse prediction."""

    time_s: float
    u_s: float
    lo_s: float
    hi_s: float


def fit_line(
    times_s: Sequence[float],
    depths_nm: Sequence[float],
    u_depth_nm: Sequence[float] | None,
    *,
    rescale: bool = False,
) -> LineFit:
    """
    Weighted least squares of depth against time, with an intercept.

    The origin is never forced: a delay before etching starts would then bias the rate. The points of
    one wafer share that wafer's rate, so the fit says nothing about the spread between runs.

    Parameters
    ----------
    times_s:
        Etch times, s, shape (n,), at least 3 of them distinct.
    depths_nm:
        Depths removed, nm, shape (n,); may be negative.
    u_depth_nm:
        Standard uncertainties of the depths, nm, each > 0; None when unknown: the scatter about the
        line then sets the covariance.
    rescale:
        Take the uncertainties as relative weights only, and let the scatter set the scale.

    Raises
    ------
    DomainError
        Lengths differ, a value is not finite, an uncertainty is not > 0, or fewer than 3 distinct times.

    Source
    ------
    Bevington, Data Reduction and Error Analysis; Press et al., Numerical Recipes (both from memory).
    Cases: tests/cases/line_fit.json.
    """
    time, depth, weight = _checked(times_s, depths_nm, u_depth_nm)
    # Sums about the weighted means: the textbook sums lose half the digits for late times.
    total = float(weight.sum())
    mean_time = float((weight * time).sum()) / total
    mean_depth = float((weight * depth).sum()) / total
    centred = time - mean_time
    sum_tt = float((weight * centred**2).sum())
    slope = float((weight * centred * (depth - mean_depth)).sum()) / sum_tt
    intercept = mean_depth - slope * mean_time
    residual = depth - mean_depth - slope * centred
    chi2 = float((weight * residual**2).sum())
    dof = len(time) - 2
    rescaled = rescale or u_depth_nm is None
    scale = chi2 / dof if rescaled else 1.0
    return LineFit(
        intercept_nm=intercept,
        slope_nm_per_s=slope,
        var_intercept_nm2=scale * (1 / total + mean_time**2 / sum_tt),
        var_slope_nm2_per_s2=scale / sum_tt,
        cov_nm2_per_s=-scale * mean_time / sum_tt,
        chi2=chi2,
        dof=dof,
        rescaled=rescaled,
        s_residual_nm=math.sqrt(chi2 / dof),
    )


def mean_depth_at(fit: LineFit, time_s: float) -> Prediction:
    """
    Depth of the mean line at a time, s; the covariance term is what keeps its uncertainty honest.

    Source: JCGM 100:2008, H.3. Cases: tests/cases/line_fit.json.
    """
    variance = _line_variance(fit, time_s)
    return Prediction(fit.intercept_nm + fit.slope_nm_per_s * time_s, math.sqrt(max(variance, 0.0)))


def new_depth_at(fit: LineFit, time_s: float, u_new_nm: float) -> Prediction:
    """
    Depth of one new point at a time, s, that scatters by `u_new_nm` (nm, >= 0) about the line.

    Raises DomainError if `u_new_nm` is negative. For an unweighted fit the scatter is `fit.s_residual_nm`.
    """
    _require_not_negative("u_new_nm", u_new_nm)
    mean = mean_depth_at(fit, time_s)
    return Prediction(mean.depth_nm, math.hypot(mean.u_nm, u_new_nm))


def time_to_depth(
    fit: LineFit, depth_nm: float, quantile: float, *, u_new_nm: float = 0.0, tau_nm_per_s: float = 0.0
) -> TimeToDepth:
    """
    Time at which the line reaches a depth.

    Parameters
    ----------
    depth_nm:
        Depth, nm.
    quantile:
        Quantile of the two-sided limits, > 0 (1.96 for 95 % with known uncertainties).
    u_new_nm:
        Repeatability of a new run's depth, nm, >= 0.
    tau_nm_per_s:
        Spread of the rate between runs, nm/s, >= 0; the points of one wafer cannot show it.

    Returns
    -------
    :
        Time, its first-order uncertainty, and the Fieller limits, s. The limits are not symmetric.

    Raises
    ------
    DomainError
        The slope is not > 0, or is not distinguishable from 0 at this quantile: the limits are then
        unbounded and there is no latest time to give.

    Source
    ------
    Fieller 1954; Draper & Smith, inverse prediction (both from memory). Cases: tests/cases/line_fit.json.
    """
    _require_not_negative("u_new_nm", u_new_nm)
    _require_not_negative("tau_nm_per_s", tau_nm_per_s)
    if not quantile > 0:
        raise DomainError("quantile", quantile, "quantile > 0")
    slope = fit.slope_nm_per_s
    var_slope = fit.var_slope_nm2_per_s2 + tau_nm_per_s**2
    if not slope > 0 or slope**2 <= quantile**2 * var_slope:
        raise DomainError("slope_nm_per_s", slope, f"slope > {quantile * math.sqrt(var_slope):.6g} nm/s")
    rise = depth_nm - fit.intercept_nm
    time = rise / slope
    variance = (_line_variance(fit, time) + u_new_nm**2 + (tau_nm_per_s * time) ** 2) / slope**2
    q2 = quantile**2
    square = slope**2 - q2 * var_slope
    half_linear = slope * rise + q2 * fit.cov_nm2_per_s
    constant = rise**2 - q2 * (fit.var_intercept_nm2 + u_new_nm**2)
    # Bounded limits have real roots but for rounding when every uncertainty is 0.
    root = math.sqrt(max(half_linear**2 - square * constant, 0.0))
    return TimeToDepth(
        time_s=time,
        u_s=math.sqrt(max(variance, 0.0)),
        lo_s=(half_linear - root) / square,
        hi_s=(half_linear + root) / square,
    )


def _checked(
    times: Sequence[float], depths: Sequence[float], u_depth: Sequence[float] | None
) -> tuple[NDArray[np.float64], NDArray[np.float64], NDArray[np.float64]]:
    time = np.asarray(times, dtype=np.float64)
    depth = np.asarray(depths, dtype=np.float64)
    u = np.ones_like(time) if u_depth is None else np.asarray(u_depth, dtype=np.float64)
    if not len(time) == len(depth) == len(u):
        raise DomainError("lengths", (len(time), len(depth), len(u)), "equal lengths")
    for name, values in (("times_s", time), ("depths_nm", depth), ("u_depth_nm", u)):
        if not np.isfinite(values).all():
            raise DomainError(name, values.tolist(), "finite numbers")
    if len(np.unique(time)) < LINE_MIN_TIMES:
        raise DomainError("times_s", time.tolist(), f"at least {LINE_MIN_TIMES} distinct times")
    if not (u > 0).all():
        raise DomainError("u_depth_nm", u.tolist(), "u > 0")
    return time, depth, 1 / u**2


def _line_variance(fit: LineFit, time_s: float) -> float:
    return fit.var_intercept_nm2 + time_s**2 * fit.var_slope_nm2_per_s2 + 2 * time_s * fit.cov_nm2_per_s


def _require_not_negative(name: str, value: float) -> None:
    if not value >= 0:
        raise DomainError(name, value, f"{name} >= 0")
