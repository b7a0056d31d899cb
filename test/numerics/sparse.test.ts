import { describe, expect, it } from "vitest";
import { bandwidthOf, patternOf, reverseCuthillMcKee } from "../../shared-core/numerics/ordering.ts";
import {
  sparseFromDense,
  sparseFromTriplets,
  sparseTimesVector,
  sparseToBand,
  sparseToDense,
} from "../../shared-core/numerics/sparse.ts";
import { difference, EPS, product, randomMatrix, seeded } from "./helpers.ts";

/** Pattern of a chain whose nodes carry the given numbers, with ones beside and twos on the diagonal. */
function shuffledChain(numbers: readonly number[]) {
  const row: number[] = [];
  const column: number[] = [];
  const value: number[] = [];
  const put = (i: number, j: number, v: number) => {
    row.push(i);
    column.push(j);
    value.push(v);
  };
  numbers.forEach((i, t) => {
    put(i, i, 2);
    if (t === 0) return;
    put(i, numbers[t - 1], -1);
    put(numbers[t - 1], i, -1);
  });
  return sparseFromTriplets(numbers.length, numbers.length, { row, column, value });
}

function shuffled(n: number, seed: number): number[] {
  const next = seeded(seed);
  const out = Array.from({ length: n }, (_, i) => i);
  for (let i = n - 1; i > 0; i--) {
    const j = Math.floor(((next() + 1) / 2) * (i + 1));
    [out[i], out[j]] = [out[j], out[i]];
  }
  return out;
}

describe("sparse matrices", () => {
  it("sums duplicates in the order given", () => {
    const a = sparseFromTriplets(2, 3, { row: [1, 0, 1, 1], column: [2, 1, 2, 0], value: [1e16, 5, 1, 7] });
    expect([...a.rowStart]).toEqual([0, 1, 3]);
    expect([...a.column]).toEqual([1, 0, 2]);
    expect([...a.value]).toEqual([5, 7, 1e16 + 1]);
    const other = sparseFromTriplets(1, 1, { row: [0, 0, 0], column: [0, 0, 0], value: [1e16, 1, -1e16] });
    expect(other.value[0]).toBe(0);
    const turned = sparseFromTriplets(1, 1, { row: [0, 0, 0], column: [0, 0, 0], value: [1e16, -1e16, 1] });
    expect(turned.value[0]).toBe(1);
  });

  it("goes to dense and back, and multiplies", () => {
    const dense = randomMatrix(7, 5, 1).map((v) => (Math.abs(v) < 0.5 ? 0 : v));
    const a = sparseFromDense(dense, 7, 5);
    expect(difference(sparseToDense(a), dense)).toBe(0);
    const x = randomMatrix(5, 1, 2);
    expect(difference(sparseTimesVector(a, x), product(dense, x, 7, 5, 1))).toBeLessThan(5 * EPS);
  });

  it("answers no entries at all", () => {
    const a = sparseFromTriplets(3, 3, { row: [], column: [], value: [] });
    expect([...sparseTimesVector(a, Float64Array.of(1, 2, 3))]).toEqual([0, 0, 0]);
    expect([...reverseCuthillMcKee(patternOf([a], 3))].sort()).toEqual([0, 1, 2]);
  });
});

describe("reverse Cuthill-McKee", () => {
  it.each([1, 2, 3, 10, 200])("brings a shuffled chain of %i back to bandwidth one", (n) => {
    const a = shuffledChain(shuffled(n, n));
    const pattern = patternOf([a], n);
    const order = reverseCuthillMcKee(pattern);
    expect([...order].sort((p, q) => p - q)).toEqual(Array.from({ length: n }, (_, i) => i));
    expect(bandwidthOf(pattern, order)).toBe(Math.min(1, n - 1));
    const band = sparseToBand(a, 1, order);
    for (let i = 0; i < n; i++)
      expect([...band.values.subarray(2 * i, 2 * i + 2)]).toEqual([i === 0 ? 0 : -1, 2]);
  });

  it("brings a shuffled grid of 6 × 20 to a bandwidth near its short side", () => {
    const numbers = shuffled(120, 5);
    const row: number[] = [];
    const column: number[] = [];
    for (let x = 0; x < 20; x++) {
      for (let y = 0; y < 6; y++) {
        if (x > 0) [row.push(numbers[6 * x + y]), column.push(numbers[6 * x + y - 6])];
        if (y > 0) [row.push(numbers[6 * x + y]), column.push(numbers[6 * x + y - 1])];
      }
    }
    const pattern = patternOf([sparseFromTriplets(120, 120, { row, column, value: row.map(() => 1) })], 120);
    expect(bandwidthOf(pattern)).toBeGreaterThan(40);
    expect(bandwidthOf(pattern, reverseCuthillMcKee(pattern))).toBeLessThanOrEqual(8);
  });

  it("keeps unconnected parts apart and merges the patterns of several matrices", () => {
    const k = shuffledChain([0, 2, 4]);
    const both = patternOf(
      [
        {
          ...k,
          rows: 6,
          columns: 6,
          rowStart: Int32Array.of(...k.rowStart, k.rowStart[3], k.rowStart[3], k.rowStart[3]),
        },
      ],
      6,
    );
    expect(both.start.length).toBe(7);
    const order = reverseCuthillMcKee(both);
    expect(new Set(order).size).toBe(6);
  });
});
