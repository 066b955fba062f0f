"""The records that hang together: those whose every reference, and theirs in turn, leads to a record."""

from __future__ import annotations

from collections.abc import Collection, Mapping, Sequence

from builder.checking.reference_table import REFERENCES, Reference, names_at
from builder.reading.lab_tree import RawFile
from builder.records.samples import ANY_ETCH, NOTHING_UNDER

_ANY_KIND = ("chemicals", "groups", "etchants", "containers")
_MORE: Mapping[str, tuple[Reference, ...]] = {
    "mixing": tuple(Reference((side, "id"), _ANY_KIND) for side in "ab"),
    "samples": (
        Reference(("layers", "*", "film"), ("films",)),
        Reference(("layers", "*", "on"), ("films",)),
        Reference(("also_exposed", "*", "film"), ("films",)),
        Reference(("also_exposed", "*", "on"), ("films",)),
        Reference(("back", "film"), ("films",)),
        Reference(("limits", "tools", "*"), ("tools",)),
        Reference(("limits", "etchants", "*"), ("etchants",)),
        Reference(("steps", "*", "etchant"), ("etchants",)),
        Reference(("steps", "*", "etch"), ("etches",)),
    ),
}
_WORDS = frozenset({ANY_ETCH, NOTHING_UNDER})
"""Words that stand where else an id stands."""


def whole_files(files: Sequence[RawFile]) -> list[RawFile]:
    """
    Return the files that refer to nothing missing, after what refers to a dropped file is dropped too.

    Rules that follow references deep into the records run on these: the fault is reported already.
    """
    kept = list(files)
    while True:
        ids = {(str(file.kind), file.id) for file in kept}
        whole = [file for file in kept if _is_whole(file, ids)]
        if len(whole) == len(kept):
            return whole
        kept = whole


def _is_whole(file: RawFile, ids: Collection[tuple[str, str]]) -> bool:
    kind = str(file.kind)
    for reference in (*REFERENCES.get(kind, ()), *_MORE.get(kind, ())):
        for _, text in names_at(file.raw.data, reference.path):
            name = text.lower() if reference.to == ("codes",) else text
            is_word = text in _WORDS or text.startswith("family:")
            if not is_word and not any((other, name) in ids for other in reference.to):
                return False
    return True
