/**
 * Complex band LU with partial pivoting, for the rare symmetric matrix that must not go without.
 *
 * Method: row-wise Gaussian elimination of the equilibrated matrix; with pivoting U has up to twice the
 * bandwidth above the diagonal (Golub & Van Loan, Matrix Computations, 4th ed., §4.3.3).
 */

export type BandLu = {
  n: number;
  bandwidth: number;
  /** Rows of U under way: column c of row i at i·(3b + 1) + c − i + b. */
  re: Float64Array;
  im: Float64Array;
  /** Multipliers of column j at j·b …, for the rows j + 1 … j + b. */
  lowerRe: Float64Array;
  lowerIm: Float64Array;
  /** Row exchanged with row j at step j. */
  pivot: Int32Array;
  /** Symmetric power-of-two scale of each coordinate. */
  scale: Float64Array;
};

export function bandLuWorkspace(n: number, bandwidth: number): BandLu {
  const width = 3 * bandwidth + 1;
  return {
    n,
    bandwidth,
    re: new Float64Array(n * width),
    im: new Float64Array(n * width),
    lowerRe: new Float64Array(n * bandwidth),
    lowerIm: new Float64Array(n * bandwidth),
    pivot: new Int32Array(n),
    scale: new Float64Array(n),
  };
}

/**
 * Factors the symmetric lower band `re` + i `im`; returns the first column without a usable pivot, or −1. With
 * `regularise` such a pivot becomes ε instead, which is what inverse iteration wants.
 */
export function factorBandLu(lu: BandLu, re: Float64Array, im: Float64Array, regularise = false): number {
  load(lu, re, im);
  const { n, bandwidth: b, re: ur, im: ui, lowerRe, lowerIm, pivot } = lu;
  const width = 3 * b + 1;
  const floor = n * Number.EPSILON;
  for (let j = 0; j < n; j++) {
    const last = Math.min(n - 1, j + b);
    let best = j;
    let size = -1;
    for (let i = j; i <= last; i++) {
      const p = i * width + j - i + b;
      const s = Math.abs(ur[p]) + Math.abs(ui[p]);
      if (size < s) {
        size = s;
        best = i;
      }
    }
    if (!(size > floor) && !regularise) return j;
    pivot[j] = best;
    const right = Math.min(n - 1, j + 2 * b);
    if (best !== j) exchange(ur, ui, j * width - j + b, best * width - best + b, j, right);
    const own = j * width - j + b;
    // Only a pivot far below rounding is replaced: a small one is what singles out the wanted vector.
    const tiny = size < Number.EPSILON * Number.EPSILON;
    const pr = tiny ? Number.EPSILON : ur[own + j];
    const pi = tiny ? 0 : ui[own + j];
    const square = pr * pr + pi * pi;
    const ir = pr / square;
    const ii = -pi / square;
    ur[own + j] = ir;
    ui[own + j] = ii;
    for (let i = j + 1; i <= last; i++) {
      const row = i * width - i + b;
      const ar = ur[row + j];
      const ai = ui[row + j];
      const lr = ar * ir - ai * ii;
      const li = ar * ii + ai * ir;
      lowerRe[j * b + i - j - 1] = lr;
      lowerIm[j * b + i - j - 1] = li;
      if (lr === 0 && li === 0) continue;
      for (let c = j + 1; c <= right; c++) {
        ur[row + c] -= lr * ur[own + c] - li * ui[own + c];
        ui[row + c] -= lr * ui[own + c] + li * ur[own + c];
      }
    }
  }
  return -1;
}

/** Spreads the symmetric band into full rows, scaled so that each row's largest entry is about one. */
function load(lu: BandLu, re: Float64Array, im: Float64Array): void {
  const { n, bandwidth: b, re: ur, im: ui, scale } = lu;
  const width = 3 * b + 1;
  const w = b + 1;
  ur.fill(0);
  ui.fill(0);
  const at = (i: number, j: number) => i * w + j - i + b;
  // A few rounds of row maxima settle a symmetric scale (Ruiz, 2001); powers of two keep it exact.
  scale.fill(1);
  for (let round = 0; round < 4; round++) {
    for (let i = 0; i < n; i++) {
      let most = 0;
      for (let j = Math.max(0, i - b); j <= Math.min(n - 1, i + b); j++) {
        const p = i >= j ? at(i, j) : at(j, i);
        most = Math.max(most, (Math.abs(re[p]) + Math.abs(im[p])) * scale[i] * scale[j]);
      }
      if (most > 0 && Number.isFinite(most)) scale[i] *= 2 ** -Math.round(0.5 * Math.log2(most));
    }
  }
  for (let i = 0; i < n; i++) {
    for (let j = Math.max(0, i - b); j <= Math.min(n - 1, i + b); j++) {
      const p = i >= j ? at(i, j) : at(j, i);
      const q = i * width + j - i + b;
      ur[q] = re[p] * scale[i] * scale[j];
      ui[q] = im[p] * scale[i] * scale[j];
    }
  }
}

/** Swaps columns from … to of two rows given by their offsets. */
function exchange(
  ur: Float64Array,
  ui: Float64Array,
  first: number,
  second: number,
  from: number,
  to: number,
): void {
  for (let c = from; c <= to; c++) {
    const re = ur[first + c];
    const im = ui[first + c];
    ur[first + c] = ur[second + c];
    ui[first + c] = ui[second + c];
    ur[second + c] = re;
    ui[second + c] = im;
  }
}

/** X ← A⁻¹ X in place, X n×columns row-major. */
export function solveBandLu(lu: BandLu, xr: Float64Array, xi: Float64Array, columns: number): void {
  const { n, bandwidth: b, re: ur, im: ui, lowerRe, lowerIm, pivot, scale } = lu;
  const width = 3 * b + 1;
  for (let p = 0; p < n * columns; p++) {
    const s = scale[Math.floor(p / columns)];
    xr[p] *= s;
    xi[p] *= s;
  }
  for (let j = 0; j < n; j++) {
    const swap = pivot[j];
    for (let c = 0; c < columns; c++) {
      const p = j * columns + c;
      const q = swap * columns + c;
      const re = xr[q];
      const im = xi[q];
      xr[q] = xr[p];
      xi[q] = xi[p];
      xr[p] = re;
      xi[p] = im;
      for (let i = j + 1; i <= Math.min(n - 1, j + b); i++) {
        const lr = lowerRe[j * b + i - j - 1];
        const li = lowerIm[j * b + i - j - 1];
        xr[i * columns + c] -= lr * re - li * im;
        xi[i * columns + c] -= lr * im + li * re;
      }
    }
  }
  for (let i = n - 1; i >= 0; i--) {
    const row = i * width - i + b;
    for (let c = 0; c < columns; c++) {
      let sr = xr[i * columns + c];
      let si = xi[i * columns + c];
      for (let k = i + 1; k <= Math.min(n - 1, i + 2 * b); k++) {
        const re = xr[k * columns + c];
        const im = xi[k * columns + c];
        sr -= ur[row + k] * re - ui[row + k] * im;
        si -= ur[row + k] * im + ui[row + k] * re;
      }
      xr[i * columns + c] = sr * ur[row + i] - si * ui[row + i];
      xi[i * columns + c] = sr * ui[row + i] + si * ur[row + i];
    }
  }
  for (let p = 0; p < n * columns; p++) {
    const s = scale[Math.floor(p / columns)];
    xr[p] *= s;
    xi[p] *= s;
  }
}
