"""The mask needed: what is left after the loss is the reserve, no less and no more."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from builder.engine import (
    Allowance,
    Cut,
    DomainError,
    allowed_mask,
    least_mask,
    mask_loss_by_selectivity,
)

RULES = Allowance(
    under_fraction=0.05, under_nm=10.0, other_fraction=0.02, other_nm=5.0, other_least_nm=1.0,
    reserve_resist_plasma_fraction=0.2, reserve_resist_plasma_nm=200.0, reserve_fraction=0.1,
    reserve_nm=20.0, none_below_nm=20.0,
)  # fmt: skip
losses = st.floats(min_value=0.0, max_value=1e6)


@given(losses, st.booleans())
def test_the_least_mask_may_lose_what_it_loses(loss_nm: float, in_plasma: bool) -> None:
    """The thickness found is allowed the loss, and one a thousandth thinner is not, or is too thin at all."""
    needed = least_mask(loss_nm, RULES, resist_in_plasma=in_plasma)
    allowed = allowed_mask(needed * (1 + 1e-9), RULES, resist_in_plasma=in_plasma)
    assert allowed is not None and allowed >= loss_nm
    thinner = allowed_mask(needed * 0.999, RULES, resist_in_plasma=in_plasma)
    assert thinner is None or loss_nm == 0 or thinner < loss_nm


def test_a_negative_loss_is_refused() -> None:
    """No film grows in an etch that was measured as an etch."""
    with pytest.raises(DomainError):
        least_mask(-1.0, RULES, resist_in_plasma=False)


@given(
    depth=st.floats(10, 1e5), selectivity=st.floats(0.1, 1e3), phi=st.floats(0, 0.3),
    tolerance=st.floats(0, 0.2), rate=st.floats(0.01, 100),
)  # fmt: skip
def test_the_mask_loss_is_that_of_an_etch_stopped_on_clearing(
    depth: float, selectivity: float, phi: float, tolerance: float, rate: float
) -> None:
    """Whatever the rate of the day: time to clear the slowest place, times the mask's rate at its fastest."""
    cut = Cut(depth, depth, tolerance, phi, 0.0, 0.0, 15.0, True)
    clears_s = depth * (1 + tolerance) / (rate * (1 - phi))
    lost = rate / selectivity * (1 + phi) * clears_s
    assert mask_loss_by_selectivity(cut, selectivity) == pytest.approx(lost, rel=1e-9)


def test_a_selectivity_of_zero_is_refused() -> None:
    """A lower end of 0 says nothing, so it gives no thickness."""
    with pytest.raises(DomainError):
        mask_loss_by_selectivity(Cut(100, 100, 0, 0, 0, 0, 15, True), 0.0)
