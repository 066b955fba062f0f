"""The computed parts of a recipe's page: order, the two laws, every number with its unit and rank."""

from __future__ import annotations

import re
from html import unescape

import pytest

from builder.engine import Rank
from builder.findings.recipe_times import target_timings
from builder.pages.render import render_page
from builder.views.number_text import UNKNOWN
from builder.views.recipe_page import RecipePage, recipe_page
from tests.views.shipped import RECIPES, lab

_ORDER = (
    "rate", "time", "mask", "sideways", "steps", "clearing", "not-cleared", "masks", "evidence", "films",
    "numbers", "worked", "runs", "sources",
)  # fmt: skip


def _page(recipe: str) -> RecipePage:
    records, computed = lab()
    return recipe_page(records, computed, records.etches[recipe])


def _html(recipe: str) -> str:
    return render_page("recipe", _page(recipe)).html


@pytest.mark.parametrize("recipe", RECIPES)
def test_the_page_keeps_its_order(recipe: str) -> None:
    """What is needed first at the bench stands first; the safety strip before settings, never folded."""
    html = _html(recipe)
    places = [html.index(f'id="{anchor}"') for anchor in _ORDER if f'id="{anchor}"' in html]
    assert places == sorted(places) and len(places) >= len(_ORDER) - 2
    assert html.index('id="sideways"') < html.index("ew-caution") < html.index('id="steps"')
    assert "<details" not in html


@pytest.mark.parametrize("recipe", RECIPES)
def test_a_word_holds_only_by_own_or_literature(recipe: str) -> None:
    """No recalled number, statement or similar film is called safe, and no loss is written as nothing."""
    films = _page(recipe).films.rows
    holding = [row for row in films if row.verdict == "holds"]
    assert all(row.rank in ("own runs", "literature") for row in holding)
    assert all(row.loss.is_known and row.loss.value not in ("0", "at most 0") for row in holding)
    unknown = [row for row in films if not row.loss.is_known]
    assert all(row.verdict != "holds" for row in unknown)


@pytest.mark.parametrize("recipe", RECIPES)
def test_films_stand_worst_first(recipe: str) -> None:
    """Lost, unmeasured, borderline, holds; what is worst is read first."""
    order = ["lost", "unmeasured", "borderline", "holds"]
    words = [order.index(row.verdict) for row in _page(recipe).films.rows]
    assert words == sorted(words)


@pytest.mark.parametrize("recipe", RECIPES)
def test_every_film_with_a_run_is_accounted_for(recipe: str) -> None:
    """A film that a monitor wafer carried is a target or stands in the table of other films."""
    records, _ = lab()
    page = _page(recipe)
    shown = {row.film.id for row in page.films.rows} | set(records.etches[recipe].targets)
    assert {run.film for run in records.runs.get(recipe, ())} <= shown


@pytest.mark.parametrize("recipe", RECIPES)
def test_every_run_is_listed_used_or_left_out(recipe: str) -> None:
    """No run of the target disappears: it is used, or the page says why not."""
    records, computed = lab()
    page = _page(recipe)
    target = target_timings(computed, recipe)[0].film
    wafers = {(run.date.isoformat(), run.wafer) for run in records.runs[recipe] if run.film == target}
    assert page.numbers is not None
    assert {(line.date, line.wafer) for line in page.numbers.runs} == wafers
    assert all(line.is_used == (line.use == "used") and line.use for line in page.numbers.runs)


@pytest.mark.parametrize("recipe", RECIPES)
def test_answers_agree_with_each_other(recipe: str) -> None:
    """The big time is the row of the usual depth in the table of stated depths."""
    answers = _page(recipe).answers
    usual = [row for row in answers.time.rows if row.depth == answers.depth]
    assert usual == [answers.time.usual]
    assert answers.rate.rate.interval and answers.rate.rate.unit


@pytest.mark.parametrize("recipe", RECIPES)
def test_a_mask_never_measured_is_not_given_a_thickness(recipe: str) -> None:
    """Only a mask with a high end of its loss gets a number; any other says that it is unknown."""
    _, computed = lab()
    for answer in _page(recipe).answers.masks:
        band = computed.known(recipe, answer.mask.id).band
        if band is None or band.high is None:
            assert answer.needed == UNKNOWN
        else:
            assert re.match(r"[\d.]+\xa0(nm|µm)$", answer.needed), answer


def test_sideways_without_a_ratio_is_common_practice_or_unknown() -> None:
    """An isotropic etch goes at least as far sideways as down; an etch nobody looked at says so."""
    assumed = _page("oxide-bhf-slow").answers.sideways
    assert assumed.way.value.startswith("at least") and "common practice, no source" in assumed.basis
    unknown = _page("glass-rie").answers.sideways
    assert not unknown.way.is_known and unknown.basis == "No undercut is on record."


@pytest.mark.parametrize(
    ("recipe", "words"),
    [
        ("silicon-rie", "drifts down"),
        ("oxide-bhf-slow", "contradict each other"),
        ("polyimide-oxygen", "Stale"),
        ("aluminium-open-beaker", "Retired"),
        ("glass-rie", "One run only"),
    ],
)
def test_troubles_stand_on_top(recipe: str, words: str) -> None:
    """What makes a rate doubtful is said before the rate."""
    html = unescape(_html(recipe))
    assert words in html[: html.index('id="rate"')]


def test_the_depth_field_is_hidden_until_its_script_runs() -> None:
    """Without JavaScript the table of stated depths answers, and no dead field shows."""
    html = _html("oxide-bhf")
    assert re.search(r"<form[^>]*data-ew-depth hidden>", html)
    assert html.count("Latest stop") >= 1


def test_own_runs_outrank_the_literature() -> None:
    """Where both exist the page shows the own rate, and says that they contradict."""
    _, computed = lab()
    known = computed.known("oxide-bhf-slow", "sio2-thermal-wet")
    assert known.rank is Rank.OWN and known.conflict
