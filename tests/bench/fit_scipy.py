"""The other side of fit.bench.ts: the same fits with scipy.optimize.least_squares (trf, bounds, 2-point Jacobian).

Reads one JSON request a line, answers one JSON line. Parameters are the scaled ones of the product (logarithms where it
takes logarithms); the model is written in whole NumPy arrays, with everything that does not depend on the parameters
computed beforehand.
"""

import json
import sys
import time

import numpy as np
import scipy
from scipy.optimize import least_squares


def coil_model(name, omega):
    jw = 1j * omega
    root = np.sqrt(jw)
    lg = np.log(omega / (2000 * np.pi))
    lg_complex = lg + 0.5j * np.pi
    exp = np.exp
    return {
        "inductor": lambda p: jw * exp(p[4]),
        "inductor+eddy": lambda p: jw * exp(p[4]) + 1 / (1 / (jw * exp(p[5])) + exp(-p[6])),
        "power-law": lambda p: exp(p[4] + p[5] * lg_complex),
        "split-power-law": lambda p: exp(p[4] + p[5] * lg) + 1j * exp(p[6] + p[7] * lg),
        "semi-inductance": lambda p: jw * exp(p[4]) + 1 / (1 / (jw * exp(p[5])) + 1 / (exp(p[6]) * root) + exp(p[7])),
    }[name]


def residual_of(request):
    frequency = np.array(request["frequencyHz"])
    log_z = np.log(np.array(request["re"]) + 1j * np.array(request["im"]))
    coil = coil_model(request["coil"], 2 * np.pi * frequency)

    def residual(p):
        x = frequency / np.exp(p[1])
        y = np.exp(-p[2]) + 1j * (x - 1 / x)
        return (log_z - np.log(np.exp(p[0]) + np.exp(p[0] - p[3]) / y + coil(p))).view(float)

    return residual


def answer(request):
    residual = residual_of(request)
    start = np.array(request["start"])
    bounds = (np.array(request["lower"]), np.array(request["upper"]))
    times = []
    for _ in range(request["runs"]):
        begin = time.perf_counter()
        fit = least_squares(residual, start, bounds=bounds)
        times.append((time.perf_counter() - begin) * 1e3)
    return {"times": times, "values": list(fit.x), "cost": float(fit.cost), "evaluations": int(fit.nfev)}


print(json.dumps({"scipy": scipy.__version__, "numpy": np.__version__}), flush=True)
for line in sys.stdin:
    print(json.dumps(answer(json.loads(line))), flush=True)
