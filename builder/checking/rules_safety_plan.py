"""All safety rules that speak of one etchant on one sample, for a recipe that is checked or planned."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field

from builder.checking.rules_safety_containers import container_findings
from builder.checking.rules_safety_finding import SafetyFinding, without_repeats
from builder.checking.rules_safety_meetings import (
    WetStep,
    bond_findings,
    film_gas,
    mixture_findings,
    sequence_findings,
)
from builder.checking.rules_safety_practice import (
    chlorine_on_aluminium,
    hf_first_aid,
    plating_metal_in_hf,
    recipe_steps,
)
from builder.records.etches import AfterStep, Etch
from builder.records.lab import LabRecords
from builder.records.quantities import Quantity
from builder.records.terms import State


@dataclass(frozen=True, kw_only=True)
class EtchSituation:
    """
    An etchant, the films it reaches, and what is known around it; None is not known.

    `films` are all films on the sample. `thickness_nm` is by film, the thickest where one stands
    twice. `before` are the steps the sample comes from, `after` the steps of the recipe.
    """

    etchant: str
    films: tuple[str, ...]
    thickness_nm: Mapping[str, float] = field(default_factory=dict)
    tool: str | None = None
    temperature: Quantity | None = None
    bond: str | None = None
    before: tuple[WetStep, ...] = ()
    after: tuple[AfterStep, ...] | None = None


def situation_findings(records: LabRecords, situation: EtchSituation) -> tuple[SafetyFinding, ...]:
    """Return every finding on an etchant as it is used on a sample, forbidden ones first."""
    etchant, films = situation.etchant, situation.films
    found = [
        *film_gas(records, etchant, films, situation.thickness_nm),
        *bond_findings(records, etchant, situation.bond),
        *sequence_findings(records, [*situation.before, WetStep(records.etchants[etchant].name, etchant)]),
        *chlorine_on_aluminium(records, etchant, films, situation.after),
        *plating_metal_in_hf(records, etchant, films, situation.tool),
        *hf_first_aid(records, etchant),
        *mixture_findings(records, records.etchants[etchant]),
        *_container(records, situation),
    ]
    return without_repeats(found)


def _container(records: LabRecords, situation: EtchSituation) -> Iterator[SafetyFinding]:
    tool = records.tools.get(situation.tool or "")
    is_liquid = records.etchants[situation.etchant].state is State.LIQUID
    if tool is None or tool.container is None or not is_liquid:
        return
    if tool.container in records.containers:
        yield from container_findings(records, tool.container, situation.etchant, situation.temperature)


def recipe_situation(records: LabRecords, etch: Etch, films: Sequence[str]) -> EtchSituation:
    """Return the situation of a recipe on films."""
    return EtchSituation(
        etchant=etch.etchant,
        films=tuple(dict.fromkeys(films)),
        tool=etch.tool,
        temperature=etch.temperature,
        after=etch.after_steps,
    )


def recipe_sequence(records: LabRecords, etch: Etch) -> tuple[SafetyFinding, ...]:
    """Return what a recipe's own steps carry into each other."""
    return sequence_findings(records, recipe_steps(records, etch))


def recipe_films(etch: Etch) -> tuple[str, ...]:
    """Return the films a recipe itself names: targets, masks, what the masks stand on."""
    under = [film for mask in etch.masks for film in mask.on]
    return tuple(dict.fromkeys((*etch.targets, *(mask.film for mask in etch.masks), *under)))
