"""Safety rules over recipes, tools, samples and mixtures: what must not meet, what holds it, what follows."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from typing import TypeAlias

from builder.checking import rules_safety_records
from builder.checking.rule import Checked, Fault, Rule
from builder.checking.rules_safety_containers import container_findings
from builder.checking.rules_safety_finding import SafetyFinding
from builder.checking.rules_safety_meetings import (
    WetStep,
    bench_findings,
    bond_findings,
    film_gas,
    mixture_findings,
    sequence_findings,
)
from builder.checking.rules_safety_plan import recipe_films
from builder.checking.rules_safety_practice import (
    chlorine_on_aluminium,
    hf_first_aid,
    plating_metal_in_hf,
    recipe_steps,
    waste_of_recipe,
)
from builder.checking.rules_safety_sequence import sample_steps
from builder.problems import Severity
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.quantities import Quantity
from builder.records.tools import Tool

Placed: TypeAlias = tuple[str, str, SafetyFinding]
"""File, JSON pointer, finding."""
_BATH_SETTINGS = ("bath_temperature", "temperature")


def _recipes(records: LabRecords) -> Iterator[Etch]:
    """Yield the recipes whose tool, etchant and films are all on record; the others have their own fault."""
    for etch in records.etches.values():
        known = etch.etchant in records.etchants and etch.tool in records.tools
        parts = records.etchants[etch.etchant].parts if known else ()
        named = [step.chemical for step in etch.after_steps if step.chemical is not None]
        if (
            known
            and all(part.chemical in records.chemicals for part in parts)
            and all(film in records.films for film in recipe_films(etch))
            and all(name in records.chemicals or name in records.etchants for name in named)
        ):
            yield etch


def _steps(records: LabRecords) -> Iterator[Placed]:
    for etch in _recipes(records):
        steps = recipe_steps(records, etch)
        etch_at = len(steps) - len(etch.after_steps) - 1
        for finding in sequence_findings(records, steps):
            yield etch.file, _step_pointer((finding.step or 0) - etch_at, etch), finding


def _step_pointer(after_etch: int, etch: Etch) -> str:
    if after_etch < 0:
        return f"/before_steps/{len(etch.before_steps) - 1}"
    return "/etchant" if after_etch == 0 else f"/after_steps/{after_etch - 1}"


def _sample_steps(records: LabRecords) -> Iterator[Placed]:
    for sample in records.samples.values():
        steps: list[WetStep] = []
        places: list[int] = []
        for place, step in sample_steps(records, sample.steps):
            steps.append(step)
            places.append(place)
        for finding in sequence_findings(records, steps):
            yield sample.file, f"/steps/{places[finding.step or 0]}", finding


def _sample_films(records: LabRecords) -> Iterator[Placed]:
    """Yield what the films and the mount of a sample meet in the liquids its steps name."""
    for sample in records.samples.values():
        films = [film for film in sample.films if film.film in records.films]
        thickest = {film.film: film.thickness_nm for film in sorted(films, key=lambda one: one.thickness_nm)}
        for place, step in sample_steps(records, sample.steps):
            if step.substance in records.etchants:
                found = film_gas(records, str(step.substance), thickest, thickest)
                bond = bond_findings(records, str(step.substance), sample.mount.bond)
                for finding in (*found, *bond):
                    yield sample.file, f"/steps/{place}", finding


def _films(records: LabRecords) -> Iterator[Placed]:
    for etch in _recipes(records):
        for finding in film_gas(records, etch.etchant, recipe_films(etch)):
            yield etch.file, "/etchant", finding


def _containers(records: LabRecords) -> Iterator[Placed]:
    for etch in _recipes(records):
        container = records.tools[etch.tool].container
        if container in records.containers and records.etchants[etch.etchant].state.value == "liquid":
            for pointer, temperature in _temperatures(etch):
                for finding in container_findings(records, str(container), etch.etchant, temperature):
                    yield etch.file, pointer if finding.code == "bath-over-limit" else "/tool", finding


def _temperatures(etch: Etch) -> Iterator[tuple[str, Quantity | None]]:
    yield "/temperature", etch.temperature
    for place, step in enumerate(etch.settings):
        for name in _BATH_SETTINGS:
            if name in step.values:
                yield f"/settings/{place}/values/{name}", step.values[name]


def _tool_containers(records: LabRecords) -> Iterator[Placed]:
    for tool in records.tools.values():
        for place, chemical in _tool_chemicals(records, tool):
            for finding in container_findings(records, str(tool.container), chemical, None):
                yield tool.file, f"/chemicals/{place}", finding


def _tool_chemicals(records: LabRecords, tool: Tool) -> Iterator[tuple[int, str]]:
    if tool.container in records.containers:
        for place, name in enumerate(tool.chemicals):
            if name in records.chemicals or name in records.etchants:
                yield place, name


def _benches(records: LabRecords) -> Iterator[Placed]:
    for tool in records.tools.values():
        held = [name for name in tool.chemicals if name in records.chemicals]
        if tool.kind.value == "bench":
            for finding in bench_findings(records, held):
                yield tool.file, "/chemicals", finding


def _mixtures(records: LabRecords) -> Iterator[Placed]:
    for etchant in records.etchants.values():
        if all(part.chemical in records.chemicals for part in etchant.parts):
            for finding in mixture_findings(records, etchant):
                yield etchant.file, "/parts", finding


def _first_aid(records: LabRecords) -> Iterator[Placed]:
    for etchant in records.etchants.values():
        if all(part.chemical in records.chemicals for part in etchant.parts):
            for finding in hf_first_aid(records, etchant.id):
                yield etchant.file, "/parts", finding


def _practice(records: LabRecords) -> Iterator[Placed]:
    for etch in _recipes(records):
        films = recipe_films(etch)
        for finding in waste_of_recipe(records, etch):
            yield etch.file, "", finding
        for finding in chlorine_on_aluminium(records, etch.etchant, films, etch.after_steps):
            yield etch.file, "/after_steps", finding
        for finding in plating_metal_in_hf(records, etch.etchant, films, etch.tool):
            yield etch.file, "/targets", finding


def _rule(
    name: str, find: Callable[[LabRecords], Iterator[Placed]], codes: tuple[str, ...], forbidden: bool = True
) -> Rule:
    """Return the rule that reports the findings of these codes, those that forbid or those that do not."""

    def faults(checked: Checked) -> Iterator[Fault]:
        for file, pointer, finding in find(checked.records):
            if finding.code in codes and finding.forbidden is forbidden:
                yield Fault(file, pointer, finding.message)

    return Rule(name, faults, Severity.ERROR if forbidden else Severity.NOTICE)


RULES: tuple[Rule, ...] = (
    *rules_safety_records.RULES,
    _rule("steps-must-not-meet", _steps, ("unrinsed-steps",)),
    _rule("steps-need-care", _steps, ("unrinsed-steps",), forbidden=False),
    _rule("steps-must-not-meet", _sample_steps, ("unrinsed-steps",)),
    _rule("film-gives-gas", _films, ("film-meets-etchant",)),
    _rule("film-gives-gas", _sample_films, ("film-meets-etchant",)),
    _rule("thick-organic", _sample_films, ("thick-organic",)),
    _rule("bond-in-oxidiser", _sample_films, ("bond-in-oxidiser",)),
    _rule("container-attacked", _containers, ("container-attacked",)),
    _rule("container-attacked", _tool_containers, ("container-attacked",)),
    _rule("container-unproven", _containers, ("container-unknown",), forbidden=False),
    _rule("bath-over-limit", _containers, ("bath-over-limit",)),
    _rule("bench-shared", _benches, ("bench-shared",), forbidden=False),
    _rule("forbidden-mixture", _mixtures, ("forbidden-mixture",)),
    _rule("hf-without-first-aid", _first_aid, ("hf-without-first-aid",)),
    _rule("waste-not-named", _practice, ("waste-not-named",)),
    _rule("chlorine-on-aluminium", _practice, ("chlorine-on-aluminium",)),
    _rule("plating-metal-in-hf", _practice, ("plating-metal-in-hf",), forbidden=False),
)
