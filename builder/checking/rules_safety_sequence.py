"""The steps of a sample's sequence as wet steps, with their places in the file."""

from __future__ import annotations

from collections.abc import Iterable, Iterator

from builder.checking.rules_safety_meetings import WetStep
from builder.checking.rules_safety_practice import after_step
from builder.records.lab import LabRecords
from builder.records.samples import ANY_ETCH, SequenceStep
from builder.records.terms import Treatment


def sample_steps(records: LabRecords, steps: Iterable[SequenceStep]) -> Iterator[tuple[int, WetStep]]:
    """
    Yield each step as place and wet step; a recipe brings the steps after its etch with it.

    An etch that is still open (`any`) leaves nobody knows what on the sample, so what comes after it
    is looked at from a clean start.
    """
    for place, step in enumerate(steps):
        if step.etch == ANY_ETCH:
            yield place, WetStep("an etch not chosen yet", None, clears=True)
        elif step.etch is not None:
            yield from ((place, inner) for inner in _recipe_steps(records, step.etch))
        else:
            yield place, _treatment(records, step)


def _recipe_steps(records: LabRecords, etch_id: str) -> Iterator[WetStep]:
    etch = records.etches.get(etch_id)
    if etch is not None and etch.etchant in records.etchants:
        yield WetStep(etch.name, etch.etchant)
        yield from (after_step(step) for step in etch.after_steps)


def _treatment(records: LabRecords, step: SequenceStep) -> WetStep:
    known = step.etchant in records.etchants or step.etchant in records.chemicals
    rinses = step.treat is Treatment.RINSE and step.etchant in (None, "water")
    return WetStep(str(step.treat), step.etchant if known and not rinses else None, rinses)
