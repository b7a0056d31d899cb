import { describe, expect, it } from "vitest";
import { type DampedModes, quadraticEigen } from "../../shared-core/numerics/quadratic-eigen.ts";
import { difference, EPS, largest, product, randomMatrix, seeded, transposed, unwrap } from "./helpers.ts";

type System = { m: Float64Array; c: Float64Array; k: Float64Array; n: number };

const full = (m: Float64Array, n: number) =>
  m.length === n * n && n > 1
    ? m
    : Float64Array.from({ length: n * n }, (_, p) => (Math.floor(p / n) === p % n ? m[p % n] : 0));

/** Backward error of each pair: |Q(λ)ψ| / ((|λ|²‖M‖ + |λ|‖C‖ + ‖K‖)‖ψ‖), Tisseur (2000), and ψᴴMψ − 1. */
function check({ m, c, k, n }: System, modes: DampedModes, factor = 1) {
  const { re, im, vectors: x } = modes;
  const size = 2 * n;
  expect(re.length).toBe(size);
  const mass = full(m, n);
  const times = (a: Float64Array) => [product(a, x.re, n, n, size), product(a, x.im, n, n, size)];
  const [[mr, mi], [cr, ci], [kr, ki]] = [times(mass), times(c), times(k)];
  const norm = (a: Float64Array) =>
    Math.max(
      ...Array.from({ length: n }, (_, i) =>
        a.subarray(i * n, i * n + n).reduce((s, v) => s + Math.abs(v), 0),
      ),
    );
  const [nm, nc, nk] = [norm(mass), norm(c), norm(k)];
  let worst = 0;
  let mismatches = 0;
  for (let j = 0; j < size; j++) {
    const [lr, li] = [re[j], im[j]];
    const [sr, si] = [lr * lr - li * li, 2 * lr * li];
    const length = Math.hypot(lr, li);
    let residual = 0;
    let top = 0;
    let mNorm = 0;
    for (let p = j; p < n * size; p += size) {
      const a = sr * mr[p] - si * mi[p] + lr * cr[p] - li * ci[p] + kr[p];
      const b = sr * mi[p] + si * mr[p] + lr * ci[p] + li * cr[p] + ki[p];
      residual = Math.max(residual, Math.hypot(a, b));
      top = Math.max(top, Math.hypot(x.re[p], x.im[p]));
      mNorm += x.re[p] * mr[p] + x.im[p] * mi[p];
    }
    worst = Math.max(worst, residual / ((length * length * nm + length * nc + nk) * top));
    expect(Math.abs(mNorm - 1)).toBeLessThan(100 * n * EPS);
    if (li > 0) {
      expect([re[j + 1], im[j + 1]]).toEqual([lr, -li]);
      for (let p = j; p < n * size; p += size) {
        if (x.re[p + 1] !== x.re[p] || x.im[p + 1] !== -x.im[p]) mismatches++;
      }
    }
    if (j > 0) expect(length).toBeGreaterThanOrEqual(Math.hypot(re[j - 1], im[j - 1]) * (1 - 8 * EPS));
  }
  expect(mismatches).toBe(0);
  expect(worst).toBeLessThan(factor * 20 * n * EPS);
  // The sum of the values is −trace(M⁻¹C) when M is diagonal.
  if (m.length === n) {
    const trace = m.reduce((sum, v, i) => sum - c[i * n + i] / v, 0);
    const top = Math.hypot(re[size - 1], im[size - 1]);
    expect(Math.abs(re.reduce((sum, v) => sum + v, 0) - trace)).toBeLessThan(100 * size * n * EPS * top);
  }
}

function chain(
  n: number,
  stiffness: (i: number) => number,
  dashpot: (i: number) => number,
  mass: (i: number) => number,
  grounded = true,
): System {
  const assemble = (entry: (i: number) => number) => {
    const a = new Float64Array(n * n);
    const entries = Array.from({ length: n }, (_, i) => entry(i));
    const value = (i: number) => entries[i];
    for (let i = grounded ? 0 : 1; i < n; i++) {
      a[i * n + i] += value(i);
      if (i === 0) continue;
      a[(i - 1) * n + i - 1] += value(i);
      a[i * n + i - 1] -= value(i);
      a[(i - 1) * n + i] -= value(i);
    }
    return a;
  };
  return {
    n,
    k: assemble(stiffness),
    c: assemble(dashpot),
    m: Float64Array.from({ length: n }, (_, i) => mass(i)),
  };
}

/** Masses on a grid, springs of many sizes between neighbours, some dashpots; the first row held or not. */
function grid(across: number, along: number, held: boolean): System {
  const n = across * along;
  const [k, c] = [new Float64Array(n * n), new Float64Array(n * n)];
  const next = seeded(n);
  const join = (a: Float64Array, i: number, j: number, v: number) => {
    a[i * n + i] += v;
    a[j * n + j] += v;
    a[i * n + j] -= v;
    a[j * n + i] -= v;
  };
  for (let x = 0; x < along; x++) {
    for (let y = 0; y < across; y++) {
      const i = x * across + y;
      if (x === 0 && held) k[i * n + i] += 60;
      if (x > 0) join(k, i, i - across, 100 + 40 * next());
      if (x > 0 && y === 0) join(c, i, i - across, 0.8 + 0.5 * next());
      if (y > 0) join(k, i, i - 1, 100 + 40 * next());
    }
  }
  return { n, k, c, m: Float64Array.from({ length: n }, (_, i) => 1 + (i % 3)) };
}

function even(system: System): System {
  const { n } = system;
  const round = (a: Float64Array) => a.map((v, p) => (p % (n + 1) === 0 || v === 0 ? 0 : -100));
  const k = round(system.k);
  for (let i = 0; i < n; i++)
    k[i * n + i] = 100 - k.subarray(i * n, (i + 1) * n).reduce((sum, v) => sum + v, 0);
  const c = k.map((v, p) => (p % (n + 1) === 0 ? 0.01 * v + 0.3 : 0.01 * v));
  return { n, k, c, m: new Float64Array(n).fill(1) };
}

/** A binary tree held at its root. */
function tree(n: number): System {
  const [k, c] = [new Float64Array(n * n), new Float64Array(n * n)];
  for (let i = 0; i < n; i++) {
    const parent = i === 0 ? -1 : (i - 1) >> 1;
    for (const [a, v] of [
      [k, 100 + 7 * (i % 11)],
      [c, i % 3 ? 0.2 : 1.1],
    ] as const) {
      a[i * n + i] += v;
      if (parent < 0) continue;
      a[parent * n + parent] += v;
      a[i * n + parent] -= v;
      a[parent * n + i] -= v;
    }
  }
  return { n, k, c, m: Float64Array.from({ length: n }, (_, i) => 1 + 0.01 * i) };
}

/** Two systems that know nothing of each other. */
function side(a: System, b: System): System {
  const n = a.n + b.n;
  const put = (first: Float64Array, second: Float64Array) => {
    const out = new Float64Array(n * n);
    for (let i = 0; i < a.n; i++) out.set(first.subarray(i * a.n, (i + 1) * a.n), i * n);
    for (let i = 0; i < b.n; i++) out.set(second.subarray(i * b.n, (i + 1) * b.n), (a.n + i) * n + a.n);
    return out;
  };
  return { n, k: put(a.k, b.k), c: put(a.c, b.c), m: Float64Array.from([...a.m, ...b.m]) };
}

function stiffDamper(system: System, dashpot: number): System {
  const c = Float64Array.from(system.c);
  c[20 * system.n + 20] += dashpot;
  return { ...system, c };
}

/** Adds a dashpot from the first mass to ground. */
function grounding(system: System, dashpot: number): System {
  const c = Float64Array.from(system.c);
  c[0] += dashpot;
  return { ...system, c };
}

/** Takes away the coupling before coordinate `at`, the diagonal staying. */
function cut(system: System, at: number): System {
  const without = (a: Float64Array) =>
    a.map((v, p) => (p === at * system.n + at - 1 || p === (at - 1) * system.n + at ? 0 : v));
  return { ...system, c: without(system.c), k: without(system.k) };
}

/** Couples the last coordinate to the first. */
function closed(system: System): System {
  const k = Float64Array.from(system.k);
  k[system.n - 1] = k[(system.n - 1) * system.n] = -30;
  return { ...system, k };
}

function renumbered(system: System, place: Int32Array): System {
  const { n } = system;
  const move = (a: Float64Array) => {
    const out = new Float64Array(n * n);
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) out[place[i] * n + place[j]] = a[i * n + j];
    return out;
  };
  const m = new Float64Array(n);
  system.m.forEach((v, i) => {
    m[place[i]] = v;
  });
  return { n, m, c: move(system.c), k: move(system.k) };
}

const solve = ({ m, c, k, n }: System) => unwrap(quadraticEigen(m, c, k, n));

describe("quadratic eigenproblem", () => {
  it.each([0, 0.02, 0.999, 1, 1.001, 3, -0.1])("meets the closed form of one mass, ζ = %d", (zeta) => {
    const [m, w] = [2.5, 70];
    const system = {
      n: 1,
      m: Float64Array.of(m),
      c: Float64Array.of(2 * zeta * w * m),
      k: Float64Array.of(w * w * m),
    };
    const modes = solve(system);
    check(system, modes);
    const inner = zeta * zeta - 1;
    const root = w * Math.sqrt(Math.abs(inner));
    const tolerance = zeta === 1 ? 1e-6 * w : 1e-12 * w;
    for (let j = 0; j < 2; j++) {
      const [er, ei] =
        inner < 0
          ? [-zeta * w, j === 0 ? root : -root]
          : [-zeta * w + (zeta > 0 === (j === 0) ? root : -root), 0];
      expect(Math.hypot(modes.re[j] - er, modes.im[j] - ei)).toBeLessThan(tolerance);
    }
  });

  it.each([2, 10, 40])("decouples proportional damping exactly, %i masses", (n) => {
    const base = chain(
      n,
      (i) => 1e5 * (1 + (i % 3)),
      () => 0,
      (i) => 1 + 0.1 * i,
    );
    const [alpha, beta] = [0.7, 2e-5];
    const c = base.k.map((v, p) => beta * v + (p % (n + 1) === 0 ? alpha * base.m[p % n] : 0));
    const system = { ...base, c };
    const modes = solve(system);
    check(system, modes);
    const undamped = solve({ ...base, c: new Float64Array(n * n) });
    for (let j = 0; j < 2 * n; j += 2) {
      const w = undamped.im[j];
      const zeta = alpha / (2 * w) + (beta * w) / 2;
      expect(Math.abs(modes.re[j] / (zeta * w) + 1)).toBeLessThan(1e-10);
      expect(Math.abs(modes.im[j] / (w * Math.sqrt(1 - zeta * zeta)) - 1)).toBeLessThan(1e-11);
    }
    expect(largest(undamped.re)).toBe(0);
  });

  it.each([1, 2, 5, 20, 55])("solves chains of %i with scattered dashpots", (n) => {
    const system = chain(
      n,
      (i) => 1e5 * (1 + (i % 4)),
      (i) => (i % 3 === 0 ? 40 + i : 0),
      (i) => 1 + (i % 2),
    );
    check(system, solve(system));
  });

  it.each([
    [
      "overdamped in part",
      chain(
        8,
        () => 100,
        (i) => (i === 3 ? 5000 : 1),
        () => 1,
      ),
    ],
    [
      "free-free",
      chain(
        9,
        () => 100,
        (i) => (i % 2 ? 3 : 0),
        () => 2,
        false,
      ),
    ],
    [
      "equal cells: repeating parameters",
      chain(
        24,
        () => 100,
        (i) => (i === 0 ? 2 : 0),
        () => 1,
      ),
    ],
    [
      "masses and stiffnesses over 1e12",
      chain(
        6,
        (i) => 10 ** (2 * i),
        (i) => 10 ** i / 30,
        (i) => 10 ** (-2 * i),
      ),
    ],
  ] as const)("keeps residuals small: %s", (name, system) => {
    // Heavy damping costs the low modes up to ‖C‖/√(‖M‖‖K‖), here 500, of the linear problem's accuracy
    // (Tisseur, 2000); eight covers what is seen.
    check(system, solve(system), name.startsWith("overdamped") ? 8 : 1);
  });

  it.each([
    [
      "loose, alike twice over",
      chain(
        30,
        () => 100,
        (i) => (i % 15 === 3 ? 4 : 0.2),
        () => 1,
      ),
    ],
    [
      "long and lightly damped",
      chain(
        150,
        (i) => 1e6 * (1 + (i % 5)),
        (i) => 20 * (i % 3),
        (i) => 1 + (i % 7),
      ),
    ],
    [
      "uniform with few dashpots",
      chain(
        120,
        () => 1e6,
        (i) => (i % 7 === 0 ? 200 : 0),
        () => 1,
      ),
    ],
    [
      "damped to ground, not sprung to it",
      grounding(
        chain(
          40,
          () => 50,
          (i) => (i % 4 ? 0.3 : 0),
          () => 2,
          false,
        ),
        0.8,
      ),
    ],
    [
      "one mode far overdamped",
      chain(
        60,
        () => 100,
        (i) => (i === 30 ? 900 : 0.1),
        () => 1,
      ),
    ],
    [
      "heavily damped throughout",
      chain(
        40,
        (i) => 100 * (1 + (i % 3)),
        (i) => 40 * (1 + (i % 2)),
        () => 1,
      ),
    ],
    [
      "proportional",
      chain(
        70,
        (i) => 1e4 * (1 + (i % 3)),
        (i) => 3 * (1 + (i % 3)),
        () => 1,
      ),
    ],
    [
      "parts without coupling",
      cut(
        chain(
          45,
          () => 80,
          (i) => 1 + (i % 2),
          () => 1,
        ),
        15,
      ),
    ],
    [
      "a ring, which is no chain",
      closed(
        chain(
          24,
          () => 100,
          (i) => (i % 2 ? 2 : 0),
          () => 1,
        ),
      ),
    ],
  ] as const)("solves long chains: %s", (name, system) => {
    check(system, solve(system), name.includes("damped") ? 8 : 1);
    const place = Int32Array.from({ length: system.n }, (_, i) => (i * 7) % system.n);
    if (new Set(place).size === system.n)
      check(renumbered(system, place), solve(renumbered(system, place)), 8);
  });

  it.each([
    ["a grid of 3 × 20", grid(3, 20, true)],
    ["a grid of 4 × 30, loose", grid(4, 30, false)],
    ["a tree", tree(90)],
    [
      "a ring",
      closed(
        chain(
          64,
          (i) => 100 + i,
          (i) => (i % 2 ? 2 : 0),
          () => 1,
        ),
      ),
    ],
    ["two grids", side(grid(3, 16, true), grid(2, 24, false))],
    ["a grid with one far overdamped dashpot", stiffDamper(grid(3, 20, true), 400)],
    ["a grid of equal cells: repeated values", even(grid(5, 10, true))],
  ])("solves narrow bands: %s", (name, system) => {
    check(system, solve(system), name.includes("overdamped") ? 8 : 1);
  });

  it("solves a gyroscopic system: pure imaginary values in closed form", () => {
    // Jeffcott rotor in a rotating frame: ẍ − 2Ωẏ + (w² − Ω²)x = 0 and its fellow; values ±i(w ± Ω).
    const [w, spin] = [30, 12];
    const k = w * w - spin * spin;
    const system = {
      n: 2,
      m: Float64Array.of(1, 1),
      c: Float64Array.of(0, -2 * spin, 2 * spin, 0),
      k: Float64Array.of(k, 0, 0, k),
    };
    const modes = solve(system);
    check(system, modes);
    expect(difference(modes.im, [w - spin, spin - w, w + spin, -w - spin])).toBeLessThan(1e-12 * w);
    expect(largest(modes.re)).toBeLessThan(1e-12 * w);
  });

  it("solves flutter and divergence: unsymmetric and negative stiffness", () => {
    const one = Float64Array.of(1, 1);
    const circulatory = { n: 2, m: one, c: new Float64Array(4), k: Float64Array.of(4, 3, -3, 4) };
    const flutter = solve(circulatory);
    check(circulatory, flutter);
    // λ² = −(4 ± 3i): λ = ±(1 ∓ 2i)/√2 · …, checked by squaring.
    for (let j = 0; j < 4; j++) {
      expect(Math.abs(flutter.re[j] ** 2 - flutter.im[j] ** 2 + 4)).toBeLessThan(1e-13);
      expect(Math.abs(Math.abs(2 * flutter.re[j] * flutter.im[j]) - 3)).toBeLessThan(1e-13);
    }
    const inverted = {
      n: 2,
      m: one,
      c: Float64Array.of(0.1, 0.05, 0.05, 0.2),
      k: Float64Array.of(-9, 1, 1, 16),
    };
    const modes = solve(inverted);
    check(inverted, modes);
    expect(modes.re.some((v) => v > 2)).toBe(true);
  });

  it.each([3, 12])("solves a seeded problem of %i with full mass", (n) => {
    const gram = (seed: number) => {
      const g = randomMatrix(n, n, seed);
      return product(g, transposed(g, n, n), n, n, n);
    };
    const m = gram(1);
    for (let i = 0; i < n; i++) m[i * n + i] += 1;
    const system = { n, m, c: gram(2).map((v) => 0.1 * v), k: gram(3) };
    check(system, solve(system));
  });

  it.each([
    [
      "five masses",
      chain(
        5,
        (i) => 50 + 7 * i,
        (i) => 0.4 + 0.1 * i,
        (i) => 1 + 0.1 * i,
      ),
      4,
    ],
    [
      "equal cells",
      chain(
        60,
        () => 100,
        (i) => (i % 9 ? 0.1 : 1.5),
        () => 1,
      ),
      7,
    ],
    ["values equal to the last bit", lightChain(150), 700],
    [
      "loose",
      chain(
        40,
        () => 100,
        (i) => (i % 5 ? 0.1 : 0.8),
        () => 2,
        false,
      ),
      5,
    ],
  ] as const)("keeps the response, modes superposed against the direct solve: %s", (_, system, w) => {
    const [hr, hi] = superposed(system, solve(system), w);
    const direct = directReceptance(system, w);
    expect(Math.hypot(hr - direct[0], hi - direct[1])).toBeLessThan(1e-10 * Math.hypot(...direct));
  });

  it("refuses what is not finite and a mass that is not positive", () => {
    const one = Float64Array.of(1);
    expect(quadraticEigen(one, Float64Array.of(Number.NaN), one, 1).ok).toBe(false);
    expect(quadraticEigen(Float64Array.of(0), one, one, 1)).toMatchObject({
      ok: false,
      reason: expect.stringContaining("row 1"),
    });
    expect(quadraticEigen(one, one, Float64Array.of(Number.POSITIVE_INFINITY), 1).ok).toBe(false);
  });
});

/** A pattern that repeats in localised modes whose values agree to the last bit. */
function lightChain(n: number): System {
  return chain(
    n,
    (i) => 1e6 * (1 + (i % 5)),
    (i) => 20 * (i % 3) + 1,
    (i) => 1 + (i % 7),
  );
}

/**
 * Entry (0, 0) of Σ ψψᵀ / (a (iω − λ)), a = ψᵀ(2λM + C)ψ, for symmetric M, C, K (Tisseur & Meerbergen, 2001, §3.6).
 * Values at zero (a loose system) have a = 0 and are left to their limit: 1 / (−ω² ΣM).
 */
function superposed({ m, c, n }: System, { re, im, vectors }: DampedModes, w: number): [number, number] {
  const size = 2 * n;
  const cx = [product(c, vectors.re, n, n, size), product(c, vectors.im, n, n, size)];
  let [hr, hi] = [0, 0];
  for (let j = 0; j < size; j++) {
    if (Math.hypot(re[j], im[j]) < 1e-6 * Math.hypot(re[size - 1], im[size - 1])) {
      hr += -0.5 / (w * w * m.reduce((sum, v) => sum + v, 0));
      continue;
    }
    let [ar, ai] = [0, 0];
    for (let i = 0; i < n; i++) {
      const p = i * size + j;
      const [xr, xi] = [vectors.re[p], vectors.im[p]];
      const gr = 2 * m[i] * (re[j] * xr - im[j] * xi) + cx[0][p];
      const gi = 2 * m[i] * (re[j] * xi + im[j] * xr) + cx[1][p];
      ar += xr * gr - xi * gi;
      ai += xr * gi + xi * gr;
    }
    const [dr, di] = [-ar * re[j] - ai * (w - im[j]), ar * (w - im[j]) - ai * re[j]];
    const [zr, zi] = [vectors.re[j] ** 2 - vectors.im[j] ** 2, 2 * vectors.re[j] * vectors.im[j]];
    const square = dr * dr + di * di;
    hr += (zr * dr + zi * di) / square;
    hi += (zi * dr - zr * di) / square;
  }
  return [hr, hi];
}

/** Entry (0, 0) of (K − ω²M + iωC)⁻¹ by plain complex elimination from the far end of a chain. */
function directReceptance({ m, c, k, n }: System, w: number): [number, number] {
  let [dr, di] = [0, 0];
  for (let i = n - 1; i >= 0; i--) {
    let [er, ei] = [k[i * n + i] - w * w * m[i], w * c[i * n + i]];
    if (i < n - 1) {
      const [br, bi] = [k[i * n + i + 1], w * c[i * n + i + 1]];
      const [sr, si] = [br * br - bi * bi, 2 * br * bi];
      const square = dr * dr + di * di;
      er -= (sr * dr + si * di) / square;
      ei -= (si * dr - sr * di) / square;
    }
    [dr, di] = [er, ei];
  }
  const square = dr * dr + di * di;
  return [dr / square, -di / square];
}
