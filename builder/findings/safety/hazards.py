"""What an etchant inherits from its parts: hazard statements, precautions, what nobody knows of it."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from builder.records.chemicals import Chemical
from builder.records.etchants import Etchant
from builder.records.lab import LabRecords
from builder.records.mixing_match import HF_PRECAUTION, holds_hydrofluoric_acid
from builder.records.terms import Signal

_SIGNAL_ORDER = (Signal.NONE, Signal.WARNING, Signal.DANGER)


@dataclass(frozen=True)
class EtchantHazards:
    """
    Hazards of an etchant as those of its parts, which a mixture may exceed.

    `codes` are pairs of a hazard statement and the names of the parts that carry it. `unknown` says
    in words what is not known; `precautions` are ids, its own first. `signal` is the graver word of
    the parts that are known, PENDING where none is.
    """

    codes: tuple[tuple[str, tuple[str, ...]], ...]
    pictograms: tuple[str, ...]
    signal: Signal
    unknown: tuple[str, ...]
    precautions: tuple[str, ...]
    is_never_capped: bool
    holds_hf: bool


def etchant_hazards(records: LabRecords, etchant_id: str) -> EtchantHazards:
    """Return the hazards of an etchant."""
    etchant = records.etchants[etchant_id]
    parts = _parts(records, etchant)
    codes = sorted({code for part in parts for code in part.h_codes}, key=_code_order)
    return EtchantHazards(
        codes=tuple((code, tuple(part.name for part in parts if code in part.h_codes)) for code in codes),
        pictograms=tuple(sorted({code for part in parts for code in part.pictograms})),
        signal=_signal(parts),
        unknown=tuple(_unknown(etchant, parts)),
        precautions=_precautions(records, etchant, parts),
        is_never_capped=_is_never_capped(etchant, parts),
        holds_hf=holds_hydrofluoric_acid(records, etchant),
    )


def cautions_of(records: LabRecords, etchant_id: str) -> tuple[str, ...]:
    """Return the sentences that stand beside an etchant wherever it is named, gravest first."""
    etchant = records.etchants[etchant_id]
    hazards = etchant_hazards(records, etchant_id)
    return tuple(_cautions(etchant, hazards))


def _cautions(etchant: Etchant, hazards: EtchantHazards) -> Iterator[str]:
    if hazards.holds_hf:
        yield "Hydrofluoric acid: not alone, gel at hand and in date, trained people only."
    if hazards.is_never_capped:
        yield "Never in a closed bottle: it makes gas."
    if etchant.mixture is not None and etchant.mixture.order_of_mixing:
        yield f"Order of mixing: {etchant.mixture.order_of_mixing}."
    yield from hazards.unknown


def _precautions(records: LabRecords, etchant: Etchant, parts: tuple[Chemical, ...]) -> tuple[str, ...]:
    """Return the precautions in force, each once: that of HF where it forms, its own, its parts'."""
    by_content = HF_PRECAUTION if holds_hydrofluoric_acid(records, etchant) else None
    named = (by_content, etchant.precaution, *(part.precaution for part in parts))
    return tuple(dict.fromkeys(name for name in named if name is not None and name in records.precautions))


def _parts(records: LabRecords, etchant: Etchant) -> tuple[Chemical, ...]:
    found: dict[str, Chemical] = {}
    for part in etchant.parts:
        chemical = records.chemicals[part.chemical]
        found[chemical.id] = chemical
    return tuple(found.values())


def _signal(parts: tuple[Chemical, ...]) -> Signal:
    known = [part.signal for part in parts if part.signal is not Signal.PENDING]
    if not known or (max(known, key=_SIGNAL_ORDER.index) is not Signal.DANGER and len(known) < len(parts)):
        return Signal.PENDING
    return max(known, key=_SIGNAL_ORDER.index)


def _unknown(etchant: Etchant, parts: tuple[Chemical, ...]) -> Iterator[str]:
    if etchant.parts_unknown is not None:
        printed = etchant.parts_unknown
        yield f'Its parts are not known exactly ("{printed}"): treat it as the worst they may be.'
    for part in parts:
        if "h_codes" in part.pending:
            yield f"Hazard statements of {part.name} are pending: treat it as hazardous, read its SDS."
        if "precaution" in part.pending and etchant.precaution is None:
            yield f"Protective equipment and first action for {part.name} are pending: read its SDS."


def _is_never_capped(etchant: Etchant, parts: tuple[Chemical, ...]) -> bool:
    own = etchant.mixture is not None and etchant.mixture.never_capped is True
    return own or any(part.never_capped is True for part in parts)


def _code_order(code: str) -> tuple[bool, str]:
    return code.startswith("EUH"), code
