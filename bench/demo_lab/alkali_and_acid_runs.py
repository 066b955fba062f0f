"""True values of the hot baths: phosphoric acid, alkali, piranha; invented."""

from __future__ import annotations

from datetime import date

from bench.demo_lab.plan import FilmRuns, RecipeRuns

_STEP = "step height against a protected mesa"

ALKALI_AND_ACID_RUNS: tuple[RecipeRuns, ...] = (
    RecipeRuns(
        etch="nitride-hot-phosphoric",
        prefix="NP",
        first=date(2026, 3, 2),
        every_days=21,
        count=12,
        spread=0.045,
        temperature_degc=160.0,
        temperature_sd=0.3,
        load_cm2=157,
        bath="hotphos",
        films=(
            FilmRuns("sin-lpcvd", 4.4, 150, (1200,), 0.3, site_spread=0.02),
            FilmRuns("sio2-thermal-wet", 0.17, 300, (3600,), 0.3, (1, 3, 5, 7, 9, 11), own_wafer=True),
            FilmRuns("si-100", 0.16, 1000, (3600,), 0.6, (2, 4, 6, 8, 10), own_wafer=True, note=_STEP),
            FilmRuns("sin-pecvd-lab", 21, 300, (420,), 0.6, (4, 8), own_wafer=True),
        ),
    ),
    # Last run more than a year before the lab's "today": stale.
    RecipeRuns(
        etch="nitride-low-stress-phosphoric",
        prefix="NL",
        first=date(2024, 9, 2),
        every_days=28,
        count=6,
        spread=0.05,
        temperature_degc=160.0,
        temperature_sd=0.4,
        load_cm2=157,
        bath="hotphos-old",
        films=(
            FilmRuns("sin-low-stress", 2.6, 300, (2400,), 0.5),
            FilmRuns("sio2-thermal-wet", 0.17, 300, (3600,), 0.3, (1, 4), own_wafer=True),
        ),
    ),
    # Depth series on one wafer, nitride mask that shows no loss beside it.
    RecipeRuns(
        etch="silicon-koh",
        prefix="SK",
        first=date(2026, 2, 2),
        every_days=23,
        count=12,
        spread=0.035,
        temperature_degc=80.0,
        temperature_sd=0.3,
        load_cm2=30,
        bath="koh",
        films=(
            FilmRuns("si-100", 1180, 525000, (7200,), 400, (0, 1, 3, 4, 5, 7, 9, 10, 11), prior="oxide dip"),
            FilmRuns("si-100", 1180, 525000, (3600, 7200, 14400), 400, (2, 6, 8), prior="oxide dip"),
            FilmRuns("sin-lpcvd", 0, 200, (7200,), 0.4, (0, 3, 5, 7, 9, 11)),
            FilmRuns("sio2-thermal-wet", 7.4, 1000, (2400,), 0.8, (1, 4, 10), own_wafer=True),
            FilmRuns("si-111", 8.5, 20000, (7200,), 25, (2, 8), own_wafer=True, note=_STEP),
        ),
    ),
    # Two runs: the moderated interval must stay useful.
    RecipeRuns(
        etch="silicon-koh-60",
        prefix="SL",
        first=date(2026, 8, 10),
        every_days=30,
        count=2,
        spread=0.04,
        temperature_degc=60.0,
        temperature_sd=0.3,
        load_cm2=30,
        bath="koh-60",
        films=(
            FilmRuns("si-100", 395, 525000, (14400,), 400, prior="oxide dip"),
            FilmRuns("sin-lpcvd", 0, 200, (14400,), 0.4),
        ),
    ),
    # A single run: draft.
    RecipeRuns(
        etch="silicon-tmah",
        prefix="ST",
        first=date(2026, 10, 5),
        every_days=1,
        count=1,
        spread=0.05,
        temperature_degc=80.0,
        temperature_sd=0.3,
        load_cm2=30,
        bath="tmah",
        films=(
            FilmRuns("si-100", 570, 525000, (7200,), 400, prior="oxide dip"),
            FilmRuns("sio2-thermal-wet", 0.1, 500, (7200,), 0.6, own_wafer=True),
        ),
    ),
    RecipeRuns(
        etch="resist-strip-piranha",
        prefix="RP",
        first=date(2026, 4, 13),
        every_days=42,
        count=5,
        spread=0.15,
        temperature_degc=115,
        temperature_sd=4,
        load_cm2=78.5,
        bath="pir",
        fresh_bath=True,
        films=(
            FilmRuns("resist-positive-a", 4000, 1400, (12,), 8, note="pulled before clearing"),
            FilmRuns("sio2-thermal-wet", 0, 300, (1200,), 0.3, (0, 2, 4), own_wafer=True),
            FilmRuns("sin-lpcvd", 0, 150, (1200,), 0.3, (1, 3), own_wafer=True),
            FilmRuns("si-100", 0, 1000, (1200,), 0.6, (0, 3), own_wafer=True, note=_STEP),
            FilmRuns("au", 0, 210, (1200,), 1.5, (2,), own_wafer=True),
        ),
    ),
)
