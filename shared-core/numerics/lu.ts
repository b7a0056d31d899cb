/**
 * Real LU with partial pivoting of the equilibrated matrix: P (R A C) = L U.
 *
 * Method: row-oriented outer-product Gaussian elimination (Golub & Van Loan, Matrix Computations, 4th ed.,
 * §3.4.3), in the kernel. Error of a solve: ‖x − x̂‖/‖x‖ of order n·ε / reciprocal condition.
 */
import { equilibrationScales } from "./equilibrate.ts";
import { kernelFor } from "./kernel.ts";
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite } from "./products.ts";
import { substitute } from "./triangular.ts";

/** A factored matrix; also the workspace of the next factorisation of the same size. */
export type RealLu = {
  n: number;
  /** n×n row-major: U on and above the diagonal, the multipliers of L (unit diagonal) below. */
  factors: Float64Array;
  /** Row i of the factors is row `permutation[i]` of A. */
  permutation: Int32Array;
  rowScale: Float64Array;
  columnScale: Float64Array;
  /** ‖R A C‖₁ */
  norm: number;
  scratch: Float64Array;
};

/** Room for one n×n factorisation. */
export function realLuWorkspace(n: number): RealLu {
  return {
    n,
    factors: new Float64Array(n * n),
    permutation: new Int32Array(n),
    rowScale: new Float64Array(n),
    columnScale: new Float64Array(n),
    norm: 0,
    scratch: new Float64Array(n),
  };
}

/**
 * Factors A (n×n, kept). Fails on non-finite entries and where a pivot of the equilibrated matrix is below
 * n·ε: A is then singular to working precision.
 */
export function factorLu(a: Float64Array, n: number, workspace = realLuWorkspace(n)): Outcome<RealLu> {
  if (!allFinite(a)) return fail("the matrix holds a value that is not finite");
  const { factors, permutation, rowScale, columnScale } = workspace;
  equilibrationScales(a, undefined, n, rowScale, columnScale);
  const sums = workspace.scratch.fill(0);
  for (let i = 0; i < n; i++) {
    permutation[i] = i;
    for (let j = 0; j < n; j++) {
      const entry = a[i * n + j] * rowScale[i] * columnScale[j];
      factors[i * n + j] = entry;
      sums[j] += Math.abs(entry);
    }
  }
  workspace.norm = sums.reduce((most, s) => Math.max(most, s), 0);
  const singularAt = kernelFor(n).factor(factors, undefined, n, permutation, n * Number.EPSILON);
  if (singularAt >= 0) return fail(`the matrix is singular to working precision at column ${singularAt + 1}`);
  return succeed(workspace);
}

/** Solves A X = B with B and X n×columns, row-major; `out` may not be `b`. */
export function solveLu(
  lu: RealLu,
  b: Float64Array,
  columns = 1,
  out: Float64Array = new Float64Array(lu.n * columns),
): Float64Array {
  const { n, factors: f, permutation, rowScale, columnScale } = lu;
  for (let i = 0; i < n; i++) {
    const row = permutation[i];
    for (let c = 0; c < columns; c++) out[i * columns + c] = b[row * columns + c] * rowScale[row];
  }
  const coefficients = (start: number, _end: number, from: number) => ({
    data: f,
    at: start * n + from,
    stride: n,
  });
  substitute(out, {
    n,
    columns,
    downwards: true,
    within: (from, to) => {
      for (let i = from; i < to; i++) {
        for (let k = from; k < i; k++) addRow(out, columns, i, k, -f[i * n + k]);
      }
    },
    coefficients,
  });
  substitute(out, {
    n,
    columns,
    downwards: false,
    within: (from, to) => {
      for (let i = to - 1; i >= from; i--) {
        for (let k = i + 1; k < to; k++) addRow(out, columns, i, k, -f[i * n + k]);
        const pivot = f[i * n + i];
        for (let c = 0; c < columns; c++) out[i * columns + c] /= pivot;
      }
    },
    coefficients,
  });
  for (let i = 0; i < n; i++) {
    for (let c = 0; c < columns; c++) out[i * columns + c] *= columnScale[i];
  }
  return out;
}

function addRow(x: Float64Array, columns: number, to: number, from: number, factor: number): void {
  if (factor === 0) return;
  for (let c = 0; c < columns; c++) x[to * columns + c] += factor * x[from * columns + c];
}

/** Solves Aᵀ x = b for one right-hand side. */
export function solveLuTransposed(lu: RealLu, b: Float64Array): Float64Array {
  const { n, permutation, rowScale, columnScale } = lu;
  const y = new Float64Array(n);
  for (let i = 0; i < n; i++) y[i] = b[i] * columnScale[i];
  solveScaledTransposed(lu, y);
  const x = new Float64Array(n);
  for (let i = 0; i < n; i++) x[permutation[i]] = y[i] * rowScale[permutation[i]];
  return x;
}

/** y ← (L U)ᵀ⁻¹ y: the scaled system, rows still permuted. */
function solveScaledTransposed(lu: RealLu, y: Float64Array): void {
  const { n, factors: f } = lu;
  for (let i = 0; i < n; i++) {
    y[i] /= f[i * n + i];
    for (let j = i + 1; j < n; j++) y[j] -= f[i * n + j] * y[i];
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let j = 0; j < i; j++) y[j] -= f[i * n + j] * y[i];
  }
}

/** y ← (L U)⁻¹ y. */
function solveScaled(lu: RealLu, y: Float64Array): void {
  const { n, factors: f } = lu;
  for (let i = 0; i < n; i++) {
    let sum = y[i];
    for (let k = 0; k < i; k++) sum -= f[i * n + k] * y[k];
    y[i] = sum;
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = y[i];
    for (let k = i + 1; k < n; k++) sum -= f[i * n + k] * y[k];
    y[i] = sum / f[i * n + i];
  }
}

/**
 * Estimate of 1 / (‖B‖₁ ‖B⁻¹‖₁) for the equilibrated B = R A C: near 1 is well conditioned, near ε is singular.
 * Method: Hager's estimator with Higham's alternating vector (Higham, Accuracy and Stability of Numerical
 * Algorithms, 2nd ed., §15.3, algorithm 15.1); never below the true value by construction, seldom above thrice.
 */
export function reciprocalCondition(lu: RealLu): number {
  const { n } = lu;
  if (n === 0) return 1;
  // A row permutation changes no 1-norm of the inverse's columns, so P is left out.
  let x = new Float64Array(n).fill(1 / n);
  solveScaled(lu, x);
  let estimate = sumAbs(x);
  let last = -1;
  for (let step = 0; step < 5; step++) {
    const signs = Float64Array.from(x, (v) => (v >= 0 ? 1 : -1));
    solveScaledTransposed(lu, signs);
    let best = 0;
    for (let i = 1; i < n; i++) if (Math.abs(signs[i]) > Math.abs(signs[best])) best = i;
    if (best === last) break;
    last = best;
    x = new Float64Array(n);
    x[best] = 1;
    solveScaled(lu, x);
    const next = sumAbs(x);
    if (next <= estimate) break;
    estimate = next;
  }
  const alternating = Float64Array.from(
    { length: n },
    (_, i) => (i % 2 ? -1 : 1) * (1 + i / Math.max(1, n - 1)),
  );
  solveScaled(lu, alternating);
  estimate = Math.max(estimate, (2 * sumAbs(alternating)) / (3 * n));
  const product = lu.norm * estimate;
  return product > 0 && Number.isFinite(product) ? Math.min(1, 1 / product) : 0;
}

function sumAbs(x: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < x.length; i++) sum += Math.abs(x[i]);
  return sum;
}
