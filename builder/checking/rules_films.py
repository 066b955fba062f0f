"""Rules for films: chains of similar films end, families and films are told apart."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from builder.checking.reference_table import names_at
from builder.checking.rule import Checked, Fault, Rule
from builder.records.films import Film


def _cycles(checked: Checked) -> Iterator[Fault]:
    """A cycle would hand a film its own missing rate as a hint."""
    films = checked.records.films
    for film in films.values():
        for index, other in enumerate(film.similar):
            if other in films and film.id in _reached(other, films):
                words = f'"{other}" is similar to "{film.id}" in turn; hints would go round in a circle'
                yield Fault(film.file, f"/similar/{index}", words, "keep one of the two directions")


def _reached(start: str, films: Mapping[str, Film]) -> frozenset[str]:
    """Return every film that `start` leads to by `similar`, itself included."""
    seen: set[str] = set()
    waiting = [start]
    while waiting:
        name = waiting.pop()
        if name not in seen:
            seen.add(name)
            waiting += films[name].similar if name in films else ()
    return frozenset(seen)


def _similar_families(checked: Checked) -> Iterator[Fault]:
    films = checked.records.films
    for film in films.values():
        for key, names in (("similar", film.similar), ("adhesion_layer_usual", film.adhesion_layer_usual)):
            for index, name in enumerate(names):
                if name in films and films[name].is_family:
                    words = f'"{name}" stands for several films'
                    yield Fault(film.file, f"/{key}/{index}", words, "name the film as deposited")


def _members(checked: Checked) -> Iterator[Fault]:
    films = checked.records.films
    for film in films.values():
        if film.members and not film.is_family:
            yield Fault(film.file, "/members", "only a family has members", 'set "class: family"')
        for index, name in enumerate(film.members):
            if name in films and films[name].is_family:
                words = f'the member "{name}" is a family itself'
                yield Fault(film.file, f"/members/{index}", words, "list its films")


def _pending(checked: Checked) -> Iterator[Fault]:
    for file, raw in checked.raws.items():
        if not isinstance(raw.data, Mapping):
            continue
        for pointer, name in names_at(raw.data, ("pending", "*")):
            if raw.data.get(name) not in (None, [], "pending"):
                yield Fault(file, pointer, f'"{name}" is stated, so it is not pending')


def _couples(checked: Checked) -> Iterator[Fault]:
    for couple in checked.records.couples.values():
        if couple.affects is not None and couple.affects not in couple.films:
            words = f'"{couple.affects}" is none of the two films'
            yield Fault(couple.file, "/affects", words, f"write {' or '.join(couple.films)}")


RULES: tuple[Rule, ...] = (
    Rule("similar-cycle", _cycles),
    Rule("family-for-film", _similar_families),
    Rule("members-of-film", _members),
    Rule("pending-but-stated", _pending),
    Rule("couple-affects-other", _couples),
)
