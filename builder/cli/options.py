"""Options that several commands share, and how problems are printed."""

from __future__ import annotations

import datetime
import os
import sys
from collections.abc import Callable, Iterable
from pathlib import Path
from typing import TypeVar

import click

from builder.problems import Problem, Severity, format_text, has_errors

F = TypeVar("F", bound=Callable[..., object])

_DAY_SECONDS = "SOURCE_DATE_EPOCH"


class Day(click.ParamType[datetime.date]):
    """A day as 2026-11-15."""

    name = "DAY"

    def convert(
        self, value: object, param: click.Parameter | None, ctx: click.Context | None
    ) -> datetime.date:
        """Return the day a text states."""
        try:
            return datetime.date.fromisoformat(str(value))
        except ValueError:
            self.fail(f'"{value}" is no day; write it as 2026-11-15', param, ctx)


def lab_option(function: F) -> F:
    """Add --lab DIR."""
    return click.option(
        "--lab", type=click.Path(path_type=Path), default=Path(), metavar="DIR",
        help="Folder of the lab; this folder by default.",
    )(function)  # fmt: skip


def as_of_option(function: F) -> F:
    """Add --as-of DAY."""
    return click.option(
        "--as-of", type=Day(), default=None, metavar="DAY",
        help="The day that counts as today; else SOURCE_DATE_EPOCH, else as_of in lab.yaml, else the clock.",
    )(function)  # fmt: skip


def given_day(as_of: datetime.date | None) -> datetime.date | None:
    """
    Return the day that was asked for on the command line or in the environment, or None.

    Raises
    ------
    click.UsageError
        SOURCE_DATE_EPOCH is no count of seconds.
    """
    if as_of is not None or _DAY_SECONDS not in os.environ:
        return as_of
    try:
        return datetime.datetime.fromtimestamp(int(os.environ[_DAY_SECONDS]), datetime.UTC).date()
    except (ValueError, OverflowError, OSError):
        raise click.UsageError(f"{_DAY_SECONDS} must be a count of seconds since 1970") from None


def print_problems(problems: Iterable[Problem], *, notices: bool = True) -> None:
    """Print problems to the error stream, one line each; without `notices` only errors."""
    for problem in problems:
        if notices or problem.severity is Severity.ERROR:
            click.echo(format_text(problem), err=True)


def stop_on_errors(problems: Iterable[Problem], what: str) -> None:
    """End with exit 1 if a problem is an error, after a last line that says what was not done."""
    listed = list(problems)
    if has_errors(listed):
        count = sum(problem.severity is Severity.ERROR for problem in listed)
        click.echo(f"{count} {'error' if count == 1 else 'errors'}; {what}", err=True)
        raise click.exceptions.Exit(1)


def progress(text: str) -> None:
    """Tell a person at a terminal what is going on; a log or a pipe needs no such lines."""
    if sys.stderr.isatty():
        click.echo(f"  {text} …", err=True)
