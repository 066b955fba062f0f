"""Substances and stock solutions."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.conversion import MolarMass, Temperature
from builder.records.record import Part, Record
from builder.records.terms import ExposureKind, PartTrust, Signal, Trust


@dataclass(frozen=True, slots=True, kw_only=True)
class ExposureLimit:
    """One occupational exposure limit; `value` is in `unit`, both as printed."""

    body: str
    kind: ExposureKind
    value: float
    unit: str
    trust: Trust
    source: str | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class ChemicalTrust:
    """How each part of a chemical's record is known."""

    identity: PartTrust
    boiling_point: PartTrust
    ghs: PartTrust


@dataclass(frozen=True, slots=True, kw_only=True)
class Chemical(Record):
    """One substance or stock solution. H and pictogram codes are in capitals; their records are not."""

    name: str
    hazardous: bool
    signal: Signal
    trust: ChemicalTrust
    synonyms: tuple[str, ...] = ()
    formula: str | None = None
    cas: tuple[str, ...] = ()
    role: str | None = None
    molar_mass: MolarMass | None = None
    boiling_point: Temperature | None = None
    boiling_point_solution: str | None = None
    parts: tuple[Part, ...] = ()
    groups: tuple[str, ...] = ()
    h_codes: tuple[str, ...] = ()
    pictograms: tuple[str, ...] = ()
    exposure_limits: tuple[ExposureLimit, ...] = ()
    precaution: str | None = None
    never_capped: bool | None = None
    waste: str | None = None
    first_action: str | None = None
    containers_note: str | None = None
    note: str | None = None
    source: tuple[str, ...] = ()
    pending: tuple[str, ...] = ()
