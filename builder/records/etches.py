"""Etch recipes of the lab."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Annotated

from builder.records.conversion import Key, Percent, Setting, Temperature, Time
from builder.records.record import Record
from builder.records.terms import AfterStepKind, Bath, Method, PublishedConditions, Status


@dataclass(frozen=True, slots=True, kw_only=True)
class Step:
    """One step with its settings by name; `time` only where the recipe fixes it."""

    step: str
    values: Mapping[str, Setting]
    time: Time | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class MaskRecord:
    """A mask that was seen to stay on the films `on`, with its preparation, for up to a time."""

    film: str
    on: tuple[str, ...]
    preparation: str
    longest_time_held: Time
    runs: tuple[str, ...] = ()
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class UndercutRatio:
    """Sideways etch divided by depth; `basis` (`from` in the file) says where the values come from."""

    low: float
    mid: float
    high: float
    basis: Annotated[str, Key("from")]


@dataclass(frozen=True, slots=True, kw_only=True)
class AfterStep:
    """A step after the etch; `within` is the longest wait before it."""

    what: str
    kind: AfterStepKind
    chemical: str | None = None
    within: Time | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Fault:
    """A known fault: how it looks, its cause, its cure."""

    look: str
    cause: str
    cure: str


@dataclass(frozen=True, slots=True, kw_only=True)
class Etch(Record):
    """One recipe of the lab. What a recipe does not state is None, never a default."""

    name: str
    method: Method
    tool: str
    etchant: str
    status: Status
    owner_role: str
    targets: tuple[str, ...]
    settings: tuple[Step, ...]
    clearing: str
    if_not_cleared: str
    bath: Bath | None = None
    published_conditions: PublishedConditions | None = None
    retired_reason: str | None = None
    temperature: Temperature | None = None
    temperature_held: str | None = None
    masks: tuple[MaskRecord, ...] = ()
    undercut_ratio: UndercutRatio | None = None
    isotropic: bool | None = None
    nonuniformity: Percent | None = None
    induction: Time | None = None
    breakthrough: str | None = None
    transfer_time: Time | None = None
    overetch: Percent | None = None
    endpoint: str | None = None
    seasoning: str | None = None
    cooling: str | None = None
    seconds_per_cycle: Time | None = None
    before_steps: tuple[str, ...] = ()
    after_steps: tuple[AfterStep, ...] = ()
    faults: tuple[Fault, ...] = ()
    do_not_use_for: tuple[str, ...] = ()
    waste: str | None = None
    labels: tuple[str, ...] = ()
    note: str | None = None
