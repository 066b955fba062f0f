"""The schemas are the reference people read: every field explains itself, and its examples are valid."""

from __future__ import annotations

import json
from collections.abc import Iterator
from typing import Any

import jsonschema
import pytest
import referencing
from jsonschema.protocols import Validator
from referencing.jsonschema import DRAFT202012

from builder.checking.formats import format_fault
from builder.checking.schema_files import Schemas
from builder.reading.lab_tree import Kind, find_shipped

FOLDER = find_shipped().schemas
RECORDS = Schemas(FOLDER)
FILES = sorted(path.name for path in FOLDER.glob("*.json"))
CONTENTS = {name: json.loads((FOLDER / name).read_text(encoding="utf-8")) for name in FILES}
REGISTRY: referencing.Registry[Any] = referencing.Registry().with_resources(
    (name, DRAFT202012.create_resource(content)) for name, content in CONTENTS.items()
)
FEWEST_WORDS = 2


def parts(name: str) -> Iterator[tuple[str, dict[str, Any]]]:
    """Yield pointer and schema of every property and every shared definition of a file."""
    waiting: list[tuple[str, Any]] = [("", CONTENTS[name])]
    while waiting:
        pointer, part = waiting.pop()
        if isinstance(part, list):
            waiting += [(f"{pointer}/{index}", item) for index, item in enumerate(part)]
        if not isinstance(part, dict):
            continue
        for keyword in ("properties", "$defs"):
            for field, schema in part.get(keyword, {}).items():
                yield f"{pointer}/{keyword}/{field}", schema
                waiting.append((f"{pointer}/{keyword}/{field}", schema))
        for keyword in ("items", "additionalProperties", "anyOf", "oneOf", "allOf"):
            waiting.append((f"{pointer}/{keyword}", part.get(keyword)))


def objects(name: str) -> Iterator[tuple[str, dict[str, Any]]]:
    """Yield every part of a file that has named fields."""
    waiting: list[tuple[str, Any]] = [("", CONTENTS[name])]
    while waiting:
        pointer, part = waiting.pop()
        if isinstance(part, dict):
            if "properties" in part and isinstance(part["properties"], dict) and "type" in part:
                yield pointer, part
            waiting += [(f"{pointer}/{key}", value) for key, value in part.items() if key != "examples"]
        elif isinstance(part, list):
            waiting += [(f"{pointer}/{index}", value) for index, value in enumerate(part)]


@pytest.mark.parametrize("name", FILES)
def test_every_schema_is_a_schema(name: str) -> None:
    """By the schema of schemas."""
    jsonschema.Draft202012Validator.check_schema(CONTENTS[name])
    assert CONTENTS[name]["title"]
    assert CONTENTS[name]["description"]


@pytest.mark.parametrize("name", FILES)
def test_every_field_has_a_title_a_description_and_examples(name: str) -> None:
    """A field that nobody explains is filled in by guess."""
    faults = [
        pointer
        for pointer, schema in parts(name)
        if not schema.get("title")
        or len(schema.get("description", "").split()) < FEWEST_WORDS
        or not schema.get("examples")
    ]
    assert faults == []


@pytest.mark.parametrize("name", FILES)
def test_every_example_is_valid(name: str) -> None:
    """An example that the check refuses teaches the fault."""
    base = RECORDS.validator("films").evolve(schema={}, registry=REGISTRY)
    faults = []
    for pointer, schema in [("", CONTENTS[name]), *parts(name)]:
        resolver = REGISTRY.resolver(name)
        for example in schema.get("examples", []):
            validator: Validator = base.evolve(schema=schema, _resolver=resolver)
            faults += [f"{pointer}: {error.message}" for error in validator.iter_errors(example)]
    assert faults == []


@pytest.mark.parametrize("name", FILES)
def test_no_object_takes_a_field_it_does_not_name(name: str) -> None:
    """A misspelt field would else be lost without a word."""
    assert [pointer for pointer, part in objects(name) if part.get("additionalProperties") is not False] == []


@pytest.mark.parametrize("name", FILES)
def test_every_format_is_known(name: str) -> None:
    """An unknown format would check nothing."""
    formats = [schema["format"] for _, schema in parts(name) if "format" in schema]
    for form in formats:
        format_fault(form, "x")
    with pytest.raises(ValueError, match="format"):
        format_fault("quantity-of-length", "x")


def test_every_kind_of_record_has_a_schema() -> None:
    """And every schema a kind."""
    assert set(RECORDS.kinds) == {str(kind) for kind in Kind}
