import { describe, expect, it } from "vitest";
import { generalEigen } from "../../shared-core/numerics/general-eigen.ts";
import { generalisedEigen } from "../../shared-core/numerics/generalised-eigen.ts";
import { symmetricEigen } from "../../shared-core/numerics/symmetric-eigen.ts";
import { tridiagonalEigen } from "../../shared-core/numerics/tridiagonal-eigen.ts";
import { identityOf, randomMatrix, randomSymmetric, seeded, transposed, unwrap } from "./helpers.ts";

const LAYOUTS = ["columns", "rows"] as const;

/** Rows must be the very columns turned over: the layout changes no rounding. */
function expectTurned(columns: Float64Array, rows: Float64Array, n: number) {
  expect(columns.length).toBe(n * n);
  expect([...rows]).toEqual([...transposed(columns, n, n)]);
}

/** A chain whose coordinates are numbered out of their order. */
function shuffledChain(n: number): Float64Array {
  const k = identityOf(n).map((v) => 2 * v);
  const place = (t: number) => (t * 7) % n;
  for (let t = 0; t + 1 < n; t++) {
    const [i, j] = [place(t), place(t + 1)];
    k[i * n + j] = k[j * n + i] = -0.5 - 0.1 * Math.sin(t);
  }
  return k;
}

describe("vectors as rows", () => {
  it.each([3, 20, 45])("of a symmetric matrix of %i", (n) => {
    const a = randomSymmetric(n, n);
    const [columns, rows] = LAYOUTS.map((layout) => unwrap(symmetricEigen(a, n, { layout })).vectors);
    expectTurned(columns, rows, n);
  });

  it.each([3, 40])("of a tridiagonal matrix of %i", (n) => {
    const next = seeded(n);
    const [d, e] = [Float64Array.from({ length: n }, next), Float64Array.from({ length: n - 1 }, next)];
    const [columns, rows] = LAYOUTS.map((layout) => unwrap(tridiagonalEigen(d, e, { layout })).vectors);
    expectTurned(columns, rows, n);
  });

  it.each(["one by one", "along a chain", "with a full mass"])("of modes %s", (kind) => {
    const n = 20;
    const k = kind === "along a chain" ? shuffledChain(n) : randomSymmetric(n, 4);
    const m = Float64Array.from({ length: n }, (_, i) => 1 + 0.1 * i);
    const full = identityOf(n).map((v, p) => 3 * v + 0.1 * (randomSymmetric(n, 9)[p] ?? 0));
    const mass = kind === "with a full mass" ? full : m;
    const [columns, rows] = LAYOUTS.map((layout) => unwrap(generalisedEigen(k, mass, n, { layout })).vectors);
    expectTurned(columns, rows, n);
  });

  it("of a general matrix, both parts, right and left", () => {
    const n = 12;
    const a = randomMatrix(n, n, 2);
    const [columns, rows] = LAYOUTS.map((layout) => unwrap(generalEigen(a, n, { left: true, layout })));
    for (const side of ["right", "left"] as const) {
      for (const part of ["re", "im"] as const) {
        const [c, r] = [columns[side]?.[part], rows[side]?.[part]];
        expectTurned(c ?? new Float64Array(0), r ?? new Float64Array(0), n);
      }
    }
  });
});
