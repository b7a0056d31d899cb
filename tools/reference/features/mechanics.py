"""Small linear mechanics by NumPy and SciPy alone: matrices from a list of elements, roots, steady states, histories."""

import math

import numpy as np
import scipy.linalg as la
from scipy.integrate import solve_ivp
from scipy.optimize import brentq, minimize_scalar

GN = 9.80665
INCH, FOOT, LBF, LBM = 0.0254, 0.3048, 4.4482216152605, 0.45359237
TAU = 2 * math.pi


class System:
    """Coordinates with their matrices; `given` names are supports. 'ground' stands still."""

    def __init__(self, names, given=()):
        self.names, self.given = names.split(), list(given.split() if given else ())
        self.all = self.names + self.given
        n = len(self.all)
        self.M, self.C, self.K, self.H = (np.zeros((n, n)) for _ in range(4))
        self.T = np.eye(n)

    def form(self, a, b="ground"):
        f = np.zeros(len(self.all))
        for name, sign in ((a, 1.0), (b, -1.0)):
            if name != "ground":
                f[self.all.index(name)] += sign
        return f

    def mass(self, a, m):
        self.M += m * np.outer(self.form(a), self.form(a))
        return self

    def spring(self, a, b, k, eta=0.0, own=0.0):
        f = self.form(a, b)
        self.K += k * np.outer(f, f)
        self.H += eta * k * np.outer(f, f)
        if own:
            ends = [self.all.index(x) if x != "ground" else None for x in (a, b)]
            for i, p in enumerate(ends):
                for j, q in enumerate(ends):
                    if p is not None and q is not None:
                        self.M[p, q] += own / 6 * (2 if i == j else 1)
        return self

    def damper(self, a, b, c):
        f = self.form(a, b)
        self.C += c * np.outer(f, f)
        return self

    def inerter(self, a, b, m):
        f = self.form(a, b)
        self.M += m * np.outer(f, f)
        return self

    def bind(self, name, **factors):
        """Before any matrix is read; chained binds in order of definition, the innermost first."""
        i = self.all.index(name)
        row = np.zeros(len(self.all))
        for other, factor in factors.items():
            row += factor * self.T[self.all.index(other)]
        self.T[i] = row
        self.names.remove(name)
        return self

    def free(self):
        return [self.all.index(x) for x in self.names]

    def sets(self):
        return [self.all.index(x) for x in self.given]

    def matrices(self, complex_k=False):
        """M, C, K over the free coordinates."""
        f = self.free()
        T = self.T[:, f]
        K = self.K + 1j * self.H if complex_k else self.K
        return T.T @ self.M @ T, T.T @ self.C @ T, T.T @ K @ T

    def coupling(self, complex_k=False):
        """The same against the supports."""
        f, s = self.free(), self.sets()
        T, S = self.T[:, f], self.T[:, s]
        K = self.K + 1j * self.H if complex_k else self.K
        return T.T @ self.M @ S, T.T @ self.C @ S, T.T @ K @ S

    def frequencies(self):
        """Hz, undamped; massless coordinates are condensed."""
        M, _, K = self.matrices()
        heavy = [i for i in range(len(M)) if M[i, i] > 0]
        light = [i for i in range(len(M)) if M[i, i] == 0]
        k = K[np.ix_(heavy, heavy)]
        if light:
            k = k - K[np.ix_(heavy, light)] @ la.solve(K[np.ix_(light, light)], K[np.ix_(light, heavy)])
        return np.sqrt(np.maximum(la.eigh(k, M[np.ix_(heavy, heavy)], eigvals_only=True), 0)) / TAU

    def roots(self, extra_c=None):
        """All roots of lambda^2 M + lambda C + K with a positive or no imaginary part, by |root|."""
        M, C, K = self.matrices()
        if extra_c is not None:
            C = C + extra_c
        n = len(M)
        A = np.block([[np.zeros((n, n)), np.eye(n)], [-K, -C]])
        B = np.block([[np.eye(n), np.zeros((n, n))], [np.zeros((n, n)), M]])
        w = la.eig(A, B, right=False)
        w = w[np.isfinite(w)]
        w = w[np.abs(w) < 1e12]
        return sorted((z for z in w if z.imag > -1e-12 * abs(z)), key=abs)

    def modal_damping(self, ratios):
        """M Phi diag(2 zeta omega) Phi^T M for ratios of the undamped modes."""
        M, _, K = self.matrices()
        w2, phi = la.eigh(K, M)
        return M @ phi @ np.diag([2 * z * math.sqrt(max(x, 0)) for z, x in zip(ratios, w2)]) @ phi.T @ M

    def loss_ratios(self):
        M, _, K = self.matrices()
        f = self.free()
        H = self.T[:, f].T @ self.H @ self.T[:, f]
        w2, phi = la.eigh(K, M)
        return [p @ H @ p / (2 * x) if x > 1e-12 * w2.max() else 0.0 for x, p in zip(w2, phi.T)]

    def steady(self, hz, forces=None, supports=None):
        """Complex displacement by name (phasor of exp(i w t)); supports as displacement phasors."""
        w = TAU * hz
        M, C, K = self.matrices(True)
        F = np.zeros(len(self.all), dtype=complex)
        for name, value in (forces or {}).items():
            F += value * self.form(name)
        rhs = self.T[:, self.free()].T @ F
        s = np.array([(supports or {}).get(name, 0.0) for name in self.given], dtype=complex)
        if len(s):
            Ms, Cs, Ks = self.coupling(True)
            rhs = rhs - (Ks + 1j * w * Cs - w * w * Ms) @ s
        q = la.solve(K + 1j * w * C - w * w * M, rhs)
        x = self.T[:, self.free()] @ q
        if len(s):
            x = x + self.T[:, self.sets()] @ s
        return dict(zip(self.all, x))


class History:
    """Displacement, velocity, acceleration of every name; DOP853 at 1e-12 between the breaks."""

    def __init__(self, system, until, forces=None, supports=None, x0=None, v0=None, breaks=(), extra_c=None):
        self.s, self.until, self.forces, self.supports = system, until, forces or {}, supports or {}
        M, C, K = system.matrices()
        if extra_c is not None:
            C = C + extra_c
        n = len(M)
        self.heavy = [i for i in range(n) if M[i, i] > 0]
        self.light = [i for i in range(n) if M[i, i] == 0]
        self.M, self.C, self.K = M, C, K
        x = np.array([(x0 or {}).get(name, 0.0) for name in system.names])
        v = np.array([(v0 or {}).get(name, 0.0) for name in system.names])
        y = np.concatenate([x, v[self.heavy]])
        edges = [0.0]
        for b in sorted([*breaks, until]):
            if edges[-1] + 1e-12 * until < b <= until:
                edges.append(b)
        edges[-1] = until
        self.parts = []
        self.scale = 1.0
        for a, b in zip(edges, edges[1:]):
            self.middle = (a, b)
            sol = solve_ivp(lambda t, y, a=a, b=b: self.rate(t, y, a, b), (a, b), y, method="DOP853", rtol=3e-13,
                            atol=1e-20, dense_output=True, max_step=(b - a) / 8)
            assert sol.success
            self.parts.append((a, b, sol.sol))
            y = sol.y[:, -1]

    def inside(self, t, a, b):
        """Just inside a piece, where a drive jumps at its ends."""
        e = (b - a) * 1e-13
        return min(max(t, a + e), b - e)

    def load(self, t):
        s = self.s
        F = np.zeros(len(s.all))
        for name, f in self.forces.items():
            F += f(t) * s.form(name)
        rhs = s.T[:, s.free()].T @ F
        if s.given:
            Ms, Cs, Ks = s.coupling()
            u = np.array([self.supports.get(name, ZERO)(t) for name in s.given])
            rhs = rhs - Ks @ u[:, 0] - Cs @ u[:, 1] - Ms @ u[:, 2]
        return rhs

    def split(self, y):
        n = len(self.M)
        return y[:n], y[n:]

    def motion(self, t, y, a, b):
        x, vh = self.split(y)
        rhs = self.load(self.inside(t, a, b)) - self.K @ x
        h, l = self.heavy, self.light
        v = np.zeros(len(x))
        v[h] = vh
        if l:
            v[l] = la.solve(self.C[np.ix_(l, l)], rhs[l] - self.C[np.ix_(l, h)] @ vh)
        acc = np.full(len(x), np.nan)
        acc[h] = la.solve(self.M[np.ix_(h, h)], (rhs - self.C @ v)[h])
        return x, v, acc

    def rate(self, t, y, a, b):
        x, v, acc = self.motion(t, y, a, b)
        return np.concatenate([v, acc[self.heavy]])

    def at(self, t, last=True):
        """{name: (x, v, a)}; at a break the value just after it (or just before, with last=False)."""
        fits = [p for p in self.parts if p[0] - 1e-15 <= t <= p[1] + 1e-15]
        a, b, sol = fits[-1 if last else 0]
        x, v, acc = self.motion(t, sol(t), a, b)
        T = self.s.T[:, self.s.free()]
        full = [T @ part for part in (x, v, acc)]
        if self.s.given:
            u = np.array([self.supports.get(name, ZERO)(self.inside(t, a, b)) for name in self.s.given])
            full = [p + self.s.T[:, self.s.sets()] @ u[:, i] for i, p in enumerate(full)]
        return {name: tuple(p[i] for p in full) for i, name in enumerate(self.s.all)}

    def series(self, of, count):
        """Times and values over all parts, each part's ends included."""
        out = []
        for a, b, _ in self.parts:
            for t in np.linspace(a, b, max(9, int(count * (b - a) / self.until))):
                inner = min(max(t, a + 1e-12 * (b - a)), b - 1e-12 * (b - a))
                out.append((t, of(self.at(inner))))
        return np.array(out).T

    def extreme(self, of, sign=1, count=1500):
        """(value, time) of the largest sign * value."""
        t, y = self.series(of, count)
        best = None
        for k in np.argsort(-sign * y)[:4]:
            lo, hi = t[max(k - 1, 0)], t[min(k + 1, len(t) - 1)]
            part = next(p for p in self.parts if p[0] <= (lo + hi) / 2 <= p[1])
            lo, hi = max(lo, part[0] + 1e-12), min(hi, part[1] - 1e-12)
            r = minimize_scalar(lambda x: -sign * of(self.at(x)), bounds=(lo, hi), method="bounded",
                                options={"xatol": 1e-12 * self.until})
            for value, at in ((of(self.at(r.x)), r.x), (y[k], t[k])):
                if best is None or sign * value > sign * best[0]:
                    best = (value, at)
        return best

    def peak(self, of, count=1500):
        return max(abs(self.extreme(of, 1, count)[0]), abs(self.extreme(of, -1, count)[0]))

    def rms(self, of, panels=60):
        nodes, weights = np.polynomial.legendre.leggauss(12)
        total = 0.0
        for a, b, _ in self.parts:
            n = max(2, int(panels * (b - a) / self.until))
            for i in range(n):
                lo, h = a + (b - a) * i / n, (b - a) / n
                total += sum(w * h / 2 * of(self.at(lo + h * (x + 1) / 2)) ** 2 for x, w in zip(nodes, weights))
        return math.sqrt(total / self.until)

    def last_outside(self, of, final, band, count=4000):
        """Last time |of - final| leaves the band."""
        t, y = self.series(of, count)
        g = np.abs(y - final) - band
        k = np.flatnonzero(g > 0)[-1]
        return brentq(lambda x: abs(of(self.at(x)) - final) - band, t[k], t[k + 1], xtol=1e-15)

    def upward(self, of, level=0.0, count=3000):
        t, y = self.series(of, count)
        y = y - level
        return [brentq(lambda x: of(self.at(x)) - level, t[i], t[i + 1], xtol=1e-15)
                for i in range(len(y) - 1) if y[i] < 0 <= y[i + 1]]


def ZERO(t):
    return (0.0, 0.0, 0.0)


def peak_of(f, lo, hi, count=4001, log=True):
    """Largest value and its place of a smooth function, grid then bounded minimisation."""
    grid = np.geomspace(lo, hi, count) if log else np.linspace(lo, hi, count)
    y = np.array([f(x) for x in grid])
    k = int(np.argmax(y))
    a, b = grid[max(k - 1, 0)], grid[min(k + 1, count - 1)]
    r = minimize_scalar(lambda x: -f(x), bounds=(a, b), method="bounded", options={"xatol": 1e-13 * b})
    return max((-r.fun, r.x), (y[k], grid[k]))
