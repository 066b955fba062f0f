"""A hazardous record states its codes, first action and waste, or says that they are pending."""

from __future__ import annotations

from collections.abc import Iterator

from builder.checking.rule import Checked, Fault, Rule
from builder.records.chemicals import Chemical
from builder.records.terms import PartTrust, Signal

_HINT = "state it, or list it under pending, which the page then says in words"


def _hazard_codes(checked: Checked) -> Iterator[Fault]:
    for chemical in _hazardous(checked):
        is_classified_as_none = chemical.signal is Signal.NONE and chemical.trust.ghs is not PartTrust.GAP
        if not chemical.h_codes and "h_codes" not in chemical.pending and not is_classified_as_none:
            words = f"{chemical.name} is hazardous, but has no hazard statement"
            yield Fault(chemical.file, "/hazardous", words, _HINT)


def _first_action(checked: Checked) -> Iterator[Fault]:
    for chemical in _hazardous(checked):
        if not (chemical.first_action or _is_covered(chemical, "first_action")):
            words = f"{chemical.name} is hazardous, but nothing says what to do first when it is on skin"
            yield Fault(chemical.file, "/hazardous", words, _HINT)


def _waste_stream(checked: Checked) -> Iterator[Fault]:
    for chemical in _hazardous(checked):
        if not (chemical.waste or _is_covered(chemical, "waste")):
            words = f"{chemical.name} is hazardous, but nothing says where its waste goes"
            yield Fault(chemical.file, "/hazardous", words, _HINT)


def _unknown_mixtures(checked: Checked) -> Iterator[Fault]:
    for etchant in checked.records.etchants.values():
        is_covered = etchant.precaution is not None or "precaution" in etchant.pending
        if etchant.parts_unknown is not None and not is_covered:
            words = f"nobody knows the parts of {etchant.name}, and no precaution covers it"
            yield Fault(etchant.file, "", words, _HINT)


def _hazardous(checked: Checked) -> Iterator[Chemical]:
    return (chemical for chemical in checked.records.chemicals.values() if chemical.hazardous)


def _is_covered(chemical: Chemical, part: str) -> bool:
    """Tell whether a precaution states the part, or the record says that it is pending."""
    return chemical.precaution is not None or bool({part, "precaution"}.intersection(chemical.pending))


RULES: tuple[Rule, ...] = (
    Rule("hazard-codes-missing", _hazard_codes),
    Rule("first-action-missing", _first_action),
    Rule("waste-stream-missing", _waste_stream),
    Rule("precaution-missing", _unknown_mixtures),
)
