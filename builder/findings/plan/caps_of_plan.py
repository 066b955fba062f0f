"""What keeps a whole plan from the word "holds", whatever its films: conditions that no run has seen."""

from __future__ import annotations

from collections.abc import Iterator

from builder.engine.plan_rules import RUN_SPAN
from builder.findings.plan.evidence import Evidence
from builder.findings.plan.exposures import Reaching
from builder.findings.plan.facts import OwnFact, Span
from builder.findings.plan.result import CapCode, Remark


def plan_caps(reach: Reaching, known: Evidence) -> Iterator[Remark]:
    """Yield the caps of a plan as a whole, but for those of couples; `known` is the target's evidence."""
    sample = reach.stage.sample
    if known.conflict and known.single:
        yield Remark(CapCode.CONFLICT)
    if sample.through_wafer and sample.carrier is None and not reach.stage.below:
        yield Remark(CapCode.THROUGH_WAFER)
    yield from _load_cap(reach)
    yield from _window_cap(reach)
    yield from _heat_cap(reach)
    if reach.facts.films[reach.stage.target.film].is_family:
        yield Remark(CapCode.FAMILY)


def windows_of_runs(reach: Reaching) -> Span | None:
    """Return the openings of the target's own runs, nm, where an opening's width changes the rate."""
    own = _own_of_target(reach)
    # A liquid etches a narrow opening as fast as a wide one; gas gets in and out of it more slowly.
    return None if own is None or reach.is_wet else own.window_nm


def _own_of_target(reach: Reaching) -> OwnFact | None:
    return reach.etching.own(reach.stage.target.film)


def _is_outside(value: float, runs: Span) -> bool:
    return not RUN_SPAN[0] * runs.low <= value <= RUN_SPAN[1] * runs.high


def _load_cap(reach: Reaching) -> Iterator[Remark]:
    sample, own = reach.stage.sample, _own_of_target(reach)
    loads = None if own is None else own.load_cm2
    if loads is not None and sample.load_cm2 is not None:
        if _is_outside(sample.load_cm2, loads):
            yield Remark(
                CapCode.LOAD, {"load_cm2": sample.load_cm2, "low_cm2": loads.low, "high_cm2": loads.high}
            )
    elif sample.load_cm2 is None and sample.carrier == reach.stage.target.film and not reach.is_wet:
        # A carrier of the target's own film eats most of the etchant: no run says how fast the piece goes.
        yield Remark(CapCode.CARRIER_LOAD, {"film": sample.carrier})


def _window_cap(reach: Reaching) -> Iterator[Remark]:
    window, runs = reach.stage.sample.window_nm, windows_of_runs(reach)
    if window is not None and runs is not None and _is_outside(window, runs):
        yield Remark(CapCode.WINDOW, {"window_nm": window, "low_nm": runs.low, "high_nm": runs.high})


def _heat_cap(reach: Reaching) -> Iterator[Remark]:
    """A limit on heat means something only for an etch whose temperature is known to be below it."""
    limit = reach.stage.sample.hottest_k
    at = reach.etching.temperature or reach.asked.temperature_k
    if limit is not None and (at is None or at.high > limit):
        yield Remark(CapCode.HEAT_LIMIT, {"limit_k": limit, "at_k": None if at is None else at.high})
