"""The lab's defaults, in the units of a plan."""

from __future__ import annotations

from typing import TYPE_CHECKING

from builder.engine import Allowance
from builder.findings.plan.facts import Defaults
from builder.records.terms import Method

if TYPE_CHECKING:
    from builder.records.settings import LabSettings


def defaults_of(settings: LabSettings) -> Defaults:
    """Return the defaults in force, in canonical units."""
    given = settings.defaults
    under, other = given.allowed_loss.under, given.allowed_loss.other
    resist, reserve = given.mask_reserve.resist_plasma, given.mask_reserve.other
    return Defaults(
        confidence=settings.confidence,
        tolerance=given.thickness_tolerance.number,
        phi_immersion=given.nonuniformity.immersion.number,
        phi_bubbles=given.nonuniformity.gas_bubbles.number,
        phi_vapour=given.nonuniformity.vapour.number,
        phi_plasma=given.nonuniformity.plasma.number,
        phi_cyclic=given.nonuniformity.deep_silicon.number,
        reaction_wet_s=given.reaction_time.wet.number,
        reaction_plasma_s=given.reaction_time.plasma.number,
        allowance=Allowance(
            under_fraction=under.share.number,
            under_nm=under.length.number,
            other_fraction=other.share.number,
            other_nm=other.length.number,
            other_least_nm=0.0 if other.at_least is None else other.at_least.number,
            reserve_resist_plasma_fraction=resist.share.number,
            reserve_resist_plasma_nm=resist.length.number,
            reserve_fraction=reserve.share.number,
            reserve_nm=reserve.length.number,
            none_below_nm=given.allowed_loss.none_below.number,
        ),
    )


def default_phi(defaults: Defaults, method: Method, *, gas_bubbles: bool) -> float:
    """Return the non-uniformity of an etch that states none."""
    if method is Method.PLASMA:
        return defaults.phi_plasma
    if method is Method.CYCLIC:
        return defaults.phi_cyclic
    if method is Method.VAPOUR:
        return defaults.phi_vapour
    return defaults.phi_bubbles if gas_bubbles else defaults.phi_immersion
