"""A recipe's own runs of one film: rate by rate, the current series, and the next run's interval."""

from __future__ import annotations

import datetime
import math
import statistics
from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field
from enum import StrEnum

from builder.engine import (
    DomainError,
    LineFit,
    NextRun,
    RunRate,
    Spread,
    Trend,
    fit_line,
    predict_in_series,
    rate_of_line,
    run_rate,
)
from builder.engine.plan_rules import CLEAR_GAIN, RUN_SPAN
from builder.findings.spread_groups import spread_group, spread_in_force
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.runs import Run

_LINE_TIMES = 3
"""Distinct times from which a line is fitted; two times leave its quality unknown."""


class LeftOut(StrEnum):
    """Why a run does not enter the next-run interval."""

    EARLIER_SERIES = "earlier-series"
    OTHER_LOAD = "other-load"
    OTHER_WINDOW = "other-window"
    SAYS_NOTHING = "says-nothing"


@dataclass(frozen=True, slots=True)
class OwnRun:
    """One run: its rows (several times are a depth series), its rate, and why it is left out, if it is."""

    rows: tuple[Run, ...]
    rate: RunRate
    fit: LineFit | None
    left_out: LeftOut | None

    @property
    def date(self) -> datetime.date:
        """Day of the run."""
        return self.rows[0].date


@dataclass(frozen=True, slots=True)
class OwnRate:
    """
    What a recipe's runs say of one film.

    `next_run` None: no run of the current series says anything. `induction_s` is fitted from depth
    series of the current series; None where there is none. `events` are (day, words), oldest first.
    """

    etch: str
    film: str
    runs: tuple[OwnRun, ...]
    events: tuple[tuple[datetime.date, str], ...]
    group: str
    spread: Spread
    next_run: NextRun | None
    trend: Trend | None
    induction_s: float | None
    positions: tuple[float, ...] = field(default=())

    @property
    def used(self) -> tuple[OwnRun, ...]:
        """The runs that enter the interval, oldest first."""
        return tuple(run for run in self.runs if run.left_out is None)

    @property
    def last_date(self) -> datetime.date | None:
        """Day of the newest run of any series; None without runs."""
        return max((run.date for run in self.runs), default=None)


def own_rate(records: LabRecords, etch: Etch, film: str, confidence: float | None = None) -> OwnRate | None:
    """Return what the recipe's runs say of a film at the lab's confidence; None if it has no runs of it."""
    rows = [run for run in records.runs.get(etch.id, ()) if run.film == film]
    if not rows:
        return None
    events = _events(records.runs[etch.id], film)
    runs = _judged(_grouped(etch, film, rows), _series_start(events))
    group = spread_group(etch)
    spread = spread_in_force(records, group, etch.id)
    used = [run for run in runs if run.left_out is None]
    positions = _positions(used)
    next_run, trend = _predicted(records, used, positions, spread, confidence)
    return OwnRate(
        etch=etch.id, film=film, runs=tuple(runs), events=tuple(events), group=group, spread=spread,
        next_run=next_run, trend=trend, induction_s=_induction(used), positions=tuple(positions),
    )  # fmt: skip


def at_confidence(records: LabRecords, own: OwnRate, confidence: float) -> NextRun | None:
    """Return the next-run interval of the same runs at another confidence."""
    return _predicted(records, own.used, own.positions, own.spread, confidence)[0]


def films_run(records: LabRecords, etch: Etch) -> tuple[str, ...]:
    """Return the films that a recipe has runs of, its targets first."""
    seen = dict.fromkeys(run.film for run in records.runs.get(etch.id, ()))
    return tuple(sorted(seen, key=lambda film: (film not in etch.targets, film)))


def _events(rows: Iterable[Run], film: str) -> list[tuple[datetime.date, str]]:
    """Events of the whole recipe; a new film lot starts a new series of that film alone."""
    return sorted(
        (row.date, row.event)
        for row in rows
        if row.event and (row.film == film or "lot" not in row.event.split())
    )


def _series_start(events: Sequence[tuple[datetime.date, str]]) -> datetime.date | None:
    return events[-1][0] if events else None


def _grouped(
    etch: Etch, film: str, rows: Iterable[Run]
) -> list[tuple[tuple[Run, ...], RunRate, LineFit | None]]:
    by_wafer: dict[tuple[datetime.date, str], list[Run]] = {}
    for row in rows:
        by_wafer.setdefault((row.date, row.wafer), []).append(row)
    induction_s = _wait(etch, film)
    return [
        (tuple(wafer), *_rate_of(wafer, induction_s))
        for _, wafer in sorted(by_wafer.items(), key=lambda item: item[0])
    ]


def _wait(etch: Etch, film: str) -> float:
    """Time to take off a run's: the wait before a target is etched, less what goes on in transfer, s."""
    transfer = 0.0 if etch.transfer_time is None else etch.transfer_time.number
    waits = etch.induction is not None and film in etch.targets
    return (etch.induction.number if waits and etch.induction is not None else 0.0) - transfer


def _rate_of(wafer: Sequence[Run], induction_s: float) -> tuple[RunRate, LineFit | None]:
    times = [row.time_s for row in wafer]
    if len(set(times)) >= _LINE_TIMES:
        uncertainties = [math.hypot(row.u_nm, row.u_nm) for row in wafer]
        depths = [row.before_nm - row.after_nm for row in wafer]
        weights = None if min(uncertainties) == 0 else uncertainties
        fit = fit_line(times, depths, weights)
        if -fit.slope_nm_per_s > CLEAR_GAIN * fit.u_slope_nm_per_s:
            return RunRate(None), fit
        return rate_of_line(fit, max(times)), fit
    longest = max(wafer, key=lambda row: row.time_s)
    if longest.after_nm - longest.before_nm > CLEAR_GAIN * math.hypot(longest.u_nm, longest.u_nm):
        # A film that grew, or a row with its readings exchanged, is no sign that nothing was lost.
        return RunRate(None), None
    try:
        rate = run_rate(
            longest.before_nm, longest.after_nm, longest.time_s, longest.u_nm, longest.u_nm, induction_s
        )
    except DomainError:
        # A run shorter than the induction time says nothing; the records' check reports it.
        return RunRate(None), None
    return rate, None


def _judged(
    grouped: Sequence[tuple[tuple[Run, ...], RunRate, LineFit | None]], start: datetime.date | None
) -> list[OwnRun]:
    current = [rows[0] for rows, _, _ in grouped if start is None or rows[0].date >= start]
    load = _middle(row.load_cm2 for row in current)
    window = _middle(row.window_um for row in current)
    return [
        OwnRun(rows, rate, fit, _left_out(rows[0], rate, start, load, window)) for rows, rate, fit in grouped
    ]


def _left_out(
    row: Run, rate: RunRate, start: datetime.date | None, load: float | None, window: float | None
) -> LeftOut | None:
    if start is not None and row.date < start:
        return LeftOut.EARLIER_SERIES
    if _is_far(row.load_cm2, load):
        return LeftOut.OTHER_LOAD
    if _is_far(row.window_um, window):
        return LeftOut.OTHER_WINDOW
    if rate.log_rate is None and rate.limit_nm_per_s is None:
        return LeftOut.SAYS_NOTHING
    return None


def _middle(values: Iterable[float | None]) -> float | None:
    known = [value for value in values if value is not None]
    # The lower of two middle values: one that some run really had.
    return statistics.median_low(known) if known else None


def _is_far(value: float | None, middle: float | None) -> bool:
    if value is None or middle is None:
        return False
    return not RUN_SPAN[0] * middle <= value <= RUN_SPAN[1] * middle


def _positions(used: Sequence[OwnRun]) -> list[float]:
    days = [float(run.date.toordinal()) for run in used]
    if len(set(days)) == len(days):
        return [day - days[0] for day in days]
    return [float(place) for place in range(len(used))]


def _predicted(
    records: LabRecords,
    used: Sequence[OwnRun],
    positions: Sequence[float],
    spread: Spread,
    confidence: float | None,
) -> tuple[NextRun | None, Trend | None]:
    if not used:
        return None, None
    gauge = records.settings.gauge_error
    u_gauge = 0.0 if gauge is None else gauge.relative.number
    level = records.settings.confidence if confidence is None else confidence
    return predict_in_series([run.rate for run in used], positions, spread, level, u_gauge)


def _induction(used: Iterable[OwnRun]) -> float | None:
    times = [run.fit.induction_s for run in used if run.fit is not None and run.rate.log_rate is not None]
    return statistics.fmean(times) if times else None
