"""Where the pages of each kind of record live, and links to them as values."""

from __future__ import annotations

import enum
from dataclasses import dataclass


class PageKind(enum.StrEnum):
    """The folder of a record's page; ids are unique only within a kind, so the address carries it."""

    RECIPE = "recipes"
    FILM = "films"
    ETCHANT = "etchants"
    CHEMICAL = "chemicals"
    TOOL = "tools"


@dataclass(frozen=True)
class Link:
    """Words that lead somewhere: `target` is an address from the root of the site (`films/au.html`)."""

    text: str
    target: str


def page_url(kind: PageKind, record_id: str) -> str:
    """Return the address of a record's page, from the root of the site."""
    return f"{kind}/{record_id}.html"


def source_url(source_id: str) -> str:
    """Return the address of a reference in the bibliography."""
    return f"bibliography.html#{source_id}"


def glossary_url(term: str) -> str:
    """Return the address of a term in the glossary."""
    return f"glossary.html#{term}"
