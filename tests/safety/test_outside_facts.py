"""Chemicals against sources outside: check digits, masses, boiling points, UN GHS labels."""

from __future__ import annotations

import re

import chemicals
import molmass
import periodictable
import pytest

from builder.records.chemicals import Chemical
from builder.records.terms import Signal
from tests.safety.shipped import shipped_records
from tests.safety.un_ghs import derived_pictograms, derived_signal

_ALL = sorted(shipped_records().chemicals.values(), key=lambda one: one.id)
_WITH_MASS = [one for one in _ALL if one.molar_mass is not None]
_WITH_BOILING = [one for one in _ALL if one.boiling_point is not None]
_WITH_CODES = [one for one in _ALL if one.h_codes]
_MASS_TOLERANCE = 2e-4
"""Relative: atomic masses of the two libraries differ by up to 1e-4 (chlorine, sulfur)."""
_BOILING_TOLERANCE_K = 0.7
"""Collections differ by so much for phosgene, HCN and NF3; the records print a tenth of a degree."""
_LABEL_DEVIATIONS: dict[str, str] = {}
"""Chemicals whose label differs from the derivation, each with its reason. None does at present."""


def _digits_fit(number: str) -> bool:
    """Digits from the right, weighted 1, 2, 3 ..., modulo 10 (CAS, "Check Digit Verification")."""
    digits = number.replace("-", "")
    return sum(int(d) * w for w, d in enumerate(reversed(digits[:-1]), 1)) % 10 == int(digits[-1])


@pytest.mark.parametrize("chemical", _ALL, ids=lambda one: one.id)
def test_cas_numbers_carry_their_check_digit(chemical: Chemical) -> None:
    """A slip in one digit would send people to the data sheet of another substance."""
    assert chemical.cas, "a chemical without a CAS number cannot be looked up"
    for number in chemical.cas:
        assert re.fullmatch(r"\d{2,7}-\d{2}-\d", number)
        assert _digits_fit(number), number


def test_the_check_digit_notices_one_wrong_digit() -> None:
    """The check itself can fail: each single digit of a number changed is noticed."""
    right = "7664-39-3"
    wrong = [
        right[:place] + str((int(right[place]) + 1) % 10) + right[place + 1 :]
        for place in range(len(right))
        if right[place] != "-"
    ]
    assert _digits_fit(right)
    assert not any(map(_digits_fit, wrong))


@pytest.mark.parametrize("chemical", _WITH_MASS, ids=lambda one: one.id)
def test_molar_mass_follows_from_the_formula(chemical: Chemical) -> None:
    """Two libraries of atomic masses (molmass: CIAAW; periodictable: IUPAC, NIST) agree with the record."""
    assert chemical.molar_mass is not None
    recorded = chemical.molar_mass.number
    assert recorded == pytest.approx(molmass.Formula(chemical.formula).mass, rel=_MASS_TOLERANCE)
    assert recorded == pytest.approx(periodictable.formula(chemical.formula).mass, rel=_MASS_TOLERANCE)


@pytest.mark.parametrize("chemical", _WITH_BOILING, ids=lambda one: one.id)
def test_boiling_point_agrees_with_the_collection(chemical: Chemical) -> None:
    """`chemicals` (C. Bell and others, after CRC Handbook and Common Chemistry) has it by CAS number."""
    assert chemical.boiling_point is not None
    found = [chemicals.Tb(number) for number in chemical.cas]
    assert any(
        value is not None and abs(value - chemical.boiling_point.number) <= _BOILING_TOLERANCE_K
        for value in found
    ), (chemical.boiling_point.text, found)


def test_enough_is_compared() -> None:
    """The comparisons above do not run empty."""
    assert (len(_WITH_MASS), len(_WITH_BOILING), len(_WITH_CODES)) >= (70, 60, 68)


@pytest.mark.parametrize("chemical", _WITH_CODES, ids=lambda one: one.id)
def test_pictograms_and_signal_word_follow_from_the_statements(chemical: Chemical) -> None:
    """The label is the one that UN GHS derives from the hazard statements, or the deviation is named."""
    label = (set(chemical.pictograms), chemical.signal.value)
    derived = (derived_pictograms(chemical.h_codes), derived_signal(chemical.h_codes))
    assert (label == derived) is (chemical.id not in _LABEL_DEVIATIONS), (label, derived)


def test_precedence_leaves_out_the_exclamation_mark() -> None:
    """By UN GHS 1.4.10.5.3.1: skull over mark, corrosion over irritation, sensitiser over skin."""
    assert derived_pictograms(["H301", "H315", "H336"]) == {"GHS06"}
    assert derived_pictograms(["H314", "H319"]) == {"GHS05"}
    assert derived_pictograms(["H314", "H319", "H302"]) == {"GHS05", "GHS07"}
    assert derived_pictograms(["H290", "H319"]) == {"GHS05", "GHS07"}
    assert derived_pictograms(["H334", "H317"]) == {"GHS08"}


def test_a_wrong_label_would_be_noticed() -> None:
    """Leaving out any one pictogram of any chemical is noticed."""
    for chemical in _WITH_CODES:
        for pictogram in chemical.pictograms:
            assert set(chemical.pictograms) - {pictogram} != derived_pictograms(chemical.h_codes), chemical.id


def test_no_label_stands_without_statements() -> None:
    """A signal word without a statement behind it would be a guess."""
    for chemical in _ALL:
        if not chemical.h_codes:
            assert chemical.signal in (Signal.NONE, Signal.PENDING)
            assert not chemical.pictograms
