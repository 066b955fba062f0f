"""Rules for runs: films and times that can be, dates that have come; age is a notice."""

from __future__ import annotations

from collections.abc import Iterator

from builder.checking.rule import Checked, Fault, Rule
from builder.engine.plan_rules import CLEAR_GAIN
from builder.problems import Severity
from builder.records.runs import Run
from builder.records.terms import Status

_ABSOLUTE_ZERO_DEGC = -273.15


def _runs(checked: Checked) -> Iterator[Run]:
    for runs in checked.records.runs.values():
        yield from runs


def _families(checked: Checked) -> Iterator[Fault]:
    films = checked.records.films
    for run in _runs(checked):
        if run.film in films and films[run.film].is_family:
            words = f'"{run.film}" stands for several films; a run has one'
            yield Fault(run.file, f"{run.pointer}/film", words, "name the film as deposited")


def _inductions(checked: Checked) -> Iterator[Fault]:
    for run in _runs(checked):
        etch = checked.records.etches.get(run.etch)
        induction = None if etch is None else etch.induction
        pointer = f"{run.pointer}/time_s"
        if run.time_s == 0:
            words = "a run of 0 s gives no rate"
            yield Fault(run.file, pointer, words, "the thickness before is in before_nm already")
        elif induction is not None and run.time_s <= induction.number:
            words = f"{run.time_s:g} s is not longer than the induction time of the recipe, {induction.text}"
            yield Fault(run.file, pointer, words)


def _temperatures(checked: Checked) -> Iterator[Fault]:
    for run in _runs(checked):
        if run.temperature_degc is not None and run.temperature_degc <= _ABSOLUTE_ZERO_DEGC:
            words = f"{run.temperature_degc:g} degC is below absolute zero"
            yield Fault(run.file, f"{run.pointer}/temperature_degc", words)


def _site_spreads(checked: Checked) -> Iterator[Fault]:
    for run in _runs(checked):
        if run.site_spread is not None and run.site_spread >= 1:
            words = f"a half-range of {run.site_spread:g} of the mean means that some of the wafer grew"
            yield Fault(run.file, f"{run.pointer}/site_spread", words, "write 3 % as 0.03")


def _repeats(checked: Checked) -> Iterator[Fault]:
    seen: set[tuple[str, str, str, str, float]] = set()
    for run in _runs(checked):
        key = (run.file, run.date.isoformat(), run.wafer, run.film, run.time_s)
        if key in seen:
            words = f'the wafer "{run.wafer}" is listed twice with this date, film and time'
            yield Fault(run.file, run.pointer, words, "a run that counts twice narrows the interval")
        seen.add(key)


def _gains(checked: Checked) -> Iterator[Fault]:
    for run in _runs(checked):
        gain = run.after_nm - run.before_nm
        if gain > CLEAR_GAIN * 2**0.5 * run.u_nm:
            words = f"the film is {gain:g} nm thicker after the etch"
            hint = "are before and after exchanged? The run does not count"
            yield Fault(run.file, f"{run.pointer}/after_nm", words, hint)


def _future(checked: Checked) -> Iterator[Fault]:
    for run in _runs(checked):
        if run.date > checked.today:
            words = f"{run.date} is after today, {checked.today}"
            yield Fault(run.file, f"{run.pointer}/date", words)


def _future_fit(checked: Checked) -> Iterator[Fault]:
    spread = checked.records.spread
    if spread is not None and spread.as_of > checked.today:
        yield Fault(spread.file, "/as_of", f"{spread.as_of} is after today, {checked.today}")


def _stale(checked: Checked) -> Iterator[Fault]:
    limit = checked.records.settings.stale_after_days
    for name, runs in checked.records.runs.items():
        etch = checked.records.etches.get(name)
        if etch is None or etch.status is not Status.PROVEN or not runs:
            continue
        newest = max(runs, key=lambda run: run.date)
        age = (checked.today - newest.date).days
        if age > limit:
            words = f"the newest run of a proven recipe is {age} days old, more than {limit:g}"
            yield Fault(newest.file, f"{newest.pointer}/date", words, "run a monitor wafer")


RULES: tuple[Rule, ...] = (
    Rule("family-for-film", _families),
    Rule("time-within-induction", _inductions),
    Rule("below-absolute-zero", _temperatures),
    Rule("site-spread-too-large", _site_spreads),
    Rule("repeated-run", _repeats),
    Rule("thicker-after", _gains, Severity.NOTICE),
    Rule("future-date", _future, Severity.NOTICE),
    Rule("future-date", _future_fit, Severity.NOTICE),
    Rule("stale-runs", _stale, Severity.NOTICE),
)
