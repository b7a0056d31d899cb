import { inverse, LuDecomposition, Matrix, solve } from "ml-matrix";
import { describe, expect, it } from "vitest";
import {
  complexLuWorkspace,
  factorCholesky,
  factorComplexLu,
  factorLu,
  multiply,
  multiplyVector,
  norm1,
  realLuWorkspace,
  reciprocalCondition,
  solveCholesky,
  solveComplexLu,
  solveLower,
  solveLowerTransposed,
  solveLu,
  solveLuTransposed,
  transpose,
} from "../../shared-core/numerics/dense.ts";
import {
  difference,
  EPS,
  identityOf,
  largest,
  product,
  randomMatrix,
  transposed,
  unwrap,
} from "./helpers.ts";

const hilbert = (n: number) =>
  Float64Array.from({ length: n * n }, (_, p) => 1 / (Math.floor(p / n) + (p % n) + 1));

describe("products", () => {
  it.each([
    [1, 1, 1],
    [3, 5, 2],
    [17, 9, 31],
    [64, 33, 48],
  ])("multiplies %i×%i by ×%i as the triple loop does", (rows, inner, columns) => {
    const a = randomMatrix(rows, inner, 1);
    const b = randomMatrix(inner, columns, 2);
    const expected = product(a, b, rows, inner, columns);
    expect(difference(multiply(a, b, rows, inner, columns), expected)).toBeLessThan(inner * EPS);
    expect(
      difference(
        multiplyVector(a, b.subarray(0, inner), rows, inner),
        product(a, b.subarray(0, inner), rows, inner, 1),
      ),
    ).toBeLessThan(inner * EPS);
    expect(difference(transpose(a, rows, inner), transposed(a, rows, inner))).toBe(0);
  });

  it("gives the 1-norm of a small matrix", () => {
    expect(norm1(Float64Array.of(1, -2, -3, 1), 2, 2)).toBe(4);
  });
});

describe("real LU", () => {
  it.each([1, 2, 3, 4, 5, 7, 8, 9, 30, 101])(
    "solves a seeded system of %i with a residual of order n·ε",
    (n) => {
      const a = randomMatrix(n, n, n);
      const b = randomMatrix(n, 3, n + 1);
      const lu = unwrap(factorLu(a, n));
      const x = solveLu(lu, b, 3);
      const scale = n * largest(a) * largest(x) * EPS;
      expect(difference(product(a, x, n, n, 3), b)).toBeLessThan(8 * scale);
      const y = solveLuTransposed(
        lu,
        b.filter((_, i) => i % 3 === 0),
      );
      expect(
        difference(
          product(transposed(a, n, n), y, n, n, 1),
          b.filter((_, i) => i % 3 === 0),
        ),
      ).toBeLessThan(8 * n * largest(a) * largest(y) * EPS);
    },
  );

  it.each([33, 70, 129])("solves for as many right-hand sides as unknowns, %i", (n) => {
    const a = randomMatrix(n, n, n);
    const x = solveLu(unwrap(factorLu(a, n)), identityOf(n), n);
    const scale = n * largest(a) * largest(x) * EPS;
    expect(difference(product(a, x, n, n, n), identityOf(n))).toBeLessThan(8 * scale);
    const one = solveLu(
      unwrap(factorLu(a, n)),
      identityOf(n).filter((_, p) => p % n === 0),
    );
    expect(
      difference(
        one,
        x.filter((_, p) => p % n === 0),
      ),
    ).toBeLessThan(8 * scale * largest(x));
  });

  it("agrees with ml-matrix on a seeded system", () => {
    const n = 12;
    const a = randomMatrix(n, n, 5);
    const b = randomMatrix(n, 2, 6);
    const oracle = solve(Matrix.from1DArray(n, n, a), Matrix.from1DArray(n, 2, b)).to1DArray();
    expect(new LuDecomposition(Matrix.from1DArray(n, n, a)).isSingular()).toBe(false);
    expect(difference(solveLu(unwrap(factorLu(a, n)), b, 2), oracle)).toBeLessThan(1e-12);
  });

  it("keeps small unknowns beside large ones: units mixed over twelve decades", () => {
    // D A D with D from 1 to 1e6: the solution of the scaled system is D⁻¹ times the plain one.
    const n = 9;
    const a = randomMatrix(n, n, 8);
    const d = Float64Array.from({ length: n }, (_, i) => 10 ** ((6 * i) / (n - 1)));
    const scaled = a.map((v, p) => v * d[Math.floor(p / n)] * d[p % n]);
    const b = randomMatrix(n, 1, 9);
    const plain = solveLu(unwrap(factorLu(a, n)), b);
    const x = solveLu(
      unwrap(factorLu(scaled, n)),
      b.map((v, i) => v * d[i]),
    ).map((v, i) => v * d[i]);
    expect(difference(x, plain)).toBeLessThan(1e-12 * largest(plain));
  });

  it("estimates the condition of the Hilbert matrix within a factor three of the true one", () => {
    const n = 8;
    const lu = unwrap(factorLu(hilbert(n), n));
    const scaled = hilbert(n).map((v, p) => v * lu.rowScale[Math.floor(p / n)] * lu.columnScale[p % n]);
    const inverted = inverse(Matrix.from1DArray(n, n, scaled)).to1DArray();
    const truth = 1 / (norm1(scaled, n, n) * norm1(Float64Array.from(inverted), n, n));
    const estimate = reciprocalCondition(lu);
    expect(estimate).toBeGreaterThan(truth * 0.99);
    expect(estimate).toBeLessThan(truth * 3);
  });

  it("reports a condition of one for a diagonal spread over twenty decades", () => {
    const a = new Float64Array(9);
    a.set([1e-10], 0);
    a.set([1], 4);
    a.set([1e10], 8);
    expect(reciprocalCondition(unwrap(factorLu(a, 3)))).toBeGreaterThan(0.2);
  });

  it.each([
    ["a zero matrix", new Float64Array(4)],
    ["equal rows", Float64Array.of(1, 2, 1, 2)],
    ["rows equal up to rounding", Float64Array.of(0.1, 0.7, 0.1 * 3, 0.7 * 3)],
    ["a free-free chain", Float64Array.of(1, -1, 0, -1, 2, -1, 0, -1, 1)],
  ])("refuses %s", (_, a) => {
    const outcome = factorLu(a, Math.sqrt(a.length));
    expect(outcome).toMatchObject({ ok: false, reason: expect.stringContaining("singular") });
  });

  it.each([Number.NaN, Number.POSITIVE_INFINITY])("refuses %d as a value", (bad) => {
    expect(factorLu(Float64Array.of(1, bad, 0, 1), 2)).toMatchObject({
      ok: false,
      reason: expect.stringContaining("finite"),
    });
  });

  it("reuses a workspace without mixing factorisations", () => {
    const room = realLuWorkspace(4);
    unwrap(factorLu(randomMatrix(4, 4, 1), 4, room));
    const a = randomMatrix(4, 4, 2);
    const b = randomMatrix(4, 1, 3);
    expect(difference(solveLu(unwrap(factorLu(a, 4, room)), b), solveLu(unwrap(factorLu(a, 4)), b))).toBe(0);
  });
});

describe("complex LU", () => {
  it.each([1, 2, 5, 40])("solves a seeded system of %i as its real form of twice the size does", (n) => {
    const [re, im] = [randomMatrix(n, n, n), randomMatrix(n, n, n + 50)];
    const [bRe, bIm] = [randomMatrix(n, 2, n + 60), randomMatrix(n, 2, n + 70)];
    const [xRe, xIm] = [new Float64Array(2 * n), new Float64Array(2 * n)];
    const lu = unwrap(factorComplexLu(re, im, n, complexLuWorkspace(n)));
    solveComplexLu(lu, bRe, bIm, 2, xRe, xIm);
    const rr = product(re, xRe, n, n, 2);
    const ii = product(im, xIm, n, n, 2);
    const ri = product(re, xIm, n, n, 2);
    const ir = product(im, xRe, n, n, 2);
    const scale = 32 * n * EPS * (largest(xRe) + largest(xIm));
    expect(
      difference(
        rr.map((v, i) => v - ii[i]),
        bRe,
      ),
    ).toBeLessThan(scale);
    expect(
      difference(
        ri.map((v, i) => v + ir[i]),
        bIm,
      ),
    ).toBeLessThan(scale);
  });

  it("solves a purely imaginary system in closed form", () => {
    const lu = unwrap(factorComplexLu(new Float64Array(4), Float64Array.of(0, 2, 4, 0), 2));
    const [xRe, xIm] = [new Float64Array(2), new Float64Array(2)];
    solveComplexLu(lu, Float64Array.of(2, 4), new Float64Array(2), 1, xRe, xIm);
    expect([...xRe, ...xIm]).toEqual([0, 0, -1, -1]);
  });

  it("refuses singular and non-finite input", () => {
    const zero = new Float64Array(4);
    expect(factorComplexLu(zero, Float64Array.of(1, 1, 1, 1), 2).ok).toBe(false);
    expect(factorComplexLu(zero, Float64Array.of(1, Number.NaN, 0, 1), 2).ok).toBe(false);
  });
});

describe("Cholesky", () => {
  it.each([1, 2, 10, 60])("factors and solves a seeded positive definite matrix of %i", (n) => {
    const g = randomMatrix(n, n, n + 3);
    const a = product(g, transposed(g, n, n), n, n, n);
    for (let i = 0; i < n; i++) a[i * n + i] += 1;
    const factor = unwrap(factorCholesky(a, n));
    expect(difference(product(factor.lower, transposed(factor.lower, n, n), n, n, n), a)).toBeLessThan(
      n * EPS * largest(a),
    );
    const b = randomMatrix(n, 2, 4);
    const x = solveCholesky(factor, b, 2);
    expect(difference(product(a, x, n, n, 2), b)).toBeLessThan(8 * n * EPS * largest(a) * largest(x));
    const half = Float64Array.from(b);
    solveLower(factor, half, 2);
    solveLowerTransposed(factor, half, 2);
    expect(difference(half, x)).toBe(0);
  });

  it.each([40, 100])("solves for as many right-hand sides as unknowns, %i", (n) => {
    const g = randomMatrix(n, n, n);
    const a = product(g, transposed(g, n, n), n, n, n);
    for (let i = 0; i < n; i++) a[i * n + i] += 1;
    const factor = unwrap(factorCholesky(a, n));
    const x = solveCholesky(factor, identityOf(n), n);
    expect(difference(product(a, x, n, n, n), identityOf(n))).toBeLessThan(
      8 * n * EPS * largest(a) * largest(x),
    );
    expect(difference(x, transposed(x, n, n))).toBeLessThan(8 * n * EPS * largest(a) * largest(x));
  });

  it("names the row that is not positive, whatever the units", () => {
    for (const unit of [1e-30, 1, 1e30]) {
      const outcome = factorCholesky(Float64Array.of(unit, 0, 0, 0, unit, unit, 0, unit, unit), 3);
      expect(outcome).toMatchObject({ ok: false, upTo: { reached: 2 } });
    }
    expect(factorCholesky(Float64Array.of(-1), 1)).toMatchObject({ ok: false, upTo: { reached: 0 } });
    expect(factorCholesky(Float64Array.of(Number.NaN), 1).ok).toBe(false);
  });

  it("accepts a diagonal spread over twenty-four decades", () => {
    const factor = unwrap(factorCholesky(Float64Array.of(1e-12, 0, 0, 1e12), 2));
    expect([...factor.lower]).toEqual([1e-6, 0, 0, 1e6]);
  });
});
