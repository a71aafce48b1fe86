"""Densities, distribution functions and quantiles for the tests of fit/, from general numerical libraries (scipy, mpmath at 40 digits).

Run: python3 test/oracles/fit_values.py > test/checks/fitValues.json
"""
import json
import mpmath as mp
import numpy as np
from scipy import stats

mp.mp.dps = 40


def phi_log(x):
    return float(mp.log(mp.erfc(-mp.mpf(x) / mp.sqrt(2)) / 2))


def truncated(mean, sd, low, high):
    a = -np.inf if low is None else (low - mean) / sd
    b = np.inf if high is None else (high - mean) / sd
    return stats.truncnorm(a, b, mean, sd)


def rows(dist, probabilities=(0.001, 0.05, 0.3, 0.5, 0.9, 0.999)):
    out = []
    for p in probabilities:
        x = float(dist.ppf(p))
        out.append({"x": x, "cdf": float(dist.cdf(x)), "logDensity": float(dist.logpdf(x))})
    return out


priors = [
    ({"prior": "uniform", "low": -3, "high": 5}, stats.uniform(-3, 8)),
    ({"prior": "logUniform", "low": 20, "high": 2000}, stats.loguniform(20, 2000)),
    ({"prior": "normal", "mean": -9, "sd": 0.4}, stats.norm(-9, 0.4)),
    ({"prior": "logNormal", "median": 120, "logSd": 0.7}, stats.lognorm(0.7, 0, 120)),
    ({"prior": "truncatedNormal", "mean": 1, "sd": 2, "low": 0}, truncated(1, 2, 0, None)),
    ({"prior": "truncatedNormal", "mean": 1, "sd": 2, "high": -1}, truncated(1, 2, None, -1)),
    ({"prior": "truncatedNormal", "mean": 0.5, "sd": 0.25, "low": 0, "high": 1}, truncated(0.5, 0.25, 0, 1)),
    ({"prior": "beta", "a": 2, "b": 5}, stats.beta(2, 5)),
    ({"prior": "beta", "a": 0.5, "b": 0.5}, stats.beta(0.5, 0.5)),
]
student = []
for degrees in (1, 2.5, 4, 30):
    for z in (-8.0, -1.3, 0.0, 0.7, 3.0):
        t = stats.t(degrees)
        student.append({"degrees": degrees, "z": z, "logDensity": float(t.logpdf(z)), "logCdf": float(t.logcdf(z))})
out = {
    "source": "scipy %s distributions; log of the normal distribution function by mpmath at 40 digits" % __import__("scipy").__version__,
    "priors": [{"prior": p, "rows": rows(d)} for p, d in priors],
    "student": student,
    "logNormalCdf": [{"x": x, "value": phi_log(x)} for x in (-40, -12, -5, -3.0001, -2.9999, -1, -0.1, 0, 0.5, 2.9, 3.1, 6, 9)],
    "paretoTail": {
        "note": "quantiles of scipy.stats.genpareto at (i - 0.5)/n",
        "cases": [
            {"shape": k, "scale": s, "excesses": stats.genpareto(k, 0, s).ppf((np.arange(1, 201) - 0.5) / 200).tolist()}
            for k, s in ((0.2, 1.0), (0.7, 3.0), (-0.2, 1.0))
        ],
    },
}
print(json.dumps(out, indent=1))
