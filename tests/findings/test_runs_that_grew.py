"""A run in which the film got thicker says nothing: its readings may be exchanged."""

from __future__ import annotations

from dataclasses import replace

import pytest

from builder.findings.own_rates import LeftOut, own_rate
from builder.records.lab import LabRecords

RECIPE, FILM = "oxide-bhf", "si-100"


@pytest.mark.parametrize(("gain_nm", "counts"), [(0.5, True), (100.0, False)])
def test_a_clear_gain_is_no_limit(records: LabRecords, gain_nm: float, counts: bool) -> None:
    """The readings of silicon in buffered HF have an uncertainty of 0.6 nm each."""
    grown = tuple(
        replace(run, after_nm=run.before_nm + gain_nm) if run.film == FILM else run
        for run in records.runs[RECIPE]
    )
    changed = replace(records, runs={**records.runs, RECIPE: grown})
    rate = own_rate(changed, changed.etches[RECIPE], FILM)
    assert rate is not None
    assert (rate.next_run is not None) is counts
    expected = set() if counts else {LeftOut.SAYS_NOTHING}
    assert {run.left_out for run in rate.runs} - {None, LeftOut.EARLIER_SERIES} == expected
