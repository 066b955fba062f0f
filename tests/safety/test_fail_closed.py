"""Closed where facts are missing: a hazardous chemical robbed of a fact is an error, or says pending."""

from __future__ import annotations

import datetime
from dataclasses import replace

import pytest

from builder.checking.rule import Checked
from builder.checking.rules_safety import RULES
from builder.records.chemicals import Chemical
from builder.records.terms import Signal
from tests.safety.shipped import shipped_records

RECORDS = shipped_records()
HAZARDOUS = [one for one in RECORDS.chemicals.values() if one.hazardous]
_BY_NAME = {rule.name: rule for rule in RULES}


def _faults(chemical: Chemical, rule: str) -> list[str]:
    records = replace(RECORDS, chemicals={chemical.id: chemical})
    checked = Checked(records, {}, {}, frozenset(), datetime.date(2026, 6, 1))
    return [problem.file for problem in _BY_NAME[rule].problems(checked)]


@pytest.mark.parametrize("chemical", HAZARDOUS, ids=lambda one: one.id)
def test_a_hazardous_chemical_without_its_codes_is_an_error(chemical: Chemical) -> None:
    """A blank is not "no hazard"; only the word pending lets it pass."""
    robbed = replace(chemical, h_codes=(), signal=Signal.DANGER, pending=())
    assert _faults(robbed, "hazard-codes-missing") == [chemical.file]
    assert _faults(replace(robbed, pending=("h_codes",)), "hazard-codes-missing") == []


@pytest.mark.parametrize("chemical", HAZARDOUS, ids=lambda one: one.id)
@pytest.mark.parametrize(
    ("rule", "fact"), [("first-action-missing", "first_action"), ("waste-stream-missing", "waste")]
)
def test_a_hazardous_chemical_without_first_action_or_waste_is_an_error(
    chemical: Chemical, rule: str, fact: str
) -> None:
    """Neither of its own nor by a precaution: then nobody would know what to do."""
    robbed = replace(chemical, first_action=None, waste=None, precaution=None, pending=())
    assert _faults(robbed, rule) == [chemical.file]
    assert _faults(replace(robbed, **{fact: "stated"}), rule) == []
    assert _faults(replace(robbed, pending=(fact,)), rule) == []


def test_the_shipped_chemicals_pass() -> None:
    """What they lack, they say."""
    for chemical in RECORDS.chemicals.values():
        for rule in ("hazard-codes-missing", "first-action-missing", "waste-stream-missing"):
            assert _faults(chemical, rule) == [], (chemical.id, rule)


def test_what_is_not_hazardous_is_left_alone() -> None:
    """Water needs no first action."""
    water = replace(RECORDS.chemicals["water"], precaution=None, pending=())
    assert _faults(water, "first-action-missing") == []
