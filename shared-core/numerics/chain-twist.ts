/**
 * Factorisations of Q(z) = z² I + z C + K of a chain from both ends.
 *
 * Method: pivots from the top and from the bottom that meet where γ is smallest, the twisted factorisation of
 * Dhillon & Parlett, Linear Algebra Appl. 387, 2004, here complex symmetric; Rayleigh corrections with its vectors.
 */
import { BandForm } from "./band-quadratic.ts";
import type { ChainQuadratic } from "./chain-quadratic.ts";
import type { DeterminantForm } from "./modes-together.ts";
import { maxAbs } from "./products.ts";
import type { SymmetricBand } from "./sparse.ts";

/** Corrections allowed for one value. */
const POLISH_CAP = 6;
/** Smallest pivot, relative to entries of size one: a zero pivot becomes this instead. */
const PIVOT_FLOOR = 1e-290;

/** Workspace and results of factorisations of Q(z) = z² I + z C + K from both ends. */
export class Twist implements DeterminantForm {
  readonly size: number;
  readonly traces: DeterminantForm["traces"];
  /** Value after `polish`. */
  readonly value = { re: 0, im: 0 };
  /** Vector of the last twisted factorisation, unit 2-norm after `polish`. */
  readonly vectorRe: Float64Array;
  readonly vectorIm: Float64Array;
  private readonly q: ChainQuadratic;
  private readonly n: number;
  /** The same as a band, made when inverse iteration is needed. */
  private band: BandForm | undefined;
  /** Bound of |z|‖C‖ + ‖K‖ for |z| ≤ 1, for judging residuals. */
  private readonly scale: number;
  private readonly downRe: Float64Array;
  private readonly downIm: Float64Array;
  private readonly upRe: Float64Array;
  private readonly upIm: Float64Array;

  constructor(q: ChainQuadratic) {
    const n = q.k.length;
    this.q = q;
    this.size = n;
    this.traces = tracesOf(q);
    this.scale = 1 + 2 * maxAbs(q.c) + 2 * maxAbs(q.cOff);
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

  damp(x: Float64Array, out: Float64Array): void {
    const { c, cOff } = this.q;
    for (let i = 0; i < this.n; i++) {
      out[i] = c[i] * x[i] + (i > 0 ? cOff[i - 1] * x[i - 1] : 0) + (i + 1 < this.n ? cOff[i] * x[i + 1] : 0);
    }
  }

  vectorBeside(re: number, im: number, clean: (x: Float64Array, y: Float64Array) => void): boolean {
    const { c, cOff, k, kOff } = this.q;
    this.band ??= new BandForm(asBand(c, cOff), asBand(k, kOff), Math.min(1, this.n - 1));
    if (!this.band.vectorBeside(re, im, clean)) return false;
    this.vectorRe.set(this.band.vectorRe);
    this.vectorIm.set(this.band.vectorIm);
    return true;
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
      // The vector in hand belongs to the value before the move, so the move itself must be rounding: of the
      // value, or (stagnating) of the residual γ against the size of Q.
      const stuck = move >= 0.25 * before && this.residual() <= 8 * Number.EPSILON * this.scale;
      if (move <= 4 * Number.EPSILON * size || stuck) {
        this.value.re = x;
        this.value.im = y;
        this.normalise();
        return zi === 0 || y > 0;
      }
      before = move;
    }
    return false;
  }

  /** ‖Q ψ‖ / ‖ψ‖ */
  private residual(): number {
    const { n, vectorRe: x, vectorIm: y } = this;
    let sum = 0;
    for (let i = 0; i < n; i++) sum += x[i] * x[i] + y[i] * y[i];
    return Math.sqrt((this.gammaRe * this.gammaRe + this.gammaIm * this.gammaIm) / sum);
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

function tracesOf(q: ChainQuadratic): DeterminantForm["traces"] {
  const traces = { c: 0, cSquared: 0, k: 0 };
  for (let i = 0; i < q.k.length; i++) {
    traces.c += q.c[i];
    traces.k += q.k[i];
    traces.cSquared += q.c[i] * q.c[i] + (i > 0 ? 2 * q.cOff[i - 1] * q.cOff[i - 1] : 0);
  }
  return traces;
}

function asBand(diagonal: Float64Array, off: Float64Array): SymmetricBand {
  const n = diagonal.length;
  if (n === 1) return { n, bandwidth: 0, values: Float64Array.from(diagonal) };
  const values = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) {
    values[2 * i + 1] = diagonal[i];
    if (i > 0) values[2 * i] = off[i - 1];
  }
  return { n, bandwidth: 1, values };
}
