"""
The numeric engine: pure functions of plain numbers in nm, s and K, and the frozen results they return.

Other layers import from here. No files, no clock, no randomness without a generator passed in.
"""

from __future__ import annotations

from builder.engine.conflict import (
    LogInterval,
    intervals_conflict,
)
from builder.engine.errors import (
    DomainError,
)
from builder.engine.individuals import (
    EwmaPoint,
    IndividualsChart,
    ewma_chart,
    individuals_chart,
)
from builder.engine.limits import (
    CensoredFit,
    DetectionLimits,
    currie,
    feldman_cousins_upper,
    left_censored_normal,
    run_limit,
)
from builder.engine.line_fit import (
    LineFit,
    Prediction,
    TimeToDepth,
    fit_line,
    mean_depth_at,
    new_depth_at,
    time_to_depth,
)
from builder.engine.next_run import (
    NextRun,
    NextRunKind,
    predict_next_run,
    sample_variance,
)
from builder.engine.pooling import (
    DegreesRule,
    Interval,
    Pooled,
    dersimonian_laird,
    fixed_effect,
    hartung_knapp_safe_se,
    hartung_knapp_se,
    mean_interval,
    paule_mandel,
    plain_interval,
    prediction_interval,
)
from builder.engine.quantiles import (
    normal,
    normal_cdf,
    student_t,
    two_sided_t,
)
from builder.engine.run_rate import (
    RunRate,
    rate_of_line,
    run_rate,
)
from builder.engine.selectivity import (
    FiellerRatio,
    Selectivity,
    fieller_ratio,
    paired_selectivity,
)
from builder.engine.series import (
    Trend,
    TrendAdjusted,
    current_series,
    find_trend,
    predict_in_series,
    split_at_events,
    trend_adjusted,
    von_neumann_ratio,
)
from builder.engine.spread import (
    Spread,
    SpreadPrior,
    fit_spread,
    leave_one_out,
    moderated,
)
from builder.engine.tolerance import (
    prediction_factor,
    runs_to_see,
    sigma_upper_factor,
    tolerance_factor_one_sided,
    tolerance_factor_two_sided,
    zero_failures_upper,
)

__all__ = [
    "CensoredFit",
    "DegreesRule",
    "DetectionLimits",
    "DomainError",
    "EwmaPoint",
    "FiellerRatio",
    "IndividualsChart",
    "Interval",
    "LineFit",
    "LogInterval",
    "NextRun",
    "NextRunKind",
    "Pooled",
    "Prediction",
    "RunRate",
    "Selectivity",
    "Spread",
    "SpreadPrior",
    "TimeToDepth",
    "Trend",
    "TrendAdjusted",
    "current_series",
    "currie",
    "dersimonian_laird",
    "ewma_chart",
    "feldman_cousins_upper",
    "fieller_ratio",
    "find_trend",
    "fit_line",
    "fit_spread",
    "fixed_effect",
    "hartung_knapp_safe_se",
    "hartung_knapp_se",
    "individuals_chart",
    "intervals_conflict",
    "leave_one_out",
    "left_censored_normal",
    "mean_depth_at",
    "mean_interval",
    "moderated",
    "new_depth_at",
    "normal",
    "normal_cdf",
    "paired_selectivity",
    "paule_mandel",
    "plain_interval",
    "predict_in_series",
    "predict_next_run",
    "prediction_factor",
    "prediction_interval",
    "rate_of_line",
    "run_limit",
    "run_rate",
    "runs_to_see",
    "sample_variance",
    "sigma_upper_factor",
    "split_at_events",
    "student_t",
    "time_to_depth",
    "tolerance_factor_one_sided",
    "tolerance_factor_two_sided",
    "trend_adjusted",
    "two_sided_t",
    "von_neumann_ratio",
    "zero_failures_upper",
]
