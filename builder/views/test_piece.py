"""The short test that would settle what a plan leaves open: which film, how long, read with what."""

from __future__ import annotations

from builder.engine import Ground
from builder.findings.plan.result import FilmRow
from builder.records.terms import FilmFamily, Role
from builder.views.number_text import time_text

_SETTLED_BY_TEST = frozenset(
    {Ground.BEYOND_TESTED_TIME, Ground.NO_EVIDENCE, Ground.NO_HIGH_END, Ground.STRADDLES, Ground.UNCHECKED}
)

TEST_S = 600.0
"""Ten minutes: long enough to see a nanometre a minute, short enough to be done today."""


def needs_test_piece(row: FilmRow) -> bool:
    """Tell whether a measurement of the film would settle its word; what is not stated needs none."""
    return not row.rank.can_hold or row.ground in _SETTLED_BY_TEST


def piece_time_s(row: FilmRow) -> float:
    """Return how long a test piece should stay in: ten minutes, or the worst exposure if that is shorter."""
    if row.exposure is None or row.exposure.high_s <= 0:
        return TEST_S
    return min(TEST_S, row.exposure.high_s)


def piece_words(row: FilmRow, family: FilmFamily | None = None) -> str:
    """Return the test that would settle a film's word."""
    where = " on the same film as here" if row.role is Role.MASK else ""
    time = time_text(piece_time_s(row))
    return f"etch a test piece of {row.film}{where} for {time} and read {gauge_words(family)}"


def gauge_words(family: FilmFamily | None) -> str:
    """Return the gauge that reads a film of a family."""
    if family is FilmFamily.METAL:
        return "the step or the sheet resistance before and after"
    if family in (FilmFamily.SEMICONDUCTOR, None):
        return "the thickness or the step before and after"
    return "the thickness before and after on the optical gauge"
