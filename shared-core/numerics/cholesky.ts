/**
 * Cholesky factorisation A = L Lᵀ of a symmetric positive definite matrix.
 *
 * Method: row-oriented (Golub & Van Loan, Matrix Computations, 4th ed., §4.2.5). Backward error n·ε‖A‖.
 */
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite } from "./products.ts";
import { substitute } from "./triangular.ts";

/** The factor of a positive definite matrix. */
export type Cholesky = {
  n: number;
  /** n×n row-major, zero above the diagonal. */
  lower: Float64Array;
  /** Rows finished; n after success, otherwise the zero-based row whose pivot was not positive. */
  reached: number;
};

/**
 * Factors A (n×n; only the lower triangle is read). A pivot counts as zero below n·ε times its own diagonal
 * entry, which no scaling of the coordinates changes. `upTo.reached` names the guilty row on failure.
 */
export function factorCholesky(a: Float64Array, n: number): Outcome<Cholesky> {
  if (!allFinite(a)) return fail("the matrix holds a value that is not finite");
  const l = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    const row = i * n;
    for (let j = 0; j < i; j++) {
      const other = j * n;
      let sum = a[row + j];
      for (let k = 0; k < j; k++) sum -= l[row + k] * l[other + k];
      l[row + j] = sum / l[other + j];
    }
    let pivot = a[row + i];
    for (let k = 0; k < i; k++) pivot -= l[row + k] * l[row + k];
    if (!(pivot > n * Number.EPSILON * Math.abs(a[row + i]))) {
      return fail(`the matrix is not positive definite at row ${i + 1}`, { n, lower: l, reached: i });
    }
    l[row + i] = Math.sqrt(pivot);
  }
  return succeed({ n, lower: l, reached: n });
}

/** X ← L⁻¹ X in place, X n×columns row-major. */
export function solveLower(factor: Cholesky, x: Float64Array, columns = 1): void {
  const { n, lower: l } = factor;
  substitute(x, {
    n,
    columns,
    downwards: true,
    within: (from, to) => {
      for (let i = from; i < to; i++) {
        for (let k = from; k < i; k++) subtractRow(x, columns, i, k, l[i * n + k]);
        divideRow(x, columns, i, l[i * n + i]);
      }
    },
    coefficients: (start, _end, from) => ({ data: l, at: start * n + from, stride: n }),
  });
}

/** X ← L⁻ᵀ X in place, X n×columns row-major. */
export function solveLowerTransposed(factor: Cholesky, x: Float64Array, columns = 1): void {
  const { n, lower: l } = factor;
  substitute(x, {
    n,
    columns,
    downwards: false,
    within: (from, to) => {
      for (let i = to - 1; i >= from; i--) {
        divideRow(x, columns, i, l[i * n + i]);
        for (let k = from; k < i; k++) subtractRow(x, columns, k, i, l[i * n + k]);
      }
    },
    coefficients: (start, end, from, to) => {
      // Lᵀ: the block below the diagonal, turned over.
      const width = to - from;
      const data = new Float64Array((end - start) * width);
      for (let k = from; k < to; k++) {
        for (let i = start; i < end; i++) data[(i - start) * width + k - from] = l[k * n + i];
      }
      return { data, at: 0, stride: width };
    },
  });
}

/** Row `to` −= f · row `from`. */
function subtractRow(x: Float64Array, columns: number, to: number, from: number, f: number): void {
  if (f === 0) return;
  const a = to * columns;
  const b = from * columns;
  for (let c = 0; c < columns; c++) x[a + c] -= f * x[b + c];
}

function divideRow(x: Float64Array, columns: number, row: number, pivot: number): void {
  for (let p = row * columns; p < (row + 1) * columns; p++) x[p] /= pivot;
}

/** Solves A X = B with B and X n×columns row-major. */
export function solveCholesky(factor: Cholesky, b: Float64Array, columns = 1): Float64Array {
  const x = Float64Array.from(b);
  solveLower(factor, x, columns);
  solveLowerTransposed(factor, x, columns);
  return x;
}
