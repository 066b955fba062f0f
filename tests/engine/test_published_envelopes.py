"""The envelope of published values: it only widens, and order and repeats do not matter."""

from __future__ import annotations

from dataclasses import replace

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from builder.engine import (
    PublishedKind,
    PublishedValue,
    RateBand,
    envelope,
    widest,
)

SETTINGS = settings(max_examples=150, deadline=None, derandomize=True)
RATES = st.floats(1e-4, 100)
STRETCH = st.floats(1, 20)
BANDS = st.builds(lambda r, a, b: RateBand(r / a, r, r * b), RATES, STRETCH, STRETCH)
OPEN_BANDS = (
    BANDS | BANDS.map(lambda b: replace(b, high=None)) | BANDS.map(lambda b: RateBand(0.0, None, b.high))
)

SPANS = st.builds(
    lambda low, f, s: PublishedValue(PublishedKind.VALUE, low, low * f, s), RATES, STRETCH, st.floats(0, 1)
)
UPPER = st.builds(
    lambda high, t: PublishedValue(PublishedKind.UPPER, None, high, 0.6, t),
    RATES,
    st.none() | st.floats(1, 1e4),
)
LOWER = st.builds(lambda low: PublishedValue(PublishedKind.LOWER, low, None, 0.6), RATES)
VALUES = st.lists(SPANS | UPPER | LOWER, min_size=1, max_size=6)


@given(VALUES, VALUES, st.floats(0.5, 2.5), st.floats(0, 1))
@SETTINGS
def test_further_values_or_more_confidence_never_narrow_an_envelope(
    values: list[PublishedValue], further: list[PublishedValue], quantile: float, more: float
) -> None:
    """The ends move outwards only; a lower limit opens the high end for good."""
    one = envelope(values, quantile)
    assert one is not None
    for other in (envelope([*values, *further], quantile), envelope(values, quantile + more)):
        assert other is not None
        assert other.band.low <= one.band.low
        assert other.band.high is None or (one.band.high is not None and other.band.high >= one.band.high)


@given(VALUES, st.floats(0.5, 2.5))
@SETTINGS
def test_repeats_and_order_of_published_values_do_not_matter(
    values: list[PublishedValue], quantile: float
) -> None:
    """The same fact twice counts once."""
    one = envelope(values, quantile)
    other = envelope([*reversed(values), *values], quantile)
    assert one is not None
    assert other is not None
    assert (other.band.low, other.band.high, other.limit_time_s) == (
        one.band.low,
        one.band.high,
        one.limit_time_s,
    )
    assert (other.band.mid is None) == (one.band.mid is None)
    if one.band.mid is not None:
        assert other.band.mid == pytest.approx(one.band.mid, rel=1e-9)


@given(VALUES, st.floats(0.5, 2.5))
@SETTINGS
def test_an_envelope_stands_in_order(values: list[PublishedValue], quantile: float) -> None:
    """Low below middle below high, unless a printed upper limit lies below another text's value."""
    found = envelope(values, quantile)
    assert found is not None
    if found.band.high is not None:
        assert found.band.low <= found.band.high
    if found.band.mid is not None and all(v.kind is PublishedKind.VALUE for v in values):
        assert found.band.high is not None
        assert found.band.low * (1 - 1e-9) <= found.band.mid <= found.band.high * (1 + 1e-9)
    assert envelope([], quantile) is None


@given(st.lists(OPEN_BANDS, min_size=1, max_size=5), OPEN_BANDS)
@SETTINGS
def test_a_further_member_never_narrows_a_family(bands: list[RateBand], further: RateBand) -> None:
    """The envelope of whole bands holds every one of them."""
    one, other = widest(bands), widest([*bands, further])
    assert other.low <= min(one.low, further.low)
    assert other.high is None or (one.high is not None and other.high >= one.high)
