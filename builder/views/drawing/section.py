"""The sample in section, before and after an etch: what is drawn, not how it looks."""

from __future__ import annotations

import enum
from collections.abc import Sequence
from dataclasses import dataclass

from builder.views.drawing.heights import DrawnHeight, drawn_heights
from builder.views.drawing.shape import Label, Shape, family_fill, rectangle, rounded

PANEL_WIDTH = 120.0
_GAP = 24.0
_TOP = 26.0
_ROOM = 124.0
_OPENING = (40.0, 80.0)
"""Left and right edge of the opening in the mask, within a panel."""
_LABEL_X = 2 * PANEL_WIDTH + _GAP + 22.0
_LABEL_STEP = 17.0
_WIDEST_UNDERCUT = 22.0
WIDTH = 490.0


class Role(enum.StrEnum):
    """What a layer is to the etch."""

    MASK = "mask"
    TARGET = "target"
    UNDER = "under"


@dataclass(frozen=True)
class SectionLayer:
    """
    A layer of the section, top first.

    `left` is the fraction of it that remains where the etch reaches it, 0 to 1; None if unknown.
    """

    name: str
    family: str
    role: Role
    thickness_nm: float | None
    thickness: str
    left: float | None


@dataclass(frozen=True)
class Section:
    """A drawing of two panels side by side with labels to the right; `breaks` are heights of break marks."""

    width: float
    height: float
    before: tuple[Shape, ...]
    after: tuple[Shape, ...]
    after_x: float
    panel_width: float
    breaks: tuple[float, ...]
    leader_from: float
    leader_to: float
    labels: tuple[Label, ...]
    title: str
    description: str


@dataclass(frozen=True)
class _Placed:
    layer: SectionLayer
    top: float
    bottom: float
    tone: int
    drawn: DrawnHeight


def section(layers: Sequence[SectionLayer], undercut_ratio: float | None, description: str) -> Section:
    """
    Return the drawing of a sample before and after its etch.

    `layers` are given from the top; `undercut_ratio` is sideways over downwards etching, None if
    unknown (then walls are drawn upright, and the description has to say so).
    """
    placed = _place(layers)
    bottom = placed[-1].bottom if placed else _TOP
    before = [shape for item in placed for shape in _before(item)]
    after = [shape for item in placed for shape in _after(item, undercut_ratio)]
    return Section(
        width=WIDTH,
        height=rounded(bottom + 14.0),
        before=tuple(before),
        after=tuple(after),
        after_x=PANEL_WIDTH + _GAP,
        panel_width=PANEL_WIDTH,
        breaks=tuple(rounded((item.top + item.bottom) / 2) for item in placed if item.drawn.is_cut),
        leader_from=2 * PANEL_WIDTH + _GAP + 3.0,
        leader_to=_LABEL_X - 4.0,
        labels=_labels(placed),
        title="Section before and after the etch",
        description=description,
    )


def _place(layers: Sequence[SectionLayer]) -> tuple[_Placed, ...]:
    heights: tuple[DrawnHeight, ...] = drawn_heights([layer.thickness_nm for layer in layers], _ROOM)
    placed: list[_Placed] = []
    top = _TOP
    for index, (layer, drawn) in enumerate(zip(layers, heights, strict=True)):
        placed.append(_Placed(layer, top, top + drawn.height, index % 2, drawn))
        top += drawn.height
    return tuple(placed)


def _before(item: _Placed) -> list[Shape]:
    if item.layer.role is Role.MASK:
        return _two_sides(item, item.top, _OPENING)
    return [_shape(item, rectangle(0.0, item.top, PANEL_WIDTH, item.bottom))]


def _after(item: _Placed, undercut_ratio: float | None) -> list[Shape]:
    height = item.bottom - item.top
    left = 1.0 if item.layer.left is None else item.layer.left
    if item.layer.role is Role.MASK:
        return _two_sides(item, item.bottom - height * left, _OPENING)
    if item.layer.role is Role.UNDER or left > 0.0:
        return [_notched(item, item.top + height * (1.0 - left))]
    sideways = min(height * (undercut_ratio or 0.0), _WIDEST_UNDERCUT)
    return [_wall(item, sideways, mirrored=False), _wall(item, sideways, mirrored=True)]


def _two_sides(item: _Placed, top: float, opening: tuple[float, float]) -> list[Shape]:
    return [
        _shape(item, rectangle(0.0, top, opening[0], item.bottom)),
        _shape(item, rectangle(opening[1], top, PANEL_WIDTH, item.bottom)),
    ]


def _notched(item: _Placed, floor: float) -> Shape:
    left, right = _OPENING
    top, floor, bottom = rounded(item.top), rounded(floor), rounded(item.bottom)
    notch = f"H{left:g}V{floor:g}H{right:g}V{top:g}" if floor > top else ""
    return _shape(item, f"M0 {top:g}{notch}H{PANEL_WIDTH:g}V{bottom:g}H0Z")


def _wall(item: _Placed, sideways: float, *, mirrored: bool) -> Shape:
    """One side of a layer that is cut through; etched sideways by `sideways` at its top, round below."""
    edge, outer = (_OPENING[1], PANEL_WIDTH) if mirrored else (_OPENING[0], 0.0)
    back = rounded(edge + sideways if mirrored else edge - sideways)
    top, bottom, turn = rounded(item.top), rounded(item.bottom), 0 if mirrored else 1
    arc = f"A{rounded(sideways):g} {rounded(bottom - top):g} 0 0 {1 - turn} {edge:g} {bottom:g}"
    return _shape(item, f"M{outer:g} {top:g}H{back:g}{arc}H{outer:g}Z")


def _shape(item: _Placed, path: str) -> Shape:
    return Shape(path, family_fill(item.layer.family), item.tone, item.layer.role)


def _label_text(item: _Placed) -> str:
    raised = not item.drawn.to_scale and not item.drawn.is_cut
    scale = " (not to scale)" if raised else ""
    return f"{item.layer.name}, {item.layer.thickness}{scale}"


def _labels(placed: Sequence[_Placed]) -> tuple[Label, ...]:
    labels: list[Label] = []
    lowest = _TOP - _LABEL_STEP
    for item in placed:
        middle = (item.top + item.bottom) / 2
        y = max(middle, lowest + _LABEL_STEP)
        labels.append(
            Label(
                _LABEL_X,
                rounded(y),
                _label_text(item),
                rounded(middle),
                item.layer.role,
            )
        )
        lowest = y
    return tuple(labels)
