"""What holds a bath: a material the chemical attacks, a bath over the material's limit, no record at all."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from builder.checking.rules_safety_finding import SafetyFinding, caution, forbid, of_meeting, without_repeats
from builder.records.lab import LabRecords
from builder.records.mixing_match import container_presence, meetings, substance_presence
from builder.records.quantities import Quantity
from builder.records.safety import Fitness
from builder.records.terms import FitnessVerdict

ROOM_TOLERANCE_K = 0.5
"""A bath counts as over a limit only beyond this, for the rounding of units. Common practice, no source."""


@dataclass(frozen=True)
class ContainerFit:
    """What is known of a material for a substance; `by_part` tells that a part's record stands in."""

    fitness: Fitness | None
    by_part: str | None = None


def container_fit(records: LabRecords, container_id: str, substance_id: str) -> ContainerFit:
    """
    Return the record of a material for a chemical or etchant.

    Where the etchant has none, the worst record of its parts stands in, but only to forbid: parts
    that are each held do not make a mixture that is.
    """
    fitness = _fitness(records, container_id, substance_id)
    if fitness is not None or substance_id not in records.etchants:
        return ContainerFit(fitness)
    etchant = records.etchants[substance_id]
    for part in etchant.parts:
        inner = _fitness(records, container_id, part.chemical)
        if inner is not None and inner.verdict is FitnessVerdict.NOT_USABLE:
            return ContainerFit(inner, records.chemicals[part.chemical].name)
    if len(etchant.parts) == 1:
        return ContainerFit(_fitness(records, container_id, etchant.parts[0].chemical))
    return ContainerFit(None)


def container_findings(
    records: LabRecords, container_id: str, substance_id: str, temperature: Quantity | None
) -> tuple[SafetyFinding, ...]:
    """Return what is wrong with a bath of a substance at a temperature in a material."""
    met = meetings(
        records, container_presence(records, container_id), substance_presence(records, substance_id)
    )
    found = [of_meeting("container-attacked", meeting) for meeting in met]
    return without_repeats(found + list(_fit_findings(records, container_id, substance_id, temperature)))


def _fit_findings(
    records: LabRecords, container_id: str, substance_id: str, temperature: Quantity | None
) -> Iterator[SafetyFinding]:
    material = records.containers[container_id].name
    named = records.etchants.get(substance_id) or records.chemicals[substance_id]
    fit = container_fit(records, container_id, substance_id)
    if fit.fitness is None:
        yield caution(
            "container-unknown", f"No record says that {material} holds {named.name}. Ask first.", ()
        )
        return
    note = f" {fit.fitness.note}." if fit.fitness.note else ""
    by = f" (by its part {fit.by_part})" if fit.by_part else ""
    source = (fit.fitness.source,)
    if fit.fitness.verdict is FitnessVerdict.NOT_USABLE:
        yield forbid("container-attacked", f"{material} does not hold {named.name}{by}.{note}", source)
        return
    if fit.fitness.verdict is FitnessVerdict.LIMITED:
        yield caution("container-limited", f"{material} holds {named.name} for a limited time.{note}", source)
    yield from _over_limit(material, named.name, fit.fitness, temperature)


def _over_limit(
    material: str, name: str, fitness: Fitness, temperature: Quantity | None
) -> Iterator[SafetyFinding]:
    limit = None if fitness.limit is None else highest(fitness.limit)
    bath = None if temperature is None else highest(temperature)
    if limit is None or bath is None or fitness.limit is None or temperature is None:
        return
    if bath > limit + ROOM_TOLERANCE_K:
        yield forbid(
            "bath-over-limit",
            f"{name} at {temperature.text} is over the limit of {material} for it, {fitness.limit.text}.",
            (fitness.source,),
        )


def highest(temperature: Quantity) -> float | None:
    """Return the highest temperature a quantity may mean, K, or None where it has no upper end."""
    if temperature.value is not None:
        return temperature.value + (temperature.half_width or 0.0)
    return temperature.high


def _fitness(records: LabRecords, container_id: str, substance_id: str) -> Fitness | None:
    rows = [row for row in records.containers[container_id].fitness if row.chemical == substance_id]
    order = list(FitnessVerdict)
    return max(rows, key=lambda row: order.index(row.verdict), default=None)
