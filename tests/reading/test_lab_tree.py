"""Which files of a lab are read, and what is said of those that are not."""

from __future__ import annotations

import os
from pathlib import Path

import pytest

from builder.problems import Problem
from builder.reading.lab_tree import Kind, LabFiles, Origin, Shipped, find_shipped, read_lab


def lab_with(tmp_path: Path, files: dict[str, str]) -> LabFiles:
    """Return what is read of a lab that holds these files, with a reference of one film."""
    reference = tmp_path / "shipped" / "reference"
    (reference / "films").mkdir(parents=True)
    (reference / "films" / "au.yaml").write_text("name: Gold\n")
    lab = tmp_path / "lab"
    for name, text in files.items():
        path = lab / name
        path.parent.mkdir(parents=True, exist_ok=True)
        path.write_text(text)
    return read_lab(lab, shipped=Shipped(reference, tmp_path))


def only_problem(files: LabFiles) -> Problem:
    """Return the only problem."""
    assert len(files.problems) == 1, files.problems
    return files.problems[0]


def test_records_of_reference_and_lab_are_read_by_kind(tmp_path: Path) -> None:
    """The folder is the kind, the stem is the id."""
    files = lab_with(
        tmp_path,
        {"recipes/films/cr.yaml": "name: x\n", "recipes/lab.yaml": "name: y\n", "recipes/runs/a.csv": "b\n"},
    )
    assert files.problems == ()
    assert [(file.kind, file.id, file.origin) for file in files.files] == [
        (Kind.FILMS, "au", Origin.REFERENCE),
        (Kind.FILMS, "cr", Origin.LAB),
        (Kind.LAB, "lab", Origin.LAB),
        (Kind.RUNS, "a", Origin.LAB),
    ]
    assert [file.raw.file for file in files.of_kind(Kind.FILMS)] == [
        "recipes/reference/films/au.yaml",
        "recipes/films/cr.yaml",
    ]


def test_a_folder_that_is_no_kind_is_named_with_a_suggestion(tmp_path: Path) -> None:
    """`film` would else be passed over in silence."""
    problem = only_problem(lab_with(tmp_path, {"recipes/film/cr.yaml": "a: 1\n"}))
    assert problem.rule == "unknown-kind"
    assert "films" in problem.hint


@pytest.mark.parametrize("name", ["recipes/films/cr.yml", "recipes/runs/a.yaml", "recipes/notes.yaml"])
def test_a_file_that_would_not_be_read_is_named(tmp_path: Path, name: str) -> None:
    """A record with the wrong ending is no record, and nobody would notice."""
    assert only_problem(lab_with(tmp_path, {name: "a: 1\n"})).rule == "unknown-file"


def test_a_folder_within_a_kind_is_named(tmp_path: Path) -> None:
    """Its records would not be read."""
    assert only_problem(lab_with(tmp_path, {"recipes/films/old/cr.yaml": "a: 1\n"})).rule == "unknown-folder"


@pytest.mark.parametrize("stem", ["Gold", "gold_film", "gold--film", "-gold"])
def test_a_file_name_that_is_no_id_is_named(tmp_path: Path, stem: str) -> None:
    """The id becomes part of an address."""
    assert only_problem(lab_with(tmp_path, {f"recipes/films/{stem}.yaml": "a: 1\n"})).rule == "bad-file-name"


def test_hidden_files_and_files_for_people_are_passed_over(tmp_path: Path) -> None:
    """An editor's copy is no record."""
    files = lab_with(tmp_path, {"recipes/.x": "", "recipes/README.md": "", "recipes/films/.cr.yaml.swp": ""})
    assert files.problems == ()


def test_a_folder_without_recipes_is_no_lab(tmp_path: Path) -> None:
    """The hint says how to name another."""
    problem = only_problem(lab_with(tmp_path, {"notes.txt": ""}))
    assert problem.rule == "no-recipes"
    assert "--lab" in problem.hint


def test_a_missing_reference_is_named(tmp_path: Path) -> None:
    """Without it every plan would be empty."""
    (tmp_path / "recipes").mkdir()
    files = read_lab(tmp_path, shipped=Shipped(tmp_path / "none", tmp_path))
    assert only_problem(files).rule == "no-reference"


def test_a_copy_of_the_reference_in_the_lab_is_refused(tmp_path: Path) -> None:
    """It would drift apart unseen."""
    files = lab_with(tmp_path, {"recipes/reference/films/au.yaml": "name: Not gold\n"})
    assert only_problem(files).rule == "reference-is-shipped"


def test_a_link_out_of_the_lab_is_refused(tmp_path: Path) -> None:
    """A record must not be a file of somebody else."""
    outside = tmp_path / "outside.yaml"
    outside.write_text("a: 1\n")
    films = tmp_path / "lab" / "recipes" / "films"
    films.mkdir(parents=True)
    (films / "cr.yaml").symlink_to(outside)
    assert only_problem(lab_with(tmp_path, {})).rule == "outside-lab"


def test_what_is_no_regular_file_is_not_waited_for(tmp_path: Path) -> None:
    """A pipe would never end."""
    films = tmp_path / "lab" / "recipes" / "films"
    films.mkdir(parents=True)
    os.mkfifo(films / "cr.yaml")
    assert only_problem(lab_with(tmp_path, {})).rule == "unreadable-file"


def test_a_file_without_data_is_remembered(tmp_path: Path) -> None:
    """References to it must not be called unknown."""
    files = lab_with(tmp_path, {"recipes/films/cr.yaml": ""})
    assert only_problem(files).rule == "empty-file"
    assert files.unread == (("films", "cr"),)


def test_the_shipped_records_are_found() -> None:
    """Beside the package, or within it."""
    shipped = find_shipped()
    assert (shipped.reference / "lab.yaml").is_file()
    assert (shipped.schemas / "films.schema.json").is_file()
