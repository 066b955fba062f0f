"""Links: made relative to their page, allowed by their scheme, and checked over the finished site."""

from __future__ import annotations

import posixpath
from collections import Counter
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path
from urllib.parse import unquote, urlsplit

from builder.pages.start_tags import start_tags
from builder.problems import Problem, Severity, sorted_problems

_ALLOWED_SCHEMES = frozenset({"https", "mailto"})
_LINK_ATTRIBUTES = frozenset({"href", "src", "action", "poster", "data", "xlink:href"})
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


@dataclass(frozen=True)
class _Content:
    """The anchors and links of one page; a link has its tag, its address and its place in the text."""

    text: str
    anchors: frozenset[str]
    repeated: frozenset[str]
    links: tuple[tuple[str, str, int], ...]

    def line_and_column(self, offset: int) -> tuple[int, int]:
        """Where a place in the text is, for people."""
        return self.text.count("\n", 0, offset) + 1, offset - self.text.rfind("\n", 0, offset)


def _read(path: Path) -> _Content:
    text = path.read_text(encoding="utf-8")
    anchors: Counter[str] = Counter()
    links: list[tuple[str, str, int]] = []
    for tag in start_tags(text):
        for name, value in tag.attributes:
            if name == "id":
                anchors[value] += 1
            elif name in _LINK_ATTRIBUTES:
                links.append((tag.name, value, tag.offset))
    repeated = frozenset(anchor for anchor, count in anchors.items() if count > 1)
    return _Content(text, frozenset(anchors), repeated, tuple(links))


def _dead_links(page: str, content: _Content, read: dict[str, _Content], site_dir: Path) -> Iterator[Problem]:
    for anchor in sorted(content.repeated):
        yield _problem(page, 1, 1, "repeated-anchor", f'the anchor "{anchor}" stands twice')
    for tag, link, offset in content.links:
        fault = _fault(page, tag, link, read, site_dir)
        if fault is not None:
            yield _problem(page, *content.line_and_column(offset), *fault)


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
