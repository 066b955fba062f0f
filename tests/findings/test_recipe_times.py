"""The depth a page asks for, and the times for it."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from builder.findings.recipe_times import UNKNOWN_DEPTH_NM, target_timings, usual_depth_nm
from tests.views.shipped import RECIPES, lab


def _is_round(depth_nm: float) -> bool:
    digits = f"{depth_nm:.6e}".partition("e")[0].rstrip("0").rstrip(".")
    return digits in {"1", "2", "3", "5"}


@pytest.mark.parametrize("recipe", RECIPES)
def test_the_usual_depth_is_round_and_near_the_runs(recipe: str) -> None:
    """A depth of one digit, within a factor of two of what the runs in use removed."""
    _, computed = lab()
    timing = target_timings(computed, recipe)[0]
    own = computed.own[recipe][timing.film]
    lost = [max(row.before_nm - row.after_nm for row in run.rows) for run in own.used]
    assert _is_round(timing.usual_nm)
    assert min(lost) / 2 <= timing.usual_nm <= max(lost) * 2


@pytest.mark.parametrize("recipe", RECIPES)
def test_stated_depths_rise_and_so_do_their_times(recipe: str) -> None:
    """Three depths around the usual one; a deeper etch is never shorter."""
    _, computed = lab()
    timing = target_timings(computed, recipe)[0]
    small, usual, great = timing.stated_depths_nm
    assert small < usual == timing.usual_nm < great
    assert all(_is_round(depth) for depth in (small, great))
    stops = [timing.times(depth).latest_stop_s for depth in (small, usual, great)]
    known = [stop for stop in stops if stop is not None]
    assert known == sorted(known) and len(known) == 3


def test_without_runs_a_plain_depth_stands_in() -> None:
    """No run shows what the recipe is for."""
    assert usual_depth_nm(None) == UNKNOWN_DEPTH_NM


@given(st.sampled_from(RECIPES), st.floats(1, 1e6))
def test_the_latest_stop_is_enough_at_the_slow_end(recipe: str, depth_nm: float) -> None:
    """At the low end of the rate, where the wafer etches slowest, the thickest film is gone by then."""
    _, computed = lab()
    timing = target_timings(computed, recipe)[0]
    stop = timing.times(depth_nm).latest_stop_s
    assert stop is not None and timing.band is not None
    removed = timing.band.low * (1 - timing.phi) * (stop - timing.offset_s)
    assert stop == 0 or removed >= depth_nm * (1 + timing.tolerance) * (1 - 1e-9)
