"""The facts of a lab for a plan: from the store where nothing has changed, else from the records."""

from __future__ import annotations

import datetime
import gc
from pathlib import Path

from builder.cli.options import print_problems, stop_on_errors
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.store import key_of, load, save
from builder.reading.lab_tree import RECIPES


def lab_facts(
    lab: Path, as_of: datetime.date | None, confidence: float | None, *, reference_only: bool
) -> PlanFacts:
    """
    Return the facts of a lab; ends the program with exit 1 if its records have errors.

    `reference_only` leaves out every fact of the lab's own.
    """
    day = "" if as_of is None else as_of.isoformat()
    # Without a given day it may be the clock's, so the store is good for one day only.
    key = key_of(lab, day or f"clock {datetime.date.today()}", confidence, reference_only=reference_only)
    facts = load(lab, key)
    # The facts stay to the end: to look among them for rubbish again and again is time lost.
    gc.freeze()
    if facts is None:
        facts = _from_records(lab, as_of, confidence, reference_only=reference_only)
        save(lab, key, facts)
    return facts


def _from_records(
    lab: Path, as_of: datetime.date | None, confidence: float | None, *, reference_only: bool
) -> PlanFacts:
    from builder.checking.lab_check import check_lab
    from builder.findings.plan.gather import gather
    from builder.findings.plan.gather import reference_only as without_lab

    # Published facts alone can be asked for anywhere, also where no lab is.
    folder = None if reference_only and not (lab / RECIPES).is_dir() else lab
    records, problems = check_lab(folder, as_of)
    print_problems(problems, notices=False)
    stop_on_errors(problems, "no plan can be made of these records; mend them first")
    assert records is not None
    today = as_of or records.settings.as_of or datetime.date.today()
    levels = () if confidence is None else (confidence,)
    return gather(without_lab(records) if reference_only else records, today, levels)
