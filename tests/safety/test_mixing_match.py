"""What meets what: rules in both orders, never inside one mixture, and no record is no permission."""

from __future__ import annotations

from dataclasses import replace
from itertools import product

import pytest

from builder.checking.rules_safety_meetings import mixture_findings
from builder.records.mixing_match import (
    chemical_presence,
    etchant_presence,
    film_presence,
    holds_hydrofluoric_acid,
    meetings,
    pairs_of_chemicals,
)
from builder.records.record import Part
from builder.records.terms import Origin
from tests.safety.shipped import shipped_records

RECORDS = shipped_records()
LEGITIMATE = [
    "piranha",
    "piranha-base",
    "aqua-regia",
    "rc1",
    "rc2",
    "pan-al",
    "hna-1-3-8",
    "ni-etch",
    "inp-hcl",
]


def _rules(one: str, other: str) -> set[str]:
    found = meetings(RECORDS, chemical_presence(RECORDS, one), chemical_presence(RECORDS, other))
    return {meeting.rule.id for meeting in found}


@pytest.mark.parametrize(
    ("one", "other", "rule"),
    [
        # From the rules as published, by hand: chemical by chemical, group by chemical, group by group.
        ("h2o2-30", "acetone", "p010"),
        ("hno3-70", "ipa", "p017"),
        ("hno3-70", "acetic", "p018"),
        ("nh4oh-28", "i2", "p056"),
        ("naocl", "hcl-37", "p029"),
        ("nacn", "hcl-37", "p078"),
        ("nan3", "h2so4-96", "p081"),
        ("bhf", "h2so4-96", "p047"),
        ("chloroform", "koh", "p054"),
        ("nf3", "h2", "p097"),
    ],
)
def test_a_rule_speaks_in_both_orders(one: str, other: str, rule: str) -> None:
    """Which of two bottles is named first makes no difference."""
    assert rule in _rules(one, other)
    assert _rules(one, other) == _rules(other, one)


def test_every_pair_is_the_same_both_ways_and_none_is_with_itself() -> None:
    """The matrix is symmetric."""
    pairs = pairs_of_chemicals(RECORDS)
    assert len(pairs) > 500
    for (one, other), rules in pairs.items():
        assert set(pairs[other, one]) == set(rules)
        assert one != other


def test_pairs_agree_with_meetings() -> None:
    """The two ways through the rules, by rule and by pair, find the same."""
    pairs = pairs_of_chemicals(RECORDS)
    some = sorted(RECORDS.chemicals)[::6]
    for one, other in product(some, some):
        if one != other and not _is_part(one, other):
            assert {rule.id for rule in pairs.get((one, other), ())} == _rules(one, other), (one, other)


def _is_part(one: str, other: str) -> bool:
    parts = {part.chemical for name in (one, other) for part in RECORDS.chemicals[name].parts}
    return bool(parts)


@pytest.mark.parametrize("etchant", LEGITIMATE)
def test_a_mixture_does_not_forbid_itself(etchant: str) -> None:
    """Piranha is acid and peroxide, aqua regia two acids: that they meet is their use."""
    presence = etchant_presence(RECORDS, etchant)
    own = [
        meeting.rule.id
        for meeting in meetings(RECORDS, presence, presence)
        if meeting.one.chemical is not None and meeting.other.chemical is not None
    ]
    assert own == []


def test_unknown_pairs_exist_and_stay_unknown() -> None:
    """Two harmless-looking chemicals without a rule have no entry, so pages must speak for them."""
    assert ("ar", "water") not in pairs_of_chemicals(RECORDS)


@pytest.mark.parametrize(
    ("etchant", "holds"),
    [
        ("hf-49", True),
        ("hf-100-1", True),
        ("bhf-5-1", True),
        ("hna-1-3-8", True),
        ("hno3-nh4f-si", True),
        ("hf-vapour", True),
        ("ale-tma-hf", True),
        ("kf-1m", False),
        ("pan-al", False),
        ("koh-30", False),
        ("plasma-sf6-o2-icp", False),
    ],
)
def test_hydrofluoric_acid_is_found_also_where_it_forms(etchant: str, holds: bool) -> None:
    """Ammonium fluoride in nitric acid is hydrofluoric acid, whatever the label says."""
    assert holds_hydrofluoric_acid(RECORDS, RECORDS.etchants[etchant]) is holds


@pytest.mark.parametrize(
    ("film", "group"),
    [
        ("gaas", "arsenide"),
        ("inp", "phosphide"),
        ("al-si", "aluminium"),
        ("si-100", "silicon"),
        ("su-8-lab", "resist"),
    ],
)
def test_a_film_is_known_by_its_groups_or_its_formula(film: str, group: str) -> None:
    """A film that somebody forgot to group is still recognised."""
    assert group in {name for _, name in film_presence(RECORDS, film).bearers}


def test_oxides_of_phosphorus_give_no_phosphine() -> None:
    """Phosphosilicate glass holds phosphorus as oxide: it is no phosphide."""
    assert "phosphide" not in {name for _, name in film_presence(RECORDS, "psg").bearers}


def test_no_etchant_on_record_is_a_forbidden_mixture() -> None:
    """The mixtures of the demonstration lab are all made of pairs that are published together."""
    assert [one.id for one in RECORDS.etchants.values() if mixture_findings(RECORDS, one)] == []


def test_a_mixture_that_nobody_published_is_forbidden() -> None:
    """Nitric acid with isopropanol has burst bottles."""
    parts = (Part(chemical="hno3-70", amount="1 part"), Part(chemical="ipa", amount="1 part"))
    mixture = replace(RECORDS.etchants["cu-hno3"], id="own", origin=Origin.LAB, parts=parts)
    assert [finding.rule for finding in mixture_findings(RECORDS, mixture)] == ["p017"]
