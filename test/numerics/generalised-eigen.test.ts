import { describe, expect, it } from "vitest";
import { generalisedEigen } from "../../shared-core/numerics/generalised-eigen.ts";
import {
  difference,
  EPS,
  largest,
  product,
  randomMatrix,
  randomSymmetric,
  seeded,
  transposed,
  unwrap,
} from "./helpers.ts";

function positiveDefinite(n: number, seed: number): Float64Array {
  const g = randomMatrix(n, n, seed);
  const m = product(g, transposed(g, n, n), n, n, n);
  for (let i = 0; i < n; i++) m[i * n + i] += n;
  return m;
}

function full(diagonal: Float64Array): Float64Array {
  const n = diagonal.length;
  return Float64Array.from({ length: n * n }, (_, p) => (Math.floor(p / n) === p % n ? diagonal[p % n] : 0));
}

/** K φ = λ M φ and φᵀ M φ = I, in units of n·ε and the sizes involved. */
function checkModes(k: Float64Array, m: Float64Array, n: number, values: Float64Array, phi: Float64Array) {
  const kPhi = product(k, phi, n, n, n);
  const mPhi = product(m, phi, n, n, n);
  const top = largest(values);
  const scaled = kPhi.map((v, p) => v - mPhi[p] * values[p % n]);
  expect(largest(scaled)).toBeLessThan(40 * n * EPS * top * largest(mPhi));
  const gram = product(transposed(phi, n, n), mPhi, n, n, n);
  for (let i = 0; i < n; i++) gram[i * n + i] -= 1;
  expect(largest(gram)).toBeLessThan(40 * n * EPS);
}

describe("generalised symmetric eigenproblem", () => {
  it("solves two masses in closed form", () => {
    // m₁ = 2, m₂ = 1, k = 3 to ground and 1 between: det(K − λM) = 2λ² − 6λ + 3.
    const { values } = unwrap(generalisedEigen(Float64Array.of(4, -1, -1, 1), Float64Array.of(2, 1), 2));
    const root = Math.sqrt(36 - 24);
    expect(difference(values, [(6 - root) / 4, (6 + root) / 4])).toBeLessThan(8 * EPS);
  });

  it.each([1, 2, 7, 40, 90])("solves seeded problems of %i with diagonal and full mass", (n) => {
    const k = randomSymmetric(n, n);
    const next = seeded(n + 1);
    const diagonal = Float64Array.from({ length: n }, () => 2 + next());
    const plain = unwrap(generalisedEigen(k, diagonal, n));
    checkModes(k, full(diagonal), n, plain.values, plain.vectors);
    const same = unwrap(generalisedEigen(k, full(diagonal), n));
    expect(difference(same.vectors, plain.vectors)).toBe(0);
    const m = positiveDefinite(n, n + 2);
    const general = unwrap(generalisedEigen(k, m, n));
    checkModes(k, m, n, general.values, general.vectors);
    const alone = unwrap(generalisedEigen(k, m, n, { vectors: false }));
    expect(difference(alone.values, general.values)).toBeLessThan(20 * n * EPS * largest(general.values));
    expect(alone.vectors.length).toBe(0);
  });

  it("finds the rigid-body root of a free chain as zero beside the largest", () => {
    const n = 30;
    const k = new Float64Array(n * n);
    for (let i = 0; i + 1 < n; i++) {
      k[i * n + i] += 5e6;
      k[(i + 1) * n + i + 1] += 5e6;
      k[i * n + i + 1] = k[(i + 1) * n + i] = -5e6;
    }
    const mass = new Float64Array(n).fill(12);
    const { values } = unwrap(generalisedEigen(k, mass, n));
    expect(Math.abs(values[0])).toBeLessThan(n * EPS * values[n - 1]);
    // λⱼ = 4 k/m sin²(jπ / 2n), the free-free chain in closed form.
    const exact = values.map((_, j) => 4 * (5e6 / 12) * Math.sin((j * Math.PI) / (2 * n)) ** 2);
    expect(difference(values, exact)).toBeLessThan(4 * n * EPS * values[n - 1]);
  });

  it.each([40, 130])("solves a chain of %i whose numbering is shuffled, as the plain order does", (n) => {
    const next = seeded(n);
    const place = Array.from({ length: n }, (_, i) => (i * 37) % n);
    expect(new Set(place).size).toBe(n);
    const k = new Float64Array(n * n);
    for (let t = 0; t + 1 < n; t++) {
      const [i, j, s] = [place[t], place[t + 1], 1 + 0.5 * next()];
      k[i * n + i] += s;
      k[j * n + j] += s;
      k[i * n + j] = k[j * n + i] = -s;
    }
    const mass = Float64Array.from({ length: n }, () => 2 + next());
    const { values, vectors } = unwrap(generalisedEigen(k, mass, n));
    checkModes(k, full(mass), n, values, vectors);
    const alone = unwrap(generalisedEigen(k, mass, n, { vectors: false }));
    expect(difference(alone.values, values)).toBeLessThan(4 * n * EPS * values[n - 1]);
    expect(Math.abs(values[0])).toBeLessThan(n * EPS * values[n - 1]);
  });

  it("keeps mass ratios of 1e12 apart", () => {
    const mass = Float64Array.of(1e-6, 1, 1e6);
    const { values } = unwrap(generalisedEigen(full(Float64Array.of(1, 4, 9)), mass, 3));
    expect(values[0] * 1e6).toBeCloseTo(9, 12);
    expect(values[1]).toBeCloseTo(4, 12);
    expect(values[2] / 1e6).toBeCloseTo(1, 12);
  });

  it("refuses a mass that is not positive, naming the row, and values that are not finite", () => {
    const k = Float64Array.of(1, 0, 0, 1);
    const reason = expect.stringContaining("row 2");
    expect(generalisedEigen(k, Float64Array.of(1, 0), 2)).toMatchObject({ ok: false, reason });
    expect(generalisedEigen(k, Float64Array.of(1, -1), 2)).toMatchObject({ ok: false, reason });
    expect(generalisedEigen(k, Float64Array.of(1, 1, 1, 1), 2)).toMatchObject({ ok: false, reason });
    expect(generalisedEigen(k, Float64Array.of(1, Number.NaN), 2).ok).toBe(false);
    expect(
      generalisedEigen(Float64Array.of(1, 0, 0, Number.POSITIVE_INFINITY), Float64Array.of(1, 1), 2).ok,
    ).toBe(false);
  });
});
