/**
 * All eigenvalues, and right and left eigenvectors if wanted, of a general real matrix.
 *
 * Method: balancing, Householder reduction to Hessenberg form, implicit QR (double shift, multishift where large) to the real Schur form
 * and back substitution (Golub & Van Loan, Matrix Computations, 4th ed., ch. 7). Values are exact for a matrix
 * within about n·ε‖A‖ of A; a value of a defective matrix of index k is therefore uncertain by about
 * (n·ε‖A‖)^(1/k), and its vectors come out (nearly) parallel, each with a small residual.
 */
import { balance } from "./balance.ts";
import { type Kernel, kernelFor } from "./kernel.ts";
import { multishiftQr } from "./multishift-qr.ts";
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite, maxAbs, transpose } from "./products.ts";
import type { SchurValues } from "./real-schur.ts";
import { schurVectors } from "./schur-vectors.ts";
import { unitScale, type VectorLayout } from "./symmetric-eigen.ts";

/** n×n row-major, vector j in column j, or in row j where rows were asked for. */
export type ComplexMatrix = { re: Float64Array; im: Float64Array };

export type GeneralEigen = {
  /** Real and imaginary parts in the unit of A; pairs adjacent, positive imaginary part first. */
  re: Float64Array;
  im: Float64Array;
  /** A x = λ x, ‖x‖₂ = 1, phase as it falls; when asked for. */
  right?: ComplexMatrix;
  /** yᴴ A = λ yᴴ, ‖y‖₂ = 1; when asked for. */
  left?: ComplexMatrix;
};

export type GeneralEigenOptions = {
  /** Default true. */
  right?: boolean;
  /** Default false. */
  left?: boolean;
  /** Of the vectors; default columns. */
  layout?: VectorLayout;
  kernel?: Kernel;
};

/** `a` is n×n row-major and kept. On failure `upTo` holds the values found, NaN for the others. */
export function generalEigen(
  a: Float64Array,
  n: number,
  options: GeneralEigenOptions = {},
): Outcome<GeneralEigen> {
  if (!allFinite(a)) return fail("the matrix holds a value that is not finite");
  const { right = true, left = false, layout = "columns", kernel = kernelFor(n) } = options;
  const scale = unitScale(maxAbs(a));
  const work = a.map((v) => v * scale);
  const stretch = balance(work, n);
  const vectors = right || left;
  const { h, transposedQ } = kernel.hessenberg(work, n, vectors);
  const values: SchurValues = {
    re: new Float64Array(n).fill(Number.NaN),
    im: new Float64Array(n).fill(Number.NaN),
  };
  const found = multishiftQr(h, n, values, kernel, vectors ? transposedQ : undefined);
  const result: GeneralEigen = { re: values.re.map((v) => v / scale), im: values.im.map((v) => v / scale) };
  if (found < n) return fail(`the QR iteration found ${found} of ${n} values within its cap`, result);
  if (right) {
    const x = schurVectors(h, n, values.re, values.im);
    result.right = unitVectors(timesBasis(x, transposedQ, n, kernel), n, values.im, stretch, 1);
    if (layout === "columns") result.right = columnsOf(result.right, n);
  }
  if (left) {
    // Left vectors of T are right vectors of its mirror image in the other diagonal, conjugated.
    const mirrored = mirror(h, n);
    const reversed = (v: Float64Array) => Float64Array.from(v).reverse();
    const im = reversed(values.im).map((v) => -v);
    const y = unmirror(schurVectors(mirrored, n, reversed(values.re), im), n, values.im);
    const shrink = stretch.map((s) => 1 / s);
    result.left = unitVectors(timesBasis(y, transposedQ, n, kernel), n, values.im, shrink, -1);
    if (layout === "columns") result.left = columnsOf(result.left, n);
  }
  return succeed(result);
}

/** P Tᵀ P with P reversing the order: upper quasi-triangular again. */
function mirror(t: Float64Array, n: number): Float64Array {
  const out = new Float64Array(n * n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) out[i * n + j] = t[(n - 1 - j) * n + n - 1 - i];
  return out;
}

/** Rows and entries back into the order of T; a pair's two rows keep their meaning (real, imaginary part). */
function unmirror(rows: Float64Array, n: number, im: Float64Array): Float64Array {
  const out = new Float64Array(n * n);
  for (let j = 0; j < n; j++) {
    let from = n - 1 - j;
    if (im[j] > 0) from = n - 2 - j;
    else if (im[j] < 0) from = n - j;
    for (let k = 0; k < n; k++) out[j * n + k] = rows[from * n + n - 1 - k];
  }
  return out;
}

/** Vectors of the Schur form (rows, pairs in two rows) times Z. */
function timesBasis(x: Float64Array, zt: Float64Array, n: number, kernel: Kernel): Float64Array {
  const rows = new Float64Array(n * n);
  const whole = (data: Float64Array) => ({ data, at: 0, stride: n });
  kernel.product(whole(x), whole(zt), whole(rows), n, n, n);
  return rows;
}

/**
 * Rows, a pair in two of them, entry i of each times `factor[i]`, to complex unit vectors, one a row. `rows` is
 * overwritten and becomes the real parts. `sign` −1 conjugates.
 */
function unitVectors(
  rows: Float64Array,
  n: number,
  im: Float64Array,
  factor: Float64Array,
  sign: 1 | -1,
): ComplexMatrix {
  const imaginary = new Float64Array(n * n);
  for (let j = 0; j < n; j++) {
    const pair = im[j] !== 0;
    const first = j * n;
    const second = first + n;
    let most = 0;
    for (let i = 0; i < n; i++) {
      rows[first + i] *= factor[i];
      most = Math.max(most, Math.abs(rows[first + i]));
      if (!pair) continue;
      rows[second + i] *= factor[i];
      most = Math.max(most, Math.abs(rows[second + i]));
    }
    let square = 0;
    for (let p = first; p < (pair ? second + n : second); p++) square += (rows[p] / most) ** 2;
    const scale = 1 / (most * Math.sqrt(square));
    for (let i = 0; i < n; i++) {
      rows[first + i] *= scale;
      if (!pair) continue;
      const part = sign * rows[second + i] * scale;
      rows[second + i] = rows[first + i];
      imaginary[first + i] = part;
      imaginary[second + i] = -part;
    }
    if (pair) j++;
  }
  return { re: rows, im: imaginary };
}

function columnsOf({ re, im }: ComplexMatrix, n: number): ComplexMatrix {
  return { re: transpose(re, n, n), im: transpose(im, n, n) };
}
