"""Films by every name people use for them: id, name, synonym, formula."""

from __future__ import annotations

import unicodedata
from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from typing import TYPE_CHECKING

from builder.problems import did_you_mean

if TYPE_CHECKING:
    from builder.records.films import Film

_MOST_SHOWN = 5
"""Films named in one suggestion; a longer list is no help."""


@dataclass(frozen=True)
class FilmNames:
    """An index from every name to the ids of the films that carry it."""

    ids_by_form: Mapping[str, tuple[str, ...]]
    names: Mapping[str, tuple[str, ...]]

    @classmethod
    def of(cls, films: Iterable[Film]) -> FilmNames:
        """Return the index of the films."""
        # A film called so goes before one that only has the formula, and a film before a family.
        ordered = sorted(films, key=lambda film: (film.is_family, film.id))
        called = [(film.id, name) for film in ordered for name in (film.id, film.name, *film.synonyms)]
        # Who calls a film by the name of its family means one of the members.
        meant = [(id, name) for film in ordered for name in film.synonyms for id in film.members]
        made_of = [(film.id, film.formula) for film in ordered if film.formula]
        return cls.of_pairs([*called, *meant, *made_of])

    @classmethod
    def of_pairs(cls, pairs: Iterable[tuple[str, str]]) -> FilmNames:
        """Return the index of pairs of a film's id and one of its names, the best known first."""
        by_form: dict[str, list[str]] = {}
        names: dict[str, list[str]] = {}
        for film, name in pairs:
            _add(by_form, _form(name), film)
            _add(names, name, film)
        return cls(
            {form: tuple(ids) for form, ids in by_form.items()},
            {name: tuple(ids) for name, ids in names.items()},
        )

    def find(self, word: str) -> tuple[str, ...]:
        """
        Return the ids of the films called so, the likeliest first; empty if none is.

        Case, blanks, hyphens and the height of digits make no difference: `SiO₂` finds the oxides.
        """
        return self.ids_by_form.get(_form(word), ())

    def suggestion(self, word: str) -> str:
        """Return `did you mean "id" or "id"?` for a word that is no film's id, or an empty hint."""
        ids = self.find(word)
        if not ids:
            close = did_you_mean(word, self.names)
            ids = () if close is None else self.names[close]
        if not ids:
            return ""
        shown = " or ".join(f'"{name}"' for name in ids[:_MOST_SHOWN])
        return f"did you mean {shown}{' or another' if len(ids) > _MOST_SHOWN else ''}?"


def _add(index: dict[str, list[str]], name: str, film: str) -> None:
    ids = index.setdefault(name, [])
    if film not in ids:
        ids.append(film)


def _form(name: str) -> str:
    letters = unicodedata.normalize("NFKC", name).casefold()
    return "".join(letter for letter in letters if letter.isalnum())
