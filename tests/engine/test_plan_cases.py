"""The pure functions of a plan against cases worked on paper, and against the textbook forms they contain."""

from __future__ import annotations

import itertools
import math
from dataclasses import replace

import pytest

from builder.engine import (
    UNKNOWN_SCHEDULE,
    UNKNOWN_SPAN,
    Allowance,
    Cut,
    Exposure,
    Ground,
    Grounds,
    Mode,
    PublishedKind,
    PublishedValue,
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
    end_mode,
    envelope,
    film_word,
    loss,
    open_by_timer,
    schedule,
    under_by_look,
    under_by_timer,
    undercut,
    worst,
    worst_rank,
)

PER_MIN = 1 / 60
# The oxide of the worked cases: 500 nm +/- 2 %, 3 % uneven, 80 to 125 nm/min.
BAND = RateBand(80 * PER_MIN, 100 * PER_MIN, 125 * PER_MIN)
CUT = Cut(500, 500, 0.02, 0.03, 0, 0, 15, through=True)
RULES = Allowance(0.05, 10, 0.02, 5, 1, 0.20, 200, 0.10, 20, 20)
OWN = Grounds(Rank.OWN, Rank.OWN, attacked=False, adverse=False, limit_time_s=None)


def test_clearing_times_worked_on_paper() -> None:
    """
    490 / (125 x 1.03) = 3.80583 min; 510 / (80 x 0.97) = 6.57216 min; nominal 5 min; look at 0.8 of the
    first.
    """
    plan = schedule(BAND, CUT)
    assert plan.clear_first_s == pytest.approx(228.350, abs=1e-3)
    assert plan.clear_last_s == pytest.approx(394.330, abs=1e-3)
    assert plan.latest_stop_s == plan.clear_last_s
    assert plan.first_look_s == pytest.approx(182.680, abs=1e-3)
    assert plan.nominal_s == pytest.approx(300, rel=1e-12)


def test_offset_and_overetch_worked_on_paper() -> None:
    """12 s of induction shift every time; 10 % of overetch lengthens only the etching: 394.330 x 1.1 + 12."""
    plan = schedule(BAND, replace(CUT, offset_s=12, overetch=0.1))
    assert plan.clear_first_s == pytest.approx(240.350, abs=1e-3)
    assert plan.clear_last_s == pytest.approx(406.330, abs=1e-3)
    assert plan.latest_stop_s == pytest.approx(445.763, abs=1e-3)


def test_a_part_depth_worked_on_paper() -> None:
    """
    300 of 500 nm: the tolerance of the film does not matter; 300 / (80 x 0.97) = 3.86598 min; opening as
    above.
    """
    plan = schedule(BAND, replace(CUT, depth_nm=300, through=False))
    assert plan.latest_stop_s == pytest.approx(231.959, abs=1e-3)
    assert plan.open_first_s == pytest.approx(228.350, abs=1e-3)
    assert plan.open_last_s == pytest.approx(394.330, abs=1e-3)


def test_film_below_by_timer_worked_on_paper() -> None:
    """
    Silicon at 1, 2, 3 nm/min below the oxide.

    High: 3 x 1.03 x (394.330 - 228.350) / 60 = 8.548 nm; mid: 2 x (394.330 - 300) / 60 = 3.1443; low: 0.
    """
    lost = loss(RateBand(PER_MIN, 2 * PER_MIN, 3 * PER_MIN), under_by_timer(schedule(BAND, CUT)), 0.03)
    assert lost.high == pytest.approx(8.5480, abs=1e-3)
    assert lost.mid == pytest.approx(3.1443, abs=1e-3)
    assert lost.low == 0


def test_film_below_by_look_worked_on_paper() -> None:
    """
    500 x (1.02 / 0.97 - 0.98 / 1.03) = 50.0450 nm of unevenness, plus 15 s to react.

    At 80 nm/min 37.534 s, at 100 30.027 s, at 125 24.022 s, each plus 15 s.
    """
    found = under_by_look(BAND, schedule(BAND, CUT), CUT)
    assert found is not None
    assert [found.low_s, found.mid_s, found.high_s] == pytest.approx([39.0216, 45.0270, 52.5338], abs=1e-3)


def test_open_film_worked_on_paper() -> None:
    """
    A mask at 9, 10, 11 nm/min: 9 x 0.97 x 394.330 / 60 = 57.375; 65.722; 11 x 1.03 x 394.330 / 60 =
    74.462 nm.
    """
    mask = RateBand(9 * PER_MIN, 10 * PER_MIN, 11 * PER_MIN)
    lost = loss(mask, open_by_timer(schedule(BAND, CUT)), 0.03)
    assert [lost.low, lost.mid, lost.high] == pytest.approx([57.3750, 65.7216, 74.4624], abs=2e-3)
    both = loss(mask, open_by_timer(schedule(BAND, CUT)), 0.03, faces=2)
    assert both.high == pytest.approx(2 * 74.4624, abs=4e-3)


def test_second_layer_down_worked_on_paper() -> None:
    """
    20 nm exposed for 100 to 400 s at 1 to 4 nm/min: at the earliest through after 19.6 / 4.12 min =
    285.44 s.
    """
    upper = RateBand(1 * PER_MIN, 2 * PER_MIN, 4 * PER_MIN)
    found = below(Exposure(100, 200, 400), upper, 20, CUT, porous=False)
    assert found.high_s == pytest.approx(400 - 285.437, abs=1e-3)
    assert (found.low_s, found.mid_s) == (0, 0)
    assert below(Exposure(100, 200, 400), upper, 20, CUT, porous=True).high_s == 400


def test_substrate_selectivity_of_the_textbook_form() -> None:
    """
    Wolf & Tauber vol. 1, form from memory: U = 0.3110275689, S = 7.7756892 for 500 nm over 20 nm.

    delta = phi = 5 %, overetch 10 %, rate exactly known; the exposure of the layer below, times R / h, is U.
    """
    exact = RateBand(1.0, 1.0, 1.0)
    cut = Cut(500, 500, 0.05, 0.05, 0, 0.1, 0, through=True)
    exposure = under_by_timer(schedule(exact, cut))
    assert exposure is not None
    assert exposure.high_s / 500 == pytest.approx(0.3110275689223061, rel=1e-9)
    substrate = 1 / 7.775689223057652
    assert loss(RateBand(substrate, substrate, substrate), exposure, 0.0).high == pytest.approx(20, rel=1e-9)


def test_mask_thickness_of_the_textbook_form() -> None:
    """
    Derived form (check of the budget): 500 nm at selectivity 5 needs 227.65789 nm, 100 nm of it in
    reserve.
    """
    exact = RateBand(1.0, 1.0, 1.0)
    cut = Cut(500, 500, 0.05, 0.05, 0, 0.1, 0, through=True)
    lost = loss(RateBand(0.2, 0.2, 0.2), open_by_timer(schedule(exact, cut)), 0.05)
    assert lost.high == pytest.approx(227.65789473684214 - 100, rel=1e-9)


def test_undercut_of_the_textbook_form() -> None:
    """
    Wolf & Tauber vol. 1 definition (from memory): 500 nm at an anisotropy of 0.8 moves each edge by 100
    nm.
    """
    exact = RateBand(1.0, 1.0, 1.0)
    cut = Cut(500, 500, 0.0, 0.0, 0, 0.0, 0, through=True)
    found = undercut(Span(0.2, 0.2, 0.2), exact, schedule(exact, cut), cut)
    assert [found.low, found.mid, found.high] == pytest.approx([100, 100, 100], rel=1e-12)


def test_undercut_stands_still_during_induction() -> None:
    """By hand: stop at 512 s, of which 12 s are induction; half of 1 nm/s for 500 s is 250 nm, not 256."""
    exact = RateBand(1.0, 1.0, 1.0)
    cut = Cut(500, 500, 0.0, 0.0, 12, 0.0, 0, through=True)
    found = undercut(Span(0.5, 0.5, 0.5), exact, schedule(exact, cut), cut)
    assert [found.low, found.mid, found.high] == pytest.approx([250, 250, 250], rel=1e-12)


@pytest.mark.parametrize(
    ("thickness", "under", "other", "mask", "resist"),
    [
        # min(5 % h, 10); max(1, min(2 % h, 5)); h - max(10 % h, 20); h - max(20 % h, 200), never below 0
        (19.9, None, None, None, None),
        (20, 1.0, 1.0, 0, 0),
        (100, 5, 2, 80, 0),
        (200, 10, 4, 180, 0),
        (500, 10, 5, 450, 300),
        (1400, 10, 5, 1260, 1120),
    ],
)
def test_default_allowances_worked_on_paper(
    thickness: float, under: float | None, other: float | None, mask: float | None, resist: float | None
) -> None:
    """Each rule on both sides of its turning point; no default below 20 nm."""
    assert allowed_under(thickness, RULES) == pytest.approx(under)
    assert allowed_other(thickness, RULES) == pytest.approx(other)
    assert allowed_mask(thickness, RULES, resist_in_plasma=False) == pytest.approx(mask)
    assert allowed_mask(thickness, RULES, resist_in_plasma=True) == pytest.approx(resist)


def test_envelope_worked_on_paper() -> None:
    """
    90 (sigma 0.25) and 100 to 160 (sigma 0.6): 100 e^(-0.987) = 37.27, 160 e^(0.987) = 429.3, mid sqrt(90
    x 126.5).
    """
    found = envelope(
        [
            PublishedValue(PublishedKind.VALUE, 90, 90, 0.25),
            PublishedValue(PublishedKind.VALUE, 100, 160, 0.6),
        ],
        1.645,
    )
    assert found is not None
    assert found.band.low == pytest.approx(37.271, abs=2e-3)
    assert found.band.high == pytest.approx(429.29, abs=0.02)
    assert found.band.mid == pytest.approx(math.sqrt(90 * 126.4911), rel=1e-6)
    assert found.limit_time_s is None


def test_the_same_fact_twice_counts_once() -> None:
    """By hand: 40, 40 again and 90 have the middle sqrt(40 x 90) = 60, not 52.4 as of three values."""
    forty, ninety = (PublishedValue(PublishedKind.VALUE, v, v, 0.25) for v in (40, 90))
    found = envelope([forty, forty, ninety], 1.645)
    assert found is not None
    assert found.band.mid == pytest.approx(60, rel=1e-12)


def test_equal_limits_hold_as_long_as_the_shorter_test() -> None:
    """By hand: below 5 tested for 100 s and for 1000 s holds for 100 s; a higher limit decides alone."""
    short, long, high = (
        PublishedValue(PublishedKind.UPPER, None, v, 0.6, t) for v, t in ((5, 100), (5, 1000), (9, 50))
    )
    for values, seconds in (([short, long], 100), ([long], 1000), ([short, long, high], 50)):
        found = envelope(values, 1.645)
        assert found is not None
        assert found.limit_time_s == seconds


def test_a_printed_limit_is_not_widened_and_ends_with_its_time() -> None:
    """
    `< 5`: low 0, no middle, high 5 as printed; ten minutes where no tested time is known, else the tested
    time.
    """
    for tested, holds_until in ((None, 600), (3600, 3600)):
        found = envelope([PublishedValue(PublishedKind.UPPER, None, 5, 0.6, tested)], 1.645)
        assert found is not None
        assert found.band == RateBand(0, None, 5)
        assert found.limit_time_s == holds_until
    lower = envelope([PublishedValue(PublishedKind.LOWER, 1000, None, 0.6)], 1.645)
    assert lower is not None
    assert lower.band.high is None
    assert lower.band.low == pytest.approx(1000 * math.exp(-0.987), rel=1e-9)


def test_words_worked_on_paper() -> None:
    """Losses of 3 to 9 nm against 10, 5 and 2 nm allowed; and each ground that keeps a film from "holds"."""
    lost, exposure = Span(3, 6, 9), Exposure(100, 200, 700)
    cases = [
        (10.0, OWN, Verdict.HOLDS, Ground.WITHIN_ALLOWED),
        (9.0, OWN, Verdict.HOLDS, Ground.WITHIN_ALLOWED),
        (5.0, OWN, Verdict.BORDERLINE, Ground.STRADDLES),
        (3.0, OWN, Verdict.BORDERLINE, Ground.STRADDLES),
        (2.0, OWN, Verdict.LOST, Ground.MILD_END_EXCEEDS),
        (None, OWN, Verdict.BORDERLINE, Ground.NO_ALLOWANCE),
        (10.0, replace(OWN, rank=Rank.LITERATURE), Verdict.HOLDS, Ground.WITHIN_ALLOWED),
        (10.0, replace(OWN, rank=Rank.UNCHECKED), Verdict.BORDERLINE, Ground.UNCHECKED),
        (10.0, replace(OWN, target_rank=Rank.UNCHECKED), Verdict.BORDERLINE, Ground.TARGET_UNCHECKED),
        (10.0, replace(OWN, limit_time_s=600), Verdict.BORDERLINE, Ground.BEYOND_TESTED_TIME),
        (10.0, replace(OWN, limit_time_s=700), Verdict.HOLDS, Ground.WITHIN_ALLOWED),
        (10.0, replace(OWN, rank=Rank.STATEMENT), Verdict.BORDERLINE, Ground.STATEMENT_RESISTS),
        (10.0, replace(OWN, rank=Rank.STATEMENT, adverse=True), Verdict.BORDERLINE, Ground.STATEMENT_ADVERSE),
        (10.0, replace(OWN, rank=Rank.STATEMENT, attacked=True), Verdict.LOST, Ground.STATEMENT_ATTACKS),
        (10.0, replace(OWN, rank=Rank.SIMILAR), Verdict.UNMEASURED, Ground.NO_EVIDENCE),
        (10.0, replace(OWN, rank=Rank.NONE), Verdict.UNMEASURED, Ground.NO_EVIDENCE),
    ]
    for allowed, grounds, verdict, ground in cases:
        assert film_word(lost, exposure, grounds, allowed, 50) == Word(verdict, ground)
    assert film_word(replace(lost, high=None), exposure, OWN, 10, 50).ground is Ground.NO_HIGH_END
    assert film_word(UNKNOWN_SPAN, None, OWN, 10, 50) == Word(Verdict.UNMEASURED, Ground.TIME_UNKNOWN)
    attacked = replace(OWN, attacked=True)
    assert film_word(UNKNOWN_SPAN, None, attacked, 10, 50) == Word(Verdict.LOST, Ground.STATEMENT_ATTACKS)


def test_order_of_the_words() -> None:
    """A plan has its worst film's word: lost, unmeasured, borderline, holds."""
    in_order = [Verdict.HOLDS, Verdict.BORDERLINE, Verdict.UNMEASURED, Verdict.LOST]
    for a, b in itertools.combinations(in_order, 2):
        assert worst([a, b]) is worst([b, a]) is b
    assert worst([]) is Verdict.HOLDS
    assert worst([Verdict.HOLDS], best=Verdict.BORDERLINE) is Verdict.BORDERLINE
    assert [capped(word) for word in in_order] == [Verdict.BORDERLINE, *in_order[1:]]
    assert worst_rank([Rank.OWN, Rank.SIMILAR, Rank.LITERATURE]) is Rank.SIMILAR
    assert worst_rank([]) is Rank.NONE


def test_how_an_etch_is_ended() -> None:
    """
    By hand: 228 to 394 s is 1.73, so look; 1.25 exactly is still a timer; an endpoint or a harmless
    overetch too.
    """
    plan = schedule(BAND, CUT)
    assert end_mode(plan, holds_by_timer=False, endpoint=False) is Mode.LOOK_AND_FINISH
    assert end_mode(plan, holds_by_timer=True, endpoint=False) is Mode.RUN_TO_TIME
    assert end_mode(plan, holds_by_timer=False, endpoint=True) is Mode.RUN_TO_TIME
    narrow = replace(plan, clear_first_s=100.0, clear_last_s=125.0)
    assert end_mode(narrow, holds_by_timer=False, endpoint=False) is Mode.RUN_TO_TIME
    assert (
        end_mode(replace(narrow, clear_last_s=125.1), holds_by_timer=False, endpoint=False)
        is Mode.LOOK_AND_FINISH
    )
    assert end_mode(UNKNOWN_SCHEDULE, holds_by_timer=True, endpoint=True) is None
