"""The folders of a lab and of the shipped reference: which file is which record."""

from __future__ import annotations

import enum
import re
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from pathlib import Path

from builder.problems import Problem, Severity, suggestion
from builder.reading.csv_files import Columns, read_csv
from builder.reading.raw import Raw
from builder.reading.yaml_files import read_yaml


class Kind(enum.StrEnum):
    """The kinds of records; the value is the folder's name (`lab` and `spread`: the file's)."""

    CHEMICALS = "chemicals"
    CODES = "codes"
    COMPATIBILITY = "compatibility"
    CONSTANTS = "constants"
    CONTAINERS = "containers"
    COUPLES = "couples"
    ETCHANTS = "etchants"
    ETCHES = "etches"
    FILMS = "films"
    GROUPS = "groups"
    HAZARDS = "hazards"
    LAB = "lab"
    MIXING = "mixing"
    PRECAUTIONS = "precautions"
    PRODUCTS = "products"
    RATES = "rates"
    RUNS = "runs"
    SAMPLES = "samples"
    SOURCES = "sources"
    SPREAD = "spread"
    TOOLS = "tools"


class Origin(enum.StrEnum):
    """Whose record it is: a published fact that comes with the program, or the lab's own."""

    REFERENCE = "reference"
    LAB = "lab"


RECIPES = "recipes"
"""Name of the folder of records in a lab."""

_SINGLE_FILES = {"lab.yaml": Kind.LAB, "spread.yaml": Kind.SPREAD}
_FOLDERS = frozenset(str(kind) for kind in Kind if kind not in _SINGLE_FILES.values())
_ID = re.compile(r"[a-z0-9]+(?:-[a-z0-9]+)*")
_READABLE_BY_PEOPLE = frozenset({"README.md", "README.txt", "LICENSE"})


@dataclass(frozen=True)
class Shipped:
    """Where the published records and the schemas stand that come with the program."""

    reference: Path
    schemas: Path


@dataclass(frozen=True)
class RawFile:
    """One file of records: kind, id (the file's stem), whose it is, and its data."""

    kind: Kind
    id: str
    origin: Origin
    raw: Raw


@dataclass(frozen=True)
class LabFiles:
    """
    All files of a lab and of the reference, ordered by kind, id and origin, with the problems met.

    `unread` holds kind and id of files that gave no data at all.
    """

    files: tuple[RawFile, ...]
    problems: tuple[Problem, ...]
    unread: tuple[tuple[str, str], ...] = ()

    def of_kind(self, kind: Kind) -> tuple[RawFile, ...]:
        """Return the files of one kind, ordered by id."""
        return tuple(file for file in self.files if file.kind is kind)


@dataclass(frozen=True)
class _Found:
    """A file to be read: its kind, its path, and the name shown for it."""

    kind: Kind
    path: Path
    file: str


def find_shipped() -> Shipped:
    """
    Return where the reference and the schemas stand: within an installed package, else beside it.

    Raises
    ------
    FileNotFoundError
        The installation is incomplete.
    """
    package = Path(__file__).resolve().parent.parent
    for root in (package / "_data", package.parent):
        shipped = Shipped(root / RECIPES / "reference", root / "schemas")
        if shipped.schemas.is_dir():
            return shipped
    raise FileNotFoundError(f"no schemas in {package}, nor beside it; install the package again")


def read_lab(lab: Path | None, *, columns: Columns | None = None, shipped: Shipped | None = None) -> LabFiles:
    """
    Read every record of the lab in folder `lab`, and every shipped one; without `lab` these alone.

    `columns` are those of a run table. The reference is always read from the shipped place; a copy
    of it in the lab would drift apart unseen, so a different one is an error.
    """
    shipped = find_shipped() if shipped is None else shipped
    problems: list[Problem] = []
    found: list[tuple[Origin, _Found]] = []
    for origin, walk in (
        (Origin.REFERENCE, _reference_files(shipped)),
        (Origin.LAB, () if lab is None else _lab_files(lab, shipped)),
    ):
        for item in walk:
            if isinstance(item, Problem):
                problems.append(item)
            else:
                found.append((origin, item))
    files = []
    unread = []
    for origin, item in found:
        if item.kind is Kind.RUNS:
            raw, faults = read_csv(item.path, item.file, columns)
        else:
            raw, faults = read_yaml(item.path, item.file)
        problems += faults
        if raw is not None:
            files.append(RawFile(item.kind, item.path.stem, origin, raw))
        else:
            unread.append((str(item.kind), item.path.stem))
    files.sort(key=lambda file: (file.kind, file.id, file.origin))
    return LabFiles(tuple(files), tuple(problems), tuple(unread))


def _reference_files(shipped: Shipped) -> Iterator[_Found | Problem]:
    # An installer may link files from its store, so links are no fault here.
    if shipped.reference.is_dir():
        yield from _records(shipped.reference, f"{RECIPES}/reference", None)
    else:
        words = "the published records are missing"
        yield _error(f"{RECIPES}/reference", "no-reference", words, "install the program again")


def _lab_files(lab: Path, shipped: Shipped) -> Iterator[_Found | Problem]:
    recipes = lab / RECIPES
    if not recipes.is_dir():
        hint = "name the lab's folder with --lab"
        yield _error(RECIPES, "no-recipes", "there is no such folder here", hint)
        return
    own = recipes / "reference"
    if own.exists() and not (shipped.reference.exists() and own.samefile(shipped.reference)):
        hint = "remove it; a fact of your own goes into recipes/<kind>"
        words = "the reference comes with the program"
        yield _error(f"{RECIPES}/reference", "reference-is-shipped", words, hint)
    yield from _records(recipes, RECIPES, lab.resolve())


def _records(folder: Path, shown: str, boundary: Path | None) -> Iterator[_Found | Problem]:
    """Walk a folder of kinds; `boundary` is the folder that no link may leave, if any."""
    for path in _entries(folder):
        name = f"{shown}/{path.name}"
        if boundary is not None and path.name == "reference":
            continue  # judged by the caller
        if boundary is not None and not path.resolve().is_relative_to(boundary):
            yield _outside(name)
        elif path.is_dir():
            if path.name in _FOLDERS:
                yield from _kind_folder(Kind(path.name), path, name, boundary)
            else:
                hint = suggestion(path.name, _FOLDERS)
                yield _error(name, "unknown-kind", f'there is no kind of record "{path.name}"', hint)
        elif path.name in _SINGLE_FILES:
            yield from _regular(_Found(_SINGLE_FILES[path.name], path, name))
        else:
            yield _unknown_file(name, path.name, _SINGLE_FILES)


def _kind_folder(kind: Kind, folder: Path, shown: str, boundary: Path | None) -> Iterator[_Found | Problem]:
    suffix = ".csv" if kind is Kind.RUNS else ".yaml"
    for path in _entries(folder):
        name = f"{shown}/{path.name}"
        if boundary is not None and not path.resolve().is_relative_to(boundary):
            yield _outside(name)
        elif path.is_dir():
            yield _error(name, "unknown-folder", "records stand directly in the folder of their kind")
        elif path.suffix != suffix:
            yield _unknown_file(name, path.name, (f"{path.stem}{suffix}",))
        else:
            if not _ID.fullmatch(path.stem):
                yield _bad_name(name, path.stem)
            yield from _regular(_Found(kind, path, name))


def _regular(found: _Found) -> Iterator[_Found | Problem]:
    # A pipe would be waited for without end; a dangling link has nothing to read.
    if found.path.is_file():
        yield found
    else:
        yield _error(found.file, "unreadable-file", "is no regular file")


def _entries(folder: Path) -> list[Path]:
    return sorted(path for path in folder.iterdir() if not _is_for_people(path.name))


def _is_for_people(name: str) -> bool:
    return name.startswith(".") or name in _READABLE_BY_PEOPLE


def _outside(name: str) -> Problem:
    return _error(name, "outside-lab", "the link leads out of the lab's folder", "put the file itself here")


def _unknown_file(name: str, given: str, known: Iterable[str]) -> Problem:
    return _error(name, "unknown-file", "this file would not be read", suggestion(given, known))


def _bad_name(name: str, stem: str) -> Problem:
    words = re.findall(r"[a-z0-9]+", stem.lower())
    hint = f'for example "{"-".join(words)}"' if words else ""
    return _error(name, "bad-file-name", "a file is named in lower case, digits and single hyphens", hint)


def _error(file: str, rule: str, message: str, hint: str = "") -> Problem:
    return Problem(file, 0, 0, "", Severity.ERROR, rule, message, hint)
