"""Links: relative, allowed, and checked over finished pages."""

from __future__ import annotations

from pathlib import Path

import pytest

from builder.pages.links import allowed_url, check_links, relative_url


@pytest.mark.parametrize(
    ("page", "target", "expected"),
    [
        ("index.html", "films/au.html", "films/au.html"),
        ("films/au.html", "films/cr.html", "cr.html"),
        ("films/au.html", "index.html", "../index.html"),
        ("films/au.html", "bibliography.html#x", "../bibliography.html#x"),
        ("films/au.html", "films/au.html#rates", "#rates"),
    ],
)
def test_relative_url(page: str, target: str, expected: str) -> None:
    """A link leads from its page to its target wherever the site stands."""
    assert relative_url(page, target) == expected


@pytest.mark.parametrize(
    "url", ["javascript:alert(1)", " JavaScript:x", "data:text/html,x", "http://x.org", "x.html"]
)
def test_other_schemes_are_refused(url: str) -> None:
    """Only https and mail addresses leave the site."""
    assert allowed_url(url) is None


def test_an_allowed_address_is_kept() -> None:
    """A DOI's address passes unchanged."""
    assert allowed_url(" https://doi.org/10.1/x ") == "https://doi.org/10.1/x"


def _rules(folder: Path, body: str) -> list[str]:
    (folder / "a").mkdir()
    (folder / "a" / "page.html").write_text(f"<h1 id='top'>x</h1>{body}", encoding="utf-8")
    (folder / "other.html").write_text("<p id='there'>y</p>", encoding="utf-8")
    (folder / "style.css").write_text("", encoding="utf-8")
    return [problem.rule for problem in check_links(folder)]


@pytest.mark.parametrize(
    "body",
    [
        "<a href='../other.html#there'>x</a>",
        "<a href='#top'>x</a><link href='../style.css?v=1'>",
        "<a href='https://doi.org/10.1/x'>x</a>",
        "<img src='data:image/png;base64,AA'>",
    ],
)
def test_good_links_pass(tmp_path: Path, body: str) -> None:
    """Files, anchors, outside citations and inline images are no problem."""
    assert _rules(tmp_path, body) == []


@pytest.mark.parametrize(
    ("body", "rule"),
    [
        ("<a href='../gone.html'>x</a>", "dead-link"),
        ("<a href='../../outside.html'>x</a>", "dead-link"),
        ("<a href='../other.html#gone'>x</a>", "dead-anchor"),
        ("<a href='#gone'>x</a>", "dead-anchor"),
        ("<a href='/other.html'>x</a>", "absolute-link"),
        ("<a href='javascript:x()'>x</a>", "refused-scheme"),
        ("<script src='https://cdn.example/x.js'></script>", "outside-request"),
        ("<img src='//cdn.example/x.png'>", "outside-request"),
        ("<i id='top'>x</i>", "repeated-anchor"),
    ],
)
def test_bad_links_are_named(tmp_path: Path, body: str, rule: str) -> None:
    """Each fault has a rule of its own."""
    assert _rules(tmp_path, body) == [rule]
