"""Rules for recipes: evidence for the targets, a status that is earned, masks that were seen to hold."""

from __future__ import annotations

from collections.abc import Iterator

from builder.checking.rule import Checked, Fault, Rule
from builder.problems import Severity, suggestion
from builder.records.etches import Etch, MaskRecord
from builder.records.terms import Effect, Method, RateKind, Status


def recipe_films(etch: Etch) -> Iterator[tuple[str, str]]:
    """Yield pointer and id of every film a recipe names: targets, masks, what the masks lie on."""
    for index, film in enumerate(etch.targets):
        yield f"/targets/{index}", film
    for place, mask in enumerate(etch.masks):
        yield f"/masks/{place}/film", mask.film
        for index, film in enumerate(mask.on):
            yield f"/masks/{place}/on/{index}", film


def _families(checked: Checked) -> Iterator[Fault]:
    films = checked.records.films
    for etch in checked.records.etches.values():
        for pointer, film in recipe_films(etch):
            if film in films and films[film].is_family:
                words = f'"{film}" stands for several films'
                yield Fault(etch.file, pointer, words, "name the film as deposited")


def _no_evidence(checked: Checked) -> Iterator[Fault]:
    for etch in checked.records.etches.values():
        if etch.status is Status.RETIRED or _may_hide_evidence(checked, etch):
            continue
        for index, film in enumerate(etch.targets):
            record = checked.records.films.get(film)
            if record is not None and not record.is_family and not _has_evidence(checked, etch, film):
                words = f'nothing is known of "{film}" in this etch: no run, no published rate, no statement'
                hint = f"add runs to recipes/runs/{etch.id}.csv, or take it from the targets"
                yield Fault(etch.file, f"/targets/{index}", words, hint)


def _may_hide_evidence(checked: Checked, etch: Etch) -> bool:
    """Tell whether a fault that is reported elsewhere may be why no evidence is seen."""
    if etch.etchant not in checked.records.etchants or _has_unknown_film(checked, etch):
        return True
    lists = (("runs", etch.id), ("rates", etch.etchant), ("compatibility", etch.etchant))
    return any(checked.is_broken(kind, name) for kind, name in lists)


def _has_unknown_film(checked: Checked, etch: Etch) -> bool:
    return any(run.film not in checked.records.films for run in checked.records.runs.get(etch.id, ()))


def _has_evidence(checked: Checked, etch: Etch, film: str) -> bool:
    records = checked.records
    return (
        any(run.film == film for run in records.runs.get(etch.id, ()))
        or any(
            rate.film == film and rate.kind is not RateKind.NONE_SEEN
            for rate in records.rates.get(etch.etchant, ())
        )
        or any(
            statement.film == film and statement.effect is not Effect.RESISTS
            for statement in records.statements.get(etch.etchant, ())
        )
    )


def _unproven(checked: Checked) -> Iterator[Fault]:
    for etch in checked.records.etches.values():
        runs = checked.records.runs.get(etch.id, ())
        is_known = not checked.is_broken("runs", etch.id) and not _has_unknown_film(checked, etch)
        if etch.status is Status.PROVEN and is_known and not any(run.film in etch.targets for run in runs):
            hint = f'add runs to recipes/runs/{etch.id}.csv, or set "status: draft"'
            yield Fault(etch.file, "/status", "proven, but no run of a target is on record", hint)


def _retired(checked: Checked) -> Iterator[Fault]:
    for etch in checked.records.etches.values():
        if etch.status is Status.RETIRED and etch.retired_reason is None:
            hint = 'say why in "retired_reason"'
            yield Fault(etch.file, "/status", "retired without a reason", hint)
        if etch.status is not Status.RETIRED and etch.retired_reason is not None:
            words = f"a reason for retirement, but the recipe is {etch.status}"
            yield Fault(etch.file, "/retired_reason", words, 'set "status: retired", or remove the reason')


def _undercuts(checked: Checked) -> Iterator[Fault]:
    for etch in checked.records.etches.values():
        ratio = etch.undercut_ratio
        if ratio is not None and not ratio.low <= ratio.mid <= ratio.high:
            words = f"low {ratio.low:g}, mid {ratio.mid:g}, high {ratio.high:g} are out of order"
            yield Fault(etch.file, "/undercut_ratio", words)


def _baths(checked: Checked) -> Iterator[Fault]:
    for etch in checked.records.etches.values():
        if etch.bath is not None and etch.method not in (Method.WET, Method.LIFT_OFF):
            yield Fault(etch.file, "/bath", f"a {etch.method} recipe has no bath")


def _wafers(checked: Checked) -> Iterator[Fault]:
    for etch in checked.records.etches.values():
        if checked.is_broken("runs", etch.id):
            continue
        wafers = {run.wafer for run in checked.records.runs.get(etch.id, ())}
        for place, mask in enumerate(etch.masks):
            for index, wafer in enumerate(mask.runs):
                if wafer not in wafers:
                    words = f'no run of this recipe has the wafer "{wafer}"'
                    yield Fault(etch.file, f"/masks/{place}/runs/{index}", words, suggestion(wafer, wafers))


def _held_too_long(checked: Checked) -> Iterator[Fault]:
    """A mask holds no longer than somebody looked."""
    for etch in checked.records.etches.values():
        for place, mask in enumerate(etch.masks):
            seen_s = _longest_seen_s(checked, etch, mask)
            if seen_s is not None and mask.longest_time_held.number > seen_s:
                words = f'"{mask.longest_time_held.text}", but its longest run took {seen_s:g} s'
                yield Fault(etch.file, f"/masks/{place}/longest_time_held", words)


def _longest_seen_s(checked: Checked, etch: Etch, mask: MaskRecord) -> float | None:
    times = [run.time_s for run in checked.records.runs.get(etch.id, ()) if run.wafer in mask.runs]
    return max(times, default=None)


RULES: tuple[Rule, ...] = (
    Rule("family-for-film", _families),
    Rule("target-without-evidence", _no_evidence),
    Rule("proven-without-runs", _unproven),
    Rule("retired-without-reason", _retired),
    Rule("undercut-out-of-order", _undercuts),
    Rule("bath-without-liquid", _baths),
    Rule("unknown-wafer", _wafers),
    Rule("held-longer-than-run", _held_too_long, Severity.NOTICE),
)
