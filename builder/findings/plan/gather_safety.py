"""What etchants do to people, as facts of a plan: by film, by what holds the sample, by recipe."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable

from builder.checking.rules_safety_finding import SafetyFinding, advice_of
from builder.checking.rules_safety_meetings import (
    BOND_WORDS,
    THICK_ORGANIC_NM,
    bond_findings,
    gas_of_film,
)
from builder.checking.rules_safety_plan import recipe_sequence, recipe_situation, situation_findings
from builder.checking.rules_safety_practice import chlorine_on_aluminium, plating_metal_in_hf
from builder.findings.plan.facts import GasFact, MeetingFact
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.mixing_match import etchant_presence, gravest, meetings
from builder.records.safety import MixingRule
from builder.records.terms import MixingSeverity, State

BOND_PATTERN = BOND_WORDS.pattern
"""Words that name wax, tape or grease, as a pattern that both languages read."""


def gas_by_film(records: LabRecords, etchant: str) -> dict[str, tuple[GasFact, ...]]:
    """Return what an etchant and each film do to a person; films without a finding are left out."""
    facts: dict[str, tuple[GasFact, ...]] = {}
    presence = etchant_presence(records, etchant)
    for film in sorted(records.films):
        always = gas_of_film(records, presence, film)
        thick = [one for one in gas_of_film(records, presence, film, math.inf) if one not in always]
        found = (*_facts(always), *_facts(thick, THICK_ORGANIC_NM))
        if found:
            facts[film] = found
    return facts


def alone_by_film(records: LabRecords, etchant: str) -> dict[str, tuple[GasFact, ...]]:
    """Return what is to be minded of a film where no recipe says in which tool, and what follows."""
    films = sorted(records.films)
    if not any(chlorine_on_aluminium(records, etchant, films, None)) and not any(
        plating_metal_in_hf(records, etchant, films, None)
    ):
        return {}
    return _by_film(
        films,
        lambda film: [
            *chlorine_on_aluminium(records, etchant, [film], None),
            *plating_metal_in_hf(records, etchant, [film], None),
        ],
    )


def of_recipe_by_film(records: LabRecords, etch: Etch) -> dict[str, tuple[GasFact, ...]]:
    """Return what is to be minded of a film in a recipe, with its tool and the steps that follow."""
    films, after = sorted(records.films), etch.after_steps
    if not any(chlorine_on_aluminium(records, etch.etchant, films, after)) and not any(
        plating_metal_in_hf(records, etch.etchant, films, etch.tool)
    ):
        return {}
    return _by_film(
        films,
        lambda film: [
            *chlorine_on_aluminium(records, etch.etchant, [film], after),
            *plating_metal_in_hf(records, etch.etchant, [film], etch.tool),
        ],
    )


def of_recipe(records: LabRecords, etch: Etch) -> tuple[tuple[str, ...], tuple[str, ...]]:
    """Return what forbids a recipe on any sample, and what is to be minded on every one."""
    found = [
        *situation_findings(records, recipe_situation(records, etch, ())),
        *recipe_sequence(records, etch),
    ]
    messages = dict.fromkeys((one.forbidden, one.message) for one in found)
    return (
        tuple(message for forbidden, message in messages if forbidden),
        tuple(message for forbidden, message in messages if not forbidden),
    )


def of_bond(records: LabRecords, etchant: str) -> tuple[GasFact, ...]:
    """Return what wax, tape or grease do in an etchant."""
    return tuple(_facts(bond_findings(records, etchant, "wax")))


def meetings_of_steps(records: LabRecords) -> tuple[MeetingFact, ...]:
    """Return, by rule, the etchants that must not meet what is left of a liquid before them."""
    present = {id: etchant_presence(records, id) for id in sorted(records.etchants)}
    liquids = {id: one for id, one in present.items() if records.etchants[id].state is State.LIQUID}
    pairs: dict[str, list[tuple[str, ...]]] = {}
    for first, carried in liquids.items():
        for second, here in present.items():
            for met in gravest(meetings(records, here, carried)):
                pairs.setdefault(met.rule.id, []).append((first, second))
    return tuple(_meeting(records.mixing[rule], tuple(found)) for rule, found in sorted(pairs.items()))


def _meeting(rule: MixingRule, pairs: tuple[tuple[str, ...], ...]) -> MeetingFact:
    gas = f" ({rule.gas})" if rule.gas else ""
    words = f"{', '.join(rule.hazards)}{gas}. {advice_of(rule.note)}".strip()
    forbidden = rule.severity is MixingSeverity.FORBID
    return MeetingFact(rule=rule.id, forbidden=forbidden, words=words, pairs=pairs)


def _by_film(
    films: Iterable[str], findings: Callable[[str], Iterable[SafetyFinding]]
) -> dict[str, tuple[GasFact, ...]]:
    return {film: facts for film in films if (facts := tuple(_facts(findings(film))))}


def _facts(findings: Iterable[SafetyFinding], from_nm: float = 0.0) -> list[GasFact]:
    return [GasFact(forbidden=one.forbidden, words=one.message, from_nm=from_nm) for one in findings]
