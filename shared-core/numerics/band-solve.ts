/**
 * Solves with complex symmetric banded matrices (dynamic stiffness frequency by frequency), and real ones.
 *
 * Method: L D Lᵀ without pivoting, row by row (Golub & Van Loan, Matrix Computations, 4th ed., §4.3.6), watched
 * for growth; where a pivot comes out small the matrix is factored anew by band LU with partial pivoting
 * (band-lu.ts). Backward error: n·ε times the growth limit at worst, n·ε usually. Work per frequency is
 * n·(b² + 4b) complex multiply-adds; nothing is allocated after the workspace.
 */
import { type BandLu, bandLuWorkspace, factorBandLu, solveBandLu } from "./band-lu.ts";
import { fail, type Outcome, succeed } from "./outcome.ts";
import type { SymmetricBand } from "./sparse.ts";

/** Ratio of what elimination subtracts from a diagonal entry to that entry, above which LU takes over. */
export const GROWTH_LIMIT = 1e4;

export type BandWorkspace = {
  n: number;
  bandwidth: number;
  /**
   * The matrix, put here by the caller before each factorisation: lower band, entry (i, j) with
   * i − bandwidth ≤ j ≤ i at i·(bandwidth + 1) + j − i + bandwidth. Kept.
   */
  re: Float64Array;
  im: Float64Array;
  /** L below the diagonal and 1/dᵢ on it, same places. */
  factorRe: Float64Array;
  factorIm: Float64Array;
  /** Row of L·D under construction. */
  rowRe: Float64Array;
  rowIm: Float64Array;
  /** Whether the last factorisation had to pivot. */
  pivoted: boolean;
  lu: BandLu | undefined;
};

/** Room for matrices of one size and bandwidth. */
export function bandWorkspace(n: number, bandwidth: number): BandWorkspace {
  const size = n * (bandwidth + 1);
  return {
    n,
    bandwidth,
    re: new Float64Array(size),
    im: new Float64Array(size),
    factorRe: new Float64Array(size),
    factorIm: new Float64Array(size),
    rowRe: new Float64Array(bandwidth + 1),
    rowIm: new Float64Array(bandwidth + 1),
    pivoted: false,
    lu: undefined,
  };
}

/** Outcome shared by all good factorisations, so that a frequency loop allocates nothing. */
const DONE: Outcome<true> = succeed(true);

/** Factors the matrix in the workspace. Fails where it is not finite or singular to working precision. */
export function factorBand(ws: BandWorkspace): Outcome<true> {
  ws.pivoted = false;
  if (ws.bandwidth === 1 ? factorTridiagonal(ws) : factorSymmetric(ws)) return DONE;
  for (let p = 0; p < ws.re.length; p++) {
    // Places outside the matrix, before the first column, are not looked at anywhere.
    const i = Math.floor(p / (ws.bandwidth + 1));
    if (i + (p % (ws.bandwidth + 1)) < ws.bandwidth) continue;
    if (!Number.isFinite(ws.re[p] + ws.im[p])) return fail("the matrix holds a value that is not finite");
  }
  ws.pivoted = true;
  ws.lu ??= bandLuWorkspace(ws.n, ws.bandwidth);
  const singularAt = factorBandLu(ws.lu, ws.re, ws.im);
  return singularAt < 0
    ? DONE
    : fail(`the matrix is singular to working precision at column ${singularAt + 1}`);
}

/** L D Lᵀ; false as soon as a pivot is too small, or not a number. */
function factorSymmetric(ws: BandWorkspace): boolean {
  const { n, bandwidth: b, re, im, factorRe: fr, factorIm: fi, rowRe: ur, rowIm: ui } = ws;
  const w = b + 1;
  for (let i = 0; i < n; i++) {
    const first = Math.max(0, i - b);
    const row = i * w + b - i;
    let dr = re[row + i];
    let di = im[row + i];
    const own = Math.abs(dr) + Math.abs(di);
    let taken = 0;
    for (let j = first; j < i; j++) {
      // u = (L D)ᵢⱼ = aᵢⱼ − Σₖ uᵢₖ lⱼₖ
      const other = j * w + b - j;
      let sr = re[row + j];
      let si = im[row + j];
      for (let k = Math.max(first, j - b); k < j; k++) {
        const lr = fr[other + k];
        const li = fi[other + k];
        sr -= ur[k - first] * lr - ui[k - first] * li;
        si -= ur[k - first] * li + ui[k - first] * lr;
      }
      ur[j - first] = sr;
      ui[j - first] = si;
      const lr = sr * fr[other + j] - si * fi[other + j];
      const li = sr * fi[other + j] + si * fr[other + j];
      fr[row + j] = lr;
      fi[row + j] = li;
      const pr = sr * lr - si * li;
      const pi = sr * li + si * lr;
      taken += Math.abs(pr) + Math.abs(pi);
      dr -= pr;
      di -= pi;
    }
    const left = Math.abs(dr) + Math.abs(di);
    // A NaN fails both comparisons' negations as well.
    if (!(taken <= GROWTH_LIMIT * own) || !(left * GROWTH_LIMIT > own + taken)) return false;
    const square = dr * dr + di * di;
    fr[row + i] = dr / square;
    fi[row + i] = -di / square;
    if (!Number.isFinite(fr[row + i] + fi[row + i])) return false;
  }
  return true;
}

/** The same for bandwidth one, where loops would cost more than the sums. */
function factorTridiagonal(ws: BandWorkspace): boolean {
  const { n, re, im, factorRe: fr, factorIm: fi } = ws;
  let qr = 0;
  let qi = 0;
  for (let i = 0; i < n; i++) {
    const p = 2 * i;
    let dr = re[p + 1];
    let di = im[p + 1];
    const own = Math.abs(dr) + Math.abs(di);
    let taken = 0;
    if (i > 0) {
      const sr = re[p];
      const si = im[p];
      const lr = sr * qr - si * qi;
      const li = sr * qi + si * qr;
      fr[p] = lr;
      fi[p] = li;
      const pr = sr * lr - si * li;
      const pi = sr * li + si * lr;
      taken = Math.abs(pr) + Math.abs(pi);
      dr -= pr;
      di -= pi;
    }
    const left = Math.abs(dr) + Math.abs(di);
    if (!(taken <= GROWTH_LIMIT * own) || !(left * GROWTH_LIMIT > own + taken)) return false;
    const inverse = 1 / (dr * dr + di * di);
    qr = dr * inverse;
    qi = -di * inverse;
    fr[p + 1] = qr;
    fi[p + 1] = qi;
    if (!Number.isFinite(qr + qi)) return false;
  }
  return true;
}

/**
 * X ← A⁻¹ X in place, X n×columns row-major, with the last factorisation of the workspace.
 */
export function solveBand(ws: BandWorkspace, xRe: Float64Array, xIm: Float64Array, columns = 1): void {
  if (ws.pivoted && ws.lu) solveBandLu(ws.lu, xRe, xIm, columns);
  else if (columns === 1 && ws.bandwidth === 1) solveTridiagonal(ws, xRe, xIm);
  else if (columns === 1) solveOne(ws, xRe, xIm);
  else solveMany(ws, xRe, xIm, columns);
}

function solveOne(ws: BandWorkspace, xr: Float64Array, xi: Float64Array): void {
  const { n, bandwidth: b, factorRe: fr, factorIm: fi } = ws;
  const w = b + 1;
  for (let i = 0; i < n; i++) {
    const row = i * w + b - i;
    let sr = xr[i];
    let si = xi[i];
    for (let k = Math.max(0, i - b); k < i; k++) {
      sr -= fr[row + k] * xr[k] - fi[row + k] * xi[k];
      si -= fr[row + k] * xi[k] + fi[row + k] * xr[k];
    }
    xr[i] = sr;
    xi[i] = si;
  }
  for (let i = n - 1; i >= 0; i--) {
    const row = i * w + b - i;
    // What came in from below is already subtracted; it precedes the division by d.
    let sr = xr[i] * fr[row + i] - xi[i] * fi[row + i];
    let si = xr[i] * fi[row + i] + xi[i] * fr[row + i];
    const last = Math.min(n - 1, i + b);
    for (let k = i + 1; k <= last; k++) {
      const p = k * w + b - k + i;
      sr -= fr[p] * xr[k] - fi[p] * xi[k];
      si -= fr[p] * xi[k] + fi[p] * xr[k];
    }
    xr[i] = sr;
    xi[i] = si;
  }
}

/** The same for bandwidth one, where loops would cost more than the sums. */
function solveTridiagonal(ws: BandWorkspace, xr: Float64Array, xi: Float64Array): void {
  const { n, factorRe: fr, factorIm: fi } = ws;
  let sr = 0;
  let si = 0;
  for (let i = 0; i < n; i++) {
    const lr = fr[2 * i];
    const li = fi[2 * i];
    const re = i === 0 ? xr[0] : xr[i] - lr * sr + li * si;
    const im = i === 0 ? xi[0] : xi[i] - lr * si - li * sr;
    sr = re;
    si = im;
    xr[i] = re;
    xi[i] = im;
  }
  let nr = 0;
  let ni = 0;
  for (let i = n - 1; i >= 0; i--) {
    const dr = fr[2 * i + 1];
    const di = fi[2 * i + 1];
    let re = xr[i] * dr - xi[i] * di;
    let im = xr[i] * di + xi[i] * dr;
    if (i + 1 < n) {
      const lr = fr[2 * i + 2];
      const li = fi[2 * i + 2];
      re -= lr * nr - li * ni;
      im -= lr * ni + li * nr;
    }
    nr = re;
    ni = im;
    xr[i] = re;
    xi[i] = im;
  }
}

function solveMany(ws: BandWorkspace, xr: Float64Array, xi: Float64Array, columns: number): void {
  const { n, bandwidth: b, factorRe: fr, factorIm: fi } = ws;
  const w = b + 1;
  for (let i = 0; i < n; i++) {
    const row = i * w + b - i;
    for (let k = Math.max(0, i - b); k < i; k++) subtract(xr, xi, columns, i, k, fr[row + k], fi[row + k]);
  }
  for (let i = n - 1; i >= 0; i--) {
    const row = i * w + b - i;
    const dr = fr[row + i];
    const di = fi[row + i];
    for (let p = i * columns; p < (i + 1) * columns; p++) {
      const re = xr[p];
      xr[p] = re * dr - xi[p] * di;
      xi[p] = re * di + xi[p] * dr;
    }
    const last = Math.min(n - 1, i + b);
    for (let k = i + 1; k <= last; k++) {
      const p = k * w + b - k + i;
      subtract(xr, xi, columns, i, k, fr[p], fi[p]);
    }
  }
}

/** Row `to` −= (fr + i fi) · row `from`. */
function subtract(
  xr: Float64Array,
  xi: Float64Array,
  columns: number,
  to: number,
  from: number,
  fr: number,
  fi: number,
): void {
  const a = to * columns;
  const b = from * columns;
  for (let c = 0; c < columns; c++) {
    const re = xr[b + c];
    const im = xi[b + c];
    xr[a + c] -= fr * re - fi * im;
    xi[a + c] -= fr * im + fi * re;
  }
}

/** Solves a real symmetric banded system for b n×columns row-major (kept). For single solves, not for loops. */
export function solveRealBand(a: SymmetricBand, b: Float64Array, columns = 1): Outcome<Float64Array> {
  const ws = bandWorkspace(a.n, a.bandwidth);
  ws.re.set(a.values);
  const factored = factorBand(ws);
  if (!factored.ok) return fail(factored.reason);
  const x = Float64Array.from(b);
  solveBand(ws, x, new Float64Array(x.length), columns);
  return succeed(x);
}
