import { describe, expect, it } from "vitest";
import { bestKernel, plainKernel } from "../../shared-core/numerics/kernel.ts";
import { tridiagonalEigen } from "../../shared-core/numerics/tridiagonal-eigen.ts";
import { difference, EPS, eigenResidual, largest, orthogonalityError, seeded, unwrap } from "./helpers.ts";

function dense(d: ArrayLike<number>, e: ArrayLike<number>): Float64Array {
  const n = d.length;
  const a = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    a[i * n + i] = d[i];
    if (i > 0) a[i * n + i - 1] = a[(i - 1) * n + i] = e[i - 1];
  }
  return a;
}

function check(d: number[], e: number[], factor = 4): Float64Array {
  const n = d.length;
  const [df, ef] = [Float64Array.from(d), Float64Array.from(e)];
  const matrix = dense(df, ef);
  const alone = unwrap(tridiagonalEigen(df, ef, { vectors: false })).values;
  const norm = Math.max(largest(alone), Number.MIN_VALUE);
  for (const kernel of [plainKernel, bestKernel()]) {
    const { values, vectors } = unwrap(tridiagonalEigen(df, ef, { kernel }));
    expect(orthogonalityError(vectors, n)).toBeLessThanOrEqual(factor * n * EPS);
    expect(eigenResidual(matrix, vectors, values, n)).toBeLessThanOrEqual(factor * n * EPS * norm);
    expect(difference(alone, values)).toBeLessThanOrEqual(factor * n * EPS * norm);
  }
  return alone;
}

/** Wilkinson's W⁺ of odd order: pairs of roots that agree to many digits. */
const wilkinson = (n: number) => Array.from({ length: n }, (_, i) => Math.abs(i - (n - 1) / 2));

describe("symmetric tridiagonal eigenproblem", () => {
  it.each([1, 2, 3, 32, 33, 64, 65, 150])("meets the closed form of a chain of %i", (n) => {
    const values = check(Array(n).fill(2), Array(n - 1).fill(-1));
    const exact = values.map((_, j) => 4 * Math.sin(((j + 1) * Math.PI) / (2 * (n + 1))) ** 2);
    expect(difference(values, exact)).toBeLessThan(4 * n * EPS * 4);
  });

  it("gives Wilkinson's W21⁺ its published largest root", () => {
    // J. H. Wilkinson, The Algebraic Eigenvalue Problem, 1965, ch. 5 § 45: 10.746 194 182 903 3.
    const values = check(wilkinson(21), Array(20).fill(1));
    expect(values[20]).toBeCloseTo(10.7461941829033, 12);
    expect(values[20] - values[19]).toBeLessThan(1e-13);
  });

  it.each([
    ["Wilkinson 101", wilkinson(101), Array(100).fill(1)],
    [
      "ten W21⁺ glued by 1e−8",
      Array(10).fill(wilkinson(21)).flat(),
      Array.from({ length: 209 }, (_, i) => (i % 21 === 20 ? 1e-8 : 1)),
    ],
    [
      "ten W21⁺ glued by 1e−14",
      Array(10).fill(wilkinson(21)).flat(),
      Array.from({ length: 209 }, (_, i) => (i % 21 === 20 ? 1e-14 : 1)),
    ],
    [
      "a repeating chain of twelve loose parts",
      Array(120).fill(3),
      Array.from({ length: 119 }, (_, i) => (i % 10 === 9 ? 0 : -1)),
    ],
    ["zero", Array(90).fill(0), Array(89).fill(0)],
    ["identity", Array(90).fill(1), Array(89).fill(0)],
    ["zero diagonal", Array(91).fill(0), Array(90).fill(1)],
    [
      "graded upwards to 1e12",
      Array.from({ length: 80 }, (_, i) => 10 ** (i / 6.6)),
      Array.from({ length: 79 }, (_, i) => 0.3 * 10 ** (i / 6.6)),
    ],
    [
      "graded downwards from 1e12",
      Array.from({ length: 80 }, (_, i) => 10 ** (12 - i / 6.6)),
      Array.from({ length: 79 }, (_, i) => 0.3 * 10 ** (11.8 - i / 6.6)),
    ],
    [
      "heavy and light masses in turn, 1e12 apart",
      Array.from({ length: 100 }, (_, i) => (i % 2 ? 2e6 : 2e-6)),
      Array(99).fill(-1),
    ],
    ["huge unit", Array(60).fill(2e200), Array(59).fill(-1e200)],
    ["tiny unit", Array(60).fill(2e-200), Array(59).fill(-1e-200)],
  ])("keeps residuals and orthogonality: %s", (_, d, e) => {
    check(d, e);
  });

  it.each([1, 2, 3, 4])("keeps them on seeded random entries, case %i", (seed) => {
    const next = seeded(seed);
    const n = 60 + 23 * seed;
    check(
      Array.from({ length: n }, () => next() * 10 ** (seed * next())),
      Array.from({ length: n - 1 }, () => next() * 10 ** (seed * next())),
    );
  });

  it("refuses what is not finite, answers nothing to nothing", () => {
    expect(tridiagonalEigen(Float64Array.of(1, Number.NaN), Float64Array.of(1)).ok).toBe(false);
    expect(tridiagonalEigen(Float64Array.of(1, 1), Float64Array.of(Number.POSITIVE_INFINITY)).ok).toBe(false);
    expect(unwrap(tridiagonalEigen(new Float64Array(0), new Float64Array(0))).values.length).toBe(0);
  });
});
