"""The page of a tool: what it may do, which films may enter, which recipes run on it."""

from __future__ import annotations

from dataclasses import dataclass

from builder.records.lab import LabRecords
from builder.records.terms import FilmFamily
from builder.records.tools import SettingLimit, Tool
from builder.views.link import Link, PageKind, page_url
from builder.views.number_text import as_written
from builder.views.recipe_rows import RecipeRow, recipe_rows
from builder.views.references import Fact, chemical_link, film_link, known_facts
from builder.views.words import FAMILY_NAMES, METHOD_NAMES, TOOL_KIND_NAMES, listed

_FAMILY_MARK = "family:"


@dataclass(frozen=True)
class FilmRule:
    """Films that may or must not enter: one film with its page, or a whole family."""

    text: str
    link: Link | None


@dataclass(frozen=True)
class ToolPage:
    """All that the page of a tool shows."""

    url: str
    title: str
    description: str
    search_text: str
    kind: str
    facts: tuple[Fact, ...]
    limits: tuple[Fact, ...]
    allowed: tuple[FilmRule, ...]
    forbidden: tuple[FilmRule, ...]
    chemicals: tuple[Link, ...]
    training: str
    owner_role: str
    note: str | None
    recipes: tuple[RecipeRow, ...]


def tool_page(records: LabRecords, tool: Tool) -> ToolPage:
    """Return the view of one tool."""
    return ToolPage(
        url=page_url(PageKind.TOOL, tool.id),
        title=tool.name,
        description=f"{tool.name}: limits, films that may enter, recipes.",
        search_text=f"{tool.id} {tool.kind}",
        kind=TOOL_KIND_NAMES[tool.kind],
        facts=known_facts(
            ("Methods", listed(tuple(METHOD_NAMES[method].lower() for method in tool.methods))),
            ("Carrier", tool.carrier),
            ("Cooling", tool.cooling),
            ("Container", records.containers[tool.container].name if tool.container else None),
            ("Asks for", tool.training),
            ("Looked after by", tool.owner_role),
        ),
        limits=tuple(Fact(name, _limit_text(limit)) for name, limit in tool.limits.items()),
        allowed=tuple(_film_rule(records, one) for one in tool.films_allowed),
        forbidden=tuple(_film_rule(records, one) for one in tool.films_forbidden),
        chemicals=tuple(chemical_link(records, one) for one in tool.chemicals),
        training=tool.training,
        owner_role=tool.owner_role,
        note=tool.note,
        recipes=recipe_rows(records, [etch for etch in records.etches.values() if etch.tool == tool.id]),
    )


def _limit_text(limit: SettingLimit) -> str:
    low = None if limit.min is None else as_written(limit.min.text)
    high = None if limit.max is None else as_written(limit.max.text)
    if low is not None and high is not None:
        return f"{low} to {high}"
    return (
        f"at least {low}" if low is not None else f"at most {high}" if high is not None else "no limit stated"
    )


def _film_rule(records: LabRecords, named: str) -> FilmRule:
    if named.startswith(_FAMILY_MARK):
        family = FilmFamily(named.removeprefix(_FAMILY_MARK))
        return FilmRule(f"all {FAMILY_NAMES[family].lower()}", None)
    link = film_link(records, named)
    return FilmRule(link.text, link)
