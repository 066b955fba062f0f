"""`etchwright new FOLDER`: another lab, small and whole, whose check and site pass."""

from __future__ import annotations

import json
import re
from collections.abc import Iterator
from pathlib import Path

import click

from builder.pages.shipped_files import find_shipped_mkdocs_file

_TEMPLATE = Path(__file__).resolve().parent / "new_lab"
_NAME = "LAB_NAME"
_RENAMED = {"gitignore": ".gitignore"}
"""A file of that name within the package would rule the package's own files."""


@click.command()
@click.argument("folder", type=click.Path(path_type=Path))
@click.option("--name", default=None, help="Name of the lab; else that of the folder.")
def new(folder: Path, name: str | None) -> None:
    """
    Start another lab in FOLDER, which must not exist yet or be empty.

    It holds one tool, one draft recipe and one sample to be replaced by your own; the published facts
    come with the program.
    """
    if folder.exists() and (not folder.is_dir() or any(folder.iterdir())):
        raise click.UsageError(f"{folder} is not empty; name a new folder")
    title = name or re.sub(r"[-_]+", " ", folder.resolve().name).strip().capitalize() or "A new lab"
    for source, target in _files(folder):
        target.parent.mkdir(parents=True, exist_ok=True)
        text = source.read_text(encoding="utf-8")
        target.write_text(
            text.replace(f'"{_NAME}"', json.dumps(title)).replace(_NAME, title), encoding="utf-8"
        )
    (folder / "mkdocs.yml").write_text(_host_settings(title), encoding="utf-8")
    click.echo(f"Started {title} in {folder}. Next:")
    click.echo(f"  cd {folder} && etchwright check && etchwright site")


def _files(folder: Path) -> Iterator[tuple[Path, Path]]:
    for source in sorted(path for path in _TEMPLATE.rglob("*") if path.is_file()):
        inside = source.relative_to(_TEMPLATE)
        yield source, folder / inside.parent / _RENAMED.get(inside.name, inside.name)


def _host_settings(title: str) -> str:
    """The shipped settings of the host under the lab's own name."""
    text = find_shipped_mkdocs_file().read_text(encoding="utf-8")
    text = re.sub(r"(?m)^site_name:.*$", lambda _: f"site_name: {json.dumps(title)}", text)
    words = json.dumps("How to remove a film, what survives it, and how sure that is.")
    return re.sub(r"(?m)^site_description:.*$", lambda _: f"site_description: {words}", text)
