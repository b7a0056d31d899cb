/**
 * Balancing of a square matrix by a diagonal similarity, D⁻¹ A D, with D of powers of two.
 *
 * Method: Parlett & Reinsch, Numerische Mathematik 13, 1969, with 2-norms of whole rows and columns as James,
 * Langou & Lowery propose (arXiv 1401.5766, 2014): that does not blow up rounding noise in nearly triangular
 * matrices. Exact, as only exponents change.
 */

/** A further change must shrink row plus column by at least this factor; LAPACK's figure. */
const WORTHWHILE = 0.95;
/** Rounds over all rows; convergence usually takes two or three. */
const ROUND_CAP = 100;

/** Balances `a` (n×n) in place and returns the diagonal of D: an eigenvector of the result times D is one of A. */
export function balance(a: Float64Array, n: number): Float64Array {
  const scale = new Float64Array(n).fill(1);
  for (let round = 0; round < ROUND_CAP; round++) {
    let changed = false;
    for (let i = 0; i < n; i++) {
      let columnSquare = 0;
      let rowSquare = 0;
      for (let j = 0; j < n; j++) {
        columnSquare += a[j * n + i] * a[j * n + i];
        rowSquare += a[i * n + j] * a[i * n + j];
      }
      const column = Math.sqrt(columnSquare);
      const row = Math.sqrt(rowSquare);
      if (!(column > 0 && row > 0) || !Number.isFinite(column) || !Number.isFinite(row)) continue;
      const f = 2 ** Math.round(0.5 * Math.log2(row / column));
      const next = scale[i] * f;
      if (f === 1 || !(next > 1e-150 && next < 1e150)) continue;
      if (column * f + row / f >= WORTHWHILE * (column + row)) continue;
      changed = true;
      scale[i] = next;
      for (let j = 0; j < n; j++) a[i * n + j] /= f;
      for (let j = 0; j < n; j++) a[j * n + i] *= f;
    }
    if (!changed) break;
  }
  return scale;
}
