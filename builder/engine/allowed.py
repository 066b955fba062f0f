"""How much a film may lose when nobody has said."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Allowance:
    """
    The lab's default allowances; fractions and nm.

    A film under the target loses at most min(under_fraction h, under_nm); any other
    min(other_fraction h, other_nm) but at least other_least_nm; a mask keeps
    max(fraction h, nm) and may lose the rest. Below `none_below_nm` there is no default.
    """

    under_fraction: float
    under_nm: float
    other_fraction: float
    other_nm: float
    other_least_nm: float
    reserve_resist_plasma_fraction: float
    reserve_resist_plasma_nm: float
    reserve_fraction: float
    reserve_nm: float
    none_below_nm: float


def allowed_under(thickness_nm: float, rules: Allowance) -> float | None:
    """Allowed loss of the film under the target, nm; None for a film too thin for a default."""
    if thickness_nm < rules.none_below_nm:
        return None
    return min(rules.under_fraction * thickness_nm, rules.under_nm)


def allowed_other(thickness_nm: float, rules: Allowance) -> float | None:
    """Allowed loss of any other kept film, nm; None for a film too thin for a default."""
    if thickness_nm < rules.none_below_nm:
        return None
    return max(rules.other_least_nm, min(rules.other_fraction * thickness_nm, rules.other_nm))


def allowed_mask(thickness_nm: float, rules: Allowance, *, resist_in_plasma: bool) -> float | None:
    """Allowed loss of a mask, nm: what is left above its reserve, never below 0."""
    if thickness_nm < rules.none_below_nm:
        return None
    if resist_in_plasma:
        reserve = max(rules.reserve_resist_plasma_fraction * thickness_nm, rules.reserve_resist_plasma_nm)
    else:
        reserve = max(rules.reserve_fraction * thickness_nm, rules.reserve_nm)
    return max(0.0, thickness_nm - reserve)
