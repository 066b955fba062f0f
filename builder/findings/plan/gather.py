"""The facts of a plan, gathered from the records of a lab."""

from __future__ import annotations

import datetime
from collections.abc import Mapping, Sequence
from typing import TypeVar

from builder.findings.plan.defaults import defaults_of
from builder.findings.plan.facts import FORMAT, CoupleFact, FilmFacts, PlanFacts
from builder.findings.plan.gather_etchants import etchant_facts
from builder.findings.plan.gather_recipes import etch_facts
from builder.findings.plan.gather_safety import BOND_PATTERN, meetings_of_steps
from builder.records.films import Film
from builder.records.lab import LabRecords
from builder.records.published import PublishedRate, Statement
from builder.records.terms import Origin
from builder.records.tools import Tool

LEVELS = (0.80, 0.90, 0.95, 0.99)
"""Two-sided confidences at which intervals are stored."""

E = TypeVar("E", PublishedRate, Statement)


def gather(records: LabRecords, today: datetime.date, extra_levels: Sequence[float] = ()) -> PlanFacts:
    """Return the facts of a lab; its own confidence and `extra_levels` are added to the stored ones."""
    levels = tuple(sorted({*LEVELS, records.settings.confidence, *extra_levels}))
    return PlanFacts(
        format=FORMAT,
        as_of=today.isoformat(),
        defaults=defaults_of(records.settings),
        films={id: _film(film) for id, film in sorted(records.films.items())},
        etchants={id: etchant_facts(records, etchant) for id, etchant in sorted(records.etchants.items())},
        etches={id: etch_facts(records, etch, levels, today) for id, etch in sorted(records.etches.items())},
        refused={id: _refused(records, tool) for id, tool in sorted(records.tools.items())},
        couples=tuple(
            CoupleFact(
                films=couple.films, etchants=couple.etchants, effect=couple.effect, words=couple.words,
                source=couple.source, affects=couple.affects,
            )
            for _, couple in sorted(records.couples.items())
        ),
        meetings=meetings_of_steps(records),
        bond_words=BOND_PATTERN,
    )  # fmt: skip


def reference_only(records: LabRecords) -> LabRecords:
    """
    Return the records with no fact of the lab's own left: for answers that rest on publications alone.

    The lab's settings and its definitions of films stay; its etchants stay as names without facts.
    """
    return LabRecords(
        settings=records.settings,
        sources=records.sources,
        films=records.films,
        chemicals=records.chemicals,
        etchants=records.etchants,
        rates=_shipped(records.rates),
        statements=_shipped(records.statements),
        couples={id: c for id, c in records.couples.items() if c.origin is Origin.REFERENCE},
        mixing={id: m for id, m in records.mixing.items() if m.origin is Origin.REFERENCE},
        groups=records.groups,
        containers=records.containers,
        codes=records.codes,
        precautions=records.precautions,
        hazards=records.hazards,
        film_names=records.film_names,
    )


def _shipped(facts: Mapping[str, tuple[E, ...]]) -> dict[str, tuple[E, ...]]:
    return {
        id: tuple(fact for fact in entries if fact.origin is Origin.REFERENCE)
        for id, entries in facts.items()
    }


def _film(film: Film) -> FilmFacts:
    return FilmFacts(
        id=film.id, name=film.name, family=film.family, is_family=film.is_family, members=film.members,
        barrier=film.barrier, electrical=film.electrical, noble=bool(film.noble), similar=film.similar,
        adhesion=film.adhesion_layer_usual,
        names=(film.name, *film.synonyms), formula=film.formula or "",
    )  # fmt: skip


def _refused(records: LabRecords, tool: Tool) -> dict[str, str]:
    return {id: why for id, film in sorted(records.films.items()) if (why := tool.refusal(film)) is not None}
