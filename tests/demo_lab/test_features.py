"""The demonstration lab shows every feature and every fault that the pages must be able to show."""

from __future__ import annotations

import datetime
import math
from collections import Counter
from collections.abc import Sequence

from builder.engine import NextRunKind, intervals_conflict
from builder.findings.own_rates import LeftOut, OwnRate, own_rate
from builder.problems import Problem, Severity
from builder.records.lab import LabRecords
from builder.records.terms import Method, Origin, Status

LITERATURE_STD = 0.25
"""Standard deviation of ln(rate) of a published rate of thermal oxide in a bath, as in the lab's settings."""


def _own(records: LabRecords, etch: str, film: str) -> OwnRate:
    own = own_rate(records, records.etches[etch], film)
    assert own is not None
    return own


def _kind(records: LabRecords, etch: str, film: str) -> NextRunKind:
    next_run = _own(records, etch, film).next_run
    assert next_run is not None
    return next_run.kind


def test_at_least_thirty_recipes_over_all_methods(records: LabRecords) -> None:
    """Wet, vapour, plasma, cyclic and lift-off."""
    methods = Counter(etch.method for etch in records.etches.values())
    assert len(records.etches) >= 30
    assert set(methods) == set(Method)


def test_at_least_twenty_five_films_are_etched(records: LabRecords) -> None:
    """Counted over the runs: films of the lab and of the reference."""
    assert len({run.film for runs in records.runs.values() for run in runs}) >= 25


def test_at_least_eight_tools(records: LabRecords) -> None:
    """Each of them is used by a recipe."""
    used = {etch.tool for etch in records.etches.values()}
    assert len(records.tools) >= 8
    assert used == set(records.tools)


def test_at_least_150_runs(records: LabRecords) -> None:
    """Wafers, not rows."""
    wafers = {(etch, run.date, run.wafer) for etch, runs in records.runs.items() for run in runs}
    assert len(wafers) >= 150


def test_at_least_ten_samples_of_the_lab(records: LabRecords) -> None:
    """The samples stand in recipes/samples."""
    own = [sample for sample in records.samples.values() if sample.origin is Origin.LAB]
    assert len(own) >= 10


def test_every_recipe_has_runs_and_every_run_file_a_recipe(records: LabRecords) -> None:
    """Nothing hangs in the air."""
    assert set(records.runs) == set(records.etches)


def test_no_errors_and_only_the_notices_that_are_meant(
    checked: tuple[LabRecords | None, Sequence[Problem]],
) -> None:
    """Two proven recipes without a run for a year."""
    _, problems = checked
    assert [problem for problem in problems if problem.severity is Severity.ERROR] == []
    stale = {problem.file for problem in problems if problem.rule == "stale-runs"}
    assert stale == {"recipes/runs/nitride-low-stress-phosphoric.csv", "recipes/runs/polyimide-oxygen.csv"}


def test_drifting_recipes_and_no_others(records: LabRecords) -> None:
    """A chamber and a bath get slower; no other target has a trend."""
    drifting = set()
    for etch in records.etches.values():
        for film in etch.targets:
            own = own_rate(records, etch, film)
            if own is not None and own.trend is not None and own.trend.significant:
                drifting.add(etch.id)
    assert drifting == {"silicon-rie", "chromium-can"}


def test_the_drift_goes_down(records: LabRecords) -> None:
    """The bath tires."""
    trend = _own(records, "chromium-can", "cr").trend
    assert trend is not None
    assert trend.slope_hi < 0


def test_a_stale_recipe(records: LabRecords) -> None:
    """Older than the lab's limit on the lab's day."""
    last = _own(records, "nitride-low-stress-phosphoric", "sin-low-stress").last_date
    assert last is not None
    assert records.settings.as_of is not None
    assert records.settings.as_of - last > datetime.timedelta(days=records.settings.stale_after_days)


def test_a_retired_recipe_says_why(records: LabRecords) -> None:
    """Its runs stay."""
    retired = [etch for etch in records.etches.values() if etch.status is Status.RETIRED]
    assert [etch.id for etch in retired] == ["aluminium-open-beaker"]
    assert retired[0].retired_reason is not None


def test_drafts_on_a_single_run(records: LabRecords) -> None:
    """Three of them, each with one run of its target."""
    drafts = {etch.id: etch.targets[0] for etch in records.etches.values() if etch.status is Status.DRAFT}
    assert set(drafts) == {"silicon-tmah", "oxide-hf-vapour-fast", "glass-rie"}
    assert {_kind(records, etch, film) for etch, film in drafts.items()} == {NextRunKind.SINGLE}


def test_two_runs_only(records: LabRecords) -> None:
    """The moderated interval must help."""
    assert len(_own(records, "silicon-koh-60", "si-100").used) == 2


def test_own_runs_contradict_the_published_rate(records: LabRecords) -> None:
    """Half the published rate, beyond both intervals."""
    next_run = _own(records, "oxide-bhf-slow", "sio2-thermal-wet").next_run
    assert next_run is not None
    etchant = records.etches["oxide-bhf-slow"].etchant
    rates = [rate.rate for rate in records.rates[etchant] if rate.film == "sio2-thermal-wet"]
    published = [math.log(rate.number) for rate in rates if rate is not None]
    assert published
    half = 1.645 * LITERATURE_STD
    own = (next_run.log_lo, next_run.log_hi)
    assert all(intervals_conflict(own, (value - half, value + half)) for value in published)


def test_recipes_agree_with_the_published_rate_elsewhere(records: LabRecords) -> None:
    """The conflict is one of a kind: buffered HF 5:1 lies where the paper has it."""
    next_run = _own(records, "oxide-bhf", "sio2-thermal-wet").next_run
    assert next_run is not None
    assert next_run.lo_nm_per_s * 60 < 100 < next_run.hi_nm_per_s * 60


def test_time_series_give_a_positive_induction(records: LabRecords) -> None:
    """The native oxide of aluminium, wet and dry, as the recipe states it."""
    for etch, film in (("aluminium-pan", "al-si"), ("aluminium-rie", "al-cu")):
        fitted, stated = _own(records, etch, film).induction_s, records.etches[etch].induction
        assert fitted is not None
        assert stated is not None
        assert abs(fitted - stated.number) < 2


def test_time_series_give_a_negative_induction(records: LabRecords) -> None:
    """Gold goes on etching on its way to the rinse."""
    fitted = _own(records, "gold-ki-i2", "au").induction_s
    transfer = records.etches["gold-ki-i2"].transfer_time
    assert fitted is not None
    assert transfer is not None
    assert abs(fitted + transfer.number) < 0.5


def test_no_loss_seen(records: LabRecords) -> None:
    """Every run of silicon in buffered HF, and of nitride in potassium hydroxide, is a limit."""
    assert _kind(records, "oxide-bhf", "si-100") is NextRunKind.LIMITS
    assert _kind(records, "silicon-koh", "sin-lpcvd") is NextRunKind.LIMITS


def test_mixed_rates_and_limits(records: LabRecords) -> None:
    """Undoped polysilicon in dilute HF, at the edge of what the gauge sees."""
    assert _kind(records, "oxide-hf-10-1", "poly-si-undoped") is NextRunKind.MIXED


def test_target_and_mask_on_the_same_wafer(records: LabRecords) -> None:
    """Pairs from which a selectivity comes."""
    runs = records.runs["oxide-rie"]
    wafers = {
        film: {run.wafer for run in runs if run.film == film}
        for film in ("sio2-thermal-wet", "resist-positive-a")
    }
    assert len(wafers["sio2-thermal-wet"] & wafers["resist-positive-a"]) >= 10


def test_every_kind_of_event_starts_a_series(records: LabRecords) -> None:
    """Clean, repair, new bath, new film lot."""
    events = {run.event for runs in records.runs.values() for run in runs if run.event}
    assert events == {"clean", "repair", "new bath", "new film lot"}


def test_a_new_film_lot_leaves_the_old_runs_out(records: LabRecords) -> None:
    """Lot P26-08 etches faster: the interval lies above the centre of the old lot."""
    own = _own(records, "oxide-pecvd-bhf", "sio2-pecvd-lab")
    assert {run.rows[0].film_lot for run in own.used} == {"P26-08"}
    assert own.next_run is not None
    assert own.next_run.lo_nm_per_s * 60 > 430


def test_chips_and_narrow_trenches_are_told_apart(records: LabRecords) -> None:
    """Another load and another window do not enter the interval of the wafers."""
    own = _own(records, "silicon-rie", "si-100")
    left_out = Counter(run.left_out for run in own.runs if run.left_out is not None)
    assert left_out[LeftOut.OTHER_LOAD] >= 2
    assert left_out[LeftOut.OTHER_WINDOW] >= 1


def test_two_gauges(records: LabRecords) -> None:
    """A coarse gauge every third session: runs weigh by their uncertainty."""
    runs = records.runs["oxide-bhf"]
    assert {run.u_nm for run in runs if run.film == "sio2-thermal-wet"} == {0.8, 2.5}


def test_sites_over_the_wafer(records: LabRecords) -> None:
    """The scatter of sites is non-uniformity, no runs of their own."""
    assert any(run.site_spread for runs in records.runs.values() for run in runs)


def test_every_group_has_a_stored_spread(records: LabRecords) -> None:
    """Fitted where there are four recipes or more, else the prior; it stands beside the recipes."""
    assert records.spread is not None
    methods = records.spread.methods
    assert methods.wet_thermostated is not None and not methods.wet_thermostated.from_prior
    assert methods.wet_open is not None and not methods.wet_open.from_prior
    assert methods.plasma is not None and not methods.plasma.from_prior
    assert methods.cyclic is not None and methods.cyclic.from_prior
    assert methods.vapour is not None and methods.vapour.from_prior


def test_the_stored_spread_is_near_the_truth(records: LabRecords) -> None:
    """The generator's spreads are 2.5 to 6 % in thermostated baths and 4 to 10 % in plasma."""
    assert records.spread is not None
    thermostated, plasma = records.spread.methods.wet_thermostated, records.spread.methods.plasma
    assert thermostated is not None and 0.025 < thermostated.s0 < 0.06
    assert plasma is not None and 0.04 < plasma.s0 < 0.10


def test_a_recipe_run_as_published(records: LabRecords) -> None:
    """Its published rates count, those of the other plasmas are hints."""
    same = [etch.id for etch in records.etches.values() if str(etch.published_conditions) == "same"]
    assert same == ["nitride-icp-published"]


def test_recipes_tell_a_newcomer_what_to_do(records: LabRecords) -> None:
    """Rinse, waste, a fault, what it must not be used for, and who answers: in every recipe."""
    for etch in records.etches.values():
        assert etch.faults, etch.id
        assert etch.do_not_use_for, etch.id
        assert etch.waste, etch.id
        assert etch.after_steps, etch.id
        assert etch.owner_role in {contact.role for contact in records.settings.contacts}, etch.id


def test_no_two_recipes_are_copies(records: LabRecords) -> None:
    """Each has its own name and its own steps for its own films."""
    etches = records.etches.values()
    assert len({etch.name for etch in etches}) == len(etches)
    assert len({repr((etch.tool, etch.targets, etch.settings)) for etch in etches}) == len(etches)


def test_chlorine_etched_aluminium_is_stripped_in_the_tool(records: LabRecords) -> None:
    """And rinsed within a minute."""
    steps = records.etches["aluminium-rie"].after_steps
    assert str(steps[0].kind) == "strip"
    assert steps[1].within is not None and steps[1].within.number <= 60


def test_own_runs_of_target_mask_and_film_below(records: LabRecords) -> None:
    """Recipes in which a plan can rightly hold: everything on the plain sample was run, the mask held."""
    wanted = {
        "oxide-bhf": ("sio2-thermal-wet", "resist-positive-a", "si-100"),
        "oxide-hf-10-1": ("sio2-thermal-wet", "resist-positive-a", "si-100"),
        "oxide-pecvd-bhf": ("sio2-pecvd-lab", "resist-positive-a", "si-100"),
        "aluminium-pan": ("al-si", "resist-positive-a", "sio2-thermal-wet"),
        "gold-ki-i2": ("au", "resist-positive-a", "ti"),
        "nitride-hot-phosphoric": ("sin-lpcvd", "sio2-thermal-wet", "sio2-thermal-wet"),
    }
    for etch, films in wanted.items():
        assert all(_own(records, etch, film).next_run is not None for film in films), etch
        assert any(mask.film == films[1] and films[0] in mask.on for mask in records.etches[etch].masks), etch
