"""The other side of read.bench.ts: numpy.loadtxt that is told the delimiter and where the data starts.

Reads one JSON request a line, answers one JSON line with the time in ms, the shape and a few numbers to compare.
"""

import json
import sys
import time

import numpy as np

print(json.dumps({"numpy": np.__version__}), flush=True)
for line in sys.stdin:
    request = json.loads(line)
    start = time.perf_counter()
    table = np.loadtxt(request["path"], delimiter=request["delimiter"], skiprows=request["skiprows"])
    elapsed = (time.perf_counter() - start) * 1000
    rows = [0, len(table) // 2, len(table) - 1]
    print(json.dumps({"ms": elapsed, "rows": len(table), "sample": table[rows].tolist()}), flush=True)
