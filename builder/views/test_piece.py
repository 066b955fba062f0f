"""The short test that would settle what a plan leaves open: which film, how long, read with what."""

from __future__ import annotations

from builder.findings.plan.result import FilmRow
from builder.records.terms import FilmFamily, Role
from builder.views.number_text import time_text

TEST_S = 600.0
"""Ten minutes: long enough to see a nanometre a minute, short enough to be done today."""


def test_time_s(row: FilmRow) -> float:
    """Return how long a test piece should stay in: ten minutes, or the film's worst exposure if that is shorter."""
    if row.exposure is None or row.exposure.high_s <= 0:
        return TEST_S
    return min(TEST_S, row.exposure.high_s)


def test_piece_words(row: FilmRow, family: FilmFamily | None = None) -> str:
    """Return the test that would settle a film's word."""
    where = "as a mask on the same film, " if row.role is Role.MASK else ""
    return f"etch a test piece of {row.film}, {where}for {time_text(test_time_s(row))} and read {gauge_words(family)}"


def gauge_words(family: FilmFamily | None) -> str:
    """Return the gauge that reads a film of a family."""
    if family is FilmFamily.METAL:
        return "the step or the sheet resistance before and after"
    if family in (FilmFamily.SEMICONDUCTOR, None):
        return "the thickness or the step before and after"
    return "the thickness before and after on the optical gauge"
