/**
 * The few dense inner loops worth a machine-near version, behind one interface.
 *
 * The plain version here runs everywhere; kernel-simd.ts offers the same functions on WebAssembly SIMD. Both
 * are deterministic; between them results agree to rounding only.
 */
import { backTransform } from "./back-transform.ts";
import { eliminate } from "./eliminate.ts";
import { type Hessenberg, hessenberg } from "./hessenberg.ts";
import { simdKernel } from "./kernel-simd.ts";
import { type MergeStep, plainMerge } from "./merge-step.ts";
import { doubleShiftQr, type SchurValues } from "./real-schur.ts";
import { type Tridiagonal, tridiagonalise } from "./tridiagonalise.ts";

/** A rows×columns window of a row-major array: first entry `at`, row distance `stride`. */
export type Window = { data: Float64Array; at: number; stride: number };

export type Kernel = {
  name: "plain" | "simd";
  /** C = A B with A rows×inner, B inner×columns; C may overlap neither. */
  product(a: Window, b: Window, c: Window, rows: number, inner: number, columns: number): void;
  /** See tridiagonalise.ts; the array given is destroyed. */
  tridiagonalise(a: Float64Array, n: number): Tridiagonal;
  /** rows (count×n) ← rows Qᵀ for the Q of a tridiagonalisation, see back-transform.ts. */
  backTransform(rows: Float64Array, count: number, t: Tridiagonal): void;
  /** See hessenberg.ts; the array given becomes H. */
  hessenberg(a: Float64Array, n: number, withQ: boolean): Hessenberg;
  /** `doubleShiftQr` (real-schur.ts) over the whole matrix; `zt` is n×n. */
  schur(h: Float64Array, n: number, full: boolean, values: SchurValues, zt?: Float64Array): number;
  /** See merge-step.ts. */
  merge(step: MergeStep): boolean;
  /** See eliminate.ts. */
  factor(
    re: Float64Array,
    im: Float64Array | undefined,
    n: number,
    permutation: Int32Array,
    floor: number,
  ): number;
};

/** Rows of B and columns of C held in the second-level cache at a time; chosen by trial. */
const BLOCK_INNER = 64;
const BLOCK_COLUMNS = 256;

function plainProduct(a: Window, b: Window, c: Window, rows: number, inner: number, columns: number): void {
  for (let i = 0; i < rows; i++) c.data.fill(0, c.at + i * c.stride, c.at + i * c.stride + columns);
  for (let j = 0; j < columns; j += BLOCK_COLUMNS) {
    const width = Math.min(BLOCK_COLUMNS, columns - j);
    for (let k = 0; k < inner; k += BLOCK_INNER) {
      const depth = Math.min(BLOCK_INNER, inner - k);
      addBlock(a, b, c, rows, k, depth, j, width);
    }
  }
}

function addBlock(
  a: Window,
  b: Window,
  c: Window,
  rows: number,
  k0: number,
  depth: number,
  j0: number,
  width: number,
): void {
  const ad = a.data;
  const bd = b.data;
  const cd = c.data;
  const quads = depth - (depth % 4);
  for (let i = 0; i < rows; i++) {
    const ai = a.at + i * a.stride + k0;
    const ci = c.at + i * c.stride + j0;
    for (let k = 0; k < quads; k += 4) {
      const f0 = ad[ai + k];
      const f1 = ad[ai + k + 1];
      const f2 = ad[ai + k + 2];
      const f3 = ad[ai + k + 3];
      const b0 = b.at + (k0 + k) * b.stride + j0;
      const b1 = b0 + b.stride;
      const b2 = b1 + b.stride;
      const b3 = b2 + b.stride;
      for (let j = 0; j < width; j++) {
        cd[ci + j] += f0 * bd[b0 + j] + f1 * bd[b1 + j] + f2 * bd[b2 + j] + f3 * bd[b3 + j];
      }
    }
    for (let k = quads; k < depth; k++) {
      const f = ad[ai + k];
      const from = b.at + (k0 + k) * b.stride + j0;
      for (let j = 0; j < width; j++) cd[ci + j] += f * bd[from + j];
    }
  }
}

/** Plain TypeScript, for every host. */
export const plainKernel: Kernel = {
  name: "plain",
  product: plainProduct,
  tridiagonalise,
  backTransform: (rows, count, t) => backTransform(rows, count, t, plainProduct),
  hessenberg,
  schur: (h, n, full, values, zt) => doubleShiftQr(h, n, 0, n - 1, full, values, zt),
  merge: (step) => plainMerge(step, plainProduct),
  factor: eliminate,
};

let best: Kernel | undefined;

/** The quickest kernel of this host; the first call compiles it, in about a millisecond. */
export function bestKernel(): Kernel {
  best ??= simdKernel() ?? plainKernel;
  return best;
}

/** Size from which the kernel's set-up and copying pay; found by trial. */
const KERNEL_SIZE = 32;

/** The kernel for a problem of order n. */
export function kernelFor(n: number): Kernel {
  return n < KERNEL_SIZE ? plainKernel : bestKernel();
}
