/**
 * All eigenvalues, and eigenvectors if wanted, of a dense symmetric matrix.
 *
 * Method: Householder tridiagonalisation after ordering the diagonal ascending; implicit QL for small matrices,
 * divide and conquer with blocked back-transformation for larger ones. Errors: values within about n·ε‖A‖,
 * residuals ‖A v − λ v‖ and ‖VᵀV − I‖ likewise, repeated roots included. The order lets small roots of a steadily
 * graded matrix keep their own digits where QL is used; that is usual, not guaranteed (equal large entries spoil
 * it), and divide and conquer gives errors relative to ‖A‖ only.
 */
import { divideAndConquer } from "./divide-and-conquer.ts";
import { type Kernel, kernelFor } from "./kernel.ts";
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite, maxAbs } from "./products.ts";
import { implicitQl, sortAscending } from "./tridiagonal-ql.ts";
import { formTransposedQ } from "./tridiagonalise.ts";

export type SymmetricEigen = {
  /** Ascending, in the unit of A. */
  values: Float64Array;
  /** n×n row-major, unit vector of `values[j]` in column (or row) j; empty when not asked for. */
  vectors: Float64Array;
};

/** How vectors lie in a row-major array; columns where nothing is said. */
export type VectorLayout = "columns" | "rows";

export type SymmetricEigenOptions = { vectors?: boolean; layout?: VectorLayout; kernel?: Kernel };

/** Largest size at which rotating the vectors inside QL is the quickest way; found by trial. */
const QL_SIZE = 28;

/** `a` is n×n row-major; only its lower triangle is read and it is kept. */
export function symmetricEigen(
  a: Float64Array,
  n: number,
  options: SymmetricEigenOptions = {},
): Outcome<SymmetricEigen> {
  if (!allFinite(a)) return fail("the matrix holds a value that is not finite");
  const withVectors = options.vectors ?? true;
  const kernel = options.kernel ?? kernelFor(n);
  const order = ascendingDiagonal(a, n);
  const scale = unitScale(maxAbs(a));
  const work = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      const p = order[i];
      const q = order[j];
      work[i * n + j] = (p >= q ? a[p * n + q] : a[q * n + p]) * scale;
    }
  }
  const t = kernel.tridiagonalise(work, n);
  const values = t.diagonal;
  let rows: Float64Array | undefined;
  if (withVectors && n > QL_SIZE) {
    rows = divideAndConquer(values, t.offDiagonal, n, kernel);
    if (!rows) return fail("the divide-and-conquer iteration did not converge");
    kernel.backTransform(rows, n, t);
  } else {
    rows = withVectors ? formTransposedQ(t) : undefined;
    if (!implicitQl(values, t.offDiagonal, n, rows)) return fail("the QL iteration did not converge");
    sortAscending(values, n, rows);
  }
  for (let i = 0; i < n; i++) values[i] /= scale;
  if (rows === undefined) return succeed({ values, vectors: new Float64Array(0) });
  const vectors = options.layout === "rows" ? unordered(rows, n, order) : columnsFromRows(rows, n, order);
  return succeed({ values, vectors });
}

/** Indices that bring the diagonal into ascending magnitude; equal entries keep their order. */
function ascendingDiagonal(a: Float64Array, n: number): Int32Array {
  const size = new Float64Array(n);
  const order = new Int32Array(n);
  for (let i = 0; i < n; i++) {
    size[i] = Math.abs(a[i * n + i]);
    order[i] = i;
  }
  return order.sort((i, j) => size[i] - size[j] || i - j);
}

/** Vectors held as rows with a permutation undone, in place: entry i of a row goes to `order[i]`. */
function unordered(rows: Float64Array, n: number, order: Int32Array): Float64Array {
  const row = new Float64Array(n);
  for (let at = 0; at < n * n; at += n) {
    for (let i = 0; i < n; i++) row[order[i]] = rows[at + i];
    rows.set(row, at);
  }
  return rows;
}

/** A power of two that brings `size` near one. */
export function unitScale(size: number): number {
  return size === 0 ? 1 : 2 ** -Math.max(-1000, Math.min(1000, Math.floor(Math.log2(size))));
}

/** Transposes vectors held as rows into columns, undoing a permutation: entry i of a row goes to `order[i]`. */
export function columnsFromRows(rows: Float64Array, n: number, order?: Int32Array): Float64Array {
  const out = new Float64Array(n * n);
  const tile = 16;
  for (let j0 = 0; j0 < n; j0 += tile) {
    const j1 = Math.min(n, j0 + tile);
    for (let i = 0; i < n; i++) {
      const to = (order ? order[i] : i) * n;
      for (let j = j0; j < j1; j++) out[to + j] = rows[j * n + i];
    }
  }
  return out;
}
