"""Writes test/checks/numericValues.json: normal distribution at 40 digits (mpmath), quantiles and regressions (numpy, scipy).

Run: python3 test/oracles/numeric_values.py
"""

import json
import pathlib

import mpmath
import numpy as np
from mpmath import mp, mpf
from scipy import optimize

mp.dps = 40


def normal_row(z):
    z = mpf(z)
    return {
        "z": float(z),
        "cdf": float(mpmath.erfc(-z / mpmath.sqrt(2)) / 2),
        "erf": float(mpmath.erf(z)),
        "erfc": float(mpmath.erfc(z)),
    }


def quantile_row(p):
    p = mpf(p)
    start = -mpmath.sqrt(-2 * mpmath.log(p)) if p < 0.1 else mpf(0)
    f = lambda z: mpmath.log(mpmath.erfc(-z / mpmath.sqrt(2)) / 2) - mpmath.log(p)
    return {"p": float(p), "z": float(mpmath.findroot(f, start))}


def regression():
    rng = np.random.default_rng(5)
    x = np.linspace(0, 2, 12)
    design = np.column_stack([np.ones_like(x), x, np.sin(3 * x)])
    y = design @ np.array([1.5, -0.7, 2.0]) + 0.1 * rng.normal(size=x.size)
    w = rng.uniform(0.2, 3, x.size)
    root = np.sqrt(w)
    c, *_ = np.linalg.lstsq(design * root[:, None], y * root, rcond=None)
    r = y - design @ c
    s2 = np.sum(w * r**2) / (x.size - 3)
    cov = s2 * np.linalg.inv(design.T @ (w[:, None] * design))
    return {
        "design": design.ravel().tolist(),
        "observations": y.tolist(),
        "weights": w.tolist(),
        "coefficients": c.tolist(),
        "covariance": cov.ravel().tolist(),
        "residualSd": float(np.sqrt(s2)),
    }


def huber():
    """Least Huber loss at a given spread, by a general minimiser."""
    rng = np.random.default_rng(6)
    x = np.linspace(-1, 1, 40)
    design = np.column_stack([np.ones_like(x), x])
    y = 3 + 2 * x + 0.2 * rng.standard_normal(40)
    y[[3, 17, 30]] += [4, -6, 9]
    spread = lambda c: np.median(np.abs(y - design @ c)) / 0.6744897501960817
    c = np.linalg.lstsq(design, y, rcond=None)[0]
    for _ in range(200):
        s = spread(c)
        fit = optimize.least_squares(lambda c: (y - design @ c) / s, c, loss="huber", f_scale=1.345, xtol=1e-15, ftol=1e-15, gtol=1e-15)
        done = np.max(np.abs(fit.x - c)) < 1e-13
        c = fit.x
        if done:
            break
    return {"design": design.ravel().tolist(), "observations": y.tolist(), "coefficients": c.tolist(), "spread": float(spread(c)), "tolerance": 1e-6}


values = [0.3, -1.25, 7, 2.5, 2.5, -4, 11.75, 0]
probabilities = [0, 0.05, 0.25, 1 / 3, 0.5, 0.9, 0.999, 1]
out = {
    "source": "mpmath at 40 digits; numpy quantile (default method), lstsq and inv; scipy least_squares with Huber loss",
    "normal": [normal_row(z) for z in [-37.5, -20, -8, -3, -1.5, -0.7, -1e-3, -1e-12, 0, 1e-9, 0.25, 1, 1.7, 2.5, 4, 6]],
    "normalQuantile": [quantile_row(p) for p in ["1e-300", "1e-100", "1e-15", "1e-6", "0.001", "0.025", "0.1", "0.25", "0.4", "0.49"]],
    "quantile": {
        "values": sorted(values),
        "p": probabilities,
        "expected": [float(np.quantile(values, p)) for p in probabilities],
    },
    "regression": regression(),
    "huber": huber(),
}
for row in out["normalQuantile"]:
    assert row["p"] > 0
path = pathlib.Path(__file__).parent.parent / "checks" / "numericValues.json"
path.write_text(json.dumps(out, indent=2) + "\n")
