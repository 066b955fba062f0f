"""Where a recipe stands: proven or not, how old its newest run is, how many runs count, what troubles it."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date

from builder.findings.computed import Computed
from builder.findings.own_rates import OwnRate
from builder.findings.recipe_times import TargetTiming
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.terms import Status
from builder.views.number_text import NO_BREAK
from builder.views.words import STATUS_NAMES


@dataclass(frozen=True)
class Standing:
    """The word for a recipe's standing, what it rests on, and what a reader must know (`troubles`)."""

    status: str
    facts: tuple[str, ...]
    troubles: tuple[str, ...]


def standing(records: LabRecords, computed: Computed, etch: Etch, timing: TargetTiming) -> Standing:
    """Return the standing of a recipe, judged by the runs of its first target."""
    own = computed.own[etch.id].get(timing.film)
    return Standing(
        status=STATUS_NAMES[etch.status],
        facts=tuple(_facts(computed, etch, own)),
        troubles=tuple(_troubles(records, computed, etch, own, timing)),
    )


def runs_text(count: int) -> str:
    """Return a count of runs in words."""
    return "no run" if count == 0 else f"{count}{NO_BREAK}run{'' if count == 1 else 's'}"


def age_text(day: date, today: date) -> str:
    """Return how long before the records' day something was: a page is read on any other day."""
    days = (today - day).days
    if days == 0:
        return "the day of these records"
    return f"{days}{NO_BREAK}day{'' if days == 1 else 's'} before {today.isoformat()}"


def is_stale(records: LabRecords, computed: Computed, own: OwnRate | None) -> bool:
    """Tell whether the newest run of any series is older than the lab allows."""
    if own is None or own.last_date is None:
        return False
    return (computed.today - own.last_date).days > records.settings.stale_after_days


def _facts(computed: Computed, etch: Etch, own: OwnRate | None) -> Iterator[str]:
    if own is None or own.last_date is None:
        yield "no run of its target on record"
        return
    yield f"newest run {own.last_date.isoformat()}, {age_text(own.last_date, computed.today)}"
    since = f", since the {own.events[-1][1]} of {own.events[-1][0].isoformat()}" if own.events else ""
    yield f"{runs_text(len(own.used))} in the current series{since}"


def _troubles(
    records: LabRecords, computed: Computed, etch: Etch, own: OwnRate | None, timing: TargetTiming
) -> Iterator[str]:
    if etch.status is Status.RETIRED:
        yield f"Retired: {etch.retired_reason}"
    if etch.status is Status.DRAFT:
        yield "A draft: nobody has called it proven."
    if is_stale(records, computed, own):
        limit = int(records.settings.stale_after_days)
        yield f"Stale: its newest run is older than {limit}{NO_BREAK}days. Run a monitor wafer first."
    if own is not None and own.trend is not None and own.trend.significant:
        way = "up" if own.trend.slope > 0 else "down"
        yield f"Its rate drifts {way}: the interval stands at the end of the trend and is wider for it."
    if timing.known.conflict:
        yield "Its runs and the literature contradict each other beyond both intervals; the own runs count."
    if own is not None and len(own.used) == 1:
        yield "One run only: how the next one will differ is taken from the lab's other recipes."
