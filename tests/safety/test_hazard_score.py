"""The order of the lesser hazard: graver statements weigh more, what is unknown weighs most."""

from __future__ import annotations

from dataclasses import replace

import pytest

from builder.findings.safety import cautions_of, etchant_hazards, hazard_score
from builder.findings.safety.score import GRAVEST, code_level
from builder.records.lab import LabRecords
from builder.records.terms import Signal
from tests.safety.shipped import shipped_records

RECORDS = shipped_records()


@pytest.mark.parametrize(
    ("graver", "lesser"),
    [
        ("tmah-25b", "koh-30"),
        ("hf-10-1", "koh-30"),
        ("hf-49", "pan-al"),
        ("plasma-cl2-he-275w", "plasma-sf6-he-100w"),
        ("xef2", "plasma-sf6-o2-icp"),
        ("koh-30", "isopropanol"),
        ("cyanide-au", "ki-i2"),
    ],
)
def test_the_graver_etchant_scores_higher(graver: str, lesser: str) -> None:
    """Pairs whose order a safety office would not argue about."""
    assert hazard_score(RECORDS, graver) > hazard_score(RECORDS, lesser)


def _without_codes(chemical: str) -> LabRecords:
    record = RECORDS.chemicals[chemical]
    unknown = replace(record, h_codes=(), pictograms=(), signal=Signal.PENDING, pending=("h_codes",))
    return replace(RECORDS, chemicals={**RECORDS.chemicals, chemical: unknown})


@pytest.mark.parametrize("etchant", ["koh-30", "isopropanol", "pan-al", "plasma-sf6-he-100w"])
def test_forgetting_the_codes_never_makes_an_etchant_lesser(etchant: str) -> None:
    """What nobody knows of a chemical counts as the worst."""
    first = RECORDS.etchants[etchant].parts[0].chemical
    blank = _without_codes(first)
    assert hazard_score(blank, etchant) >= hazard_score(RECORDS, etchant)
    assert hazard_score(blank, etchant) >= 1000 * GRAVEST


def test_dilution_does_not_lower_the_score() -> None:
    """A weak bath is mixed from the strong bottle."""
    assert hazard_score(RECORDS, "hf-100-1") >= hazard_score(RECORDS, "hf-49")


def test_every_statement_on_record_has_a_level_of_its_own() -> None:
    """A statement that is not in the table counts as the gravest, which must not happen to a mild one."""
    assert {code_level(code) for code in ("H290", "H302", "EUH066", "H335")} <= {1, 2}
    assert code_level("H360D") == code_level("H360") == 4
    assert code_level("H999") == GRAVEST


@pytest.mark.parametrize("etchant", sorted(RECORDS.etchants))
def test_an_etchant_inherits_every_statement_of_its_parts(etchant: str) -> None:
    """Nothing is lost between the bottles and the bath, and what is unknown is said in words."""
    record = RECORDS.etchants[etchant]
    hazards = etchant_hazards(RECORDS, etchant)
    parts = [RECORDS.chemicals[part.chemical] for part in record.parts]
    assert {code for code, _ in hazards.codes} == {code for part in parts for code in part.h_codes}
    for part in parts:
        if "h_codes" in part.pending:
            assert any(part.name in words for words in hazards.unknown)
    if not parts:
        assert hazards.unknown
        assert hazards.signal is Signal.PENDING


def test_piranha_says_that_it_makes_gas_and_how_it_is_mixed() -> None:
    """The rules that must not be overlooked stand in the cautions of a plan."""
    words = " ".join(cautions_of(RECORDS, "piranha"))
    assert "closed bottle" in words
    assert "Peroxide slowly into the acid" in words


def test_a_fluoride_says_that_nobody_works_alone() -> None:
    """Also where the acid only forms in the mixture."""
    assert any("not alone" in words for words in cautions_of(RECORDS, "hno3-nh4f-si"))
