"""One page of each kind, and the largest of the kinds that records make long."""

from __future__ import annotations

from pathlib import Path

PAGES = {
    "home": "index.html",
    "recipe list": "recipes/index.html",
    "recipe": "recipes/oxide-bhf.html",
    "recipe, many runs": "recipes/oxide-hf-vapour.html",
    "recipe, retired": "recipes/aluminium-open-beaker.html",
    "film list": "films/index.html",
    "film": "films/sio2-thermal-wet.html",
    "film family": "films/sio2-any.html",
    "etchant list": "etchants/index.html",
    "etchant": "etchants/piranha.html",
    "chemical list": "chemicals/index.html",
    "chemical": "chemicals/hf-49.html",
    "tool list": "tools/index.html",
    "tool": "tools/hf-bench.html",
    "bibliography": "bibliography.html",
    "matrix of losses": "matrices/films.html",
    "matrix of selectivity": "matrices/selectivity.html",
    "selectivity of a film": "matrices/selectivity-sio2-thermal-wet.html",
    "planner": "planner/index.html",
    "safety": "safety/index.html",
    "hydrofluoric acid": "safety/hydrofluoric-acid.html",
    "first wet etch": "safety/before-your-first-wet-etch.html",
    "plasma hazards": "safety/plasma.html",
    "matrix of chemicals": "safety/mixing.html",
    "matrix of groups": "safety/groups.html",
    "matrix of films": "safety/film-gas.html",
    "matrix of containers": "safety/containers.html",
    "bench sheet": "safety/sheets/hf-49.html",
    "start": "start.html",
    "reading": "reading.html",
    "glossary": "glossary.html",
    "method note": "methods/rates.html",
}


def kind_of(url: str) -> str:
    """Return what pages made alike have in common: their folder, and whether they are its list."""
    path = Path(url)
    folder = path.parent.as_posix()
    return path.as_posix() if folder == "." else f"{folder}/{'list' if path.stem == 'index' else 'record'}"


def recipe_pages(folder: Path) -> list[Path]:
    """Return the page of every recipe of a built site."""
    return [path for path in sorted((folder / "recipes").glob("*.html")) if path.name != "index.html"]


def kinds_of_site(folder: Path) -> set[str]:
    """Return the kinds of all pages of a built site."""
    return {kind_of(path.relative_to(folder).as_posix()) for path in folder.rglob("*.html")}
