/**
 * All eigenvalues, and eigenvectors if wanted, of a dense symmetric matrix.
 *
 * Method: Householder tridiagonalisation after ordering the diagonal ascending (graded matrices keep the
 * relative accuracy of small values that way), then implicit QL. Errors: values within about n·ε‖A‖,
 * residuals ‖A v − λ v‖ and ‖VᵀV − I‖ likewise, repeated roots included.
 */
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite, maxAbs } from "./products.ts";
import { implicitQl, sortAscending } from "./tridiagonal-ql.ts";
import { formTransposedQ, tridiagonalise } from "./tridiagonalise.ts";

export type SymmetricEigen = {
  /** Ascending, in the unit of A. */
  values: Float64Array;
  /** n×n row-major, unit vector of `values[j]` in column j; empty when not asked for. */
  vectors: Float64Array;
};

/** `a` is n×n row-major; only its lower triangle is read and it is kept. */
export function symmetricEigen(
  a: Float64Array,
  n: number,
  options: { vectors?: boolean } = {},
): Outcome<SymmetricEigen> {
  if (!allFinite(a)) return fail("the matrix holds a value that is not finite");
  const withVectors = options.vectors ?? true;
  const order = ascendingDiagonal(a, n);
  const scale = powerOfTwoScale(a, n);
  const work = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      const p = order[i];
      const q = order[j];
      work[i * n + j] = (p >= q ? a[p * n + q] : a[q * n + p]) * scale;
    }
  }
  const t = tridiagonalise(work, n);
  const values = t.diagonal;
  const rows = withVectors ? formTransposedQ(t) : undefined;
  if (!implicitQl(values, t.offDiagonal, n, rows)) return fail("the QL iteration did not converge");
  sortAscending(values, n, rows);
  for (let i = 0; i < n; i++) values[i] /= scale;
  const vectors = new Float64Array(rows ? n * n : 0);
  if (rows)
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) vectors[order[i] * n + j] = rows[j * n + i];
  return succeed({ values, vectors });
}

/** Indices that bring the diagonal into ascending magnitude; equal entries keep their order. */
function ascendingDiagonal(a: Float64Array, n: number): Int32Array {
  const order = Int32Array.from({ length: n }, (_, i) => i);
  return order.sort((i, j) => Math.abs(a[i * n + i]) - Math.abs(a[j * n + j]) || i - j);
}

/** A power of two that brings the largest entry near one. */
function powerOfTwoScale(a: Float64Array, n: number): number {
  const most = maxAbs(a.subarray(0, n * n));
  return most === 0 ? 1 : 2 ** -Math.max(-1000, Math.min(1000, Math.floor(Math.log2(most))));
}
