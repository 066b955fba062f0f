"""Ranks of evidence: how good the grounds for a number are. One scale for the whole project."""

from __future__ import annotations

from collections.abc import Iterable
from enum import StrEnum


class Rank(StrEnum):
    """
    Grounds of a number or a word, best first.

    `own`: this lab's runs. `literature`: seen in a text that quotes the source. `unchecked`:
    recalled, or resting on a guess. `statement`: words without a number. `similar`: another
    film's number, a hint only. `none`: nothing on record.
    """

    OWN = "own"
    LITERATURE = "literature"
    UNCHECKED = "unchecked"
    STATEMENT = "statement"
    SIMILAR = "similar"
    NONE = "none"

    @property
    def order(self) -> int:
        """0 for the best rank, rising."""
        return _ORDER[self]

    @property
    def has_number(self) -> bool:
        """Does this rank carry a number for the pair itself?"""
        return self in (Rank.OWN, Rank.LITERATURE, Rank.UNCHECKED)

    @property
    def can_hold(self) -> bool:
        """May a number of this rank support the word "holds"?"""
        return self in (Rank.OWN, Rank.LITERATURE)


_ORDER = {rank: place for place, rank in enumerate(Rank)}


def worst_rank(ranks: Iterable[Rank]) -> Rank:
    """The weakest of several ranks; `none` when there are none."""
    return max(ranks, key=lambda rank: rank.order, default=Rank.NONE)
