"""What etches a film: the lab's recipes first, then published etchants; how fast, how sure, for how long."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from builder.engine import Cut, Rank, schedule
from builder.findings.computed import Computed
from builder.findings.plan.evidence import Evidence
from builder.findings.plan.option import phi_of
from builder.findings.recipe_times import UNKNOWN_DEPTH_NM, target_timing
from builder.records.lab import LabRecords
from builder.records.terms import Status
from builder.views.link import Link
from builder.views.number_text import NumberText, times_text
from builder.views.plan_words import RANK_WORDS
from builder.views.recipe_answers import band_text, depth_text
from builder.views.recipe_standing import is_stale, runs_text
from builder.views.references import etchant_link, recipe_link


@dataclass(frozen=True)
class EtchedBy:
    """
    One etch that removes a film; `times` are first look and latest stop for `depth`.

    `member` names the film of a family that it removes (else empty).
    """

    etch: Link
    member: str
    is_retired: bool
    is_recipe: bool
    rate: NumberText
    rank: str
    rests_on: str
    depth: str
    times: str
    remark: str


def etched_by(records: LabRecords, computed: Computed, film: str) -> tuple[EtchedBy, ...]:
    """Return what removes a film: recipes that have it as target, then etchants with a published rate."""
    return (*recipes_for(records, computed, film), *_etchants(records, computed, film))


def recipes_for(records: LabRecords, computed: Computed, film: str) -> Iterator[EtchedBy]:
    """Yield the recipes that remove a film, the proven ones first; for a family, those of its members."""
    if not records.films[film].is_family:
        yield from _recipes(records, computed, film, "")
        return
    for member in records.films[film].members:
        yield from _recipes(records, computed, member, records.films[member].name)


def _recipes(records: LabRecords, computed: Computed, film: str, member: str) -> Iterator[EtchedBy]:
    etches = [etch for etch in records.etches.values() if film in etch.targets]
    order = {Status.PROVEN: 0, Status.DRAFT: 1, Status.RETIRED: 2}
    for etch in sorted(etches, key=lambda one: (order[one.status], one.name.casefold())):
        timing = target_timing(computed, etch.id, film)
        own = computed.own[etch.id].get(film)
        plan = timing.times(timing.usual_nm)
        remarks = [str(etch.status)] if etch.status is not Status.PROVEN else []
        if is_stale(records, computed, own):
            remarks.append("not run for long")
        if timing.known.conflict:
            remarks.append("its runs contradict the literature")
        if own is not None and own.trend is not None and own.trend.significant:
            remarks.append("drifts")
        yield EtchedBy(
            etch=recipe_link(records, etch.id),
            member=member,
            is_retired=etch.status is Status.RETIRED,
            is_recipe=True,
            rate=band_text(timing.band),
            rank=RANK_WORDS[timing.known.rank],
            rests_on=runs_text(len(own.used)) if own is not None and timing.known.rank is Rank.OWN else "",
            depth=depth_text(timing.usual_nm),
            times=_times(plan.first_look_s, plan.latest_stop_s),
            remark=", ".join(remarks),
        )


def _etchants(records: LabRecords, computed: Computed, film: str) -> Iterator[EtchedBy]:
    """Etchants by published numbers, the better known first; one that was seen to do nothing is no etch."""
    found = [
        (known.rank.order, records.etchants[etchant].name.casefold(), etchant, known)
        for etchant, films in computed.by_etchant.items()
        if (known := films.get(film)) is not None and known.band is not None and known.band.low > 0
    ]
    for _, _, etchant, known in sorted(found, key=lambda one: one[:3]):
        yield EtchedBy(
            etch=etchant_link(records, etchant),
            member="",
            is_retired=False,
            is_recipe=False,
            rate=band_text(known.band),
            rank=RANK_WORDS[known.rank],
            rests_on="",
            depth=depth_text(UNKNOWN_DEPTH_NM),
            times=_published_times(computed, etchant, known),
            remark="over all temperatures on record" if known.all_temperatures else "",
        )


def _published_times(computed: Computed, etchant: str, known: Evidence) -> str:
    cut = Cut(
        depth_nm=UNKNOWN_DEPTH_NM, thickness_nm=UNKNOWN_DEPTH_NM,
        tolerance=computed.facts.defaults.tolerance,
        nonuniformity=phi_of(computed.reference, computed.etchant_alone(etchant)),
        offset_s=0.0, overetch=0.0, reaction_s=0.0, through=True,
    )  # fmt: skip
    plan = schedule(known.band, cut)
    return _times(plan.first_look_s, plan.latest_stop_s)


def _times(first_s: float | None, latest_s: float | None) -> str:
    if latest_s is None:
        return "unknown"
    return times_text((first_s, latest_s))
