"""Films by every name people use for them."""

from __future__ import annotations

from builder.records.film_names import FilmNames
from builder.records.films import Film
from builder.records.terms import Barrier, FilmClass, FilmFamily, Origin


def film(
    name: str, *, is_family: bool = False, synonyms: tuple[str, ...] = (), formula: str | None = None
) -> Film:
    """Return a film with these names."""
    return Film(
        id=name,
        file=f"recipes/films/{name}.yaml",
        origin=Origin.LAB,
        name=f"Film {name}",
        family=FilmFamily.OXIDE,
        film_class=FilmClass.FAMILY if is_family else FilmClass.FILM,
        barrier=Barrier.UNKNOWN,
        synonyms=synonyms,
        formula=formula,
    )


NAMES = FilmNames.of(
    [
        film("a-glass", formula="SiO2"),
        film("oxide-any", is_family=True, synonyms=("oxide",), formula="SiO2"),
        film("oxide-wet", synonyms=("thermal oxide", "SiO2")),
        film("al-si", synonyms=("Al/Si 2%",), formula="Al"),
    ]
)


def test_case_height_of_digits_and_hyphens_make_no_difference() -> None:
    """SiO₂, sio2 and SIO-2 are one name."""
    for word in ("SiO₂", "sio2", "SIO-2", " SiO2 "):
        assert NAMES.find(word) == ("oxide-wet", "a-glass", "oxide-any")


def test_a_film_called_so_stands_before_one_that_only_has_the_formula() -> None:
    """And a family, which is no film, stands last."""
    assert NAMES.suggestion("SiO2").startswith('did you mean "oxide-wet" or "a-glass" or "oxide-any"')


def test_a_misspelling_is_found() -> None:
    """By likeness, over every name."""
    assert NAMES.suggestion("thermal oxid") == 'did you mean "oxide-wet"?'


def test_a_word_like_nothing_has_no_suggestion() -> None:
    """A wild guess is worse than none."""
    assert NAMES.suggestion("xyzzy") == ""
    assert NAMES.find("xyzzy") == ()
