"""How long each film is exposed, and what it loses in that time."""

from __future__ import annotations

from dataclasses import dataclass

from builder.engine.evidence import RateBand
from builder.engine.timing import Cut, Schedule


@dataclass(frozen=True, slots=True)
class Exposure:
    """Exposure of a film, s: mild, likely (None: unknown), worst."""

    low_s: float
    mid_s: float | None
    high_s: float


@dataclass(frozen=True, slots=True)
class Span:
    """A length, nm: mild end, likely value, worst end. None is unknown, never 0."""

    low: float | None
    mid: float | None
    high: float | None


UNKNOWN_SPAN = Span(None, None, None)


def open_by_timer(plan: Schedule) -> Exposure | None:
    """A film that is open from the start is exposed until the latest stop."""
    if plan.latest_stop_s is None:
        return None
    return Exposure(plan.latest_stop_s, plan.latest_stop_s, plan.latest_stop_s)


def open_by_look(plan: Schedule, cut: Cut) -> Exposure | None:
    """A film open from the start, when the etch is stopped on seeing it clear."""
    if plan.clear_first_s is None or plan.clear_last_s is None:
        return None
    likely = None if plan.nominal_s is None else plan.nominal_s + cut.reaction_s
    return Exposure(plan.clear_first_s + cut.reaction_s, likely, plan.clear_last_s + cut.reaction_s)


def under_by_timer(plan: Schedule) -> Exposure | None:
    """
    The film below the target, when the etch is stopped by the latest stop.

    Worst: from the earliest opening to the stop. Mild: from the latest opening. Source:
    docs/methods/loss.md.
    """
    if plan.latest_stop_s is None or plan.open_first_s is None or plan.open_last_s is None:
        return None
    stop = plan.latest_stop_s
    likely = None if plan.open_mid_s is None else max(0.0, stop - plan.open_mid_s)
    return Exposure(max(0.0, stop - plan.open_last_s), likely, max(0.0, stop - plan.open_first_s))


def under_by_look(band: RateBand | None, plan: Schedule, cut: Cut) -> Exposure | None:
    """
    The film below the target, when the etch is stopped on seeing the last place clear.

    Only the unevenness within the wafer counts, h[(1+delta)/(1-phi) - (1-delta)/(1+phi)]/R,
    plus the time to react. A depth short of the whole film is stopped as by the timer.
    """
    if not cut.through or band is None or band.low <= 0:
        return under_by_timer(plan)
    spread_nm = cut.thickness_nm * (
        (1 + cut.tolerance) / (1 - cut.nonuniformity) - (1 - cut.tolerance) / (1 + cut.nonuniformity)
    )
    return Exposure(
        low_s=cut.reaction_s + (0.0 if band.high is None else spread_nm / band.high),
        mid_s=None if band.mid is None else cut.reaction_s + spread_nm / band.mid,
        high_s=cut.reaction_s + spread_nm / band.low,
    )


def below(
    exposure: Exposure, band: RateBand | None, thickness_nm: float, cut: Cut, *, porous: bool
) -> Exposure:
    """
    Exposure of the layer below a layer that is itself exposed.

    It starts when the upper layer is gone; at once where the upper layer lets the etchant
    through (`porous`) or where nothing bounds its rate. The upper film's own tolerance is
    taken as the cut's.
    """
    high = exposure.high_s
    if not porous and band is not None and band.high is not None:
        fastest = band.high * (1 + cut.nonuniformity)
        high = 0.0 if fastest <= 0 else max(0.0, high - thickness_nm * (1 - cut.tolerance) / fastest)
    slowest = 0.0 if band is None else band.low * (1 - cut.nonuniformity)
    low = 0.0 if slowest <= 0 else max(0.0, exposure.low_s - thickness_nm * (1 + cut.tolerance) / slowest)
    mid = None
    if exposure.mid_s is not None and band is not None and band.mid is not None and band.mid > 0:
        mid = max(0.0, exposure.mid_s - thickness_nm / band.mid)
    return Exposure(low, mid, high)


def loss(band: RateBand | None, exposure: Exposure | None, nonuniformity: float, faces: float = 1.0) -> Span:
    """
    Thickness lost, nm: [R_low (1 - phi), R, R_high (1 + phi)] times the exposure.

    `faces` is 2 for a film wet on both sides. Not cut off at the film's thickness: a loss
    beyond it says how far the film is from lasting.
    """
    if band is None or exposure is None:
        return UNKNOWN_SPAN
    mid = None
    if band.mid is not None and exposure.mid_s is not None:
        mid = band.mid * exposure.mid_s * faces
    high = None if band.high is None else band.high * (1 + nonuniformity) * exposure.high_s * faces
    return Span(band.low * (1 - nonuniformity) * exposure.low_s * faces, mid, high)


def undercut(ratio: Span, band: RateBand | None, plan: Schedule, cut: Cut) -> Span:
    """
    Sideways etch under one mask edge, nm, up to the latest stop.

    `ratio` is sideways over downward etch. The worst end is the fast end of the rate at the
    latest stop: the edge goes on moving where the film has long cleared.
    """
    if band is None or plan.latest_stop_s is None:
        return UNKNOWN_SPAN
    etching_s = max(0.0, plan.latest_stop_s - cut.offset_s)
    return Span(
        low=None if ratio.low is None else ratio.low * band.low * (1 - cut.nonuniformity) * etching_s,
        mid=None if ratio.mid is None or band.mid is None else ratio.mid * band.mid * etching_s,
        high=None
        if ratio.high is None or band.high is None
        else ratio.high * band.high * (1 + cut.nonuniformity) * etching_s,
    )
