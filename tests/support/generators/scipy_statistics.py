"""Numbers from SciPy and NumPy that the statistics of shared/science are compared with.

python3 tests/support/generators/scipy_statistics.py > tests/support/generators/scipy-statistics.json
"""

import json
import sys

import numpy as np
import scipy
from scipy import stats

DRIFT_DAYS = [0, 92, 181, 273, 365, 457, 546]
DRIFT_ERRORS = [0.02, -0.11, -0.24, -0.31, -0.49, -0.55, -0.71]
DRIFT_U = [0.1, 0.1, 0.05, 0.05, 0.1, 0.05, 0.05]


def t_quantiles():
    freedoms = [1, 1.5, 2, 3, 4, 4.7, 9, 16, 19, 30, 100, 1e4, 1e8]
    probabilities = [1e-9, 0.001, 0.25, 0.6, 0.9, 0.95, 0.975, 0.97725, 0.995, 0.9999]
    return [
        {"probability": p, "degreesOfFreedom": v, "t": stats.t.ppf(p, v)} for v in freedoms for p in probabilities
    ]


def t_probabilities():
    return [
        {"t": t, "degreesOfFreedom": v, "probability": stats.t.cdf(t, v)}
        for v in [1, 2.5, 4, 19, 200]
        for t in [-6.5, -2, -0.3, 0, 1.1, 2.7764, 9]
    ]


def normal():
    quantiles = [1e-12, 1e-9, 0.001, 0.05, 0.31, 0.5, 0.9, 0.95, 0.975, 0.999999, 1 - 1e-9]
    deviates = [-8, -3, -1.4, -0.2, 0, 0.7, 1.96, 4.5]
    return {
        "quantiles": [{"probability": p, "z": stats.norm.ppf(p)} for p in quantiles],
        "probabilities": [{"z": z, "probability": stats.norm.cdf(z)} for z in deviates],
    }


def chi_square():
    return [
        {"chiSquare": x, "degreesOfFreedom": v, "probability": stats.chi2.sf(x, v)}
        for v in [1, 2, 3, 4, 7, 10, 45, 120]
        for x in [0.01, 0.7, 3, 12.5, 60, 400]
    ]


def poisson_upper_rates():
    return [
        {"failures": n, "confidence": c, "mean": stats.chi2.ppf(c, 2 * (n + 1)) / 2}
        for n in [0, 1, 4, 30]
        for c in [0.6, 0.9, 0.95]
    ]


def unweighted_line():
    fit = stats.linregress(DRIFT_DAYS, DRIFT_ERRORS)
    return {
        "intercept": fit.intercept,
        "slope": fit.slope,
        "interceptStandardError": fit.intercept_stderr,
        "slopeStandardError": fit.stderr,
        "rSquared": fit.rvalue**2,
    }


def weighted_line():
    """Normal equations by QR on the scaled design, errors from the given u alone."""
    weight = 1 / np.array(DRIFT_U)
    design = np.column_stack([np.ones(len(DRIFT_DAYS)), DRIFT_DAYS]) * weight[:, None]
    target = np.array(DRIFT_ERRORS) * weight
    q, r = np.linalg.qr(design)
    beta = np.linalg.solve(r, q.T @ target)
    inverse = np.linalg.inv(r)
    covariance = inverse @ inverse.T
    residual = target - design @ beta
    return {
        "intercept": beta[0],
        "slope": beta[1],
        "interceptStandardError": np.sqrt(covariance[0, 0]),
        "slopeStandardError": np.sqrt(covariance[1, 1]),
        "covariance": covariance[0, 1],
        "chiSquare": residual @ residual,
    }


def welch():
    before, after = [1.0, 2.0, 1.5, 2.2, 1.1], [3.9, 4.4, 3.7, 4.1, 5.0, 4.2]
    result = stats.ttest_ind(after, before, equal_var=False)
    return {"before": before, "after": after, "t": result.statistic}


json.dump(
    {
        "library": f"scipy {scipy.__version__}, numpy {np.__version__}",
        "driftLine": {"days": DRIFT_DAYS, "errors": DRIFT_ERRORS, "u": DRIFT_U},
        "tQuantiles": t_quantiles(),
        "tProbabilities": t_probabilities(),
        "normal": normal(),
        "chiSquare": chi_square(),
        "poissonUpperMeans": poisson_upper_rates(),
        "unweightedLine": unweighted_line(),
        "weightedLine": weighted_line(),
        "welch": welch(),
    },
    sys.stdout,
    indent=1,
)
