"""Templates to HTML: autoescaped, strict about undefined names, no arithmetic inside."""

from __future__ import annotations

import json
import re
from functools import cache, partial
from html import unescape
from typing import Any, Protocol

from jinja2 import Environment, PackageLoader, StrictUndefined
from markupsafe import Markup

from builder.pages.links import allowed_url, relative_url
from builder.pages.page import Heading, Page
from builder.views.number_text import in_words

_SCRIPT_ESCAPES = str.maketrans(
    {"<": "\\u003c", ">": "\\u003e", "&": "\\u0026", "\u2028": "\\u2028", "\u2029": "\\u2029"}
)
_HEADING = re.compile(r'<h([23]) id="([^"]+)">(.*?)</h\1>', re.DOTALL)
_TAG = re.compile(r"<[^>]*>")


class PageView(Protocol):
    """What every view of a whole page tells about itself."""

    @property
    def url(self) -> str: ...
    @property
    def title(self) -> str: ...
    @property
    def description(self) -> str: ...
    @property
    def search_text(self) -> str: ...


def render_page(template: str, view: PageView, found_as: str = "") -> Page:
    """Return the finished page of a view, by the template `<template>.html.j2`; see `Page.found_as`."""
    html = (
        _environment()
        .get_template(f"{template}.html.j2")
        .render(view=view, href=partial(relative_url, view.url))
    )
    title, description = in_words(view.title), in_words(view.description)
    return Page(view.url, title, _headings(html), html, view.search_text, description, in_words(found_as))


def script_json(value: object) -> Markup:
    """Return a value as JSON that may stand inside a script element, whatever text is in it."""
    text = json.dumps(value, ensure_ascii=False, allow_nan=False, sort_keys=True, separators=(",", ":"))
    return Markup(text.translate(_SCRIPT_ESCAPES))


def _in_words(value: object) -> object:
    """Text of records is shown with the signs people read; markup stays as it is."""
    return in_words(value) if isinstance(value, str) and not isinstance(value, Markup) else value


def _headings(html: str) -> tuple[Heading, ...]:
    return tuple(
        Heading(anchor, unescape(_TAG.sub("", text)).strip(), int(level))
        for level, anchor, text in _HEADING.findall(html)
    )


@cache
def _environment() -> Environment:
    environment = Environment(
        loader=PackageLoader("builder.pages"),
        autoescape=True,
        undefined=StrictUndefined,
        finalize=_in_words,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    filters: dict[str, Any] = {"script_json": script_json, "allowed_url": allowed_url}
    environment.filters.update(filters)
    return environment
