"""What must not meet, groups, container materials, GHS codes, precautions and plasma hazards."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.conversion import Temperature
from builder.records.record import Record
from builder.records.terms import (
    CodeKind,
    FitnessVerdict,
    HazardKind,
    MixingSeverity,
    SideKind,
    Trust,
)


@dataclass(frozen=True, slots=True, kw_only=True)
class Side:
    """One side of a mixing rule: an id of the kind named, or words where no record stands for it."""

    kind: SideKind
    id: str | None = None
    text: str | None = None

    @property
    def handle(self) -> tuple[SideKind, str]:
        """How the side names its thing: a kind, and an id or words."""
        return self.kind, self.id or self.text or ""


@dataclass(frozen=True, slots=True, kw_only=True)
class MixingRule(Record):
    """Two things that must not meet."""

    a: Side
    b: Side
    hazards: tuple[str, ...]
    severity: MixingSeverity
    source: tuple[str, ...]
    trust: Trust
    gas: str | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Group(Record):
    """Substances or films that react alike; members may also name the group themselves."""

    name: str
    description: str
    epa_group: int | None = None
    members: tuple[str, ...] = ()
    note: str | None = None
    source: tuple[str, ...] = ()
    trust: Trust | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Fitness:
    """Fitness of a material for one chemical, etchant or group, up to a temperature."""

    chemical: str
    verdict: FitnessVerdict
    source: str
    trust: Trust
    limit: Temperature | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Container(Record):
    """A material of tanks, beakers and carriers."""

    name: str
    fitness: tuple[Fitness, ...] = ()
    service_limit: str | None = None
    note: str | None = None
    pending: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class GhsCode(Record):
    """A hazard statement, a supplementary statement, a pictogram, or a rule of precedence."""

    code: str
    kind: CodeKind
    meaning: str
    source: str
    trust: Trust
    signal: str | None = None
    pictogram: str | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Precaution(Record):
    """Protective equipment and first action for a class; it defers to the safety data sheet."""

    name: str
    covers: tuple[str, ...]
    ppe: str
    controls: str
    first_action_skin: str
    first_action_eye: str
    first_action_inhalation: str
    storage_and_waste: str
    defer_to: str
    source: tuple[str, ...]
    trust: Trust
    monitoring: str | None = None
    extra: str | None = None
    trust_note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class PlasmaHazard(Record):
    """A hazard of plasma etching and what is done about it."""

    subject: str
    kind: HazardKind
    hazard: str
    control: str
    source: tuple[str, ...]
    trust: Trust
    by_products: str | None = None
    trust_note: str | None = None
