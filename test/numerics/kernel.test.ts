import { execFileSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { kernelFor, plainKernel } from "../../shared-core/numerics/kernel.ts";
import { simdKernel } from "../../shared-core/numerics/kernel-simd.ts";
import { symmetricEigen } from "../../shared-core/numerics/symmetric-eigen.ts";
import {
  difference,
  EPS,
  eigenResidual,
  identityOf,
  largest,
  orthogonalityError,
  product,
  randomMatrix,
  randomSymmetric,
  transposed,
  unwrap,
} from "./helpers.ts";

const simd = simdKernel();
if (!simd) throw new Error("this host lacks WebAssembly SIMD");

const root = new URL("../../", import.meta.url);

describe.each([plainKernel, simd])("kernel $name", (kernel) => {
  it.each([
    [1, 1, 1],
    [4, 4, 4],
    [3, 7, 5],
    [5, 300, 6],
    [67, 2, 67],
    [65, 130, 131],
    [2, 0, 3],
    [0, 3, 4],
  ])("multiplies windows of %i×%i×%i and touches nothing else", (rows, inner, columns) => {
    const window = (r: number, c: number, seed: number) => ({
      data: randomMatrix(r + 2, c + 3, seed),
      at: c + 4,
      stride: c + 3,
    });
    const [a, b, c] = [window(rows, inner, 1), window(inner, columns, 2), window(rows, columns, 3)];
    const cut = (w: { data: Float64Array; at: number; stride: number }, r: number, n: number) =>
      Float64Array.from({ length: r * n }, (_, p) => w.data[w.at + Math.floor(p / n) * w.stride + (p % n)]);
    const expected = product(cut(a, rows, inner), cut(b, inner, columns), rows, inner, columns);
    const before = Float64Array.from(c.data);
    kernel.product(a, b, c, rows, inner, columns);
    expect(difference(cut(c, rows, columns), expected)).toBeLessThanOrEqual(inner * EPS);
    for (let p = 0; p < before.length; p++) {
      const [i, j] = [Math.floor((p - c.at) / c.stride), (p - c.at) % c.stride];
      if (!(0 <= i && i < rows && 0 <= j && j < columns)) expect(c.data[p]).toBe(before[p]);
    }
  });

  it.each([1, 2, 3, 8, 51, 100])("reduces a matrix of %i to Q T Qᵀ", (n) => {
    const a = randomSymmetric(n, n);
    const t = kernel.tridiagonalise(Float64Array.from(a), n);
    // Rows of the identity through the back-transformation give Qᵀ itself.
    const q = identityOf(n);
    kernel.backTransform(q, n, t);
    expect(orthogonalityError(q, n)).toBeLessThan(4 * n * EPS);
    const band = new Float64Array(n * n);
    for (let i = 0; i < n; i++) {
      band[i * n + i] = t.diagonal[i];
      if (i > 0) band[i * n + i - 1] = band[(i - 1) * n + i] = t.offDiagonal[i - 1];
    }
    const back = product(product(transposed(q, n, n), band, n, n, n), q, n, n, n);
    expect(difference(back, a)).toBeLessThan(4 * n * EPS);
  });

  it.each([1, 2, 3, 4, 9, 50, 51, 100, 131])("reduces a general matrix of %i to Hessenberg form", (n) => {
    const a = randomMatrix(n, n, n);
    const { h, transposedQ } = kernel.hessenberg(Float64Array.from(a), n, true);
    for (let i = 2; i < n; i++) for (let j = 0; j < i - 1; j++) expect(h[i * n + j]).toBe(0);
    expect(orthogonalityError(transposedQ, n)).toBeLessThan(4 * n * EPS);
    const back = product(product(transposed(transposedQ, n, n), h, n, n, n), transposedQ, n, n, n);
    expect(difference(back, a)).toBeLessThan(8 * n * EPS);
    const alone = kernel.hessenberg(Float64Array.from(a), n, false);
    expect(difference(alone.h, h)).toBe(0);
    expect(alone.transposedQ.length).toBe(0);
  });

  it.each([1, 2, 5, 23, 24, 25, 60, 101])("factors real and complex matrices of %i", (n) => {
    const [re, im] = [randomMatrix(n, n, n), randomMatrix(n, n, n + 1)];
    for (const imaginary of [undefined, im]) {
      const [lr, li] = [Float64Array.from(re), imaginary && Float64Array.from(imaginary)];
      const order = Int32Array.from({ length: n }, (_, i) => i);
      expect(kernel.factor(lr, li, n, order, n * EPS)).toBe(-1);
      expect(new Set(order).size).toBe(n);
      expect(factorError(lr, li, order, re, imaginary, n)).toBeLessThan(4 * n * EPS);
    }
  });

  it("names the column without a pivot", () => {
    const order = Int32Array.of(0, 1, 2);
    expect(kernel.factor(Float64Array.of(1, 2, 3, 2, 4, 5, 3, 6, 7), undefined, 3, order, 1e-15)).toBe(1);
    expect(kernel.factor(new Float64Array(4), new Float64Array(4), 2, Int32Array.of(0, 1), 1e-15)).toBe(0);
  });

  it("leaves a triangular matrix as it is", () => {
    const n = 12;
    const a = Float64Array.from({ length: n * n }, (_, p) => (p % n >= Math.floor(p / n) ? 1 + p : 0));
    const { h, transposedQ } = kernel.hessenberg(Float64Array.from(a), n, true);
    expect(difference(h, a)).toBe(0);
    expect(difference(transposedQ, identityOf(n))).toBe(0);
  });

  it("takes a zero matrix and one already tridiagonal", () => {
    const n = 20;
    for (const off of [0, 1]) {
      const a = new Float64Array(n * n);
      for (let i = 1; i < n; i++) a[i * n + i - 1] = a[(i - 1) * n + i] = off;
      const t = kernel.tridiagonalise(Float64Array.from(a), n);
      expect(largest(t.tau)).toBe(0);
      expect([...t.offDiagonal]).toEqual(Array(n - 1).fill(off));
    }
  });

  it.each([70, 131])("carries the symmetric eigenproblem of %i", (n) => {
    const a = randomSymmetric(n, n + 1);
    const { values, vectors } = unwrap(symmetricEigen(a, n, { kernel }));
    expect(eigenResidual(a, vectors, values, n)).toBeLessThan(4 * n * EPS * largest(values));
    expect(orthogonalityError(vectors, n)).toBeLessThan(4 * n * EPS);
  });

  it("repeats itself bit for bit, whatever ran before", () => {
    const a = randomMatrix(90, 90, 1);
    const whole = (data: Float64Array) => ({ data, at: 0, stride: 90 });
    const [first, second] = [new Float64Array(8100), new Float64Array(8100)];
    kernel.product(whole(a), whole(a), whole(first), 90, 90, 90);
    kernel.tridiagonalise(randomSymmetric(150, 2), 150);
    kernel.product(whole(a), whole(a), whole(second), 90, 90, 90);
    expect(difference(first, second)).toBe(0);
  });
});

/** max |P A − L U| */
function factorError(
  lr: Float64Array,
  li: Float64Array | undefined,
  order: Int32Array,
  re: Float64Array,
  im: Float64Array | undefined,
  n: number,
): number {
  let worst = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      let [sr, si] = [re[order[i] * n + j], im ? im[order[i] * n + j] : 0];
      for (let k = 0; k <= Math.min(i, j); k++) {
        let [ar, ai] = k === i ? [1, 0] : [lr[i * n + k], li ? li[i * n + k] : 0];
        const [br, bi] = [lr[k * n + j], li ? li[k * n + j] : 0];
        if (k === j && li) {
          // The diagonal holds 1/u: divide instead.
          const square = br * br + bi * bi;
          [ar, ai] = [(ar * br + ai * bi) / square, (ai * br - ar * bi) / square];
          [sr, si] = [sr - ar, si - ai];
        } else [sr, si] = [sr - (ar * br - ai * bi), si - (ar * bi + ai * br)];
      }
      worst = Math.max(worst, Math.abs(sr) + Math.abs(si));
    }
  }
  return worst;
}

describe("kernel choice", () => {
  it("is plain for small problems and the best there is for large ones", () => {
    expect(kernelFor(10)).toBe(plainKernel);
    expect(kernelFor(500).name).toBe("simd");
    expect(kernelFor(500)).toBe(kernelFor(300));
  });

  it("embeds exactly what the source builds", () => {
    const built = execFileSync(process.execPath, ["tools/build-kernel.mjs", "--print"], {
      cwd: root,
      encoding: "utf8",
    });
    expect(readFileSync(new URL("shared-core/numerics/kernel-module.ts", root), "utf8")).toBe(built);
  }, 60_000);
});
