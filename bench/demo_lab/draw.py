"""Draws the monitor runs of a recipe: same seed, same bytes, on every Python."""

from __future__ import annotations

import datetime
import math
import random
from collections.abc import Iterator
from dataclasses import dataclass
from statistics import NormalDist

from bench.demo_lab.plan import Event, FilmRuns, RecipeRuns

SEED = "quillhaven 2026 48"
"""Chosen among others so that only the recipes meant to drift show a trend."""
_SHARED = math.sqrt(0.5)
"""Half of the run-to-run variance is the bath's or the chamber's and moves all films of a session alike."""
_SATURDAY = 5
_FINE_U_NM = 2.0
"""A gauge finer than this prints tenths of a nanometre."""
_BATH_AGE_AT_FIRST_RUN_H = 26
_CLEAN_EVENTS = ("clean", "repair")


@dataclass(frozen=True)
class RunRow:
    """One line of a run file; units are in the names."""

    date: str
    wafer: str
    film: str
    film_lot: str
    prior: str
    time_s: str
    before_nm: str
    after_nm: str
    u_nm: str
    temperature_degc: str
    load_cm2: str
    carrier: str
    window_um: str
    bath: str
    bath_hours: str
    wafers_since_clean: str
    event: str
    note: str
    site_spread: str


@dataclass(frozen=True)
class _Session:
    number: int
    date: datetime.date
    log_deviation: float
    temperature: str
    bath: str
    bath_hours: str
    wafers_since_clean: int | None
    event: str


class _Normal:
    """
    Standard normal numbers from `random.Random`.

    Python keeps the stream of `random()` the same over versions and machines, which neither
    `gauss` nor numpy promise; the inverse of the normal law does the rest.
    """

    def __init__(self, seed: str) -> None:
        self._random = random.Random(seed)
        self._law = NormalDist()

    def draw(self) -> float:
        return self._law.inv_cdf(min(max(self._random.random(), 1e-9), 1 - 1e-9))


def draw_runs(recipe: RecipeRuns, seed: str = SEED) -> list[RunRow]:
    """Return the rows of the recipe's run file, by date; more sessions leave the earlier rows as they are."""
    normal = _Normal(f"{seed} {recipe.etch}")
    rows: list[RunRow] = []
    for session in _sessions(recipe, normal):
        event = session.event
        for film in recipe.films:
            if film.sessions and session.number not in film.sessions:
                continue
            rows.extend(_film_rows(recipe, session, film, event, normal))
            event = ""  # an event is written once, on the first row after it
    return rows


def _sessions(recipe: RecipeRuns, normal: _Normal) -> Iterator[_Session]:
    last_event, bath_number, bath_mixed, wafers, shift = 0, 1, recipe.first, 4, 0.0
    for number in range(recipe.count):
        date = _working_day(recipe.first + datetime.timedelta(days=number * recipe.every_days))
        event = recipe.events.get(number, Event(""))
        if event.kind:
            last_event, shift = number, shift + event.log_shift
        if event.kind == "new bath":
            bath_number, bath_mixed = bath_number + 1, date
        wafers = 3 if event.kind in _CLEAN_EVENTS else wafers + 5 + (number * 7) % 6
        bath, hours = _bath(recipe, number, bath_number, (date - bath_mixed).days)
        drift = recipe.drift * (number - last_event)
        yield _Session(
            number=number,
            date=date,
            log_deviation=shift + drift + _SHARED * recipe.spread * normal.draw(),
            temperature=_temperature(recipe, normal),
            bath=bath,
            bath_hours=hours,
            wafers_since_clean=wafers if recipe.chamber else None,
            event=event.kind,
        )


def _working_day(date: datetime.date) -> datetime.date:
    late = date.weekday() - _SATURDAY
    return date if late < 0 else date + datetime.timedelta(days=2 - late)


def _bath(recipe: RecipeRuns, session: int, bath_number: int, age_days: int) -> tuple[str, str]:
    if not recipe.bath:
        return "", ""
    if recipe.fresh_bath:
        return f"{recipe.bath}-{session + 1:02d}", f"{0.3 + 0.1 * (session % 5):.1f}"
    return f"{recipe.bath}-{bath_number:02d}", str(_BATH_AGE_AT_FIRST_RUN_H + 24 * age_days)


def _temperature(recipe: RecipeRuns, normal: _Normal) -> str:
    if recipe.temperature_degc is None:
        return ""
    return f"{recipe.temperature_degc + recipe.temperature_sd * normal.draw():.1f}"


def _film_rows(
    recipe: RecipeRuns, session: _Session, film: FilmRuns, event: str, normal: _Normal
) -> Iterator[RunRow]:
    lot, log_rate_shift, lot_event = _lot(film, session.number)
    log_deviation = (
        session.log_deviation + _SHARED * recipe.spread * normal.draw() + film.log_shift + log_rate_shift
    )
    rate_nm_per_s = film.rate_nm_per_min / 60 * math.exp(log_deviation)
    u_nm = film.coarse_u_nm if film.coarse_u_nm is not None and session.number % 3 == 2 else film.u_nm
    thickness_nm = film.thickness_nm * (1 + 0.006 * normal.draw())
    before_nm = thickness_nm + u_nm * normal.draw()
    for time_s in film.times_s:
        loss_nm = max(0.0, rate_nm_per_s * (time_s - film.induction_s))
        after_nm = thickness_nm - loss_nm + u_nm * normal.draw()
        if after_nm <= 0:
            raise ValueError(f"{recipe.etch}: {film.film} clears within {time_s} s; choose a thicker monitor")
        yield _row(recipe, session, film, lot, event or lot_event, time_s, (before_nm, after_nm, u_nm))
        event = lot_event = ""


def _lot(film: FilmRuns, session: int) -> tuple[str, float, str]:
    lot, shift = film.lot, 0.0
    for start in sorted(film.lot_changes):
        if session >= start:
            lot, shift = film.lot_changes[start].lot, film.lot_changes[start].log_shift
    return lot, shift, "new film lot" if session in film.lot_changes else ""


def _row(
    recipe: RecipeRuns,
    session: _Session,
    film: FilmRuns,
    lot: str,
    event: str,
    time_s: float,
    readings_nm: tuple[float, float, float],
) -> RunRow:
    before_nm, after_nm, u_nm = readings_nm
    decimals = 1 if u_nm < _FINE_U_NM else 0
    # A film on its own wafer is named after it, so that it is not taken for paired with the target.
    wafer = f"{recipe.prefix}{session.number + 1:03d}"
    load = film.load_cm2 if film.load_cm2 is not None else recipe.load_cm2
    return RunRow(
        date=session.date.isoformat(),
        wafer=f"{wafer}-{film.film}" if film.own_wafer else wafer,
        film=film.film,
        film_lot=lot,
        prior=film.prior,
        time_s=f"{time_s:g}",
        before_nm=f"{before_nm:.{decimals}f}",
        after_nm=f"{after_nm:.{decimals}f}",
        u_nm=f"{u_nm:g}",
        temperature_degc=session.temperature,
        load_cm2="" if load is None else f"{load:g}",
        carrier=film.carrier,
        window_um="" if film.window_um is None else f"{film.window_um:g}",
        bath=session.bath,
        bath_hours=session.bath_hours,
        wafers_since_clean="" if session.wafers_since_clean is None else str(session.wafers_since_clean),
        event=event,
        note=film.note,
        site_spread="" if film.site_spread is None else f"{film.site_spread:g}",
    )
