"""The schemas and the dataclasses say the same: same fields, same words, same obligations."""

from __future__ import annotations

import dataclasses
import enum
import types
import typing
from collections.abc import Mapping
from typing import Annotated, Any

import pytest

from builder.checking.schema_files import Schemas
from builder.reading.lab_tree import find_shipped
from builder.records.chemicals import Chemical
from builder.records.conversion import field_keys
from builder.records.etchants import Etchant
from builder.records.etches import Etch
from builder.records.films import Film
from builder.records.published import Couple, Hint, PublishedRate, Statement
from builder.records.references import Product, RateConstant, Source
from builder.records.runs import Run
from builder.records.safety import Container, GhsCode, Group, MixingRule, PlasmaHazard, Precaution
from builder.records.settings import LabSettings, SpreadRecord
from builder.records.tools import Tool

SCHEMAS = Schemas(find_shipped().schemas)
NOT_IN_FILE = frozenset({"id", "file", "origin", "pointer", "etch"})
"""Given by the place of the file."""


def part(kind: str, *path: str) -> dict[str, Any]:
    """Return a part of a kind's schema, references written out."""
    schema = SCHEMAS.resolved(kind)
    for step in path:
        schema = schema[step]
    return schema


CASES: dict[str, tuple[type[Any], dict[str, Any]]] = {
    "chemicals": (Chemical, part("chemicals")),
    "codes": (GhsCode, part("codes")),
    "constants": (RateConstant, part("constants")),
    "containers": (Container, part("containers")),
    "couples": (Couple, part("couples")),
    "etchants": (Etchant, part("etchants")),
    "etches": (Etch, part("etches")),
    "films": (Film, part("films")),
    "groups": (Group, part("groups")),
    "hazards": (PlasmaHazard, part("hazards")),
    "mixing": (MixingRule, part("mixing")),
    "precautions": (Precaution, part("precautions")),
    "products": (Product, part("products")),
    "sources": (Source, part("sources")),
    "tools": (Tool, part("tools")),
    "spread": (SpreadRecord, part("spread")),
    "lab": (LabSettings, part("lab")),
    "rates": (PublishedRate, part("rates", "properties", "rates", "items")),
    "statements": (Statement, part("compatibility", "properties", "statements", "items")),
    "hints": (Hint, part("compatibility", "properties", "hints", "items")),
    "runs": (Run, part("runs", "items")),
}
LISTED = frozenset({"rates", "statements", "hints"})
SHIPPED_DEFAULTS = frozenset({"lab"})
"""Its obligations are met by the shipped settings, so the schema asks for less than the dataclass."""


@pytest.mark.parametrize("name", CASES)
def test_every_field_is_in_both(name: str) -> None:
    """A field that only the schema knows would be read and lost."""
    cls, schema = CASES[name]
    outside = NOT_IN_FILE | ({"etchant"} if name in LISTED else set())
    assert compare_fields(cls, schema, name in SHIPPED_DEFAULTS, outside) == len(schema["properties"]) > 0


def compare_fields(
    cls: type[Any], schema: Mapping[str, Any], may_lack: bool, outside: set[str] | frozenset[str]
) -> int:
    """Compare names, obligations, words, and the objects within; return how many fields were compared."""
    keys = field_keys(cls)
    fields = {keys[field.name]: field for field in dataclasses.fields(cls) if field.name not in outside}
    assert set(fields) == set(schema["properties"]), cls
    required = {
        key
        for key, field in fields.items()
        if field.default is dataclasses.MISSING and field.default_factory is dataclasses.MISSING
    }
    asked = set(schema.get("required", []))
    assert may_lack or required <= asked, cls
    hints = typing.get_type_hints(cls, include_extras=True)
    compared = 0
    for attribute, key in keys.items():
        if attribute not in outside:
            compare_types(hints[attribute], schema["properties"][key], may_lack)
            compared += 1
    return compared


def compare_types(hint: Any, schema: Mapping[str, Any], may_lack: bool) -> None:
    """Compare one field: enum words, inner objects, entries of lists and mappings."""
    origin, arguments = typing.get_origin(hint), typing.get_args(hint)
    if origin is Annotated:
        compare_types(arguments[0], schema, may_lack)
    elif origin in (typing.Union, types.UnionType):
        inner = [argument for argument in arguments if argument is not type(None)]
        compare_types(inner[0], schema, may_lack)
    elif origin is tuple:
        compare_types(arguments[0], schema["items"], may_lack)
    elif origin is Mapping:
        compare_types(arguments[1], schema["additionalProperties"], may_lack)
    elif isinstance(hint, type) and issubclass(hint, enum.Enum):
        assert [member.value for member in hint] == schema["enum"], hint
    elif dataclasses.is_dataclass(hint) and "properties" in schema:
        compare_fields(hint, schema, may_lack, frozenset())


def test_every_kind_with_a_schema_is_compared() -> None:
    """Samples have a reading of their own, tested there."""
    compared = set(CASES) - {"statements", "hints"} | {"compatibility", "samples"}
    assert compared == set(SCHEMAS.kinds)
