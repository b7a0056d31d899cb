/**
 * All eigenvalues, and eigenvectors if wanted, of a symmetric tridiagonal matrix.
 *
 * Method: implicit QL (small, or values alone), otherwise divide and conquer. Errors of order n·ε‖T‖ in values,
 * residuals and orthogonality, also where roots agree to the last bit.
 */
import { divideAndConquer } from "./divide-and-conquer.ts";
import { type Kernel, kernelFor } from "./kernel.ts";
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite, identity, maxAbs } from "./products.ts";
import { columnsFromRows, type SymmetricEigen, unitScale, type VectorLayout } from "./symmetric-eigen.ts";
import { implicitQl, sortAscending } from "./tridiagonal-ql.ts";

/** Up to here QL with vectors is quicker; found by trial. */
const QL_SIZE = 24;

/**
 * `diagonal` has n entries; entry i of `offDiagonal` (n−1) couples i and i+1. Both are kept. Values ascending,
 * vectors n×n row-major in columns or rows, empty with `vectors: false`.
 */
export function tridiagonalEigen(
  diagonal: Float64Array,
  offDiagonal: Float64Array,
  options: { vectors?: boolean; layout?: VectorLayout; kernel?: Kernel } = {},
): Outcome<SymmetricEigen> {
  const n = diagonal.length;
  if (!allFinite(diagonal) || !allFinite(offDiagonal))
    return fail("the matrix holds a value that is not finite");
  const scale = unitScale(Math.max(maxAbs(diagonal), maxAbs(offDiagonal)));
  const d = diagonal.map((v) => v * scale);
  const e = new Float64Array(Math.max(0, n - 1)).map((_, i) => offDiagonal[i] * scale);
  const withVectors = options.vectors ?? true;
  let rows: Float64Array | undefined;
  if (withVectors && n > QL_SIZE) {
    rows = divideAndConquer(d, e, n, options.kernel ?? kernelFor(n));
    if (!rows) return fail("the divide-and-conquer iteration did not converge");
  } else {
    rows = withVectors ? identity(n) : undefined;
    if (!implicitQl(d, e, n, rows)) return fail("the QL iteration did not converge");
    sortAscending(d, n, rows);
  }
  const values = d.map((v) => v / scale);
  if (rows === undefined) return succeed({ values, vectors: new Float64Array(0) });
  return succeed({ values, vectors: options.layout === "rows" ? rows : columnsFromRows(rows, n) });
}
