"""`etchwright spread`: the lab's run-to-run spread fitted anew and stored."""

from __future__ import annotations

import datetime
from pathlib import Path

import click

from builder.checking.lab_check import check_lab
from builder.cli.options import as_of_option, given_day, lab_option, print_problems, stop_on_errors
from builder.findings.spread_fit import GroupFit, fit_groups, spread_yaml
from builder.views.number_text import percent_text, plain_number


@click.command()
@lab_option
@as_of_option
@click.option("--dry-run", is_flag=True, help="Show the fit and store nothing.")
def spread(lab: Path, as_of: datetime.date | None, dry_run: bool) -> None:
    """
    Fit how much rates vary from run to run, by method, and store it in recipes/spread.yaml.

    Pages and plans use the stored fit until this command is run again, so that one new run does not
    change every page.
    """
    records, problems = check_lab(lab, given_day(as_of))
    print_problems(problems, notices=False)
    stop_on_errors(problems, "nothing fitted")
    assert records is not None
    fits = fit_groups(records)
    for fit in fits:
        click.echo(_line(fit))
    if dry_run:
        return
    day = given_day(as_of) or records.settings.as_of or datetime.date.today()
    path = lab / "recipes" / "spread.yaml"
    path.write_text(spread_yaml(fits, day, invented=records.settings.invented), encoding="utf-8")
    click.echo(f"Stored in {path}.")


def _line(fit: GroupFit) -> str:
    name = fit.group.replace("_", ", ")
    grounds = (
        f"the prior of lab.yaml ({fit.spread.recipes} recipes are too few to fit)"
        if fit.spread.from_prior
        else f"{fit.spread.recipes} recipes, {fit.runs} runs"
    )
    return (
        f"{name:18} {percent_text(fit.spread.s0)} from run to run, worth "
        f"{plain_number(fit.spread.d0)} degrees of freedom; {grounds}"
    )
