"""Selectivities: pairs where wafers carried both films, worst ends else, no upper end without a loss."""

from __future__ import annotations

import math
import statistics

import pytest

from builder.engine import Rank, RateBand
from builder.findings.plan.evidence import NOTHING, Evidence
from builder.findings.selectivities import rate_selectivity, recipe_selectivity
from tests.views.shipped import lab


def _known(low: float, mid: float | None, high: float | None, rank: Rank = Rank.OWN) -> Evidence:
    return Evidence(rank, RateBand(low, mid, high))


def test_pairs_are_wafers_of_one_day() -> None:
    """The middle is the mean of the ratios wafer by wafer, worked out here from the rows themselves."""
    records, computed = lab()
    found = recipe_selectivity(computed, "oxide-rie", "sio2-thermal-wet", "resist-positive-a")
    start = max(run.date for run in records.runs["oxide-rie"] if run.event)
    lost = {
        (run.wafer, run.film): run.before_nm - run.after_nm
        for run in records.runs["oxide-rie"]
        if run.date >= start
    }
    ratios = [
        math.log(lost[wafer, "sio2-thermal-wet"] / lost[wafer, film])
        for wafer, film in lost
        if film == "resist-positive-a" and (wafer, "sio2-thermal-wet") in lost
    ]
    assert found is not None and found.mid is not None and found.lo is not None and found.hi is not None
    assert found.pairs == len(ratios) >= 3
    assert found.mid == pytest.approx(math.exp(statistics.fmean(ratios)), rel=0.01)
    assert found.lo < found.mid < found.hi
    apart = rate_selectivity(
        computed.known("oxide-rie", "sio2-thermal-wet"), computed.known("oxide-rie", "resist-positive-a")
    )
    assert apart is not None and apart.lo is not None and apart.lo < found.lo


def test_without_a_loss_there_is_only_a_lower_end() -> None:
    """A film that showed no loss bounds the selectivity from below and not from above."""
    _, computed = lab()
    found = recipe_selectivity(computed, "silicon-koh", "si-100", "sin-lpcvd")
    assert found is not None and found.lo is not None and found.lo > 1
    assert found.mid is None and found.hi is None


def test_separate_rates_take_the_worst_ends() -> None:
    """Slow target over fast film, and the other way round."""
    found = rate_selectivity(_known(1, 2, 4), _known(0.1, 0.2, 0.5, Rank.UNCHECKED))
    assert found is not None
    assert (found.lo, found.mid, found.hi) == (pytest.approx(2), pytest.approx(10), pytest.approx(40))
    assert found.rank is Rank.UNCHECKED and found.pairs == 0


@pytest.mark.parametrize(
    ("target", "other"),
    [
        (_known(1, 2, 4), NOTHING),
        (NOTHING, _known(1, 2, 4)),
        (_known(0, None, 4), _known(0, None, 4)),
        (_known(1, None, None), _known(0, None, None)),
    ],
)
def test_without_two_numbers_there_is_none(target: Evidence, other: Evidence) -> None:
    """A missing rate, or two limits, give no selectivity: never 0, never infinity."""
    assert rate_selectivity(target, other) is None
