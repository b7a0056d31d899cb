/**
 * Plain products, transposes and norms of dense real matrices, row-major in a Float64Array.
 *
 * Sums run in a fixed order, so the same input gives the same bits on every host.
 */

import { bestKernel, plainKernel } from "./kernel.ts";

/** Multiply-adds from which copying into the quick kernel pays; found by trial. */
const KERNEL_WORK = 32 ** 3;

/** True when no entry is NaN or infinite. */
export function allFinite(values: ArrayLike<number>): boolean {
  for (let i = 0; i < values.length; i++) if (!Number.isFinite(values[i])) return false;
  return true;
}

/** The n×n identity. */
export function identity(n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) out[i * n + i] = 1;
  return out;
}

/** Aᵀ (columns×rows) of A (rows×columns). */
export function transpose(a: Float64Array, rows: number, columns: number): Float64Array {
  const out = new Float64Array(rows * columns);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++) out[j * rows + i] = a[i * columns + j];
  }
  return out;
}

/**
 * C = A B with A rows×inner, B inner×columns; `out` (rows×columns) is overwritten and returned and may be
 * neither A nor B. Error: |C − Ĉ| ≤ inner·ε |A||B| entry by entry.
 */
export function multiply(
  a: Float64Array,
  b: Float64Array,
  rows: number,
  inner: number,
  columns: number,
  out: Float64Array = new Float64Array(rows * columns),
): Float64Array {
  const left = { data: a, at: 0, stride: inner };
  const right = { data: b, at: 0, stride: columns };
  const kernel = rows * inner * columns < KERNEL_WORK ? plainKernel : bestKernel();
  kernel.product(left, right, { data: out, at: 0, stride: columns }, rows, inner, columns);
  return out;
}

/** y = A x with A rows×columns; `out` (rows) may not be x. */
export function multiplyVector(
  a: Float64Array,
  x: Float64Array,
  rows: number,
  columns: number,
  out: Float64Array = new Float64Array(rows),
): Float64Array {
  for (let i = 0; i < rows; i++) {
    const at = i * columns;
    let sum = 0;
    for (let j = 0; j < columns; j++) sum += a[at + j] * x[j];
    out[i] = sum;
  }
  return out;
}

/** Largest column sum of magnitudes, ‖A‖₁. */
export function norm1(a: Float64Array, rows: number, columns: number): number {
  const sums = new Float64Array(columns);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++) sums[j] += Math.abs(a[i * columns + j]);
  }
  return sums.reduce((most, s) => Math.max(most, s), 0);
}

/** Largest magnitude of any entry. */
export function maxAbs(values: Float64Array): number {
  let most = 0;
  for (let i = 0; i < values.length; i++) {
    const size = Math.abs(values[i]);
    if (most < size) most = size;
  }
  return most;
}

/** Largest |aᵢⱼ − aⱼᵢ|, the distance from symmetry in the unit of A. */
export function asymmetry(a: Float64Array, n: number): number {
  let most = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) most = Math.max(most, Math.abs(a[i * n + j] - a[j * n + i]));
  }
  return most;
}
