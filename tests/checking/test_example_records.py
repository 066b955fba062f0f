"""Good and bad records are files: a bad one breaks exactly the rule it is named after, a good one none."""

from __future__ import annotations

import pytest

from builder.problems import format_text
from tests.checking.example_lab import Example, examples, problems_with
from tests.checking.rule_names import FOLDER_RULES, rule_names


def _name(example: Example) -> str:
    return f"{example.kind}/{example.path.name}"


def test_the_example_lab_itself_has_no_problem() -> None:
    """A fault of the lab around an example would be blamed on the example."""
    assert [format_text(problem) for problem in problems_with(None)] == []


@pytest.mark.parametrize("example", examples("invalid"), ids=_name)
def test_an_invalid_record_breaks_exactly_its_rule(example: Example) -> None:
    """The rule named, and no other, is reported, and it is placed in the example."""
    problems = problems_with(example)
    shown = [format_text(problem) for problem in problems]
    assert {problem.rule for problem in problems} == {example.rule}, shown
    places = {place for _, place in example.files()}
    assert {problem.file for problem in problems} <= places, shown


@pytest.mark.parametrize("example", examples("valid"), ids=_name)
def test_a_valid_record_breaks_no_rule(example: Example) -> None:
    """What stands just within a rule passes."""
    assert [format_text(problem) for problem in problems_with(example)] == []


def test_every_rule_has_an_invalid_example() -> None:
    """A rule that no record can break might be no rule at all."""
    shown = {example.rule for example in examples("invalid")}
    assert rule_names() - FOLDER_RULES - shown == set()
    assert shown - rule_names() == set(), "an example names a rule that does not exist"
