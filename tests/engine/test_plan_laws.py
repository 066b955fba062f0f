"""
The laws of a plan that no change of input may break (docs/methods/verdicts.md, "What can never happen").

A longer time, a smaller allowed loss or a thinner kept film never improve a word. A wider interval never
creates "holds". Without a number of rank own or literature nothing "holds". Units and order never matter.
"""

from __future__ import annotations

import itertools
from dataclasses import replace

import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from builder.engine import (
    UNKNOWN_SCHEDULE,
    UNKNOWN_SPAN,
    Allowance,
    Cut,
    Exposure,
    Grounds,
    Rank,
    RateBand,
    Span,
    Verdict,
    Word,
    allowed_mask,
    allowed_other,
    allowed_under,
    below,
    capped,
    film_word,
    loss,
    open_by_look,
    open_by_timer,
    schedule,
    under_by_look,
    under_by_timer,
    undercut,
    worst,
)

SETTINGS = settings(max_examples=150, deadline=None, derandomize=True)
RULES = Allowance(0.05, 10, 0.02, 5, 1, 0.20, 200, 0.10, 20, 20)
RATES = st.floats(1e-4, 100)
STRETCH = st.floats(1, 20)
BANDS = st.builds(lambda r, a, b: RateBand(r / a, r, r * b), RATES, STRETCH, STRETCH)
OPEN_BANDS = (
    BANDS | BANDS.map(lambda b: replace(b, high=None)) | BANDS.map(lambda b: RateBand(0.0, None, b.high))
)
CUTS = st.builds(
    lambda h, d, p, offset, over, react: Cut(h, h, d, p, offset, over, react, through=True),
    st.floats(1, 1e5),
    st.floats(0, 0.2),
    st.floats(0, 0.3),
    st.floats(0, 60),
    st.floats(0, 1),
    st.floats(0, 60),
)
EXPOSURES = st.builds(
    lambda low, a, b: Exposure(low, low + a, low + a + b),
    st.floats(0, 1e4),
    st.floats(0, 1e4),
    st.floats(0, 1e4),
)
GROUNDS = st.builds(
    Grounds,
    st.sampled_from(Rank),
    st.sampled_from(Rank),
    st.booleans(),
    st.booleans(),
    st.none() | st.floats(0, 1e4),
)
ALLOWED = st.none() | st.floats(0, 500)
THICKNESS = st.floats(0.5, 2000)


def word_of(
    band: RateBand | None,
    exposure: Exposure | None,
    grounds: Grounds,
    allowed: float | None,
    thickness: float,
) -> Word:
    """The word of a film from its rate and exposure."""
    return film_word(loss(band, exposure, 0.03), exposure, grounds, allowed, thickness)


@given(OPEN_BANDS | st.none(), EXPOSURES | st.none(), GROUNDS, ALLOWED, THICKNESS, st.booleans())
@SETTINGS
def test_nothing_unmeasured_is_called_safe(
    band: RateBand | None,
    exposure: Exposure | None,
    grounds: Grounds,
    allowed: float | None,
    thickness: float,
    any_loss: bool,
) -> None:
    """
    Every "holds" has a number of rank own or literature for film and target, a time, and a bounded loss.
    """
    word = film_word(loss(band, exposure, 0.03), exposure, grounds, allowed, thickness, any_loss=any_loss)
    if word.verdict is not Verdict.HOLDS:
        return
    assert {grounds.rank, grounds.target_rank} <= {Rank.OWN, Rank.LITERATURE}
    assert exposure is not None
    if not any_loss:
        assert band is not None
        assert band.high is not None
        assert allowed is not None
        assert band.high * 1.03 * exposure.high_s <= allowed
    if grounds.limit_time_s is not None:
        assert exposure.high_s <= grounds.limit_time_s


def test_without_own_or_literature_numbers_no_combination_holds() -> None:
    """Exhaustive over ranks, statements and allowances, for a film that loses next to nothing."""
    lost, exposure = Span(0.0, 0.0, 1e-9), Exposure(0, 0, 1)
    weak = [rank for rank in Rank if rank not in (Rank.OWN, Rank.LITERATURE)]
    for rank, other, attacked, adverse, any_loss in itertools.product(
        weak, Rank, (False, True), (False, True), (False, True)
    ):
        for film, target in ((rank, other), (other, rank)):
            grounds = Grounds(film, target, attacked=attacked, adverse=adverse, limit_time_s=None)
            for allowed in (None, 0.0, 1e9):
                word = film_word(lost, exposure, grounds, allowed, 1e9, any_loss=any_loss)
                assert word.verdict is not Verdict.HOLDS


@given(BANDS, CUTS)
@SETTINGS
def test_unknown_rates_give_unknown_times_and_losses(band: RateBand, cut: Cut) -> None:
    """No rate, or none that is bounded from below: no stop, no exposure, no loss; never 0."""
    for unknown in (None, RateBand(0.0, None, band.high), RateBand(0.0, None, None)):
        plan = schedule(unknown, cut)
        assert plan == UNKNOWN_SCHEDULE
        assert not plan.known
        for exposure in (open_by_timer(plan), open_by_look(plan, cut), under_by_timer(plan),
                         under_by_look(unknown, plan, cut)):  # fmt: skip
            assert exposure is None
            assert loss(band, exposure, 0.03) == UNKNOWN_SPAN
        assert undercut(Span(1, 1, 1), unknown, plan, cut) == UNKNOWN_SPAN
    assert loss(None, Exposure(1, 1, 1), 0.03) == UNKNOWN_SPAN
    only_lower = schedule(replace(band, high=None, mid=None), cut)
    assert only_lower.first_look_s is not None
    assert only_lower.first_look_s <= cut.offset_s
    assert only_lower.nominal_s is None


@given(OPEN_BANDS, EXPOSURES, st.floats(1, 10), st.floats(0, 1e4), GROUNDS, ALLOWED, THICKNESS)
@SETTINGS
def test_a_longer_time_never_improves_a_word(
    band: RateBand,
    exposure: Exposure,
    factor: float,
    more_s: float,
    grounds: Grounds,
    allowed: float | None,
    thickness: float,
) -> None:
    """Every end of the exposure longer, the rest as before."""
    assert exposure.mid_s is not None
    longer = Exposure(*(factor * s + more_s for s in (exposure.low_s, exposure.mid_s, exposure.high_s)))
    before, after = (word_of(band, e, grounds, allowed, thickness).verdict for e in (exposure, longer))
    assert after.order >= before.order


@given(OPEN_BANDS, EXPOSURES, GROUNDS, st.floats(0, 500), st.floats(0, 1), THICKNESS)
@SETTINGS
def test_a_smaller_allowed_loss_never_improves_a_word(
    band: RateBand, exposure: Exposure, grounds: Grounds, allowed: float, part: float, thickness: float
) -> None:
    """The allowed loss smaller, the rest as before."""
    before, after = (
        word_of(band, exposure, grounds, a, thickness).verdict for a in (allowed, part * allowed)
    )
    assert after.order >= before.order


@given(
    OPEN_BANDS,
    EXPOSURES,
    GROUNDS,
    THICKNESS,
    st.floats(0.01, 1),
    st.sampled_from(["under", "other", "mask", "resist"]),
)
@SETTINGS
def test_a_thinner_kept_film_never_improves_a_word(
    band: RateBand, exposure: Exposure, grounds: Grounds, thickness: float, part: float, role: str
) -> None:
    """With the lab's default allowance, across the thickness below which there is none."""

    def word(nm: float) -> Verdict:
        allowed, of_least = (_default(h, role) for h in (nm, RULES.none_below_nm))
        assert of_least is not None
        # As the plan calls it: a film too thin for a default is no better off than the thinnest that has one.
        return word_of(
            band, exposure, grounds, allowed, nm if allowed is not None else min(nm, of_least)
        ).verdict

    assert word(part * thickness).order >= word(thickness).order


def _default(thickness: float, role: str) -> float | None:
    if role in ("mask", "resist"):
        return allowed_mask(thickness, RULES, resist_in_plasma=role == "resist")
    return allowed_under(thickness, RULES) if role == "under" else allowed_other(thickness, RULES)


@given(BANDS, STRETCH, STRETCH, EXPOSURES, GROUNDS, ALLOWED, THICKNESS)
@SETTINGS
def test_a_wider_interval_of_the_film_never_creates_holds(
    band: RateBand,
    down: float,
    up: float,
    exposure: Exposure,
    grounds: Grounds,
    allowed: float | None,
    thickness: float,
) -> None:
    """Both ends of the film's rate farther out, or the high end lost."""
    assert band.high is not None
    for wider in (
        RateBand(band.low / down, band.mid, band.high * up),
        RateBand(0.0, None, band.high * up),
        RateBand(band.low / down, band.mid, None),
    ):
        if word_of(wider, exposure, grounds, allowed, thickness).verdict is Verdict.HOLDS:
            assert word_of(band, exposure, grounds, allowed, thickness).verdict is Verdict.HOLDS


@given(BANDS, STRETCH, STRETCH, CUTS)
@SETTINGS
def test_a_wider_interval_of_the_target_looks_earlier_and_stops_later(
    band: RateBand, down: float, up: float, cut: Cut
) -> None:
    """And so no film is exposed for less time at worst, by timer or by look."""
    assert band.high is not None
    wider = RateBand(band.low / down, band.mid, band.high * up)
    one, other = schedule(band, cut), schedule(wider, cut)
    assert _at_least(one.first_look_s, other.first_look_s)
    assert _at_least(other.latest_stop_s, one.latest_stop_s)
    for narrow_exposure, wide_exposure in (
        (open_by_timer(one), open_by_timer(other)),
        (open_by_look(one, cut), open_by_look(other, cut)),
        (under_by_timer(one), under_by_timer(other)),
        (under_by_look(band, one, cut), under_by_look(wider, other, cut)),
    ):
        assert narrow_exposure is not None
        assert wide_exposure is not None
        assert _at_least(wide_exposure.high_s, narrow_exposure.high_s)


@given(BANDS, CUTS, st.floats(0, 1), st.floats(0, 0.1), st.floats(1, 3))
@SETTINGS
def test_less_sure_or_thicker_cuts_expose_longer(
    band: RateBand, cut: Cut, overetch: float, uneven: float, factor: float
) -> None:
    """
    More overetch, more unevenness, a worse tolerance, or a thicker target: never a shorter worst
    exposure.
    """
    worse_cuts = [
        replace(cut, overetch=cut.overetch + overetch),
        replace(cut, nonuniformity=cut.nonuniformity + uneven),
        replace(cut, tolerance=cut.tolerance + uneven),
        replace(cut, depth_nm=cut.depth_nm * factor, thickness_nm=cut.thickness_nm * factor),
    ]
    for worse in worse_cuts:
        for exposed in (
            lambda c: open_by_timer(schedule(band, c)),
            lambda c: under_by_timer(schedule(band, c)),
            lambda c: under_by_look(band, schedule(band, c), c),
            lambda c: open_by_look(schedule(band, c), c),
        ):
            before, after = exposed(cut), exposed(worse)
            assert before is not None
            assert after is not None
            assert _at_least(after.high_s, before.high_s)


@given(BANDS, CUTS)
@SETTINGS
def test_times_and_exposures_stand_in_order(band: RateBand, cut: Cut) -> None:
    """Look before first clearing before last clearing before the stop; mild, likely and worst rise."""
    plan = schedule(band, cut)
    times = [plan.first_look_s, plan.clear_first_s, plan.clear_last_s, plan.latest_stop_s]
    assert all(_at_least(b, a) for a, b in itertools.pairwise(times))
    assert _at_least(plan.clear_last_s, plan.nominal_s)
    assert _at_least(plan.nominal_s, plan.clear_first_s)
    for exposure in (open_by_timer(plan), open_by_look(plan, cut), under_by_timer(plan),
                     under_by_look(band, plan, cut)):  # fmt: skip
        assert exposure is not None
        assert _at_least(exposure.high_s, exposure.mid_s)
        assert _at_least(exposure.mid_s, exposure.low_s)
        lost = loss(band, exposure, cut.nonuniformity)
        assert _at_least(lost.high, lost.mid)
        assert _at_least(lost.mid, lost.low)


@given(BANDS, EXPOSURES, st.floats(1, 1000), st.floats(0.1, 1), CUTS)
@SETTINGS
def test_a_thinner_or_porous_upper_film_bares_the_next_one_longer(
    band: RateBand, exposure: Exposure, thickness: float, part: float, cut: Cut
) -> None:
    """What lies below is never exposed for less time, nor longer than what lies above."""
    thick, thin, porous = (
        below(exposure, band, thickness, cut, porous=False),
        below(exposure, band, part * thickness, cut, porous=False),
        below(exposure, band, thickness, cut, porous=True),
    )
    assert thick.high_s <= thin.high_s <= porous.high_s == exposure.high_s
    assert thick.low_s <= thin.low_s <= exposure.low_s
    # Nothing known of the upper film: at worst the next one is bare at once, at best never; no likely value.
    assert below(exposure, None, thickness, cut, porous=False) == Exposure(0.0, None, exposure.high_s)


@given(st.lists(st.sampled_from(Verdict), max_size=6), st.sampled_from(Verdict))
@SETTINGS
def test_one_more_exposed_film_never_improves_a_plan(words: list[Verdict], further: Verdict) -> None:
    """And a caution never improves a word."""
    assert worst([*words, further]).order >= worst(words).order
    assert capped(further).order >= further.order
    assert worst(reversed(words)) is worst(words)


@given(THICKNESS, st.floats(0, 1))
@SETTINGS
def test_default_allowances_rise_with_the_thickness_and_stay_within_it(thickness: float, part: float) -> None:
    """A thinner film is never allowed more, and no film more than it has."""
    for role in ("under", "other", "mask", "resist"):
        thick, thin = _default(thickness, role), _default(part * thickness, role)
        if thin is not None:
            assert thick is not None
            assert 0 <= thin <= thick <= thickness


@given(BANDS, CUTS, BANDS, st.floats(0.01, 100), GROUNDS, st.floats(0.01, 500))
@SETTINGS
def test_units_never_matter(
    target: RateBand, cut: Cut, film: RateBand, length: float, grounds: Grounds, allowed: float
) -> None:
    """All lengths in another unit: the same times and the same word (away from an exact tie)."""
    exposure = under_by_timer(schedule(target, cut))
    other_cut = replace(cut, depth_nm=cut.depth_nm * length, thickness_nm=cut.thickness_nm * length)
    other = under_by_timer(schedule(_scaled(target, length), other_cut))
    assert exposure is not None
    assert other is not None
    assert other.high_s == pytest.approx(exposure.high_s, rel=1e-9, abs=1e-6)
    lost = loss(film, exposure, 0.03)
    assume(lost.high is not None and lost.low is not None)
    assert lost.high is not None
    assert lost.low is not None
    assume(abs(lost.high / allowed - 1) > 1e-6 and abs(lost.low / allowed - 1) > 1e-6)
    assert film_word(lost, exposure, grounds, allowed, 1e6) == film_word(
        loss(_scaled(film, length), exposure, 0.03), exposure, grounds, allowed * length, 1e6 * length
    )


def _scaled(band: RateBand, factor: float) -> RateBand:
    assert band.mid is not None
    assert band.high is not None
    return RateBand(band.low * factor, band.mid * factor, band.high * factor)


def _at_least(larger: float | None, smaller: float | None) -> bool:
    """Not smaller, but for rounding."""
    assert larger is not None
    assert smaller is not None
    return larger >= smaller - 1e-9 * max(1.0, abs(smaller))
