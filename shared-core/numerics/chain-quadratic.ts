/**
 * Damped modes of a chain: (λ² I + λ C + K) ψ = 0 with C and K symmetric tridiagonal.
 *
 * Method: undamped frequencies by QL, first guesses from each mode's own damping, all values together by
 * Ehrlich-Aberth steps on the determinant (O(n) each), then one or two Rayleigh corrections a value with vectors
 * from the twisted factorisation (Dhillon & Parlett, Linear Algebra Appl. 387, 2004, here complex symmetric).
 * The result is checked: sums of the values and of their squares against traces, every residual, and no value
 * found twice. Where a check fails, nothing is returned and the caller takes the dense way.
 */
import { ehrlichAberth, type RootItems } from "./ehrlich-aberth.ts";
import { implicitQl, sortAscending } from "./tridiagonal-ql.ts";

/** Diagonals (n) and off-diagonals (n − 1) of C and K, scaled so that ‖K‖ is about one. */
export type ChainQuadratic = {
  c: Float64Array;
  cOff: Float64Array;
  k: Float64Array;
  kOff: Float64Array;
};

/** The 2n values, pairs adjacent with the positive imaginary part first, and their vectors as rows. */
export type ChainModes = { re: Float64Array; im: Float64Array; rowsRe: Float64Array; rowsIm: Float64Array };

/** Newton steps below this relative size leave the rest to the Rayleigh corrections, which square the error. */
const COARSE = 1e-7;
/** Corrections allowed for one value. */
const POLISH_CAP = 6;
/** Smallest pivot, relative to entries of size one: a zero pivot becomes this instead. */
const PIVOT_FLOOR = 1e-290;

/** Undefined where the checks do not hold: repeated or defective values, or no convergence. */
export function chainModes(q: ChainQuadratic): ChainModes | undefined {
  const n = q.k.length;
  const parts = connectedParts(q);
  const out: ChainModes = {
    re: new Float64Array(2 * n),
    im: new Float64Array(2 * n),
    rowsRe: new Float64Array(2 * n * n),
    rowsIm: new Float64Array(2 * n * n),
  };
  let at = 0;
  for (const [first, end] of parts) {
    const part: ChainQuadratic = {
      c: q.c.subarray(first, end),
      cOff: q.cOff.subarray(first, Math.max(first, end - 1)),
      k: q.k.subarray(first, end),
      kOff: q.kOff.subarray(first, Math.max(first, end - 1)),
    };
    if (!solvePart(part, n, first, at, out)) return undefined;
    at += 2 * (end - first);
  }
  return out;
}

/** Ranges [first, end) without coupling between them. */
function connectedParts(q: ChainQuadratic): [number, number][] {
  const parts: [number, number][] = [];
  let first = 0;
  for (let i = 0; i < q.k.length; i++) {
    if (i + 1 < q.k.length && (q.kOff[i] !== 0 || q.cOff[i] !== 0)) continue;
    parts.push([first, i + 1]);
    first = i + 1;
  }
  return parts;
}

/** Solves one connected part into `out`: values from `at` on, vectors at coordinates `first` … */
function solvePart(q: ChainQuadratic, n: number, first: number, at: number, out: ChainModes): boolean {
  const size = q.k.length;
  const twist = new Twist(q);
  const starts = firstGuesses(q, twist);
  if (!starts) return false;
  const { items, rigid, zeros } = starts;
  if (!ehrlichAberth(items, zeros, COARSE, (re, im, g) => twist.logDerivative(re, im, g))) return false;
  let t = at;
  for (let z = 0; z < zeros; z++, t++) {
    for (let i = 0; i < size; i++) out.rowsRe[t * n + first + i] = rigid[i];
  }
  for (let j = 0; j < items.re.length; j++) {
    const polished = twist.polish(items.re[j], items.im[j]);
    if (!polished) return false;
    out.re[t] = twist.re;
    out.im[t] = twist.im;
    out.rowsRe.set(twist.vectorRe, t * n + first);
    out.rowsIm.set(twist.vectorIm, t * n + first);
    t++;
    if (items.im[j] === 0) continue;
    out.re[t] = twist.re;
    out.im[t] = -twist.im;
    out.rowsRe.set(twist.vectorRe, t * n + first);
    for (let i = 0; i < size; i++) out.rowsIm[t * n + first + i] = -twist.vectorIm[i];
    t++;
  }
  return t === at + 2 * size && allThere(q, out, at, t) && allDistinct(out, at, t, zeros);
}

/** Σλ = −tr C and Σλ² = tr C² − 2 tr K, to what rounding allows: a value found twice for another shows here. */
function allThere(q: ChainQuadratic, out: ChainModes, at: number, end: number): boolean {
  const size = q.k.length;
  let sum = 0;
  let squares = 0;
  let scale = 0;
  for (let t = at; t < end; t++) {
    sum += out.re[t];
    squares += (out.re[t] - out.im[t]) * (out.re[t] + out.im[t]);
    scale = Math.max(scale, Math.abs(out.re[t]), Math.abs(out.im[t]));
  }
  let trace = 0;
  let traceSquares = 0;
  for (let i = 0; i < size; i++) {
    trace += q.c[i];
    traceSquares += q.c[i] * q.c[i] - 2 * q.k[i];
    if (i + 1 < size) traceSquares += 2 * q.cOff[i] * q.cOff[i];
  }
  const tolerance = 1e-13 * size;
  return (
    Math.abs(sum + trace) <= tolerance * scale &&
    Math.abs(squares - traceSquares) <= tolerance * scale * scale
  );
}

/**
 * No two values of a connected chain may agree: such a value is defective (its matrix has rank n − 1), and the
 * corrections do not converge on it; agreement within 1e-9 means one of two neighbours was found twice.
 */
function allDistinct(out: ChainModes, at: number, end: number, zeros: number): boolean {
  const order = Array.from({ length: end - at - zeros }, (_, t) => at + zeros + t);
  order.sort((a, b) => out.im[a] - out.im[b] || out.re[a] - out.re[b]);
  for (let s = 0; s < order.length; s++) {
    const a = order[s];
    const near = 1e-9 * (Math.abs(out.re[a]) + Math.abs(out.im[a]));
    for (let r = s + 1; r < order.length && out.im[order[r]] - out.im[a] <= near; r++) {
      if (Math.abs(out.re[order[r]] - out.re[a]) <= near) return false;
    }
  }
  return true;
}

type Starts = { items: RootItems; rigid: Float64Array; zeros: number };

/** Roots of z² + d z + ω² for each undamped mode, d its own damping; a rigid-body mode is set aside exactly. */
function firstGuesses(q: ChainQuadratic, twist: Twist): Starts | undefined {
  const n = q.k.length;
  const values = Float64Array.from(q.k);
  if (!implicitQl(values, Float64Array.from(q.kOff), n)) return undefined;
  sortAscending(values, n);
  const items: RootItems = { re: [], im: [] };
  const rigid = new Float64Array(n);
  let zeros = 0;
  for (let j = 0; j < n; j++) {
    twist.undampedVector(values[j]);
    const { vectorRe: v } = twist;
    const d = bandForm(q.c, q.cOff, v);
    // A chain has at most one rigid-body motion, and rounding hides anything softer.
    if (j === 0 && Math.abs(values[0]) <= 8 * n * Number.EPSILON) {
      rigid.set(v);
      zeros = Math.abs(d) <= 8 * n * Number.EPSILON * maxOf(q.c) ? 2 : 1;
      if (zeros === 1) {
        items.re.push(-d);
        items.im.push(0);
      }
      continue;
    }
    const inner = 0.25 * d * d - values[j];
    if (inner < 0) {
      items.re.push(-0.5 * d);
      items.im.push(Math.sqrt(-inner));
    } else {
      const large = -(0.5 * d + (d >= 0 ? 1 : -1) * Math.sqrt(inner));
      const small = values[j] / large;
      items.re.push(large, small === large ? small * 0.999 : small);
      items.im.push(0, 0);
    }
  }
  return { items, rigid, zeros };
}

function maxOf(v: Float64Array): number {
  return v.reduce((most, x) => Math.max(most, Math.abs(x)), 0);
}

/** vᵀ A v for a tridiagonal A. */
function bandForm(diagonal: Float64Array, off: Float64Array, v: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < diagonal.length; i++) {
    sum += diagonal[i] * v[i] * v[i];
    if (i + 1 < diagonal.length) sum += 2 * off[i] * v[i] * v[i + 1];
  }
  return sum;
}

/** Workspace and results of factorisations of Q(z) = z² I + z C + K from both ends. */
class Twist {
  /** Value after `polish`. */
  re = 0;
  im = 0;
  /** Vector of the last twisted factorisation, unit 2-norm after `polish`. */
  readonly vectorRe: Float64Array;
  readonly vectorIm: Float64Array;
  private readonly q: ChainQuadratic;
  private readonly n: number;
  private readonly downRe: Float64Array;
  private readonly downIm: Float64Array;
  private readonly upRe: Float64Array;
  private readonly upIm: Float64Array;

  constructor(q: ChainQuadratic) {
    const n = q.k.length;
    this.q = q;
    this.n = n;
    this.vectorRe = new Float64Array(n);
    this.vectorIm = new Float64Array(n);
    this.downRe = new Float64Array(n);
    this.downIm = new Float64Array(n);
    this.upRe = new Float64Array(n);
    this.upIm = new Float64Array(n);
  }

  /**
   * f′/f of f = det Q at z: Σ dᵢ′/dᵢ over the pivots dᵢ = aᵢ − bᵢ² / dᵢ₋₁ and their derivatives in z.
   */
  logDerivative(zr: number, zi: number, out: Float64Array): void {
    const { c, cOff, k, kOff } = this.q;
    const sr = zr * zr - zi * zi;
    const si = 2 * zr * zi;
    // r = 1/dᵢ₋₁ and g = dᵢ₋₁′/dᵢ₋₁ of the row before.
    let rr = 0;
    let ri = 0;
    let gr = 0;
    let gi = 0;
    let sumR = 0;
    let sumI = 0;
    for (let i = 0; i < this.n; i++) {
      let dr = sr + zr * c[i] + k[i];
      let di = si + zi * c[i];
      let er = 2 * zr + c[i];
      let ei = 2 * zi;
      if (i > 0) {
        const co = cOff[i - 1];
        const br = zr * co + kOff[i - 1];
        const bi = zi * co;
        // t = b²/d, t′ = (2 b b′ − b² d′/d) / d = t (2 b′/b) − t g, written without dividing by b.
        const pr = br * rr - bi * ri;
        const pi = br * ri + bi * rr;
        const tr = br * pr - bi * pi;
        const ti = br * pi + bi * pr;
        dr -= tr;
        di -= ti;
        er -= 2 * co * pr - (tr * gr - ti * gi);
        ei -= 2 * co * pi - (tr * gi + ti * gr);
      }
      const square = dr * dr + di * di;
      if (square > PIVOT_FLOOR) {
        const inverse = 1 / square;
        rr = dr * inverse;
        ri = -di * inverse;
      } else {
        rr = 1e145;
        ri = 0;
      }
      gr = er * rr - ei * ri;
      gi = er * ri + ei * rr;
      sumR += gr;
      sumI += gi;
    }
    out[0] = sumR;
    out[1] = sumI;
  }

  /** Vector of K for an undamped value, real, unit 2-norm. */
  undampedVector(value: number): void {
    this.factor(-value, 0, 0, 0);
    this.solve(0, 0);
    this.normalise();
  }

  /** Corrects z by Rayleigh steps until they are rounding; false where they do not settle. */
  polish(zr: number, zi: number): boolean {
    let x = zr;
    let y = zi;
    let before = Number.POSITIVE_INFINITY;
    for (let step = 0; step < POLISH_CAP; step++) {
      this.factor(x * x - y * y, 2 * x * y, x, y);
      const k = this.solve(x, y);
      const [dr, di] = this.derivativeForm(x, y);
      const square = dr * dr + di * di;
      // Q ψ = γ e_k with ψ_k = 1, so ψᵀQψ = γ: the correction is γ / ψᵀQ′ψ.
      const moveR = (this.gammaRe * dr + this.gammaIm * di) / square;
      const moveI = (this.gammaIm * dr - this.gammaRe * di) / square;
      const move = Math.sqrt(moveR * moveR + moveI * moveI);
      const size = Math.sqrt(x * x + y * y);
      if (!(move <= 1e-3 * size) || k < 0) return false;
      x -= moveR;
      if (zi > 0) y -= moveI;
      // The vector in hand belongs to the value before the move, so the move itself must be rounding.
      if (move <= 4 * Number.EPSILON * size || (move >= 0.25 * before && move <= 1e-11 * size)) {
        this.re = x;
        this.im = y;
        this.normalise();
        return zi === 0 || y > 0;
      }
      before = move;
    }
    return false;
  }

  private gammaRe = 0;
  private gammaIm = 0;
  private twistAt = 0;

  /** Pivots of s I + z C + K from the top (down) and the bottom (up), and the twist with the smallest γ. */
  private factor(sr: number, si: number, zr: number, zi: number): void {
    const { n, downRe, downIm, upRe, upIm } = this;
    const { c, cOff, k, kOff } = this.q;
    for (let i = 0; i < n; i++) {
      let dr = sr + zr * c[i] + k[i];
      let di = si + zi * c[i];
      if (i > 0) {
        const br = zr * cOff[i - 1] + kOff[i - 1];
        const bi = zi * cOff[i - 1];
        const pr = downRe[i - 1];
        const pi = downIm[i - 1];
        const inverse = 1 / (pr * pr + pi * pi);
        const qr = br * br - bi * bi;
        const qi = 2 * br * bi;
        dr -= (qr * pr + qi * pi) * inverse;
        di -= (qi * pr - qr * pi) * inverse;
      }
      if (dr * dr + di * di < PIVOT_FLOOR) dr = 1e-145;
      downRe[i] = dr;
      downIm[i] = di;
    }
    for (let i = n - 1; i >= 0; i--) {
      let dr = sr + zr * c[i] + k[i];
      let di = si + zi * c[i];
      if (i + 1 < n) {
        const br = zr * cOff[i] + kOff[i];
        const bi = zi * cOff[i];
        const pr = upRe[i + 1];
        const pi = upIm[i + 1];
        const inverse = 1 / (pr * pr + pi * pi);
        const qr = br * br - bi * bi;
        const qi = 2 * br * bi;
        dr -= (qr * pr + qi * pi) * inverse;
        di -= (qi * pr - qr * pi) * inverse;
      }
      if (dr * dr + di * di < PIVOT_FLOOR) dr = 1e-145;
      upRe[i] = dr;
      upIm[i] = di;
    }
    let least = Number.POSITIVE_INFINITY;
    for (let i = 0; i < n; i++) {
      const gr = downRe[i] + upRe[i] - (sr + zr * c[i] + k[i]);
      const gi = downIm[i] + upIm[i] - (si + zi * c[i]);
      const size = gr * gr + gi * gi;
      if (size >= least) continue;
      least = size;
      this.gammaRe = gr;
      this.gammaIm = gi;
      this.twistAt = i;
    }
  }

  /** The vector with Q ψ = γ e_k, ψ_k = 1; returns k, or −1 where it overflows. */
  private solve(zr: number, zi: number): number {
    const { n, downRe, downIm, upRe, upIm, vectorRe: x, vectorIm: y, twistAt: k } = this;
    const { cOff, kOff } = this.q;
    x[k] = 1;
    y[k] = 0;
    for (let i = k - 1; i >= 0; i--)
      step(x, y, i, i + 1, zr * cOff[i] + kOff[i], zi * cOff[i], downRe[i], downIm[i]);
    for (let i = k + 1; i < n; i++) {
      step(x, y, i, i - 1, zr * cOff[i - 1] + kOff[i - 1], zi * cOff[i - 1], upRe[i], upIm[i]);
    }
    let sum = 0;
    for (let i = 0; i < n; i++) sum += x[i] * x[i] + y[i] * y[i];
    return Number.isFinite(sum) ? k : -1;
  }

  /** ψᵀ (2z I + C) ψ */
  private derivativeForm(zr: number, zi: number): [number, number] {
    const { n, vectorRe: x, vectorIm: y } = this;
    const { c, cOff } = this.q;
    let sr = 0;
    let si = 0;
    for (let i = 0; i < n; i++) {
      const pr = x[i] * x[i] - y[i] * y[i];
      const pi = 2 * x[i] * y[i];
      const dr = 2 * zr + c[i];
      sr += dr * pr - 2 * zi * pi;
      si += dr * pi + 2 * zi * pr;
      if (i + 1 === n || cOff[i] === 0) continue;
      sr += 2 * cOff[i] * (x[i] * x[i + 1] - y[i] * y[i + 1]);
      si += 2 * cOff[i] * (x[i] * y[i + 1] + y[i] * x[i + 1]);
    }
    return [sr, si];
  }

  private normalise(): void {
    const { n, vectorRe: x, vectorIm: y } = this;
    let sum = 0;
    for (let i = 0; i < n; i++) sum += x[i] * x[i] + y[i] * y[i];
    const scale = 1 / Math.sqrt(sum);
    for (let i = 0; i < n; i++) {
      x[i] *= scale;
      y[i] *= scale;
    }
  }
}

/** ψ_to = −(b / d) ψ_from */
function step(
  x: Float64Array,
  y: Float64Array,
  to: number,
  from: number,
  br: number,
  bi: number,
  dr: number,
  di: number,
): void {
  const inverse = -1 / (dr * dr + di * di);
  const qr = (br * dr + bi * di) * inverse;
  const qi = (bi * dr - br * di) * inverse;
  x[to] = qr * x[from] - qi * y[from];
  y[to] = qr * y[from] + qi * x[from];
}
