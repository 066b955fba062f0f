"""What the lab makes of its runs, against the rates the generator drew them from."""

from __future__ import annotations

import dataclasses
from collections.abc import Iterator
from dataclasses import dataclass

from scipy import stats

from bench.demo_lab.draw import SEED, RunRow, draw_runs
from bench.demo_lab.plan import FilmRuns, RecipeRuns, is_plain
from bench.demo_lab.run_files import ALL_RUNS
from builder.findings.own_rates import own_rate
from builder.records.lab import LabRecords
from builder.records.runs import Run, runs_from
from builder.records.terms import Origin

CONFIDENCE = 0.90
FROM_PRIOR = ("cyclic", "vapour")
SEEDS = tuple(f"next runs {number}" for number in range(12))
CLEARLY_MEASURED = 10.0
"""Loss in units of the gauge's uncertainty from which a run gives a rate and no limit."""


@dataclass(frozen=True)
class Outcome:
    """One series: the interval of the lab against the truth and against the next run, nm/min."""

    etch: str
    film: str
    group: str
    low: float
    high: float
    truth: float
    next_rate: float


def test_committed_runs_recover_the_truth(records: LabRecords) -> None:
    """An interval for a next run holds the rate behind the runs at least as often as it holds a next run."""
    outcomes = list(_outcomes(records, SEED))
    hits = sum(outcome.low <= outcome.truth <= outcome.high for outcome in outcomes)
    assert len(outcomes) >= 60
    # The middle scatters less than a run does: more hits than 90 % are right, fewer would not be.
    assert hits >= stats.binom.ppf(0.01, len(outcomes), CONFIDENCE), _missed(outcomes)


def test_next_runs_fall_into_their_intervals(records: LabRecords) -> None:
    """Over many draws of the lab, nine in ten 90 % intervals hold the next run."""
    outcomes = [outcome for seed in SEEDS for outcome in _outcomes(records, seed)]
    fitted = [outcome for outcome in outcomes if outcome.group not in FROM_PRIOR]
    hits = sum(outcome.low <= outcome.next_rate <= outcome.high for outcome in fitted)
    # Films of one session share half of their scatter: they count as half as many independent runs.
    worth = len(fitted) // 2
    low, high = (float(stats.binom.ppf(level, worth, CONFIDENCE)) / worth for level in (0.001, 0.999))
    assert len(fitted) >= 700
    assert low <= hits / len(fitted) <= high


def test_groups_without_a_fit_are_wide_rather_than_narrow(records: LabRecords) -> None:
    """Three cyclic and three vapour recipes leave the prior in force, which is wider than the truth here."""
    outcomes = [outcome for seed in SEEDS for outcome in _outcomes(records, seed)]
    prior = [outcome for outcome in outcomes if outcome.group in FROM_PRIOR]
    hits = sum(outcome.low <= outcome.next_rate <= outcome.high for outcome in prior)
    assert len(prior) >= 200
    assert hits / len(prior) >= CONFIDENCE


def _outcomes(records: LabRecords, seed: str) -> Iterator[Outcome]:
    for stated in ALL_RUNS:
        recipe = stated if seed == SEED else _on_thick_monitors(stated)
        plain = [film for film in recipe.films if is_plain(recipe, film) and _is_measured(film)]
        if not plain:
            continue
        drawn = dataclasses.replace(records, runs={recipe.etch: _as_records(recipe, draw_runs(recipe, seed))})
        following = _next_session(recipe, seed)
        for film in plain:
            own = own_rate(drawn, records.etches[recipe.etch], film.film, CONFIDENCE)
            if own is not None and own.next_run is not None:
                yield Outcome(
                    recipe.etch, film.film, own.group,
                    own.next_run.lo_nm_per_s * 60, own.next_run.hi_nm_per_s * 60,
                    film.rate_nm_per_min, _rate(following[film.film], film),
                )  # fmt: skip


def _on_thick_monitors(recipe: RecipeRuns) -> RecipeRuns:
    """Among many draws a rate may be so high that the lab's own monitors would clear."""
    films = tuple(dataclasses.replace(film, thickness_nm=5 * film.thickness_nm) for film in recipe.films)
    return dataclasses.replace(recipe, films=films)


def _is_measured(film: FilmRuns) -> bool:
    loss_nm = film.rate_nm_per_min / 60 * film.times_s[0]
    return loss_nm > CLEARLY_MEASURED * film.u_nm


def _as_records(recipe: RecipeRuns, rows: list[RunRow]) -> tuple[Run, ...]:
    stated = [{key: text for key, text in dataclasses.asdict(row).items() if text} for row in rows]
    return runs_from(stated, f"recipes/runs/{recipe.etch}.csv", Origin.LAB)


def _next_session(recipe: RecipeRuns, seed: str) -> dict[str, RunRow]:
    """One session more, in which every plain film is run; the rows before it stay as they are."""
    films = tuple(
        dataclasses.replace(film, sessions=(*film.sessions, recipe.count))
        if film.sessions and is_plain(recipe, film)
        else film
        for film in recipe.films
    )
    longer = _on_thick_monitors(dataclasses.replace(recipe, films=films, count=recipe.count + 1))
    rows = draw_runs(longer, seed)
    return {row.film: row for row in rows if row.date == rows[-1].date}


def _rate(row: RunRow, film: FilmRuns) -> float:
    return (float(row.before_nm) - float(row.after_nm)) / (float(row.time_s) - film.induction_s) * 60


def _missed(outcomes: list[Outcome]) -> list[Outcome]:
    return [outcome for outcome in outcomes if not outcome.low <= outcome.truth <= outcome.high]
