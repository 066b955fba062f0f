"""Rules for names: every reference resolves, ids are unique, lists stand in the file of their name."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from pathlib import PurePosixPath

from builder.checking.reference_table import REFERENCES, names_at
from builder.checking.rule import Checked, Fault, Rule
from builder.problems import did_you_mean, suggestion
from builder.records.lab import LabRecords
from builder.records.terms import SideKind

_ID = re.compile(r"[a-z0-9]+(?:-[a-z0-9]+)*")
_FAMILY = "family:"
_LISTS = frozenset({"rates", "compatibility", "runs"})
"""Kinds of list files, of which the lab may have one beside the shipped one."""
_SINGLES = frozenset({"lab", "spread"})
_WORDS = {
    "codes": "code",
    "chemicals": "chemical",
    "containers": "container",
    "etchants": "etchant",
    "etches": "recipe",
    "films": "film",
    "groups": "group",
    "precautions": "precaution",
    "sources": "source",
    "tools": "tool",
}
_SIDES = {
    SideKind.CHEMICAL: "chemicals",
    SideKind.GROUP: "groups",
    SideKind.FILM_GROUP: "groups",
    SideKind.ETCHANT: "etchants",
    SideKind.CONTAINER: "containers",
}


def _unknown_ids(checked: Checked) -> Iterator[Fault]:
    for file, raw in checked.raws.items():
        for reference in REFERENCES.get(checked.kinds[file], ()):
            for pointer, text in names_at(raw.data, reference.path):
                if not _is_known(checked, text, reference.to):
                    yield _unknown(checked.records, file, pointer, text, reference.to)


def _is_known(checked: Checked, text: str, kinds: tuple[str, ...]) -> bool:
    name = text.lower() if kinds == ("codes",) else text
    if text.startswith(_FAMILY) or not _ID.fullmatch(name):
        return True  # a family, or misspelled, which the schema says
    return any(name in records_of(checked.records, kind) or checked.is_broken(kind, name) for kind in kinds)


def records_of(records: LabRecords, kind: str) -> Mapping[str, object]:
    """Return the records of one kind by id."""
    found = getattr(records, kind)
    assert isinstance(found, Mapping)
    return found


def _unknown(records: LabRecords, file: str, pointer: str, text: str, kinds: tuple[str, ...]) -> Fault:
    words = " or ".join(_WORDS[kind] for kind in kinds)
    if kinds == ("films",):
        hint = records.film_names.suggestion(text)
    elif kinds == ("etchants",):
        hint = _etchant_hint(records, text)
    else:
        hint = suggestion(text, [name for kind in kinds for name in records_of(records, kind)])
    return Fault(file, pointer, f'there is no {words} "{text}"', hint)


def _etchant_hint(records: LabRecords, text: str) -> str:
    ids = {
        name: etchant.id
        for etchant in records.etchants.values()
        for name in (etchant.id, etchant.name, *etchant.synonyms)
    }
    name = did_you_mean(text, ids)
    return "" if name is None else f'did you mean "{ids[name]}"?'


def _unknown_sides(checked: Checked) -> Iterator[Fault]:
    for rule in checked.records.mixing.values():
        for key, side in (("/a", rule.a), ("/b", rule.b)):
            kind = _SIDES.get(side.kind)
            if side.id is None or kind is None or _is_known(checked, side.id, (kind,)):
                continue
            yield _unknown(checked.records, rule.file, f"{key}/id", side.id, (kind,))


def _unknown_recipes(checked: Checked) -> Iterator[Fault]:
    for name, runs in checked.records.runs.items():
        if runs and not _is_known(checked, name, ("etches",)):
            hint = suggestion(name, checked.records.etches)
            yield Fault(
                runs[0].file, "", f'there is no recipe "{name}" that these runs could belong to', hint
            )


def _sides_without_name(checked: Checked) -> Iterator[Fault]:
    for rule in checked.records.mixing.values():
        for key, side in (("/a", rule.a), ("/b", rule.b)):
            if (side.id is None) == (side.text is None):
                yield Fault(rule.file, key, "a side has either an id or a text")


def _duplicate_ids(checked: Checked) -> Iterator[Fault]:
    first: dict[tuple[str, str], str] = {}
    for file in sorted(checked.raws, key=lambda file: ("/reference/" not in file, file)):
        kind = checked.kinds[file]
        key = (kind, PurePosixPath(file).stem)
        if kind not in _LISTS | _SINGLES and key in first:
            hint = "give the lab's own record another id"
            yield Fault(file, "", f'the id "{key[1]}" is taken by {first[key]}', hint)
        first.setdefault(key, file)


def _file_names(checked: Checked) -> Iterator[Fault]:
    for file, raw in checked.raws.items():
        if checked.kinds[file] not in ("rates", "compatibility"):
            continue
        stem = PurePosixPath(file).stem
        for pointer, etchant in names_at(raw.data, ("etchant",)):
            if etchant != stem:
                words = f'the list of "{etchant}" stands in the file of "{stem}"'
                yield Fault(file, pointer, words, f'name the file "{etchant}.yaml"')


def _codes(checked: Checked) -> Iterator[Fault]:
    for code in checked.records.codes.values():
        if code.code.lower().replace(" ", "-") != code.id:
            words = f'the code "{code.code}" stands in the file of "{code.id}"'
            yield Fault(code.file, "/code", words)


RULES: tuple[Rule, ...] = (
    Rule("unknown-id", _unknown_ids),
    Rule("unknown-id", _unknown_sides),
    Rule("unknown-id", _unknown_recipes),
    Rule("unclear-side", _sides_without_name),
    Rule("duplicate-id", _duplicate_ids),
    Rule("wrong-file-name", _file_names),
    Rule("wrong-file-name", _codes),
)
