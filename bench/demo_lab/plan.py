"""What the generator knows of a recipe's monitor wafers: the truth, and the faults laid into it."""

from __future__ import annotations

import datetime
from collections.abc import Mapping
from dataclasses import dataclass, field


@dataclass(frozen=True)
class Event:
    """Something done before a session; `log_shift` is the lasting change of ln(rate) that it brings."""

    kind: str
    log_shift: float = 0.0


@dataclass(frozen=True)
class LotChange:
    """A new film lot from one session on; `log_shift` is the change of ln(rate) of this film alone."""

    lot: str
    log_shift: float


@dataclass(frozen=True)
class FilmRuns:
    """
    One film in one recipe: its true rate, and how it is measured.

    `rate_nm_per_min` is 0 for a film that is not attacked. Several `times_s` make a time series.
    `u_nm` is the standard uncertainty of one thickness reading; `coarse_u_nm` replaces it in every
    third session (another gauge). `induction_s` may be negative: etching goes on in transfer.
    `log_shift` moves ln(rate) of this campaign for a stated cause (a small load, a narrow trench).
    """

    film: str
    rate_nm_per_min: float
    thickness_nm: float
    times_s: tuple[float, ...]
    u_nm: float
    sessions: tuple[int, ...] = ()
    lot: str = "L1"
    lot_changes: Mapping[int, LotChange] = field(default_factory=dict)
    prior: str = ""
    induction_s: float = 0.0
    coarse_u_nm: float | None = None
    own_wafer: bool = False
    load_cm2: float | None = None
    carrier: str = ""
    window_um: float | None = None
    site_spread: float | None = None
    log_shift: float = 0.0
    note: str = ""


@dataclass(frozen=True)
class RecipeRuns:
    """
    The sessions of one recipe.

    `spread` is the standard deviation of ln(rate) from session to session; `drift` is added to
    ln(rate) each session, since the last event. `events` are keyed by session number, from 0.
    `bath` is the stem of the bath ids: a tank keeps its bath until a "new bath" event, with
    `fresh_bath` each session has its own. `chamber` counts wafers since the last clean.
    """

    etch: str
    prefix: str
    first: datetime.date
    every_days: int
    count: int
    spread: float
    films: tuple[FilmRuns, ...]
    temperature_degc: float | None = None
    temperature_sd: float = 0.1
    load_cm2: float | None = None
    drift: float = 0.0
    events: Mapping[int, Event] = field(default_factory=dict)
    bath: str = ""
    fresh_bath: bool = False
    chamber: bool = False


def is_plain(recipe: RecipeRuns, film: FilmRuns) -> bool:
    """Tell whether the stated rate is the centre of all these runs: no drift, shift, lot change or series."""
    shifted = recipe.drift or film.log_shift or any(event.log_shift for event in recipe.events.values())
    return film.rate_nm_per_min > 0 and not shifted and not film.lot_changes and len(film.times_s) == 1
