/**
 * Eigenvalues and vectors of a symmetric tridiagonal matrix by divide and conquer.
 *
 * Method: Cuppen's tearing with deflation (Dongarra & Sorensen, SIAM J. Sci. Stat. Comput. 8, 1987) and vectors
 * from recomputed weights (Gu & Eisenstat, SIAM J. Matrix Anal. Appl. 16, 1995), so that they are orthogonal
 * to machine precision however close the roots lie. Vectors are rows here, so that all inner loops run along
 * memory. The products fall to the kernel; repeated roots deflate and cost nothing.
 */
import type { Kernel } from "./kernel.ts";
import { implicitQl, rotateRows, sortAscending } from "./tridiagonal-ql.ts";

/** Blocks of up to this many rows go to implicit QL; chosen by trial. */
const LEAF = 24;

/** Which half a row has its non-zeros in. */
const UPPER = 0;
const BOTH = 1;
const LOWER = 2;

type Work = {
  n: number;
  d: Float64Array;
  rows: Float64Array;
  kernel: Kernel;
  /** Three n×n areas, used from their beginning by every merge. */
  packed: Float64Array;
  mix: Float64Array;
  result: Float64Array;
};

/**
 * `d` (n) and `e` (n−1), entries of size about one, both destroyed; `d` ends as the ascending values. Returns
 * n×n rows, row j the unit vector of d[j], or undefined where an iteration met its cap.
 */
export function divideAndConquer(
  d: Float64Array,
  e: Float64Array,
  n: number,
  kernel: Kernel,
): Float64Array | undefined {
  const room = n > LEAF ? n * n : 0;
  const work: Work = {
    n,
    d,
    rows: new Float64Array(n * n),
    kernel,
    packed: new Float64Array(room),
    mix: new Float64Array(room),
    result: new Float64Array(room),
  };
  return solve(work, e, 0, n) ? work.rows : undefined;
}

function solve(work: Work, e: Float64Array, lo: number, hi: number): boolean {
  const { n, d, rows } = work;
  const size = hi - lo;
  if (size <= LEAF) {
    for (let i = lo; i < hi; i++) rows[i * n + i] = 1;
    const at = lo * n + lo;
    const block = d.subarray(lo, hi);
    if (!implicitQl(block, e.subarray(lo, Math.max(lo, hi - 1)), size, rows, at, n, size)) return false;
    sortAscending(block, size, rows, at, n, size);
    return true;
  }
  const middle = lo + (size >> 1);
  const coupling = e[middle - 1];
  const rho = Math.abs(coupling);
  d[middle - 1] -= rho;
  d[middle] -= rho;
  if (!solve(work, e, lo, middle) || !solve(work, e, middle, hi)) return false;
  return merge(work, lo, middle, hi, rho, coupling < 0 ? -1 : 1);
}

/** Joins two solved halves: diag(d) + ρ z zᵀ in the basis of their rows. */
function merge(work: Work, lo: number, middle: number, hi: number, rho: number, sign: number): boolean {
  const { n, d, rows } = work;
  const size = hi - lo;
  // z is scaled to unit length, ρ takes the factor two.
  const z = new Float64Array(size);
  for (let i = lo; i < middle; i++) z[i - lo] = rows[i * n + middle - 1] * Math.SQRT1_2;
  for (let i = middle; i < hi; i++) z[i - lo] = sign * rows[i * n + middle] * Math.SQRT1_2;
  const order = mergedOrder(d, lo, middle, hi);
  const kind = new Uint8Array(size);
  kind.fill(LOWER, middle - lo);
  const { kept, dropped } = deflate(work, lo, hi, 2 * rho, z, order, kind);
  const k = kept.length;
  const values = new Float64Array(k);
  if (k > 0 && !rotateKept(work, lo, middle, hi, 2 * rho, z, kept, kind, values)) return false;
  writeBack(work, lo, hi, kept.length, values, dropped);
  return true;
}

/** Local indices of both (ascending) halves in one ascending order. */
function mergedOrder(d: Float64Array, lo: number, middle: number, hi: number): Int32Array {
  const order = new Int32Array(hi - lo);
  let i = lo;
  let j = middle;
  for (let t = 0; t < order.length; t++) {
    order[t] = (j >= hi || (i < middle && d[i] <= d[j]) ? i++ : j++) - lo;
  }
  return order;
}

/**
 * Sets aside the rows that are already vectors of the whole: those with a negligible zᵢ, and one of every two
 * with nearly equal d after a rotation has emptied its zᵢ. The tolerance is LAPACK's 8 ε max(|d|, |z|).
 */
function deflate(
  work: Work,
  lo: number,
  hi: number,
  rho: number,
  z: Float64Array,
  order: Int32Array,
  kind: Uint8Array,
): { kept: Int32Array; dropped: Int32Array } {
  const { n, d, rows } = work;
  const size = hi - lo;
  let scale = 0;
  for (let i = 0; i < size; i++) scale = Math.max(scale, Math.abs(d[lo + i]), Math.abs(z[i]));
  const tolerance = 8 * Number.EPSILON * scale;
  const kept = new Int32Array(size);
  const dropped = new Int32Array(size);
  let keptCount = 0;
  let droppedCount = 0;
  let held = -1;
  for (const j of order) {
    if (rho * Math.abs(z[j]) <= tolerance) {
      dropped[droppedCount++] = j;
      continue;
    }
    if (held >= 0) {
      const length = Math.sqrt(z[held] * z[held] + z[j] * z[j]);
      const c = z[j] / length;
      const s = z[held] / length;
      const gap = d[lo + j] - d[lo + held];
      if (Math.abs(gap * c * s) <= tolerance) {
        z[j] = length;
        z[held] = 0;
        if (kind[j] !== kind[held]) kind[j] = BOTH;
        rotateRows(rows, (lo + held) * n + lo, (lo + j) * n + lo, size, c, s);
        const dHeld = d[lo + held];
        const dNew = d[lo + j];
        d[lo + held] = dHeld * c * c + dNew * s * s;
        d[lo + j] = dHeld * s * s + dNew * c * c;
        dropped[droppedCount++] = held;
      } else {
        kept[keptCount++] = held;
      }
    }
    held = j;
  }
  if (held >= 0) kept[keptCount++] = held;
  return { kept: kept.subarray(0, keptCount), dropped: dropped.subarray(0, droppedCount) };
}

/** Solves the secular equation for the kept rows and multiplies them by its vectors into `result`. */
function rotateKept(
  work: Work,
  lo: number,
  middle: number,
  hi: number,
  rho: number,
  z: Float64Array,
  kept: Int32Array,
  kind: Uint8Array,
  values: Float64Array,
): boolean {
  const { n, d, rows, packed, mix, result, kernel } = work;
  const k = kept.length;
  const size = hi - lo;
  const poles = new Float64Array(k);
  const weights = new Float64Array(k);
  for (let j = 0; j < k; j++) {
    poles[j] = d[lo + kept[j]];
    weights[j] = z[kept[j]];
  }
  // Columns grouped by kind, so that each half of the product sees only rows that reach into it.
  const counts = [0, 0, 0];
  for (let j = 0; j < k; j++) counts[kind[kept[j]]]++;
  const starts = [0, counts[UPPER], counts[UPPER] + counts[BOTH]];
  const column = new Int32Array(k);
  for (let j = 0; j < k; j++) column[j] = starts[kind[kept[j]]]++;
  for (let j = 0; j < k; j++) copyRow(rows, (lo + kept[j]) * n + lo, packed, column[j] * size, size);
  return kernel.merge({
    k,
    poles,
    weights,
    rho,
    column,
    packed,
    size,
    left: middle - lo,
    upper: counts[UPPER] + counts[BOTH],
    skip: counts[UPPER],
    result,
    values,
    mix,
  });
}

/** Rows and values of both sorts back into place, ascending. */
function writeBack(
  work: Work,
  lo: number,
  hi: number,
  k: number,
  values: Float64Array,
  dropped: Int32Array,
): void {
  const { n, d, rows, packed, result } = work;
  const size = hi - lo;
  // The deflated rows are parked while the new ones come in; their values with them.
  const parked = new Float64Array(dropped.length);
  dropped.sort((i, j) => d[lo + i] - d[lo + j] || i - j);
  for (let j = 0; j < dropped.length; j++) {
    copyRow(rows, (lo + dropped[j]) * n + lo, packed, j * size, size);
    parked[j] = d[lo + dropped[j]];
  }
  // Both lists ascend.
  let [i, j] = [0, 0];
  for (let t = 0; t < size; t++) {
    const fresh = j >= parked.length || (i < k && values[i] <= parked[j]);
    d[lo + t] = fresh ? values[i] : parked[j];
    const to = (lo + t) * n + lo;
    if (fresh) copyRow(result, i++ * size, rows, to, size);
    else copyRow(packed, j++ * size, rows, to, size);
  }
}

/** Rows shorter than this are copied number by number: a view of each would cost more. */
const SHORT_ROW = 64;

function copyRow(from: Float64Array, fromAt: number, to: Float64Array, toAt: number, size: number): void {
  if (size < SHORT_ROW) for (let i = 0; i < size; i++) to[toAt + i] = from[fromAt + i];
  else to.set(from.subarray(fromAt, fromAt + size), toAt);
}
