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
 * Returns the number of values found from hi upwards; hi − lo + 1 is success.
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
    doubleStep(h, n, l, i, full ? 0 : l, full ? n - 1 : i, stalled, zt, width);
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

const shiftRoom = new Float64Array(4);

function doubleStep(
  h: Float64Array,
  n: number,
  l: number,
  i: number,
  i1: number,
  i2: number,
  stalled: number,
  zt: Float64Array | undefined,
  width: number,
): void {
  shifts(h, n, l, i, stalled, shiftRoom);
  const [rt1r, rt1i, rt2r, rt2i] = shiftRoom;
  let v1 = 0;
  let v2 = 0;
  let v3 = 0;
  let m = i - 2;
  for (; m >= l; m--) {
    const at = m * n + m;
    const own = h[at];
    const next = h[at + n + 1];
    const below = h[at + n];
    const s = Math.abs(own - rt2r) + Math.abs(rt2i) + Math.abs(below);
    const ratio = below / s;
    v1 = ratio * h[at + 1] + (own - rt1r) * ((own - rt2r) / s) - rt1i * (rt2i / s);
    v2 = ratio * (own + next - rt1r - rt2r);
    v3 = ratio * h[at + 2 * n + 1];
    const size = Math.abs(v1) + Math.abs(v2) + Math.abs(v3);
    v1 /= size;
    v2 /= size;
    v3 /= size;
    if (m === l) break;
    const around = Math.abs(h[at - n - 1]) + Math.abs(own) + Math.abs(next);
    if (Math.abs(h[at - 1]) * (Math.abs(v2) + Math.abs(v3)) <= Number.EPSILON * Math.abs(v1) * around) break;
  }
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
    if (three) {
      reflectRows3(h, k * n, n, k, i2, v2, v3, t1);
      reflectColumns3(h, n, k, i1, Math.min(k + 3, i), v2, v3, t1);
      if (zt) reflectRows3(zt, k * width, width, 0, width - 1, v2, v3, t1);
    } else {
      reflectRows2(h, k * n, n, k, i2, v2, t1);
      reflectColumns2(h, n, k, i1, i, v2, t1);
      if (zt) reflectRows2(zt, k * width, width, 0, width - 1, v2, t1);
    }
  }
}

export function reflectRows3(
  h: Float64Array,
  row: number,
  stride: number,
  from: number,
  to: number,
  v2: number,
  v3: number,
  t1: number,
): void {
  const t2 = t1 * v2;
  const t3 = t1 * v3;
  const end = row + to;
  for (let p = row + from; p <= end; p++) {
    const a = h[p];
    const b = h[p + stride];
    const c = h[p + 2 * stride];
    const sum = a + v2 * b + v3 * c;
    h[p] = a - sum * t1;
    h[p + stride] = b - sum * t2;
    h[p + 2 * stride] = c - sum * t3;
  }
}

export function reflectRows2(
  h: Float64Array,
  row: number,
  stride: number,
  from: number,
  to: number,
  v2: number,
  t1: number,
): void {
  const t2 = t1 * v2;
  const end = row + to;
  for (let p = row + from; p <= end; p++) {
    const a = h[p];
    const b = h[p + stride];
    const sum = a + v2 * b;
    h[p] = a - sum * t1;
    h[p + stride] = b - sum * t2;
  }
}

export function reflectColumns3(
  h: Float64Array,
  n: number,
  k: number,
  from: number,
  to: number,
  v2: number,
  v3: number,
  t1: number,
): void {
  const t2 = t1 * v2;
  const t3 = t1 * v3;
  for (let p = from * n + k; p <= to * n + k; p += n) {
    const a = h[p];
    const b = h[p + 1];
    const c = h[p + 2];
    const sum = a + v2 * b + v3 * c;
    h[p] = a - sum * t1;
    h[p + 1] = b - sum * t2;
    h[p + 2] = c - sum * t3;
  }
}

export function reflectColumns2(
  h: Float64Array,
  n: number,
  k: number,
  from: number,
  to: number,
  v2: number,
  t1: number,
): void {
  const t2 = t1 * v2;
  for (let p = from * n + k; p <= to * n + k; p += n) {
    const a = h[p];
    const b = h[p + 1];
    const sum = a + v2 * b;
    h[p] = a - sum * t1;
    h[p + 1] = b - sum * t2;
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
    for (let j = i + 1; j < n; j++) {
      const upper = h[(i - 1) * n + j];
      const lower = h[i * n + j];
      h[(i - 1) * n + j] = cs * upper + sn * lower;
      h[i * n + j] = cs * lower - sn * upper;
    }
    for (let r = 0; r < i - 1; r++) {
      const left = h[r * n + i - 1];
      const right = h[r * n + i];
      h[r * n + i - 1] = cs * left + sn * right;
      h[r * n + i] = cs * right - sn * left;
    }
  }
  if (!zt) return;
  for (let j = 0; j < width; j++) {
    const upper = zt[(i - 1) * width + j];
    const lower = zt[i * width + j];
    zt[(i - 1) * width + j] = cs * upper + sn * lower;
    zt[i * width + j] = cs * lower - sn * upper;
  }
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
