"""One recipe, as facts of a plan: what it states, and what its own runs say."""

from __future__ import annotations

import datetime
from collections.abc import Iterable, Mapping, Sequence

from builder.findings.own_rates import OwnRate, at_confidence, films_run, own_rate
from builder.findings.plan.defaults import default_phi, defaults_of
from builder.findings.plan.facts import EtchFacts, LevelBand, MaskFact, OwnFact, RatioFact, Span, span_of
from builder.findings.plan.gather_safety import of_recipe, of_recipe_by_film
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.terms import Method, PublishedConditions

_ZERO_DEGC_K = 273.15
_NM_PER_UM = 1000.0


def etch_facts(records: LabRecords, etch: Etch, levels: Sequence[float], today: datetime.date) -> EtchFacts:
    etchant = records.etchants[etch.etchant]
    defaults = defaults_of(records.settings)
    own = {film: rate for film in films_run(records, etch) if (rate := own_rate(records, etch, film))}
    stated = None if etch.nonuniformity is None else etch.nonuniformity.number
    phi = default_phi(defaults, etch.method, gas_bubbles=bool(etchant.gas_bubbles))
    ratio = etch.undercut_ratio
    forbidden, cautions = of_recipe(records, etch)
    offset_s, transfer_s = _waits(etch, own)
    cycle = etch.seconds_per_cycle
    return EtchFacts(
        id=etch.id, name=etch.name, etchant=etch.etchant, method=etch.method, tool=etch.tool,
        status=etch.status, inherits=_inherits(etch), targets=etch.targets,
        phi=phi if stated is None else stated, offset_s=offset_s, transfer_s=transfer_s,
        overetch=0.0 if etch.overetch is None else etch.overetch.number,
        endpoint=etch.endpoint is not None, cooled=etch.cooling is not None,
        isotropic=bool(etchant.isotropic) if etch.isotropic is None else etch.isotropic,
        temperature=span_of(etch.temperature), cycle_s=None if cycle is None else cycle.number,
        ratio=None if ratio is None else RatioFact(
            low=ratio.low, mid=ratio.mid, high=ratio.high, basis=ratio.basis
        ),
        masks=tuple(
            MaskFact(film=mask.film, on=mask.on, longest_s=mask.longest_time_held.number)
            for mask in etch.masks
        ),
        gas=of_recipe_by_film(records, etch), forbidden=forbidden,
        cautions=cautions,
        own=_owns(records, own, levels, today),
        clearing=etch.clearing, if_not_cleared=etch.if_not_cleared,
    )  # fmt: skip


def _inherits(etch: Etch) -> bool:
    if etch.method in (Method.PLASMA, Method.CYCLIC):
        return etch.published_conditions is PublishedConditions.SAME
    return True


def _waits(etch: Etch, own: Mapping[str, OwnRate]) -> tuple[float, float]:
    """
    Return the offset of the clock and the time in which etching goes on after it, s.

    The offset is the wait before etching starts less what goes on in transfer. A depth series shows
    both in one, so it counts only where the recipe states neither.
    """
    if etch.induction is not None or etch.transfer_time is not None:
        induction = 0.0 if etch.induction is None else etch.induction.number
        transfer = 0.0 if etch.transfer_time is None else etch.transfer_time.number
        return induction - transfer, transfer
    fitted = [
        rate.induction_s for film in etch.targets if (rate := own.get(film)) and rate.induction_s is not None
    ]
    offset = fitted[0] if fitted else 0.0
    return offset, max(0.0, -offset)


def _owns(
    records: LabRecords, own: Mapping[str, OwnRate], levels: Sequence[float], today: datetime.date
) -> dict[str, OwnFact]:
    facts = ((film, _own(records, rate, levels, today)) for film, rate in own.items())
    return {film: fact for film, fact in facts if fact is not None}


def _own(records: LabRecords, rate: OwnRate, levels: Sequence[float], today: datetime.date) -> OwnFact | None:
    if rate.next_run is None:
        return None
    bands = []
    for level in levels:
        run = at_confidence(records, rate, level)
        assert run is not None
        bands.append(
            LevelBand(confidence=level, low=run.lo_nm_per_s, mid=run.mid_nm_per_s, high=run.hi_nm_per_s)
        )
    rows = [row for run in rate.used for row in run.rows]
    times = _span(row.time_s for row in rows)
    assert times is not None
    return OwnFact(
        levels=tuple(bands), runs=rate.next_run.n_runs, limits=rate.next_run.n_limits, times=times,
        limit_s=_limit_time(rate) if rate.next_run.n_runs == 0 else None,
        temperature=_span(
            None if row.temperature_degc is None else row.temperature_degc + _ZERO_DEGC_K for row in rows
        ),
        load_cm2=_span(row.load_cm2 for row in rows),
        window_nm=_span(None if row.window_um is None else row.window_um * _NM_PER_UM for row in rows),
        induction_s=rate.induction_s, stale_days=_stale_days(records, rate, today),
    )  # fmt: skip


def _stale_days(records: LabRecords, rate: OwnRate, today: datetime.date) -> int | None:
    age = min(((today - run.date).days for run in rate.used), default=0)
    return age if age > records.settings.stale_after_days else None


def _limit_time(rate: OwnRate) -> float:
    """Longest time, s, of the runs whose limit is the smallest: a greater limit says less for longer."""
    limits = [
        (run.rate.limit_nm_per_s, -max(row.time_s for row in run.rows))
        for run in rate.used
        if run.rate.limit_nm_per_s is not None
    ]
    return -min(limits)[1]


def _span(values: Iterable[float | None]) -> Span | None:
    known = [value for value in values if value is not None]
    return Span(low=min(known), high=max(known)) if known else None
