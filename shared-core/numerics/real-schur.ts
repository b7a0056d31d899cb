/**
 * Real Schur form of an upper Hessenberg matrix, H = Z T Zᵀ, by implicit double-shift QR.
 *
 * Method: Francis' steps with two small subdiagonals and the deflation test of Ahues & Tisseur, exceptional
 * shifts every tenth step; structure and constants of LAPACK's dlahqr and dlanv2, symbols as there. T is upper
 * triangular but for 2×2 blocks of equal diagonal and off-diagonals of opposite sign: the complex pairs.
 * Sized well above the usual function length because the sweep is one inner loop.
 */

/** Exceptional shifts after so many steps without deflation. */
const EXCEPTIONAL = 10;
/** Steps allowed in all, for each row. */
const STEPS_PER_ROW = 30;
/** Subdiagonals below this, in matrices of entries about one, count as zero: their squares would underflow. */
const SMALLEST = 1e-140;

/** Values found, as real and imaginary parts; pairs adjacent, positive imaginary part first. */
export type SchurValues = { re: Float64Array; im: Float64Array };

/**
 * Works on rows and columns lo … hi (inclusive) of `h` (stride `n`), all of which is updated where `full` is
 * set; otherwise only the values are right. `zt` (Zᵀ, rows of `width`, when given) is multiplied from the left.
 * Returns the number of values found from hi upwards; hi − lo + 1 is success. `chase` is `chaseBulge` on these
 * arrays, or a quicker one.
 */
export function doubleShiftQr(
  h: Float64Array,
  n: number,
  lo: number,
  hi: number,
  full: boolean,
  values: SchurValues,
  zt?: Float64Array,
  width = n,
  chase: Chase = (bulge) => chaseBulge(h, n, bulge, zt, width),
): number {
  for (let j = lo; j + 2 <= hi; j++) {
    h[(j + 2) * n + j] = 0;
    if (j + 3 <= hi) h[(j + 3) * n + j] = 0;
  }
  let budget = STEPS_PER_ROW * Math.max(10, hi - lo + 1);
  let i = hi;
  let stalled = 0;
  while (i >= lo) {
    const l = smallSubdiagonal(h, n, lo, hi, i);
    if (l > lo) h[l * n + l - 1] = 0;
    if (l >= i - 1) {
      if (l === i) {
        values.re[i] = h[i * n + i];
        values.im[i] = 0;
      } else {
        standardise(h, n, i, full, values, zt, width);
      }
      stalled = 0;
      i = l - 1;
      continue;
    }
    if (budget-- === 0) return hi - i;
    stalled++;
    shifts(h, n, l, i, stalled, shiftRoom);
    const m = findStart(h, n, l, i, bulge);
    bulge.l = l;
    bulge.m = m;
    bulge.i = i;
    bulge.i1 = full ? 0 : l;
    bulge.i2 = full ? n - 1 : i;
    chase(bulge);
  }
  return hi - lo + 1;
}

/** Row of the lowest negligible subdiagonal at or above i, or `lo`. */
export function smallSubdiagonal(h: Float64Array, n: number, lo: number, hi: number, i: number): number {
  const ulp = Number.EPSILON;
  let k = i;
  for (; k > lo; k--) {
    const below = Math.abs(h[k * n + k - 1]);
    if (below <= SMALLEST) break;
    const previous = h[(k - 1) * n + k - 1];
    const own = h[k * n + k];
    let size = Math.abs(previous) + Math.abs(own);
    if (size === 0) {
      if (k - 2 >= lo) size += Math.abs(h[(k - 1) * n + k - 2]);
      if (k + 1 <= hi) size += Math.abs(h[(k + 1) * n + k]);
    }
    if (below > ulp * size) continue;
    const above = Math.abs(h[(k - 1) * n + k]);
    const [ab, ba] = below > above ? [below, above] : [above, below];
    const gap = Math.abs(previous - own);
    const [aa, bb] = Math.abs(own) > gap ? [Math.abs(own), gap] : [gap, Math.abs(own)];
    const s = aa + ab;
    if (ba * (ab / s) <= Math.max(SMALLEST, ulp * (bb * (aa / s)))) break;
  }
  return k;
}

/** The two shifts: eigenvalues of the trailing 2×2, or an exceptional pair; [re₁, im₁, re₂, im₂]. */
function shifts(h: Float64Array, n: number, l: number, i: number, stalled: number, out: Float64Array): void {
  let h11 = h[(i - 1) * n + i - 1];
  let h21 = h[i * n + i - 1];
  let h12 = h[(i - 1) * n + i];
  let h22 = h[i * n + i];
  if (stalled % EXCEPTIONAL === 0) {
    const bottom = stalled % (2 * EXCEPTIONAL) === 0;
    const s = bottom
      ? Math.abs(h21) + Math.abs(h[(i - 1) * n + i - 2])
      : Math.abs(h[(l + 1) * n + l]) + Math.abs(h[(l + 2) * n + l + 1]);
    h11 = 0.75 * s + h[bottom ? i * n + i : l * n + l];
    h12 = -0.4375 * s;
    h21 = s;
    h22 = h11;
  }
  const s = Math.abs(h11) + Math.abs(h12) + Math.abs(h21) + Math.abs(h22);
  out.fill(0);
  if (s === 0) return;
  h11 /= s;
  h21 /= s;
  h12 /= s;
  h22 /= s;
  const tr = (h11 + h22) / 2;
  const det = (h11 - tr) * (h22 - tr) - h12 * h21;
  const root = Math.sqrt(Math.abs(det));
  if (det >= 0) {
    out[0] = out[2] = tr * s;
    out[1] = root * s;
    out[3] = -root * s;
    return;
  }
  // Two real shifts: the nearer one to h22, twice.
  const nearer = Math.abs(tr + root - h22) <= Math.abs(tr - root - h22) ? tr + root : tr - root;
  out[0] = out[2] = nearer * s;
}

/** One double-shift step: rows m … i of an active block that begins at l, its first vector, and what it changes. */
export type Bulge = {
  l: number;
  m: number;
  i: number;
  /** Columns are changed from row i1 on, rows up to column i2. */
  i1: number;
  i2: number;
  v1: number;
  v2: number;
  v3: number;
};

export type Chase = (bulge: Bulge) => void;

const shiftRoom = new Float64Array(4);
const bulge: Bulge = { l: 0, m: 0, i: 0, i1: 0, i2: 0, v1: 0, v2: 0, v3: 0 };

/** Row at which a step may begin because two subdiagonals in a row are small; its first vector goes to `out`. */
function findStart(h: Float64Array, n: number, l: number, i: number, out: Bulge): number {
  const [rt1r, rt1i, rt2r, rt2i] = shiftRoom;
  let m = i - 2;
  for (; m >= l; m--) {
    const at = m * n + m;
    const own = h[at];
    const next = h[at + n + 1];
    const below = h[at + n];
    const s = Math.abs(own - rt2r) + Math.abs(rt2i) + Math.abs(below);
    const ratio = below / s;
    const v1 = ratio * h[at + 1] + (own - rt1r) * ((own - rt2r) / s) - rt1i * (rt2i / s);
    const v2 = ratio * (own + next - rt1r - rt2r);
    const v3 = ratio * h[at + 2 * n + 1];
    const size = Math.abs(v1) + Math.abs(v2) + Math.abs(v3);
    out.v1 = v1 / size;
    out.v2 = v2 / size;
    out.v3 = v3 / size;
    if (m === l) break;
    const around = Math.abs(h[at - n - 1]) + Math.abs(own) + Math.abs(next);
    const taken = Math.abs(h[at - 1]) * (Math.abs(out.v2) + Math.abs(out.v3));
    if (taken <= Number.EPSILON * Math.abs(out.v1) * around) break;
  }
  return m;
}

/** Chases the bulge of one step out of the block. */
export function chaseBulge(
  h: Float64Array,
  n: number,
  bulge: Bulge,
  zt: Float64Array | undefined,
  width: number,
): void {
  const { l, m, i, i1, i2 } = bulge;
  let { v1, v2, v3 } = bulge;
  for (let k = m; k < i; k++) {
    const three = k + 2 <= i;
    if (k > m) {
      v1 = h[k * n + k - 1];
      v2 = h[(k + 1) * n + k - 1];
      v3 = three ? h[(k + 2) * n + k - 1] : 0;
    }
    if (!three) v3 = 0;
    const tail = v2 * v2 + v3 * v3;
    let t1 = 0;
    let beta = v1;
    if (tail > 0) {
      const length = Math.sqrt(v1 * v1 + tail);
      beta = v1 >= 0 ? -length : length;
      t1 = (beta - v1) / beta;
      const scale = 1 / (v1 - beta);
      v2 *= scale;
      v3 *= scale;
    } else {
      v2 = 0;
      v3 = 0;
    }
    if (k > m) {
      h[k * n + k - 1] = beta;
      h[(k + 1) * n + k - 1] = 0;
      if (three) h[(k + 2) * n + k - 1] = 0;
    } else if (m > l) {
      // Not simply −h: v1 may have been the image of a tiny pair.
      h[k * n + k - 1] *= 1 - t1;
    }
    if (t1 === 0) continue;
    const row = k * n + k;
    if (three) {
      reflect3(h, row, 1, n, i2 - k + 1, v2, v3, t1);
      reflect3(h, i1 * n + k, n, 1, Math.min(k + 3, i) - i1 + 1, v2, v3, t1);
      if (zt) reflect3(zt, k * width, 1, width, width, v2, v3, t1);
    } else {
      reflect2(h, row, 1, n, i2 - k + 1, v2, t1);
      reflect2(h, i1 * n + k, n, 1, i - i1 + 1, v2, t1);
      if (zt) reflect2(zt, k * width, 1, width, width, v2, t1);
    }
  }
}

/**
 * Applies I − t₁ v vᵀ, v = (1, v₂, v₃), to `count` triples: entries `apart` from each other, triples `step` from
 * each other. Rows of a matrix of stride n from the left: step 1, apart n; columns from the right: step n, apart 1.
 */
export function reflect3(
  a: Float64Array,
  at: number,
  step: number,
  apart: number,
  count: number,
  v2: number,
  v3: number,
  t1: number,
): void {
  const t2 = t1 * v2;
  const t3 = t1 * v3;
  for (let k = 0, p = at; k < count; k++, p += step) {
    const x = a[p];
    const y = a[p + apart];
    const z = a[p + 2 * apart];
    const sum = x + v2 * y + v3 * z;
    a[p] = x - sum * t1;
    a[p + apart] = y - sum * t2;
    a[p + 2 * apart] = z - sum * t3;
  }
}

/** The same for pairs. */
export function reflect2(
  a: Float64Array,
  at: number,
  step: number,
  apart: number,
  count: number,
  v2: number,
  t1: number,
): void {
  const t2 = t1 * v2;
  for (let k = 0, p = at; k < count; k++, p += step) {
    const x = a[p];
    const y = a[p + apart];
    const sum = x + v2 * y;
    a[p] = x - sum * t1;
    a[p + apart] = y - sum * t2;
  }
}

/** Turns pairs that lie as those of `reflect2`. */
function rotate2(
  a: Float64Array,
  at: number,
  step: number,
  apart: number,
  count: number,
  cs: number,
  sn: number,
): void {
  for (let k = 0, p = at; k < count; k++, p += step) {
    const x = a[p];
    const y = a[p + apart];
    a[p] = cs * x + sn * y;
    a[p + apart] = cs * y - sn * x;
  }
}

/** Brings the 2×2 block at i − 1, i to standard form (LAPACK's dlanv2) and notes its two values. */
function standardise(
  h: Float64Array,
  n: number,
  i: number,
  full: boolean,
  values: SchurValues,
  zt: Float64Array | undefined,
  width: number,
): void {
  const p = (i - 1) * n + i - 1;
  const { a, b, c, d, cs, sn } = standardBlock(h[p], h[p + 1], h[p + n], h[p + n + 1]);
  h[p] = a;
  h[p + 1] = b;
  h[p + n] = c;
  h[p + n + 1] = d;
  values.re[i - 1] = a;
  values.re[i] = d;
  const root = c === 0 ? 0 : Math.sqrt(Math.abs(b)) * Math.sqrt(Math.abs(c));
  values.im[i - 1] = root;
  values.im[i] = root === 0 ? 0 : -root;
  if (full) {
    rotate2(h, (i - 1) * n + i + 1, 1, n, n - 1 - i, cs, sn);
    rotate2(h, i - 1, n, 1, i - 1, cs, sn);
  }
  if (zt) rotate2(zt, (i - 1) * width, 1, width, width, cs, sn);
}

export type Block = { a: number; b: number; c: number; d: number; cs: number; sn: number };

/** Schur form of [a b; c d]: either c = 0, or a = d and b c < 0. */
export function standardBlock(a: number, b: number, c: number, d: number): Block {
  if (c === 0) return { a, b, c, d, cs: 1, sn: 0 };
  if (b === 0) return { a: d, b: -c, c: 0, d: a, cs: 0, sn: 1 };
  if (a - d === 0 && Math.sign(b) !== Math.sign(c)) return { a, b, c, d, cs: 1, sn: 0 };
  let p = 0.5 * (a - d);
  const most = Math.max(Math.abs(b), Math.abs(c));
  const least = Math.min(Math.abs(b), Math.abs(c)) * Math.sign(b) * Math.sign(c);
  const scale = Math.max(Math.abs(p), most);
  const z = (p / scale) * p + (most / scale) * least;
  if (z >= 4 * Number.EPSILON) {
    const root = Math.sqrt(scale) * Math.sqrt(z);
    const lead = p + (p >= 0 ? root : -root);
    const length = Math.hypot(c, lead);
    return { a: d + lead, b: b - c, c: 0, d: d - (most / lead) * least, cs: lead / length, sn: c / length };
  }
  // Complex, or real and nearly equal: make the diagonal equal.
  const sigma = b + c;
  const length = Math.hypot(sigma, a - d);
  let cs = Math.sqrt(0.5 * (1 + Math.abs(sigma) / length));
  let sn = -(p / (length * cs)) * (sigma >= 0 ? 1 : -1);
  const aa = a * cs + b * sn;
  const bb = -a * sn + b * cs;
  const cc = c * cs + d * sn;
  const dd = -c * sn + d * cs;
  let [na, nb, nc, nd] = [aa * cs + cc * sn, bb * cs + dd * sn, -aa * sn + cc * cs, -bb * sn + dd * cs];
  const mean = 0.5 * (na + nd);
  na = mean;
  nd = mean;
  if (nc !== 0 && nb === 0) return { a: na, b: -nc, c: 0, d: nd, cs: -sn, sn: cs };
  if (nc !== 0 && Math.sign(nb) === Math.sign(nc)) {
    // Real roots after all: reduce to triangular form.
    const [sab, sac] = [Math.sqrt(Math.abs(nb)), Math.sqrt(Math.abs(nc))];
    p = nc >= 0 ? sab * sac : -sab * sac;
    const tau = 1 / Math.sqrt(Math.abs(nb + nc));
    const [cs1, sn1] = [sab * tau, sac * tau];
    [cs, sn] = [cs * cs1 - sn * sn1, cs * sn1 + sn * cs1];
    return { a: mean + p, b: nb - nc, c: 0, d: mean - p, cs, sn };
  }
  return { a: na, b: nb, c: nc, d: nd, cs, sn };
}
