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
from builder.records.lab import LabRecords


@dataclass(frozen=True)
class Computed:
    """
    Findings of one build.

    `reference` holds the etchants by published facts alone. `own` is by recipe and film, with the
    targets first. `by_recipe` and `by_etchant` hold only pairs with anything on record.
    """

    today: datetime.date
    facts: PlanFacts
    reference: PlanFacts
    own: Mapping[str, Mapping[str, OwnRate]]

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

    @cached_property
    def by_recipe(self) -> Mapping[str, Mapping[str, Evidence]]:
        """Evidence of films in each recipe."""
        return {
            etch_id: _evidence_of(self.facts, self.etching(etch_id), self.asked, (*self.own[etch_id], *recipe.targets))
            for etch_id, recipe in self.facts.etches.items()
        }  # fmt: skip

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
    published = reference_only(records)
    etchants = {
        id: etchant_facts(published, etchant) for id, etchant in sorted(published.etchants.items())
    }
    return Computed(
        today=today,
        facts=facts,
        reference=replace(facts, etchants=etchants, etches={}, refused={}),
        own={
            etch.id: {film: rate for film in films_run(records, etch) if (rate := own_rate(records, etch, film))}
            for etch in records.etches.values()
        },
    )  # fmt: skip


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
