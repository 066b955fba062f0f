"""Numbers worked by hand: whoever follows them with a pencil gets what is printed, and the page's answers."""

from __future__ import annotations

import math
import re
from decimal import Decimal

import pytest

from builder.findings.recipe_times import TargetTiming, target_timings
from builder.views.number_text import Rounding, time_text
from builder.views.pencil import worked_out
from builder.views.recipe_worked import Worked, worked_numbers
from builder.views.worked_interval import WorkedStep
from tests.views.shipped import RECIPES, lab

_NUMBER = re.compile(r"\d+(?:\.\d+)?")


def _worked(recipe: str) -> tuple[TargetTiming, Worked]:
    _, computed = lab()
    timing = target_timings(computed, recipe)[0]
    found = worked_numbers(computed, computed.own[recipe].get(timing.film), timing)
    assert found is not None
    return timing, found


def _by_hand(sum_: str) -> float:
    """Work out a printed sum by Python's own parser of expressions: another route than the page's."""
    text = sum_.replace("−", "-").replace("×", "*").replace("÷", "/").replace("²", "**2")
    text = text.replace("e^(", "exp(").replace("√(", "sqrt(").replace("ln(", "log(")
    assert re.fullmatch(r"[\d.+\-*/() a-z]*", text), sum_
    return float(eval(text, {"__builtins__": {}}, {"exp": math.exp, "sqrt": math.sqrt, "log": math.log}))


def _last_digit(printed: str) -> float:
    return float(Decimal(1).scaleb(Decimal(printed).as_tuple().exponent))  # type: ignore[arg-type]


def _step(steps: tuple[WorkedStep, ...], start: str) -> WorkedStep:
    """The last step whose words start so: where a drift moves the ends, they are stated once more."""
    return [step for step in steps if step.words.startswith(start)][-1]


@pytest.mark.parametrize("recipe", RECIPES)
def test_every_sum_gives_its_result(recipe: str) -> None:
    """From the printed numbers alone each result is right to half its last digit."""
    _, worked = _worked(recipe)
    sums = [step for step in worked.steps if step.sum]
    assert len(sums) >= 5
    for step in sums:
        printed = step.result.replace("−", "-")
        assert abs(_by_hand(step.sum) - float(printed)) <= 0.5000001 * _last_digit(printed), step


@pytest.mark.parametrize("recipe", RECIPES)
def test_the_last_results_are_the_answers_of_the_page(recipe: str) -> None:
    """The ends agree with the program's to three digits, and the two times to the step of a timer."""
    timing, worked = _worked(recipe)
    assert timing.band is not None and timing.band.high is not None and timing.band.mid is not None
    for words, rate in (("The low end", timing.band.low), ("The high end", timing.band.high)):
        step = (
            _step(worked.steps, words.removeprefix("The ").capitalize())
            if _is_moved(worked)
            else _step(worked.steps, words)
        )
        assert float(step.result) == pytest.approx(60 * rate, rel=2e-3)
    plan = timing.times(timing.usual_nm)
    first, last = _step(worked.steps, "First look"), _step(worked.steps, "Latest stop")
    assert time_text(float(first.result), Rounding.DOWN) == time_text(plan.first_look_s, Rounding.DOWN)
    assert time_text(float(last.result), Rounding.UP) == time_text(plan.latest_stop_s, Rounding.UP)
    assert time_text(plan.first_look_s, Rounding.DOWN) in first.words
    assert time_text(plan.latest_stop_s, Rounding.UP) in last.words


def _is_moved(worked: Worked) -> bool:
    return any(step.words.startswith("Low end") for step in worked.steps)


@pytest.mark.parametrize("recipe", RECIPES)
def test_every_number_of_a_sum_was_printed_before(recipe: str) -> None:
    """A sum takes what the page shows: results of earlier lines, logarithms of the runs, records in words."""
    records, _ = lab()
    timing, worked = _worked(recipe)
    seen = {log.lstrip("−") for _, log in worked.runs}
    defaults = {"60", "0.8", "1", str(len(worked.runs)), str(len(worked.runs) - 1)}
    for step in worked.steps:
        seen |= set(_NUMBER.findall(step.words))
        if step.words.startswith("Run "):
            seen |= set(_NUMBER.findall(step.sum))
    rows = {str(int(run.time_s)) for run in records.runs[recipe]}
    given = {timing.usual_nm, timing.tolerance, timing.phi, abs(timing.offset_s), timing.overetch, 0.005}
    spread = {str(computed_number) for computed_number in _spread(recipe, timing)}
    for step in worked.steps:
        used = set(_NUMBER.findall(step.sum))
        unknown = {
            one
            for one in used - seen - defaults - rows - spread
            if not any(math.isclose(float(one), value) for value in given)
        }
        if "sum of the weights" not in step.words and "less the induction" not in step.words:
            assert unknown <= _weights(worked), step
        seen.add(step.result.lstrip("−"))


def _weights(worked: Worked) -> set[str]:
    return {
        number
        for step in worked.steps
        if "sum of the weights" in step.words
        for number in _NUMBER.findall(step.sum)
    }


def _spread(recipe: str, timing: TargetTiming) -> set[float]:
    _, computed = lab()
    own = computed.own[recipe][timing.film]
    return {own.spread.s0, own.spread.d0, float(f"{own.spread.d0:g}")}


def test_a_sum_with_anything_but_arithmetic_is_refused() -> None:
    """The pencil works out sums, and nothing else that a text might hold."""
    with pytest.raises(ValueError, match="no sum"):
        worked_out("(1, 2)")
    assert worked_out("√(3² + 4²) − e^(0) × 2 ÷ 1") == 3.0


def test_a_recipe_without_own_runs_has_nothing_to_work_out() -> None:
    """Published numbers are not dressed up as a calculation from runs."""
    _, computed = lab()
    timing = target_timings(computed, "oxide-bhf")[1]
    assert timing.film not in computed.own["oxide-bhf"]
    assert worked_numbers(computed, None, timing) is None
