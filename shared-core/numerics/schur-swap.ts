/**
 * Moves diagonal blocks within a real Schur form by orthogonal swaps of neighbours.
 *
 * Method: Bai & Demmel, On swapping diagonal blocks in real Schur form, Linear Algebra Appl. 186, 1993: the
 * invariant subspace of the lower block comes from a small Sylvester equation, and a swap that would disturb
 * the form by more than rounding is refused.
 */
import { standardBlock } from "./real-schur.ts";

/** Disturbance of the zero block, in units of ε times the largest entry, that refuses a swap; LAPACK's figure. */
const REFUSAL = 20;

/**
 * Moves the block that starts at row `from` up to row `to` (both first rows of blocks) of T (n×n, upper
 * quasi-triangular); `qt` (rows of n, Qᵀ) is multiplied along. Returns the row where the block ended: `to`, or
 * lower down where a swap was refused.
 */
export function moveUp(t: Float64Array, n: number, from: number, to: number, qt: Float64Array): number {
  let at = from;
  while (at > to) {
    const upper = at >= 2 && t[(at - 1) * n + at - 2] !== 0 ? 2 : 1;
    const lower = at + 1 < n && t[(at + 1) * n + at] !== 0 ? 2 : 1;
    if (!swapBlocks(t, n, at - upper, upper, lower, qt)) return at;
    at -= upper;
  }
  return at;
}

/** Swaps the neighbouring blocks of sizes p and q at row j; false, with nothing changed, where refused. */
function swapBlocks(t: Float64Array, n: number, j: number, p: number, q: number, qt: Float64Array): boolean {
  const m = p + q;
  const d = new Float64Array(m * m);
  let most = 0;
  for (let r = 0; r < m; r++) {
    for (let c = 0; c < m; c++) {
      d[r * m + c] = t[(j + r) * n + j + c];
      most = Math.max(most, Math.abs(d[r * m + c]));
    }
  }
  const x = sylvester(d, p, q);
  if (!x) return false;
  // The columns of [−X; I] span the subspace of the lower block; reflections that bring it to the top.
  const basis = new Float64Array(m * q);
  for (let r = 0; r < p; r++) for (let c = 0; c < q; c++) basis[r * q + c] = -x[r * q + c];
  for (let c = 0; c < q; c++) basis[(p + c) * q + c] = 1;
  const u = orthogonalComplete(basis, m, q);
  const moved = sandwich(u, d, m);
  for (let r = q; r < m; r++) {
    for (let c = 0; c < q; c++)
      if (!(Math.abs(moved[r * m + c]) <= REFUSAL * Number.EPSILON * most)) return false;
  }
  // Nothing stands left of the blocks or below them.
  applyLeft(u, t, n, j, m, j);
  applyRight(u, t, n, j, m, j + m);
  applyLeft(u, qt, n, j, m);
  for (let r = q; r < m; r++) for (let c = 0; c < q; c++) t[(j + r) * n + j + c] = 0;
  if (q === 2) settle(t, n, j, qt);
  if (p === 2) settle(t, n, j + q, qt);
  return true;
}

/** X with A X − X B = C for the blocks of d = [A C; 0 B]; undefined where A and B share a value. */
function sylvester(d: Float64Array, p: number, q: number): Float64Array | undefined {
  const m = p + q;
  const size = p * q;
  // One equation a row: unknown X(r, c) at r·q + c, right-hand side last.
  const w = size + 1;
  const a = new Float64Array(size * w);
  for (let r = 0; r < p; r++) {
    for (let c = 0; c < q; c++) {
      const row = (r * q + c) * w;
      for (let k = 0; k < p; k++) a[row + k * q + c] += d[r * m + k];
      for (let k = 0; k < q; k++) a[row + r * q + k] -= d[(p + k) * m + p + c];
      a[row + size] = d[r * m + p + c];
    }
  }
  for (let k = 0; k < size; k++) {
    let best = k;
    for (let i = k + 1; i < size; i++) if (Math.abs(a[i * w + k]) > Math.abs(a[best * w + k])) best = i;
    if (a[best * w + k] === 0) return undefined;
    for (let c = 0; c < w; c++) {
      const kept = a[k * w + c];
      a[k * w + c] = a[best * w + c];
      a[best * w + c] = kept;
    }
    for (let i = 0; i < size; i++) {
      if (i === k) continue;
      const factor = a[i * w + k] / a[k * w + k];
      for (let c = k; c < w; c++) a[i * w + c] -= factor * a[k * w + c];
    }
  }
  const x = new Float64Array(size);
  for (let k = 0; k < size; k++) x[k] = a[k * w + size] / a[k * w + k];
  return x.every(Number.isFinite) ? x : undefined;
}

/** Uᵀ (m×m) orthogonal whose first q rows span the columns of `basis` (m×q). */
function orthogonalComplete(basis: Float64Array, m: number, q: number): Float64Array {
  const u = new Float64Array(m * m);
  for (let i = 0; i < m; i++) u[i * m + i] = 1;
  const v = new Float64Array(m);
  for (let c = 0; c < q; c++) {
    let square = 0;
    for (let r = c; r < m; r++) square += basis[r * q + c] ** 2;
    const first = basis[c * q + c];
    const beta = first >= 0 ? -Math.sqrt(square) : Math.sqrt(square);
    v.fill(0);
    for (let r = c; r < m; r++) v[r] = basis[r * q + c];
    v[c] -= beta;
    const scale = square === 0 ? 0 : 1 / (beta * (beta - first));
    for (const [target, width] of [
      [basis, q],
      [u, m],
    ] as const) {
      for (let k = 0; k < width; k++) {
        let dot = 0;
        for (let r = c; r < m; r++) dot += v[r] * target[r * width + k];
        dot *= scale;
        for (let r = c; r < m; r++) target[r * width + k] -= dot * v[r];
      }
    }
  }
  return u;
}

/** U D Uᵀ for small m. */
function sandwich(u: Float64Array, d: Float64Array, m: number): Float64Array {
  const out = new Float64Array(m * m);
  for (let i = 0; i < m; i++) {
    for (let j = 0; j < m; j++) {
      let sum = 0;
      for (let r = 0; r < m; r++) {
        for (let c = 0; c < m; c++) sum += u[i * m + r] * d[r * m + c] * u[j * m + c];
      }
      out[i * m + j] = sum;
    }
  }
  return out;
}

/** Rows j … j + m − 1 of `a`, columns from `from` on, ← U times them; m ≤ 4. */
function applyLeft(u: Float64Array, a: Float64Array, n: number, j: number, m: number, from = 0): void {
  const two = m > 2;
  const three = m > 3;
  // Rows beyond m repeat the first with weight zero.
  const weight = (r: number, c: number) => (r < m && c < m ? u[r * m + c] : 0);
  const [u00, u01, u02, u03] = [weight(0, 0), weight(0, 1), weight(0, 2), weight(0, 3)];
  const [u10, u11, u12, u13] = [weight(1, 0), weight(1, 1), weight(1, 2), weight(1, 3)];
  const [u20, u21, u22, u23] = [weight(2, 0), weight(2, 1), weight(2, 2), weight(2, 3)];
  const [u30, u31, u32, u33] = [weight(3, 0), weight(3, 1), weight(3, 2), weight(3, 3)];
  const r0 = j * n;
  const r1 = r0 + n;
  const r2 = two ? r1 + n : r0;
  const r3 = three ? r1 + 2 * n : r0;
  for (let c = from; c < n; c++) {
    const x0 = a[r0 + c];
    const x1 = a[r1 + c];
    const x2 = a[r2 + c];
    const x3 = a[r3 + c];
    a[r0 + c] = u00 * x0 + u01 * x1 + u02 * x2 + u03 * x3;
    a[r1 + c] = u10 * x0 + u11 * x1 + u12 * x2 + u13 * x3;
    if (two) a[r2 + c] = u20 * x0 + u21 * x1 + u22 * x2 + u23 * x3;
    if (three) a[r3 + c] = u30 * x0 + u31 * x1 + u32 * x2 + u33 * x3;
  }
}

/** Columns j … j + m − 1 of `a`, rows before `to`, ← themselves times Uᵀ. */
function applyRight(u: Float64Array, a: Float64Array, n: number, j: number, m: number, to = n): void {
  const kept = new Float64Array(m);
  for (let r = 0; r < to; r++) {
    const row = r * n + j;
    for (let c = 0; c < m; c++) kept[c] = a[row + c];
    for (let c = 0; c < m; c++) {
      let sum = 0;
      for (let k = 0; k < m; k++) sum += kept[k] * u[c * m + k];
      a[row + c] = sum;
    }
  }
}

/** Standard form of the 2×2 block at row j; it may turn out to be two real values. */
function settle(t: Float64Array, n: number, j: number, qt: Float64Array): void {
  const p = j * n + j;
  const { a, b, c, d, cs, sn } = standardBlock(t[p], t[p + 1], t[p + n], t[p + n + 1]);
  const u = Float64Array.of(cs, sn, -sn, cs);
  applyLeft(u, t, n, j, 2, j);
  applyRight(u, t, n, j, 2, j + 2);
  applyLeft(u, qt, n, j, 2);
  t[p] = a;
  t[p + 1] = b;
  t[p + n] = c;
  t[p + n + 1] = d;
}
