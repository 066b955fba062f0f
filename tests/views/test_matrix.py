"""The matrices: what nobody measured stays visible as unmeasured, and no weak number is called safe."""

from __future__ import annotations

import functools
import json
import re
from collections import Counter
from dataclasses import replace

import pytest

from builder.engine import Rank
from builder.findings.plan.evidence import Evidence
from builder.findings.side_films import row_after
from builder.pages.render import render_page
from builder.views.matrix_films import films_matrix
from builder.views.matrix_grid import PUBLISHED_COLUMN, RECIPE_COLUMN, Column, MatrixView, columns_of
from builder.views.matrix_selectivity import selectivity_index, selectivity_pages
from tests.views.shipped import lab


@functools.cache
def _columns() -> tuple[Column, ...]:
    return columns_of(*lab())


@functools.cache
def _films() -> MatrixView:
    return films_matrix(*lab(), _columns(), ())


@functools.cache
def _selectivities() -> tuple[MatrixView, ...]:
    return selectivity_pages(*lab(), _columns())


def _evidence(film: str, place: int) -> Evidence | None:
    return _columns()[place].evidence.get(film)


def test_every_pair_has_a_cell() -> None:
    """No row is short: a pair is measured, or shown as unmeasured."""
    view = _films()
    assert len(view.rows) > 80 and len(view.heads) > 120
    assert {len(row.cells) for row in view.rows} == {len(view.heads)}
    html = render_page("matrix", view).html
    blank = re.findall(r"<td[^>]*></td>", html)
    assert blank == ["<td></td>"], "only the corner above the film names is empty"


def test_a_pair_without_a_record_is_unmeasured() -> None:
    """A cell is unmeasured exactly where neither a number nor a statement is on record."""
    for row in _films().rows:
        for place, cell in enumerate(row.cells):
            assert (cell is None) == (_evidence(row.film.id, place) is None)


def test_nothing_weak_holds_in_any_time() -> None:
    """Own runs and literature may hold; recalled numbers and statements never do, however short the time."""
    view = _films()
    rows = view.data["rows"]
    assert isinstance(rows, list)
    seen: Counter[str] = Counter()
    for row, line in zip(view.rows, rows, strict=True):
        for place, cell in line.items():
            known = _evidence(row.film.id, int(place))
            assert known is not None
            seen.update(cell[0])
            if "h" in cell[0]:
                assert known.rank in (Rank.OWN, Rank.LITERATURE), (row.film.id, _columns()[int(place)].id)
    assert set(seen) == {"h", "b", "l", "u"}


def test_a_longer_time_never_improves_a_word() -> None:
    """From 1 to 10 to 60 minutes a word stays or gets worse."""
    order = {"h": 0, "b": 1, "u": 2, "l": 3}
    rows = _films().data["rows"]
    assert isinstance(rows, list)
    words = [cell[0][:3] for line in rows for cell in line.values()]
    assert all(list(map(order.__getitem__, one)) == sorted(map(order.__getitem__, one)) for one in words)
    assert len({one for one in words if len(set(one)) > 1}) >= 3


def test_published_columns_hold_no_record_of_the_lab() -> None:
    """A column of published facts would be the same in a lab without any record of its own."""
    records, _ = lab()
    published = [column for column in _columns() if column.kind == PUBLISHED_COLUMN]
    own_sources = {one.id for one in records.sources.values() if one.origin == "lab"}
    assert own_sources and len(published) > 80
    for column in published:
        for known in column.evidence.values():
            assert known.rank is not Rank.OWN
            assert not own_sources & set(known.sources)


def test_published_chambers_do_not_vouch_for_this_one() -> None:
    """A literature number of plasma or vapour is no "holds" here: this chamber has no run of it."""
    _, computed = lab()
    chambers = [
        column
        for column in _columns()
        if column.kind == PUBLISHED_COLUMN and column.method_id in ("plasma", "vapour", "cyclic")
    ]
    assert chambers
    for column in chambers:
        for film in column.evidence:
            assert row_after(computed, column.etching, film, 60.0).verdict != "holds", (column.id, film)


def test_a_chamber_without_own_runs_borrows_no_safety() -> None:
    """A published number may hold in a vapour chamber with runs of its own target, and not without."""
    _, computed = lab()
    recipe = "molybdenum-xef2"
    bare = replace(computed.facts.etches[recipe], own={})
    facts = replace(computed.facts, etches={**computed.facts.etches, recipe: bare})
    without = replace(computed, facts=facts, own={**computed.own, recipe: {}})
    with_runs = row_after(computed, computed.etching(recipe), "sin-lpcvd", 1.0)
    assert (with_runs.rank, with_runs.verdict) == (Rank.LITERATURE, "holds")
    for film in without.by_recipe[recipe]:
        assert row_after(without, without.etching(recipe), film, 1.0).verdict != "holds", film


def test_columns_stand_by_method_recipes_first() -> None:
    """Within a method the lab's own recipes come before published etchants."""
    kinds = [(column.method_id, column.kind == PUBLISHED_COLUMN) for column in _columns()]
    groups = list(dict.fromkeys(method for method, _ in kinds))
    assert kinds == sorted(kinds, key=lambda one: (groups.index(one[0]), one[1]))
    view = _films()
    assert [group.size for group in view.groups] == list(Counter(m for m, _ in kinds).values())


def test_retired_recipes_are_no_columns() -> None:
    """Nobody chooses a retired recipe from a matrix."""
    records, _ = lab()
    shown = {column.id for column in _columns() if column.kind == RECIPE_COLUMN}
    assert shown == {etch.id for etch in records.etches.values() if etch.status != "retired"}


def test_data_of_a_page_refer_to_texts_that_are_there() -> None:
    """Every place in the cells' data is one of the page's texts, and the page's script can read it."""
    for view in (_films(), *_selectivities()):
        data = json.loads(json.dumps(view.data))
        assert data["format"] == 1
        places = _places([cell for line in data["rows"] for cell in line.values()])
        assert max(places) < len(data["texts"])
        assert len(set(data["texts"])) == len(data["texts"])


def _places(value: object) -> list[int]:
    if isinstance(value, list):
        return [place for one in value for place in _places(one)]
    return [value] if isinstance(value, int) else []


def test_every_target_has_its_selectivities() -> None:
    """One page a film that a recipe removes, and a list that leads to each."""
    records, _ = lab()
    pages = _selectivities()
    targets = {film for etch in records.etches.values() for film in etch.targets}
    assert {page.url for page in pages} <= {f"matrices/selectivity-{film}.html" for film in targets}
    assert len(pages) >= 25
    index = selectivity_index(records, pages)
    assert {one.link.target for group in index.groups for one in group.targets} == {
        page.url for page in pages
    }


def test_a_film_without_a_loss_has_only_a_lower_end() -> None:
    """Where no loss was seen the cell says "at least", in every matrix of selectivity."""
    _, computed = lab()
    checked = 0
    for page in _selectivities():
        for row in page.rows:
            for head, cell in zip(page.heads, row.cells, strict=True):
                if cell is None or head.kind != RECIPE_COLUMN:
                    continue
                recipe = head.link.target.removeprefix("recipes/").removesuffix(".html")
                own = computed.own[recipe].get(row.film.id)
                if own is not None and own.used and all(run.rate.log_rate is None for run in own.used):
                    assert cell.text.startswith("≥"), (page.url, recipe, row.film.id)
                    checked += 1
    assert checked > 20


@pytest.mark.parametrize("words", ["safe", "compatible", "OK"])
def test_no_cell_uses_a_softer_word(words: str) -> None:
    """The four words are the only ones."""
    html = render_page("matrix", _films()).html
    table = html[html.index("<tbody>") : html.index("</tbody>")]
    assert not re.search(rf"\b{words}\b", re.sub(r"<[^>]*>", " ", table))
