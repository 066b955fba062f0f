"""Rates as intervals, and the envelope of published values for one film in one etchant."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from enum import StrEnum

from builder.engine.plan_rules import UNTESTED_LIMIT_S


@dataclass(frozen=True, slots=True)
class RateBand:
    """
    A rate interval, nm/s, at a stated confidence.

    `low` is 0 where only an upper limit is known; `mid` is None where nothing says what is
    likely; `high` is None where only a lower limit is known. Unknown is None, never 0.
    """

    low: float
    mid: float | None
    high: float | None


@dataclass(frozen=True, slots=True)
class LimitedBand:
    """A rate band, and the longest exposure (s) for which its high end was tested (None: any)."""

    band: RateBand
    limit_time_s: float | None


class PublishedKind(StrEnum):
    """What a published row says: a value, a span, or one end."""

    VALUE = "value"
    UPPER = "upper"
    LOWER = "lower"


@dataclass(frozen=True, slots=True)
class PublishedValue:
    """
    One published rate for one film in one etchant, nm/s.

    `sigma_log` is the standard uncertainty of ln(rate) when the value is used on another
    bench. `tested_time_s` belongs to upper limits: how long the film was watched.
    """

    kind: PublishedKind
    low: float | None
    high: float | None
    sigma_log: float
    tested_time_s: float | None = None


def envelope(values: Sequence[PublishedValue], quantile: float) -> LimitedBand | None:
    """
    Envelope of published values, each widened by its own spread.

    Parameters
    ----------
    values:
        Published values of one film in one etchant at one temperature; the same fact twice
        counts once.
    quantile:
        One-sided normal quantile, > 0 (1.645 for a confidence of 0.90).

    Returns
    -------
    :
        Low end: least widened low end (0 with any upper limit). High end: greatest widened
        high end, or the upper limit as printed; None with any lower limit. Middle: geometric
        mean of the unwidened values. None for no values.

    Source
    ------
    docs/methods/evidence.md. An envelope, not a mean: two laboratories that disagree are not
    two readings of one truth.
    """
    distinct = tuple(dict.fromkeys(values))
    if not distinct:
        return None
    lows = [_low_end(value, quantile) for value in distinct]
    highs = [_high_end(value, quantile) for value in distinct]
    known_highs = [high for high in highs if high is not None]
    high = max(known_highs) if len(known_highs) == len(highs) else None
    band = RateBand(low=min(lows), mid=_geometric_middle(distinct), high=high)
    return LimitedBand(band, _limit_time(distinct))


def widest(bands: Sequence[RateBand]) -> RateBand:
    """Envelope of whole bands (members of a family): the middle is the geometric mean where all have one."""
    highs = [band.high for band in bands if band.high is not None]
    mids = [band.mid for band in bands if band.mid is not None]
    all_mids = len(mids) == len(bands) and all(mid > 0 for mid in mids)
    return RateBand(
        low=min(band.low for band in bands),
        mid=math.exp(sum(map(math.log, mids)) / len(mids)) if all_mids else None,
        high=max(highs) if len(highs) == len(bands) else None,
    )


def _low_end(value: PublishedValue, quantile: float) -> float:
    if value.kind is PublishedKind.UPPER or value.low is None:
        return 0.0
    return value.low * math.exp(-quantile * value.sigma_log)


def _high_end(value: PublishedValue, quantile: float) -> float | None:
    if value.kind is PublishedKind.LOWER or value.high is None:
        return None
    if value.kind is PublishedKind.UPPER:
        return value.high
    return value.high * math.exp(quantile * value.sigma_log)


def _geometric_middle(values: Sequence[PublishedValue]) -> float | None:
    logs = [
        (math.log(value.low) + math.log(value.high)) / 2
        for value in values
        if value.kind is PublishedKind.VALUE and value.low and value.high
    ]
    return math.exp(sum(logs) / len(logs)) if logs else None


def _limit_time(values: Sequence[PublishedValue]) -> float | None:
    """
    A high end that is a printed limit holds only as long as somebody watched.

    Compared with values as printed, not as widened: asking for more confidence must not lift the limit.
    """
    limits = [value for value in values if value.kind is PublishedKind.UPPER and value.high is not None]
    top = max((value.high for value in limits if value.high is not None), default=0.0)
    measured = max(
        (value.high for value in values if value.kind is PublishedKind.VALUE and value.high is not None),
        default=0.0,
    )
    times = [
        UNTESTED_LIMIT_S if value.tested_time_s is None else value.tested_time_s
        for value in limits
        if value.high == top
    ]
    return min(times) if times and top >= measured else None
