import { describe, expect, it } from "vitest";
import { deflateEarly } from "../../shared-core/numerics/early-deflation.ts";
import { hessenberg } from "../../shared-core/numerics/hessenberg.ts";
import { bestKernel, kernelFor, plainKernel } from "../../shared-core/numerics/kernel.ts";
import { multishiftQr } from "../../shared-core/numerics/multishift-qr.ts";
import { doubleShiftQr } from "../../shared-core/numerics/real-schur.ts";
import { moveUp } from "../../shared-core/numerics/schur-swap.ts";
import {
  difference,
  EPS,
  identityOf,
  orthogonalityError,
  product,
  randomMatrix,
  seeded,
  transposed,
} from "./helpers.ts";

/** Below all orders here: otherwise the double shift would be what is tested. */
const MANY = 100;

const room = (n: number) => ({ re: new Float64Array(n), im: new Float64Array(n) });

/** T = Zᵀ A Z, quasi-triangular with standard blocks, Z orthogonal; all relative to ‖A‖_F. */
function checkSchur(a: Float64Array, t: Float64Array, zt: Float64Array, n: number) {
  const norm = Math.sqrt(a.reduce((sum, v) => sum + v * v, 0));
  expect(orthogonalityError(zt, n)).toBeLessThanOrEqual(4 * n * EPS);
  const back = product(product(transposed(zt, n, n), t, n, n, n), zt, n, n, n);
  expect(difference(back, a)).toBeLessThanOrEqual(4 * n * EPS * norm);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i - 1; j++) expect(t[i * n + j]).toBe(0);
    if (i === 0 || t[i * n + i - 1] === 0) continue;
    // A pair: equal diagonal, off-diagonals of opposite sign, and no overlap with the next block.
    expect(t[i * n + i]).toBe(t[(i - 1) * n + i - 1]);
    expect(t[i * n + i - 1] * t[(i - 1) * n + i]).toBeLessThan(0);
    if (i + 1 < n) expect(t[(i + 1) * n + i]).toBe(0);
  }
}

const cases: [string, number, (i: number, j: number, next: () => number) => number][] = [
  ["random", 130, (_i, _j, next) => next()],
  ["random, larger", 220, (_i, _j, next) => next()],
  ["graded over 1e10", 140, (i, _j, next) => next() * 10 ** ((-10 * i) / 139)],
  ["companion of x^n = 1", 150, (i, j) => (i === 0 ? (j === 149 ? 1 : 0) : i === j + 1 ? 1 : 0)],
  ["one Jordan block", 130, (i, j) => (i === j ? 1 : j === i + 1 ? 1 : 0)],
  ["Jordan block with noise", 130, (i, j, next) => (i === j ? 1 : j === i + 1 ? 1 : 1e-12 * next())],
  [
    "nearly skew",
    160,
    (i, j, next) => (i === j ? -0.01 : i < j ? Math.cos(i * j) : -Math.cos(i * j)) + 1e-3 * next(),
  ],
  ["equal rows", 130, (_i, j) => Math.sin(j)],
  ["identity plus rank one", 130, (i, j) => (i === j ? 1 : 0) + Math.sin(i) * Math.cos(j)],
  ["two loose blocks", 160, (i, j, next) => (i < 70 === j < 70 ? next() : 0)],
  ["zero", 130, () => 0],
];

describe("multishift QR", () => {
  it.each(cases)("brings a matrix to Schur form: %s", (_, n, entry) => {
    const next = seeded(n);
    const a = Float64Array.from({ length: n * n }, (_v, p) => entry(Math.floor(p / n), p % n, next));
    const { h, transposedQ } = hessenberg(Float64Array.from(a), n, true);
    const values = room(n);
    expect(multishiftQr(h, n, values, kernelFor(n), transposedQ, MANY)).toBe(n);
    checkSchur(a, h, transposedQ, n);
    const trace = values.re.reduce((sum, v) => sum + v, 0);
    let diagonal = 0;
    for (let i = 0; i < n; i++) diagonal += a[i * n + i];
    expect(Math.abs(trace - diagonal)).toBeLessThan(
      100 * n * EPS * Math.sqrt(a.reduce((sum, v) => sum + v * v, 1e-300)),
    );
  });

  it("finds the same values without vectors, and with the plain kernel", () => {
    const n = 150;
    const a = randomMatrix(n, n, 3);
    const sorted = (v: { re: Float64Array; im: Float64Array }) =>
      [...v.re]
        .map((r, j): [number, number] => [r, v.im[j]])
        .sort((p, q) => (Math.abs(p[0] - q[0]) > 1e-9 ? p[0] - q[0] : p[1] - q[1]));
    const [full, alone, plain] = [room(n), room(n), room(n)];
    const first = hessenberg(Float64Array.from(a), n, true);
    multishiftQr(first.h, n, full, kernelFor(n), first.transposedQ, MANY);
    expect(
      multishiftQr(hessenberg(Float64Array.from(a), n, false).h, n, alone, kernelFor(n), undefined, MANY),
    ).toBe(n);
    const third = hessenberg(Float64Array.from(a), n, true);
    expect(multishiftQr(third.h, n, plain, plainKernel, third.transposedQ, MANY)).toBe(n);
    for (const other of [alone, plain]) {
      sorted(full).forEach(([r, i], j) => {
        const [s, k] = sorted(other)[j];
        // Condition of the values of a random matrix of this order: well within 1e5.
        expect(Math.hypot(r - s, i - k)).toBeLessThan(1e5 * EPS);
      });
    }
  });
});

describe("swaps in a Schur form", () => {
  it.each([4, 9, 20])("moves every block of a form of %i to the top and keeps the form", (n) => {
    const a = randomMatrix(n, n, n);
    const { h, transposedQ } = hessenberg(Float64Array.from(a), n, true);
    doubleShiftQr(h, n, 0, n - 1, true, room(n), transposedQ);
    for (let i = n - 1; i > 0; i--) {
      if (h[i * n + i - 1] !== 0) continue;
      const [re, below] = [h[i * n + i], i + 1 < n ? h[(i + 1) * n + i] : 0];
      expect(moveUp(h, n, i, 0, transposedQ)).toBe(0);
      expect(Math.abs(h[0] - re)).toBeLessThan(1e4 * EPS);
      expect(h[n] !== 0).toBe(below !== 0);
      checkSchur(a, h, transposedQ, n);
    }
  });

  it("leaves equal values where they are", () => {
    const t = Float64Array.of(2, 1, 0, 2);
    const q = identityOf(2);
    expect(moveUp(t, 2, 1, 0, q)).toBe(1);
    expect([...t]).toEqual([2, 1, 0, 2]);
  });
});

describe.each([plainKernel, bestKernel()])("double shift on the kernel $name", (kernel) => {
  it.each(cases)("brings a large matrix to Schur form: %s", (_, n, entry) => {
    const next = seeded(n);
    const a = Float64Array.from({ length: n * n }, (_v, p) => entry(Math.floor(p / n), p % n, next));
    const { h, transposedQ } = hessenberg(Float64Array.from(a), n, true);
    expect(kernel.schur(h, n, true, room(n), transposedQ)).toBe(n);
    checkSchur(a, h, transposedQ, n);
  });

  it.each([1, 2, 3, 10, 24, 25, 40, 61, 100])("brings a random matrix of %i to Schur form", (n) => {
    const a = randomMatrix(n, n, 7 * n);
    const { h, transposedQ } = hessenberg(Float64Array.from(a), n, true);
    const alone = Float64Array.from(h);
    const [values, same] = [room(n), room(n)];
    expect(kernel.schur(h, n, true, values, transposedQ)).toBe(n);
    checkSchur(a, h, transposedQ, n);
    expect(kernel.schur(alone, n, false, same)).toBe(n);
    const sum = (v: Float64Array) => v.reduce((total, x) => total + x, 0);
    // The trace, twice: values without vectors come by another sequence of roundings.
    expect(Math.abs(sum(values.re) - sum(same.re))).toBeLessThan(100 * n * EPS * Math.sqrt(n));
  });

  it("keeps exact zeros that part a matrix", () => {
    const n = 30;
    const a = randomMatrix(n, n, 5).map((v, p) => (Math.floor(p / n) >= 12 && p % n < 12 ? 0 : v));
    const { h, transposedQ } = hessenberg(Float64Array.from(a), n, true);
    expect(kernel.schur(h, n, true, room(n), transposedQ)).toBe(n);
    checkSchur(a, h, transposedQ, n);
  });
});

describe.each([plainKernel, bestKernel()])("early deflation on the kernel $name", (kernel) => {
  it("splits off a value that no small subdiagonal shows, and keeps the similarity", () => {
    // A Hessenberg matrix with subdiagonals of 1e-3 along a window of 12: their product, not any one, is small.
    const n = 14;
    const next = seeded(2);
    const h = Float64Array.from({ length: n * n }, (_, p) => {
      const [i, j] = [Math.floor(p / n), p % n];
      return j >= i ? next() + (i === j ? i : 0) : j === i - 1 ? 1e-3 : 0;
    });
    const before = Float64Array.from(h);
    const result = deflateEarly(h, n, n - 1, 12, h[2 * n + 1], kernel);
    expect(result.deflated).toBeGreaterThan(0);
    expect(result.shifts.re.length).toBe(12 - result.deflated);
    const vt = result.transform;
    if (!vt) throw new Error("no transform");
    expect(orthogonalityError(vt, 12)).toBeLessThan(48 * EPS);
    // The whole similarity: identity on the first two rows, V on the rest.
    const q = identityOf(n);
    for (let r = 0; r < 12; r++) for (let c = 0; c < 12; c++) q[(r + 2) * n + c + 2] = vt[r * 12 + c];
    const after = product(product(q, before, n, n, n), transposed(q, n, n), n, n, n);
    // Inside the window and left of it; the part above it is the caller's.
    for (let r = 2; r < n; r++) {
      for (let c = 1; c < n; c++)
        expect(Math.abs(after[r * n + c] - h[r * n + c])).toBeLessThan(64 * n * EPS * 14);
    }
    for (let r = n - result.deflated; r < n; r++) expect(h[r * n + r - 1]).toBe(0);
  });
});
