"""The names and the order of a sample, taken from data of any shape, so that one fault hides no other."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

from builder.reading.raw import join_pointer


@dataclass(frozen=True)
class Name:
    """A name and its place in the file."""

    pointer: str
    text: str


@dataclass(frozen=True)
class Layer:
    """One layer; what is missing or no text is None."""

    pointer: str
    film: str | None
    role: str | None


@dataclass(frozen=True)
class Outline:
    """What a sample names: films, tools, etchants, recipes; `layers` are top first."""

    layers: tuple[Layer, ...]
    films: tuple[Name, ...]
    unders: tuple[Name, ...]
    tools: tuple[Name, ...]
    etchants: tuple[Name, ...]
    etches: tuple[Name, ...]


def outline_of(data: object) -> Outline:
    """Return the outline of a sample's data; parts of a wrong shape are passed over."""
    layers = list(_items(data, "layers"))
    places = [*layers, *_items(data, "also_exposed"), ("/back", _field(data, "back"))]
    limits, steps = _field(data, "limits"), list(_items(data, "steps"))
    return Outline(
        layers=tuple(
            Layer(pointer, _text(_field(layer, "film")), _text(_field(layer, "role")))
            for pointer, layer in layers
        ),
        films=tuple(_names(places, "film")),
        unders=tuple(_names(places, "on")),
        tools=tuple(_listed(limits, "tools")),
        etchants=(*_listed(limits, "etchants"), *_names(steps, "etchant")),
        etches=tuple(_names(steps, "etch")),
    )


def _field(data: object, key: str) -> object:
    return data.get(key) if isinstance(data, Mapping) else None


def _text(value: object) -> str | None:
    return value if isinstance(value, str) else None


def _items(data: object, key: str) -> Iterator[tuple[str, object]]:
    items = _field(data, key)
    if isinstance(items, list):
        for index, item in enumerate(items):
            yield join_pointer(f"/{key}", index), item


def _names(places: list[tuple[str, object]], key: str) -> Iterator[Name]:
    for pointer, item in places:
        if (name := _text(_field(item, key))) is not None:
            yield Name(f"{pointer}/{key}", name)


def _listed(limits: object, key: str) -> Iterator[Name]:
    for pointer, item in _items(limits, key):
        if isinstance(item, str):
            yield Name(f"/limits{pointer}", item)
