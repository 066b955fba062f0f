"""True values of the fluorine reactive ion chamber, invented."""

from __future__ import annotations

from datetime import date

from bench.demo_lab.plan import Event, FilmRuns, RecipeRuns

_STEP = "step height"

FLUORINE_RUNS: tuple[RecipeRuns, ...] = (
    # Target and mask on the same wafer: a paired selectivity.
    RecipeRuns(
        etch="oxide-rie",
        prefix="OR",
        first=date(2026, 3, 16),
        every_days=17,
        count=14,
        spread=0.05,
        temperature_degc=20.0,
        load_cm2=78.5,
        chamber=True,
        events={4: Event("clean")},
        films=(
            FilmRuns("sio2-thermal-wet", 42, 520, (300,), 0.8, site_spread=0.03, window_um=100),
            FilmRuns("resist-positive-a", 14.5, 1390, (300,), 3, prior="hard-baked"),
            FilmRuns("si-100", 6, 1000, (600,), 1, (4, 6, 9, 12), own_wafer=True, note=_STEP),
            FilmRuns("sin-lpcvd", 37, 300, (240,), 0.6, (5, 10), own_wafer=True),
            FilmRuns("cr", 0.25, 60, (300,), 0.6, (4, 7, 11, 13), own_wafer=True),
            FilmRuns(
                "sio2-thermal-wet", 42, 520, (300,), 6, (8,), own_wafer=True, window_um=1, log_shift=-0.15
            ),
        ),
    ),
    RecipeRuns(
        etch="nitride-rie",
        prefix="NR",
        first=date(2026, 4, 20),
        every_days=21,
        count=10,
        spread=0.06,
        temperature_degc=20.0,
        load_cm2=78.5,
        chamber=True,
        films=(
            FilmRuns("sin-lpcvd", 96, 300, (120,), 0.6),
            FilmRuns("resist-positive-a", 72, 1390, (120,), 3, prior="hard-baked"),
            FilmRuns("sin-pecvd-lab", 142, 500, (120,), 1, (1, 4, 7), own_wafer=True),
            FilmRuns("sio2-thermal-wet", 28, 500, (180,), 0.8, (0, 3, 6, 9), own_wafer=True),
            FilmRuns("si-100", 108, 2000, (180,), 5, (2, 8), own_wafer=True, note=_STEP),
        ),
    ),
    # The tool drifts: two and a half percent a session since the last clean, not yet noticed.
    RecipeRuns(
        etch="silicon-rie",
        prefix="SR",
        first=date(2026, 4, 13),
        every_days=15,
        count=14,
        spread=0.03,
        temperature_degc=15.0,
        load_cm2=78.5,
        chamber=True,
        drift=-0.026,
        events={2: Event("clean", 0.02)},
        films=(
            FilmRuns("si-100", 820, 8000, (180,), 15, note=_STEP, window_um=100),
            FilmRuns("resist-positive-a", 92, 1390, (180,), 3, prior="hard-baked"),
            FilmRuns("sio2-thermal-wet", 28, 500, (300,), 0.8, (2, 5, 9, 13), own_wafer=True),
            FilmRuns(
                "si-100",
                820,
                8000,
                (180,),
                20,
                (4, 10),
                own_wafer=True,
                window_um=3,
                log_shift=-0.14,
                note="narrow trench",
            ),
            FilmRuns(
                "si-100",
                820,
                8000,
                (180,),
                15,
                (6, 12),
                own_wafer=True,
                load_cm2=1,
                carrier="sio2-thermal-wet wafer",
                log_shift=0.22,
                window_um=100,
                note="10 mm chip",
            ),
        ),
    ),
    RecipeRuns(
        etch="tungsten-rie",
        prefix="WR",
        first=date(2026, 7, 6),
        every_days=28,
        count=5,
        spread=0.08,
        temperature_degc=20.0,
        load_cm2=40,
        chamber=True,
        films=(
            FilmRuns("w", 255, 400, (60,), 2),
            FilmRuns("resist-positive-a", 185, 1390, (60,), 3, prior="hard-baked"),
            FilmRuns("sio2-thermal-wet", 92, 500, (120,), 0.8, (0, 2, 4), own_wafer=True),
        ),
    ),
    # Run as printed in the literature: three runs, so published numbers of this chemistry may count.
    RecipeRuns(
        etch="nitride-icp-published",
        prefix="NC",
        first=date(2026, 8, 3),
        every_days=38,
        count=3,
        spread=0.09,
        temperature_degc=20.0,
        load_cm2=78.5,
        chamber=True,
        films=(FilmRuns("sin-lpcvd", 112, 300, (90,), 0.6),),
    ),
    RecipeRuns(
        etch="glass-rie",
        prefix="GR",
        first=date(2026, 9, 21),
        every_days=1,
        count=1,
        spread=0.1,
        temperature_degc=20.0,
        load_cm2=16,
        chamber=True,
        films=(
            FilmRuns("quartz-fused", 39, 2000, (900,), 8, note=_STEP),
            FilmRuns("cr", 0.3, 150, (900,), 0.8),
        ),
    ),
)
