/**
 * Real Schur form of a large upper Hessenberg matrix: many small bulges chased together, with early deflation.
 *
 * Method: Braman, Byers & Mathias, The multishift QR algorithm I and II, SIAM J. Matrix Anal. Appl. 23, 2002.
 * Reflections act inside a window that travels with the bulges; what they do outside is gathered in one
 * orthogonal matrix and done by products, where the kernel is quick. Tuning follows LAPACK's dlaqr0.
 */
import { deflateEarly, valuesOf } from "./early-deflation.ts";
import type { Kernel } from "./kernel.ts";
import { identity, transpose } from "./products.ts";
import { reflect2, reflect3, type SchurValues, smallSubdiagonal } from "./real-schur.ts";

/** Whole matrices up to this order go to the double shift of the kernel, which is quicker there; found by trial. */
const DOUBLE_SHIFT: Readonly<Record<Kernel["name"], number>> = { plain: 120, simd: 1000 };
/** Active blocks of a larger matrix up to this order do as well. */
const SMALL = 64;
/** A sweep is skipped when early deflation took at least this share of its window; LAPACK's 14 %. */
const SKIP_SHARE = 0.14;
/** Exceptional shifts after so many rounds without deflation. */
const EXCEPTIONAL = 6;
const ROUNDS_PER_ROW = 30;

type Problem = {
  h: Float64Array;
  n: number;
  /** Zᵀ, n×n, or undefined when only values are wanted; H is then kept right in the active block only. */
  zt: Float64Array | undefined;
  kernel: Kernel;
  scratch: Float64Array;
};

/**
 * As `doubleShiftQr` over the whole matrix: fills `values`, returns how many were found. Matrices up to the order
 * `doubleShift` are left to that.
 */
export function multishiftQr(
  h: Float64Array,
  n: number,
  values: SchurValues,
  kernel: Kernel,
  zt?: Float64Array,
  doubleShift = DOUBLE_SHIFT[kernel.name],
): number {
  if (n <= doubleShift) return kernel.schur(h, n, zt !== undefined, values, zt);
  const problem: Problem = { h, n, zt, kernel, scratch: new Float64Array(n * n) };
  for (let r = 2; r < n; r++) h.fill(0, r * n, r * n + r - 1);
  let bottom = n - 1;
  let stalled = 0;
  for (let round = 0; round < ROUNDS_PER_ROW * n && bottom >= 0; round++) {
    const top = smallSubdiagonal(h, n, 0, n - 1, bottom);
    if (top > 0) h[top * n + top - 1] = 0;
    const size = bottom - top + 1;
    if (size <= SMALL) {
      if (!finishBlock(problem, top, bottom)) break;
      bottom = top - 1;
      stalled = 0;
      continue;
    }
    const { shifts: count, window } = tuning(size);
    // A window that stalls is widened, so that no unlucky size repeats for ever.
    const width = Math.min(size, stalled < EXCEPTIONAL - 1 ? window : 2 * window);
    const start = bottom - width + 1;
    const spike = start === top ? 0 : h[start * n + start - 1];
    const early = deflateEarly(h, n, bottom, width, spike, kernel);
    if (early.transform) applyOutside(problem, early.transform, start, width, top, bottom);
    bottom -= early.deflated;
    stalled = early.deflated > 0 ? 0 : stalled + 1;
    if (early.deflated > SKIP_SHARE * width || bottom - top < SMALL) continue;
    const exceptional = stalled > 0 && stalled % EXCEPTIONAL === 0;
    const pairs = exceptional
      ? exceptionalShifts(h, n, top, bottom, count)
      : shiftPairs(problem, early.shifts, bottom, Math.min(count, (bottom - top) & ~1));
    sweep(problem, top, bottom, pairs);
  }
  const all = valuesOf(h, n, bottom + 1, n);
  values.re.set(all.re, bottom + 1);
  values.im.set(all.im, bottom + 1);
  return n - 1 - bottom;
}

/** Shifts and deflation window for an active block of this order: LAPACK's iparmq, the shifts capped at 32. */
function tuning(size: number): { shifts: number; window: number } {
  const wanted = size < 150 ? 10 : Math.max(10, Math.round(size / Math.log2(size)));
  const shifts = Math.min(32, wanted) & ~1;
  return { shifts, window: Math.min(96, Math.max(shifts + (shifts >> 1), wanted)) };
}

/** Schur form of a small active block, worked on in a copy and applied outside by products. */
function finishBlock(problem: Problem, top: number, bottom: number): boolean {
  const { h, n } = problem;
  const size = bottom - top + 1;
  const block = new Float64Array(size * size);
  for (let r = 0; r < size; r++)
    block.set(h.subarray((top + r) * n + top, (top + r) * n + bottom + 1), r * size);
  const vt = identity(size);
  const values: SchurValues = { re: new Float64Array(size), im: new Float64Array(size) };
  const found = problem.kernel.schur(block, size, true, values, vt);
  if (found < size) return false;
  for (let r = 0; r < size; r++) h.set(block.subarray(r * size, (r + 1) * size), (top + r) * n + top);
  applyOutside(problem, vt, top, size, top, bottom);
  return true;
}

/** Rows right of the window ← Vᵀ rows, columns above it ← columns V, and Zᵀ along. */
function applyOutside(
  problem: Problem,
  vt: Float64Array,
  start: number,
  width: number,
  top: number,
  bottom: number,
): void {
  const { h, n, zt, kernel, scratch } = problem;
  const left = { data: vt, at: 0, stride: width };
  const end = zt ? n : bottom + 1;
  const right = end - start - width;
  const first = zt ? 0 : top;
  const above = start - first;
  if (right > 0) {
    const target = { data: h, at: start * n + start + width, stride: n };
    const room = { data: scratch, at: 0, stride: right };
    kernel.product(left, target, room, width, width, right);
    copyBack(scratch, h, target.at, n, width, right);
  }
  if (above > 0) {
    const target = { data: h, at: first * n + start, stride: n };
    const room = { data: scratch, at: 0, stride: width };
    kernel.product(target, { ...left, data: transpose(vt, width, width) }, room, above, width, width);
    copyBack(scratch, h, target.at, n, above, width);
  }
  if (zt) {
    const target = { data: zt, at: start * n, stride: n };
    kernel.product(left, target, { data: scratch, at: 0, stride: n }, width, width, n);
    copyBack(scratch, zt, target.at, n, width, n);
  }
}

function copyBack(
  from: Float64Array,
  to: Float64Array,
  at: number,
  stride: number,
  rows: number,
  columns: number,
): void {
  for (let r = 0; r < rows; r++) to.set(from.subarray(r * columns, (r + 1) * columns), at + r * stride);
}

/** Pairs of shifts: sum and product of each, the smallest values first to enter. */
type ShiftPairs = { re1: number[]; im1: number[]; re2: number[]; im2: number[] };

function shiftPairs(problem: Problem, found: SchurValues, bottom: number, count: number): ShiftPairs {
  const { h, n } = problem;
  let { re, im } = found;
  if (re.length <= count / 2) {
    // Too few left over: the values of the trailing block instead.
    const block = new Float64Array(count * count);
    const start = bottom - count + 1;
    for (let r = 0; r < count; r++) {
      for (let c = Math.max(0, r - 1); c < count; c++) block[r * count + c] = h[(start + r) * n + start + c];
    }
    const values: SchurValues = { re: new Float64Array(count), im: new Float64Array(count) };
    const got = problem.kernel.schur(block, count, false, values);
    re = values.re.slice(count - got);
    im = values.im.slice(count - got);
  }
  const complex: [number, number, number, number][] = [];
  const real: number[] = [];
  for (let j = re.length - 1; j >= 0; j--) {
    if (im[j] === 0) real.push(re[j]);
    else if (im[j] < 0) complex.push([re[j], im[j], re[j], -im[j]]);
  }
  for (let j = 0; j + 1 < real.length; j += 2) complex.push([real[j], 0, real[j + 1], 0]);
  if (real.length % 2 === 1) complex.push([real[real.length - 1], 0, real[real.length - 1], 0]);
  const taken = complex.slice(0, count / 2);
  return split(taken.sort((a, b) => size(b) - size(a)));
}

function size(pair: readonly number[]): number {
  return Math.abs(pair[0]) + Math.abs(pair[1]) + Math.abs(pair[2]) + Math.abs(pair[3]);
}

function split(pairs: readonly (readonly [number, number, number, number])[]): ShiftPairs {
  return {
    re1: pairs.map((p) => p[0]),
    im1: pairs.map((p) => p[1]),
    re2: pairs.map((p) => p[2]),
    im2: pairs.map((p) => p[3]),
  };
}

/** Wilkinson's exceptional shifts along the bottom, as in dlaqr0. */
function exceptionalShifts(
  h: Float64Array,
  n: number,
  top: number,
  bottom: number,
  count: number,
): ShiftPairs {
  const pairs: [number, number, number, number][] = [];
  for (let i = bottom; i >= Math.max(top + 2, bottom - count + 1); i -= 2) {
    const s = Math.abs(h[i * n + i - 1]) + Math.abs(h[(i - 1) * n + i - 2]);
    const centre = 0.75 * s + h[i * n + i];
    // Eigenvalues of [centre −0.4375s; s centre].
    const root = Math.sqrt(0.4375) * s;
    pairs.push([centre, root, centre, -root]);
  }
  return split(pairs);
}

/** Chases all bulges from the top to the bottom of the active block. */
function sweep(problem: Problem, top: number, bottom: number, pairs: ShiftPairs): void {
  const { h, n } = problem;
  const bulges = pairs.re1.length;
  // Row above each bulge, the first one leading; it still waits outside.
  const at = new Int32Array(bulges).fill(top - 1);
  const length = 3 * bulges;
  let start = top;
  while (at[bulges - 1] < bottom - 1) {
    const end = Math.min(bottom, start + 2 * length + 3);
    const width = end - start + 1;
    const ut = identity(width);
    for (let m = 0; m < bulges; m++) {
      const limit = m === 0 ? bottom : at[m - 1] === bottom - 1 ? bottom : at[m - 1] - 4;
      while (at[m] <= limit && at[m] < bottom - 1 && (at[m] + 4 <= end || end === bottom)) {
        advance(h, n, at[m], top, bottom, start, end, pairs, m, ut, width);
        at[m]++;
      }
    }
    applyOutside(problem, ut, start, width, top, bottom);
    start = Math.max(top, at[bulges - 1]);
  }
}

/** One step of bulge m from column k to k + 1, inside the window start … end. */
function advance(
  h: Float64Array,
  n: number,
  k: number,
  top: number,
  bottom: number,
  start: number,
  end: number,
  pairs: ShiftPairs,
  m: number,
  ut: Float64Array,
  width: number,
): void {
  const three = k + 3 <= bottom;
  if (k < top) firstColumn(h, n, top, pairs, m, three);
  else {
    entry[0] = h[(k + 1) * n + k];
    entry[1] = h[(k + 2) * n + k];
    entry[2] = three ? h[(k + 3) * n + k] : 0;
  }
  let v2 = entry[1];
  let v3 = entry[2];
  const tail = v2 * v2 + v3 * v3;
  if (tail === 0) {
    if (k >= top) {
      h[(k + 2) * n + k] = 0;
      if (three) h[(k + 3) * n + k] = 0;
    }
    return;
  }
  const length = Math.sqrt(entry[0] * entry[0] + tail);
  const beta = entry[0] >= 0 ? -length : length;
  const t1 = (beta - entry[0]) / beta;
  const scale = 1 / (entry[0] - beta);
  v2 *= scale;
  v3 *= scale;
  if (k >= top) {
    h[(k + 1) * n + k] = beta;
    h[(k + 2) * n + k] = 0;
    if (three) h[(k + 3) * n + k] = 0;
  }
  const row = (k + 1) * n;
  const rows = end - k;
  const columns = (three ? Math.min(k + 4, bottom) : bottom) - start + 1;
  const u = (k + 1 - start) * width;
  const reflect = (a: Float64Array, at: number, step: number, apart: number, count: number) => {
    if (three) reflect3(a, at, step, apart, count, v2, v3, t1);
    else reflect2(a, at, step, apart, count, v2, t1);
  };
  reflect(h, row + k + 1, 1, n, rows);
  reflect(h, start * n + k + 1, n, 1, columns);
  reflect(ut, u, 1, width, width);
}

/** Room for the three entries a reflection is made from. */
const entry = new Float64Array(3);

/** First column of (H − s₁)(H − s₂), scaled (LAPACK's dlaqr1). */
function firstColumn(
  h: Float64Array,
  n: number,
  top: number,
  pairs: ShiftPairs,
  m: number,
  three: boolean,
): void {
  const [sr1, si1, sr2, si2] = [pairs.re1[m], pairs.im1[m], pairs.re2[m], pairs.im2[m]];
  const p = top * n + top;
  const h21 = h[p + n];
  const h31 = three ? h[p + 2 * n] : 0;
  const s = Math.abs(h[p] - sr2) + Math.abs(si2) + Math.abs(h21) + Math.abs(h31);
  if (s === 0) {
    entry.fill(0);
    return;
  }
  const a = h21 / s;
  const b = h31 / s;
  entry[0] = (h[p] - sr1) * ((h[p] - sr2) / s) - si1 * (si2 / s) + h[p + 1] * a + (three ? h[p + 2] * b : 0);
  entry[1] = a * (h[p] + h[p + n + 1] - sr1 - sr2) + (three ? h[p + n + 2] * b : 0);
  entry[2] = three ? b * (h[p] + h[p + 2 * n + 2] - sr1 - sr2) + a * h[p + 2 * n + 1] : 0;
}
