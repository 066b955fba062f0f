"""From one run to the next-run interval, step by step on printed numbers."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from builder.engine import NextRun, NextRunKind, predict_next_run, two_sided_t
from builder.findings.computed import Computed
from builder.findings.own_rates import OwnRate, OwnRun
from builder.views.number_text import percent_text
from builder.views.pencil import Pencil, Value
from builder.views.recipe_numbers import log_of

_SECONDS_A_MINUTE = 60.0
_SAME_WEIGHT = 1e-3
"""Weights this close to each other, relatively, are taken as one: the mean does not show it."""


@dataclass(frozen=True)
class WorkedStep:
    """
    One step: in words, as a sum (empty where the result is read from elsewhere), its result and unit.

    `lists_runs`: the logarithms of all runs in use are shown with it.
    """

    words: str
    sum: str
    result: str
    unit: str
    lists_runs: bool = False


@dataclass(frozen=True)
class Ends:
    """Ends and middle of the next run, nm/min, as printed; `mid` None where there is none."""

    low: Value
    mid: Value | None
    high: Value


@dataclass(frozen=True)
class WorkedInterval:
    """The steps to an interval, and its ends."""

    steps: tuple[WorkedStep, ...]
    ends: Ends


@dataclass(frozen=True)
class _Given:
    """What the interval is worked from: measured runs in use, their logarithms, the program's result."""

    own: OwnRate
    found: NextRun
    runs: tuple[OwnRun, ...]
    logs: tuple[Value, ...]
    u_gauge: float
    confidence: float


def shown(words: str, value: Value, unit: str) -> WorkedStep:
    """Return a worked value as a step."""
    return WorkedStep(words, value.sum, value.text, unit)


def interval_steps(pencil: Pencil, computed: Computed, own: OwnRate) -> WorkedInterval:
    """Return the steps from the runs to the ends of the next run; a measured run must be in use."""
    assert own.next_run is not None
    runs = tuple(run for run in own.used if run.rate.log_rate is not None)
    logs = tuple(pencil.log(log) for run in runs if (log := log_of(run)) is not None)
    given = _Given(own, own.next_run, runs, logs, computed.gauge, computed.confidence)
    steps = list(_one_run(pencil, runs))
    mean, variance, more = _mean_and_spread(pencil, given)
    steps += more
    low, high, more = _ends(pencil, given, mean, variance)
    steps += more
    middle = pencil.work(f"e^({mean.text})")
    steps.append(shown("The middle.", middle, "nm/min"))
    ends = Ends(low, middle, high)
    adjusted = _adjusted(pencil, given)
    if adjusted is not None:
        words, ends = adjusted
        quoted = (("Low end", ends.low), ("Middle", ends.mid), ("High end", ends.high))
        steps += [WorkedStep(f"{name}. {words}", "", v.text, "nm/min") for name, v in quoted if v is not None]
    return WorkedInterval(tuple(steps), ends)


def _one_run(pencil: Pencil, runs: Sequence[OwnRun]) -> Iterator[WorkedStep]:
    """A run measured at one time; a depth series has its line, which no pencil fits."""
    single = [run for run in runs if run.fit is None and run.rate.loss_nm is not None]
    if not single:
        return
    run = single[-1]
    row = max(run.rows, key=lambda row: row.time_s)
    before, after = pencil.given(row.before_nm), pencil.given(row.after_nm)
    lost = pencil.work_exactly(f"{before.text} − {after.text}", _places(before, after))
    yield shown(
        f"Run {row.wafer} of {run.date.isoformat()}: thickness before less thickness after.", lost, "nm"
    )
    induction = row.time_s - (run.rate.exposure_s or row.time_s)
    minus = f" − {pencil.given(round_off(induction)).text}" if induction else ""
    words = "Its time, less the induction time, in minutes." if induction else "Its time in minutes."
    time = pencil.work(
        f"({pencil.given(row.time_s).text}{minus}) ÷ 60"
        if induction
        else f"{pencil.given(row.time_s).text} ÷ 60"
    )
    yield shown(words, time, "min")
    rate = pencil.work(f"{lost.text} ÷ {time.text}")
    yield shown("Its rate.", rate, "nm/min")
    log = pencil.work_log(f"ln({rate.text})")
    yield WorkedStep(
        "The logarithm of its rate in nm/min: rates spread by percent, and logarithms turn percent into "
        "plain differences. Those of all runs in use:", log.sum, log.text, "", lists_runs=True,
    )  # fmt: skip


def round_off(value: float) -> float:
    """Return a difference of two recorded numbers without the noise of its last bits."""
    return float(f"{value:.9g}")


def _places(*values: Value) -> int:
    return max(len(value.text.partition(".")[2]) for value in values)


def _mean_and_spread(pencil: Pencil, given: _Given) -> tuple[Value, Value, list[WorkedStep]]:
    """The mean of the logarithms, the variance of the next run about it, and the steps to both."""
    steps: list[WorkedStep] = []
    count = len(given.logs)
    plain = given.logs[0]
    if count > 1:
        plain = pencil.work_log(f"({' + '.join(log.text for log in given.logs)}) ÷ {count}")
        steps.append(shown("The mean of the logarithms.", plain, ""))
    spread, more = _spread(pencil, given, plain)
    steps += more
    weights = _weights(pencil, given)
    if weights is None:
        sum_ = f"{spread.text}² + {spread.text}² ÷ {count}{_gauge(pencil, given)}"
        mean = plain
        words = "how far a run falls from the mean, how far the mean itself may be off"
    else:
        total = pencil.work(" + ".join(weight.text for weight in weights))
        steps.append(shown(
            "A run measured more finely weighs more: 1 ÷ (spread between runs² + its own uncertainty²) each. "
            "The sum of the weights.", total, "",
        ))  # fmt: skip
        products = " + ".join(f"{w.text} × {x.text}" for w, x in zip(weights, given.logs, strict=True))
        mean = pencil.work_log(f"({products}) ÷ {total.text}")
        steps.append(shown("The weighted mean of the logarithms.", mean, ""))
        sum_ = f"{spread.text}² + 1 ÷ {total.text}{_gauge(pencil, given)}"
        words = "how far a run falls from the mean, how far the weighted mean may be off"
    gauge = " and the error that all readings of the gauge share" if given.u_gauge else ""
    variance = pencil.work(sum_)
    steps.append(shown(f"The variance of the next run: {words}{gauge}.", variance, ""))
    return mean, variance, steps


def _gauge(pencil: Pencil, given: _Given) -> str:
    return f" + {pencil.given(given.u_gauge).text}²" if given.u_gauge else ""


def _spread(pencil: Pencil, given: _Given, plain: Value) -> tuple[Value, list[WorkedStep]]:
    """The spread of one run about the mean: own and lab's, moderated; never below the measurement's own."""
    own, steps = given.own, []
    s0, d0 = pencil.given(own.spread.s0), own.spread.d0
    if len(given.logs) > 1:
        squares = " + ".join(f"({log.text} − {plain.text})²" for log in given.logs)
        freedom = len(given.logs) - 1
        scatter = pencil.work(f"√(({squares}) ÷ {freedom})")
        steps.append(shown("Their own spread.", scatter, ""))
        if math.isinf(d0):
            moderated = s0
        else:
            prior = pencil.given(d0).text
            moderated = pencil.work(
                f"√(({prior} × {s0.text}² + {freedom} × {scatter.text}²) ÷ ({prior} + {freedom}))"
            )
        steps.append(shown(
            f"Moderated by the lab's spread of {s0.text} ({percent_text(own.spread.s0)}), which counts for "
            f"{pencil.given(d0).text} degrees of freedom.", moderated, "",
        ))  # fmt: skip
    else:
        moderated = s0
        steps.append(WorkedStep("One run has no spread of its own; the lab's stands in.", "", s0.text, ""))
    measured = math.sqrt(given.found.mean_u2 or 0.0)
    if measured > given.found.s_tilde:
        value = pencil.quoted(measured)
        steps.append(WorkedStep(
            "The measurement alone scatters more than that, so its uncertainty counts.", "", value.text, ""
        ))  # fmt: skip
        return value, steps
    return moderated, steps


def _weights(pencil: Pencil, given: _Given) -> list[Value] | None:
    """The weight of each run; None where all weigh alike."""
    typical = given.found.mean_u2 or 0.0
    tau2 = (given.found.tau or 0.0) ** 2
    variances = [tau2 + (typical if run.rate.u_log is None else run.rate.u_log**2) for run in given.runs]
    if len(variances) < 2 or min(variances) == 0 or max(variances) <= (1 + _SAME_WEIGHT) * min(variances):
        return None
    return [pencil.quoted(1 / variance) for variance in variances]


def _ends(
    pencil: Pencil, given: _Given, mean: Value, variance: Value
) -> tuple[Value, Value, list[WorkedStep]]:
    quantile = pencil.quoted(two_sided_t(given.confidence, given.found.df))
    half = pencil.work_log(f"{quantile.text} × √({variance.text})")
    low = pencil.work(f"e^({mean.text} − {half.text})")
    high = pencil.work(f"e^({mean.text} + {half.text})")
    freedom = "infinitely many" if math.isinf(given.found.df) else pencil.quoted(given.found.df).text
    steps = [
        WorkedStep(
            f"Student's t for {percent_text(given.confidence)}, both sides, and {freedom} degrees of "
            "freedom, from a table.", "", quantile.text, "",
        ),
        shown("Half the width of the interval.", half, ""),
        shown("The low end: back from logarithms.", low, "nm/min"),
        shown("The high end.", high, "nm/min"),
    ]  # fmt: skip
    return low, high, steps


def _adjusted(pencil: Pencil, given: _Given) -> tuple[str, Ends] | None:
    """The program's own ends where a drift or a limit moved them; no pencil follows that."""
    found = given.found
    plain = predict_next_run(
        [run.rate for run in given.runs], given.own.spread, given.confidence, given.u_gauge
    )
    if (
        found.kind is not NextRunKind.MIXED
        and found.log_mid == plain.log_mid
        and found.log_hi == plain.log_hi
    ):
        return None
    words = "Moved by runs without a visible loss." if found.kind is NextRunKind.MIXED else (
        "The runs drift: a line through the logarithms ends here, and its interval is wider."
    )  # fmt: skip

    def of(rate: float) -> Value:
        return pencil.quoted(rate * _SECONDS_A_MINUTE)

    middle = None if found.mid_nm_per_s is None else of(found.mid_nm_per_s)
    return words, Ends(of(found.lo_nm_per_s), middle, of(found.hi_nm_per_s))
