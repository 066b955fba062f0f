"""The section of a recipe: its usual mask, its first target at the usual depth, what lies under it."""

from __future__ import annotations

import statistics
from dataclasses import dataclass, replace

from builder.engine import RateBand, loss, open_by_timer
from builder.findings.computed import Computed
from builder.findings.own_rates import OwnRate
from builder.findings.recipe_times import TargetTiming
from builder.records.lab import LabRecords
from builder.records.terms import FilmFamily, Method
from builder.views.drawing.section import Role, Section, SectionLayer, section
from builder.views.drawing.shape import family_fill
from builder.views.number_text import length_text
from builder.views.recipe_answers import depth_text
from builder.views.words import listed

_SHORT = {Role.MASK: "mask", Role.TARGET: "target", Role.UNDER: "under it"}
_DEEP = 2.0
"""A film at least so many times thicker than the usual depth is etched into, not through."""


@dataclass(frozen=True)
class KeyLine:
    """What one layer of the drawing is: its role there, its film, how thick it is drawn for."""

    name: str
    family: str
    film: str
    thickness: str


@dataclass(frozen=True)
class RecipeSection:
    """The drawing, and the full names that have no room in it."""

    drawing: Section
    key: tuple[KeyLine, ...]


def recipe_section(
    records: LabRecords, computed: Computed, etch_id: str, timing: TargetTiming
) -> RecipeSection | None:
    """Return the drawing of a recipe's first target before and after; None where lift-off etches nothing."""
    if records.etches[etch_id].method is Method.LIFT_OFF:
        return None
    into = _is_etched_into(records, computed, etch_id, timing)
    mask = _mask_layer(records, computed, etch_id, timing)
    target = _target_layer(records, timing, into=into)
    under = None if into else _under_layer(records, computed, etch_id)
    layers = [layer for layer in (mask, target, under) if layer is not None]
    ratio = computed.facts.etches[etch_id].ratio
    short = [replace(layer, name=_SHORT[layer.role]) for layer in layers]
    words = _description(layers, timing, into=into)
    return RecipeSection(
        section(short, None if ratio is None else ratio.mid, words),
        tuple(KeyLine(_SHORT[one.role], one.family, one.name, one.thickness) for one in layers),
    )


def _is_etched_into(records: LabRecords, computed: Computed, etch_id: str, timing: TargetTiming) -> bool:
    if not records.films[timing.film].crystalline_silicon:
        return False
    thickness = _usual_thickness(computed.own[etch_id].get(timing.film))
    return thickness is None or thickness >= _DEEP * timing.usual_nm


def _usual_thickness(own: OwnRate | None) -> float | None:
    """The middle thickness of the wafers in use, nm."""
    if own is None or not own.used:
        return None
    return statistics.median_low([max(row.before_nm for row in run.rows) for run in own.used])


def _mask_layer(
    records: LabRecords, computed: Computed, etch_id: str, timing: TargetTiming
) -> SectionLayer | None:
    masks = records.etches[etch_id].masks
    if not masks:
        return None
    film = masks[0].film
    thickness = _usual_thickness(computed.own[etch_id].get(film))
    band = computed.known(etch_id, film).band
    lost = loss(band, open_by_timer(timing.times(timing.usual_nm)), timing.phi).high
    return _layer(records, film, Role.MASK, thickness, _left(thickness, lost))


def _target_layer(records: LabRecords, timing: TargetTiming, *, into: bool) -> SectionLayer:
    depth = timing.usual_nm
    shown = f"etched {depth_text(depth)} deep" if into else depth_text(depth)
    film = records.films[timing.film]
    drawn = _DEEP * depth if into else depth
    return SectionLayer(
        film.name, family_fill(film.family), Role.TARGET, drawn, shown, 1 - 1 / _DEEP if into else 0.0
    )


def _under_layer(records: LabRecords, computed: Computed, etch_id: str) -> SectionLayer:
    film = _film_under(records, computed, etch_id)
    if film is None:
        return SectionLayer("what lies under", "other", Role.UNDER, None, "not stated", None)
    name = records.films[film].name
    family = family_fill(records.films[film].family)
    return SectionLayer(f"for example {name}", family, Role.UNDER, None, "any thickness", 1.0)


def _film_under(records: LabRecords, computed: Computed, etch_id: str) -> str | None:
    """A film of the runs that is neither target nor mask; silicon before oxide before others."""
    etch = records.etches[etch_id]
    masks = {mask.film for mask in etch.masks}
    order = (FilmFamily.SEMICONDUCTOR, FilmFamily.OXIDE)
    found = [
        film
        for film in computed.own[etch_id]
        if film not in etch.targets and film not in masks and records.films[film].family in order
    ]
    return min(found, key=lambda film: (order.index(records.films[film].family), film), default=None)


def _layer(
    records: LabRecords, film_id: str, role: Role, thickness: float | None, left: float | None
) -> SectionLayer:
    film = records.films[film_id]
    shown = "thickness not stated" if thickness is None else length_text(None, thickness, None).with_unit
    return SectionLayer(film.name, family_fill(film.family), role, thickness, shown, left)


def _left(thickness: float | None, lost: float | None) -> float | None:
    if thickness is None or lost is None:
        return None
    return max(0.0, 1 - lost / thickness)


def _description(layers: list[SectionLayer], timing: TargetTiming, *, into: bool) -> str:
    names = listed(tuple(f"{layer.name} ({layer.thickness})" for layer in layers))
    after = "is etched to that depth in the opening" if into else "is gone in the opening"
    mask = layers[0].role is Role.MASK
    worn = " The mask is drawn as thin as the latest stop may leave it." if mask else ""
    if mask and layers[0].left is None:
        worn = " What the mask loses is not on record; it is drawn whole."
    band: RateBand | None = timing.band
    known = "" if band is not None else " The rate is not on record."
    return f"From the top: {names}. After the etch the target {after}.{worn}{known}"
