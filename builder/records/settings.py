"""The settings of a lab: what it states, over the shipped defaults; and the fitted spread."""

from __future__ import annotations

import datetime
from collections.abc import Mapping
from dataclasses import dataclass

from builder.records.conversion import Data, Length, Percent, Time, from_data
from builder.records.record import Record
from builder.records.terms import Origin


@dataclass(frozen=True, slots=True, kw_only=True)
class SigmaLiterature:
    """Standard deviation of ln(rate) between a published rate and the rate in this lab."""

    wet_close: float
    wet_other: float
    plasma: float
    cyclic: float
    vapour: float


@dataclass(frozen=True, slots=True, kw_only=True)
class PriorSpread:
    """Relative run-to-run standard deviation and the degrees of freedom it counts for."""

    s0: float
    d0: float


@dataclass(frozen=True, slots=True, kw_only=True)
class PriorSpreads:
    """Prior run-to-run spread by method."""

    wet_thermostated: PriorSpread
    wet_open: PriorSpread
    plasma: PriorSpread
    cyclic: PriorSpread
    vapour: PriorSpread


@dataclass(frozen=True, slots=True, kw_only=True)
class Nonuniformity:
    """Half-range of the rate over the wafer less its outer 5 mm, where a recipe states none."""

    immersion: Percent
    gas_bubbles: Percent
    vapour: Percent
    plasma: Percent
    deep_silicon: Percent


@dataclass(frozen=True, slots=True, kw_only=True)
class ReactionTime:
    """Time from seeing the end of an etch to its stop."""

    wet: Time
    plasma: Time


@dataclass(frozen=True, slots=True, kw_only=True)
class ShareAndLength:
    """A limit given as a share of the thickness and as a length, never below `at_least` if given."""

    share: Percent
    length: Length
    at_least: Length | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class AllowedLoss:
    """Allowed loss where a sample states none; films thinner than `none_below` have no default."""

    under: ShareAndLength
    other: ShareAndLength
    none_below: Length


@dataclass(frozen=True, slots=True, kw_only=True)
class MaskReserve:
    """What must remain of a mask: the larger of share and length."""

    resist_plasma: ShareAndLength
    other: ShareAndLength


@dataclass(frozen=True, slots=True, kw_only=True)
class Defaults:
    """Numbers used where neither a record nor the sample states one."""

    sigma_literature: SigmaLiterature
    spread: PriorSpreads
    nonuniformity: Nonuniformity
    thickness_tolerance: Percent
    reaction_time: ReactionTime
    allowed_loss: AllowedLoss
    mask_reserve: MaskReserve


@dataclass(frozen=True, slots=True, kw_only=True)
class Contact:
    """A role and how to reach it."""

    role: str
    reach: str


@dataclass(frozen=True, slots=True, kw_only=True)
class GaugeError:
    """Relative standard uncertainty shared by all readings of the gauge."""

    relative: Percent


@dataclass(frozen=True, slots=True, kw_only=True)
class LabSettings(Record):
    """
    The settings in force. `origin` is `reference` where the lab has no settings of its own.

    `confidence` is two-sided, in (0.5, 1). `gauge_error` None is unknown. `as_of` None means the clock.
    """

    name: str
    confidence: float
    stale_after_days: float
    defaults: Defaults
    invented: bool = False
    as_of: datetime.date | None = None
    contacts: tuple[Contact, ...] = ()
    local_rules: tuple[str, ...] = ()
    gauge_error: GaugeError | None = None
    note: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class FitWithout:
    """Fitted spread of one method with one recipe left out, for that recipe."""

    recipe: str
    s0: float
    d0: float


@dataclass(frozen=True, slots=True, kw_only=True)
class FittedSpread:
    """Fitted spread of one method, with what entered the fit; `without` only where recipes are few."""

    s0: float
    d0: float
    recipes: int
    runs: int
    from_prior: bool
    without: tuple[FitWithout, ...] = ()


@dataclass(frozen=True, slots=True, kw_only=True)
class FittedSpreads:
    """Fitted spread by method; None where no fit is stored, so that the prior stands."""

    wet_thermostated: FittedSpread | None = None
    wet_open: FittedSpread | None = None
    plasma: FittedSpread | None = None
    cyclic: FittedSpread | None = None
    vapour: FittedSpread | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class SpreadRecord(Record):
    """The spread stored by the last fit, and its day."""

    as_of: datetime.date
    methods: FittedSpreads


def settings_over(shipped: Data, own: Data | None, file: str) -> LabSettings:
    """
    Return the settings in force: each key of the lab's own file over that of the shipped one.

    Both have passed the schema of lab settings; `shipped` states every default. `file` is the lab's
    file, or the shipped one where the lab has none.
    """
    if own is None:
        return from_data(LabSettings, shipped, id="lab", file=file, origin=Origin.REFERENCE)
    return from_data(LabSettings, _merged(shipped, own), id="lab", file=file, origin=Origin.LAB)


def _merged(under: Data, over: Data) -> dict[str, object]:
    merged = dict(under)
    for key, value in over.items():
        below = merged.get(key)
        both = isinstance(value, Mapping) and isinstance(below, Mapping)
        merged[key] = _merged(below, value) if both else value  # type: ignore[arg-type]
    return merged
