"""The order of a plan's films: worst first, then the one that comes closest to its limit."""

from __future__ import annotations

import math
from collections.abc import Iterator

from builder.findings.plan.result import CapCode, FilmRow


def ordered_rows(rows: Iterator[FilmRow]) -> tuple[FilmRow, ...]:
    """Worst first, then closest to its limit; of the layers that may lie under one noble metal, the worst."""
    listed = list(rows)
    if len({(row.role, row.film, row.thickness_nm) for row in listed}) < len(listed):
        # No two rows change places because they were listed so.
        listed.sort(key=repr)
    ordered = sorted(
        listed,
        key=lambda row: (
            -row.verdict.order,
            -row.verdict_by_look.order,
            -_share_used(row),
            row.role,
            row.film,
            row.thickness_nm,
        ),
    )
    kept: list[FilmRow] = []
    noble: set[object] = set()
    for row in ordered:
        under = next((cap.params["film"] for cap in row.caps if cap.code == CapCode.UNDER_NOBLE), None)
        if under is not None and under in noble:
            continue
        noble.add(under)
        kept.append(row)
    return tuple(kept)


def _share_used(row: FilmRow) -> float:
    """Return how much of what a film may lose goes at worst, by timer or by look; unknown counts as all."""
    if row.allowed_nm is not None and math.isinf(row.allowed_nm):
        return -1.0
    highs = (row.loss.high, row.loss_by_look.high)
    if not row.allowed_nm or None in highs:
        return math.inf
    # To nine digits: the last bits of exp and log are the platform's, and must not decide an order.
    return float(f"{max(high or 0.0 for high in highs) / row.allowed_nm:.9g}")
