"""What a plan says, as plain values: words are made of these elsewhere."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from enum import StrEnum

from builder.engine import Exposure, Ground, Mode, Rank, RateBand, Schedule, Span, Verdict
from builder.records.terms import Effect, Method, Role, Treatment

Value = str | float | None


class CapCode(StrEnum):
    """What keeps a film from the word "holds", each lifted by a record or a statement."""

    ADVERSE = "adverse"
    ADHESION = "adhesion"
    ADHESION_TIME = "adhesion-time"
    BACK = "back"
    BARRIER = "barrier"
    CARRIER_LOAD = "carrier-load"
    CONFLICT = "conflict"
    COUPLE = "couple"
    COUPLE_UNDERCUT = "couple-undercut"
    EARLIER_LOSS = "earlier-loss"
    EDGE = "edge"
    FAMILY = "family"
    HEAT = "heat"
    HEAT_LIMIT = "heat-limit"
    LINE = "line"
    LOAD = "load"
    PUBLISHED_CHAMBER = "published-chamber"
    THROUGH_WAFER = "through-wafer"
    UNDER_NOBLE = "under-noble"
    UNDERCUT_ASSUMED = "undercut-assumed"
    UNDERCUT_UNKNOWN = "undercut-unknown"
    WINDOW = "window"


class LostCode(StrEnum):
    """What makes a film lost whatever its number."""

    COUPLE = "couple"
    LINE = "line"
    MASK_FAILS = "mask-fails"
    ROUGHENED = "roughened"


class NoteCode(StrEnum):
    """What a reader of an option must know beside its verdict."""

    NOT_A_TARGET = "not-a-target"
    DRAFT = "draft"
    CONFLICT = "conflict"
    FAR = "far"
    STALE = "stale"
    ALL_TEMPERATURES = "all-temperatures"
    TIME_OUTSIDE_RUNS = "time-outside-runs"
    COUPLE_TARGET = "couple-target"
    UNDERCUT_ASSUMED = "undercut-assumed"
    GAS = "gas"
    MEETING = "meeting"
    HAZARD = "hazard"
    RESIDUE_OF_TARGET = "residue-of-target"


class UnstatedCode(StrEnum):
    """What the sample does not say and a better answer needs."""

    BACK = "back"
    EDGE = "edge"
    UNDER_NOBLE = "under-noble"
    ALLOWED = "allowed"
    TEMPERATURE = "temperature"
    LOAD = "load"
    LINE = "line"
    STOP = "stop"
    WINDOW = "window"


class ExcludedCode(StrEnum):
    """Why an etch is not offered."""

    NO_EVIDENCE = "no-evidence"
    DOES_NOT_ETCH = "does-not-etch"
    RETIRED = "retired"
    TOOL_REFUSES = "tool-refuses"
    METHOD = "method"
    TOOL = "tool"
    ETCHANT = "etchant"
    TOO_HOT = "too-hot"
    OTHER_TEMPERATURE = "other-temperature"
    SAFETY = "safety"
    MEETING = "meeting"


@dataclass(frozen=True)
class Remark:
    """A code, and the values that its sentence needs."""

    code: str
    params: Mapping[str, Value] = field(default_factory=dict)

    @property
    def key(self) -> tuple[str, str]:
        """Order of remarks, and what makes two of them one."""
        return self.code, repr(sorted(self.params.items()))


@dataclass(frozen=True)
class FilmRow:
    """
    What an etch does to one film that should stay.

    `loss` and `allowed_nm` in nm, None unknown; `allowed_nm` infinite: it may vanish. `ground` is the
    reason of the word before caps; `lost` what overrides a number.
    """

    film: str
    role: Role
    thickness_nm: float
    exposure: Exposure | None
    loss: Span
    loss_by_look: Span
    allowed_nm: float | None
    verdict: Verdict
    verdict_by_look: Verdict
    ground: Ground
    ground_by_look: Ground
    rank: Rank
    effects: tuple[Effect, ...]
    caps: tuple[Remark, ...]
    lost: Remark | None
    hint: str | None
    assumed: bool
    spent_nm: float | None


@dataclass(frozen=True)
class LaterTarget:
    """What an etch takes of a target that a later stage removes; `loss_nm` at worst, None unknown."""

    film: str
    thickness_nm: float
    loss_nm: float | None


@dataclass(frozen=True)
class Option:
    """
    One etch for one target. `recipe` None: an etchant alone, by published facts.

    `caps` keep the plan as a whole from "holds"; they stand among each film's caps too. `bares` is the
    film that shows when the target has cleared, None where nothing clears or nothing below is listed.
    """

    recipe: str | None
    etchant: str
    method: Method
    verdict: Verdict
    verdict_by_look: Verdict
    target: str | None
    target_rank: Rank
    target_band: RateBand | None
    schedule: Schedule
    mode: Mode | None
    undercut: Span
    rows: tuple[FilmRow, ...]
    notes: tuple[Remark, ...]
    unstated: tuple[Remark, ...]
    proven: bool
    hazard: int
    has_margin: bool
    phi: float
    offset_s: float
    overetch: float
    later: tuple[LaterTarget, ...] = ()
    caps: tuple[Remark, ...] = ()
    bares: str | None = None


@dataclass(frozen=True)
class Excluded:
    """An etch that is not offered, and why."""

    recipe: str | None
    etchant: str
    reason: Remark


@dataclass(frozen=True)
class StagePlan:
    """
    One stage: a target, or a treatment with an etchant for a time.

    A rinse that names no etchant is one in water and has no say in the plan's word; of any other
    treatment that names none nobody knows what it does.
    """

    step: int
    target: str | None
    treat: str | None
    etchant: str | None
    options: tuple[Option, ...]
    excluded: tuple[Excluded, ...]

    @property
    def counts(self) -> bool:
        """Has this stage a say in the word of the plan?"""
        return self.treat != Treatment.RINSE or self.etchant is not None


@dataclass(frozen=True)
class Plan:
    """A whole plan; the first stage's options are the plan's."""

    sample: str
    as_of: str
    confidence: float
    stages: tuple[StagePlan, ...]
    is_sequence: bool

    @property
    def holds(self) -> bool:
        """Does the best option of every stage hold?"""
        return all(
            stage.options and stage.options[0].verdict is Verdict.HOLDS
            for stage in self.stages
            if stage.counts
        ) and any(stage.counts for stage in self.stages)
