"""Random samples, made so that much of what a recipe knows comes up and all four words are common."""

from __future__ import annotations

import math
import random
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any

from builder.findings.plan.facts import EtchFacts, PlanFacts

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


def recipe_cases(facts: PlanFacts, count: int, seed: int) -> list[Case]:
    """Return cases for every recipe of the facts in turn."""
    maker = _Maker(facts, random.Random(seed))
    etches = sorted(facts.etches)
    return [maker.case(number, facts.etches[etches[number % len(etches)]]) for number in range(count)]


def etchant_cases(facts: PlanFacts, count: int, seed: int) -> list[Case]:
    """Return cases for every etchant of the facts in turn, each asked alone."""
    maker = _Maker(facts, random.Random(seed))
    etchants = sorted(facts.etchants)
    return [maker.case_alone(number, etchants[number % len(etchants)]) for number in range(count)]


class _Maker:
    """Makes samples; two films of three are those that the recipe or the etchant in question knows."""

    def __init__(self, facts: PlanFacts, source: random.Random) -> None:
        self.facts = facts
        self.random = source
        self.films = sorted(facts.films)
        self.etches = sorted(facts.etches)
        self.tools = sorted({etch.tool for etch in facts.etches.values()})
        self.etchants = sorted(facts.etchants)
        self.known: list[str] = self.films
        self.masks: list[str] = self.films

    def case(self, number: int, recipe: EtchFacts) -> Case:
        self.know(recipe.etchant, recipe)
        target = self.random.choice((*recipe.targets, self.a_film()))
        return Case(self.sample(f"random-{number}", target), self.random.choice(CONFIDENCES), None)

    def case_alone(self, number: int, etchant: str) -> Case:
        self.know(etchant, None)
        sample = self.sample(f"random-alone-{number}", self.a_film())
        return Case(sample, self.random.choice(CONFIDENCES), etchant)

    def know(self, etchant: str, recipe: EtchFacts | None) -> None:
        """Choose the films that are asked for most of all from now on."""
        published = self.facts.etchants[etchant]
        own = [] if recipe is None else [*recipe.own, *recipe.targets]
        self.known = sorted({*own, *published.rows, *published.said} & set(self.films)) or self.films
        held = [] if recipe is None else [mask.film for mask in recipe.masks]
        self.masks = sorted(held) or self.known

    def sample(self, name: str, target: str) -> SampleFile:
        data: SampleFile = {"sample": name, "layers": self.layers(target)}
        some = self.random.random
        if some() < 0.35:
            data["also_exposed"] = [self.exposed() for _ in range(self.random.randint(1, 2))]
        if some() < 0.8:
            data["back"] = "protected" if some() < 0.7 else self.film(self.a_film(), 50, 1000)
        if some() < 0.8:
            data["edge"] = self.random.choice(("open", "protected", "protected", "unused"))
        if some() < 0.5:
            data["goal"] = self.goal()
        if some() < 0.15:
            data["limits"] = self.limits()
        if some() < 0.2:
            data["mount"] = self.mount(target)
        if some() < 0.15:
            data["temperature"] = self.random.choice(("room", "60 degC", "80 degC", "293.15 K", "160 degC"))
        if some() < 0.2:
            data["steps"] = self.steps(sum(layer["role"] == "target" for layer in data["layers"]))
        return data

    def layers(self, target: str) -> list[SampleFile]:
        masks = [
            {**self.film(self.random.choice((*self.masks, self.a_film())), 300, 5000), "role": "mask"}
            for _ in range(self.random.choice((0, 1, 1, 1, 1, 2)))
        ]
        targets = [{**self.film(target, 10, 3000), "role": "target"}]
        if self.random.random() < 0.2:
            targets.append({**self.film(self.a_film(), 5, 300), "role": "target"})
        unders = [
            {**self.film(self.a_film(), 10, 600_000), "role": "under"}
            for _ in range(self.random.choice((0, 1, 1, 1, 2)))
        ]
        return [*masks, *targets, *unders]

    def film(self, film: str, low_nm: float, high_nm: float) -> SampleFile:
        length = self.length(low_nm, high_nm)
        data: SampleFile = {"film": film, "thickness": length}
        if self.random.random() < 0.3:
            data["thickness"] = f"{length} +/- {self.random.choice((1, 2, 5, 10))} %"
        if self.random.random() < 0.4:
            data["allowed_loss"] = "any" if self.random.random() < 0.2 else self.length(0.3, 500.0)
        if self.random.random() < 0.1:
            data["surface"] = "critical"
        if self.random.random() < 0.2:
            data["on"] = self.random.choice(("none", self.a_film()))
        return data

    def exposed(self) -> SampleFile:
        data = self.film(self.random.choice((self.a_film(), self.a_film(), "au", "pt", "al-si")), 20, 2000)
        if self.random.random() < 0.7:
            data["exposed"] = self.random.choice(("face", "sidewall", "both-faces"))
        return data

    def goal(self) -> SampleFile:
        goal: SampleFile = {
            "depth": self.random.choice(("through", "through-wafer", self.length(5.0, 2000.0)))
        }
        if self.random.random() < 0.5:
            goal["line"] = self.length(500.0, 50_000.0)
        if self.random.random() < 0.4:
            goal["load_cm2"] = round(10 ** self.random.uniform(-1, 3), 2)
        return goal

    def limits(self) -> SampleFile:
        few = min(4, len(self.tools))
        choices = (
            {"methods": sorted(self.random.sample(_METHODS, 3))},
            {"tools": sorted(self.random.sample(self.tools, few))} if few else {},
            {"temperature": self.random.choice(("60 degC", "100 degC"))},
            {"etchants": sorted(self.random.sample(self.etchants, 30))},
        )
        return self.random.choice(choices)

    def mount(self, target: str) -> SampleFile:
        bond = {"bond": self.random.choice(_BONDS)}
        return (
            {**bond, "carrier": self.random.choice((target, self.a_film()))}
            if self.random.random() < 0.7
            else bond
        )

    def steps(self, targets: int) -> list[SampleFile]:
        steps: list[SampleFile] = []
        for _ in range(targets):
            steps += [self.treatment() for _ in range(self.random.choice((0, 1, 2)))]
            steps.append({"etch": self.random.choice(("any", "any", *self.etches[:2]))})
        return [*steps, *(self.treatment() for _ in range(self.random.choice((0, 1))))]

    def treatment(self) -> SampleFile:
        step: SampleFile = {"treat": self.random.choice(_TREATMENTS)}
        if step["treat"] != "rinse" or self.random.random() < 0.3:
            step["etchant"] = self.random.choice(self.etchants)
        if self.random.random() < 0.8:
            step["time"] = self.random.choice(("60 s", "2 min", "0.5 h", "10 min"))
        if self.random.random() < 0.5:
            step["temperature"] = self.random.choice(("room", "21 degC", "80 degC"))
        return step

    def a_film(self) -> str:
        pool: Sequence[str] = self.known if self.random.random() < 0.67 else self.films
        return self.random.choice(pool)

    def length(self, low_nm: float, high_nm: float) -> str:
        value = math.exp(self.random.uniform(math.log(low_nm), math.log(high_nm)))
        unit = self.random.choice(sorted(_UNITS))
        return f"{value / _UNITS[unit]:.4g} {unit}"
