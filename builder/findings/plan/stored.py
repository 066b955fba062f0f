"""The facts of a plan as plain data: for the store beside a lab, and for the planner in the browser."""

from __future__ import annotations

import dataclasses
import enum
from collections.abc import Mapping
from typing import cast

from builder.findings.plan.facts import PlanFacts
from builder.records.conversion import Data, from_data


def plain(value: object) -> object:
    """
    Return a fact as JSON-like data; a field that has its default is left out of its object.

    Reading fills the gap with the same default, so nothing is lost.
    """
    if dataclasses.is_dataclass(value) and not isinstance(value, type):
        fields = ((field, getattr(value, field.name)) for field in dataclasses.fields(value))
        return {field.name: plain(item) for field, item in fields if not _is_default(field, item)}
    if isinstance(value, enum.Enum):
        return value.value
    if isinstance(value, Mapping):
        return {str(key): plain(item) for key, item in value.items()}
    if isinstance(value, (tuple, list)):
        return [plain(item) for item in value]
    return value


def facts_from_plain(data: object) -> PlanFacts:
    """Return the facts that `plain` wrote."""
    return from_data(PlanFacts, cast(Data, data))


def _is_default(field: dataclasses.Field[object], item: object) -> bool:
    if field.default_factory is not dataclasses.MISSING:
        return bool(item == field.default_factory())
    return field.default is not dataclasses.MISSING and item == field.default
