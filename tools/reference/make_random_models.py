#!/usr/bin/env python3
"""Writes test/reference/data/random-models.json: 200 seeded random models with answers by SciPy.

Each model is Thrum text made from a list of masses, junctions, springs and dampers. The answers come from
the same list through NumPy and SciPy alone (eigh, svd, eig, solve, expm), on matrices put together here, so
that nothing of Thrum takes part. Run with Debian's python3-scipy:

    python3 tools/reference/make_random_models.py

Groups: ordinary, free-free, junctions (massless, also in series with dampers), repeated (equal or nearly
equal roots), overdamped, unstable (a negative damper), stiff (stiffness ratios to 1e9).
"""

import json
import os

import numpy as np
import scipy
import scipy.linalg as la

SIZES = {"ordinary": 60, "free-free": 24, "junctions": 24, "repeated": 24, "overdamped": 24, "unstable": 22, "stiff": 22}
HERE = os.path.dirname(os.path.abspath(__file__))
TARGET = os.path.join(HERE, "..", "..", "test", "reference", "data", "random-models.json")


def four(x):
    """A value as it will be read from the text: four significant digits."""
    return float(f"{x:.4g}")


class System:
    """masses: name -> kg (0 for a junction); elements: (kind, name, a, b, value, loss factor); b may be ground."""

    def __init__(self, group, rng):
        self.group, self.rng = group, rng
        self.names, self.mass, self.elements = [], [], []
        self.start, self.moving = {}, {}
        self.modal = 0.0

    def add(self, name, mass):
        self.names.append(name)
        self.mass.append(mass)
        return len(self.names) - 1

    def join(self, kind, a, b, value, loss=0.0):
        name = f"{'k' if kind == 'spring' else 'c'}{len(self.elements) + 1}"
        self.elements.append((kind, name, a, b, four(value), loss))

    def form(self, a, b):
        f = np.zeros(len(self.names))
        f[a] += 1
        if b is not None:
            f[b] -= 1
        return f

    def matrices(self):
        n = len(self.names)
        M, C, K, H = np.diag(np.array(self.mass)), np.zeros((n, n)), np.zeros((n, n)), np.zeros((n, n))
        for kind, _, a, b, v, eta in self.elements:
            f = self.form(a, b)
            if kind == "spring":
                K += v * np.outer(f, f)
                H += eta * v * np.outer(f, f)
            else:
                C += v * np.outer(f, f)
        return M, C, K, H

    def text(self, ask):
        out = ["thrum 1", ""]
        if self.modal:
            out.append(f"assume modal_damping = {self.modal!r}")
        for i, name in enumerate(self.names):
            if self.mass[i] == 0:
                out.append(f"junction {name}")
                continue
            out.append(f"mass {name} = {self.mass[i]!r} kg")
            if name in self.start:
                out.append(f"    starts_at = {self.start[name]!r} m")
            if name in self.moving:
                out.append(f"    starts_moving = {self.moving[name]!r} m/s")
        for kind, name, a, b, v, eta in self.elements:
            other = "ground" if b is None else self.names[b]
            unit = "N/m" if kind == "spring" else "N*s/m"
            out.append(f"{kind} {name} between {self.names[a]} and {other} = {v!r} {unit}")
            if eta:
                out.append(f"    loss_factor = {eta!r}")
        return "\n".join(out + ask) + "\n"


def tree_edges(rng, n, chain):
    """Each coordinate hangs on an earlier one, so that the system is in one piece."""
    return [(i, i - 1 if chain or rng.random() < 0.6 else int(rng.integers(0, i))) for i in range(1, n)]


def build(group, index, rng):
    s = System(group, rng)
    n = 1 + (index * 7) % 80 if group == "ordinary" else int(rng.integers(2, 41))
    if group == "junctions":
        n = int(rng.integers(1, 25))
    if group == "repeated":
        n = int(rng.integers(3, 30))
    lo, hi = (3, 6) if group != "stiff" else (1, 10)

    def stiffness():
        return 10 ** rng.uniform(lo, hi)

    for i in range(n):
        s.add(f"m{i + 1}", four(10 ** rng.uniform(-0.5, 1.5)))
    if group == "repeated":
        return build_repeated(s, n, rng, index)
    chain = rng.random() < 0.5
    edges = tree_edges(rng, n, chain)
    for a, b in edges:
        s.join("spring", a, b, stiffness(), four(rng.uniform(0.01, 0.1)) if group == "ordinary" and index % 5 == 0 else 0.0)
    extra = int(rng.integers(0, max(1, n // 2)))
    for _ in range(extra):
        a, b = (int(x) for x in rng.integers(0, n, 2))
        if a != b:
            s.join("spring", a, b, stiffness())
    if group != "free-free":
        for i in sorted(set(int(x) for x in rng.integers(0, n, 1 + n // 8))):
            s.join("spring", i, None, stiffness())
    damp(s, n, edges, group, index, rng)
    if group == "junctions":
        add_junctions(s, n, rng)
    if group == "ordinary" and index % 7 == 3:
        s.modal = 0.015
    return s


def damp(s, n, edges, group, index, rng):
    """Dashpots on some of the joints: non-proportional on purpose."""
    m, k = np.mean(s.mass), np.median([e[4] for e in s.elements if e[0] == "spring"])
    scale = 2 * np.sqrt(m * k) * {"overdamped": 3.0}.get(group, 0.05)
    if group == "overdamped":
        for i in range(n):
            s.join("damper", i, None, scale * rng.uniform(0.4, 2.5))
        return
    for a, b in edges:
        if rng.random() < 0.6:
            s.join("damper", a, b, scale * rng.uniform(0.2, 2))
    if group == "ordinary" and index % 10 == 9:
        s.elements = [e for e in s.elements if e[0] == "spring"]
    if group == "unstable":
        s.join("damper", int(rng.integers(0, n)), None, -scale * rng.uniform(0.2, 1.2))


def add_junctions(s, n, rng):
    """Springs in series, Maxwell branches (spring and damper in series) and Zener mounts."""
    for _ in range(int(rng.integers(1, 5))):
        a = int(rng.integers(0, n))
        b = None if n == 1 or rng.random() < 0.4 else int(rng.integers(0, n))
        if b == a:
            b = None
        j = s.add(f"j{len(s.names) - n + 1}", 0)
        s.join("spring", a, j, 10 ** rng.uniform(3.5, 5.5))
        if rng.random() < 0.5:
            s.join("spring", j, b, 10 ** rng.uniform(3.5, 5.5))
        else:
            s.join("damper", j, b, 10 ** rng.uniform(2, 3.5))


def build_repeated(s, n, rng, index):
    """Equal arms on one hub, some split by a relative change of 1e-9."""
    s.mass = [s.mass[0]] * n
    s.mass[0] = four(20 + 30 * rng.random())
    k = four(10 ** rng.uniform(4, 5))
    s.join("spring", 0, None, 3 * k)
    for i in range(1, n):
        s.elements.append(("spring", f"k{len(s.elements) + 1}", 0, i, k * (1 + (1e-9 * i if index % 2 else 0)), 0.0))
        s.elements.append(("damper", f"c{len(s.elements) + 1}", 0, i, four(k * 2e-4), 0.0))
    return s


def undamped(s, M, K):
    """Natural frequencies (Hz) with massless coordinates condensed; SVD of the stiffness factor where it can be."""
    heavy, light = np.flatnonzero(np.diag(M) > 0), np.flatnonzero(np.diag(M) == 0)
    if light.size == 0 and all(e[4] > 0 for e in s.elements if e[0] == "spring"):
        rows = [np.sqrt(v) * s.form(a, b) for kind, _, a, b, v, _ in s.elements if kind == "spring"]
        B = np.array(rows) / np.sqrt(np.diag(M))[None, :]
        w = np.zeros(len(s.names))
        sv = la.svd(B, compute_uv=False)
        w[: sv.size] = sv[: w.size]
        w[w < 1e-10 * w.max()] = 0
        return np.sort(w) / (2 * np.pi)
    K_hh = K[np.ix_(heavy, heavy)]
    if light.size:
        K_ll, K_lh = K[np.ix_(light, light)], K[np.ix_(light, heavy)]
        K_hh = K_hh - K_lh.T @ la.pinvh(K_ll) @ K_lh
    w2 = la.eigh(K_hh, M[np.ix_(heavy, heavy)], eigvals_only=True)
    w2[np.abs(w2) < 1e-12 * np.abs(w2).max()] = 0
    return np.sqrt(np.maximum(w2, 0)) / (2 * np.pi)


def state_form(M, C, K):
    """y' = A y + B f for y = (x, v, s): s are massless coordinates with a damper; the other massless ones are static."""
    n = M.shape[0]
    heavy = np.flatnonzero(np.diag(M) > 0)
    light = np.flatnonzero(np.diag(M) == 0)
    creep = np.array([i for i in light if C[i, i] > 0], dtype=int)
    still = np.array([i for i in light if C[i, i] == 0], dtype=int)
    keep = np.concatenate([heavy, creep]).astype(int)
    # q = P q_keep with the static ones eliminated; a force acts on heavy coordinates only
    P = np.zeros((n, keep.size))
    P[keep, np.arange(keep.size)] = 1
    if still.size:
        P[still, :] = -la.solve(K[np.ix_(still, still)], K[np.ix_(still, keep)])
    m, c, k = P.T @ M @ P, P.T @ C @ P, P.T @ K @ P
    h, t = heavy.size, keep.size
    A, B = np.zeros((h + t, h + t)), np.zeros((h + t, n))
    # order of y: x (h), s (t - h), v (h)
    Css = c[h:, h:]
    X = la.solve(Css, np.hstack([-k[h:, :], -c[h:, :h]])) if t > h else np.zeros((0, t + h))
    A[:h, t:] = np.eye(h)
    A[h:t, :] = X
    Mi = la.inv(m[:h, :h])
    A[t:, :t] = -Mi @ k[:h, :]
    A[t:, t:] = -Mi @ c[:h, :h]
    if t > h:
        A[t:, :] -= Mi @ c[:h, h:] @ X
    B[t:, heavy] = Mi
    return A, B, heavy, keep, P


def answer(s, rng):
    M, C, K, H = s.matrices()
    n = len(s.names)
    f = undamped(s, M, K)
    heavy_count = int(np.count_nonzero(np.diag(M)))
    # a damping ratio added to every elastic mode: M Phi diag(2 zeta w) Phi^T M (no junctions in such models)
    Cm = np.zeros_like(C)
    if s.modal:
        w2, phi = la.eigh(K, M)
        Cm = M @ phi @ np.diag(2 * s.modal * np.sqrt(np.maximum(w2, 0))) @ phi.T @ M
    A, B, heavy, keep, P = state_form(M, C + Cm, K)
    lossy = bool(np.any(H))
    out = {"frequencyHz": f.tolist()}
    lam = la.eigvals(A)
    if not lossy:
        out["roots"] = [[z.real, z.imag] for z in sorted(lam, key=lambda z: (round(z.imag, 9), z.real)) if z.imag >= 0]
        out["rootScale"] = float(np.abs(lam).max())
    drive, watch = int(heavy[rng.integers(0, heavy_count)]), [int(x) for x in sorted(set(rng.integers(0, n, 3)))]
    elastic = f[f > 0]
    out["drive"], out["watch"] = s.names[drive], [s.names[i] for i in watch]
    force = np.zeros(n)
    force[drive] = 1.0
    stable = s.group != "unstable"
    if stable and elastic.size:
        lo, hi = 0.3 * elastic[0], 1.5 * elastic[min(elastic.size - 1, 8)]
        fs = [four(x) for x in np.geomspace(lo, hi, 7)]
        X = []
        for fr in fs:
            w = 2 * np.pi * fr
            x = la.solve(K + 1j * H + 1j * w * (C + Cm) - w * w * M, 100.0 * force.astype(complex))
            X.append([[x[i].real, x[i].imag] for i in watch])
        out["sweep"] = {"frequencyHz": fs, "response": X}
    if elastic.size and not lossy:
        out["history"] = history(s, A, B, heavy, keep, P, force, elastic, watch)
    ask = [f"force shake on {s.names[drive]}", "    amplitude = 100 N", f"    frequency = {four(elastic[0]) if elastic.size else 1.0!r} Hz"]
    ask += [f"force kick on {s.names[drive]}", "    step = 50 N", "    start = 0 s"]
    ask += ["ask sweep run", f"    of = {', '.join(s.names[i] + '.displacement' for i in watch)}", "    by = shake"]
    lo, hi = (0.3 * elastic[0], 1.5 * elastic[-1]) if elastic.size else (0.1, 10)
    ask += [f"    from = {four(lo)!r} Hz", f"    to = {four(hi)!r} Hz"]
    if "history" in out:
        ask += ["ask history ring", f"    of = {', '.join(s.names[i] + '.displacement' for i in watch)}", "    by = kick"]
        ask += [f"    lasting = {out['history']['timeS'][-1]!r} s"]
    out["text"] = s.text(ask)
    return out


def history(s, A, B, heavy, keep, P, force, elastic, watch):
    """A step of 50 N at t = 0 on top of the initial state, by the exponential of the augmented matrix."""
    y0 = np.zeros(A.shape[0])
    for r, i in enumerate(heavy):
        y0[r] = s.start.get(s.names[i], 0.0)
        y0[keep.size + r] = s.moving.get(s.names[i], 0.0)
    # junctions held by dampers start at zero, their unstressed position
    b = B @ (50.0 * force)
    span = 3.0 / elastic[0]
    ts = [four(x) for x in span * np.array([0.02, 0.11, 0.27, 0.5, 1.0])]
    big = np.zeros((A.shape[0] + 1, A.shape[0] + 1))
    big[:-1, :-1], big[:-1, -1] = A, b
    values = []
    for t in ts:
        y = (la.expm(big * t) @ np.append(y0, 1.0))[:-1]
        q = P @ y[: keep.size]
        values.append([q[i] for i in watch])
    return {"timeS": ts, "values": values}


def rounded(o):
    """Thirteen digits are below every tolerance asked for and halve the file."""
    if isinstance(o, float):
        return float(f"{o:.13g}")
    if isinstance(o, dict):
        return {k: rounded(v) for k, v in o.items()}
    if isinstance(o, list):
        return [rounded(v) for v in o]
    return o


def main():
    models = []
    for g, (group, count) in enumerate(SIZES.items()):
        for index in range(count):
            rng = np.random.default_rng([20261, g, index])
            s = build(group, index, rng)
            if index % 3 != 0:
                for i, name in enumerate(s.names):
                    if s.mass[i] > 0 and rng.random() < 0.5:
                        s.start[name] = four(rng.normal() * 1e-3)
                        s.moving[name] = four(rng.normal() * 1e-1)
            models.append({"group": group, "index": index, "coordinates": len(s.names), **answer(s, rng)})
    data = {"madeBy": "tools/reference/make_random_models.py", "numpy": np.__version__, "scipy": scipy.__version__, "models": models}
    with open(TARGET, "w", encoding="utf-8") as out:
        json.dump(rounded(data), out, separators=(",", ":"))
        out.write("\n")
    print(f"{len(models)} models, {os.path.getsize(TARGET) / 1e6:.2f} MB")




if __name__ == "__main__":
    main()
