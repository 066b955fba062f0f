"""From the inputs of a case file to the engine's numbers, under the names the case file uses."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from builder import engine
from builder.engine.quantiles import chi_squared
from builder.engine.trigamma import degrees_for, log_bias_of, log_variance_of

# Case files are JSON: what a case holds is known only to the route that reads it.
Values = Mapping[str, Any]


def line_fit(given: Values) -> Values:
    """A line, and what is asked of it: depth at `at_s`, time to `depth_nm`."""
    fit = engine.fit_line(
        given["times_s"], given["depths_nm"], given["u_depth_nm"], rescale=given.get("rescale", False)
    )
    found = {
        "intercept": fit.intercept_nm,
        "slope": fit.slope_nm_per_s,
        "u_intercept": fit.u_intercept_nm,
        "u_slope": fit.u_slope_nm_per_s,
        "cov": fit.cov_nm2_per_s,
        "chi2": fit.chi2,
        "dof": fit.dof,
        "s_residual": fit.s_residual_nm,
        "birge_ratio": fit.reduced_chi2**0.5,
        "induction_s": fit.induction_s,
    }
    if fit.u_slope_nm_per_s > 0:
        found["correlation"] = fit.cov_nm2_per_s / (fit.u_intercept_nm * fit.u_slope_nm_per_s)
        found["f_ratio"] = (fit.slope_nm_per_s / fit.u_slope_nm_per_s) ** 2
    if "at_s" in given:
        mean = engine.mean_depth_at(fit, given["at_s"])
        found |= {"depth_at": mean.depth_nm, "u_depth_at": mean.u_nm}
    if "depth_nm" in given:
        time = engine.time_to_depth(
            fit, given["depth_nm"], given["quantile"], u_new_nm=given.get("u_new_nm", 0.0)
        )
        found |= {"time_s": time.time_s, "u_s": time.u_s, "lo_s": time.lo_s, "hi_s": time.hi_s}
    return found


def pooling(given: Values) -> Values:
    """A pooled mean, its intervals and the prediction intervals."""
    methods = {"fixed": engine.fixed_effect, "dl": engine.dersimonian_laird, "pm": engine.paule_mandel}
    values, u = given["values"], given["u"]
    pooled = methods[given["method"]](values, u)
    found = {"mean": pooled.mean, "se": pooled.se, "q": pooled.q, "i2": pooled.i2, "tau2": pooled.tau2}
    found |= {"tau": pooled.tau2**0.5, "hk_se": engine.hartung_knapp_se(values, u, pooled.tau2)}
    if "confidence" not in given:
        return found
    confidence = given["confidence"]
    intervals = {
        "normal": engine.mean_interval(pooled.mean, pooled.se, float("inf"), confidence),
        "hk": engine.mean_interval(pooled.mean, found["hk_se"], len(values) - 1, confidence),
        "next_k2": engine.prediction_interval(pooled, confidence),
        "next_k1": engine.prediction_interval(pooled, confidence, engine.DegreesRule.K_MINUS_1),
    }
    return found | {f"{name}_{end}": getattr(i, end) for name, i in intervals.items() for end in ("lo", "hi")}


def selectivity(given: Values) -> Values:
    """Fieller's limits of a ratio."""
    ratio = engine.fieller_ratio(**given)
    return {"ratio": ratio.ratio, "lo": ratio.lo, "hi": ratio.hi, "g": ratio.g}


def individuals(given: Values) -> Values:
    """An individuals chart, or an EWMA chart where a target is given."""
    if "target" in given:
        points = engine.ewma_chart(**given)
        last = points[-1]
        return {"ewma": [p.value for p in points], "last_lower": last.lower, "last_upper": last.upper}
    chart = engine.individuals_chart(given["values"])
    return {
        "centre": chart.centre,
        "lower": chart.lower,
        "upper": chart.upper,
        "mean_moving_range": chart.mean_moving_range,
        "moving_range_upper": chart.moving_range_upper,
        "e2": (chart.upper - chart.centre) / chart.mean_moving_range,
    }


def series(given: Values) -> Values:
    """The von Neumann ratio."""
    return {"ratio": engine.von_neumann_ratio(given["values"])}


def tolerance(given: Values) -> Values:
    """The factors for `n` runs, or the runs needed to see a shift."""
    if "shift" in given:
        return {"runs": engine.runs_to_see(**given)}
    n, confidence = given["n"], given["confidence"]
    found = {
        "prediction": engine.prediction_factor(n, confidence),
        "sigma_upper": engine.sigma_upper_factor(n, confidence),
        "zero_failures": engine.zero_failures_upper(n, confidence),
    }
    if "content" in given:
        found["one_sided"] = engine.tolerance_factor_one_sided(n, given["content"], confidence)
        found["two_sided"] = engine.tolerance_factor_two_sided(n, given["content"], confidence)
    return found


def limits(given: Values) -> Values:
    """Whichever limit the inputs belong to."""
    if "u_zero" in given:
        found = engine.currie(given["u_zero"], paired=given["paired"])
        return {"decision": found.decision, "detection": found.detection}
    if "reading" in given:
        return {"upper": engine.feldman_cousins_upper(given["reading"], given["confidence"])}
    if "observed" in given:
        fit = engine.left_censored_normal(**given)
        return {"mean": fit.mean, "sd": fit.sd}
    return {"limit": engine.run_limit(**given)}


def run_rate(given: Values) -> Values:
    """The rate or limit of one run."""
    found = engine.run_rate(**given)
    return {"rate": found.rate_nm_per_s, "u_log": found.u_log, "limit": found.limit_nm_per_s}


def next_run(given: Values) -> Values:
    """The interval of the next run."""
    runs = [engine.RunRate(**{"log_rate": None, **run}) for run in given["runs"]]
    spread = engine.Spread(**given["spread"], recipes=20, from_prior=False)
    found = engine.predict_next_run(runs, spread, given["confidence"], given.get("u_gauge_log", 0.0))
    half = None if found.log_lo is None else (found.log_hi - found.log_lo) / 2
    values = {"lo": found.log_lo, "mid": found.log_mid, "hi": found.log_hi, "half": half}
    return values | {name: getattr(found, name) for name in ("s_tilde", "df", "share_own", "tau", "sum_w")}


def quantiles(given: Values) -> Values:
    """Quantiles of the three distributions, or how rare a normal deviate is."""
    if "z" in given:
        return {"one_in": 1 / engine.normal_cdf(given["z"])}
    p, df = given["p"], given.get("df", 1)
    return {
        "normal": engine.normal(p),
        "student_t": engine.student_t(p, df),
        "chi_squared": chi_squared(p, df),
    }


def trigamma(given: Values) -> Values:
    """The moments of ln(variance), or the degrees of freedom they belong to."""
    if "log_variance_value" in given:
        return {"degrees": degrees_for(given["log_variance_value"])}
    return {"log_variance": log_variance_of(given["df"]), "log_bias": log_bias_of(given["df"])}
