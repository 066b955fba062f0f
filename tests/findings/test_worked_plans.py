"""Whole options worked on paper: every expected number is reached by the steps in the comments."""

from __future__ import annotations

import pytest

from builder.engine import Mode, PublishedKind, Rank, Verdict
from builder.findings.plan.facts import EtchFacts, OwnFact, PlanFacts, RatioFact
from builder.findings.plan.planning import plan
from builder.findings.plan.result import CapCode, LostCode, Option, UnstatedCode
from builder.findings.plan.sample import PlanFilm, PlanSample
from builder.records.terms import CoupleEffect, Edge, Effect, Exposure, Method, Role, State
from tests.findings.fact_builder import (
    couple,
    etchant,
    facts,
    layer,
    option_of,
    own,
    rate,
    recipe,
    row_of,
    said,
    sample,
)

EXACT = 1e-9
"""Paper and program do the same few operations: only rounding lies between them."""

OXIDE = own(80, 100, 125)
"""Interval of the next run of the target, nm/min, used throughout; phi is 4 %, thickness 500 nm +/- 2 %."""
TARGET = layer("oxide", 500, Role.TARGET, tolerance=0.02)
# Earliest: 490 nm / (125 x 1.04 nm/min) = 490/130 min. Latest: 510 nm / (80 x 0.96 nm/min) = 510/76.8 min.
FIRST_MIN = 490 / 130
LAST_MIN = 6.640625


def approx(value: float) -> object:
    """The value to the last digits."""
    return pytest.approx(value, rel=EXACT, abs=1e-12)


def dip(more_own: dict[str, OwnFact] | None = None, **more: object) -> PlanFacts:
    """A lab with one recipe, whose phi is 4 %."""
    values: dict[str, object] = {"phi": 0.04, **more}
    made: EtchFacts = recipe({"oxide": OXIDE, **(more_own or {})}, **values)
    return facts(etchant(), made)


def option(known: PlanFacts, *layers: PlanFilm, **more: object) -> Option:
    """The option for a sample of these layers."""
    return option_of(known, sample(*layers, **more))


def test_the_times_of_a_target() -> None:
    """Wait 5 s, overetch 10 %: the wait is added once, the overetch acts on the etching time only."""
    times = option(dip(offset_s=5.0, overetch=0.10), TARGET).schedule
    # 490/130 min = 226.153846... s, 510/76.8 min = 398.4375 s, 500/100 min = 300 s; and 5 s to each.
    assert times.clear_first_s == approx(490 / 130 * 60 + 5)
    assert times.clear_last_s == approx(403.4375)
    assert times.nominal_s == approx(305)
    # 0.8 x 231.153846... s; 398.4375 s x 1.1 + 5 s.
    assert times.first_look_s == approx(0.8 * (490 / 130 * 60 + 5))
    assert times.latest_stop_s == approx(443.28125)


def test_the_film_under_the_target_by_timer_and_by_look() -> None:
    """Both losses are given, and both are worked from the same rates."""
    row = row_of(
        option(dip({"silicon": own(0.6, 1.0, 2.0)}), TARGET, layer("silicon", 525_000, Role.UNDER)), "silicon"
    )
    # Timer: at worst open from 490/130 min to 6.640625 min; likely from 5 min; mildest: never.
    assert row.loss.high == approx(2.0 * 1.04 * (LAST_MIN - FIRST_MIN))
    assert row.loss.mid == approx(1.640625)
    assert row.loss.low == approx(0)
    # Look: 500 nm x (1.02/0.96 - 0.98/1.04) = 60.0961538 nm are etched while the last place clears,
    # at 80, 100, 125 nm/min: 45.0721154, 36.0576923, 28.8461538 s, and 15 s to react.
    assert row.loss_by_look.high == approx(2.0 * 1.04 * (500 * (1.0625 - 0.98 / 1.04) / 80 + 0.25))
    assert row.loss_by_look.high == pytest.approx(2.0825, rel=1e-4)
    assert row.loss_by_look.mid == pytest.approx(0.850962, rel=1e-5)
    assert row.loss_by_look.low == pytest.approx(0.420923, rel=1e-5)
    assert row.allowed_nm == approx(10)
    assert row.verdict is Verdict.HOLDS


def test_by_the_timer_borderline_by_look_it_holds() -> None:
    """Slow end of a wide interval: the stop comes long after the likely clearing, a look sees it."""
    known = dip({"silicon": own(1.0, 2.5, 4.0)})
    made = option(known, TARGET, layer("silicon", 525_000, Role.UNDER))
    # Timer: 4 x 1.04 x 2.87139 min = 11.945 nm of 10; look: 4 x 1.04 x 60.0721 s = 4.165 nm of 10.
    row = row_of(made, "silicon")
    assert row.loss.high == pytest.approx(11.94500, rel=1e-5)
    assert row.loss_by_look.high == pytest.approx(4.16500, rel=1e-4)
    assert (made.verdict, made.verdict_by_look) == (Verdict.BORDERLINE, Verdict.HOLDS)
    # 398.4 s over 226.2 s is 1.76, more than 1.25, and not every film holds by timer.
    assert made.mode is Mode.LOOK_AND_FINISH


@pytest.mark.parametrize(
    ("line_nm", "verdict", "code"),
    [
        (918, Verdict.LOST, LostCode.LINE),
        (2_244, Verdict.BORDERLINE, CapCode.LINE),
        (2_245, Verdict.HOLDS, None),
    ],
)
def test_undercut_takes_the_footing(line_nm: float, verdict: Verdict, code: str | None) -> None:
    """A line is lost where even the mild undercut meets in its middle, and not sure up to the worst one."""
    known = dip({"resist": own(0.5, 1, 2)}, ratio=RatioFact(low=0.9, mid=1.0, high=1.3, basis="seen"))
    made = option(known, layer("resist", 1400, Role.MASK), TARGET, line_nm=line_nm)
    # In 6.640625 min: 0.9 x 80 x 0.96 = 69.12 nm/min, 100 nm/min, 1.3 x 125 x 1.04 = 169 nm/min.
    assert made.undercut.low == approx(459.0)
    assert made.undercut.mid == approx(664.0625)
    assert made.undercut.high == approx(1122.265625)
    row = row_of(made, "resist")
    assert row.verdict is verdict
    codes = [cap.code for cap in row.caps] if row.lost is None else [row.lost.code]
    assert codes == ([] if code is None else [code])


def test_etching_goes_on_in_transfer() -> None:
    """Ten seconds on the way to the rinse come off the clock, not off the losses."""
    known = dip({"resist": own(1, 2, 3), "silicon": own(0.6, 1.0, 2.0)}, offset_s=-10.0, transfer_s=10.0)
    made = option(known, layer("resist", 1400, Role.MASK), TARGET, layer("silicon", 525_000, Role.UNDER))
    assert made.schedule.latest_stop_s == approx(388.4375)
    # The mask is in for 388.4375 s and 10 s more: 3 x 1.04 x 6.640625 min.
    assert row_of(made, "resist").loss.high == approx(20.71875)
    # The silicon is open 10 s earlier on the clock and for 10 s after it: as long as without transfer.
    assert row_of(made, "silicon").loss.high == approx(2.0 * 1.04 * (LAST_MIN - FIRST_MIN))


def test_losses_of_two_targets_add_up() -> None:
    """What the first etch took is no longer there for the second."""
    known = dip({"nitride": own(30, 36, 45), "glass": own(0.1, 0.2, 0.4)}, targets=("oxide", "nitride"))
    stack = sample(
        TARGET, layer("nitride", 300, Role.TARGET, tolerance=0.02), layer("silicon", 525_000, Role.UNDER),
        exposed=(layer("glass", 1000, Role.EXPOSED, allowed_nm=7.0),),
    )  # fmt: skip
    first, second = plan(known, stack, confidence=0.90).stages
    # First: 0.4 x 1.04 x 6.640625 min = 2.7625 nm of 7 nm.
    one = row_of(first.options[0], "glass")
    assert (one.loss.high, one.allowed_nm, one.verdict) == (approx(2.7625), approx(7.0), Verdict.HOLDS)
    # Second: 306 nm / (30 x 0.96 nm/min) = 10.625 min, 0.4 x 1.04 x 10.625 = 4.42 nm of 7 - 2.7625 nm.
    two = row_of(second.options[0], "glass")
    assert (two.loss.high, two.allowed_nm, two.verdict) == (approx(4.42), approx(4.2375), Verdict.BORDERLINE)


def test_the_second_target_may_be_thinner_when_its_turn_comes() -> None:
    """The overetch of the first target eats into it, so the first look at the second comes earlier."""
    known = dip({"nitride": own(30, 36, 45)}, targets=("oxide", "nitride"))
    stack = sample(TARGET, layer("nitride", 300, Role.TARGET, tolerance=0.02))
    times = plan(known, stack, confidence=0.90).stages[1].options[0].schedule
    # Open for at most 6.640625 - 490/130 min at 45 x 1.04 nm/min: 134.3813 nm less than 294 nm are left.
    left = 294 - 46.8 * (LAST_MIN - FIRST_MIN)
    assert left == pytest.approx(159.6187, rel=1e-6)
    assert times.clear_first_s == approx(left / 46.8 * 60)
    # Nothing may be gone at all: the latest clearing stays that of 306 nm at 28.8 nm/min.
    assert times.clear_last_s == approx(637.5)


def test_a_family_takes_the_worst_of_its_members_and_never_holds() -> None:
    """Nobody said which oxide lies open."""
    gentle = dip({"glass": own(0.01, 0.02, 0.03), "oxide": own(80, 100, 125)})
    open_family = (layer("some-oxide", 1000, Role.EXPOSED),)
    # The member "oxide" loses at least 80 x 0.96 x 6.640625 = 510 nm of 5 nm allowed: lost.
    assert row_of(option(gentle, TARGET, exposed=open_family), "some-oxide").verdict is Verdict.LOST
    both = facts(
        etchant(),
        recipe({"oxide": own(0.01, 0.02, 0.03), "glass": own(0.01, 0.02, 0.03), "nitride": OXIDE}, phi=0.04),
    )
    nitride = layer("nitride", 500, Role.TARGET, tolerance=0.02)
    # Both members lose at most 0.03 x 1.04 x 6.640625 = 0.2072 nm of 5 nm, and still it is not known which.
    row = row_of(option(both, nitride, exposed=open_family), "some-oxide")
    assert row.loss.high == approx(0.2071875)
    assert (row.verdict, [cap.code for cap in row.caps]) == (Verdict.BORDERLINE, [CapCode.FAMILY])


def test_a_target_with_pinholes_shields_nothing() -> None:
    """In the worst case the silicon is wet from the start: 2 x 1.04 x 6.640625 = 13.8125 nm of 10 nm."""
    rates = {"pinholed-oxide": OXIDE, "silicon": own(0.6, 1.0, 2.0)}
    known = facts(etchant(), recipe(rates, phi=0.04))
    target = layer("pinholed-oxide", 500, Role.TARGET, tolerance=0.02)
    row = row_of(option(known, target, layer("silicon", 525_000, Role.UNDER)), "silicon")
    assert row.loss.high == approx(13.8125)
    assert row.verdict is Verdict.BORDERLINE


def test_a_mask_that_may_leak_is_capped_until_it_was_seen_to_hold() -> None:
    """`open-resist` has neither a record of adhesion nor a word that it is dense."""
    rates = {"oxide": OXIDE, "open-resist": own(0.01, 0.02, 0.03)}
    known = facts(etchant(), recipe(rates, phi=0.04))
    row = row_of(option(known, layer("open-resist", 1400, Role.MASK), TARGET), "open-resist")
    assert row.verdict is Verdict.BORDERLINE
    assert [cap.code for cap in row.caps] == [CapCode.ADHESION, CapCode.BARRIER]


def test_the_back_decides_if_nobody_states_it() -> None:
    """Not stated: borderline, and asked for. Stated: the oxide there goes as the one in front."""
    known = dip({"silicon": own(0.0, 0.01, 0.02)})
    layers = (TARGET, layer("silicon", 525_000, Role.UNDER))
    asked = option(known, *layers, back_protected=False)
    row = row_of(asked, "silicon", Role.BACK)
    assert (row.verdict, [cap.code for cap in row.caps]) == (Verdict.BORDERLINE, [CapCode.BACK])
    assert UnstatedCode.BACK in [item.code for item in asked.unstated]
    told = option(known, *layers, back_protected=False, back=layer("oxide", 500, Role.BACK, allowed_nm=20))
    # At least 80 x 0.96 x 6.640625 = 510 nm of 20 nm.
    assert row_of(told, "oxide").loss.low == approx(510)
    assert row_of(told, "oxide").verdict is Verdict.LOST
    assert UnstatedCode.BACK not in [item.code for item in told.unstated]


def test_the_back_of_the_wafer_adds_up_over_two_targets() -> None:
    """The film on the back is gone early; the silicon behind it is wet in both etches."""
    rates = {"oxide": OXIDE, "glass": own(80, 100, 125), "silicon": own(0.5, 0.7, 0.9)}
    known = facts(etchant(), recipe(rates, phi=0.0, targets=("oxide", "glass")))
    # phi 0, both targets 400 nm exactly: each stop is 400/80 = 5 min. 10 nm on the back last 10/125 min.
    stack = sample(
        layer("oxide", 400, Role.TARGET), layer("glass", 400, Role.TARGET),
        layer("silicon", 525_000, Role.UNDER, allowed_nm=8.0),
        back_protected=False, back=layer("oxide", 10, Role.BACK, allowed_nm=float("inf")),
    )  # fmt: skip
    first, second = plan(known, stack, confidence=0.90).stages
    # First etch: 0.9 x (5 - 0.08) = 4.428 nm of 8 nm. Second: 0.9 x 5 = 4.5 nm of 8 - 4.428 = 3.572 nm.
    one, two = (row_of(stage.options[0], "silicon", Role.BACK) for stage in (first, second))
    assert (one.loss.high, one.verdict) == (approx(4.428), Verdict.HOLDS)
    assert (two.loss.high, two.allowed_nm) == (approx(4.5), approx(3.572))
    assert two.verdict is Verdict.BORDERLINE


def test_gold_lifts_although_only_gold_is_named() -> None:
    """Titanium is usual under gold, and its edge is open from the start."""
    known = facts(
        etchant(statements={"titanium": [said(Effect.ATTACKS)]}),
        recipe({"oxide": OXIDE, "gold": own(0.0, 0.01, 0.02)}, phi=0.04),
    )
    made = option(known, TARGET, exposed=(layer("gold", 200, Role.EXPOSED),))
    # Titanium is attacked, of chromium nothing is known: of what may lie there only the worst is shown.
    row = row_of(made, "titanium")
    assert (row.verdict, row.assumed) == (Verdict.LOST, True)
    assert [other.film for other in made.rows] == ["titanium", "gold"]
    assert [item.code for item in made.unstated if item.code == UnstatedCode.UNDER_NOBLE]
    told = option(known, TARGET, exposed=(layer("gold", 200, Role.EXPOSED, on="none"),))
    assert [other.film for other in told.rows] == ["gold"]


@pytest.mark.parametrize(
    ("effect", "affects", "verdict"),
    [
        (CoupleEffect.NONE, None, Verdict.HOLDS),
        (CoupleEffect.UNDERCUT, None, Verdict.BORDERLINE),
        (CoupleEffect.ATTACKS, "nickel", Verdict.LOST),
        (None, None, Verdict.BORDERLINE),
    ],
)
def test_a_couple_decides_over_rates(
    effect: CoupleEffect | None, affects: str | None, verdict: Verdict
) -> None:
    """Nickel alone loses 0.05 x 1.04 x 6.640625 = 0.35 nm; what gold at its side does, no rate tells."""
    rates = {"gold": own(80, 100, 125), "nickel": own(0.01, 0.02, 0.05)}
    couples = [] if effect is None else [couple("gold", "nickel", effect, affects)]
    known = facts(etchant(), recipe(rates, phi=0.04, targets=("gold",)), couples)
    made = option(known, layer("gold", 500, Role.TARGET, tolerance=0.02), layer("nickel", 200, Role.UNDER))
    assert made.verdict is verdict


def test_at_an_open_edge_the_film_below_is_in_from_the_start() -> None:
    """In a bath and in a vapour: 2 x 1.04 x 6.640625 = 13.8125 nm; with the edge unknown it is asked for."""
    for state, method in ((State.LIQUID, Method.WET), (State.VAPOUR, Method.VAPOUR)):
        known = facts(
            etchant(state=state, method=method),
            recipe({"oxide": OXIDE, "silicon": own(0.6, 1.0, 2.0)}, phi=0.04, method=method),
        )
        layers = (TARGET, layer("silicon", 525_000, Role.UNDER))
        row = row_of(option(known, *layers, edge=Edge.OPEN), "silicon")
        assert (row.loss.high, row.verdict) == (approx(13.8125), Verdict.BORDERLINE)
        unknown = option(known, *layers, edge=None)
        assert [cap.code for cap in row_of(unknown, "silicon").caps] == [CapCode.EDGE]
        assert UnstatedCode.EDGE in [item.code for item in unknown.unstated]


def test_both_faces_lose_twice() -> None:
    """A lamella of glass: 2 x 0.4 x 1.04 x 6.640625 = 5.525 nm, just more than its 5 nm."""
    known = dip({"glass": own(0.1, 0.2, 0.4)})
    one = option(known, TARGET, exposed=(layer("glass", 1000, Role.EXPOSED),))
    both = option(known, TARGET, exposed=(layer("glass", 1000, Role.EXPOSED, exposed=Exposure.BOTH_FACES),))
    assert (row_of(one, "glass").loss.high, one.verdict) == (approx(2.7625), Verdict.HOLDS)
    assert (row_of(both, "glass").loss.high, both.verdict) == (approx(5.525), Verdict.BORDERLINE)


def test_a_limit_counts_only_as_long_as_somebody_watched() -> None:
    """None seen at 0.5 nm/min within 5 min: 6.6 min of etching are longer than that, at any confidence."""
    limit = rate(None, 0.5, kind=PublishedKind.UPPER, tested_s=300.0)
    slow = rate(0.3, sigma=0.25)
    known = facts(
        etchant({"glass": [limit, slow]}), recipe({"oxide": own(80, 100, 125, widen=1.01)}, phi=0.04)
    )
    for confidence in (0.80, 0.90, 0.95, 0.99):
        # 0.3 x exp(2.576 x 0.25) = 0.571 nm/min is above 0.5 at 0.99, and that lifts nothing.
        made = option_of(known, sample(TARGET, exposed=(layer("glass", 1000, Role.EXPOSED),)), confidence)
        assert made.verdict is Verdict.BORDERLINE


def test_a_recalled_rate_of_the_target_caps_all() -> None:
    """The time is not sure, so nothing that depends on it is."""
    known = facts(etchant({"oxide": [rate(100, rank=Rank.UNCHECKED)], "glass": [rate(0.01)]}))
    made = option(known, TARGET, exposed=(layer("glass", 1000, Role.EXPOSED),))
    assert made.target_rank is Rank.UNCHECKED
    assert row_of(made, "glass").verdict is Verdict.BORDERLINE


def test_a_film_that_may_vanish_stays_so_after_an_unknown_loss() -> None:
    """Any loss accepted is any loss accepted, also where nobody knows what the first etch took."""
    rates = {"oxide": OXIDE, "nitride": own(30, 36, 45)}
    known = facts(
        etchant(statements={"glass": [said(Effect.RESISTS)]}), recipe(rates, targets=("oxide", "nitride"))
    )
    gone = layer("glass", 100, Role.EXPOSED, allowed_nm=float("inf"))
    stack = sample(TARGET, layer("nitride", 300, Role.TARGET), exposed=(gone,))
    stages = plan(known, stack, confidence=0.90).stages
    assert [row_of(stage.options[0], "glass").allowed_nm for stage in stages] == [float("inf")] * 2


def test_what_an_unknown_time_says() -> None:
    """Attacked films are lost, all others unmeasured, whatever is known of them; also the back."""
    known = facts(
        etchant({"glass": [rate(0.01)]}, {"oxide": [said(Effect.ATTACKS)], "nitride": [said(Effect.ATTACKS)]})
    )
    open_films = (layer("glass", 1000, Role.EXPOSED), layer("nitride", 100, Role.EXPOSED))
    stack: PlanSample = sample(
        TARGET, layer("silicon", 525_000, Role.UNDER), exposed=open_films, back_protected=False
    )
    made = option_of(known, stack)
    assert not made.schedule.known
    words = {(row.film, row.role): row.verdict for row in made.rows}
    assert words == {
        ("nitride", Role.EXPOSED): Verdict.LOST,
        ("glass", Role.EXPOSED): Verdict.UNMEASURED,
        ("silicon", Role.UNDER): Verdict.UNMEASURED,
        ("silicon", Role.BACK): Verdict.UNMEASURED,
    }
