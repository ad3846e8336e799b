"""The three-class system of tests/bench/models.ts to a given time by SciPy's LSODA, a yardstick for the bench.

Usage: lsoda.py <end> <milliseconds> <tolerance ...>. Prints, for each tolerance, milliseconds a run and the state at the end.
"""

import sys
import time

from scipy.integrate import odeint

R, K, A1, A2, H, E, M1, M2 = 1, 4, 1.1, 0.9, 0.6, 0.8, 0.35, 0.25


def rhs(u, _):
    x, y1, y2 = u
    eaten = x * (A1 * y1 + A2 * y2) / (1 + H * x)
    return R * x * (1 - x / K) - eaten, E * eaten / 2 - M1 * y1, E * eaten / 2 - M2 * y2


end, budget = float(sys.argv[1]), float(sys.argv[2])
for word in sys.argv[3:]:
    best, began = float("inf"), time.perf_counter()
    while True:
        start = time.perf_counter()
        states = odeint(rhs, (0.5, 0.25, 0.25), (0, end), rtol=float(word), atol=1e-12, mxstep=10**6)
        now = time.perf_counter()
        best = min(best, now - start)
        if 1e3 * (now - began) > budget:
            break
    print(1e3 * best, *(float(value) for value in states[-1]))
