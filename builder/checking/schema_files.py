"""The schemas of `schemas/`, one ready validator a kind, made once and used for every file."""

from __future__ import annotations

import json
from collections.abc import Iterator, Mapping, Sequence
from pathlib import Path
from typing import Any, TypeAlias

import jsonschema
import referencing
from jsonschema.protocols import Validator
from jsonschema.validators import extend
from referencing.jsonschema import DRAFT202012

from builder.checking.formats import format_fault
from builder.reading.csv_files import Columns

_Schema: TypeAlias = dict[str, Any]
_ANNOTATIONS = frozenset({"$id", "$schema", "$comment", "title", "description", "examples"})
_DATA_KEYWORDS = frozenset({"enum", "const", "required"})
"""Keywords whose value is data, not a schema."""


class Schemas:
    """The validators by kind, each made when it is first asked for."""

    def __init__(self, folder: Path) -> None:
        self._contents = {path.name: _load(path) for path in sorted(folder.glob("*.schema.json"))}
        resources = ((name, DRAFT202012.create_resource(data)) for name, data in self._contents.items())
        self._registry: referencing.Registry[_Schema] = referencing.Registry().with_resources(resources)
        self._validators: dict[str, Validator] = {}

    @property
    def kinds(self) -> tuple[str, ...]:
        """The kinds that have a schema."""
        names = (name.removesuffix(".schema.json") for name in self._contents)
        return tuple(name for name in names if name != "defs")

    def validator(self, kind: str) -> Validator:
        """Return the validator of a kind; its schema holds no references and no annotations."""
        if kind not in self._validators:
            schema = self.resolved(kind)
            self._validators[kind] = _VALIDATOR(schema)
        return self._validators[kind]

    def resolved(self, kind: str) -> _Schema:
        """Return the schema of a kind with every reference replaced by what it refers to."""
        name = f"{kind}.schema.json"
        resolved = _resolved(self._contents[name], self._registry.resolver(name))
        assert isinstance(resolved, dict)
        return resolved

    def run_columns(self) -> Columns:
        """Return the columns of a run table."""
        row = self._contents["runs.schema.json"]["items"]
        return Columns(tuple(row["properties"]), frozenset(row["required"]))


def _load(path: Path) -> _Schema:
    data = json.loads(path.read_text(encoding="utf-8"))
    assert isinstance(data, dict)
    return data


def _resolved(part: object, resolver: Any) -> object:
    """
    Return the schema with references written out and annotations left out.

    Following a reference anew for each value took half the time of a check.
    """
    if isinstance(part, list):
        return [_resolved(item, resolver) for item in part]
    if not isinstance(part, dict):
        return part
    plain: _Schema = {}
    for keyword, value in part.items():
        if keyword == "$ref":
            found = resolver.lookup(value)
            target = _resolved(found.contents, found.resolver)
            assert isinstance(target, dict)
            plain |= target
        elif keyword == "properties":
            plain[keyword] = {name: _resolved(field, resolver) for name, field in value.items()}
        elif keyword in _DATA_KEYWORDS:
            plain[keyword] = value
        elif keyword not in _ANNOTATIONS and keyword != "$defs":
            plain[keyword] = _resolved(value, resolver)
    return plain


def _format_keyword(
    _validator: object, form: str, value: object, _schema: Mapping[str, object]
) -> Iterator[jsonschema.ValidationError]:
    if isinstance(value, str) and (fault := format_fault(form, value)):
        # The fault rides along as the cause, so that its rule and hint are not lost in a message.
        yield jsonschema.ValidationError(fault.message, cause=FormatError(fault.rule, fault.hint))


class FormatError(Exception):
    """Carries rule and hint of a format fault within jsonschema's error."""

    def __init__(self, rule: str, hint: str) -> None:
        super().__init__(rule)
        self.rule = rule
        self.hint = hint


_VALIDATOR: type[Validator] = extend(  # type: ignore[no-untyped-call]
    jsonschema.Draft202012Validator, {"format": _format_keyword}
)


def words_of(schema: Mapping[str, Any]) -> Sequence[object]:
    """Return the fixed words that a part of a schema allows."""
    if "const" in schema:
        return [schema["const"]]
    words = schema.get("enum", [])
    assert isinstance(words, list)
    return words
