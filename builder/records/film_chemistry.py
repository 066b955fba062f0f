"""What the formula of a film tells about the gas it can give, where no record groups the film."""

from __future__ import annotations

import re
from collections.abc import Iterator

from builder.records.films import Film
from builder.records.terms import FilmFamily

_ELEMENT = re.compile(r"[A-Z][a-z]?")
_HYDROGEN_METALS = frozenset({"Al", "Zn", "Mg", "Sn"})
"""Metals that acids and alkalis dissolve with hydrogen."""
_PLATING_METALS = frozenset({"Cu", "Ag", "Au", "Pt", "Pd", "Ir", "Ru", "Rh", "Hg"})
"""Metals nobler than hydrogen: their ions plate out on bare silicon from hydrofluoric acid."""
_COMPOUND_FAMILIES = frozenset({FilmFamily.SEMICONDUCTOR, FilmFamily.OTHER})
_SULFIDE_WORDS = "sulfide"


def elements(film: Film) -> tuple[str, ...]:
    """Return the element symbols of the formula in the order written; none if it has no formula."""
    return tuple(_ELEMENT.findall(film.formula or ""))


def reacting_groups(film: Film) -> Iterator[str]:
    """Yield the groups of films that the formula puts it into."""
    found = elements(film)
    if film.family is FilmFamily.METAL and found and found[0] in _HYDROGEN_METALS:
        yield from ("aluminium", "hydrogen-metal")
    if film.family in _COMPOUND_FAMILIES:
        if "As" in found:
            yield "arsenide"
        if "P" in found:
            yield "phosphide"
        if found == ("Si",):
            yield "silicon"


def reacting_words(film: Film) -> Iterator[str]:
    """Yield the words by which rules name what no group of films stands for."""
    if film.family in _COMPOUND_FAMILIES and "S" in elements(film):
        yield _SULFIDE_WORDS


def hydride_of(film: Film) -> str | None:
    """Return the toxic gas that a compound of this formula can give in an acid, or None."""
    if film.family not in _COMPOUND_FAMILIES:
        return None
    found = elements(film)
    gases = {"As": "AsH3", "P": "PH3", "S": "H2S", "Se": "H2Se", "Sb": "SbH3", "Te": "H2Te"}
    given = [gas for element, gas in gases.items() if element in found]
    return " and ".join(given) or None


def is_plating_metal(film: Film) -> bool:
    """Tell whether ions of this film plate out on bare silicon from hydrofluoric acid."""
    return film.family is FilmFamily.METAL and bool(_PLATING_METALS.intersection(elements(film)))


def is_aluminium(film: Film) -> bool:
    """Tell whether the film is aluminium or an alloy of it."""
    return film.family is FilmFamily.METAL and elements(film)[:1] == ("Al",)
