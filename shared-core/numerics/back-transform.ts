/**
 * Applies the reflections of a tridiagonalisation to vectors held as rows.
 *
 * Method: blocks of reflections in compact WY form, H(b)…H(a) = I − V T Vᵀ (Schreiber & Van Loan, SIAM J. Sci.
 * Stat. Comput. 10, 1989), so that the work falls to matrix products. Error of order n·ε.
 */
import type { Kernel } from "./kernel.ts";
import type { Tridiagonal } from "./tridiagonalise.ts";

/** Reflections taken together; chosen by trial. */
const BLOCK = 32;

/** rows (count×n) ← rows Qᵀ: vectors of T become vectors of A. */
export function backTransform(
  rows: Float64Array,
  count: number,
  t: Tridiagonal,
  product: Kernel["product"],
): void {
  const { n, reflectors, tau } = t;
  const v = new Float64Array(BLOCK * n);
  const vt = new Float64Array(n * BLOCK);
  const factor = new Float64Array(BLOCK * BLOCK);
  const tv = new Float64Array(BLOCK * n);
  const dots = new Float64Array(count * BLOCK);
  const change = new Float64Array(count * n);
  const window = (data: Float64Array, stride: number) => ({ data, at: 0, stride });
  // x = H(n−1) … H(2) H(1) y: H(1) acts first, so for rows the blocks run upwards.
  for (let first = 1; first < n; first += BLOCK) {
    const many = Math.min(BLOCK, n - first);
    const width = first + many - 1;
    for (let b = 0; b < many; b++) {
      const i = first + b;
      v.fill(0, b * width, (b + 1) * width);
      v.set(reflectors.subarray(i * n, i * n + i), b * width);
      for (let j = 0; j < width; j++) vt[j * many + b] = v[b * width + j];
    }
    blockFactor(v, width, many, tau, first, factor);
    // rows ← rows − (rows V) T Vᵀ with H(first) … H(last) = I − V T Vᵀ acting from the right.
    product(window(factor, many), window(v, width), window(tv, width), many, many, width);
    product(window(rows, n), window(vt, many), window(dots, many), count, width, many);
    product(window(dots, many), window(tv, width), window(change, width), count, many, width);
    for (let r = 0; r < count; r++) {
      const to = r * n;
      const from = r * width;
      for (let j = 0; j < width; j++) rows[to + j] -= change[from + j];
    }
  }
}

/** T (many×many, upper triangular) of H(first) H(first+1) … = I − V T Vᵀ. */
function blockFactor(
  v: Float64Array,
  width: number,
  many: number,
  tau: Float64Array,
  first: number,
  factor: Float64Array,
): void {
  factor.fill(0);
  for (let b = 0; b < many; b++) {
    const t = tau[first + b];
    factor[b * many + b] = t;
    // Column b above the diagonal: −τ T (Vᵀ v).
    for (let a = 0; a < b; a++) {
      let dot = 0;
      for (let j = 0; j < width; j++) dot += v[a * width + j] * v[b * width + j];
      factor[a * many + b] = -t * dot;
    }
    for (let a = 0; a < b; a++) {
      let sum = 0;
      for (let c = a; c < b; c++) sum += factor[a * many + c] * factor[c * many + b];
      factor[a * many + b] = sum;
    }
  }
}
