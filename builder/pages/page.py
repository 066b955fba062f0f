"""The finished page and the finished site: plain values, the same bytes for the same input."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Heading:
    """A heading of a page that can be linked to; `level` 2 is right below the title."""

    anchor: str
    text: str
    level: int = 2


@dataclass(frozen=True)
class Page:
    """
    A page ready for any host.

    `url` is relative to the root of the site and ends in `.html`. `html` is the finished content
    with its `h1`; every link in it is relative. `search_text` is plain text; `found_as` is the name
    among search results, where words count most (empty: the title).
    """

    url: str
    title: str
    headings: tuple[Heading, ...]
    html: str
    search_text: str
    description: str
    found_as: str = ""


@dataclass(frozen=True)
class DataFile:
    """A file of the site that is no page, such as the planner's data."""

    url: str
    content: bytes


@dataclass(frozen=True)
class FinishedSite:
    """All that our records add to a site. `notice` stands at the top of every page (empty: nothing)."""

    lab_name: str
    notice: str
    as_of: str
    pages: tuple[Page, ...]
    files: tuple[DataFile, ...] = ()
