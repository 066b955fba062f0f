"""Every rule across records, by subject; a new module of rules adds its tuple here."""

from __future__ import annotations

from builder.checking import (
    rules_chemistry,
    rules_films,
    rules_published,
    rules_recipe_tools,
    rules_recipes,
    rules_references,
    rules_runs,
    rules_safety,
    rules_samples,
    rules_tools,
)
from builder.checking.rule import Rule

RULES: tuple[Rule, ...] = (
    *rules_references.RULES,
    *rules_films.RULES,
    *rules_chemistry.RULES,
    *rules_published.RULES,
    *rules_tools.RULES,
    *rules_recipes.RULES,
    *rules_recipe_tools.RULES,
    *rules_runs.RULES,
    *rules_samples.RULES,
)
"""Run on all records of the right shape, also where a reference leads nowhere."""

WHOLE_RULES: tuple[Rule, ...] = (*rules_safety.RULES,)
"""Run on the records that hang together; these rules may follow any reference without asking."""
