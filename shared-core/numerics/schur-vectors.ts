/**
 * Right eigenvectors of an upper quasi-triangular matrix (a real Schur form).
 *
 * Method: back substitution on (T − λI) x = 0 as in EISPACK's hqr2 and LAPACK's dtrevc: a vanishing pivot is
 * replaced by ε‖T‖, so a defective matrix yields (nearly) parallel vectors with small residuals instead of a
 * failure; entries are rescaled before they can overflow.
 */

/** Above this size a vector under construction is scaled down; squares then stay finite. */
const LARGE = 1e120;

/**
 * Row j of `re` (and `im`, when the value is complex) becomes the vector of value j in the basis of T, entries
 * beyond the value's own block being zero. A pair is held once: row j the real part and row j + 1 the imaginary
 * part, for the value with positive imaginary part. `out` is n×n.
 */
export function schurVectors(t: Float64Array, n: number, re: Float64Array, im: Float64Array): Float64Array {
  const out = new Float64Array(n * n);
  let norm = 0;
  for (let p = 0; p < n * n; p++) norm = Math.max(norm, Math.abs(t[p]));
  const floor = Math.max(Number.EPSILON * norm, 2 ** -1000);
  for (let j = n - 1; j >= 0; j--) {
    if (im[j] === 0) {
      realVector(t, n, j, re[j], im, floor, out.subarray(j * n, (j + 1) * n));
    } else {
      j--;
      const x = out.subarray(j * n, (j + 1) * n);
      complexVector(t, n, j, re[j], im, floor, x, out.subarray((j + 1) * n, (j + 2) * n));
    }
  }
  return out;
}

function realVector(
  t: Float64Array,
  n: number,
  j: number,
  value: number,
  im: Float64Array,
  floor: number,
  x: Float64Array,
): void {
  x[j] = 1;
  for (let i = j - 1; i >= 0; i--) {
    const row = i * n;
    let r = 0;
    for (let k = i + 1; k <= j; k++) r -= t[row + k] * x[k];
    if (im[i] === 0) {
      const pivot = t[row + i] - value;
      x[i] = r / (Math.abs(pivot) < floor ? floor : pivot);
    } else {
      // Rows i − 1 and i form a block; r belongs to the lower one.
      const above = row - n;
      let s = 0;
      for (let k = i + 1; k <= j; k++) s -= t[above + k] * x[k];
      solveBlock(
        t[above + i - 1] - value,
        t[above + i],
        t[row + i - 1],
        t[row + i] - value,
        0,
        s,
        0,
        r,
        0,
        floor,
      );
      x[i - 1] = pair[0];
      x[i] = pair[2];
      i--;
    }
    rescale(x, undefined, i, j);
  }
}

function complexVector(
  t: Float64Array,
  n: number,
  j: number,
  value: number,
  im: Float64Array,
  floor: number,
  x: Float64Array,
  y: Float64Array,
): void {
  const mu = im[j];
  // The block [a b; c a]: c x₁ = (λ − a) x₂ = iμ x₂. The larger off-diagonal entry divides.
  if (Math.abs(t[j * n + j + 1]) >= Math.abs(t[(j + 1) * n + j])) {
    x[j] = 1;
    y[j + 1] = mu / t[j * n + j + 1];
  } else {
    x[j] = -mu / t[(j + 1) * n + j];
    y[j + 1] = 1;
    // iμ·(i)/c = −μ/c
  }
  for (let i = j - 1; i >= 0; i--) {
    const row = i * n;
    let rr = 0;
    let ri = 0;
    for (let k = i + 1; k <= j + 1; k++) {
      rr -= t[row + k] * x[k];
      ri -= t[row + k] * y[k];
    }
    if (im[i] === 0) {
      divide(rr, ri, t[row + i] - value, -mu, floor);
      x[i] = pair[0];
      y[i] = pair[1];
    } else {
      const above = row - n;
      let sr = 0;
      let si = 0;
      for (let k = i + 1; k <= j + 1; k++) {
        sr -= t[above + k] * x[k];
        si -= t[above + k] * y[k];
      }
      const a = t[above + i - 1] - value;
      solveBlock(a, t[above + i], t[row + i - 1], t[row + i] - value, -mu, sr, si, rr, ri, floor);
      x[i - 1] = pair[0];
      y[i - 1] = pair[1];
      x[i] = pair[2];
      y[i] = pair[3];
      i--;
    }
    rescale(x, y, i, j + 1);
  }
}

/** Result of the small solves: re₁, im₁, re₂, im₂. */
const pair = new Float64Array(4);

/** pair[0..1] = (r + i s) / (p + i q), a tiny divisor raised to `floor`. */
function divide(r: number, s: number, p: number, q: number, floor: number): void {
  let pr = p;
  let pi = q;
  if (Math.abs(pr) + Math.abs(pi) < floor) {
    pr = floor;
    pi = 0;
  }
  if (Math.abs(pr) >= Math.abs(pi)) {
    const ratio = pi / pr;
    const whole = pr + pi * ratio;
    pair[0] = (r + s * ratio) / whole;
    pair[1] = (s - r * ratio) / whole;
  } else {
    const ratio = pr / pi;
    const whole = pr * ratio + pi;
    pair[0] = (r * ratio + s) / whole;
    pair[1] = (s * ratio - r) / whole;
  }
}

/** Solves [a+iq b; c d+iq] x = r with row pivoting; r = (sr + i si, rr + i ri). */
function solveBlock(
  a: number,
  b: number,
  c: number,
  d: number,
  q: number,
  sr: number,
  si: number,
  rr: number,
  ri: number,
  floor: number,
): void {
  if (Math.abs(a) + Math.abs(q) >= Math.abs(c)) {
    // m = c / (a + iq); (d + iq − m b) x₂ = r₂ − m r₁
    divide(c, 0, a, q, floor);
    const mr = pair[0];
    const mi = pair[1];
    divide(rr - mr * sr + mi * si, ri - mr * si - mi * sr, d - mr * b, q - mi * b, floor);
    const x2r = pair[0];
    const x2i = pair[1];
    divide(sr - b * x2r, si - b * x2i, a, q, floor);
    pair[2] = x2r;
    pair[3] = x2i;
    return;
  }
  // m = (a + iq) / c; (b − m (d + iq)) x₂ = r₁ − m r₂
  const mr = a / c;
  const mi = q / c;
  divide(sr - mr * rr + mi * ri, si - mr * ri - mi * rr, b - mr * d + mi * q, -mr * q - mi * d, floor);
  const x2r = pair[0];
  const x2i = pair[1];
  pair[0] = (rr - d * x2r + q * x2i) / c;
  pair[1] = (ri - d * x2i - q * x2r) / c;
  pair[2] = x2r;
  pair[3] = x2i;
}

/** Scales the entries first … last down when one just computed has become large. */
function rescale(x: Float64Array, y: Float64Array | undefined, first: number, last: number): void {
  const size = Math.max(
    Math.abs(x[first]),
    Math.abs(x[first + 1]),
    y ? Math.max(Math.abs(y[first]), Math.abs(y[first + 1])) : 0,
  );
  if (size <= LARGE) return;
  const factor = 1 / size;
  for (let k = Math.max(0, first); k <= last; k++) {
    x[k] *= factor;
    if (y) y[k] *= factor;
  }
}
