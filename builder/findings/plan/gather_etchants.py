"""What is published of films in an etchant, as facts of a plan."""

from __future__ import annotations

from builder.engine import PublishedKind, Rank
from builder.findings.plan.facts import EtchantFacts, PublishedFact, SaidFact, span_of
from builder.findings.plan.gather_safety import alone_by_film, gas_by_film, of_bond
from builder.findings.safety import cautions_of, hazard_score
from builder.records.etchants import Etchant
from builder.records.films import Film
from builder.records.lab import LabRecords
from builder.records.published import PublishedRate, Statement
from builder.records.quantities import Form, Quantity
from builder.records.terms import Effect, Method, RateKind, SigmaClass
from builder.records.unit_table import Dimension


def etchant_facts(records: LabRecords, etchant: Etchant) -> EtchantFacts:
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
        gas=gas_by_film(records, etchant.id),
        alone=alone_by_film(records, etchant.id), bond=of_bond(records, etchant.id),
    )  # fmt: skip


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
        effect=Effect.RESISTS,
        words="no etching seen",
        source=rate.source,
        temperature=span_of(rate.temperature),
    )


def _said(statement: Statement) -> SaidFact:
    return SaidFact(
        effect=statement.effect, words=statement.words, source=statement.source,
        temperature=span_of(statement.temperature),
    )  # fmt: skip
