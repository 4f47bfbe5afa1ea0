"""The other side of read.bench.ts: writes the files, and reads them with numpy.loadtxt that is told the delimiter.

Reads one JSON request a line, answers one JSON line: after writing with the number of rows, after reading with the time in
ms, the number of rows and a few of them.
"""

import json
import sys
import time

import numpy as np


def write(request):
    """Frequency, magnitude and phase of an invented curve under one heading."""
    i = np.arange(request["rows"])
    f = 1 + i * 23_999 / (request["rows"] - 1)
    table = np.column_stack([f, 6 + 5e-4 * f + 0.01 * np.sin(i), 10 + f / 500 + 0.1 * np.cos(i)])
    heading = request["delimiter"].join(["frequency_hz", "magnitude_ohm", "phase_deg"])
    np.savetxt(request["path"], table, fmt=request["format"], delimiter=request["delimiter"], header=heading, comments="")
    return {"rows": len(table)}


def read(request):
    start = time.perf_counter()
    table = np.loadtxt(request["path"], delimiter=request["delimiter"], skiprows=1)
    elapsed = (time.perf_counter() - start) * 1000
    return {"ms": elapsed, "rows": len(table)}


print(json.dumps({"numpy": np.__version__}), flush=True)
for line in sys.stdin:
    request = json.loads(line)
    print(json.dumps(write(request) if "format" in request else read(request)), flush=True)
