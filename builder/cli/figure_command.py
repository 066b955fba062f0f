"""`etchwright figure RECIPE --out FILE`: a recipe's rates and next run, for a talk or a report."""

from __future__ import annotations

import datetime
from pathlib import Path

import click

from builder.checking.lab_check import check_lab
from builder.cli.options import as_of_option, given_day, lab_option, print_problems, stop_on_errors
from builder.findings.own_rates import own_rate
from builder.problems import suggestion
from builder.records.lab import LabRecords


@click.command()
@click.argument("recipe")
@click.option(
    "--out", "out", type=click.Path(path_type=Path), required=True, metavar="FILE",
    help="Where to write it; the end of the name says the format: .svg, .png or .pdf.",
)  # fmt: skip
@click.option("--film", default=None, help="The film whose rate is shown; else the recipe's first target.")
@lab_option
@as_of_option
def figure(recipe: str, out: Path, film: str | None, lab: Path, as_of: datetime.date | None) -> None:
    """
    Draw a recipe's rates over time with the next run's interval, and its depths over time.

    The same records give the same bytes.
    """
    from builder.pages.figure_files import FigureFormatError, write_figure
    from builder.views.recipe_figure import recipe_figure

    records, problems = check_lab(lab, given_day(as_of))
    print_problems(problems, notices=False)
    stop_on_errors(problems, "no figure drawn")
    assert records is not None
    shown = _film_of(records, recipe, film)
    own = own_rate(records, records.etches[recipe], shown)
    if own is None or own.next_run is None:
        raise click.UsageError(f"{recipe} has no run of {shown} that says anything")
    day = given_day(as_of) or records.settings.as_of or datetime.date.today()
    try:
        write_figure(recipe_figure(records, own, day), out)
    except (FigureFormatError, OSError) as error:
        raise click.UsageError(str(error)) from None
    click.echo(f"Drew {out}.")


def _film_of(records: LabRecords, recipe: str, film: str | None) -> str:
    if recipe not in records.etches:
        hint = suggestion(recipe, records.etches)
        raise click.UsageError(f'There is no recipe "{recipe}"; {hint or "see etchwright site"}')
    shown = film or records.etches[recipe].targets[0]
    if shown not in records.films:
        hint = records.film_names.suggestion(shown)
        raise click.UsageError(f'There is no film "{shown}"; {hint or "see the list on the site"}')
    return shown
