"""Random samples, and the plans that the Python engine makes of them, in a form that both languages can give."""

from __future__ import annotations

import math
import random
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import Any

from builder.engine import RateBand, Schedule, Span
from builder.findings.plan.facts import PlanFacts
from builder.findings.plan.planning import plan
from builder.findings.plan.result import FilmRow, Option, Plan, Remark, StagePlan
from builder.findings.plan.sample import plan_sample
from builder.records.samples import Sample
from builder.records.terms import Origin

# A sample file is JSON: what it holds is known only to its schema.
SampleFile = dict[str, Any]

CONFIDENCES = (0.80, 0.90, 0.95, 0.99)
_UNITS = {"nm": 1.0, "um": 1e3, "A": 0.1, "mil": 25_400.0}
_METHODS = ("wet", "vapour", "plasma", "cyclic", "lift-off")
_BONDS = ("thermal wax", "thermal grease", "clips", "carbon tape")
_TREATMENTS = ("develop", "strip", "clean", "rework", "rinse")


@dataclass(frozen=True)
class Case:
    """One question to both engines; `etchant` asks for an etchant alone, by published facts."""

    sample: SampleFile
    confidence: float
    etchant: str | None


def random_cases(facts: PlanFacts, count: int, seed: int) -> list[Case]:
    """Return cases over all films, recipes and etchants; every etchant is asked alone at least once."""
    maker = _Maker(facts, random.Random(seed))
    etchants = sorted(facts.etchants)
    cases = []
    for number in range(count):
        alone = etchants[number % len(etchants)] if number % 3 == 0 else None
        sample = maker.sample(number, maker.target_of(number))
        cases.append(Case(sample, maker.random.choice(CONFIDENCES), alone))
    return cases


class _Maker:
    """Makes samples; half of the films are those that something on record is known of."""

    def __init__(self, facts: PlanFacts, source: random.Random) -> None:
        self.random = source
        self.films = sorted(facts.films)
        self.masks = [id for id in self.films if facts.films[id].family in ("resist", "polymer", "nitride", "oxide")]
        self.etches = sorted(facts.etches)
        self.liquids = [id for id, etchant in sorted(facts.etchants.items()) if etchant.state == "liquid"]
        self.etchants = sorted(facts.etchants)
        self.tools = sorted({etch.tool for etch in facts.etches.values()})
        self.facts = facts

    def target_of(self, number: int) -> str:
        """The targets of the recipes in turn, or any film."""
        recipe = self.facts.etches[self.etches[number % len(self.etches)]]
        known = self.random.choice(sorted(recipe.own) or list(recipe.targets))
        return self.random.choice((self.random.choice(recipe.targets), known, self.random.choice(self.films)))

    def sample(self, number: int, target: str) -> SampleFile:
        data: SampleFile = {"sample": f"random-{number}", "layers": self.layers(target)}
        some = self.random.random
        if some() < 0.5:
            data["also_exposed"] = [self.exposed() for _ in range(self.random.randint(1, 3))]
        if some() < 0.6:
            data["back"] = "protected" if some() < 0.5 else self.film(self.any_film())
        if some() < 0.6:
            data["edge"] = self.random.choice(("open", "protected", "unused"))
        if some() < 0.6:
            data["goal"] = self.goal(data["layers"])
        if some() < 0.2:
            data["limits"] = self.limits()
        if some() < 0.2:
            mount = {"carrier": self.random.choice((target, self.any_film())), "bond": self.random.choice(_BONDS)}
            data["mount"] = mount if some() < 0.7 else {"bond": mount["bond"]}
        if some() < 0.15:
            data["temperature"] = self.random.choice(("room", "60 degC", "80 degC", "293.15 K", "20 - 30 degC"))
        if some() < 0.2:
            data["steps"] = self.steps(sum(layer["role"] == "target" for layer in data["layers"]))
        return data

    def layers(self, target: str) -> list[SampleFile]:
        masks = [{**self.film(self.mask()), "role": "mask"} for _ in range(self.random.choice((0, 1, 1, 1, 2)))]
        targets = [{**self.film(target), "role": "target"}]
        if self.random.random() < 0.25:
            targets.append({**self.film(self.any_film()), "role": "target"})
        unders = [
            {**self.film(self.any_film()), "role": "under"} for _ in range(self.random.choice((0, 1, 1, 2, 3)))
        ]
        return [*masks, *targets, *unders]

    def film(self, film: str) -> SampleFile:
        data: SampleFile = {"film": film, "thickness": self.thickness()}
        if self.random.random() < 0.4:
            data["allowed_loss"] = "any" if self.random.random() < 0.2 else self.length(0.1, 200.0)
        if self.random.random() < 0.1:
            data["surface"] = "critical"
        if self.random.random() < 0.2:
            data["on"] = self.random.choice(("none", self.any_film()))
        return data

    def exposed(self) -> SampleFile:
        data = self.film(self.random.choice((self.any_film(), self.random.choice(("au", "pt", "al-si")))))
        if self.random.random() < 0.7:
            data["exposed"] = self.random.choice(("face", "sidewall", "both-faces"))
        return data

    def goal(self, layers: Sequence[SampleFile]) -> SampleFile:
        goal: SampleFile = {}
        if self.random.random() < 0.5:
            goal["line"] = self.length(50.0, 50_000.0)
        if self.random.random() < 0.4:
            goal["load_cm2"] = round(10 ** self.random.uniform(-1, 3), 2)
        goal["depth"] = self.random.choice(("through", "through-wafer", self.length(1.0, 2000.0)))
        return goal

    def limits(self) -> SampleFile:
        choice = self.random.choice
        return choice(
            (
                {"methods": sorted(self.random.sample(_METHODS, 2))},
                {"tools": sorted(self.random.sample(self.tools, min(4, len(self.tools))))},
                {"temperature": choice(("60 degC", "100 degC"))},
                {"etchants": sorted({self.facts.etches[id].etchant for id in self.random.sample(self.etches, 6)})},
            )
        )

    def steps(self, targets: int) -> list[SampleFile]:
        steps: list[SampleFile] = []
        for _ in range(targets):
            steps += [self.treatment() for _ in range(self.random.choice((0, 1, 2)))]
            steps.append({"etch": self.random.choice(("any", "any", self.random.choice(self.etches)))})
        return [*steps, *(self.treatment() for _ in range(self.random.choice((0, 1))))]

    def treatment(self) -> SampleFile:
        treat = self.random.choice(_TREATMENTS)
        step: SampleFile = {"treat": treat}
        if treat != "rinse" or self.random.random() < 0.3:
            step["etchant"] = self.random.choice((self.random.choice(self.liquids), self.random.choice(self.etchants)))
        if self.random.random() < 0.8:
            step["time"] = self.random.choice(("60 s", "2 min", "0.5 h", "10 min"))
        if self.random.random() < 0.5:
            step["temperature"] = self.random.choice(("room", "21 degC", "80 degC"))
        return step

    def any_film(self) -> str:
        return self.random.choice(self.films)

    def mask(self) -> str:
        return self.random.choice((self.random.choice(self.masks), "resist-positive-a", self.any_film()))

    def thickness(self) -> str:
        text = self.length(2.0, 2e6)
        if self.random.random() < 0.3:
            return f"{text} +/- {self.random.choice((1, 2, 5, 10))} %"
        return text

    def length(self, low_nm: float, high_nm: float) -> str:
        value = math.exp(self.random.uniform(math.log(low_nm), math.log(high_nm)))
        unit = self.random.choice(sorted(_UNITS))
        return f"{value / _UNITS[unit]:.4g} {unit}"


def python_answers(facts: PlanFacts, reference: PlanFacts, cases: Sequence[Case]) -> list[Any]:
    """Return what the Python engine says to each case."""
    return [_answer(reference if case.etchant else facts, case) for case in cases]


def _answer(facts: PlanFacts, case: Case) -> Any:
    sample = Sample.from_raw(case.sample, "random.json", Origin.LAB)
    planned: Plan = plan(
        facts,
        plan_sample(sample, facts.defaults),
        sample.steps,
        confidence=case.confidence,
        etchant=case.etchant,
    )
    return [_stage(stage) for stage in planned.stages]


def _stage(stage: StagePlan) -> Any:
    return {
        "step": stage.step,
        "target": stage.target,
        "treat": stage.treat,
        "options": [_option(option) for option in stage.options],
        "excluded": [[one.recipe, one.etchant, one.reason.code] for one in stage.excluded],
    }


def _option(option: Option) -> Any:
    return {
        "recipe": option.recipe,
        "etchant": option.etchant,
        "words": [option.verdict, option.verdict_by_look, option.mode, option.target_rank],
        "flags": [option.proven, option.has_margin],
        "numbers": [
            *_ends(option.target_band),
            *_times(option.schedule),
            *_ends(option.undercut),
            option.phi,
            option.offset_s,
            option.overetch,
        ],
        "rows": [_row(row) for row in option.rows],
        "notes": _codes(option.notes),
        "unstated": _codes(option.unstated),
    }


def _row(row: FilmRow) -> Any:
    allowed = row.allowed_nm
    return {
        "film": [row.film, row.role, row.rank, row.hint, list(row.effects)],
        "words": [row.verdict, row.verdict_by_look, row.ground, row.ground_by_look],
        "caps": _codes(row.caps),
        "lost": None if row.lost is None else row.lost.code,
        "numbers": [
            row.thickness_nm,
            *_ends(row.loss),
            *_ends(row.loss_by_look),
            "any" if allowed is not None and math.isinf(allowed) else allowed,
            _finite(row.spent_nm),
        ],
    }


def _finite(value: float | None) -> float | str | None:
    return "infinite" if value is not None and math.isinf(value) else value


def _codes(remarks: Sequence[Remark]) -> list[str]:
    return [str(remark.code) for remark in remarks]


def _ends(span: Span | RateBand | None) -> Iterator[float | None]:
    yield from (None, None, None) if span is None else (span.low, span.mid, span.high)


def _times(schedule: Schedule) -> Iterator[float | None]:
    yield from (
        schedule.nominal_s,
        schedule.clear_first_s,
        schedule.clear_last_s,
        schedule.first_look_s,
        schedule.latest_stop_s,
    )
