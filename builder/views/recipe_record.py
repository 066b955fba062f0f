"""What a recipe says itself: settings, steps, masks, faults, handling; no computed number."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.etches import AfterStep, Etch, Step
from builder.records.lab import LabRecords
from builder.records.quantities import Quantity
from builder.records.terms import PublishedConditions
from builder.views.etchant_page import hazard_words
from builder.views.link import Link
from builder.views.number_text import TO, as_recorded, as_written
from builder.views.references import Fact, FilmRef, film_ref, known_facts, substance_link
from builder.views.words import AFTER_STEP_NAMES, BATH_NAMES, yes_no_unknown


@dataclass(frozen=True)
class StepRow:
    """One step with its settings."""

    name: str
    time: str
    settings: tuple[Fact, ...]
    note: str


@dataclass(frozen=True)
class MaskRow:
    """A mask that was seen to hold."""

    mask: FilmRef
    on: tuple[FilmRef, ...]
    preparation: str
    longest: str
    note: str


@dataclass(frozen=True)
class AfterRow:
    """A step after the etch, with how soon it has to follow."""

    kind: str
    what: str
    chemical: Link | None
    within: str
    note: str


@dataclass(frozen=True)
class FaultRow:
    """A known fault."""

    look: str
    cause: str
    cure: str


@dataclass(frozen=True)
class RecipeRecord:
    """The recorded part of a recipe's page."""

    steps: tuple[StepRow, ...]
    before: tuple[str, ...]
    after: tuple[AfterRow, ...]
    conditions: tuple[Fact, ...]
    masks: tuple[MaskRow, ...]
    faults: tuple[FaultRow, ...]
    do_not_use_for: tuple[str, ...]
    clearing: str
    if_not_cleared: str
    cautions: tuple[str, ...]
    hazards: tuple[str, ...]
    note: str | None


def recipe_record(records: LabRecords, etch: Etch) -> RecipeRecord:
    """Return what a recipe says itself, ready to be shown."""
    etchant = records.etchants[etch.etchant]
    return RecipeRecord(
        steps=tuple(_step(step) for step in etch.settings),
        before=etch.before_steps,
        after=tuple(_after(records, step) for step in etch.after_steps),
        conditions=_conditions(etch),
        masks=_masks(records, etch),
        faults=tuple(FaultRow(fault.look, fault.cause, fault.cure) for fault in etch.faults),
        do_not_use_for=etch.do_not_use_for,
        clearing=etch.clearing,
        if_not_cleared=etch.if_not_cleared,
        cautions=_cautions(records, etch),
        hazards=hazard_words(records, etchant),
        note=etch.note,
    )


def _step(step: Step) -> StepRow:
    settings = tuple(Fact(name.replace("_", " "), shown(value)) for name, value in step.values.items())
    return StepRow(step.step, "" if step.time is None else shown(step.time), settings, step.note or "")


def shown(quantity: Quantity) -> str:
    """Return a recorded quantity as it was written."""
    return as_written(quantity.text)


def _conditions(etch: Etch) -> tuple[Fact, ...]:
    return known_facts(
        ("Temperature", shown(etch.temperature) if etch.temperature else None),
        ("Temperature held by", etch.temperature_held),
        ("Bath", BATH_NAMES[etch.bath] if etch.bath else None),
        ("Etches sideways", _undercut(etch)),
        ("Same in all directions", yes_no_unknown(etch.isotropic)),
        ("Unevenness over the wafer", shown(etch.nonuniformity) if etch.nonuniformity else None),
        ("Induction", shown(etch.induction) if etch.induction else None),
        ("Breakthrough", etch.breakthrough),
        ("Transfer to the rinse", shown(etch.transfer_time) if etch.transfer_time else None),
        ("Overetch", shown(etch.overetch) if etch.overetch else None),
        ("Endpoint", etch.endpoint),
        ("Seasoning", etch.seasoning),
        ("Cooling", etch.cooling),
        ("Time a cycle", shown(etch.seconds_per_cycle) if etch.seconds_per_cycle else None),
        ("Published conditions", _published(etch)),
        ("Waste", etch.waste),
        ("Owner", etch.owner_role),
    )


def _undercut(etch: Etch) -> str | None:
    ratio = etch.undercut_ratio
    if ratio is None:
        return None
    low, mid, high = as_recorded(ratio.low), as_recorded(ratio.mid), as_recorded(ratio.high)
    return f"{mid} × the depth ({low}{TO}{high}; {ratio.basis})"


def _published(etch: Etch) -> str | None:
    if etch.published_conditions is None:
        return None
    same = etch.published_conditions is PublishedConditions.SAME
    return "the same as here" if same else "different from these, so published rates are hints"


def _masks(records: LabRecords, etch: Etch) -> tuple[MaskRow, ...]:
    return tuple(
        MaskRow(
            mask=film_ref(records, mask.film),
            on=tuple(film_ref(records, film) for film in mask.on),
            preparation=mask.preparation,
            longest=shown(mask.longest_time_held),
            note=mask.note or "",
        )
        for mask in etch.masks
    )


def _after(records: LabRecords, step: AfterStep) -> AfterRow:
    return AfterRow(
        kind=AFTER_STEP_NAMES[step.kind],
        what=step.what,
        chemical=None if step.chemical is None else substance_link(records, step.chemical),
        within="" if step.within is None else shown(step.within),
        note=step.note or "",
    )


def _cautions(records: LabRecords, etch: Etch) -> tuple[str, ...]:
    etchant = records.etchants[etch.etchant]
    mixture = etchant.mixture
    found = []
    if mixture is not None and mixture.hazards:
        found.append(mixture.hazards)
    if mixture is not None and mixture.order_of_mixing:
        found.append(f"Order of mixing: {mixture.order_of_mixing}")
    parts = [records.chemicals[part.chemical] for part in etchant.parts]
    if (mixture is not None and mixture.never_capped) or any(part.never_capped for part in parts):
        found.append("Never in a closed bottle: it makes gas.")
    found += [f"{part.name}: {part.first_action}" for part in parts if part.first_action]
    return tuple(found)
