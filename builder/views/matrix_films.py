"""The matrix of films by etches: what each film loses in a chosen time."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from builder.engine import Rank, Verdict, allowed_other
from builder.findings.computed import Computed
from builder.findings.plan.evidence import Evidence
from builder.findings.plan.result import FilmRow
from builder.findings.recipe_times import target_timings
from builder.findings.side_films import SIDE_FILM_NM, row_after, row_at_latest_stop
from builder.records.lab import LabRecords
from builder.views.link import Link
from builder.views.matrix_grid import (
    DATA_FORMAT,
    RECIPE_COLUMN,
    Choice,
    Column,
    GridCell,
    MatrixView,
    Pool,
    film_order,
    filters_of,
    first_kind,
    grid_row,
    groups_of,
    heads_of,
    rank_css,
    source_places,
)
from builder.views.number_text import NO_BREAK, length_text
from builder.views.plan_words import RANK_WORDS, reason
from builder.views.recipe_answers import depth_text
from builder.views.recipe_films import loss_text

URL = "matrices/films.html"
_TIMES_S = (60.0, 600.0, 3600.0)
_CHOICES = (
    Choice("60", f"1{NO_BREAK}min"),
    Choice("600", f"10{NO_BREAK}min"),
    Choice("3600", f"60{NO_BREAK}min"),
    Choice("own", "latest stop of each recipe"),
)
_CHOSEN = 1
_LETTERS = {Verdict.HOLDS: "h", Verdict.BORDERLINE: "b", Verdict.LOST: "l", Verdict.UNMEASURED: "u"}
_RANKS = (
    (GridCell("ew-grid-own", "", "bold"), "own runs"),
    (GridCell("ew-grid-read", "", "plain"), "literature"),
    (GridCell("ew-grid-weak", "", "italic"), "literature, unchecked, or a statement (said)"),
)


def films_matrix(
    records: LabRecords, computed: Computed, columns: Sequence[Column], targets: Sequence[Link]
) -> MatrixView:
    """Return the matrix of all films with anything on record; `targets` lead to the selectivities."""
    films = film_order(records, {film for column in columns for film in column.evidence})
    pool, data, rows = Pool(), [], []
    for film in films:
        cells, line = _line(records, computed, columns, film, pool)
        rows.append(grid_row(records, film, cells))
        data.append(line)
    return MatrixView(
        url=URL,
        title="Films by etches",
        description="What each film loses in each etch in a chosen time, measured or not.",
        search_text="matrix compatibility films etches loss what survives table",
        lead="What a film loses in the time you choose, if it is open from the start.",
        note="Rows are films by family, columns are etches by method: the lab's recipes first, then etchants "
        f"by published facts alone. The word is for {depth_text(SIDE_FILM_NM)} of film and the lab's default "
        "of what it may lose; for your sample the plan decides. A film outlined in bold is what the recipe "
        "is for.",
        legend=_legend(computed),
        times=_CHOICES,
        chosen=_CHOICES[_CHOSEN].id,
        heads=heads_of(columns, records),
        groups=groups_of(columns),
        rows=tuple(rows),
        filters=filters_of(records, columns, films),
        kind=first_kind(columns),
        others=tuple(targets),
        data={"format": DATA_FORMAT, "kind": "loss", "texts": pool.texts, "rows": data},
    )


def _legend(computed: Computed) -> tuple[tuple[GridCell | None, str], ...]:
    allowed = allowed_other(SIDE_FILM_NM, computed.facts.defaults.allowance)
    limit = length_text(None, allowed, None).with_unit
    worst, mild = f"≤{NO_BREAK}nm", f"≥{NO_BREAK}nm"
    return (
        (
            GridCell("ew-verdict-holds", "holds", worst),
            f"loses at worst no more than the lab's default, {limit} of {depth_text(SIDE_FILM_NM)}",
        ),
        (
            GridCell("ew-verdict-borderline", "borderline", worst),
            "may lose more, or the grounds are too weak for a better word",
        ),
        (
            GridCell("ew-verdict-lost", "lost", mild),
            "loses more even at the mild end, or a statement says that it is attacked",
        ),
        (None, "unmeasured: nothing on record"),
        *_RANKS,
    )


def short_loss(row: FilmRow) -> str:
    """Return the end of a loss that decides its word: the mild end of a film that is lost, else the worst."""
    low, high = row.loss.low, row.loss.high
    if row.verdict is Verdict.LOST and low:
        return f"≥{NO_BREAK}{length_text(low, None, None).with_unit.removeprefix('at least ')}"
    if high is not None:
        return f"≤{NO_BREAK}{length_text(None, None, high).with_unit.removeprefix('at most ')}"
    if low:
        return f"≥{NO_BREAK}{length_text(low, None, None).with_unit.removeprefix('at least ')}"
    return "no time" if row.exposure is None else "said"


def _line(
    records: LabRecords, computed: Computed, columns: Sequence[Column], film: str, pool: Pool
) -> tuple[list[GridCell | None], dict[str, object]]:
    """The cells of one film, and the data of those with anything on record by the place of their column."""
    cells: list[GridCell | None] = []
    line: dict[str, object] = {}
    for place, column in enumerate(columns):
        known = column.evidence.get(film)
        if known is None:
            cells.append(None)
            continue
        found = list(_rows(computed, column, film))
        cells.append(_cell(column, film, found[_CHOSEN], known))
        line[str(place)] = _cell_data(records, pool, found, known, column.rates[film])
    return cells, line


def _rows(computed: Computed, column: Column, film: str) -> Iterator[FilmRow]:
    for time_s in _TIMES_S:
        yield row_after(computed, column.etching, film, time_s)
    if column.kind == RECIPE_COLUMN:
        timing = target_timings(computed, column.id)[0]
        yield row_at_latest_stop(computed, column.etching, timing, film)
    else:
        yield row_after(computed, column.etching, film, None)


def _cell(column: Column, film: str, row: FilmRow, known: Evidence) -> GridCell:
    return GridCell(
        f"ew-verdict-{row.verdict} {rank_css(known.rank)}{_target(column, film)}",
        row.verdict,
        short_loss(row),
    )


def _target(column: Column, film: str) -> str:
    recipe = column.etching.recipe
    return " ew-grid-target" if recipe is not None and film in recipe.targets else ""


def _cell_data(
    records: LabRecords, pool: Pool, found: Sequence[FilmRow], known: Evidence, rate: str
) -> list[object]:
    """Verdicts, short texts, losses, reasons (one a time each), then rate, rank, statements, sources."""
    said = "; ".join(dict.fromkeys(word for word in known.words if word))
    return [
        "".join(_LETTERS[row.verdict] for row in found),
        [pool.place(short_loss(row)) for row in found],
        [pool.place(loss_text(row).full) for row in found],
        [pool.place(reason(row)) for row in found],
        pool.place(rate),
        pool.place(_rank_words(known)),
        pool.place(said),
        source_places(records, pool, known.sources),
    ]


def _rank_words(known: Evidence) -> str:
    words = RANK_WORDS[known.rank]
    if known.all_temperatures and known.rank is not Rank.OWN:
        return f"{words}; over all temperatures on record"
    return f"{words}; own runs and literature contradict each other" if known.conflict else words
