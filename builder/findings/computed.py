"""What is computed once a build and shown on many pages: facts of plans, own rates, evidence of pairs."""

from __future__ import annotations

import datetime
from collections.abc import Mapping
from dataclasses import dataclass, replace
from functools import cached_property

from builder.findings.own_rates import OwnRate, films_run, own_rate
from builder.findings.plan.evidence import NOTHING, Asked, Etching, Evidence, evidence
from builder.findings.plan.facts import EtchantFacts, PlanFacts
from builder.findings.plan.gather import gather, reference_only
from builder.findings.plan.gather_etchants import etchant_facts
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.terms import Origin


@dataclass(frozen=True)
class Computed:
    """
    Findings of one build.

    `reference` holds the etchants by published facts alone. `own` is by recipe and film, with the
    targets first. `gauge` is the relative standard uncertainty that all readings share. `by_recipe` and
    `by_etchant` hold only pairs with anything on record.
    """

    today: datetime.date
    facts: PlanFacts
    reference: PlanFacts
    own: Mapping[str, Mapping[str, OwnRate]]
    gauge: float = 0.0

    @property
    def confidence(self) -> float:
        """The lab's two-sided confidence."""
        return self.facts.defaults.confidence

    @property
    def asked(self) -> Asked:
        """What pages ask of evidence: the lab's confidence, and no temperature but the recipe's."""
        return Asked(self.confidence, None)

    def etching(self, etch_id: str) -> Etching:
        """Return a recipe as an etch to be judged."""
        recipe = self.facts.etches[etch_id]
        return Etching(self.facts.etchants[recipe.etchant], recipe)

    def etchant_alone(self, etchant_id: str) -> Etching:
        """Return an etchant by published facts, with no recipe."""
        return Etching(self.reference.etchants[etchant_id], None)

    def known(self, etch_id: str, film: str) -> Evidence:
        """Return the evidence of a film in a recipe."""
        return self.by_recipe[etch_id].get(film, NOTHING)

    def evidence(self, etching: Etching, film: str) -> Evidence:
        """Return the evidence of a film in a recipe, or in an etchant by published facts alone."""
        if etching.recipe is not None:
            return self.known(etching.recipe.id, film)
        return self.by_etchant.get(etching.etchant.id, {}).get(film, NOTHING)

    @cached_property
    def by_recipe(self) -> Mapping[str, Mapping[str, Evidence]]:
        """Evidence of films in each recipe."""
        return {
            etch_id: _evidence_of(self.facts, self.etching(etch_id), self.asked, tuple(self.own[etch_id]))
            for etch_id in self.facts.etches
        }

    @cached_property
    def by_etchant(self) -> Mapping[str, Mapping[str, Evidence]]:
        """Evidence of films in each etchant, by published facts alone; etchants without any are left out."""
        found = {
            etchant_id: _evidence_of(self.reference, self.etchant_alone(etchant_id), self.asked, ())
            for etchant_id in self.reference.etchants
        }
        return {etchant_id: films for etchant_id, films in found.items() if films}


def compute(records: LabRecords, today: datetime.date) -> Computed:
    """Return the findings of a lab as of a day."""
    facts = gather(records, today)
    gauge = records.settings.gauge_error
    published = reference_only(records)
    etchants = {
        id: etchant_facts(published, published.etchants[id]) if _has_own_facts(records, id) else found
        for id, found in facts.etchants.items()
    }
    return Computed(
        today=today,
        facts=facts,
        reference=replace(facts, etchants=etchants, etches={}, refused={}),
        own={etch.id: _own(records, etch) for etch in records.etches.values()},
        gauge=0.0 if gauge is None else gauge.relative.number,
    )


def _own(records: LabRecords, etch: Etch) -> dict[str, OwnRate]:
    rates = ((film, own_rate(records, etch, film)) for film in films_run(records, etch))
    return {film: rate for film, rate in rates if rate is not None}


def _has_own_facts(records: LabRecords, etchant: str) -> bool:
    facts = (*records.rates.get(etchant, ()), *records.statements.get(etchant, ()))
    return any(fact.origin is Origin.LAB for fact in facts)


def _evidence_of(
    facts: PlanFacts, etching: Etching, asked: Asked, own: tuple[str, ...]
) -> dict[str, Evidence]:
    """Evidence of every film, not of families, that has any; films in the order of their ids."""
    etchant: EtchantFacts = etching.etchant
    candidates = sorted({*own, *etchant.rows, *etchant.said})
    found = {
        film: evidence(facts, etching, film, asked)
        for film in candidates
        if film in facts.films and not facts.films[film].is_family
    }
    return {film: known for film, known in found.items() if known.rank.has_number or known.words}
