/**
 * Complex LU with partial pivoting of the equilibrated matrix, real and imaginary parts in separate arrays.
 *
 * Method as in lu.ts; pivots are compared by |re| + |im| (as LAPACK's izamax does). A workspace is made once
 * and used for every frequency; neither factoring nor solving allocates then.
 */
import { equilibrationScales } from "./equilibrate.ts";
import { kernelFor } from "./kernel.ts";
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite } from "./products.ts";

/** A factored complex matrix; also the workspace of the next factorisation of the same size. */
export type ComplexLu = {
  n: number;
  /** n×n row-major: U on and above the diagonal, multipliers of L below; the diagonal holds 1/uᵢᵢ. */
  re: Float64Array;
  im: Float64Array;
  /** Row i of the factors is row `permutation[i]` of A. */
  permutation: Int32Array;
  rowScale: Float64Array;
  columnScale: Float64Array;
};

/** Room for one n×n complex factorisation. */
export function complexLuWorkspace(n: number): ComplexLu {
  return {
    n,
    re: new Float64Array(n * n),
    im: new Float64Array(n * n),
    permutation: new Int32Array(n),
    rowScale: new Float64Array(n),
    columnScale: new Float64Array(n),
  };
}

/** Factors A = re + i·im (n×n each, kept). Fails as `factorLu` does. */
export function factorComplexLu(
  re: Float64Array,
  im: Float64Array,
  n: number,
  workspace = complexLuWorkspace(n),
): Outcome<ComplexLu> {
  if (!allFinite(re) || !allFinite(im)) return fail("the matrix holds a value that is not finite");
  const { re: fr, im: fi, permutation, rowScale, columnScale } = workspace;
  equilibrationScales(re, im, n, rowScale, columnScale);
  for (let i = 0; i < n; i++) {
    permutation[i] = i;
    for (let j = 0; j < n; j++) {
      const scale = rowScale[i] * columnScale[j];
      fr[i * n + j] = re[i * n + j] * scale;
      fi[i * n + j] = im[i * n + j] * scale;
    }
  }
  const singularAt = kernelFor(n).factor(fr, fi, n, permutation, n * Number.EPSILON);
  if (singularAt >= 0) return fail(`the matrix is singular to working precision at column ${singularAt + 1}`);
  return succeed(workspace);
}

/**
 * Solves A X = B for B and X n×columns, row-major, into `outRe`/`outIm`, which may not be the right-hand side.
 * Allocates nothing.
 */
export function solveComplexLu(
  lu: ComplexLu,
  bRe: Float64Array,
  bIm: Float64Array,
  columns: number,
  outRe: Float64Array,
  outIm: Float64Array,
): void {
  const { n, re: fr, im: fi, permutation, rowScale, columnScale } = lu;
  for (let i = 0; i < n; i++) {
    const row = permutation[i];
    const scale = rowScale[row];
    for (let c = 0; c < columns; c++) {
      outRe[i * columns + c] = bRe[row * columns + c] * scale;
      outIm[i * columns + c] = bIm[row * columns + c] * scale;
    }
    for (let k = 0; k < i; k++) subtractRow(outRe, outIm, columns, i, k, fr[i * n + k], fi[i * n + k]);
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) subtractRow(outRe, outIm, columns, i, k, fr[i * n + k], fi[i * n + k]);
    const ir = fr[i * n + i];
    const ii = fi[i * n + i];
    for (let c = 0; c < columns; c++) {
      const xr = outRe[i * columns + c];
      const xi = outIm[i * columns + c];
      outRe[i * columns + c] = xr * ir - xi * ii;
      outIm[i * columns + c] = xr * ii + xi * ir;
    }
  }
  for (let i = 0; i < n; i++) {
    for (let c = 0; c < columns; c++) {
      outRe[i * columns + c] *= columnScale[i];
      outIm[i * columns + c] *= columnScale[i];
    }
  }
}

function subtractRow(
  xr: Float64Array,
  xi: Float64Array,
  columns: number,
  to: number,
  from: number,
  fr: number,
  fi: number,
): void {
  if (fr === 0 && fi === 0) return;
  for (let c = 0; c < columns; c++) {
    const ur = xr[from * columns + c];
    const ui = xi[from * columns + c];
    xr[to * columns + c] -= fr * ur - fi * ui;
    xi[to * columns + c] -= fr * ui + fi * ur;
  }
}
