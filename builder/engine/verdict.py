"""The four words, and how a loss and its grounds become one of them."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from enum import StrEnum

from builder.engine.loss import Exposure, Span
from builder.engine.rank import Rank, worst_rank


class Verdict(StrEnum):
    """What happens to a film. Better first; a plan has its worst film's word."""

    HOLDS = "holds"
    BORDERLINE = "borderline"
    UNMEASURED = "unmeasured"
    LOST = "lost"

    @property
    def order(self) -> int:
        """0 for the best word, rising to the worst."""
        return _ORDER[self]


_ORDER = {word: place for place, word in enumerate(Verdict)}


class Ground(StrEnum):
    """Why a film got its word, before any caution."""

    WITHIN_ALLOWED = "within-allowed"
    ANY_LOSS_ACCEPTED = "any-loss-accepted"
    STRADDLES = "straddles"
    NO_HIGH_END = "no-high-end"
    NO_ALLOWANCE = "no-allowance"
    UNCHECKED = "unchecked"
    TARGET_UNCHECKED = "target-unchecked"
    BEYOND_TESTED_TIME = "beyond-tested-time"
    STATEMENT_RESISTS = "statement-resists"
    STATEMENT_ADVERSE = "statement-adverse"
    STATEMENT_ATTACKS = "statement-attacks"
    MILD_END_EXCEEDS = "mild-end-exceeds"
    NO_EVIDENCE = "no-evidence"
    TIME_UNKNOWN = "time-unknown"


@dataclass(frozen=True, slots=True)
class Word:
    """A verdict and its ground."""

    verdict: Verdict
    ground: Ground


@dataclass(frozen=True, slots=True)
class Grounds:
    """
    What is known of a film in an etch, beside its loss.

    `rank`: the film's best rank. `target_rank`: the target's, which fixes the time.
    `attacked`: a statement says so. `adverse`: a statement names another harm.
    `limit_time_s`: longest tested exposure where the high end is a limit (None: no limit).
    """

    rank: Rank
    target_rank: Rank
    attacked: bool
    adverse: bool
    limit_time_s: float | None


def worst(words: Iterable[Verdict], best: Verdict = Verdict.HOLDS) -> Verdict:
    """The worst of several words, and never better than `best`."""
    return max((*words, best), key=lambda word: word.order)


def capped(word: Verdict) -> Verdict:
    """A caution takes "holds" to "borderline" and changes no other word."""
    return Verdict.BORDERLINE if word is Verdict.HOLDS else word


def film_word(
    lost: Span,
    exposure: Exposure | None,
    grounds: Grounds,
    allowed_nm: float | None,
    thickness_nm: float,
    *,
    any_loss: bool = False,
) -> Word:
    """
    The word for one film from its loss, its allowance and its grounds.

    Nothing unmeasured becomes "holds": each way to that word passes a number of rank own or
    literature for the film, the same for the target, a high end, and an allowance.

    Source: docs/methods/verdicts.md.
    """
    if grounds.rank is Rank.STATEMENT or exposure is None:
        return _without_number(exposure, grounds)
    if not grounds.rank.has_number:
        return Word(Verdict.UNMEASURED, Ground.NO_EVIDENCE)
    if any_loss:
        return _ranked(grounds, exposure, Ground.ANY_LOSS_ACCEPTED)
    if lost.low is not None and lost.low > (thickness_nm if allowed_nm is None else allowed_nm):
        return Word(Verdict.LOST, Ground.MILD_END_EXCEEDS)
    if lost.high is None:
        return Word(Verdict.BORDERLINE, Ground.NO_HIGH_END)
    if allowed_nm is None:
        return Word(Verdict.BORDERLINE, Ground.NO_ALLOWANCE)
    if lost.high > allowed_nm:
        return Word(Verdict.BORDERLINE, Ground.STRADDLES)
    return _ranked(grounds, exposure, Ground.WITHIN_ALLOWED)


def _without_number(exposure: Exposure | None, grounds: Grounds) -> Word:
    if grounds.attacked:
        return Word(Verdict.LOST, Ground.STATEMENT_ATTACKS)
    if exposure is None:
        return Word(Verdict.UNMEASURED, Ground.TIME_UNKNOWN)
    ground = Ground.STATEMENT_ADVERSE if grounds.adverse else Ground.STATEMENT_RESISTS
    return Word(Verdict.BORDERLINE, ground)


def _ranked(grounds: Grounds, exposure: Exposure, good: Ground) -> Word:
    """A loss within what is allowed: does its evidence carry the word "holds"?"""
    if not worst_rank((grounds.rank, grounds.target_rank)).can_hold:
        film_weak = not grounds.rank.can_hold
        return Word(Verdict.BORDERLINE, Ground.UNCHECKED if film_weak else Ground.TARGET_UNCHECKED)
    if grounds.limit_time_s is not None and exposure.high_s > grounds.limit_time_s:
        return Word(Verdict.BORDERLINE, Ground.BEYOND_TESTED_TIME)
    return Word(Verdict.HOLDS, good)
