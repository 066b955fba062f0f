"""How thick a mask must be, so that its reserve is left after what it loses."""

from __future__ import annotations

from builder.engine.allowed import Allowance
from builder.engine.errors import DomainError
from builder.engine.timing import Cut


def least_mask(loss_nm: float, rules: Allowance, *, resist_in_plasma: bool) -> float:
    """
    Least thickness of a mask that may lose `loss_nm` and keeps its reserve, nm.

    The inverse of `allowed_mask`: both the share and the length of the reserve must be left, and no
    thinner mask than `rules.none_below_nm` has a default at all.

    Raises
    ------
    DomainError
        `loss_nm` negative.

    Source
    ------
    docs/methods/loss.md.
    """
    if not loss_nm >= 0:
        raise DomainError("loss_nm", loss_nm, "loss_nm >= 0")
    if resist_in_plasma:
        share, length = rules.reserve_resist_plasma_fraction, rules.reserve_resist_plasma_nm
    else:
        share, length = rules.reserve_fraction, rules.reserve_nm
    return max(loss_nm / (1 - share), loss_nm + length, rules.none_below_nm)


def mask_loss_by_selectivity(cut: Cut, selectivity_low: float) -> float:
    """
    Mask lost where it goes fastest when the slowest place of the target has cleared, nm.

    (h (1 + delta) / (1 - phi)) (1 + overetch) (1 + phi) / S_low: what bath or chamber do to both films
    alike drops out. Holds for an etch that is stopped on clearing, plus its overetch; an etch left to
    the timer takes more.

    Raises
    ------
    DomainError
        `selectivity_low` not > 0.

    Source
    ------
    docs/methods/loss.md.
    """
    if not selectivity_low > 0:
        raise DomainError("selectivity_low", selectivity_low, "selectivity_low > 0")
    deepest = cut.depth_nm * (1 + cut.tolerance) / (1 - cut.nonuniformity) * (1 + cut.overetch)
    return deepest * (1 + cut.nonuniformity) / selectivity_low
