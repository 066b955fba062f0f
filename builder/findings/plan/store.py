"""
The facts of a lab kept beside it between plans, and made anew whenever a record has changed.

The store is a copy that may be deleted at any time: it is used only if every record, schema and
module that it came from still has the size and the time of change that it had then.
"""

from __future__ import annotations

import gc
import hashlib
import json
import os
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from pathlib import Path

from builder.findings.plan.facts import FORMAT, FilmFacts, PlanFacts
from builder.findings.plan.stored import facts_from_plain, plain
from builder.reading.lab_tree import find_shipped
from builder.records.film_names import FilmNames

STORE = Path(".etchwright")
"""Folder of the store within a lab."""


@dataclass(frozen=True)
class FactNames:
    """Everything that a sample may name, from facts alone."""

    facts: PlanFacts
    tools: dict[str, object] = field(default_factory=dict)

    @property
    def films(self) -> Mapping[str, object]:
        """Films and families of films, by id."""
        return self.facts.films

    @property
    def etchants(self) -> Mapping[str, object]:
        """Etchants, by id."""
        return self.facts.etchants

    @property
    def etches(self) -> Mapping[str, object]:
        """Recipes, by id."""
        return self.facts.etches

    @property
    def film_names(self) -> FilmNames:
        """Films by every name."""
        return FilmNames.of_pairs(_pairs(self.facts.films.values()))


def names_of(facts: PlanFacts) -> FactNames:
    """Return what a sample may name."""
    return FactNames(facts, dict(facts.refused))


def load(lab: Path, key: str) -> PlanFacts | None:
    """Return the stored facts of that key, or None if there are none that can be used."""
    collects = gc.isenabled()
    # Nothing of what is read here is rubbish yet, and looking for some takes a third of the time.
    gc.disable()
    try:
        stamp, _, text = (lab / STORE / _name(key)).read_bytes().partition(b"\n")
        return facts_from_plain(json.loads(text)) if stamp == _stamp(key, text) else None
    except Exception:
        # Whatever a spoilt copy or one of another version raises, it is no store: records are at hand.
        return None
    finally:
        if collects:
            gc.enable()


def save(lab: Path, key: str, facts: PlanFacts) -> None:
    """Keep the facts; where the folder cannot be written the next plan computes them again."""
    folder = lab / STORE
    try:
        folder.mkdir(exist_ok=True)
        for old in folder.glob("plan-*.json"):
            old.unlink()
        beside = folder / f"{_name(key)}.{os.getpid()}"
        text = json.dumps(plain(facts)).encode()
        beside.write_bytes(_stamp(key, text) + b"\n" + text)
        beside.replace(folder / _name(key))
    except OSError:
        return


def key_of(lab: Path, as_of: str, confidence: float | None, *, reference_only: bool) -> str:
    """Return one digest of what the facts depend on: records, schemas, our own modules, what is asked."""
    asked = (FORMAT, as_of, confidence, reference_only)
    digest = hashlib.sha256(repr(asked).encode())
    for path in _inputs(lab):
        state = os.stat(path)  # noqa: PTH116 - thousands of files, and a path object for each takes longer
        digest.update(f"{path}\0{state.st_size}\0{state.st_mtime_ns}\n".encode())
    return digest.hexdigest()


def _inputs(lab: Path) -> Iterator[str]:
    shipped = find_shipped()
    package = Path(__file__).resolve().parents[2]
    yield from _files(lab.resolve() / "recipes", (".yaml", ".csv"))
    yield from _files(shipped.reference.resolve(), (".yaml", ".csv"))
    yield from _files(shipped.schemas.resolve(), (".json",))
    for part in ("engine", "records", "findings", "checking", "reading"):
        yield from _files(package / part, (".py",))


def _files(folder: Path, endings: tuple[str, ...]) -> Iterator[str]:
    for root, folders, files in os.walk(folder):
        folders.sort()
        yield from (f"{root}{os.sep}{name}" for name in sorted(files) if name.endswith(endings))


def _pairs(films: Iterable[FilmFacts]) -> list[tuple[str, str]]:
    ordered = sorted(films, key=lambda film: (film.is_family, film.id))
    return [
        *((film.id, name) for film in ordered for name in (film.id, *film.names)),
        *((id, name) for film in ordered for name in film.names[1:] for id in film.members),
        *((film.id, film.formula) for film in ordered if film.formula),
    ]


def _stamp(key: str, text: bytes) -> bytes:
    """What the facts were made for, and a digest that tells whether they are whole."""
    return f"{key} {hashlib.sha256(text).hexdigest()}".encode()


def _name(key: str) -> str:
    return f"plan-{key[:16]}.json"
