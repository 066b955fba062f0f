"""How thick a mask must be for a recipe's usual depth, its reserve included."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from builder.engine import RateBand, least_mask, loss, mask_loss_by_selectivity, open_by_timer
from builder.findings.computed import Computed
from builder.findings.recipe_times import TargetTiming
from builder.findings.selectivities import recipe_selectivity
from builder.records.lab import LabRecords
from builder.records.terms import FilmFamily, Method
from builder.views.number_text import NO_BREAK, UNKNOWN, as_written, length_text, ratio_text
from builder.views.plan_words import RANK_WORDS
from builder.views.references import FilmRef, film_ref

_ORGANIC = (FilmFamily.RESIST, FilmFamily.POLYMER)


@dataclass(frozen=True)
class MaskAnswer:
    """
    How much of one mask the usual depth needs at least, reserve included; "unknown" where nobody measured.

    `needed` is for an etch that is stopped on clearing where wafers carried both films, else for the
    latest stop; `to_latest` is for the latest stop where that is another number. `held` is how long it
    was seen to stay on.
    """

    mask: FilmRef
    needed: str
    basis: str
    to_latest: str
    held: str
    rank: str


def mask_answers(
    records: LabRecords, computed: Computed, etch_id: str, timing: TargetTiming
) -> Iterable[MaskAnswer]:
    """Return how thick each mask on record must be for the usual depth."""
    for mask in dict.fromkeys(mask.film for mask in records.etches[etch_id].masks):
        yield _mask(records, computed, etch_id, timing, mask)


def _mask(
    records: LabRecords, computed: Computed, etch_id: str, timing: TargetTiming, mask: str
) -> MaskAnswer:
    known = computed.known(etch_id, mask)
    by_timer = _loss_to_latest(known.band, timing)
    found = recipe_selectivity(computed, etch_id, timing.film, mask)
    latest = _needed(records, computed, etch_id, mask, by_timer)
    ref, held = film_ref(records, mask), _held(records, etch_id, mask)
    if found is None or not found.pairs or found.lo is None:
        basis = "left in until the latest stop" if by_timer is not None else "its loss is not on record"
        return MaskAnswer(ref, latest, basis, "", held, RANK_WORDS[known.rank])
    lost = mask_loss_by_selectivity(timing.cut(timing.usual_nm), found.lo)
    ratio = ratio_text(found.lo, found.mid, found.hi)
    needed = _needed(records, computed, etch_id, mask, lost)
    return MaskAnswer(
        mask=ref,
        needed=needed,
        basis=f"stopped on clearing; selectivity {ratio.full}, from {_pairs(found.pairs)}",
        to_latest="" if latest == needed else latest,
        held=held,
        rank=RANK_WORDS[found.rank],
    )


def _held(records: LabRecords, etch_id: str, mask: str) -> str:
    times = [one.longest_time_held for one in records.etches[etch_id].masks if one.film == mask]
    longest = max(times, key=lambda time: time.number)
    return as_written(longest.text)


def _pairs(count: int) -> str:
    return f"{count}{NO_BREAK}wafer{'s that carried both' if count != 1 else ' that carried both'}"


def _loss_to_latest(band: RateBand | None, timing: TargetTiming) -> float | None:
    plan = timing.times(timing.usual_nm)
    return loss(band, open_by_timer(plan), timing.phi).high


def _needed(records: LabRecords, computed: Computed, etch_id: str, mask: str, lost: float | None) -> str:
    if lost is None:
        return UNKNOWN
    in_plasma = records.etches[etch_id].method in (Method.PLASMA, Method.CYCLIC)
    organic = records.films[mask].family in _ORGANIC
    needed = least_mask(lost, computed.facts.defaults.allowance, resist_in_plasma=organic and in_plasma)
    return length_text(None, None, needed).with_unit.removeprefix("at most ")


def no_mask_words(records: LabRecords, etch_id: str) -> str:
    """Return what stands where no mask is on record."""
    if records.etches[etch_id].method is Method.LIFT_OFF:
        return "Lift-off needs none: what lies on the resist goes with it."
    return "No mask is on record: whether one stays on is not known here."
