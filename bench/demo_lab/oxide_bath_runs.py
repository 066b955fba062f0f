"""True values of the oxide baths (buffered and dilute HF), invented."""

from __future__ import annotations

from datetime import date

from bench.demo_lab.plan import Event, FilmRuns, LotChange, RecipeRuns

_STEP = "step height against a protected mesa"

OXIDE_BATH_RUNS: tuple[RecipeRuns, ...] = (
    # Many runs of everything: the recipe that shows what "holds" rests on.
    RecipeRuns(
        etch="oxide-bhf",
        prefix="OB",
        first=date(2026, 5, 4),
        every_days=14,
        count=14,
        spread=0.03,
        temperature_degc=20.0,
        load_cm2=78.5,
        bath="bhf",
        events={3: Event("new bath")},
        films=(
            FilmRuns("sio2-thermal-wet", 101, 520, (180,), 0.8, coarse_u_nm=2.5, site_spread=0.021),
            FilmRuns(
                "resist-positive-a", 0, 1380, (1200,), 3, (0, 3, 6, 9, 11), own_wafer=True, prior="hard-baked"
            ),
            FilmRuns("si-100", 0, 1000, (1800,), 0.6, (2, 5, 8, 12), own_wafer=True, note=_STEP),
            FilmRuns("sin-lpcvd", 0.85, 150, (1200,), 0.3, (1, 4, 7, 10), own_wafer=True),
            FilmRuns("al-si", 138, 600, (60,), 4, (4, 10), own_wafer=True),
        ),
    ),
    # No loss seen: all limits on silicon, mixed on undoped poly.
    RecipeRuns(
        etch="oxide-hf-10-1",
        prefix="HD",
        first=date(2026, 1, 12),
        every_days=28,
        count=11,
        spread=0.04,
        temperature_degc=20.5,
        temperature_sd=0.4,
        load_cm2=78.5,
        bath="dhf",
        films=(
            FilmRuns("sio2-thermal-wet", 23.5, 500, (600,), 0.6),
            FilmRuns("sio2-thermal-dry", 22.8, 100, (180,), 0.3, (1, 5, 8), own_wafer=True),
            FilmRuns("sio2-lto", 35, 400, (300,), 0.8, (2, 6, 9), own_wafer=True),
            FilmRuns("si-100", 0, 1000, (1800,), 0.6, (0, 4, 8), own_wafer=True, note=_STEP),
            FilmRuns("poly-si-undoped", 0.03, 450, (1200,), 0.5, (1, 3, 7, 10), own_wafer=True),
            FilmRuns("sin-lpcvd", 1.05, 150, (900,), 0.3, (3, 7), own_wafer=True),
            FilmRuns("resist-positive-a", 0, 1400, (600,), 3, (2, 6), own_wafer=True, prior="hard-baked"),
        ),
    ),
    # Half the published rate, beyond both intervals: the conflict the health page must show.
    RecipeRuns(
        etch="oxide-bhf-slow",
        prefix="OS",
        first=date(2026, 6, 1),
        every_days=21,
        count=7,
        spread=0.03,
        temperature_degc=20.0,
        load_cm2=78.5,
        bath="bhf-slow",
        films=(
            FilmRuns("sio2-thermal-wet", 24, 500, (300,), 0.6),
            FilmRuns("resist-positive-a", 0, 1390, (1200,), 3, (1, 4), own_wafer=True, prior="hard-baked"),
            FilmRuns("si-100", 0, 1000, (1800,), 0.6, (2, 5), own_wafer=True, note=_STEP),
        ),
    ),
    # A new film lot etches a fifth faster: the old runs must not predict it.
    RecipeRuns(
        etch="oxide-pecvd-bhf",
        prefix="PB",
        first=date(2026, 4, 7),
        every_days=16,
        count=13,
        spread=0.05,
        temperature_degc=20.0,
        load_cm2=78.5,
        bath="bhf",
        films=(
            FilmRuns(
                "sio2-pecvd-lab",
                430,
                620,
                (40,),
                1.5,
                lot="P26-03",
                lot_changes={8: LotChange("P26-08", 0.18)},
                site_spread=0.035,
            ),
            FilmRuns("resist-positive-a", 0, 1380, (300,), 3, (1, 8, 11), own_wafer=True, prior="hard-baked"),
            FilmRuns("al-cu", 125, 600, (60,), 4, (3, 9), own_wafer=True),
            FilmRuns("si-100", 0, 1000, (900,), 0.6, (5, 10), own_wafer=True, note=_STEP),
        ),
    ),
    # Open beaker: etches fast, spreads widely.
    RecipeRuns(
        etch="titanium-hf-peroxide",
        prefix="TH",
        first=date(2026, 2, 16),
        every_days=28,
        count=9,
        spread=0.14,
        temperature_degc=21.5,
        temperature_sd=0.8,
        load_cm2=20,
        bath="tihf",
        fresh_bath=True,
        films=(
            FilmRuns("ti", 980, 200, (7,), 2, prior="in air overnight"),
            FilmRuns("sio2-thermal-wet", 11.5, 500, (300,), 0.6, (1, 4, 7), own_wafer=True),
            FilmRuns("au", 0, 210, (300,), 1.5, (2, 5, 8), own_wafer=True),
            FilmRuns("resist-positive-a", 0, 1400, (180,), 3, (3, 6), own_wafer=True, prior="hard-baked"),
        ),
    ),
    RecipeRuns(
        etch="silicon-isotropic-nitric",
        prefix="SN",
        first=date(2026, 3, 23),
        every_days=35,
        count=6,
        spread=0.15,
        temperature_degc=20.5,
        temperature_sd=0.7,
        load_cm2=40,
        bath="nnf",
        fresh_bath=True,
        films=(
            FilmRuns("poly-si-undoped", 104, 480, (150,), 2),
            FilmRuns("si-100", 148, 3000, (600,), 12, (1, 3, 5), own_wafer=True, note=_STEP),
            FilmRuns("sio2-thermal-wet", 8.7, 500, (300,), 0.6, (0, 2, 4), own_wafer=True),
            FilmRuns("resist-positive-a", 0, 1400, (300,), 3, (1, 4), own_wafer=True, prior="hard-baked"),
        ),
    ),
)
