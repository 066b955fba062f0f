"""Rules of practice for a recipe or a plan: chlorine on aluminium, metals in HF baths, first aid, waste."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator

from builder.checking.rules_safety_finding import SafetyFinding, caution, forbid
from builder.checking.rules_safety_meetings import WATER, WetStep
from builder.records.etchants import Etchant
from builder.records.etches import AfterStep, Etch
from builder.records.film_chemistry import is_aluminium, is_plating_metal
from builder.records.lab import LabRecords
from builder.records.mixing_match import HF_PRECAUTION, holds_hydrofluoric_acid
from builder.records.terms import AfterStepKind, Method, State, ToolKind

_CHLORINE_FORMULA = re.compile(r"Cl(?![a-z])")
_BREAKING_KINDS = frozenset({AfterStepKind.RINSE, AfterStepKind.QUENCH})
_DRY_WORDS = re.compile(
    r"\b(rinse|rinsed|dry|dried|blow|blown|spin|bake|baked|dehydrat\w*|water)\b", re.IGNORECASE
)
_NAMED_BY_LETTERS = 3
"""A name shorter than this is no word to look for in a sentence."""


def has_chlorine(records: LabRecords, etchant: Etchant) -> bool:
    """Tell whether a gas of a plasma or vapour etchant holds chlorine."""
    gases = (records.chemicals[part.chemical] for part in etchant.parts)
    return etchant.state is not State.LIQUID and any(
        _CHLORINE_FORMULA.search(gas.formula or "") for gas in gases
    )


def chlorine_on_aluminium(
    records: LabRecords, etchant_id: str, film_ids: Iterable[str], after: tuple[AfterStep, ...] | None
) -> Iterator[SafetyFinding]:
    """
    Yield the finding for aluminium that leaves a chlorine plasma without passivation and rinse.

    `after` None means that no recipe says what follows, which is a caution.
    """
    metals = [records.films[film].name for film in film_ids if is_aluminium(records.films[film])]
    if not metals or not has_chlorine(records, records.etchants[etchant_id]):
        return
    why = (
        f"{metals[0]} leaves a chlorine plasma: chlorine left on it makes hydrochloric acid in moist air "
        "and goes on corroding"
    )
    if after is None:
        yield caution(
            "chlorine-on-aluminium", f"{why}. Passivate before venting, then rinse in water at once."
        )
        return
    kinds = [step.kind for step in after]
    rinses = [place for place, kind in enumerate(kinds) if kind in _BREAKING_KINDS]
    # What comes after the first rinse happens outside the tool: the film has seen air by then.
    in_tool = set(kinds[: rinses[0]] if rinses else kinds)
    missing = []
    if not in_tool & {AfterStepKind.PASSIVATE, AfterStepKind.STRIP}:
        missing.append("passivation or strip before the rinse" if rinses else "passivation or strip")
    if not rinses:
        missing.append("water rinse")
    if missing:
        yield forbid(
            "chlorine-on-aluminium", f"{why}. The steps after it name no {' and no '.join(missing)}."
        )


def plating_metal_in_hf(
    records: LabRecords, etchant_id: str, film_ids: Iterable[str], tool_id: str | None
) -> Iterator[SafetyFinding]:
    """Yield the caution for a noble metal that goes into a hydrofluoric acid bath that others share."""
    etchant = records.etchants[etchant_id]
    if etchant.state is not State.LIQUID or not holds_hydrofluoric_acid(records, etchant):
        return
    tool = records.tools.get(tool_id or "")
    if tool is not None and tool.kind is not ToolKind.BENCH:
        return
    for film_id in dict.fromkeys(film_ids):
        film = records.films[film_id]
        refused = tool is not None and tool.refusal(film) is not None
        if is_plating_metal(film) and not refused:
            yield caution(
                "plating-metal-in-hf",
                f"{film.name} in {etchant.name}: traces of it plate out on bare silicon. "
                "Never in a tank that others share; use a beaker of your own and throw the acid away.",
            )


def hf_first_aid(records: LabRecords, etchant_id: str) -> Iterator[SafetyFinding]:
    """
    Yield the finding for liquid hydrofluoric acid without its own first action; pending is no excuse here.

    The first action for other acids, water alone, is wrong for it.
    """
    etchant = records.etchants[etchant_id]
    if etchant.state is not State.LIQUID or not holds_hydrofluoric_acid(records, etchant):
        return
    chemicals = [records.chemicals[part.chemical] for part in etchant.parts]
    named = {etchant.precaution, *(chemical.precaution for chemical in chemicals)}
    if HF_PRECAUTION not in named or HF_PRECAUTION not in records.precautions:
        yield forbid(
            "hf-without-first-aid",
            f"{etchant.name} holds hydrofluoric acid, but not its first action (calcium gluconate gel).",
        )


def waste_of_recipe(records: LabRecords, etch: Etch) -> Iterator[SafetyFinding]:
    """Yield the finding for a wet recipe that does not say where its waste goes."""
    etchant = records.etchants[etch.etchant]
    is_wet = etch.method in (Method.WET, Method.LIFT_OFF)
    if is_wet and etch.waste is None and is_hazardous(records, etchant):
        yield forbid(
            "waste-not-named",
            f"{etchant.name} becomes hazardous waste, and the recipe does not say which stream and label.",
        )


def is_hazardous(records: LabRecords, etchant: Etchant) -> bool:
    """Tell whether an etchant is hazardous: a part is, or its parts are unknown."""
    parts = [records.chemicals[part.chemical] for part in etchant.parts]
    return not parts or any(chemical.hazardous for chemical in parts)


def recipe_steps(records: LabRecords, etch: Etch) -> tuple[WetStep, ...]:
    """Return the wet steps of a recipe: what the sample may be wet with, the etch, what follows."""
    before = _wet_before(records, etch.before_steps)
    here = WetStep(etch.name, etch.etchant)
    return (*before, here, *(after_step(step) for step in etch.after_steps))


def after_step(step: AfterStep) -> WetStep:
    """Return a step after an etch as a wet step; a rinse in a solvent rinses nothing away."""
    in_water = step.chemical is None or step.chemical == WATER
    clears = step.kind is AfterStepKind.DRY or (step.kind in _BREAKING_KINDS and in_water)
    return WetStep(step.what, None if step.chemical == WATER else step.chemical, clears)


def _wet_before(records: LabRecords, before: tuple[str, ...]) -> tuple[WetStep, ...]:
    """Return what the last of the steps before names as a chemical, unless its words speak of drying."""
    if not before or _DRY_WORDS.search(before[-1]):
        return ()
    text = before[-1].casefold()
    for chemical in records.chemicals.values():
        names = (chemical.id, chemical.name, *chemical.synonyms)
        if any(len(name) >= _NAMED_BY_LETTERS and _names(name, text) for name in names):
            return (WetStep(before[-1], chemical.id),)
    return ()


def _names(name: str, text: str) -> bool:
    return re.search(rf"(?<!\w){re.escape(name.casefold())}(?!\w)", text) is not None
