"""`etchwright remove FILM --keep …`: which etches take one film and leave the others."""

from __future__ import annotations

import datetime
import json
from collections.abc import Sequence
from pathlib import Path

import click

from builder.checking.sample_check import check_sample_data
from builder.cli.lab_facts import lab_facts
from builder.cli.options import as_of_option, given_day, lab_option, print_problems, stop_on_errors
from builder.cli.plan_command import NONE_HOLDS, Confidence, Temperature
from builder.cli.plan_text import plan_lines
from builder.findings.plan.facts import Span
from builder.findings.plan.planning import plan as make_plan
from builder.findings.plan.sample import plan_sample
from builder.findings.plan.store import names_of
from builder.reading.raw import JsonValue, Positions, Raw
from builder.views.plan_json import plan_data

_TARGET = "100 nm"
_KEPT = "1 um"
"""Thicknesses where none is given."""
NO_LINE = (0, 0)
"""Place of a fault in the words of a command, which has no lines."""


@click.command()
@click.argument("film", metavar="FILM[:THICKNESS]")
@click.option(
    "--keep",
    "keep",
    metavar="FILM[:THICKNESS],…",
    multiple=True,
    help="Films that must stay, apart by commas; the option may be repeated.",
)
@lab_option
@as_of_option
@click.option("--confidence", type=Confidence(), help="Confidence of every interval; else that of the lab.")
@click.option("--temperature", type=Temperature(), help='Temperature of the etch, as "80 degC" or room.')
@click.option("--json", "as_json", is_flag=True, help="Print the plan as JSON (schemas/plan.json).")
@click.option("--all", "every", is_flag=True, help="Show every option in full and all that is left out.")
def remove(
    film: str,
    keep: Sequence[str],
    lab: Path,
    as_of: datetime.date | None,
    confidence: float | None,
    temperature: Span | None,
    as_json: bool,
    every: bool,
) -> None:
    """
    Find the etches that remove one film and keep others; no mask, no edge, only these films.

    A film is an id, with its thickness after a colon where it matters: sio2-thermal-wet:500nm. Without
    one, 100 nm are removed and 1 µm of each kept film is open to the etch. Ends as plan does.
    """
    facts = lab_facts(lab, given_day(as_of), confidence, reference_only=False)
    sample, problems = check_sample_data(_sample(film, keep), names_of(facts))
    print_problems(problems)
    stop_on_errors(problems, "nothing looked up")
    assert sample is not None
    made = make_plan(
        facts,
        plan_sample(sample, facts.defaults, temperature),
        confidence=facts.defaults.confidence if confidence is None else confidence,
    )
    if as_json:
        click.echo(json.dumps(plan_data(made), indent=2, ensure_ascii=False))
    else:
        for line in plan_lines(made, facts, every=every):
            click.echo(line)
    if not made.holds:
        raise click.exceptions.Exit(NONE_HOLDS)


def _sample(film: str, keep: Sequence[str]) -> Raw:
    """The question as a sample: the film alone, the kept ones open beside it, nothing else wet."""
    kept = [name for part in keep for name in part.split(",") if name.strip()]
    target: JsonValue = {**_film(film, _TARGET), "role": "target"}
    exposed: list[JsonValue] = [{**_film(name, _KEPT), "exposed": "face"} for name in kept]
    title = f"remove {film}" + (f", keep {', '.join(kept)}" if kept else "")
    data: JsonValue = {
        "sample": title,
        "layers": [target],
        "also_exposed": exposed,
        "back": "protected",
        "edge": "protected",
    }
    return Raw(data, Positions({"": NO_LINE}), "remove")


def _film(text: str, thickness: str) -> dict[str, JsonValue]:
    name, _, given = text.strip().partition(":")
    return {"film": name.strip(), "thickness": given.strip() or thickness}
