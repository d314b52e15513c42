"""The fit of one shot by scipy.optimize.curve_fit: samples as JSON on stdin, times, estimates and covariance on stdout."""
import json
import sys
import time

import numpy as np
import scipy
from scipy.optimize import curve_fit

given = json.load(sys.stdin)
t, x, shot = np.array(given["t"]), np.array(given["x"]), given["shot"]
after = (t >= shot).astype(float)
s_shot = np.where(t >= shot, t - shot, 0.0)
s_start = t - t[0]


def parts(s, w, z):
    root = np.sqrt(1 - z * z)
    e = np.exp(-z * w * s)
    return e * np.cos(w * root * s), e * np.sin(w * root * s), root


def swing(s, w, z, p, v):
    c, d, root = parts(s, w, z)
    return c * p + d * (z * p + v) / root


def model(t, w, z, a, b, p, v, jump):
    return a + b * t + swing(s_start, w, z, p, v) + after * swing(s_shot, w, z, 0.0, jump)


def slopes_of_swing(s, w, z, p, v):
    c, d, root = parts(s, w, z)
    by_w = s * (v * c - (p + z * v) / root * d)
    by_z = (p + v * z) / root**3 * d - w * (p + z * v) / root**2 * s * c - w * v / root * s * d
    return by_w, by_z, c + z / root * d, d / root


def slopes(t, w, z, a, b, p, v, jump):
    w0, z0, p0, v0 = slopes_of_swing(s_start, w, z, p, v)
    w1, z1, _, v1 = slopes_of_swing(s_shot, w, z, 0.0, jump)
    return np.stack([w0 + after * w1, z0 + after * z1, np.ones_like(t), t, p0, v0, after * v1], axis=1)


start = [*given["start"], float(x.mean()), 0.0, 0.0, 0.0, 0.0]


def timed(**options):
    seconds = []
    for run in range(given["runs"] + 10):
        begun = time.perf_counter()
        found = curve_fit(model, t, x, p0=start, **options)
        if run >= 10:
            seconds.append(time.perf_counter() - begun)
    return seconds, found


seconds, (estimates, covariance) = timed()
by_slopes, (again, _) = timed(jac=slopes)
if not np.allclose(estimates, again, rtol=1e-5, atol=1e-6):
    sys.exit("with slopes as formulas it answers otherwise")
json.dump({"scipy": scipy.__version__, "seconds": seconds, "estimates": estimates.tolist(), "covariance": covariance.tolist(), "secondsBySlopes": by_slopes}, sys.stdout)
