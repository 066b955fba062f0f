"""How much faster a target goes than another film in one etch, with an interval."""

from __future__ import annotations

from dataclasses import dataclass

from builder.engine import DomainError, Rank, RateBand, RunRate, paired_selectivity, worst_rank
from builder.findings.computed import Computed
from builder.findings.own_rates import OwnRate
from builder.findings.plan.evidence import Evidence


@dataclass(frozen=True, slots=True)
class FoundSelectivity:
    """
    Rate of the target over rate of the other film, for the next run.

    `mid` and `hi` None: there is only a lower bound. `lo` None: only an upper one. `pairs` counts the
    wafers that carried both films; 0 where the two rates come from separate wafers or publications.
    """

    lo: float | None
    mid: float | None
    hi: float | None
    pairs: int
    rank: Rank


def recipe_selectivity(computed: Computed, etch_id: str, target: str, other: str) -> FoundSelectivity | None:
    """Return a recipe's selectivity: pair by pair where wafers carried both films, else from the rates."""
    own = computed.own[etch_id]
    if target in own and other in own:
        paired = _from_pairs(own[target], own[other], computed.confidence)
        if paired is not None:
            return paired
    return rate_selectivity(computed.known(etch_id, target), computed.known(etch_id, other))


def rate_selectivity(target: Evidence, other: Evidence) -> FoundSelectivity | None:
    """Return the selectivity of two separate rates, each end by the worst of both; None without a number."""
    t, o = target.band, other.band
    if t is None or o is None:
        return None
    lo = t.low / o.high if o.high and t.low > 0 else None
    hi = t.high / o.low if t.high is not None and o.low > 0 else None
    mid = _middle(t, o)
    if lo is None and hi is None:
        return None
    return FoundSelectivity(lo, mid, hi, 0, worst_rank((target.rank, other.rank)))


def _middle(target: RateBand, other: RateBand) -> float | None:
    if target.mid is None or not other.mid:
        return None
    return target.mid / other.mid


def _from_pairs(target: OwnRate, other: OwnRate, confidence: float) -> FoundSelectivity | None:
    pairs = _pairs(target, other)
    if not pairs:
        return None
    try:
        found = paired_selectivity(
            [one for one, _ in pairs], [two for _, two in pairs], target.spread, confidence
        )
    except DomainError:
        return None  # the pairs say nothing: no target on them shows a rate
    return FoundSelectivity(found.lo, found.mid, found.hi, len(pairs), Rank.OWN)


def _pairs(target: OwnRate, other: OwnRate) -> list[tuple[RunRate, RunRate]]:
    """Rates of both films on one wafer of one day, of runs in use."""
    by_wafer = {(run.date, run.rows[0].wafer): run.rate for run in other.used}
    return [
        (run.rate, by_wafer[key])
        for run in target.used
        if (key := (run.date, run.rows[0].wafer)) in by_wafer and run.rate.log_rate is not None
    ]
