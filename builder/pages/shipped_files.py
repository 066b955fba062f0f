"""Where the documents, theme parts and host settings stand that come with the program."""

from __future__ import annotations

from pathlib import Path

_PACKAGE = Path(__file__).resolve().parent.parent
MKDOCS_FILE = "mkdocs.yml"


def find_docs() -> Path:
    """Return the folder of the shipped hand-written pages and assets."""
    return _find("docs")


def find_mkdocs_file(lab_dir: Path) -> Path:
    """Return the lab's own `mkdocs.yml`, which every lab has (`new` writes it)."""
    own = lab_dir / MKDOCS_FILE
    if not own.is_file():
        raise FileNotFoundError(f"{MKDOCS_FILE} is missing in the lab's folder")
    return own.resolve()


def find_shipped_mkdocs_file() -> Path:
    """Return the host settings that come with the program, from which those of a new lab are made."""
    return _find(MKDOCS_FILE)


def find_theme() -> Path:
    """Return the folder with the parts of the theme that we change."""
    return Path(__file__).resolve().parent / "theme"


def _find(name: str) -> Path:
    for root in (_PACKAGE / "_data", _PACKAGE.parent):
        if (root / name).exists():
            return root / name
    raise FileNotFoundError(f"{name} is missing from the installation; install the package again")
