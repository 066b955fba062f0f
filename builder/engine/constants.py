"""
Every fixed number of the statistics: value, meaning, source.

Physical data and a lab's own defaults are records, not constants.
"""

from __future__ import annotations

DETECTION_QUANTILE = 1.645
"""One-sided 95 % normal quantile as printed by Currie 1968, Anal. Chem. 40, 586 (from memory)."""

TREND_CONFIDENCE = 0.95
"""Two-sided confidence at which a slope over a series counts as a trend; common practice, no source."""

TREND_MIN_RUNS = 4
"""Fewer runs leave a slope with at most one degree of freedom: its interval says nothing."""

LINE_MIN_TIMES = 3
"""Distinct times needed for a line with an intercept and at least one degree of freedom."""

PSEUDO_RECIPES = 4
"""How many recipes the lab's prior spread counts for in every fit."""

PSEUDO_RECIPE_DF = 1
"""
Degrees of freedom of a pseudo-recipe: as informative as a recipe with two runs, the least that can be fitted.
More would let a prior wrong by a factor of 1.5 move the coverage of 20 recipes out of 88 to 92 %.
"""

MIN_FITTED_RECIPES = 4
"""With fewer recipes of two or more runs the prior stands alone."""

LEAVE_ONE_OUT_BELOW = 10
"""Below this many fitted recipes a recipe's own scatter would visibly be used twice."""

SPREAD_UNCERTAINTY = 2.0
"""
Variance added to the between-recipe log variance, times 1 / (recipes + pseudo-recipes).

It stands for the uncertainty of s0 and d0, which a plug-in takes as known. Chosen by simulation
(bench/coverage.py); coverage is flat between 1 and 3.
"""

SPREAD_PASSES = 3
"""Passes of the weighted moment fit; the weights need the variance that the fit gives."""

WEIGHT_VARIANCE_FLOOR = 0.15
"""Smallest between-recipe log variance used for weights, so that no one recipe takes over the fit."""

MIN_VARIANCE_FRACTION = 1e-3
"""
Smallest sample variance in the fit, as a fraction of the prior's: 3 % of its standard deviation.

Two equal rounded readings have variance 0, whose logarithm would swamp every other recipe.
"""

TRIGAMMA_TOLERANCE = 1e-12
TRIGAMMA_MAX_STEPS = 60
TRIGAMMA_LARGE = 1e7
TRIGAMMA_SMALL = 1e-6
"""Beyond these the leading terms of the trigamma function are exact to rounding (Smyth 2004, appendix)."""

BISECTION_STEPS = 200
"""Halvings of a bracket: more than double precision can use."""

CENSORED_MAX_STEPS = 20_000
CENSORED_TOLERANCE = 1e-12

MOVING_RANGE_D2 = 1.128
"""Mean moving range of two in standard deviations, 2/sqrt(pi), as printed in ASTM E2587 (from memory)."""

MOVING_RANGE_D4 = 3.267
"""Upper limit factor of the moving range of two, ASTM E2587 (from memory)."""

CHART_SIGMAS = 3
"""Shewhart limits; NIST/SEMATECH e-Handbook 6.3.2.2."""
