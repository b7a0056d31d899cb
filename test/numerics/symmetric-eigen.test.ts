import { EigenvalueDecomposition, Matrix } from "ml-matrix";
import { describe, expect, it } from "vitest";
import { symmetricEigen } from "../../shared-core/numerics/symmetric-eigen.ts";
import {
  difference,
  EPS,
  eigenResidual,
  largest,
  orthogonalityError,
  product,
  randomMatrix,
  randomSymmetric,
  transposed,
  unwrap,
} from "./helpers.ts";

/** Fixed-fixed chain of unit springs and masses: λⱼ = 4 sin²(jπ / 2(n+1)), the textbook closed form. */
function chain(n: number): Float64Array {
  const a = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    a[i * n + i] = 2;
    if (i > 0) a[i * n + i - 1] = a[(i - 1) * n + i] = -1;
  }
  return a;
}

/** Q diag(values) Qᵀ with a seeded orthogonal Q made of reflections. */
function withSpectrum(values: number[], seed: number): Float64Array {
  const n = values.length;
  let a = new Float64Array(n * n);
  values.forEach((v, i) => {
    a[i * n + i] = v;
  });
  for (let s = 0; s < 3; s++) {
    const u = randomMatrix(n, 1, seed + s);
    const square = u.reduce((sum, x) => sum + x * x, 0);
    const h = Float64Array.from({ length: n * n }, (_, p) => {
      const [i, j] = [Math.floor(p / n), p % n];
      return (i === j ? 1 : 0) - (2 * u[i] * u[j]) / square;
    });
    a = product(product(h, a, n, n, n), h, n, n, n);
  }
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) a[j * n + i] = a[i * n + j];
  return a;
}

function checkDecomposition(a: Float64Array, n: number, factor = 4) {
  const { values, vectors } = unwrap(symmetricEigen(a, n));
  const norm = Math.max(...[...values].map(Math.abs), Number.MIN_VALUE);
  expect(eigenResidual(a, vectors, values, n)).toBeLessThanOrEqual(factor * n * EPS * norm);
  expect(orthogonalityError(vectors, n)).toBeLessThanOrEqual(factor * n * EPS);
  for (let i = 1; i < n; i++) expect(values[i]).toBeGreaterThanOrEqual(values[i - 1]);
  const alone = unwrap(symmetricEigen(a, n, { vectors: false }));
  expect(alone.vectors.length).toBe(0);
  expect(difference(alone.values, values)).toBeLessThanOrEqual(factor * n * EPS * norm);
  return { values, vectors };
}

const SIZES = [1, 2, 3, 4, 10, 24, 28, 29, 33, 51, 64, 100, 161];

describe("symmetric eigenproblem", () => {
  it.each(SIZES)("decomposes a seeded random matrix of %i", (n) => {
    const a = randomSymmetric(n, n);
    const { values } = checkDecomposition(a, n);
    if (n <= 64) {
      const oracle = new EigenvalueDecomposition(Matrix.from1DArray(n, n, a)).realEigenvalues.sort(
        (p, q) => p - q,
      );
      expect(difference(values, oracle)).toBeLessThan(4 * n * EPS * largest(oracle));
    }
  });

  it.each(SIZES)("meets the closed form of a chain of %i", (n) => {
    const { values } = checkDecomposition(chain(n), n);
    const exact = values.map((_, j) => 4 * Math.sin(((j + 1) * Math.PI) / (2 * (n + 1))) ** 2);
    expect(difference(values, exact)).toBeLessThan(4 * n * EPS * 4);
  });

  it.each([
    ["zero", 60, () => 0],
    ["all equal", 60, () => 3],
    ["two roots of many", 90, (i: number) => (i % 2 ? 1 : -2)],
    ["clusters a rounding apart", 90, (i: number) => (i % 5) + i * 1e-16],
    ["clusters of 1e-9", 120, (i: number) => (i % 7) + i * 1e-9],
    ["rigid-body roots", 75, (i: number) => (i < 6 ? 0 : i * i)],
    ["tiny unit", 55, (i: number) => (1 + (i % 3)) * 1e-200],
    ["huge unit", 55, (i: number) => (1 + (i % 3)) * 1e200],
    ["graded 1 to 1e12", 64, (i: number) => 10 ** ((12 * i) / 63)],
  ] as const)("keeps vectors orthogonal: %s", (_, n, root) => {
    const roots = Array.from({ length: n }, (_, i) => root(i)).sort((p, q) => p - q);
    for (const a of [withSpectrum(roots, 7), diagonal(roots)]) {
      const { values } = checkDecomposition(a, n, 8);
      expect(difference(values, roots)).toBeLessThanOrEqual(8 * n * EPS * largest(roots));
    }
  });

  it.each([6, 10, 13, 20, 27])("keeps small roots of a graded matrix of %i to relative accuracy", (n) => {
    // D B D with B well conditioned and D graded over six decades: the roots are determined to a few n·ε
    // relatively (Demmel & Veselić, 1992). The oracle inverts: the smallest root of A is the largest of A⁻¹
    // = D⁻¹ B⁻¹ D⁻¹, whose own large roots any backward stable method gets to relative accuracy.
    const b = Float64Array.from({ length: n * n }, (_, p) => (Math.floor(p / n) === p % n ? 1 : 0.3 / n));
    const c = 0.3 / n;
    const inverseOf = (i: number, j: number) => (i === j ? 1 / (1 - c) : 0) - c / ((1 - c) * (1 - c + n * c));
    const d = Array.from({ length: n }, (_, i) => 10 ** ((6 * ((i * 7) % n)) / (n - 1)));
    const a = b.map((v, p) => v * d[Math.floor(p / n)] * d[p % n]);
    const inverted = b.map((_, p) => inverseOf(Math.floor(p / n), p % n) / (d[Math.floor(p / n)] * d[p % n]));
    const values = unwrap(symmetricEigen(a, n)).values;
    const oracle = unwrap(symmetricEigen(inverted, n)).values;
    expect(Math.abs(values[0] * oracle[n - 1] - 1)).toBeLessThan(100 * n * EPS);
    expect(Math.abs(values[1] * oracle[n - 2] - 1)).toBeLessThan(100 * n * EPS);
  });

  it("reads the lower triangle only", () => {
    const { values } = unwrap(symmetricEigen(Float64Array.of(2, 99, 1, 2), 2));
    expect(difference(values, [1, 3])).toBeLessThan(4 * EPS);
  });

  it.each([Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY])(
    "refuses %d as a value",
    (bad) => {
      expect(symmetricEigen(Float64Array.of(1, bad, bad, 1), 2)).toMatchObject({ ok: false });
    },
  );

  it("answers an empty matrix", () => {
    expect(unwrap(symmetricEigen(new Float64Array(0), 0)).values.length).toBe(0);
  });

  it("keeps its input and repeats itself bit for bit", () => {
    const a = randomSymmetric(70, 3);
    const before = Float64Array.from(a);
    const first = unwrap(symmetricEigen(a, 70));
    const second = unwrap(symmetricEigen(a, 70));
    expect(difference(a, before)).toBe(0);
    expect(difference(first.vectors, second.vectors)).toBe(0);
    expect(difference(transposed(first.values, 1, 70), second.values)).toBe(0);
  });
});

function diagonal(roots: number[]): Float64Array {
  const n = roots.length;
  return Float64Array.from({ length: n * n }, (_, p) => (Math.floor(p / n) === p % n ? roots[p % n] : 0));
}
