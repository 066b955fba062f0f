"""Monitor wafers: one row, one wafer, one film, one etch time."""

from __future__ import annotations

import datetime
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import PurePosixPath

from builder.records.conversion import from_data
from builder.records.record import Entry
from builder.records.terms import Origin


@dataclass(frozen=True, slots=True, kw_only=True)
class Run(Entry):
    """
    One row of a run table; the unit stands in the name.

    `u_nm` is the standard uncertainty (k = 1) of one thickness reading; `site_spread` the half-range
    of the loss over the wafer as a fraction of its mean. A blank field is None: not stated.
    """

    etch: str
    date: datetime.date
    wafer: str
    film: str
    time_s: float
    before_nm: float
    after_nm: float
    u_nm: float
    film_lot: str | None = None
    prior: str | None = None
    temperature_degc: float | None = None
    load_cm2: float | None = None
    carrier: str | None = None
    window_um: float | None = None
    bath: str | None = None
    bath_hours: float | None = None
    wafers_since_clean: float | None = None
    event: str | None = None
    note: str | None = None
    site_spread: float | None = None


def runs_from(rows: object, file: str, origin: Origin) -> tuple[Run, ...]:
    """Return the rows of one run table that has passed its schema, in the order of the file."""
    assert isinstance(rows, Sequence)
    etch = PurePosixPath(file).stem
    return tuple(
        from_data(Run, row, etch=etch, file=file, origin=origin, pointer=f"/{index}")
        for index, row in enumerate(rows)
    )
