"""Samples in section: what is removed, what protects, what must stay."""

from __future__ import annotations

import json
import math
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from pathlib import PurePosixPath

from builder.records.conversion import Data, Length, Temperature, Time, from_data
from builder.records.record import Record
from builder.records.terms import Edge, Exposure, Method, Origin, Role, Surface, Treatment

ANY_LOSS = "any"
"""Written for `allowed_loss` where a film may vanish."""
NOTHING_UNDER = "none"
"""Written for `on` where nothing lies between a film and its substrate."""
ANY_ETCH = "any"
"""Written for `etch` where every recipe may be offered."""
PROTECTED = "protected"
_THROUGH = "through"
_THROUGH_WAFER = "through-wafer"


@dataclass(frozen=True, slots=True, kw_only=True)
class SampleFilm:
    """
    One film on a sample; `pointer` is its place in the file.

    `allowed_loss` None with `may_vanish` false means that none is stated. `on` None means not stated,
    "none" that nothing lies under it. `exposed` is for exposed films only.
    """

    film: str
    thickness: Length
    role: Role
    pointer: str
    allowed_loss: Length | None = None
    may_vanish: bool = False
    on: str | None = None
    surface: Surface | None = None
    exposed: Exposure | None = None

    @property
    def thickness_nm(self) -> float:
        """Thickness, nm, > 0."""
        return self.thickness.number

    @property
    def tolerance_nm(self) -> float | None:
        """Half-width of the thickness, nm; None if not stated."""
        return self.thickness.half_width

    @property
    def allowed_loss_nm(self) -> float | None:
        """Loss that does no harm, nm; infinite if the film may vanish, None if not stated."""
        if self.may_vanish:
            return math.inf
        return None if self.allowed_loss is None else self.allowed_loss.number


@dataclass(frozen=True, slots=True, kw_only=True)
class Goal:
    """What the etch should reach; `depth` None with both flags false means through the targets."""

    depth: Length | None = None
    is_through_wafer: bool = False
    window: Length | None = None
    line: Length | None = None
    load_cm2: float | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Limits:
    """What a plan may use; empty means no limit. `temperature` is the highest the sample may see."""

    methods: tuple[Method, ...] = ()
    tools: tuple[str, ...] = ()
    etchants: tuple[str, ...] = ()
    temperature: Temperature | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Mount:
    """Carrier (a film id, or words) and what holds the sample on it."""

    carrier: str | None = None
    bond: str | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class SequenceStep:
    """One step of a sequence: a treatment, or an etch (a recipe id, or "any"); never both."""

    treat: Treatment | None = None
    etch: str | None = None
    etchant: str | None = None
    time: Time | None = None
    temperature: Temperature | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Sample(Record):
    """
    One sample; `layers` top first.

    `back` None with `is_back_protected` false means that the back is not stated, `edge` None that
    the edge is not. `json_text` is the sample as it was read, as JSON.
    """

    sample: str
    layers: tuple[SampleFilm, ...]
    json_text: str
    also_exposed: tuple[SampleFilm, ...] = ()
    back: SampleFilm | None = None
    is_back_protected: bool = False
    edge: Edge | None = None
    goal: Goal = Goal()
    limits: Limits = Limits()
    mount: Mount = Mount()
    prior: tuple[str, ...] = ()
    steps: tuple[SequenceStep, ...] = ()
    temperature: Temperature | None = None
    note: str | None = None

    @property
    def targets(self) -> tuple[SampleFilm, ...]:
        """The films to remove, in the order they are etched."""
        return tuple(layer for layer in self.layers if layer.role is Role.TARGET)

    @property
    def films(self) -> tuple[SampleFilm, ...]:
        """Every film on the sample: layers, exposed films, back."""
        back = () if self.back is None else (self.back,)
        return (*self.layers, *self.also_exposed, *back)

    @classmethod
    def from_raw(cls, data: Data, file: str, origin: Origin) -> Sample:
        """Return the sample of a file whose data has passed its schema; unnamed, it is called as its file."""
        stem = PurePosixPath(file).stem
        back = data.get("back")
        return from_data(
            cls,
            data,
            id=stem,
            file=file,
            origin=origin,
            sample=data.get("sample", stem),
            json_text=json.dumps(data, ensure_ascii=False),
            layers=_films(data.get("layers"), "/layers", None),
            also_exposed=_films(data.get("also_exposed"), "/also_exposed", Role.EXPOSED),
            back=_film(back, "/back", Role.BACK) if isinstance(back, Mapping) else None,
            is_back_protected=back == PROTECTED,
            goal=_goal(data.get("goal")),
        )


def _films(rows: object, pointer: str, role: Role | None) -> tuple[SampleFilm, ...]:
    if rows is None:
        return ()
    assert isinstance(rows, Sequence)
    return tuple(_film(row, f"{pointer}/{index}", role) for index, row in enumerate(rows))


def _film(row: Data, pointer: str, role: Role | None) -> SampleFilm:
    given: dict[str, object] = {"pointer": pointer}
    if role is not None:
        given["role"] = role
    if row.get("allowed_loss") == ANY_LOSS:
        given |= {"allowed_loss": None, "may_vanish": True}
    return from_data(SampleFilm, row, **given)


def _goal(data: object) -> Goal:
    if not isinstance(data, Mapping):
        return Goal()
    depth = data.get("depth")
    if depth in (_THROUGH, _THROUGH_WAFER):
        return from_data(Goal, data, depth=None, is_through_wafer=depth == _THROUGH_WAFER)
    return from_data(Goal, data)
