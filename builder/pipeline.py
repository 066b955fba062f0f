"""The five steps in order: read, check, compute, view, write. A table of contents, no logic of its own."""

from __future__ import annotations

import datetime
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from pathlib import Path

from builder.checking.lab_check import check_lab
from builder.findings.spread_fit import spread_notices
from builder.pages.exchange import ExchangeError, exchanged_folder
from builder.pages.links import check_links
from builder.pages.page import FinishedSite
from builder.pages.whole_site import finished_site
from builder.problems import Problem, Severity, has_errors

Progress = Callable[[str], None]
Host = Callable[[FinishedSite, Path, Path], None]
"""Writes a finished site of the lab in the first folder into the second, empty, folder."""


@dataclass(frozen=True)
class Prepared:
    """All that will be written, or None if a problem is an error."""

    site: FinishedSite | None
    problems: tuple[Problem, ...]


def prepare(lab_dir: Path, as_of: datetime.date | None, progress: Progress) -> Prepared:
    """Read, check, compute and view a lab; nothing is written. `as_of` None means the lab's own day."""
    progress("reading and checking records")
    records, problems = check_lab(lab_dir, as_of)
    if records is None or has_errors(problems):
        return Prepared(None, tuple(problems))
    progress("computing")
    problems = [*problems, *spread_notices(records)]
    day = as_of or records.settings.as_of or datetime.date.today()
    site = finished_site(records, day)
    return Prepared(site, tuple(problems))


def build_site(
    lab_dir: Path, out_dir: Path, as_of: datetime.date | None, progress: Progress, host: Host
) -> list[Problem]:
    """
    Build a lab's site into `out_dir`, all or nothing; return every problem met.

    If one of them is an error, `out_dir` is as it was before.
    """
    prepared = prepare(lab_dir, as_of, progress)
    if prepared.site is None:
        return list(prepared.problems)
    try:
        return [*prepared.problems, *_write(prepared.site, lab_dir, out_dir, progress, host)]
    except ExchangeError as error:
        return [
            *prepared.problems,
            Problem(out_dir.name, 0, 0, "", Severity.ERROR, error.rule, str(error), error.hint),
        ]


def _write(site: FinishedSite, lab_dir: Path, out_dir: Path, progress: Progress, host: Host) -> list[Problem]:
    with exchanged_folder(out_dir) as folder:
        progress(f"writing {len(site.pages)} pages")
        host(site, lab_dir, folder.path)
        progress("checking links")
        problems = check_links(folder.path)
        if has_errors(problems):
            folder.keep_old()
        return problems


def day_from_environment(environment: Mapping[str, str]) -> datetime.date | None:
    """Return the day of SOURCE_DATE_EPOCH (seconds since 1970, UTC), or None if it is not set."""
    seconds = environment.get("SOURCE_DATE_EPOCH")
    return None if seconds is None else datetime.datetime.fromtimestamp(int(seconds), datetime.UTC).date()
