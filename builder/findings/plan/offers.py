"""Which etches are offered for a target, in which order, and why the others are not."""

from __future__ import annotations

from collections.abc import Iterator

from builder.engine import Rank
from builder.findings.plan.evidence import Asked, Etching, Evidence, evidence, matches
from builder.findings.plan.facts import EtchFacts, PlanFacts
from builder.findings.plan.option import gas_facts, plan_option
from builder.findings.plan.result import Excluded, ExcludedCode, Option, Remark
from builder.findings.plan.sample import PlanSample, Stage
from builder.records.terms import Status


def offers(
    facts: PlanFacts, stage: Stage, asked: Asked, only: str | None = None
) -> tuple[tuple[Option, ...], tuple[Excluded, ...]]:
    """
    Return the options for a stage, best first, and what is left out.

    `only` names the one recipe that a sequence asks for; it is excluded as any other where it must be.
    """
    options: list[Option] = []
    excluded: list[Excluded] = []
    for recipe in facts.etches.values():
        if only is not None and recipe.id != only:
            continue
        etching = Etching(facts.etchants[recipe.etchant], recipe)
        reason = _reason(facts, etching, recipe, stage, asked)
        if reason is None:
            options.append(plan_option(facts, etching, stage, asked))
        else:
            excluded.append(Excluded(recipe.id, recipe.etchant, reason))
    return tuple(sorted(options, key=order)), tuple(excluded)


def etchant_offer(facts: PlanFacts, stage: Stage, asked: Asked, etchant: str) -> Option:
    """Return the one option of an etchant alone, even where nothing tells its time."""
    return plan_option(facts, Etching(facts.etchants[etchant], None), stage, asked)


def order(option: Option) -> tuple[int, bool, bool, int, float, str, str]:
    """Order of options: word, margin, proven here, lesser hazard, time; ids break a tie."""
    stop = option.schedule.latest_stop_s
    return (
        option.verdict.order,
        not option.has_margin,
        not option.proven,
        option.hazard,
        float("inf") if stop is None else stop,
        option.recipe or "",
        option.etchant,
    )


def _reason(
    facts: PlanFacts, etching: Etching, recipe: EtchFacts, stage: Stage, asked: Asked
) -> Remark | None:
    """Return the first reason to leave a recipe out, or None."""
    known = evidence(facts, etching, stage.target.film, asked)
    if known.rank in (Rank.NONE, Rank.SIMILAR):
        return Remark(ExcludedCode.NO_EVIDENCE, {"film": stage.target.film, "hint": known.hint})
    if not _says_that_it_etches(known):
        return Remark(ExcludedCode.DOES_NOT_ETCH, {"film": stage.target.film})
    return next(_other_reasons(facts, etching, recipe, stage.sample, asked), None)


def _says_that_it_etches(known: Evidence) -> bool:
    """A target needs a number that is more than an upper limit, or a statement that it is attacked."""
    return known.attacked or (known.band is not None and (known.band.mid is not None or known.band.low > 0))


def _other_reasons(
    facts: PlanFacts, etching: Etching, recipe: EtchFacts, sample: PlanSample, asked: Asked
) -> Iterator[Remark]:
    if recipe.status is Status.RETIRED:
        yield Remark(ExcludedCode.RETIRED)
    exposed = sorted(sample.exposed, key=lambda film: film.film)  # the order of listing is no reason
    for film in [*sample.layers, *exposed, *([sample.back] if sample.back else [])]:
        words = facts.refused[recipe.tool].get(film.film)
        if words is not None:
            yield Remark(ExcludedCode.TOOL_REFUSES, {"film": film.film, "words": words})
    if sample.methods and str(recipe.method) not in sample.methods:
        yield Remark(ExcludedCode.METHOD, {"method": str(recipe.method)})
    if sample.tools and recipe.tool not in sample.tools:
        yield Remark(ExcludedCode.TOOL, {"tool": recipe.tool})
    if sample.etchants and recipe.etchant not in sample.etchants:
        yield Remark(ExcludedCode.ETCHANT, {"etchant": recipe.etchant})
    hot = recipe.temperature
    if hot is not None and sample.hottest_k is not None and hot.high > sample.hottest_k:
        yield Remark(ExcludedCode.TOO_HOT, {"recipe_k": hot.high, "limit_k": sample.hottest_k})
    if asked.temperature_k is not None and hot is not None and not matches(hot, asked.temperature_k):
        yield Remark(
            ExcludedCode.OTHER_TEMPERATURE, {"recipe_k": hot.high, "asked_k": asked.temperature_k.high}
        )
    for words in recipe.forbidden:
        yield Remark(ExcludedCode.SAFETY, {"words": words})
    for fact in gas_facts(etching, sample, facts.bond_words):
        if fact.forbidden:
            yield Remark(ExcludedCode.SAFETY, {"words": fact.words})
