/**
 * Aggressive early deflation: values that have converged at the bottom of a Hessenberg matrix without a single
 * small subdiagonal showing it.
 *
 * Method: Braman, Byers & Mathias, The multishift QR algorithm II, SIAM J. Matrix Anal. Appl. 23, 2002; as in
 * LAPACK's dlaqr2.
 */
import type { Kernel } from "./kernel.ts";
import { identity } from "./products.ts";
import type { SchurValues } from "./real-schur.ts";
import { moveUp } from "./schur-swap.ts";

export type Deflation = {
  /** Values split off at the bottom. */
  deflated: number;
  /** Those of the rest of the window, best shifts last. */
  shifts: SchurValues;
  /** Vᵀ of the window (size×size) to be applied outside it; undefined when the window was left alone. */
  transform?: Float64Array;
};

/**
 * Looks at the last `size` rows of the active block that ends at row `bottom` of H (n×n); `spike` is the
 * subdiagonal entry left of the window, 0 where the window is the whole block. Rewrites the window and, where it
 * deflates, the entry to its left.
 */
export function deflateEarly(
  h: Float64Array,
  n: number,
  bottom: number,
  size: number,
  spike: number,
  kernel: Kernel,
): Deflation {
  const top = bottom - size + 1;
  const t = new Float64Array(size * size);
  for (let r = 0; r < size; r++) {
    for (let c = Math.max(0, r - 1); c < size; c++) t[r * size + c] = h[(top + r) * n + top + c];
  }
  const vt = identity(size);
  const values: SchurValues = { re: new Float64Array(size), im: new Float64Array(size) };
  const found = kernel.schur(t, size, true, values, vt);
  if (found < size) return { deflated: 0, shifts: tail(values, size - found, size) };
  const kept = keptRows(t, size, vt, spike);
  const shifts = valuesOf(t, size, 0, kept);
  if (kept === size) return { deflated: 0, shifts };
  if (kept > 1 && spike !== 0) rebuild(t, size, kept, vt, kernel);
  if (spike !== 0) h[top * n + top - 1] = kept === 0 ? 0 : spike * vt[0];
  for (let r = 0; r < size; r++) {
    for (let c = Math.max(0, r - 1); c < size; c++) h[(top + r) * n + top + c] = t[r * size + c];
  }
  return { deflated: size - kept, shifts, transform: vt };
}

function tail(values: SchurValues, from: number, to: number): SchurValues {
  return { re: values.re.slice(from, to), im: values.im.slice(from, to) };
}

/** Sorts blocks with a large spike entry upwards and counts the rows they take. */
function keptRows(t: Float64Array, size: number, vt: Float64Array, spike: number): number {
  const floor = 2 ** -1022 * (size / Number.EPSILON);
  let kept = size;
  let upper = 0;
  while (upper < kept) {
    const pair = kept > 1 && t[(kept - 1) * size + kept - 2] !== 0;
    const last = (kept - 1) * size + kept - 1;
    let scale = Math.abs(t[last]);
    // Entry j of the spike is spike · V(0, j), and V(0, j) stands in the first column of Vᵀ.
    let entry = Math.abs(spike * vt[(kept - 1) * size]);
    if (pair) {
      scale += Math.sqrt(Math.abs(t[last - 1])) * Math.sqrt(Math.abs(t[last - size]));
      entry = Math.max(entry, Math.abs(spike * vt[(kept - 2) * size]));
    }
    if (scale === 0) scale = Math.abs(spike);
    if (entry <= Math.max(floor, Number.EPSILON * scale)) {
      kept -= pair ? 2 : 1;
      continue;
    }
    const from = pair ? kept - 2 : kept - 1;
    const landed = moveUp(t, size, from, upper, vt);
    // A refused swap ends the search: what stands above has not been looked at, and is kept.
    if (landed !== upper) break;
    // The moved block may have fallen into two real ones.
    upper += upper + 1 < size && t[(upper + 1) * size + upper] !== 0 ? 2 : 1;
  }
  return kept;
}

/** Values of the diagonal blocks in rows from … to − 1. */
export function valuesOf(t: Float64Array, n: number, from: number, to: number): SchurValues {
  const re = new Float64Array(to - from);
  const im = new Float64Array(to - from);
  for (let i = from; i < to; i++) {
    re[i - from] = t[i * n + i];
    if (i + 1 >= to || t[(i + 1) * n + i] === 0) continue;
    const root = Math.sqrt(Math.abs(t[i * n + i + 1])) * Math.sqrt(Math.abs(t[(i + 1) * n + i]));
    im[i - from] = root;
    re[i - from + 1] = t[(i + 1) * n + i + 1];
    im[i - from + 1] = -root;
    i++;
  }
  return { re, im };
}

/** Returns the kept part to Hessenberg form with the spike gathered in its first entry. */
function rebuild(t: Float64Array, size: number, kept: number, vt: Float64Array, kernel: Kernel): void {
  // Reflection that maps the first `kept` entries of V's first row to a multiple of e₁.
  const v = new Float64Array(kept);
  let square = 0;
  for (let r = 0; r < kept; r++) {
    v[r] = vt[r * size];
    square += v[r] * v[r];
  }
  const first = v[0];
  const beta = first >= 0 ? -Math.sqrt(square) : Math.sqrt(square);
  v[0] -= beta;
  const scale = 1 / (beta * (beta - first));
  reflectRows(t, size, kept, v, scale);
  for (let r = 0; r < kept; r++) {
    let dot = 0;
    for (let c = 0; c < kept; c++) dot += t[r * size + c] * v[c];
    dot *= scale;
    for (let c = 0; c < kept; c++) t[r * size + c] -= dot * v[c];
  }
  reflectRows(vt, size, kept, v, scale);
  // Exact zeros below the first entry of the spike, by construction.
  for (let r = 1; r < kept; r++) vt[r * size] = 0;
  vt[0] = beta;
  const block = new Float64Array(kept * kept);
  for (let r = 0; r < kept; r++) block.set(t.subarray(r * size, r * size + kept), r * kept);
  const { h, transposedQ } = kernel.hessenberg(block, kept, true);
  for (let r = 0; r < kept; r++) t.set(h.subarray(r * kept, (r + 1) * kept), r * size);
  rotateRowsBy(transposedQ, kept, t, size, kept, kernel);
  rotateRowsBy(transposedQ, kept, vt, size, 0, kernel);
}

function reflectRows(a: Float64Array, size: number, kept: number, v: Float64Array, scale: number): void {
  for (let c = 0; c < size; c++) {
    let dot = 0;
    for (let r = 0; r < kept; r++) dot += v[r] * a[r * size + c];
    dot *= scale;
    for (let r = 0; r < kept; r++) a[r * size + c] -= dot * v[r];
  }
}

/** Rows 0 … kept − 1 of `a`, columns from `from` on, ← Qᵀ times them. */
function rotateRowsBy(
  qt: Float64Array,
  kept: number,
  a: Float64Array,
  size: number,
  from: number,
  kernel: Kernel,
): void {
  const width = size - from;
  if (width === 0) return;
  const out = new Float64Array(kept * width);
  const rows = { data: a, at: from, stride: size };
  kernel.product(
    { data: qt, at: 0, stride: kept },
    rows,
    { data: out, at: 0, stride: width },
    kept,
    kept,
    width,
  );
  for (let r = 0; r < kept; r++) a.set(out.subarray(r * width, (r + 1) * width), r * size + from);
}
