"""How long a recipe runs for a depth, and which depths a page asks for when nobody has typed one."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from builder.engine import Cut, RateBand, Schedule, schedule
from builder.findings.computed import Computed
from builder.findings.own_rates import OwnRate
from builder.findings.plan.evidence import Evidence
from builder.findings.plan.option import phi_of, reaction_of

UNKNOWN_DEPTH_NM = 100.0
"""The depth a page asks for where no run shows what the recipe is used for. Common practice, no source."""

_STEPS = (1.0, 2.0, 3.0, 5.0)
"""Round depths in each decade."""


@dataclass(frozen=True, slots=True)
class TargetTiming:
    """
    One film that a recipe removes: its rate, and what else fixes the time.

    `tolerance`, `phi` and `overetch` are fractions; `offset_s` is induction plus transfer.
    """

    film: str
    known: Evidence
    tolerance: float
    phi: float
    offset_s: float
    overetch: float
    reaction_s: float
    usual_nm: float

    @property
    def band(self) -> RateBand | None:
        """The rate, nm/s; None where there is no number."""
        return self.known.band

    def cut(self, depth_nm: float) -> Cut:
        """Return the removal of a film of this thickness, to its end."""
        return Cut(
            depth_nm=depth_nm, thickness_nm=depth_nm, tolerance=self.tolerance, nonuniformity=self.phi,
            offset_s=self.offset_s, overetch=self.overetch, reaction_s=self.reaction_s, through=True,
        )  # fmt: skip

    def times(self, depth_nm: float) -> Schedule:
        """Return the times for a film of this thickness."""
        return schedule(self.band, self.cut(depth_nm))

    @property
    def stated_depths_nm(self) -> tuple[float, float, float]:
        """The usual depth between a smaller and a greater round one, nm."""
        place = _place(self.usual_nm)
        return _round_depth(place - 2), self.usual_nm, _round_depth(place + 2)


def target_timing(computed: Computed, etch_id: str, film: str) -> TargetTiming:
    """Return the timing of one target of a recipe."""
    recipe = computed.facts.etches[etch_id]
    etching = computed.etching(etch_id)
    return TargetTiming(
        film=film,
        known=computed.known(etch_id, film),
        tolerance=computed.facts.defaults.tolerance,
        phi=phi_of(computed.facts, etching),
        offset_s=recipe.offset_s,
        overetch=recipe.overetch,
        reaction_s=reaction_of(computed.facts, etching),
        usual_nm=usual_depth_nm(computed.own[etch_id].get(film)),
    )


def target_timings(computed: Computed, etch_id: str) -> tuple[TargetTiming, ...]:
    """Return the timings of a recipe's targets: those with own runs first, else as the recipe lists them."""
    own, targets = computed.own[etch_id], computed.facts.etches[etch_id].targets
    ordered = sorted(targets, key=lambda film: (film not in own, targets.index(film)))
    return tuple(target_timing(computed, etch_id, film) for film in ordered)


def usual_depth_nm(own: OwnRate | None) -> float:
    """Return the round depth nearest to the middle one of the runs in use."""
    depths = [] if own is None else sorted(_depths(own))
    middle = depths[(len(depths) - 1) // 2] if depths else UNKNOWN_DEPTH_NM
    return _nearest_round(middle)


def _depths(own: OwnRate) -> Sequence[float]:
    deepest = [max(row.before_nm - row.after_nm for row in run.rows) for run in own.used]
    return [depth for depth in deepest if depth > 0]


def _nearest_round(depth_nm: float) -> float:
    place = _place(depth_nm)
    choices = [_round_depth(place + step) for step in (-1, 0, 1)]
    return min(choices, key=lambda choice: abs(math.log(choice / depth_nm)))


def _place(depth_nm: float) -> int:
    """Place of the greatest round depth that is not greater, counted from 1 nm."""
    decade = math.floor(math.log10(depth_nm))
    share = depth_nm / 10.0**decade
    return decade * len(_STEPS) + sum(step <= share for step in _STEPS) - 1


def _round_depth(place: int) -> float:
    decade, step = divmod(place, len(_STEPS))
    return float(f"{_STEPS[step]:g}e{decade}")
