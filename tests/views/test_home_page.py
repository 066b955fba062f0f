"""What the home page answers: only what a recipe's own record says that it removes."""

from __future__ import annotations

from builder.records.terms import Status
from builder.views.home_page import home_page
from tests.views.shipped import lab


def test_a_film_leads_to_the_recipes_that_remove_it_and_a_family_names_the_member() -> None:
    """No recipe is offered for a film it was not written for, and none that is retired."""
    records, computed = lab()
    page = home_page(records, computed)
    offered = 0
    for entry in page.names:
        films = {entry.id} if entry.kind == "film" else set()
        family = entry.kind == "film" and records.films[entry.id].is_family
        films |= set(records.films[entry.id].members) if family else set()
        for recipe in entry.removed_by:
            etch = records.etches[recipe.target.removeprefix("recipes/").removesuffix(".html")]
            removed = films & set(etch.targets)
            assert removed and etch.status is not Status.RETIRED, (entry.id, recipe.target)
            if family:
                assert any(f" of {records.films[film].name}" in recipe.words for film in removed)
            offered += 1
        assert entry.recipes == len({one.target for one in entry.removed_by}) or entry.kind == "etchant"
    assert offered > 60
