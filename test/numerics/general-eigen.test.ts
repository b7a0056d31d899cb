import { EigenvalueDecomposition, Matrix } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { type ComplexMatrix, generalEigen } from "../../shared-core/numerics/general-eigen.ts";
import { difference, EPS, largest, product, randomMatrix, transposed, unwrap } from "./helpers.ts";

function frobenius(a: Float64Array): number {
  // Scaled first: squares of very small entries would vanish.
  const most = Math.max(largest(a), Number.MIN_VALUE);
  return most * Math.sqrt(a.reduce((sum, v) => sum + (v / most) ** 2, 0));
}

/** Largest residual of A x = λ x over all columns, and the largest departure from unit length. */
function residuals(a: Float64Array, n: number, re: Float64Array, im: Float64Array, x: ComplexMatrix) {
  const ar = product(a, x.re, n, n, n);
  const ai = product(a, x.im, n, n, n);
  let residual = 0;
  let length = 0;
  for (let j = 0; j < n; j++) {
    let square = 0;
    for (let i = 0; i < n; i++) {
      const [xr, xi] = [x.re[i * n + j], x.im[i * n + j]];
      square += xr * xr + xi * xi;
      residual = Math.max(residual, Math.abs(ar[i * n + j] - re[j] * xr + im[j] * xi));
      residual = Math.max(residual, Math.abs(ai[i * n + j] - re[j] * xi - im[j] * xr));
    }
    length = Math.max(length, Math.abs(square - 1));
  }
  return { residual, length };
}

function check(a: Float64Array, n: number, factor = 4) {
  const solved = unwrap(generalEigen(a, n, { left: true }));
  const { re, im, right, left } = solved;
  if (!right || !left) throw new Error("vectors are missing");
  const scale = factor * n * EPS * frobenius(a);
  const forwards = residuals(a, n, re, im, right);
  expect(forwards.residual).toBeLessThanOrEqual(scale);
  expect(forwards.length).toBeLessThan(8 * n * EPS);
  // yᴴ A = λ yᴴ is Aᵀ y = conj(λ) y for a real A.
  const backwards = residuals(
    transposed(a, n, n),
    n,
    re,
    im.map((v) => -v),
    left,
  );
  expect(backwards.residual).toBeLessThanOrEqual(scale);
  expect(backwards.length).toBeLessThan(8 * n * EPS);
  for (let j = 0; j < n; j++) {
    if (im[j] === 0) continue;
    expect([re[j + 1], im[j + 1]]).toEqual([re[j], -im[j]]);
    expect(im[j]).toBeGreaterThan(0);
    j++;
  }
  const trace = re.reduce((sum, v) => sum + v, 0);
  let diagonal = 0;
  for (let i = 0; i < n; i++) diagonal += a[i * n + i];
  expect(Math.abs(trace - diagonal)).toBeLessThanOrEqual(n * scale);
  return solved;
}

/** Values sorted by real, then imaginary part, for comparing sets. */
function sorted(re: ArrayLike<number>, im: ArrayLike<number>): [number, number][] {
  const all = Array.from({ length: re.length }, (_, i): [number, number] => [re[i], im[i]]);
  return all.sort((p, q) => (Math.abs(p[0] - q[0]) > 1e-9 ? p[0] - q[0] : p[1] - q[1]));
}

const companion = (coefficients: number[]) => {
  const n = coefficients.length;
  const a = new Float64Array(n * n);
  for (let j = 0; j < n; j++) a[j] = -coefficients[n - 1 - j];
  for (let i = 1; i < n; i++) a[i * n + i - 1] = 1;
  return a;
};

describe("general eigenproblem", () => {
  it.each([1, 2, 3, 4, 5, 8, 20, 60, 130])("decomposes a seeded random matrix of %i", (n) => {
    const a = randomMatrix(n, n, n);
    const { re, im } = check(a, n);
    if (n <= 60) {
      const oracle = new EigenvalueDecomposition(Matrix.from1DArray(n, n, a));
      const ours = sorted(re, im);
      const theirs = sorted(oracle.realEigenvalues, oracle.imaginaryEigenvalues);
      ours.forEach(([r, i], k) => {
        // Eigenvalues of a random matrix are conditioned well within 1e4 at these sizes.
        expect(Math.hypot(r - theirs[k][0], i - theirs[k][1])).toBeLessThan(1e4 * n * EPS);
      });
    }
  });

  it("finds the roots of unity from a companion matrix", () => {
    const n = 12;
    const { re, im } = check(companion([-1, ...Array(n - 1).fill(0)]), n);
    for (let j = 0; j < n; j++) {
      const turn = (Math.atan2(im[j], re[j]) * n) / (2 * Math.PI);
      expect(Math.abs(turn - Math.round(turn))).toBeLessThan(1e-13);
      expect(Math.abs(Math.hypot(re[j], im[j]) - 1)).toBeLessThan(1e-14);
    }
  });

  it.each([0.05, 0.9, 1.5])("meets the closed form of a damped oscillator, ζ = %d", (zeta) => {
    const w = 40;
    const { re, im } = check(Float64Array.of(0, 1, -w * w, -2 * zeta * w), 2);
    const root = w * Math.sqrt(Math.abs(1 - zeta * zeta));
    const [first, second] = sorted(re, im);
    const tolerance = 16 * EPS * w * w;
    if (zeta < 1) {
      expect(Math.abs(first[0] + zeta * w)).toBeLessThan(tolerance);
      expect(Math.abs(second[1] - root)).toBeLessThan(tolerance);
    } else {
      expect(Math.abs(first[0] + zeta * w + root)).toBeLessThan(tolerance);
      expect(Math.abs(second[0] + zeta * w - root)).toBeLessThan(tolerance);
    }
  });

  it.each([
    ["a Jordan block of 2 at zero (a free mass)", Float64Array.of(0, 1, 0, 0), 2],
    ["critical damping", Float64Array.of(0, 1, -9, -6), 2],
    [
      "a Jordan block of 6",
      Float64Array.from({ length: 36 }, (_, p) => (p % 7 === 0 ? 2 : p % 7 === 1 ? 1 : 0)),
      6,
    ],
    ["zero", new Float64Array(25), 5],
    ["identity", Float64Array.from({ length: 25 }, (_, p) => (p % 6 === 0 ? 1 : 0)), 5],
    ["lower triangle", Float64Array.from({ length: 64 }, (_, p) => (p % 8 <= p / 8 ? 1 + p : 0)), 8],
    [
      "a permutation (double shift alone stalls)",
      Float64Array.of(0, 0, 0, 1, 1, 0, 0, 0, 0, 1, 0, 0, 0, 0, 1, 0),
      4,
    ],
    [
      "graded over 1e12",
      Float64Array.from({ length: 100 }, (_, p) => Math.cos(p) * 10 ** ((-12 * (p % 10)) / 9)),
      10,
    ],
    [
      "rows and columns 1e12 apart (balancing)",
      Float64Array.from(
        { length: 64 },
        (_, p) => Math.sin(p + 1) * 10 ** ((12 * ((p % 8) - Math.floor(p / 8))) / 7),
      ),
      8,
    ],
    ["huge unit", randomMatrix(9, 9, 2).map((v) => v * 1e250), 9],
    ["tiny unit", randomMatrix(9, 9, 2).map((v) => v * 1e-250), 9],
  ] as const)("keeps residuals small: %s", (_, a, n) => {
    check(a, n, 8);
  });

  it("loses half the digits at a double root of index two, no more", () => {
    const { re, im } = check(Float64Array.of(0, 1, -9, -6), 2);
    for (let j = 0; j < 2; j++) expect(Math.hypot(re[j] + 3, im[j])).toBeLessThan(Math.sqrt(64 * EPS * 10));
  });

  it("balances: scaling the coordinates by powers of two changes nothing", () => {
    const n = 6;
    const a = randomMatrix(n, n, 3);
    const d = [1, 2 ** 20, 2 ** -15, 2 ** 7, 1, 2 ** 30];
    const plain = unwrap(generalEigen(a, n, { right: false }));
    const scaled = unwrap(
      generalEigen(
        a.map((v, p) => (v * d[p % n]) / d[Math.floor(p / n)]),
        n,
        { right: false },
      ),
    );
    const [p, q] = [sorted(plain.re, plain.im), sorted(scaled.re, scaled.im)];
    p.forEach((v, i) => {
      expect(Math.hypot(v[0] - q[i][0], v[1] - q[i][1])).toBeLessThan(1e4 * EPS);
    });
  });

  it("gives the same values with and without vectors, and keeps its input", () => {
    const a = randomMatrix(30, 30, 4);
    const before = Float64Array.from(a);
    const alone = unwrap(generalEigen(a, 30, { right: false }));
    const both = unwrap(generalEigen(a, 30));
    expect(difference(a, before)).toBe(0);
    expect(alone.right).toBeUndefined();
    expect(both.left).toBeUndefined();
    const [p, q] = [sorted(alone.re, alone.im), sorted(both.re, both.im)];
    p.forEach((v, i) => {
      expect(Math.hypot(v[0] - q[i][0], v[1] - q[i][1])).toBeLessThan(1e5 * EPS);
    });
    expect(largest(both.re)).toBeGreaterThan(0);
  });

  it("refuses what is not finite, answers nothing to nothing", () => {
    expect(generalEigen(Float64Array.of(1, Number.NaN, 0, 1), 2)).toMatchObject({ ok: false });
    expect(generalEigen(Float64Array.of(Number.NEGATIVE_INFINITY), 1)).toMatchObject({ ok: false });
    expect(unwrap(generalEigen(new Float64Array(0), 0)).re.length).toBe(0);
  });
});
