"""The names of all rules about records, gathered from the source of the program itself."""

from __future__ import annotations

import ast
import functools
import re
from collections.abc import Iterator
from pathlib import Path

import builder
from builder.checking.rules import RULES, WHOLE_RULES

FOLDER_RULES = frozenset(
    {
        "bad-file-name",
        "file-too-large",
        "no-recipes",
        "no-reference",
        "outside-lab",
        "reference-is-shipped",
        "unknown-file",
        "unknown-folder",
        "unknown-kind",
        "unreadable-file",
    }
)
"""Rules about folders and files as such, which no record can show; `tests/reading` has a test for each."""

_PLACE_OF_NAME = {
    "Problem": 5,
    "problem": 1,
    "_refuse": 2,
    "refuse": 2,
    "ScalarFault": 0,
    "QuantityFault": 0,
    "FaultError": 0,
    "_problem": 1,
    "_error": 1,
    "Rule": 0,
    "_rule": 0,
    "OutlineRule": 0,
    "SampleRule": 0,
}
"""By the function called: which argument is the rule's name."""
_NAME = re.compile(r"[a-z]+(?:-[a-z0-9]+)*")
_NEVER_SHOWN = frozenset({"does-not-fit"})
"""Words for a keyword that no schema uses yet."""


@functools.cache
def rule_names() -> frozenset[str]:
    """Return every rule name that reading, records and checking can report."""
    package = Path(builder.__file__).parent
    names: set[str] = set()
    for folder in ("reading", "records", "checking"):
        for path in sorted((package / folder).rglob("*.py")):
            if path.stem.startswith("rules_safety"):
                continue  # named through the table of rules below
            names.update(_names(ast.parse(path.read_text(encoding="utf-8")), path.name))
    names.update(rule.name for rule in (*RULES, *WHOLE_RULES))
    return frozenset(names - _NEVER_SHOWN)


def _names(tree: ast.Module, file: str) -> Iterator[str]:
    for node in ast.walk(tree):
        if isinstance(node, ast.Call):
            called = getattr(node.func, "id", getattr(node.func, "attr", ""))
            place = _PLACE_OF_NAME.get(called)
            if place is not None and len(node.args) > place:
                yield from _constants(node.args[place])
        elif file == "schema.py" and isinstance(node, ast.Return) and isinstance(node.value, ast.Tuple):
            yield from _constants(node.value.elts[0])
        elif isinstance(node, ast.Assign) and getattr(node.targets[0], "id", "") == "rule":
            yield from _constants(node.value)


def _constants(node: ast.expr) -> Iterator[str]:
    for part in (node.body, node.orelse) if isinstance(node, ast.IfExp) else (node,):
        if isinstance(part, ast.Constant) and isinstance(part.value, str) and _NAME.fullmatch(part.value):
            yield part.value
