"""Films are found by the names that people type: any words in any order; a slip of the pen is answered."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import pytest
from playwright.sync_api import Page

from tests.planner.conftest import SCRIPTS, TYPEAHEAD

Ask = Callable[..., Any]


@pytest.fixture(scope="module")
def names(model: Page, data: dict[str, Any]) -> Ask:
    """Calls a function on the films of the shipped lab and a typed text."""
    model.add_script_tag(path=TYPEAHEAD)
    model.add_script_tag(path=SCRIPTS / "names.js")
    model.evaluate(
        "(given) => { window.films = etchwright.names.entriesOf(etchwright.data.read(given).facts).films; }",
        data,
    )

    def ask(typed: str, what: str) -> Any:
        return model.evaluate(f"(typed) => {what}", typed)

    return ask


def _found(names: Ask, typed: str) -> list[str]:
    found: list[str] = names(
        typed, "etchwright.find.matches(films, 'film', typed).map((match) => match.entry.id)"
    )
    return found


def _taken(names: Ask, typed: str) -> str:
    return str(names(typed, "etchwright.names.idOf(films, typed)"))


def _told(names: Ask, typed: str) -> str:
    return str(names(typed, "etchwright.names.unknownWords(films, 'film', typed)"))


@pytest.mark.parametrize(
    ("typed", "film"),
    [
        ("LPCVD silicon nitride", "sin-lpcvd"),
        ("nitride stoichiometric LPCVD", "sin-lpcvd"),
        ("thermal SiO2", "sio2-thermal-wet"),
        ("dry thermal SiO₂", "sio2-thermal-dry"),
        ("positive photoresist", "resist-positive-a"),
        ("undoped poly", "poly-si-undoped"),
    ],
)
def test_words_in_any_order_find_a_film(names: Ask, typed: str, film: str) -> None:
    """Each typed word may stand in another of the film's names, its formula or its id."""
    assert film in _found(names, typed)


def test_a_whole_phrase_comes_before_scattered_words(names: Ask) -> None:
    """What has the text as it was typed stands above what only has its words."""
    found = _found(names, "thermal oxide")
    phrase = names(
        "thermal oxide",
        """films.filter((film) => [film.name, film.id, ...film.also].some(
             (name) => name.toLowerCase().includes(typed))).map((film) => film.id)""",
    )
    assert set(found[: len(phrase)]) == set(phrase)
    assert found[0] == "sio2-thermal-wet"


def test_every_word_must_be_found(names: Ask) -> None:
    """One word that no name has, and the film is not meant."""
    assert _found(names, "thermal oxide marmalade") == []


def test_only_a_name_is_taken(names: Ask) -> None:
    """What is called exactly so is meant; a part of a name, however rare, or half of a word is not."""
    assert _taken(names, "thermal oxide") == "sio2-thermal-wet"
    assert _taken(names, "SiO2") == "sio2-any"
    assert _taken(names, "nitride") == "sin-any"
    for typed in (
        "nitride stoichiometric LPCVD",
        "magnesium",
        "lead",
        "Pb",
        "metal",
        "sputtered oxide",
        "LOR",
    ):
        assert _taken(names, typed) == typed


def test_what_is_called_so_is_suggested_first(names: Ask) -> None:
    """Every name, other name and formula leads to a film that is called so, whatever recipes remove."""
    wrong = names(
        "",
        """films.flatMap((film) => [film.name, ...film.also].filter((name) => {
             const first = etchwright.find.matches(films, 'film', name)[0].entry;
             const same = (text) => text.normalize('NFKD').toLowerCase().replace(/[^\\p{L}\\p{N}]+/gu, '');
             return ![first.name, first.id, ...first.also].some((other) => same(other) === same(name));
           }).map((name) => [film.id, name]))""",
    )
    assert wrong == []


def test_a_misspelt_film_is_answered_with_its_like(names: Ask) -> None:
    """At most two names are offered, the likeliest first, and none for nonsense."""
    assert _told(names, "termal oxyde").startswith(
        'there is no film "termal oxyde"; did you mean Silicon dioxide, thermal, '
    )
    assert "Aluminium" in _told(names, "alluminium")
    told = _told(names, "LPCVD silicon nitride")
    assert "Silicon nitride, LPCVD, stoichiometric" in told
    assert told.count(", or ") == 1
    assert _told(names, "qqzx") == 'there is no film "qqzx"'
    assert _told(names, "") == 'there is no film ""'
