import { describe, expect, it } from "vitest";
import {
  type BandWorkspace,
  bandWorkspace,
  factorBand,
  solveBand,
  solveRealBand,
} from "../../shared-core/numerics/band-solve.ts";
import {
  complexLuWorkspace,
  factorComplexLu,
  solveComplexLu,
} from "../../shared-core/numerics/complex-lu.ts";
import { difference, EPS, largest, product, randomMatrix, seeded, unwrap } from "./helpers.ts";

function fill(ws: BandWorkspace, entry: (i: number, j: number) => [number, number]) {
  const { n, bandwidth: b } = ws;
  const dense = { re: new Float64Array(n * n), im: new Float64Array(n * n) };
  for (let i = 0; i < n; i++) {
    for (let j = Math.max(0, i - b); j <= i; j++) {
      const [re, im] = entry(i, j);
      ws.re[i * (b + 1) + j - i + b] = dense.re[i * n + j] = dense.re[j * n + i] = re;
      ws.im[i * (b + 1) + j - i + b] = dense.im[i * n + j] = dense.im[j * n + i] = im;
    }
  }
  return dense;
}

/** Backward error |A x − b| against |A||x|, the measure that holds for any conditioning. */
function backwardError(
  dense: { re: Float64Array; im: Float64Array },
  n: number,
  columns: number,
  x: Float64Array[],
  b: Float64Array[],
) {
  const [xr, xi] = x;
  const rr = product(dense.re, xr, n, n, columns);
  const ii = product(dense.im, xi, n, n, columns);
  const ri = product(dense.re, xi, n, n, columns);
  const ir = product(dense.im, xr, n, n, columns);
  const size = (largest(dense.re) + largest(dense.im)) * (largest(xr) + largest(xi));
  const worst = Math.max(
    difference(
      rr.map((v, p) => v - ii[p]),
      b[0],
    ),
    difference(
      ri.map((v, p) => v + ir[p]),
      b[1],
    ),
  );
  return worst / size;
}

function solved(ws: BandWorkspace, columns: number) {
  const b = [randomMatrix(ws.n, columns, 91), randomMatrix(ws.n, columns, 92)];
  const x = b.map((v) => Float64Array.from(v));
  unwrap(factorBand(ws));
  solveBand(ws, x[0], x[1], columns);
  return { b, x };
}

describe("banded complex symmetric solves", () => {
  it.each([
    [1, 0, 1],
    [1, 1, 1],
    [2, 1, 2],
    [30, 0, 2],
    [200, 1, 1],
    [200, 1, 3],
    [80, 2, 1],
    [80, 5, 4],
    [12, 11, 1],
  ])("solves a chain-like system of %i, bandwidth %i, %i columns", (n, b, columns) => {
    const ws = bandWorkspace(n, Math.min(b, n - 1));
    const next = seeded(n + b);
    const dense = fill(ws, (i, j) =>
      i === j ? [4 * b + 1 + next(), 0.1 * next()] : [-1 + 0.2 * next(), 0.05 * next()],
    );
    const { b: rhs, x } = solved(ws, columns);
    expect(ws.pivoted).toBe(false);
    expect(backwardError(dense, n, columns, x, rhs)).toBeLessThan(8 * n * EPS);
  });

  it.each([
    [1, 1],
    [2, 1],
    [5, 3],
  ])("pivots where leading blocks are singular, bandwidth %i", (b, columns) => {
    const n = 60;
    const ws = bandWorkspace(n, b);
    const next = seeded(b);
    // A zero diagonal defeats elimination without pivoting at the first step.
    const dense = fill(ws, (i, j) => (i === j ? [0, 0] : [1 + 0.3 * next(), 0.2 * next()]));
    const { b: rhs, x } = solved(ws, columns);
    expect(ws.pivoted).toBe(true);
    expect(backwardError(dense, n, columns, x, rhs)).toBeLessThan(8 * n * EPS);
    const lu = unwrap(factorComplexLu(dense.re, dense.im, n, complexLuWorkspace(n)));
    const [yr, yi] = [new Float64Array(n * columns), new Float64Array(n * columns)];
    solveComplexLu(lu, rhs[0], rhs[1], columns, yr, yi);
    expect(backwardError(dense, n, columns, [yr, yi], rhs)).toBeLessThan(8 * n * EPS);
  });

  it("keeps the backward error small at every frequency of a lightly damped sweep", () => {
    // Fixed-free chain, k = 1e6, m = 1, lightly damped; frequencies through all resonances.
    const n = 40;
    const ws = bandWorkspace(n, 1);
    let pivoted = 0;
    for (let f = 0; f < 400; f++) {
      const w = (f + 0.5) * 5.2;
      const dense = fill(ws, (i, j) =>
        i === j ? [(i === n - 1 ? 1e6 : 2e6) - w * w, w * (i === 0 ? 3 : 0.5)] : [-1e6, -w * 0.25],
      );
      const { b: rhs, x } = solved(ws, 1);
      expect(backwardError(dense, n, 1, x, rhs)).toBeLessThan(1e4 * n * EPS);
      if (ws.pivoted) pivoted++;
    }
    expect(pivoted).toBeLessThan(40);
  });

  it("does not mind coordinates in units twelve decades apart", () => {
    const n = 20;
    const ws = bandWorkspace(n, 2);
    const unit = (i: number) => (i % 2 ? 1e6 : 1e-6);
    fill(ws, (i, j) => [(i === j ? 8 : -1) * unit(i) * unit(j), (i === j ? 0.1 : 0) * unit(i) * unit(j)]);
    const [xr, xi] = [Float64Array.from({ length: n }, (_, i) => unit(i)), new Float64Array(n)];
    unwrap(factorBand(ws));
    expect(ws.pivoted).toBe(false);
    solveBand(ws, xr, xi);
    const plain = bandWorkspace(n, 2);
    fill(plain, (i, j) => [i === j ? 8 : -1, i === j ? 0.1 : 0]);
    const [yr, yi] = [new Float64Array(n).fill(1), new Float64Array(n)];
    unwrap(factorBand(plain));
    solveBand(plain, yr, yi);
    expect(
      difference(
        xr.map((v, i) => v * unit(i)),
        yr,
      ),
    ).toBeLessThan(64 * EPS);
    expect(
      difference(
        xi.map((v, i) => v * unit(i)),
        yi,
      ),
    ).toBeLessThan(64 * EPS);
  });

  it("reports an undamped resonance and a free body as singular, and NaN as not finite", () => {
    const free = bandWorkspace(3, 1);
    fill(free, (i, j) => [i === j ? (i === 1 ? 2 : 1) : -1, 0]);
    expect(factorBand(free)).toMatchObject({ ok: false, reason: expect.stringContaining("singular") });
    const zero = bandWorkspace(3, 2);
    expect(factorBand(zero)).toMatchObject({ ok: false, reason: expect.stringContaining("singular") });
    for (const b of [1, 2]) {
      const bad = bandWorkspace(4, b);
      fill(bad, (i, j) => [i === j ? 3 : i === 2 ? Number.NaN : 1, 0]);
      expect(factorBand(bad)).toMatchObject({ ok: false, reason: expect.stringContaining("finite") });
    }
  });

  it("recovers after a failed factorisation", () => {
    const ws = bandWorkspace(3, 1);
    expect(factorBand(ws).ok).toBe(false);
    fill(ws, (i, j) => [i === j ? 2 : -1, 0]);
    const x = [Float64Array.of(0, 0, 4), new Float64Array(3)];
    unwrap(factorBand(ws));
    solveBand(ws, x[0], x[1]);
    expect(difference(x[0], [1, 2, 3])).toBeLessThan(8 * EPS);
  });

  it("solves real bands", () => {
    const values = Float64Array.of(0, 2, -1, 2, -1, 1);
    expect(
      difference(unwrap(solveRealBand({ n: 3, bandwidth: 1, values }, Float64Array.of(0, 0, 1))), [1, 2, 3]),
    ).toBeLessThan(8 * EPS);
    expect(solveRealBand({ n: 1, bandwidth: 0, values: Float64Array.of(0) }, Float64Array.of(1)).ok).toBe(
      false,
    );
  });
});
