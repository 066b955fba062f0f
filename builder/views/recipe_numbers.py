"""How a recipe's numbers came about: each run, whose spread, and the textbook methods beside it."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass

from builder.engine import NextRun, paule_mandel, plain_interval
from builder.findings.computed import Computed
from builder.findings.own_rates import LeftOut, OwnRate, OwnRun
from builder.views.number_text import (
    NO_BREAK,
    NumberText,
    fixed_text,
    percent_text,
    plain_number,
    rate_text,
)
from builder.views.recipe_evidence import induction_words
from builder.views.recipe_standing import runs_text
from builder.views.references import Fact, known_facts

_SECONDS_A_MINUTE = 60.0
_RATE_DIGITS = 4
LEFT_OUT_WORDS = {
    LeftOut.EARLIER_SERIES: "left out: an earlier series",
    LeftOut.OTHER_LOAD: "left out: another load",
    LeftOut.OTHER_WINDOW: "left out: another window width",
    LeftOut.SAYS_NOTHING: "left out: it says nothing",
}
GROUP_WORDS = {
    "wet_thermostated": "thermostated baths",
    "wet_open": "open beakers",
    "plasma": "plasma recipes",
    "cyclic": "cyclic recipes",
    "vapour": "vapour recipes",
}


@dataclass(frozen=True)
class RunLine:
    """One run and what it says: rate or limit in nm/min, and whether it is used."""

    date: str
    wafer: str
    rate: str
    uncertainty: str
    how: str
    use: str
    is_used: bool


@dataclass(frozen=True)
class Numbers:
    """The runs of the first target, whose spread the interval has, and what other methods would give."""

    runs: tuple[RunLine, ...]
    facts: tuple[Fact, ...]
    beside: tuple[Fact, ...]


def recipe_numbers(computed: Computed, own: OwnRate | None) -> Numbers | None:
    """Return how the rate of a film came about; None without own runs."""
    if own is None:
        return None
    facts = () if own.next_run is None else known_facts(*_facts(computed, own, own.next_run))
    return Numbers(
        runs=tuple(_line(run) for run in reversed(own.runs)),
        facts=facts,
        beside=known_facts(*_beside(computed, own)),
    )


def log_of(run: OwnRun) -> float | None:
    """Return the logarithm of a run's rate in nm/min; None where it has none."""
    return None if run.rate.log_rate is None else run.rate.log_rate + math.log(_SECONDS_A_MINUTE)


def _line(run: OwnRun) -> RunLine:
    rate, limit = run.rate.rate_nm_per_s, run.rate.limit_nm_per_s
    if rate is not None:
        shown = plain_number(rate * _SECONDS_A_MINUTE, _RATE_DIGITS)
    elif limit is not None:
        shown = f"at most {plain_number(limit * _SECONDS_A_MINUTE, 2)}"
    else:
        shown = ""
    return RunLine(
        date=run.date.isoformat(),
        wafer=run.rows[0].wafer,
        rate=shown,
        uncertainty="" if run.rate.u_log is None else percent_text(run.rate.u_log),
        how="one time" if run.fit is None else f"line through {len(run.rows)} depths",
        use="used" if run.left_out is None else LEFT_OUT_WORDS[run.left_out],
        is_used=run.left_out is None,
    )


def _facts(computed: Computed, own: OwnRate, found: NextRun) -> Iterator[tuple[str, str | None]]:
    level = percent_text(computed.confidence)
    shown = rate_text(found.lo_nm_per_s or None, found.mid_nm_per_s, found.hi_nm_per_s)
    yield f"Next run, {level}", shown.full
    yield "Rests on", _rests_on(found)
    yield "Spread between runs", _spread(own, found)
    yield "Whose spread", _shares(own, found)
    if found.tau is not None and found.mean_u2 is not None:
        yield (
            "Of it, measurement",
            f"{percent_text(math.sqrt(found.mean_u2))}; {percent_text(found.tau)} remain between runs",
        )
    if own.trend is not None:
        yield "Drift", _drift(own)
    if own.induction_s is not None:
        yield "Induction", f"The line {induction_words(own.induction_s)}."


def _rests_on(found: NextRun) -> str:
    limits = f"{found.n_limits} in which no loss was seen" if found.n_limits else ""
    return ", ".join(part for part in (runs_text(found.n_runs) if found.n_runs else "", limits) if part)


def _spread(own: OwnRate, found: NextRun) -> str:
    used = percent_text(found.s_tilde)
    if found.s_own is None:
        return f"{used}, with {_degrees(found.df)} degrees of freedom"
    lab = percent_text(own.spread.s0)
    return (
        f"{used}, between its own {percent_text(found.s_own)} and {lab} of {_lab_words(own)}, "
        f"with {_degrees(found.df)} degrees of freedom"
    )


def _shares(own: OwnRate, found: NextRun) -> str:
    own_share, lab_share = percent_text(found.share_own), percent_text(found.share_lab)
    whose = _lab_words(own)
    if found.share_own == 0:
        return f"all from {whose}"
    return f"{own_share} of the weight is its own, {lab_share} from {whose}"


def _lab_words(own: OwnRate) -> str:
    group = GROUP_WORDS[own.group]
    if own.spread.from_prior:
        return f"the lab's prior for {group} (too few recipes to fit)"
    return f"{own.spread.recipes} of the lab's {group}"


def _degrees(df: float) -> str:
    return "infinitely many" if math.isinf(df) else plain_number(df, 3)


def _drift(own: OwnRate) -> str:
    assert own.trend is not None
    if not own.trend.significant:
        return "none that the runs could show"
    way = "up" if own.trend.slope > 0 else "down"
    return f"{way}; the middle is the end of the trend, the ends are wider for it"


def _beside(computed: Computed, own: OwnRate) -> Iterator[tuple[str, str | None]]:
    measured = [run for run in own.used if run.rate.log_rate is not None]
    if len(measured) < 2:
        return
    logs = [run.rate.log_rate for run in measured if run.rate.log_rate is not None]
    plain = plain_interval(logs, computed.confidence)
    text: NumberText = rate_text(math.exp(plain.lo), None, math.exp(plain.hi))
    yield "Plain t interval of these runs alone", text.with_unit
    known = [run.rate.u_log for run in measured]
    if all(u is not None and u > 0 for u in known):
        pooled = paule_mandel(logs, [u for u in known if u is not None])
        yield "Spread by Paule and Mandel", percent_text(math.sqrt(pooled.tau2))
        yield "Heterogeneity I²", f"{fixed_text(100 * pooled.i2, 0)}{NO_BREAK}%"
