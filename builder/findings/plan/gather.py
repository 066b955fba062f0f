"""The facts of a plan, gathered from the records of a lab."""

from __future__ import annotations

import datetime
import math
from collections.abc import Iterable, Mapping, Sequence
from typing import TypeVar

from builder.checking.rules_safety_meetings import THICK_ORGANIC_NM, bond_findings
from builder.engine import Allowance, PublishedKind, Rank
from builder.findings.own_rates import OwnRate, at_confidence, films_run, own_rate
from builder.findings.plan.facts import (
    FORMAT,
    CoupleFact,
    Defaults,
    EtchantFacts,
    EtchFacts,
    FilmFacts,
    GasFact,
    LevelBand,
    MaskFact,
    OwnFact,
    PlanFacts,
    PublishedFact,
    RatioFact,
    SaidFact,
    Span,
)
from builder.findings.safety import cautions_of, film_gas, hazard_score
from builder.records.etchants import Etchant
from builder.records.etches import Etch
from builder.records.films import Film
from builder.records.lab import LabRecords
from builder.records.published import PublishedRate, Statement
from builder.records.quantities import Form, Quantity
from builder.records.settings import LabSettings
from builder.records.terms import (
    Effect,
    Method,
    Origin,
    PublishedConditions,
    RateKind,
    SigmaClass,
)
from builder.records.unit_table import Dimension

LEVELS = (0.80, 0.90, 0.95, 0.99)
"""Two-sided confidences at which intervals are stored."""

_ZERO_DEGC_K = 273.15

E = TypeVar("E", PublishedRate, Statement)


def gather(records: LabRecords, today: datetime.date, extra_levels: Sequence[float] = ()) -> PlanFacts:
    """Return the facts of a lab; its own confidence and `extra_levels` are added to the stored ones."""
    levels = tuple(sorted({*LEVELS, records.settings.confidence, *extra_levels}))
    return PlanFacts(
        format=FORMAT,
        as_of=today.isoformat(),
        defaults=defaults_of(records.settings),
        films={id: _film(film) for id, film in sorted(records.films.items())},
        etchants={id: _etchant(records, etchant) for id, etchant in sorted(records.etchants.items())},
        etches={id: _etch(records, etch, levels) for id, etch in sorted(records.etches.items())},
        couples=tuple(
            CoupleFact(
                films=couple.films, etchants=couple.etchants, effect=couple.effect, words=couple.words,
                source=couple.source, affects=couple.affects,
            )
            for _, couple in sorted(records.couples.items())
        ),
    )  # fmt: skip


def reference_only(records: LabRecords) -> LabRecords:
    """
    Return the records with no fact of the lab's own left: for answers that rest on publications alone.

    The lab's settings and its definitions of films stay; its etchants stay as names without facts.
    """
    return LabRecords(
        settings=records.settings,
        sources=records.sources,
        films=records.films,
        chemicals=records.chemicals,
        etchants=records.etchants,
        rates=_shipped(records.rates),
        statements=_shipped(records.statements),
        couples={id: c for id, c in records.couples.items() if c.origin is Origin.REFERENCE},
        mixing={id: m for id, m in records.mixing.items() if m.origin is Origin.REFERENCE},
        groups=records.groups,
        containers=records.containers,
        codes=records.codes,
        precautions=records.precautions,
        hazards=records.hazards,
        film_names=records.film_names,
    )


def _shipped(facts: Mapping[str, tuple[E, ...]]) -> dict[str, tuple[E, ...]]:
    return {id: tuple(fact for fact in entries if fact.origin is Origin.REFERENCE) for id, entries in facts.items()}


def defaults_of(settings: LabSettings) -> Defaults:
    """Return the defaults in force, in canonical units."""
    given = settings.defaults
    under, other = given.allowed_loss.under, given.allowed_loss.other
    resist, reserve = given.mask_reserve.resist_plasma, given.mask_reserve.other
    return Defaults(
        confidence=settings.confidence,
        tolerance=given.thickness_tolerance.number,
        phi_immersion=given.nonuniformity.immersion.number,
        phi_bubbles=given.nonuniformity.gas_bubbles.number,
        phi_vapour=given.nonuniformity.vapour.number,
        phi_plasma=given.nonuniformity.plasma.number,
        phi_cyclic=given.nonuniformity.deep_silicon.number,
        reaction_wet_s=given.reaction_time.wet.number,
        reaction_plasma_s=given.reaction_time.plasma.number,
        allowance=Allowance(
            under_fraction=under.share.number,
            under_nm=under.length.number,
            other_fraction=other.share.number,
            other_nm=other.length.number,
            other_least_nm=0.0 if other.at_least is None else other.at_least.number,
            reserve_resist_plasma_fraction=resist.share.number,
            reserve_resist_plasma_nm=resist.length.number,
            reserve_fraction=reserve.share.number,
            reserve_nm=reserve.length.number,
            none_below_nm=given.allowed_loss.none_below.number,
        ),
    )


def default_phi(defaults: Defaults, method: Method, *, gas_bubbles: bool) -> float:
    """Return the non-uniformity of an etch that states none."""
    if method is Method.PLASMA:
        return defaults.phi_plasma
    if method is Method.CYCLIC:
        return defaults.phi_cyclic
    if method is Method.VAPOUR:
        return defaults.phi_vapour
    return defaults.phi_bubbles if gas_bubbles else defaults.phi_immersion


def _film(film: Film) -> FilmFacts:
    return FilmFacts(
        id=film.id, name=film.name, family=film.family, is_family=film.is_family, members=film.members,
        barrier=film.barrier, electrical=film.electrical, noble=bool(film.noble), similar=film.similar,
        adhesion=film.adhesion_layer_usual,
        names=tuple(name for name in (film.name, film.formula, *film.synonyms) if name),
    )  # fmt: skip


def _etchant(records: LabRecords, etchant: Etchant) -> EtchantFacts:
    rows: dict[str, list[PublishedFact]] = {}
    said: dict[str, list[SaidFact]] = {}
    for rate in records.rates.get(etchant.id, ()):
        fact = _rate(rate, _sigma(records, etchant, records.films[rate.film]))
        if fact is None:
            said.setdefault(rate.film, []).append(_none_seen(rate))
        else:
            rows.setdefault(rate.film, []).append(fact)
    for statement in records.statements.get(etchant.id, ()):
        said.setdefault(statement.film, []).append(_said(statement))
    return EtchantFacts(
        id=etchant.id, name=etchant.name, method=etchant.method, state=etchant.state,
        isotropic=bool(etchant.isotropic), gas_bubbles=bool(etchant.gas_bubbles),
        hf_vapour=bool(etchant.hf_vapour),
        hazard=hazard_score(records, etchant.id), cautions=tuple(cautions_of(records, etchant.id)),
        rows={film: tuple(facts) for film, facts in sorted(rows.items())},
        said={film: tuple(facts) for film, facts in sorted(said.items())},
        gas=_gas(records, etchant.id), bond=_bond(records, etchant.id),
    )  # fmt: skip


def _gas(records: LabRecords, etchant: str) -> dict[str, tuple[GasFact, ...]]:
    facts: dict[str, tuple[GasFact, ...]] = {}
    for film in sorted(records.films):
        always = film_gas(records, etchant, [film])
        thick = [
            one for one in film_gas(records, etchant, [film], {film: math.inf}) if one not in always
        ]
        found = [
            *(GasFact(forbidden=one.forbidden, words=one.message) for one in always),
            *(
                GasFact(forbidden=one.forbidden, words=one.message, from_nm=THICK_ORGANIC_NM)
                for one in thick
            ),
        ]
        if found:
            facts[film] = tuple(found)
    return facts


def _bond(records: LabRecords, etchant: str) -> tuple[GasFact, ...]:
    findings = bond_findings(records, etchant, "wax")
    return tuple(GasFact(forbidden=one.forbidden, words=one.message) for one in findings)


def _sigma(records: LabRecords, etchant: Etchant, film: Film) -> float:
    given = records.settings.defaults.sigma_literature
    if etchant.method is Method.PLASMA:
        return given.plasma
    if etchant.method is Method.CYCLIC:
        return given.cyclic
    if etchant.method is Method.VAPOUR:
        return given.vapour
    return given.wet_close if film.sigma_class is SigmaClass.CLOSE else given.wet_other


def _rate(rate: PublishedRate, sigma: float) -> PublishedFact | None:
    """Return a published rate as a fact, or None where it is no number but the word "none seen"."""
    quantity = rate.rate
    kind, low, high, tested = _ends(rate, quantity)
    if low is None and high is None:
        return None
    return PublishedFact(
        kind=kind, low=low, high=high, sigma=sigma, rank=Rank(rate.rank), source=rate.source,
        tested_s=tested, temperature=span_of(rate.temperature),
        per_cycle=quantity.dimension is Dimension.RATE_PER_CYCLE,
    )  # fmt: skip


def _ends(
    rate: PublishedRate, quantity: Quantity
) -> tuple[PublishedKind, float | None, float | None, float | None]:
    tested = None if rate.tested_time is None else rate.tested_time.number
    if rate.kind is RateKind.NONE_SEEN:
        if rate.detection_limit is None or tested is None:
            return PublishedKind.UPPER, None, None, None
        return PublishedKind.UPPER, None, rate.detection_limit.number, tested
    low = quantity.value if quantity.form is Form.VALUE else quantity.low
    high = quantity.value if quantity.form is Form.VALUE else quantity.high
    if rate.kind is RateKind.UPPER_LIMIT:
        return PublishedKind.UPPER, None, high, tested
    if rate.kind is RateKind.LOWER_LIMIT:
        return PublishedKind.LOWER, low, None, None
    # A rate of 0 is no rate: nobody can measure it. It says "none seen".
    if not low or not high:
        return PublishedKind.UPPER, None, high or None, tested
    return PublishedKind.VALUE, low, high, None


def _none_seen(rate: PublishedRate) -> SaidFact:
    return SaidFact(
        effect=Effect.RESISTS, words="no etching seen", source=rate.source, temperature=span_of(rate.temperature)
    )


def _said(statement: Statement) -> SaidFact:
    return SaidFact(
        effect=statement.effect, words=statement.words, source=statement.source,
        temperature=span_of(statement.temperature),
    )  # fmt: skip


def span_of(quantity: Quantity | None) -> Span | None:
    """Return the lowest and highest value of a quantity; None if it is not stated or has an open end."""
    if quantity is None:
        return None
    low = quantity.low if quantity.value is None else quantity.value
    high = quantity.high if quantity.value is None else quantity.value
    return None if low is None or high is None else Span(low=low, high=high)


def _etch(records: LabRecords, etch: Etch, levels: Sequence[float]) -> EtchFacts:
    etchant = records.etchants[etch.etchant]
    defaults = defaults_of(records.settings)
    own = {film: rate for film in films_run(records, etch) if (rate := own_rate(records, etch, film))}
    stated = None if etch.nonuniformity is None else etch.nonuniformity.number
    phi = default_phi(defaults, etch.method, gas_bubbles=bool(etchant.gas_bubbles))
    ratio = etch.undercut_ratio
    cycle = etch.seconds_per_cycle
    return EtchFacts(
        id=etch.id, name=etch.name, etchant=etch.etchant, method=etch.method, tool=etch.tool,
        status=etch.status, inherits=_inherits(etch), targets=etch.targets,
        phi=phi if stated is None else stated, offset_s=_offset(etch, own),
        overetch=0.0 if etch.overetch is None else etch.overetch.number,
        endpoint=etch.endpoint is not None, cooled=etch.cooling is not None,
        isotropic=bool(etchant.isotropic) if etch.isotropic is None else etch.isotropic,
        temperature=span_of(etch.temperature), cycle_s=None if cycle is None else cycle.number,
        ratio=None if ratio is None else RatioFact(
            low=ratio.low, mid=ratio.mid, high=ratio.high, basis=ratio.basis
        ),
        masks=tuple(
            MaskFact(film=mask.film, on=mask.on, longest_s=mask.longest_time_held.number) for mask in etch.masks
        ),
        refused=_refused(records, etch),
        own={
            film: fact for film, rate in own.items() if (fact := _own(records, rate, levels)) is not None
        },
        clearing=etch.clearing, if_not_cleared=etch.if_not_cleared,
    )  # fmt: skip


def _inherits(etch: Etch) -> bool:
    if etch.method in (Method.PLASMA, Method.CYCLIC):
        return etch.published_conditions is PublishedConditions.SAME
    return True


def _offset(etch: Etch, own: Mapping[str, OwnRate]) -> float:
    transfer = 0.0 if etch.transfer_time is None else etch.transfer_time.number
    if etch.induction is not None:
        return etch.induction.number + transfer
    fitted = [
        rate.induction_s for film in etch.targets if (rate := own.get(film)) and rate.induction_s is not None
    ]
    return (fitted[0] if fitted else 0.0) + transfer


def _refused(records: LabRecords, etch: Etch) -> dict[str, str]:
    tool = records.tools[etch.tool]
    return {id: why for id, film in sorted(records.films.items()) if (why := tool.refusal(film)) is not None}


def _own(records: LabRecords, rate: OwnRate, levels: Sequence[float]) -> OwnFact | None:
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
        limit_s=times.high if rate.next_run.n_runs == 0 else None,
        temperature=_span(
            None if row.temperature_degc is None else row.temperature_degc + _ZERO_DEGC_K for row in rows
        ),
        load_cm2=_span(row.load_cm2 for row in rows), induction_s=rate.induction_s,
    )  # fmt: skip


def _span(values: Iterable[float | None]) -> Span | None:
    known = [value for value in values if value is not None]
    return Span(low=min(known), high=max(known)) if known else None
