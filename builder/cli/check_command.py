"""`etchwright check`: every record read and checked, every problem at once."""

from __future__ import annotations

import datetime
from collections import Counter
from collections.abc import Sequence
from pathlib import Path

import click

from builder.checking.lab_check import check_lab
from builder.cli.options import as_of_option, given_day, lab_option
from builder.findings.spread_fit import spread_notices
from builder.problems import (
    Problem,
    Severity,
    format_github,
    format_json,
    format_text,
    has_errors,
    sorted_problems,
)


@click.command()
@lab_option
@as_of_option
@click.option(
    "--format", "form", type=click.Choice(["text", "json", "github"]), default="text", show_default=True,
    help="text for people, json for programs, github for remarks beside the lines of a review.",
)  # fmt: skip
def check(lab: Path, as_of: datetime.date | None, form: str) -> None:
    """
    Read and check all records of a lab.

    Prints one line a problem, as file:line:column: severity rule: message; way out. Ends with 0 if
    there is no error (notices do not count), else with 1.
    """
    records, problems = check_lab(lab, given_day(as_of))
    if records is not None:
        problems = sorted_problems([*problems, *spread_notices(records)])
    if form == "json":
        click.echo(format_json(problems))
    else:
        for problem in problems:
            click.echo(format_text(problem) if form == "text" else format_github(problem))
    if form == "text":
        click.echo(_summary(problems, 0 if records is None else records.size))
    if has_errors(problems):
        raise click.exceptions.Exit(1)


def _summary(problems: Sequence[Problem], records: int) -> str:
    counts = Counter(problem.severity for problem in problems)
    errors, notices = counts[Severity.ERROR], counts[Severity.NOTICE]
    if errors:
        return f"{errors} {_plural('error', errors)}, {notices} {_plural('notice', notices)}"
    return f"{records} records, no errors, {notices} {_plural('notice', notices)}"


def _plural(word: str, count: int) -> str:
    return word if count == 1 else f"{word}s"
