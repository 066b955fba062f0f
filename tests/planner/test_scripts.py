"""The planner's scripts keep to their rules: small, typed, no markup from text, every class in one place."""

from __future__ import annotations

import json
import re
from pathlib import Path

import pytest

from builder.views.planner_page import SCRIPTS
from builder.views.run_card import COLUMN_WORDS, COLUMNS
from tests.browser import ROOT
from tests.planner.conftest import SCRIPTS as FOLDER

_FILES = sorted(FOLDER.glob("*.js"))
_MOST_LINES = 320
_MOST_LINES_OF_MAIN = 50
_NAMES = {path.name for path in _FILES}
# What turns text into markup or code; the page may use none of it.
_FORBIDDEN = re.compile(
    r"innerHTML|outerHTML|insertAdjacentHTML|document\.write|\beval\b|new Function|"
    r"createContextualFragment|\.srcdoc"
)
_TEMPLATE = ROOT / "builder" / "pages" / "templates" / "planner.html.j2"


def _code(path: Path) -> str:
    text = path.read_text(encoding="utf-8")
    return re.sub(r"/\*.*?\*/|//[^\n]*", "", text, flags=re.DOTALL)


def test_every_script_is_loaded_or_only_types() -> None:
    """A script that no page loads would be dead, and one that is missing would break the page."""
    assert {f"{name}.js" for name in SCRIPTS} | {"types.js"} == _NAMES


@pytest.mark.parametrize("path", _FILES, ids=lambda path: path.name)
def test_a_script_is_short_typed_and_safe(path: Path) -> None:
    """Each script is checked by types, fits in one's head, and never makes markup or code of text."""
    text = path.read_text(encoding="utf-8")
    assert text.startswith("// @ts-check\n")
    assert len(text.splitlines()) <= (_MOST_LINES_OF_MAIN if path.name == "main.js" else _MOST_LINES)
    assert _FORBIDDEN.findall(text) == []


@pytest.mark.parametrize("path", _FILES, ids=lambda path: path.name)
def test_only_views_touch_the_document(path: Path) -> None:
    """Arithmetic, sentences and state know no page, no clock and no chance."""
    if path.name == "types.js" or path.name.startswith(("view", "dom", "main")):
        return
    assert re.findall(r"\bdocument\b|\bwindow\.|Date\b|Math\.random|localStorage|fetch\(", _code(path)) == []


def test_every_class_has_a_rule_and_every_rule_a_class() -> None:
    """Classes stand in hooks.js or in the template, each with a rule in planner.css, none left over."""
    hooks = set(re.findall(r'"(plan-[a-z-]+)"', (FOLDER / "hooks.js").read_text(encoding="utf-8")))
    template = _TEMPLATE.read_text(encoding="utf-8")
    classes = {
        name
        for group in re.findall(r'class="([^"]*)"', template)
        for name in group.split()
        if name.startswith("plan")
    }
    styled = set(re.findall(r"\.(plan[a-z-]*)", (FOLDER / "planner.css").read_text(encoding="utf-8")))
    assert hooks | classes == styled
    used = {
        name
        for path in _FILES
        if path.name.startswith("view")
        for name in re.findall(r"\bhooks\.([a-zA-Z]+)", path.read_text(encoding="utf-8"))
    }
    given = set(re.findall(r"\b([a-zA-Z]+): [\"']", (FOLDER / "hooks.js").read_text(encoding="utf-8")))
    assert given - {"root"} == used - {"root"}


def test_the_card_has_the_columns_of_a_run_table() -> None:
    """What is written down at the bench goes into the table column by column."""
    header = (ROOT / "recipes" / "runs" / "oxide-bhf.csv").read_text(encoding="utf-8").splitlines()[1]
    assert ",".join(COLUMNS) == header


def test_the_card_explains_columns_in_the_words_of_the_schema() -> None:
    """What a column holds is said once, in the schema."""
    schema = json.loads((ROOT / "schemas" / "runs.schema.json").read_text(encoding="utf-8"))
    fields = schema["items"]["properties"]
    assert {name: fields[name]["description"] for name in COLUMN_WORDS} == COLUMN_WORDS
    assert set(COLUMNS) - set(COLUMN_WORDS) == {
        "date", "wafer", "film", "film_lot", "carrier", "bath", "note"
    }  # fmt: skip
