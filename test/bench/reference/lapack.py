"""Times LAPACK's dense dgesv, through numpy, on one matrix, for comparison only.

    lapack.py FILE SECONDS

FILE as in sparse.c. Prints one JSON line: microseconds per system as the median over calls, and the scaled residual.
"""
import json
import statistics
import sys
import time

import numpy

with open(sys.argv[1], "rb") as file:
    n, nnz, sets = numpy.fromfile(file, "<i4", 3)
    starts = numpy.fromfile(file, "<i4", n + 1)
    rows = numpy.fromfile(file, "<i4", nnz)
    values = numpy.fromfile(file, "<f8", nnz)
    file.seek(12 + 4 * (n + 1) + 4 * nnz + 8 * int(sets) * int(nnz))
    b = numpy.fromfile(file, "<f8", n)

a = numpy.zeros((n, n))
a[rows, numpy.repeat(numpy.arange(n), numpy.diff(starts))] = values
times = []
end = time.perf_counter() + float(sys.argv[2])
while not times or time.perf_counter() < end:
    start = time.perf_counter()
    x = numpy.linalg.solve(a, b)
    times.append(1e6 * (time.perf_counter() - start))
r = numpy.abs(b - a @ x).max() / (numpy.abs(a) @ numpy.abs(x) + numpy.abs(b)).max()
print(json.dumps({"all": statistics.median(times), "residual": float(r)}))
