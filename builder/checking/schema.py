"""One file against the schema of its kind: every fault, at its place, in words."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping, Sequence
from typing import Any, TypeAlias

from jsonschema import ValidationError

from builder.checking.formats import format_fault
from builder.checking.schema_files import FormatError, Schemas, words_of
from builder.problems import Problem, suggestion
from builder.reading.raw import Raw, join_pointer

_Fault: TypeAlias = tuple[str, str, str]
"""Rule, message, hint."""

_TYPES = {
    "object": "a group of fields",
    "array": "a list",
    "string": "text",
    "number": "a number",
    "integer": "a whole number",
    "boolean": "true or false",
}
_BOUNDS = {
    "minimum": "at least",
    "maximum": "at most",
    "exclusiveMinimum": "more than",
    "exclusiveMaximum": "less than",
}
_LONGEST_SHOWN = 60
_MOST_WORDS = 12


def check_shape(kind: str, raw: Raw, schemas: Schemas) -> list[Problem]:
    """
    Return every fault of the file's data against the schema of its kind.

    Values that could not be read have their problem already and are passed over.
    """
    problems: list[Problem] = []
    for error in schemas.validator(kind).iter_errors(raw.data):
        problems += _problems(error, raw, "")
    return problems


def _problems(error: ValidationError, raw: Raw, alternative: str) -> Iterator[Problem]:
    """Yield the problems of one error; `alternative` is what might be written instead."""
    pointer = ""
    for key in error.absolute_path:
        pointer = join_pointer(pointer, key)
    if raw.is_unreadable(pointer):
        return
    keyword = str(error.validator)
    if keyword == "anyOf":
        yield from _closest(error, raw)
    elif keyword == "required":
        yield from _missing(error, raw, pointer)
    elif keyword == "additionalProperties":
        yield from _unknown(error, raw, pointer)
    else:
        rule, message, hint = _fault(keyword, error)
        hint = "; ".join(part for part in (hint, alternative) if part)
        yield raw.problem(pointer, rule, message, hint=hint, at_key=keyword == "propertyNames")


def _closest(error: ValidationError, raw: Raw) -> Iterator[Problem]:
    # Every choice in the schemas is between fixed words and one other thing, which stands last.
    branches = _wanted(error)
    words = [word for branch in branches for word in words_of(branch)]
    alternative = "or write " + " or ".join(f'"{word}"' for word in words)
    for inner in error.context or ():
        if inner.schema_path[0] == len(branches) - 1:
            yield from _problems(inner, raw, alternative)


def _missing(error: ValidationError, raw: Raw, pointer: str) -> Iterator[Problem]:
    # jsonschema names the missing field in its message only; one error comes for each of them.
    name = next(name for name in _wanted(error) if error.message.startswith(repr(name)))
    if not raw.is_unreadable(join_pointer(pointer, name)):
        yield raw.problem(pointer, "missing-field", f'the field "{name}" is missing')


def _unknown(error: ValidationError, raw: Raw, pointer: str) -> Iterator[Problem]:
    assert isinstance(error.instance, Mapping)
    assert isinstance(error.schema, Mapping)
    known = error.schema.get("properties", {})
    for name in error.instance:
        if name not in known:
            child = join_pointer(pointer, name)
            hint = suggestion(name, [other for other in known if other not in error.instance])
            yield raw.problem(child, "unknown-field", f'there is no field "{name}"', hint=hint, at_key=True)


def _wanted(error: ValidationError) -> Any:
    """Return what the broken keyword asks for; its type depends on the keyword."""
    return error.validator_value


def _fault(keyword: str, error: ValidationError) -> _Fault:
    value: Any = error.instance
    wanted = _wanted(error)
    if keyword == "format" and isinstance(error.cause, FormatError):
        return error.cause.rule, error.message, error.cause.hint
    if keyword == "type":
        return _type_fault(value, wanted, _format_of(error))
    if keyword in ("enum", "const"):
        words = [str(word) for word in (wanted if keyword == "enum" else [wanted])]
        message = f"{_shown(value)} is not one of {_listed(words)}"
        return "unknown-word", message, suggestion(str(value), words)
    if keyword == "pattern":
        return _pattern_fault(str(value), wanted)
    if keyword in _BOUNDS:
        return "out-of-range", f"{_shown(value)} must be {_BOUNDS[keyword]} {wanted}", ""
    if keyword == "uniqueItems":
        return "repeated-item", "the list names something twice", ""
    if keyword in ("minLength", "minItems", "minProperties"):
        return "too-short", f"needs at least {wanted} {_counted(keyword, wanted)}", "leave it out if unknown"
    if keyword == "maxItems":
        return "too-long", f"holds {len(value)}, at most {wanted} are allowed", ""
    return "does-not-fit", error.message, ""


def _format_of(error: ValidationError) -> str:
    return str(error.schema.get("format", "")) if isinstance(error.schema, Mapping) else ""


def _type_fault(value: object, wanted: str, form: str) -> _Fault:
    if value is None:
        return "empty-field", f"is empty, {_TYPES[wanted]} belongs here", "leave the field out if unknown"
    if wanted == "string" and isinstance(value, int | float) and not isinstance(value, bool):
        if form.startswith("quantity:") and (fault := format_fault(form, str(value))):
            return fault.rule, fault.message, fault.hint
        hint = "quote it if it is text"
        return "wrong-type", f"{value} is a bare number, text belongs here", hint
    return "wrong-type", f"{_shown(value)} is {_type_of(value)}, {_TYPES[wanted]} belongs here", ""


def _pattern_fault(value: str, pattern: str) -> _Fault:
    if pattern.startswith("^[a-z0-9]+(-"):
        words = "-".join(re.findall(r"[a-z0-9]+", value.lower()))
        hint = f'did you mean "{words}"?' if words else ""
        return "bad-id", f'"{value}" is no id: lower case, digits and single hyphens', hint
    return "bad-spelling", f"{_shown(value)} is not spelled as it must be ({pattern})", ""


def _type_of(value: object) -> str:
    if isinstance(value, bool):
        return "true or false"
    if isinstance(value, str):
        return "text"
    if isinstance(value, Mapping):
        return "a group of fields"
    return "a list" if isinstance(value, list) else "a number"


def _counted(keyword: str, count: int) -> str:
    noun = {"minLength": "letter", "minItems": "entry", "minProperties": "field"}[keyword]
    return noun if count == 1 else {"letter": "letters", "entry": "entries", "field": "fields"}[noun]


def _shown(value: object) -> str:
    if isinstance(value, Mapping | list):
        return "this"
    text = str(value).lower() if isinstance(value, bool) else str(value)
    return f'"{text[:_LONGEST_SHOWN]}..."' if len(text) > _LONGEST_SHOWN else f'"{text}"'


def _listed(words: Sequence[str]) -> str:
    more = "" if len(words) <= _MOST_WORDS else ", ..."
    return ", ".join(words[:_MOST_WORDS]) + more
