#!/usr/bin/env python3
"""What a careful engineer would write instead: NumPy and SciPy on the same model, timed inside the process.

Reads one JSON command a line on standard input, {"do": "load", ...model...} or {"do": "run", "repeat": ...}, and
answers each with one JSON line: {"seconds": ..., "values": [...], "maxRssMb": ...}, the seconds those of one run
in the mean. Started by tools/bench.mjs.
"""

import json
import resource
import sys
import time

import numpy as np
import scipy.linalg as la
from scipy import signal
from scipy.integrate import solve_ivp  # noqa: F401  (part of what such a script loads)


def matrices(model):
    n = len(model["mass"])
    M, K, C = np.diag(np.array(model["mass"])), np.zeros((n, n)), np.zeros((n, n))
    for target, key in ((K, "springs"), (C, "dampers")):
        for a, b, value in model[key]:
            target[a, a] += value
            if b >= 0:
                target[b, b] += value
                target[a, b] -= value
                target[b, a] -= value
    return M, C, K


def undamped(model, M, C, K):
    w2, _ = la.eigh(K, M, driver="gvd")
    return np.sqrt(np.maximum(w2, 0)) / (2 * np.pi)


def undamped_chain(model, M, C, K):
    """Scaled to a tridiagonal problem, as SciPy offers one."""
    s = 1 / np.sqrt(np.diag(M))
    d, e = np.diag(K) * s * s, np.diag(K, 1) * s[1:] * s[:-1]
    w2, _ = la.eigh_tridiagonal(d, e)
    return np.sqrt(np.maximum(w2, 0)) / (2 * np.pi)


def state_matrix(M, C, K):
    n = M.shape[0]
    mi = 1 / np.diag(M)
    A = np.zeros((2 * n, 2 * n))
    A[:n, n:] = np.eye(n)
    A[n:, :n] = -mi[:, None] * K
    A[n:, n:] = -mi[:, None] * C
    return A


def damped(model, M, C, K):
    lam, _ = la.eig(state_matrix(M, C, K))
    return np.sort(lam.imag[lam.imag > 0]) / (2 * np.pi)


def sweep_chain(model, M, C, K):
    """One banded complex solve a frequency."""
    n = M.shape[0]
    f = np.geomspace(*model["band"], 2000)
    b = np.zeros(n, dtype=complex)
    b[model["drive"]] = 1
    out = np.empty((f.size, n), dtype=complex)
    md, cd, kd = np.diag(M), np.diag(C), np.diag(K)
    co, ko = np.diag(C, 1), np.diag(K, 1)
    ab = np.zeros((3, n), dtype=complex)
    for i, w in enumerate(2 * np.pi * f):
        ab[1] = kd + 1j * w * cd - w * w * md
        ab[0, 1:] = ko + 1j * w * co
        ab[2, :-1] = ab[0, 1:]
        out[i] = la.solve_banded((1, 1), ab, b, check_finite=False)
    return np.abs(out[::200, model["watch"]])


def sweep_general(model, M, C, K):
    """Modes once (state form), then superposition over all frequencies."""
    n = M.shape[0]
    f = np.geomspace(*model["band"], 2000)
    lam, V = la.eig(state_matrix(M, C, K))
    b = np.zeros(2 * n, dtype=complex)
    b[n + model["drive"]] = 1 / M[model["drive"], model["drive"]]
    g = la.solve(V, b)
    H = g[None, :] / (1j * 2 * np.pi * f[:, None] - lam[None, :])
    out = H @ V[:n].T
    return np.abs(out[::200, model["watch"]])


def history_state(model, M, C, K):
    n = M.shape[0]
    dt, steps = model["dt"], 100_000
    A = state_matrix(M, C, K)
    u = np.array(model["forceTable"])[np.arange(steps + 1) % len(model["forceTable"])]
    return n, dt, A, u


def discretise(A, b, dt):
    """First-order hold by the exponential of the augmented matrix."""
    N = A.shape[0]
    big = np.zeros((N + 2, N + 2))
    big[:N, :N], big[:N, N], big[N, N + 1] = A * dt, b * dt, 1
    E = la.expm(big)
    return E[:N, :N], E[:N, N] - E[:N, N + 1], E[:N, N + 1]


def history_one(model, M, C, K):
    """One output: modal coordinates, one recursive filter a mode."""
    n, dt, A, u = history_state(model, M, C, K)
    lam, V = la.eig(A)
    b = np.zeros(2 * n)
    b[n + model["drive"]] = 1 / M[model["drive"], model["drive"]]
    g = la.solve(V, b.astype(complex))
    pick = np.flatnonzero(lam.imag > 0)
    y = np.zeros(u.size)
    for j in pick:
        z = lam[j] * dt
        e = np.exp(z)
        p1 = (e - 1) / z
        p2 = (p1 - 1) / z
        a0, a1 = dt * (p1 - p2), dt * p2
        q = signal.lfilter([a1, a0], [1, -e], u.astype(complex))
        q -= a1 * u[0] * e ** np.arange(u.size)
        y += 2 * (V[model["watch"], j] * g[j] * q).real
    return y[::10000]


def history_all(model, M, C, K):
    """All outputs: modal filters, then one product."""
    n, dt, A, u = history_state(model, M, C, K)
    lam, V = la.eig(A)
    b = np.zeros(2 * n)
    b[n + model["drive"]] = 1 / M[model["drive"], model["drive"]]
    g = la.solve(V, b.astype(complex))
    pick = np.flatnonzero(lam.imag > 0)
    Q = np.empty((pick.size, u.size), dtype=complex)
    for r, j in enumerate(pick):
        z = lam[j] * dt
        e = np.exp(z)
        p1 = (e - 1) / z
        p2 = (p1 - 1) / z
        a0, a1 = dt * (p1 - p2), dt * p2
        Q[r] = signal.lfilter([a1, a0], [1, -e], u.astype(complex))
        Q[r] -= a1 * u[0] * e ** np.arange(u.size)
    W = 2 * V[:n, pick] * g[pick][None, :]
    Y = W.real @ Q.real - W.imag @ Q.imag
    return Y[model["watch"], ::10000]


ROWS = {
    "undamped-general": undamped,
    "undamped-chain": undamped_chain,
    "damped-general": damped,
    "damped-chain": damped,
    "sweep-chain": sweep_chain,
    "sweep-general": sweep_general,
    "history-one": history_one,
    "history-all": history_all,
}


def main():
    model = mats = None
    for line in sys.stdin:
        command = json.loads(line)
        if command["do"] == "load":
            model, mats = command, matrices(command)
            print(json.dumps({"loaded": True}), flush=True)
            continue
        start = time.perf_counter()
        for _ in range(command["repeat"]):
            values = ROWS[model["row"]](model, *mats)
        seconds = (time.perf_counter() - start) / command["repeat"]
        rss = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024
        print(json.dumps({"seconds": seconds, "values": np.ravel(values).tolist(), "maxRssMb": rss}), flush=True)


if __name__ == "__main__":
    main()
