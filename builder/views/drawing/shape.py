"""The pieces a drawing is made of: outlines with a fill, labels, lines. Coordinates in SVG units, y down."""

from __future__ import annotations

from dataclasses import dataclass

FAMILY_FILLS = ("semiconductor", "oxide", "nitride", "metal", "polymer", "resist", "other")
"""Film families with a fill of their own; `other` (cross-hatch) stands for whatever is unknown."""


@dataclass(frozen=True)
class Shape:
    """An outline (SVG path data), the family whose fill it has, its tone (0 or 1) and its role."""

    path: str
    family: str
    tone: int
    role: str


@dataclass(frozen=True)
class Label:
    """Text at a point, with the height its leader line points to."""

    x: float
    y: float
    text: str
    points_to: float
    role: str


@dataclass(frozen=True)
class Tick:
    """A position on an axis and what is written there."""

    at: float
    text: str


def family_fill(family: str) -> str:
    """Return the fill of a family; a family without one is drawn as unknown."""
    return family if family in FAMILY_FILLS else "other"


def rounded(value: float) -> float:
    """Return a coordinate to a tenth of a unit: enough for a screen, and the same bytes everywhere."""
    return round(value, 1) + 0.0


def rectangle(left: float, top: float, right: float, bottom: float) -> str:
    """Return the path of a rectangle."""
    left, top, right, bottom = (rounded(side) for side in (left, top, right, bottom))
    return f"M{left:g} {top:g}H{right:g}V{bottom:g}H{left:g}Z"
