"""True values of the metal baths, invented."""

from __future__ import annotations

from datetime import date

from bench.demo_lab.plan import Event, FilmRuns, RecipeRuns

METAL_BATH_RUNS: tuple[RecipeRuns, ...] = (
    # Positive induction: the native oxide must dissolve first.
    RecipeRuns(
        etch="aluminium-pan",
        prefix="AP",
        first=date(2026, 4, 6),
        every_days=14,
        count=16,
        spread=0.05,
        temperature_degc=50.0,
        temperature_sd=0.3,
        load_cm2=78.5,
        bath="pan",
        events={5: Event("new bath")},
        films=(
            FilmRuns(
                "al-si",
                640,
                600,
                (40,),
                4,
                (0, 1, 3, 4, 5, 6, 7, 9, 10, 12, 13, 15),
                induction_s=6,
                coarse_u_nm=10,
                site_spread=0.06,
            ),
            FilmRuns("al-si", 640, 600, (18, 28, 38, 48), 4, (2, 8, 11, 14), induction_s=6),
            FilmRuns("al-cu", 585, 600, (40,), 4, (1, 5, 8, 12, 15), induction_s=6, own_wafer=True),
            FilmRuns(
                "resist-positive-a", 0, 1390, (600,), 3, (0, 6, 9, 13), own_wafer=True, prior="hard-baked"
            ),
            FilmRuns("sio2-thermal-wet", 0, 500, (1800,), 0.5, (1, 7, 10, 14), own_wafer=True),
            FilmRuns("ti", 0, 100, (900,), 0.8, (3, 8, 12), own_wafer=True),
            FilmRuns("si-100", 0, 1000, (1800,), 0.6, (4, 11), own_wafer=True, note="step height"),
        ),
    ),
    # Retired: an open beaker on a hot plate spread by a fifth.
    RecipeRuns(
        etch="aluminium-open-beaker",
        prefix="AO",
        first=date(2024, 5, 6),
        every_days=45,
        count=7,
        spread=0.22,
        temperature_degc=48,
        temperature_sd=4,
        load_cm2=78.5,
        bath="pan-beaker",
        fresh_bath=True,
        films=(FilmRuns("al-evaporated", 470, 600, (40,), 5),),
    ),
    # Negative induction: the film goes on etching on its way to the rinse.
    RecipeRuns(
        etch="gold-ki-i2",
        prefix="GK",
        first=date(2026, 3, 9),
        every_days=20,
        count=12,
        spread=0.06,
        temperature_degc=22.0,
        temperature_sd=0.3,
        load_cm2=20,
        bath="ki",
        films=(
            FilmRuns("au", 640, 300, (15,), 2, (0, 2, 3, 5, 6, 8, 9, 11), induction_s=-1.2, coarse_u_nm=6),
            FilmRuns("au", 640, 300, (6, 10, 14, 18), 2, (1, 4, 7, 10), induction_s=-1.2),
            FilmRuns("cr", 0, 60, (300,), 0.6, (0, 3, 6, 9), own_wafer=True),
            FilmRuns("ti", 0, 100, (300,), 0.6, (1, 4, 7, 10), own_wafer=True),
            FilmRuns("resist-positive-a", 0, 1400, (300,), 3, (2, 5, 8), own_wafer=True, prior="hard-baked"),
            FilmRuns("sio2-thermal-wet", 0, 500, (600,), 0.5, (3, 9), own_wafer=True),
            FilmRuns("glass-borosilicate", 0, 1000, (600,), 0.8, (6,), own_wafer=True, note="step height"),
        ),
    ),
    # The bath tires: two percent a session, no event logged.
    RecipeRuns(
        etch="chromium-can",
        prefix="CC",
        first=date(2026, 5, 11),
        every_days=15,
        count=13,
        spread=0.025,
        temperature_degc=20.0,
        temperature_sd=0.2,
        load_cm2=20,
        drift=-0.024,
        bath="can",
        films=(
            FilmRuns("cr", 150, 150, (40,), 0.8),
            FilmRuns("au", 0, 210, (600,), 1.5, (1, 5, 9), own_wafer=True),
            FilmRuns("resist-positive-a", 0, 1400, (600,), 3, (2, 7, 11), own_wafer=True, prior="hard-baked"),
            FilmRuns("glass-borosilicate", 0, 1000, (600,), 0.8, (3, 10), own_wafer=True, note="step height"),
            FilmRuns("sio2-thermal-wet", 0, 500, (600,), 0.5, (4, 8), own_wafer=True),
        ),
    ),
    RecipeRuns(
        etch="tungsten-peroxide",
        prefix="WP",
        first=date(2026, 5, 25),
        every_days=22,
        count=8,
        spread=0.06,
        temperature_degc=50.0,
        temperature_sd=0.4,
        load_cm2=40,
        bath="h2o2",
        fresh_bath=True,
        films=(
            FilmRuns("w", 140, 220, (60,), 1),
            FilmRuns("tiw", 45, 150, (120,), 1, (2, 5), own_wafer=True),
            FilmRuns(
                "resist-positive-a", 0.6, 1390, (300,), 3, (1, 4, 6), own_wafer=True, prior="hard-baked"
            ),
            FilmRuns("sio2-thermal-wet", 0, 500, (1200,), 0.5, (0, 3, 7), own_wafer=True),
            FilmRuns("sin-lpcvd", 0, 150, (1200,), 0.3, (5,), own_wafer=True),
        ),
    ),
    RecipeRuns(
        etch="copper-ferric",
        prefix="CF",
        first=date(2026, 2, 9),
        every_days=40,
        count=6,
        spread=0.16,
        temperature_degc=22.5,
        temperature_sd=1,
        load_cm2=20,
        bath="fecl3",
        fresh_bath=True,
        films=(
            FilmRuns("cu", 3500, 1000, (10,), 8, induction_s=-0.8),
            FilmRuns("ti", 0, 100, (120,), 0.8, (0, 3), own_wafer=True),
            FilmRuns("resist-positive-a", 0, 1400, (120,), 3, (1, 4), own_wafer=True, prior="hard-baked"),
        ),
    ),
    RecipeRuns(
        etch="ito-hydrochloric",
        prefix="IH",
        first=date(2026, 6, 15),
        every_days=33,
        count=5,
        spread=0.14,
        temperature_degc=40,
        temperature_sd=1,
        load_cm2=16,
        bath="hcl",
        fresh_bath=True,
        films=(
            FilmRuns("ito", 36, 150, (120,), 1),
            FilmRuns("resist-positive-a", 0, 1400, (420,), 3, (0, 2, 4), own_wafer=True, prior="hard-baked"),
            FilmRuns("glass-borosilicate", 0, 1000, (420,), 0.8, (1, 3), own_wafer=True, note="step height"),
        ),
    ),
)
