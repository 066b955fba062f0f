"""The interval in which the next run's rate is expected: the planning number of a recipe."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace
from enum import StrEnum

from builder.engine.errors import DomainError
from builder.engine.quantiles import two_sided_t
from builder.engine.run_rate import RunRate
from builder.engine.spread import Spread, moderated


class NextRunKind(StrEnum):
    """What an interval rests on."""

    RUNS = "runs"
    SINGLE = "single"
    LIMITS = "limits"
    MIXED = "mixed"


@dataclass(frozen=True, slots=True)
class NextRun:
    """
    Two-sided prediction interval for the next run's ln(rate), rate in nm/s.

    `log_lo` is None when nothing bounds the rate from below, `log_mid` when nothing says what is
    likely. `s_tilde` is the moderated standard deviation, `s_own` the recipe's own (None below two
    runs), `df` the degrees of freedom of the interval. `share_own` and `share_lab` add up to 1: how
    much of the moderated variance's weight is the recipe's own. `tau` is the spread left after the
    measurement's part `mean_u2` (None: unknown for every run) is taken off, `sum_w` the weight of the
    mean; both None without measured runs. `n_unknown` counts runs that say nothing.
    """

    log_lo: float | None
    log_mid: float | None
    log_hi: float
    df: float
    s_tilde: float
    s_own: float | None
    n_runs: int
    n_limits: int
    n_unknown: int
    share_own: float
    share_lab: float
    tau: float | None
    sum_w: float | None
    mean_u2: float | None
    kind: NextRunKind

    @property
    def lo_nm_per_s(self) -> float:
        """Low end, nm/s; 0 when nothing bounds the rate from below (a rate is never negative)."""
        return 0.0 if self.log_lo is None else math.exp(self.log_lo)

    @property
    def mid_nm_per_s(self) -> float | None:
        """Middle, nm/s; None when unknown."""
        return None if self.log_mid is None else math.exp(self.log_mid)

    @property
    def hi_nm_per_s(self) -> float:
        """High end, nm/s."""
        return math.exp(self.log_hi)


@dataclass(frozen=True, slots=True)
class _Sorted:
    logs: list[float]
    u2: list[float | None]
    log_limits: list[float]
    n_unknown: int


def predict_next_run(
    runs: Sequence[RunRate], spread: Spread, confidence: float, u_gauge_log: float = 0.0
) -> NextRun:
    """
    Prediction interval for the rate the next run will show.

    Measured runs: a Student t interval about the weighted mean of ln(rate), its spread moderated
    across the lab; variance tau^2 + mean u^2 + 1 / sum w + u_gauge^2. It is not the interval of a mean.

    Only limits: the smallest limit, widened by sqrt(2) q s0 as a single run would be; no low end and
    no middle. Mixed: the high end is the greater of the measured runs' high end and every limit, so it
    never falls when a limit is added or raised; the low end is that of the measured runs, and is given
    up (None) where a limit, or a run without any visible loss, lies below it.

    Parameters
    ----------
    runs:
        Runs of one recipe and film in one series. A run of unknown measurement uncertainty is taken
        to have the mean of the known ones.
    spread:
        The lab's spread for the method.
    confidence:
        Two-sided, 0 < confidence < 1; the high end is exceeded with probability (1 - confidence) / 2.
    u_gauge_log:
        Relative standard uncertainty of the gauge shared by all runs, >= 0. It enters once: no number
        of runs averages it away.

    Raises
    ------
    DomainError
        No run says anything, confidence outside (0, 1), or a negative or non-finite uncertainty.

    Source
    ------
    Moderated variance: Smyth 2004 (from memory). Coverage: bench/coverage.py.
    Cases: tests/cases/next_run.json.
    """
    if not 0 < confidence < 1:
        raise DomainError("confidence", confidence, "0 < confidence < 1")
    if not 0 <= u_gauge_log < math.inf:
        raise DomainError("u_gauge_log", u_gauge_log, "finite and >= 0")
    parts = _sort(runs)
    if parts.logs:
        return _with_limits(_from_measured(parts, spread, confidence, u_gauge_log), parts)
    if parts.log_limits:
        return _from_limits(parts, spread, confidence, u_gauge_log)
    raise DomainError("runs", len(runs), "at least one run with a rate or a limit")


def _sort(runs: Sequence[RunRate]) -> _Sorted:
    parts = _Sorted([], [], [], 0)
    n_unknown = 0
    for run in runs:
        if run.log_rate is not None:
            if not math.isfinite(run.log_rate):
                raise DomainError("log_rate", run.log_rate, "finite")
            if run.u_log is not None and not 0 <= run.u_log < math.inf:
                raise DomainError("u_log", run.u_log, "finite and >= 0")
            parts.logs.append(run.log_rate)
            parts.u2.append(None if run.u_log is None else run.u_log**2)
        elif run.limit_nm_per_s is not None:
            if not 0 < run.limit_nm_per_s < math.inf:
                raise DomainError("limit_nm_per_s", run.limit_nm_per_s, "finite and > 0")
            parts.log_limits.append(math.log(run.limit_nm_per_s))
        else:
            n_unknown += 1
    return _Sorted(parts.logs, parts.u2, parts.log_limits, n_unknown)


def _from_measured(parts: _Sorted, spread: Spread, confidence: float, u_gauge: float) -> NextRun:
    logs = parts.logs
    n = len(logs)
    s2_own = sample_variance(logs)
    s2, df = moderated(s2_own, n - 1, spread)
    known = [u2 for u2 in parts.u2 if u2 is not None]
    mean_u2 = math.fsum(known) / len(known) if known else None
    typical_u2 = mean_u2 or 0.0
    tau2 = max(0.0, s2 - typical_u2)
    weights = _weights([typical_u2 if u2 is None else u2 for u2 in parts.u2], tau2, typical_u2)
    sum_w = math.fsum(weights)
    mid = math.fsum(w * x for w, x in zip(weights, logs, strict=True)) / sum_w
    half = two_sided_t(confidence, df) * math.sqrt(tau2 + typical_u2 + 1 / sum_w + u_gauge**2)
    share_own = 0.0 if math.isinf(spread.d0) else (n - 1) / (spread.d0 + n - 1)
    return NextRun(
        log_lo=mid - half, log_mid=mid, log_hi=mid + half, df=df, s_tilde=math.sqrt(s2),
        s_own=None if s2_own is None else math.sqrt(s2_own),
        n_runs=n, n_limits=len(parts.log_limits), n_unknown=parts.n_unknown,
        share_own=share_own, share_lab=1 - share_own, tau=math.sqrt(tau2), sum_w=sum_w, mean_u2=mean_u2,
        kind=NextRunKind.SINGLE if n == 1 else NextRunKind.RUNS,
    )  # fmt: skip


def _weights(u2: Sequence[float], tau2: float, typical_u2: float) -> list[float]:
    variances = [tau2 + value for value in u2]
    if min(variances) == 0:
        # A run stated to be exact, and no spread between runs: it would take all the weight there is.
        return [1 / typical_u2] * len(variances)
    return [1 / variance for variance in variances]


def _with_limits(measured: NextRun, parts: _Sorted) -> NextRun:
    if not parts.log_limits and not parts.n_unknown:
        return measured
    low = measured.log_lo
    contradicted = low is not None and any(limit < low for limit in parts.log_limits)
    return replace(
        measured,
        log_lo=None if contradicted or parts.n_unknown else low,
        log_hi=max([measured.log_hi, *parts.log_limits]),
        kind=NextRunKind.MIXED,
    )


def _from_limits(parts: _Sorted, spread: Spread, confidence: float, u_gauge: float) -> NextRun:
    widening = two_sided_t(confidence, spread.d0) * math.sqrt(2 * spread.s0**2 + u_gauge**2)
    return NextRun(
        log_lo=None, log_mid=None, log_hi=min(parts.log_limits) + widening, df=spread.d0, s_tilde=spread.s0,
        s_own=None, n_runs=0, n_limits=len(parts.log_limits), n_unknown=parts.n_unknown,
        share_own=0.0, share_lab=1.0, tau=None, sum_w=None, mean_u2=None, kind=NextRunKind.LIMITS,
    )  # fmt: skip


def sample_variance(values: Sequence[float]) -> float | None:
    """Sample variance about the mean with n - 1 in the denominator; None below two values."""
    n = len(values)
    if n < 2:
        return None
    mean = math.fsum(values) / n
    return math.fsum((value - mean) ** 2 for value in values) / (n - 1)
