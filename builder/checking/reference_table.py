"""Which field of which kind names a record, and of which kinds that record may be."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass

from builder.reading.raw import join_pointer

_SUBSTANCES = ("chemicals", "etchants")
_SUBSTANCES_OR_GROUPS = (*_SUBSTANCES, "groups")


@dataclass(frozen=True)
class Reference:
    """Fields at `path` (a star stands for every entry) name a record of one of the kinds in `to`."""

    path: tuple[str, ...]
    to: tuple[str, ...]


def _to(kinds: str | tuple[str, ...], *paths: str) -> tuple[Reference, ...]:
    kinds = (kinds,) if isinstance(kinds, str) else kinds
    return tuple(Reference(tuple(path.split("/")), kinds) for path in paths)


REFERENCES: Mapping[str, tuple[Reference, ...]] = {
    "chemicals": (
        *_to("chemicals", "parts/*/chemical"),
        *_to("groups", "groups/*"),
        *_to("codes", "h_codes/*", "pictograms/*"),
        *_to("precautions", "precaution"),
        *_to("sources", "source/*", "exposure_limits/*/source"),
    ),
    "codes": _to("sources", "source"),
    "compatibility": (
        *_to("etchants", "etchant"),
        *_to("films", "statements/*/film"),
        *_to("sources", "statements/*/source", "hints/*/source"),
    ),
    "constants": (
        *_to("etchants", "etchants/*"),
        *_to("films", "films/*"),
        *_to("sources", "source"),
    ),
    "containers": (
        *_to(_SUBSTANCES_OR_GROUPS, "fitness/*/chemical"),
        *_to("sources", "fitness/*/source"),
    ),
    "couples": (
        *_to("films", "films/*", "affects"),
        *_to("etchants", "etchants/*"),
        *_to("sources", "source"),
    ),
    "etchants": (
        *_to("chemicals", "parts/*/chemical"),
        *_to("groups", "groups/*"),
        *_to("etchants", "variants_of"),
        *_to("precautions", "precaution"),
        *_to("sources", "source/*", "mixture/source/*"),
    ),
    "etches": (
        *_to("tools", "tool"),
        *_to("etchants", "etchant"),
        *_to("films", "targets/*", "masks/*/film", "masks/*/on/*"),
        *_to(_SUBSTANCES, "after_steps/*/chemical"),
    ),
    "films": (
        *_to("films", "similar/*", "members/*", "adhesion_layer_usual/*"),
        *_to("groups", "groups/*"),
        *_to("sources", "source"),
    ),
    "groups": (
        *_to((*_SUBSTANCES, "films"), "members/*"),
        *_to("sources", "source/*"),
    ),
    "hazards": _to("sources", "source/*"),
    "mixing": _to("sources", "source/*"),
    "precautions": (
        *_to(_SUBSTANCES_OR_GROUPS, "covers/*"),
        *_to("sources", "source/*"),
    ),
    "products": _to("sources", "source"),
    "rates": (
        *_to("etchants", "etchant"),
        *_to("films", "rates/*/film"),
        *_to("sources", "rates/*/source"),
    ),
    "runs": _to("films", "*/film"),
    "spread": _to("etches", "methods/*/without/*/recipe"),
    "tools": (
        *_to("containers", "container"),
        *_to(_SUBSTANCES, "chemicals/*"),
        *_to("films", "films_allowed/*", "films_forbidden/*"),
    ),
}
"""By kind; samples have rules of their own, the sides of `mixing` name their kind themselves."""


def names_at(data: object, path: Sequence[str], pointer: str = "") -> Iterator[tuple[str, str]]:
    """Yield pointer and text of every text at the path; what has another shape is passed over."""
    if not path:
        if isinstance(data, str):
            yield pointer, data
        return
    head, rest = path[0], path[1:]
    if head == "*":
        entries = enumerate(data) if isinstance(data, list) else _fields(data)
        for key, value in entries:
            yield from names_at(value, rest, join_pointer(pointer, key))
    elif isinstance(data, Mapping) and head in data:
        yield from names_at(data[head], rest, join_pointer(pointer, head))


def _fields(data: object) -> Iterator[tuple[str, object]]:
    if isinstance(data, Mapping):
        yield from data.items()
