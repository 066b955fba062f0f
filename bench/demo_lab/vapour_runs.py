"""True values of HF vapour and XeF2, invented."""

from __future__ import annotations

from datetime import date

from bench.demo_lab.plan import Event, FilmRuns, RecipeRuns

_STEP = "step height"
_CHIP_CM2 = 1.0

VAPOUR_RUNS: tuple[RecipeRuns, ...] = (
    RecipeRuns(
        etch="oxide-hf-vapour",
        prefix="HV",
        first=date(2026, 1, 19),
        every_days=24,
        count=12,
        spread=0.12,
        temperature_degc=20.0,
        temperature_sd=0.5,
        load_cm2=78.5,
        events={2: Event("repair")},
        films=(
            FilmRuns("sio2-thermal-wet", 70, 2000, (600,), 2, prior="dehydrated", site_spread=0.08),
            FilmRuns("sio2-lto", 82, 1000, (400,), 2, (1, 5, 9), own_wafer=True, prior="dehydrated"),
            FilmRuns("psg-annealed", 155, 1000, (240,), 3, (2, 6, 10), own_wafer=True, prior="dehydrated"),
            FilmRuns("si-100", 0, 1000, (1800,), 0.6, (2, 4, 8, 11), own_wafer=True, note=_STEP),
            FilmRuns("poly-si-undoped", 0, 450, (1800,), 0.5, (3, 7, 10), own_wafer=True),
            FilmRuns("si-soi-device", 0, 2000, (1800,), 1, (3, 6, 9, 11), own_wafer=True),
            FilmRuns(
                "sio2-box", 68, 2000, (600,), 2, (3, 5, 7, 8, 10, 11), own_wafer=True, prior="dehydrated"
            ),
            FilmRuns("al-cu", 0, 600, (1800,), 1.2, (4, 6, 9, 11), own_wafer=True, prior="dehydrated"),
            FilmRuns("sin-low-stress", 1.8, 500, (900,), 0.5, (2, 8), own_wafer=True),
            FilmRuns("al2o3-ald-lab", 0, 50, (1800,), 0.2, (7,), own_wafer=True),
        ),
    ),
    # One run on a warm chuck: a draft with a single number.
    RecipeRuns(
        etch="oxide-hf-vapour-fast",
        prefix="HX",
        first=date(2026, 9, 14),
        every_days=1,
        count=1,
        spread=0.15,
        temperature_degc=35.0,
        load_cm2=78.5,
        films=(FilmRuns("sio2-thermal-wet", 205, 2000, (300,), 2, prior="dehydrated"),),
    ),
    # Loading: a 10 mm chip etches faster than a wafer; both are logged with their load.
    RecipeRuns(
        etch="silicon-xef2",
        prefix="XS",
        first=date(2026, 2, 23),
        every_days=21,
        count=12,
        spread=0.12,
        temperature_degc=22.0,
        temperature_sd=0.5,
        load_cm2=_CHIP_CM2,
        events={3: Event("clean")},
        films=(
            FilmRuns(
                "poly-si-undoped", 185, 900, (180,), 3, prior="native oxide dipped", carrier="10 mm chip"
            ),
            FilmRuns(
                "si-100",
                470,
                5000,
                (300,),
                15,
                (3, 4, 6, 8, 10),
                own_wafer=True,
                carrier="10 mm chip",
                note=_STEP,
            ),
            FilmRuns(
                "si-100",
                470,
                5000,
                (300,),
                15,
                (2, 5, 9),
                own_wafer=True,
                load_cm2=78.5,
                log_shift=-0.6,
                note="full wafer: the gas runs short",
            ),
            FilmRuns("sio2-thermal-wet", 0, 500, (1800,), 0.5, (3, 5, 8, 11), own_wafer=True),
            FilmRuns("resist-positive-a", 0, 1400, (900,), 3, (4, 7, 10), own_wafer=True, prior="hard-baked"),
            FilmRuns("al-cu", 0, 600, (1800,), 1.2, (6, 9), own_wafer=True),
            FilmRuns("sin-lpcvd", 11, 150, (300,), 0.4, (3, 7), own_wafer=True),
        ),
    ),
    RecipeRuns(
        etch="molybdenum-xef2",
        prefix="XM",
        first=date(2026, 7, 20),
        every_days=49,
        count=2,
        spread=0.14,
        temperature_degc=22.0,
        load_cm2=_CHIP_CM2,
        films=(
            FilmRuns("mo", 90, 400, (150,), 3, carrier="10 mm chip"),
            FilmRuns("sio2-thermal-wet", 0, 500, (900,), 0.5, own_wafer=True),
        ),
    ),
)
