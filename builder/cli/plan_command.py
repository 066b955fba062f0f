"""`etchwright plan`: will this sample survive, and for how long is it etched?"""

from __future__ import annotations

import datetime
import json
from pathlib import Path

import click

from builder.checking.sample_check import check_sample
from builder.cli.lab_facts import lab_facts
from builder.cli.options import as_of_option, given_day, lab_option, print_problems, stop_on_errors
from builder.cli.plan_text import plan_lines
from builder.findings.plan.facts import PlanFacts, Span
from builder.findings.plan.planning import plan as make_plan
from builder.findings.plan.result import Plan
from builder.findings.plan.sample import plan_sample
from builder.findings.plan.store import names_of
from builder.problems import suggestion
from builder.records.conversion import ROOM_HIGH_K, ROOM_LOW_K
from builder.records.quantities import Form, Quantity, parse_quantity
from builder.records.samples import Sample
from builder.records.unit_table import Dimension
from builder.views.plan_json import plan_data

NONE_HOLDS = 2
"""Exit status of a plan in which no option holds."""


class Confidence(click.ParamType[float]):
    """A two-sided confidence, 0.5 to 1 exclusive, also as a percentage."""

    name = "CONFIDENCE"

    def convert(self, value: object, param: click.Parameter | None, ctx: click.Context | None) -> float:
        """Return the confidence a text states."""
        text = str(value).strip()
        try:
            number = float(text.removesuffix("%")) / (100 if text.endswith("%") else 1)
        except ValueError:
            self.fail(f'"{value}" is no confidence; write it as 0.95', param, ctx)
        if not 0.5 < number < 1:
            self.fail(f'"{value}" is not between 0.5 and 1; write it as 0.95', param, ctx)
        return number


class Temperature(click.ParamType[Span]):
    """A temperature with its unit, or `room`."""

    name = "TEMPERATURE"

    def convert(self, value: object, param: click.Parameter | None, ctx: click.Context | None) -> Span:
        """Return the temperature a text states, K."""
        if str(value).strip().lower() == "room":
            return Span(low=ROOM_LOW_K, high=ROOM_HIGH_K)
        forms = frozenset({Form.VALUE, Form.RANGE})
        quantity = parse_quantity(str(value), Dimension.TEMPERATURE, forms=forms)
        if not isinstance(quantity, Quantity):
            self.fail(f"{quantity.message}; {quantity.hint or 'write it as 80 degC'}", param, ctx)
        low = quantity.low if quantity.value is None else quantity.value
        high = quantity.high if quantity.value is None else quantity.value
        assert low is not None
        assert high is not None
        return Span(low=low, high=high)


@click.command()
@click.argument("sample", type=click.Path(path_type=Path), metavar="SAMPLE")
@lab_option
@as_of_option
@click.option("--etchant", metavar="ID", help="Published facts of one etchant alone, without any recipe.")
@click.option("--confidence", type=Confidence(), help="Confidence of every interval; else that of the lab.")
@click.option("--temperature", type=Temperature(), help='Temperature of the etch, as "80 degC" or room.')
@click.option("--json", "as_json", is_flag=True, help="Print the plan as JSON (schemas/plan.json).")
@click.option("--link", is_flag=True, help="Print the address that opens the sample in the site's planner.")
@click.option("--all", "every", is_flag=True, help="Show every option in full and all that is left out.")
def plan(
    sample: Path, lab: Path, as_of: datetime.date | None, etchant: str | None, confidence: float | None,
    temperature: Span | None, as_json: bool, link: bool, every: bool,
) -> None:  # fmt: skip
    """
    Plan the etch of a sample: which recipe, when to look and stop, what is left of every film.

    SAMPLE is a file in YAML or JSON, as in recipes/samples. Ends with 0 if an option holds, with 2 if
    none does, with 1 if the sample or the records are at fault.
    """
    facts = lab_facts(lab, given_day(as_of), confidence, reference_only=etchant is not None)
    if etchant is not None and etchant not in facts.etchants:
        hint = suggestion(etchant, facts.etchants)
        raise click.UsageError(f'There is no etchant "{etchant}"; {hint or "see the list on the site"}')
    # Published facts alone know no recipe and no tool, but the sample may name them all the same.
    unjudged = frozenset({"etches", "tools"}) if etchant is not None else frozenset()
    checked, problems = check_sample(sample, names_of(facts), unjudged=unjudged)
    print_problems(problems)
    stop_on_errors(problems, "no plan made")
    assert checked is not None
    if link:
        _print_link(checked)
        return
    made = _made(facts, checked, confidence, temperature, etchant)
    if as_json:
        click.echo(json.dumps(plan_data(made), indent=2, ensure_ascii=False))
    else:
        for line in plan_lines(made, facts, every=every):
            click.echo(line)
    if not made.holds:
        raise click.exceptions.Exit(NONE_HOLDS)


def _made(
    facts: PlanFacts, sample: Sample, confidence: float | None, temperature: Span | None, etchant: str | None
) -> Plan:
    asked = facts.defaults.confidence if confidence is None else confidence
    seen = plan_sample(sample, facts.defaults, temperature)
    return make_plan(facts, seen, sample.steps, confidence=asked, etchant=etchant)


def _print_link(sample: Sample) -> None:
    from builder.views.planner_link import planner_link

    click.echo(f"planner/index.html{planner_link(sample)}")
