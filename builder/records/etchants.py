"""What touches the film: a mixture at a strength, or a gas set in a reactor."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.record import Part, Record
from builder.records.terms import Method, State, Trust


@dataclass(frozen=True, slots=True, kw_only=True)
class Mixture:
    """How an etchant is mixed, kept and disposed of."""

    source: tuple[str, ...]
    trust: Trust
    use: str | None = None
    order_of_mixing: str | None = None
    hazards: str | None = None
    pot_life: str | None = None
    container: str | None = None
    never_capped: bool | None = None
    trust_note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Etchant(Record):
    """One etchant; what is not stated (isotropic, gas_bubbles, hf_vapour) is None, which is unknown."""

    name: str
    method: Method
    state: State
    synonyms: tuple[str, ...] = ()
    parts: tuple[Part, ...] = ()
    parts_unknown: str | None = None
    composition: str | None = None
    temperature: str | None = None
    mixture: Mixture | None = None
    isotropic: bool | None = None
    gas_bubbles: bool | None = None
    hf_vapour: bool | None = None
    published_conditions: str | None = None
    groups: tuple[str, ...] = ()
    variants_of: str | None = None
    precaution: str | None = None
    note: str | None = None
    source: tuple[str, ...] = ()
    trust: Trust | None = None
    pending: tuple[str, ...] = ()
