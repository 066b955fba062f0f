"""True values of the cyclic deep silicon tool and of the lift-off bench, invented."""

from __future__ import annotations

from datetime import date

from bench.demo_lab.plan import Event, FilmRuns, RecipeRuns

_DEPTH = "trench depth in a cleaved piece"

DEEP_SILICON_AND_LIFT_OFF_RUNS: tuple[RecipeRuns, ...] = (
    RecipeRuns(
        etch="silicon-deep",
        prefix="DS",
        first=date(2026, 2, 10),
        every_days=20,
        count=14,
        spread=0.05,
        temperature_degc=10.0,
        load_cm2=16,
        chamber=True,
        events={3: Event("clean")},
        films=(
            FilmRuns("si-100", 3600, 525000, (1800,), 500, window_um=100, note=_DEPTH),
            FilmRuns("resist-thick-q", 42, 8200, (1800,), 25, (3, 4, 6, 7, 9, 11, 12), prior="hard-baked"),
            FilmRuns("sio2-thermal-wet", 18, 2000, (1800,), 2, (3, 5, 8, 10, 13)),
            FilmRuns("al-cu", 0.05, 600, (1800,), 1.2, (4, 9, 12), own_wafer=True),
            FilmRuns(
                "si-100",
                3600,
                525000,
                (1800,),
                600,
                (5, 8, 11),
                own_wafer=True,
                window_um=10,
                log_shift=-0.22,
                note=_DEPTH,
            ),
            FilmRuns(
                "si-100",
                3600,
                525000,
                (1800,),
                500,
                (7, 13),
                own_wafer=True,
                window_um=100,
                load_cm2=0.5,
                carrier="sio2-thermal-wet wafer",
                log_shift=0.15,
                note="10 mm chip on a carrier",
            ),
        ),
    ),
    RecipeRuns(
        etch="silicon-deep-fine",
        prefix="DF",
        first=date(2026, 8, 17),
        every_days=35,
        count=3,
        spread=0.05,
        temperature_degc=10.0,
        load_cm2=16,
        chamber=True,
        films=(
            FilmRuns("si-100", 1400, 525000, (900,), 200, window_um=20, note=_DEPTH),
            FilmRuns("resist-positive-a", 29, 1390, (900,), 4, prior="hard-baked"),
        ),
    ),
    RecipeRuns(
        etch="silicon-deep-soi",
        prefix="DO",
        first=date(2026, 6, 22),
        every_days=33,
        count=5,
        spread=0.06,
        temperature_degc=10.0,
        load_cm2=16,
        chamber=True,
        films=(
            FilmRuns("si-soi-device", 2600, 25000, (420,), 100, window_um=50, note=_DEPTH),
            FilmRuns("resist-thick-q", 38, 8200, (420,), 25, prior="hard-baked"),
            FilmRuns("sio2-box", 13, 2000, (600,), 2, (0, 2, 4), own_wafer=True),
        ),
    ),
    RecipeRuns(
        etch="lift-off-gold",
        prefix="LG",
        first=date(2026, 5, 27),
        every_days=30,
        count=6,
        spread=0.18,
        temperature_degc=21.0,
        temperature_sd=0.8,
        load_cm2=78.5,
        bath="ace",
        fresh_bath=True,
        films=(
            FilmRuns("resist-negative-q", 2100, 2600, (45,), 15, note="bare resist, pulled early"),
            FilmRuns("au", 0, 210, (3600,), 1.5, (0, 2, 4), own_wafer=True),
            FilmRuns("ti", 0, 100, (3600,), 0.8, (1, 3), own_wafer=True),
            FilmRuns("sio2-thermal-wet", 0, 300, (3600,), 0.3, (2, 5), own_wafer=True),
        ),
    ),
    RecipeRuns(
        etch="lift-off-platinum",
        prefix="LP",
        first=date(2026, 8, 24),
        every_days=33,
        count=3,
        spread=0.15,
        temperature_degc=70,
        temperature_sd=1,
        load_cm2=78.5,
        bath="nmp",
        fresh_bath=True,
        films=(
            FilmRuns("resist-liftoff-q", 900, 700, (30,), 6, note="bare resist, pulled early"),
            FilmRuns("pt", 0, 120, (3600,), 1, own_wafer=True),
        ),
    ),
)
