"""The browser's model and the Python engine give the same plan: words, order, numbers, sentences."""

from __future__ import annotations

import json
import math
from collections import Counter
from collections.abc import Callable, Iterator, Sequence
from dataclasses import asdict, replace
from typing import Any

import pytest
from playwright.sync_api import Page

from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.stored import plain
from tests.planner.conftest import PlannerLab
from tests.planner.python_answers import Answer, python_answers
from tests.planner.random_samples import Case, etchant_cases, recipe_cases

# Numbers pass through exp and log of two C libraries; the last bits may differ, no more.
_RELATIVE = 1e-9
_GROUPS = 8
_CASES_A_GROUP = 125
_CASES_ALONE = 1000
_CASES_OF_ALL = 40
_SEED = 20261115

GiveData = Callable[[dict[str, Any]], Page]


def _browser_answers(page: Page, cases: Sequence[Case]) -> list[Answer]:
    return page.evaluate("(cases) => etchwright.answers(data, cases)", [asdict(case) for case in cases])


def _differences(python: Answer, browser: Answer, path: str = "") -> Iterator[str]:
    """Places at which two answers differ by more than the last bits of a number."""
    if isinstance(python, dict) and isinstance(browser, dict):
        assert python.keys() == browser.keys()
        for key in python:
            yield from _differences(python[key], browser[key], f"{path}/{key}")
    elif isinstance(python, list) and isinstance(browser, list) and len(python) == len(browser):
        for index, pair in enumerate(zip(python, browser, strict=True)):
            yield from _differences(*pair, f"{path}/{index}")
    elif not _same(python, browser):
        yield f"{path}: python {python!r}, browser {browser!r}"


def _same(python: Answer, browser: Answer) -> bool:
    numbers = [one for one in (python, browser) if isinstance(one, int | float) and not isinstance(one, bool)]
    if len(numbers) == 2:
        return math.isclose(*numbers, rel_tol=_RELATIVE, abs_tol=0.0)
    return bool(python == browser)


def _with_ties_sorted(answers: Sequence[Answer]) -> Sequence[Answer]:
    """Rows that no rule sets apart may stand in any order."""
    for option in (option for answer in answers for stage in answer for option in stage["options"]):
        places = {id(row): place for place, row in enumerate(option["rows"])}
        keys = [(*row["words"][:2], *row["film"][:2], row["numbers"][0]) for row in option["rows"]]
        first = {key: keys.index(key) for key in keys}
        option["rows"].sort(
            key=lambda row: (
                first[keys[places[id(row)]]],
                json.dumps(row["numbers"]),
                json.dumps(row["caps"]),
            )
        )
    return answers


def _check(page: Page, facts: PlanFacts, cases: Sequence[Case]) -> Counter[str]:
    """Assert that both engines agree; return how often each word came up."""
    python = _with_ties_sorted(json.loads(json.dumps(python_answers(facts, cases))))
    browser = _with_ties_sorted(_browser_answers(page, cases))
    found = [
        f"{difference}\n{json.dumps(asdict(case))}"
        for case, one, other in zip(cases, python, browser, strict=True)
        if (difference := next(_differences(one, other), None)) is not None
    ]
    assert not found, f"{len(found)} of {len(cases)} cases differ; the first:\n" + "\n".join(found[:3])
    return Counter(
        row["words"][0]
        for answer in python
        for stage in answer
        for option in stage["options"]
        for row in option["rows"]
    )


@pytest.mark.parametrize("group", range(_GROUPS))
def test_recipes(lab: PlannerLab, with_data: GiveData, group: int) -> None:
    """Random samples for each recipe, among a few others, agree in everything that a plan says."""
    ids = sorted(lab.facts.etches)[group::_GROUPS]
    facts = replace(lab.facts, etches={id: lab.facts.etches[id] for id in ids})
    page = with_data({"etches": plain(facts.etches)})
    words = _check(page, facts, recipe_cases(facts, _CASES_A_GROUP, _SEED + group))
    assert set(words) == {"holds", "borderline", "lost", "unmeasured"}


def test_all_recipes_at_once(lab: PlannerLab, with_data: GiveData) -> None:
    """With every recipe of the lab in play, options come in the same order and the same ones are left out."""
    words = _check(with_data({}), lab.facts, recipe_cases(lab.facts, _CASES_OF_ALL, _SEED))
    assert words["holds"] > 0


def test_every_etchant_alone(lab: PlannerLab, with_data: GiveData) -> None:
    """By published facts alone, each etchant gives the same one option."""
    cases = etchant_cases(lab.reference, _CASES_ALONE, _SEED)
    assert {case.etchant for case in cases} == set(lab.reference.etchants)
    words = _check(with_data({}), lab.reference, cases)
    assert words["lost"] > 0


def test_there_are_enough_cases() -> None:
    """Two thousand samples at least are compared."""
    assert _GROUPS * _CASES_A_GROUP + _CASES_ALONE + _CASES_OF_ALL >= 2000


def test_a_difference_is_seen() -> None:
    """The comparison notices a wrong word, a number off in the eighth digit, a missing option."""
    assert list(_differences({"a": ["holds"]}, {"a": ["lost"]}))
    assert list(_differences([1.0], [1.0 + 1e-8]))
    assert list(_differences([[1]], [[1], [2]]))
    assert not list(_differences([1.0, None], [1.0 + 1e-12, None]))
