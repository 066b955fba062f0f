"""Every other film in a recipe, worst first: its word, its loss until the latest stop, why."""

from __future__ import annotations

from dataclasses import dataclass

from builder.engine import Rank, Verdict
from builder.findings.computed import Computed
from builder.findings.plan.result import FilmRow
from builder.findings.recipe_times import TargetTiming
from builder.findings.side_films import SIDE_FILM_NM, row_at_latest_stop
from builder.records.etches import Etch
from builder.records.lab import LabRecords
from builder.records.terms import Role
from builder.views.link import Link
from builder.views.number_text import NumberText, Rounding, length_text, rate_text, time_text
from builder.views.plan_words import RANK_WORDS, ROLE_WORDS, reason
from builder.views.recipe_answers import band_text, depth_text
from builder.views.references import FilmRef, film_ref, source_link


@dataclass(frozen=True)
class SideFilm:
    """One film beside the target; `sources` are empty for own runs, which stand on the page."""

    film: FilmRef
    verdict: str
    loss: NumberText
    rate: NumberText
    rank: str
    role: str
    reason: str
    sources: tuple[Link, ...]


@dataclass(frozen=True)
class SideFilms:
    """The films of one recipe with what the losses are computed for; `lead` says it in words."""

    lead: str
    rows: tuple[SideFilm, ...]

    @property
    def by_word(self) -> tuple[tuple[str, tuple[str, ...]], ...]:
        """The names of the films that have each word, the worst word first: all that a sheet has room for."""
        words = dict.fromkeys(row.verdict for row in self.rows)
        return tuple(
            (word, tuple(row.film.link.text for row in self.rows if row.verdict == word)) for word in words
        )


def side_films(records: LabRecords, computed: Computed, etch: Etch, timing: TargetTiming) -> SideFilms:
    """Return every film but the targets that anything is on record of in a recipe, worst first."""
    masks = {mask.film for mask in etch.masks}
    found = [
        (film, row_at_latest_stop(computed, computed.etching(etch.id), timing, film, _role(film, masks)))
        for film in computed.by_recipe[etch.id]
        if film not in etch.targets
    ]
    ordered = sorted(found, key=lambda pair: _order(pair[1]))
    return SideFilms(_lead(timing), tuple(_side(records, computed, etch, film, row) for film, row in ordered))


def loss_text(row: FilmRow) -> NumberText:
    """Return a loss; a low end of 0 is an end nobody knows."""
    low = row.loss.low if row.loss.low else None
    return length_text(low, row.loss.mid, row.loss.high)


def _order(row: FilmRow) -> tuple[int, int, float, str]:
    """Worst word first; within a word the better known first, then the greater loss."""
    return -row.verdict.order, row.rank.order, -(row.loss.high or 0.0), row.film


def _role(film: str, masks: set[str]) -> Role:
    return Role.MASK if film in masks else Role.EXPOSED


def _side(records: LabRecords, computed: Computed, etch: Etch, film: str, row: FilmRow) -> SideFilm:
    known = computed.known(etch.id, film)
    band = known.band
    return SideFilm(
        film=film_ref(records, film),
        verdict=row.verdict,
        loss=loss_text(row),
        rate=rate_text(None, None, None) if band is None else band_text(band),
        rank=RANK_WORDS[row.rank],
        role=ROLE_WORDS[row.role] if row.role is Role.MASK else "",
        reason=_reason(row, known.words),
        sources=tuple(source_link(records, source) for source in known.sources if source),
    )


def _reason(row: FilmRow, words: tuple[str, ...]) -> str:
    said = "; ".join(dict.fromkeys(word for word in words if word))
    if row.rank is Rank.STATEMENT and said:
        return said
    why = reason(row)
    return f"{why}; {said}" if said and row.verdict is not Verdict.HOLDS else why


def _lead(timing: TargetTiming) -> str:
    stop = timing.times(timing.usual_nm).latest_stop_s
    if stop is None:
        return "How long the etch takes is not known, so no loss is."
    return (
        f"What each film loses until the latest stop for {depth_text(timing.usual_nm)} of the target, "
        f"{time_text(stop, Rounding.UP)}. The word is for {depth_text(SIDE_FILM_NM)} of the film and what it "
        "may lose by the lab's default; for your sample the plan decides. A film that is not in this table "
        "is unmeasured here."
    )
