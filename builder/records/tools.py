"""Benches and chambers."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from builder.records.conversion import Setting
from builder.records.films import Film
from builder.records.record import Record
from builder.records.terms import Method, ToolKind


@dataclass(frozen=True, slots=True, kw_only=True)
class SettingLimit:
    """Lowest and highest value of one setting; None is no limit on that side."""

    min: Setting | None = None
    max: Setting | None = None


@dataclass(frozen=True, slots=True, kw_only=True)
class Tool(Record):
    """
    One bench or chamber.

    `films_allowed` and `films_forbidden` hold film ids or `family:NAME`; an empty `films_allowed`
    means that nothing is listed, so only `films_forbidden` decides.
    """

    name: str
    kind: ToolKind
    methods: tuple[Method, ...]
    limits: Mapping[str, SettingLimit]
    training: str
    owner_role: str
    films_allowed: tuple[str, ...] = ()
    films_forbidden: tuple[str, ...] = ()
    carrier: str | None = None
    cooling: str | None = None
    container: str | None = None
    chemicals: tuple[str, ...] = ()
    note: str | None = None

    def refusal(self, film: Film) -> str | None:
        """Return why the film must not enter, or None if it may; what is forbidden is never allowed."""
        names = {film.id, f"family:{film.family}"}
        if hits := names.intersection(self.films_forbidden):
            return f"{self.name} forbids {min(hits)}"
        if self.films_allowed and not names.intersection(self.films_allowed):
            return f"{self.name} does not list {film.id} among the films it allows"
        return None
