"""Eigenvalues of one full matrix by NumPy, a native yardstick for the bench.

Usage: eigenvalues.py <n> <milliseconds>. Prints milliseconds a matrix and the largest real part. The entries are those of
tests/bench/rows/eigenvalues.ts.
"""

import sys
import time

import numpy

n, budget = int(sys.argv[1]), float(sys.argv[2])
seed = 20011
entries = numpy.empty(n * n)
for k in range(n * n):
    seed = (seed * 48271) % 2147483647
    entries[k] = seed / 2147483647 - 0.5
matrix = entries.reshape(n, n)
numpy.linalg.eigvals(matrix)
best, began = float("inf"), time.perf_counter()
while True:
    start = time.perf_counter()
    values = numpy.linalg.eigvals(matrix)
    end = time.perf_counter()
    best = min(best, end - start)
    if 1e3 * (end - began) > budget:
        break
print(1e3 * best, values.real.max())
