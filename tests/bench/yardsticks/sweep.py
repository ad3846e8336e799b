"""
The sweep of the bench in NumPy, as one would write it: pseudo-arclength continuation of the coexistence
equilibrium of the three-class model along K, eigenvalues at every point, folds and Hopf points
located by bisection on the branch.
Usage: python3 sweep.py <points>
Prints: milliseconds a sweep (fastest of three), points, and the values of K at Hopf points.
"""
import sys
import time

import numpy as np

R, A1, A2, H, E, M1, M2 = 1.0, 1.1, 0.9, 0.6, 0.8, 0.35, 0.25
LOWER, UPPER = 0.5, 6.0


def rhs(u, K):
    x, y1, y2 = u
    eaten = x * (A1 * y1 + A2 * y2) / (1 + H * x)
    return np.array([R * x * (1 - x / K) - eaten, E * eaten / 2 - M1 * y1, E * eaten / 2 - M2 * y2])


def jacobian(u, K):
    x, y1, y2 = u
    d = 1 + H * x
    by_x = (A1 * y1 + A2 * y2) / d**2
    by_1, by_2 = A1 * x / d, A2 * x / d
    return np.array(
        [
            [R * (1 - 2 * x / K) - by_x, -by_1, -by_2],
            [E * by_x / 2, E * by_1 / 2 - M1, E * by_2 / 2],
            [E * by_x / 2, E * by_1 / 2, E * by_2 / 2 - M2],
        ]
    )


def by_parameter(u, K):
    return np.array([R * u[0] ** 2 / K**2, 0.0, 0.0])


LENGTH = UPPER - LOWER


def bordered(w, c):
    u, K = w[:3], w[3] * LENGTH
    M = np.empty((4, 4))
    M[:3, :3] = jacobian(u, K)
    M[:3, 3] = by_parameter(u, K) * LENGTH
    M[3] = c
    return M


def correct(w, c, target):
    for _ in range(10):
        f = np.append(-rhs(w[:3], w[3] * LENGTH), target - c @ w)
        step = np.linalg.solve(bordered(w, c), f)
        w = w + step
        if np.max(np.abs(step)) < 1e-11:
            return w
    raise RuntimeError("not corrected")


def tangent(w, reference):
    t = np.linalg.solve(bordered(w, reference), np.array([0.0, 0.0, 0.0, 1.0]))
    return t / np.linalg.norm(t)


def leading_pair(w):
    values = np.linalg.eigvals(jacobian(w[:3], w[3] * LENGTH))
    pairs = values[values.imag > 1e-12]
    return values, pairs.real[np.argmin(np.abs(pairs.real))] if pairs.size else None


def locate(w, t, length, before, test):
    low, high = 0.0, length
    for _ in range(45):
        middle = (low + high) / 2
        p = w + middle * t
        p = correct(p, t, t @ p)
        value = test(p)
        if value is not None and (value > 0) == (before > 0):
            low = middle
        else:
            high = middle
    p = w + high * t
    return correct(p, t, t @ p)


def sweep(h, limit):
    hopf, count = [], 0
    x = 1.0
    # Coexistence at K = 3 from the closed form: mean of a/m over the sexes sets x.
    q = E * (A1 / M1 + A2 / M2) / 2
    x = 1 / (q - H)
    K = 3.0
    y = R * (1 - x / K) * (1 + H * x)
    y1 = y / (A1 + A2 * M1 / M2)
    start = np.array([x, y1, y1 * M1 / M2, K / LENGTH])
    across = np.array([0.0, 0.0, 0.0, 1.0])
    start = correct(start, across, start[3])
    for sign in (1.0, -1.0):
        w, t = start, sign * tangent(start, across)
        _, pair = leading_pair(w)
        while count < limit:
            p = w + h * t
            p = correct(p, t, t @ p)
            s = tangent(p, t)
            np.linalg.det(bordered(p, s))
            _, now = leading_pair(p)
            if pair is not None and now is not None and pair * now < 0:
                hopf.append(locate(w, t, h, pair, lambda z: leading_pair(z)[1])[3] * LENGTH)
            if s[3] * t[3] < 0:
                locate(w, t, h, t[3], lambda z: tangent(z, t)[3])
            w, t, pair = p, s, now
            count += 1
            if p[1] < 0 or not LOWER <= p[3] * LENGTH <= UPPER:
                break
    return count, hopf


if __name__ == "__main__":
    wanted = int(sys.argv[1])
    step = 1.0 / wanted
    count, _ = sweep(step, 10**6)
    step *= count / wanted
    best = float("inf")
    for _ in range(3):
        began = time.perf_counter()
        count, hopf = sweep(step, 10**6)
        best = min(best, (time.perf_counter() - began) * 1e3)
    print(best, count, *[repr(float(value)) for value in hopf])
