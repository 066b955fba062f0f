"""Links: made relative to their page, allowed by their scheme, and checked over the finished site."""

from __future__ import annotations

import posixpath
from collections.abc import Iterator
from dataclasses import dataclass, field
from html.parser import HTMLParser
from pathlib import Path
from urllib.parse import unquote, urlsplit

from builder.problems import Problem, Severity, sorted_problems

_ALLOWED_SCHEMES = frozenset({"https", "mailto"})
_LINK_ATTRIBUTES = frozenset({"href", "src", "action", "poster", "data"})
_DOI = "https://doi.org/"


def relative_url(from_url: str, to_url: str) -> str:
    """Return the address of `to_url` as seen from the page `from_url`; both from the root of the site."""
    path, separator, anchor = to_url.partition("#")
    if path == from_url and separator:
        return f"#{anchor}"
    folder = posixpath.dirname(from_url) or "."
    return posixpath.relpath(path, folder) + separator + anchor


def allowed_url(url: str) -> str | None:
    """Return an outside address if its scheme is allowed (https, mailto), else None."""
    try:
        parts = urlsplit(url.strip())
    except ValueError:
        return None
    return url.strip() if parts.scheme.lower() in _ALLOWED_SCHEMES else None


def doi_url(doi: str) -> str:
    """Return the address of a DOI."""
    return _DOI + doi


def check_links(site_dir: Path) -> list[Problem]:
    """
    Return an error for each link of the built site that leads nowhere, or out to load something.

    Looks at every HTML file: links to files and to anchors must resolve within the site; anything a
    page would load by itself (script, style, image) must be local.
    """
    read = {path.relative_to(site_dir).as_posix(): _read(path) for path in sorted(site_dir.rglob("*.html"))}
    found = (
        problem for page, content in read.items() for problem in _dead_links(page, content, read, site_dir)
    )
    return sorted_problems(found)


@dataclass
class _Content(HTMLParser):
    """The anchors and links of one page."""

    anchors: set[str] = field(default_factory=set)
    repeated: set[str] = field(default_factory=set)
    links: list[tuple[str, str, int, int]] = field(default_factory=list)

    def __post_init__(self) -> None:
        super().__init__(convert_charrefs=True)

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        line, column = self.getpos()
        for name, value in attrs:
            if value is None:
                continue
            if name == "id":
                (self.repeated if value in self.anchors else self.anchors).add(value)
            elif name in _LINK_ATTRIBUTES or name == "xlink:href":
                self.links.append((tag, value, line, column + 1))

    def __hash__(self) -> int:
        return id(self)


def _read(path: Path) -> _Content:
    content = _Content()
    content.feed(path.read_text(encoding="utf-8"))
    content.close()
    return content


def _dead_links(page: str, content: _Content, read: dict[str, _Content], site_dir: Path) -> Iterator[Problem]:
    for anchor in sorted(content.repeated):
        yield _problem(page, 1, 1, "repeated-anchor", f'the anchor "{anchor}" stands twice')
    for tag, link, line, column in content.links:
        fault = _fault(page, tag, link, read, site_dir)
        if fault is not None:
            yield _problem(page, line, column, *fault)


def _fault(
    page: str, tag: str, link: str, read: dict[str, _Content], site_dir: Path
) -> tuple[str, str] | None:
    parts = urlsplit(link)
    if parts.scheme or parts.netloc:
        return _outside_fault(tag, link, parts.scheme)
    if link.startswith("/"):
        return "absolute-link", f'"{link}" works on one server only'
    target = (
        posixpath.normpath(posixpath.join(posixpath.dirname(page), unquote(parts.path)))
        if parts.path
        else page
    )
    if target.startswith(".."):
        return "dead-link", f'"{link}" leaves the site'
    if target not in read and not (site_dir / target).is_file():
        return "dead-link", f'"{link}" leads nowhere'
    anchor = unquote(parts.fragment)
    # The theme's own toggles and an empty fragment lead to the top of the page.
    if anchor and target in read and anchor not in read[target].anchors:
        return "dead-anchor", f'"{link}" leads to an anchor that is not there'
    return None


def _target(page: str, path: str) -> str:
    return posixpath.normpath(posixpath.join(posixpath.dirname(page), path)) if path else page


def _outside_fault(tag: str, link: str, scheme: str) -> tuple[str, str] | None:
    if tag != "a":
        return None if scheme == "data" else ("outside-request", f'<{tag}> would load "{link}"')
    return None if allowed_url(link) else ("refused-scheme", f'"{link}" has a scheme that is not allowed')


def _problem(page: str, line: int, column: int, rule: str, message: str) -> Problem:
    return Problem(page, line, column, "", Severity.ERROR, rule, message)
