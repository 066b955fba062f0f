"""`etchwright site` builds the pages; `etchwright preview` shows them while records are edited."""

from __future__ import annotations

import datetime
import time
from pathlib import Path

import click

from builder.cli.options import (
    as_of_option,
    given_day,
    lab_option,
    print_problems,
    progress,
    stop_on_errors,
)
from builder.pages.shipped_files import MKDOCS_FILE


@click.command()
@lab_option
@as_of_option
@click.option(
    "--out", type=click.Path(path_type=Path), default=None, metavar="DIR",
    help="Folder of the site; site/ within the lab by default.",
)  # fmt: skip
def site(lab: Path, as_of: datetime.date | None, out: Path | None) -> None:
    """
    Build the site of a lab.

    Everything is read, checked and computed first; the old site is replaced only by a whole new one.
    """
    from builder.mkdocs_plugin import build_site

    _require_host_settings(lab)
    started = time.monotonic()
    folder = lab / "site" if out is None else out
    problems = build_site(lab, folder, given_day(as_of), progress)
    print_problems(problems)
    stop_on_errors(problems, f"{folder} is as it was")
    click.echo(f"Built {folder}/index.html in {time.monotonic() - started:.1f} s; open it in a browser.")


@click.command()
@lab_option
@click.option("--address", default="127.0.0.1:8000", show_default=True, metavar="HOST:PORT")
def preview(lab: Path, address: str) -> None:
    """Show the site at an address of this machine and build it anew when a record changes."""
    from builder.mkdocs_plugin import serve

    _require_host_settings(lab)
    click.echo(f"Open http://{address}/ ; stop with Ctrl-C.", err=True)
    serve(lab, address)


def _require_host_settings(lab: Path) -> None:
    if not (lab / MKDOCS_FILE).is_file():
        raise click.UsageError(
            f"there is no {MKDOCS_FILE} in {lab.resolve()}; name the lab's folder with --lab, or start one "
            "with etchwright new FOLDER"
        )
