"""The glossary: in order, complete, and reached from the pages."""

from __future__ import annotations

import re
from pathlib import Path

from builder.views.words import EFFECT_NAMES, METHOD_NAMES, RANK_NAMES, STATUS_NAMES

_DOCS = Path(__file__).resolve().parents[2] / "docs"
_TERM = re.compile(r"^(.+?) \{ #([a-z-]+) \}$", re.MULTILINE)
# Words of the trade that a newcomer may meet on a page; checked by hand against every kind of page.
_TRADE = (
    "adhesion", "anisotropic", "ash", "barrier", "breakthrough", "carrier", "clearing", "descum", "endpoint",
    "etchant", "film", "first look", "galvanic", "gauge", "hmds", "induction", "interval", "isotropic",
    "latest stop", "lift-off", "loading", "lot", "lpcvd", "mask", "monitor wafer", "overetch", "passivate",
    "pecvd", "plasma", "pot life", "quench", "rank", "rate", "reserve", "resist", "rinse", "run", "seasoning",
    "selectivity", "series", "spread", "stale", "standing", "strip", "target", "tolerance", "transfer",
    "undercut", "unevenness", "verdict", "window",
)  # fmt: skip


def _glossary() -> str:
    return (_DOCS / "glossary.md").read_text(encoding="utf-8")


def test_terms_are_in_order_and_explained_once() -> None:
    """Terms stand by the alphabet; each has its own anchor and a sentence."""
    terms = _TERM.findall(_glossary())
    names = [name.casefold() for name, _ in terms]
    assert names == sorted(names)
    assert len({anchor for _, anchor in terms}) == len(terms) >= 80
    explained = re.findall(r"^:   \S.*[^\s]", _glossary(), re.MULTILINE)
    assert len(explained) == len(terms)


def test_every_word_of_the_trade_on_a_page_is_explained() -> None:
    """The closed sets that pages show, and the trade's words, are all in the glossary."""
    text = _glossary().casefold()
    shown = [*EFFECT_NAMES.values(), *METHOD_NAMES.values(), *RANK_NAMES.values(), *STATUS_NAMES.values()]
    wanted = {word.casefold() for word in (*shown, *_TRADE)} - {"attacks", "leaves residue"}
    wanted = {word.replace("literature, unchecked", "unchecked") for word in wanted}
    assert {word for word in wanted if word not in text} == set()


def test_pages_lead_to_the_glossary(shipped_site: Path) -> None:
    """A newcomer gets there from the home page, from the path of the beginner and from every page's tabs."""
    for url in ("index.html", "start.html", "reading.html"):
        assert "glossary.html" in (shipped_site / url).read_text(encoding="utf-8"), url


def test_no_typed_unit_is_left_on_a_page(shipped_site: Path) -> None:
    """Degrees and micrometres have their signs wherever a record's text is shown."""
    left = {}
    for path in sorted(shipped_site.rglob("*.html")):
        text = re.sub(r"<script.*?</script>|<[^>]*>", " ", path.read_text(encoding="utf-8"), flags=re.DOTALL)
        found = re.findall(r"[^\n]{0,30}\d\s?(?:degC|um)\b", text)
        if found:
            left[path.relative_to(shipped_site).as_posix()] = found[:2]
    assert left == {}
