"""When a target clears: earliest, latest, nominal; the first look and the latest stop."""

from __future__ import annotations

from dataclasses import dataclass
from enum import StrEnum

from builder.engine.evidence import RateBand
from builder.engine.plan_rules import FIRST_LOOK_FRACTION, TIMED_RATIO


class Mode(StrEnum):
    """How the etch is ended."""

    RUN_TO_TIME = "run-to-time"
    LOOK_AND_FINISH = "look-and-finish"


@dataclass(frozen=True, slots=True)
class Cut:
    """
    What is to be removed and how evenly the etch removes it.

    `depth_nm`: depth asked for. `thickness_nm`: thickness of the target film, >= depth.
    `tolerance`: half-width of the thickness as a fraction. `nonuniformity`: half-range of
    the rate over the wafer as a fraction, < 1. `offset_s`: induction plus transfer, s, may
    be negative. `overetch`: fraction added after the latest clearing time. `reaction_s`:
    time from seeing the end to stopping, s. `through`: is the whole film removed?
    """

    depth_nm: float
    thickness_nm: float
    tolerance: float
    nonuniformity: float
    offset_s: float
    overetch: float
    reaction_s: float
    through: bool


@dataclass(frozen=True, slots=True)
class Schedule:
    """
    Times on the clock, s. All None where the rate is unknown.

    `clear_first_s`, `clear_last_s`: first and last place to reach the depth (no overetch).
    `open_first_s`, `open_mid_s`, `open_last_s`: when the layer below the *whole* film is
    laid bare at the earliest, likely, and latest (they differ from clearing when the depth
    is less than the film); `open_mid_s` and `open_last_s` are None where no end is known.
    """

    nominal_s: float | None
    clear_first_s: float | None
    clear_last_s: float | None
    first_look_s: float | None
    latest_stop_s: float | None
    open_first_s: float | None
    open_mid_s: float | None
    open_last_s: float | None

    @property
    def known(self) -> bool:
        """Is there a latest stop, so that losses can be computed?"""
        return self.latest_stop_s is not None


UNKNOWN_SCHEDULE = Schedule(None, None, None, None, None, None, None, None)


def schedule(band: RateBand | None, cut: Cut) -> Schedule:
    """
    Clearing times, first look and latest stop for one target.

    t_first = h(1 - delta) / (R_high (1 + phi)) and t_last = h(1 + delta) / (R_low (1 - phi)),
    each plus the offset and never below 0; the ends of a rate interval are inverted, not
    propagated to first order. Without a high end the first look is at once. Without a
    positive low end no latest stop exists, and everything is unknown.

    Source: docs/methods/time.md.
    """
    if band is None or band.low <= 0:
        return UNKNOWN_SCHEDULE
    tolerance = cut.tolerance if cut.through else 0.0
    last = _slow(cut.depth_nm * (1 + tolerance), band, cut)
    first = _fast(cut.depth_nm * (1 - tolerance), band, cut)
    stop = max(0.0, (last - cut.offset_s) * (1 + cut.overetch) + cut.offset_s)
    return Schedule(
        nominal_s=_likely(cut.depth_nm, band, cut),
        clear_first_s=max(0.0, first),
        clear_last_s=max(0.0, last),
        first_look_s=FIRST_LOOK_FRACTION * max(0.0, first),
        latest_stop_s=stop,
        open_first_s=max(0.0, _fast(cut.thickness_nm * (1 - cut.tolerance), band, cut)),
        open_mid_s=_likely(cut.thickness_nm, band, cut),
        open_last_s=max(0.0, _slow(cut.thickness_nm * (1 + cut.tolerance), band, cut)),
    )


def end_mode(plan: Schedule, *, holds_by_timer: bool, endpoint: bool) -> Mode | None:
    """Run to time when the overetch is harmless, the clearing span is narrow, or the tool sees the end."""
    if plan.clear_first_s is None or plan.clear_last_s is None:
        return None
    narrow = plan.clear_first_s > 0 and plan.clear_last_s <= TIMED_RATIO * plan.clear_first_s
    return Mode.RUN_TO_TIME if holds_by_timer or endpoint or narrow else Mode.LOOK_AND_FINISH


def _fast(depth_nm: float, band: RateBand, cut: Cut) -> float:
    """Time of the fastest place; 0 where no high end is known."""
    if band.high is None:
        return 0.0
    return depth_nm / (band.high * (1 + cut.nonuniformity)) + cut.offset_s


def _slow(depth_nm: float, band: RateBand, cut: Cut) -> float:
    return depth_nm / (band.low * (1 - cut.nonuniformity)) + cut.offset_s


def _likely(depth_nm: float, band: RateBand, cut: Cut) -> float | None:
    return None if band.mid is None else max(0.0, depth_nm / band.mid + cut.offset_s)
