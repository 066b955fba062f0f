"""How high each layer of a section is drawn: to scale where it can be read, else with a break."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

_LEAST = 9.0
"""Lowest height at which a fill can still be told from another, SVG units."""
_BROKEN = 38.0
"""Height of a layer too thick to be drawn to scale."""
_TOO_THICK = 6.0
"""A layer this many times thicker than all thinner ones together is drawn broken."""


@dataclass(frozen=True)
class DrawnHeight:
    """The drawn height of a layer, SVG units; `is_cut` shows a break, `to_scale` keeps the ratio."""

    height: float
    to_scale: bool
    is_cut: bool = False


def drawn_heights(thicknesses_nm: Sequence[float | None], room: float) -> tuple[DrawnHeight, ...]:
    """
    Return the height of each layer, given thicknesses in nm (None where unknown) and the room in SVG units.

    Layers keep their true ratio. One that would dwarf the others is cut to a fixed height, one that
    would vanish is raised to the least readable height; both are marked as not to scale.
    """
    broken = _too_thick(thicknesses_nm)
    scaled = [t for i, t in enumerate(thicknesses_nm) if t is not None and i != broken]
    total = sum(scaled)
    scale = room / total if total > 0.0 else 0.0
    return tuple(_height(thickness, index == broken, scale) for index, thickness in enumerate(thicknesses_nm))


def _height(thickness_nm: float | None, is_broken: bool, scale: float) -> DrawnHeight:
    if thickness_nm is None or is_broken:
        return DrawnHeight(_BROKEN, False, True)
    height = thickness_nm * scale
    return DrawnHeight(height, True) if height >= _LEAST else DrawnHeight(_LEAST, False)


def _too_thick(thicknesses_nm: Sequence[float | None]) -> int | None:
    """The place of the thickest layer if it dwarfs all others; only one is cut, the rest keep their ratio."""
    known = sorted((t, i) for i, t in enumerate(thicknesses_nm) if t is not None)
    if len(known) < 2:
        return None
    thickest, index = known[-1]
    return index if thickest > _TOO_THICK * sum(t for t, _ in known[:-1]) else None
