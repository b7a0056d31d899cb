/**
 * Damped modes of banded models (trees, ladders, frames after reordering): (λ² I + λ C + K) ψ = 0 with C and K
 * symmetric banded.
 *
 * Method: undamped modes for first guesses, all values together on the determinant (modes-together.ts) through
 * L D Lᵀ and its derivative in λ, n·b² complex multiply-adds a step, then Rayleigh corrections with vectors from
 * inverse iteration on the pivoted band LU. Checked; undefined where the dense way is to be taken.
 */
import { type BandLu, bandLuWorkspace, factorBandLu, solveBandLu } from "./band-lu.ts";
import type { Pairs } from "./modal-pairs.ts";
import {
  type DeterminantForm,
  guessMode,
  rigidStarts,
  type Starts,
  solveTogether,
  toUnit,
} from "./modes-together.ts";
import { maxAbs } from "./products.ts";
import type { SymmetricBand } from "./sparse.ts";
import { symmetricEigen } from "./symmetric-eigen.ts";

/** Corrections allowed for one value. */
const POLISH_CAP = 8;
/** Squared size below which a pivot is replaced, in matrices of entries about one. */
const PIVOT_FLOOR = 1e-290;

/** C and K of one size and bandwidth, scaled so that ‖K‖ is about one; values and vectors (rows) as found. */
export function bandModes(c: SymmetricBand, k: SymmetricBand): Pairs | undefined {
  const { n, bandwidth } = k;
  const out: Pairs = {
    re: new Float64Array(2 * n),
    im: new Float64Array(2 * n),
    rowsRe: new Float64Array(2 * n * n),
    rowsIm: new Float64Array(2 * n * n),
  };
  let first = 0;
  for (const end of partEnds(c, k)) {
    const form = new BandForm(
      cutBand(c, first, end),
      cutBand(k, first, end),
      Math.min(bandwidth, end - first - 1),
    );
    const starts = firstGuesses(form);
    if (!starts || !solveTogether(form, starts, out, n, first, 2 * first)) return undefined;
    first = end;
  }
  return out;
}

/** Ends of the ranges without coupling between them. */
function partEnds(c: SymmetricBand, k: SymmetricBand): number[] {
  const { n, bandwidth: b } = k;
  const ends: number[] = [];
  let reach = n;
  const firstOf = new Int32Array(n);
  for (let i = 0; i < n; i++) {
    firstOf[i] = i;
    for (let j = Math.max(0, i - b); j < i; j++) {
      const p = i * (b + 1) + j - i + b;
      if (c.values[p] !== 0 || k.values[p] !== 0) {
        firstOf[i] = j;
        break;
      }
    }
  }
  // Backwards: a cut lies before i where no row from i on reaches further up.
  for (let i = n - 1; i >= 0; i--) {
    reach = Math.min(reach, firstOf[i]);
    if (reach === i) ends.unshift(i);
  }
  ends.shift();
  ends.push(n);
  return ends;
}

/** Rows first … end − 1 as a band of their own, of the bandwidth that can be filled. */
function cutBand(a: SymmetricBand, first: number, end: number): SymmetricBand {
  const n = end - first;
  const bandwidth = Math.min(a.bandwidth, n - 1);
  const values = new Float64Array(n * (bandwidth + 1));
  for (let i = 0; i < n; i++) {
    for (let j = Math.max(0, i - bandwidth); j <= i; j++) {
      values[i * (bandwidth + 1) + j - i + bandwidth] =
        a.values[(first + i) * (a.bandwidth + 1) + j - i + a.bandwidth];
    }
  }
  return { n, bandwidth, values };
}

function firstGuesses(form: BandForm): Starts | undefined {
  const { size: n } = form;
  const solved = symmetricEigen(form.denseStiffness(), n);
  if (!solved.ok) return undefined;
  const { values, vectors } = solved.value;
  const items = { re: [], im: [] };
  const rigid: Float64Array[] = [];
  for (let j = 0; j < n; j++) {
    const v = Float64Array.from({ length: n }, (_, i) => vectors[i * n + j]);
    // Rounding hides anything softer than this.
    if (Math.abs(values[j]) <= 8 * n * Number.EPSILON) rigid.push(v);
    else guessMode(items, values[j], form.damping(v, v));
  }
  if (rigid.length === 0) return { items, zeroVectors: [] };
  const zeroVectors = rigidStarts(rigid, (a, b) => form.damping(a, b), form.dampingScale, items);
  return zeroVectors && { items, zeroVectors };
}

export class BandForm implements DeterminantForm {
  readonly size: number;
  readonly traces = { c: 0, cSquared: 0, k: 0 };
  readonly value = { re: 0, im: 0 };
  readonly vectorRe: Float64Array;
  readonly vectorIm: Float64Array;
  readonly dampingScale: number;
  private readonly b: number;
  private readonly c: Float64Array;
  private readonly k: Float64Array;
  private readonly lu: BandLu;
  private readonly re: Float64Array;
  private readonly im: Float64Array;
  /** L and 1/d, their derivatives, and one row of L D with its derivative. */
  private readonly lr: Float64Array;
  private readonly li: Float64Array;
  private readonly mr: Float64Array;
  private readonly mi: Float64Array;
  private readonly ur: Float64Array;
  private readonly ui: Float64Array;
  private readonly wr: Float64Array;
  private readonly wi: Float64Array;

  constructor(c: SymmetricBand, k: SymmetricBand, bandwidth: number) {
    const n = k.n;
    const room = () => new Float64Array(n * (bandwidth + 1));
    this.size = n;
    this.b = bandwidth;
    this.c = c.values;
    this.k = k.values;
    this.lu = bandLuWorkspace(n, bandwidth);
    [this.re, this.im, this.lr, this.li, this.mr, this.mi] = [room(), room(), room(), room(), room(), room()];
    const row = () => new Float64Array(bandwidth + 1);
    [this.ur, this.ui, this.wr, this.wi] = [row(), row(), row(), row()];
    this.vectorRe = new Float64Array(n);
    this.vectorIm = new Float64Array(n);
    this.dampingScale = maxAbs(c.values);
    for (let p = 0; p < c.values.length; p++) {
      const onDiagonal = p % (bandwidth + 1) === bandwidth;
      if (onDiagonal) {
        this.traces.c += c.values[p];
        this.traces.k += k.values[p];
      }
      this.traces.cSquared += (onDiagonal ? 1 : 2) * c.values[p] * c.values[p];
    }
  }

  denseStiffness(): Float64Array {
    const { size: n, b, k } = this;
    const out = new Float64Array(n * n);
    for (let i = 0; i < n; i++) {
      for (let j = Math.max(0, i - b); j <= i; j++) out[i * n + j] = k[i * (b + 1) + j - i + b];
    }
    return out;
  }

  /** xᵀ C y */
  damping(x: Float64Array, y: Float64Array): number {
    const { size: n, b, c } = this;
    let sum = 0;
    for (let i = 0; i < n; i++) {
      for (let j = Math.max(0, i - b); j < i; j++) {
        sum += c[i * (b + 1) + j - i + b] * (x[i] * y[j] + x[j] * y[i]);
      }
      sum += c[i * (b + 1) + b] * x[i] * y[i];
    }
    return sum;
  }

  damp(x: Float64Array, out: Float64Array): void {
    const { size: n, b, c } = this;
    out.fill(0);
    for (let i = 0; i < n; i++) {
      for (let j = Math.max(0, i - b); j < i; j++) {
        const entry = c[i * (b + 1) + j - i + b];
        out[i] += entry * x[j];
        out[j] += entry * x[i];
      }
      out[i] += c[i * (b + 1) + b] * x[i];
    }
  }

  logDerivative(zr: number, zi: number, out: Float64Array): void {
    const { size: n, b, c, k, lr, li, mr, mi, ur, ui, wr, wi } = this;
    const w = b + 1;
    let sumR = 0;
    let sumI = 0;
    for (let i = 0; i < n; i++) {
      const first = Math.max(0, i - b);
      const row = i * w + b - i;
      let dr = zr * zr - zi * zi + zr * c[row + i] + k[row + i];
      let di = 2 * zr * zi + zi * c[row + i];
      let er = 2 * zr + c[row + i];
      let ei = 2 * zi;
      for (let j = first; j < i; j++) {
        const other = j * w + b - j;
        // u = (L D)ᵢⱼ = aᵢⱼ − Σₖ uᵢₖ lⱼₖ and v its derivative.
        let sr = zr * c[row + j] + k[row + j];
        let si = zi * c[row + j];
        let vr = c[row + j];
        let vi = 0;
        for (let q = Math.max(first, j - b); q < j; q++) {
          const ar = ur[q - first];
          const ai = ui[q - first];
          const br = lr[other + q];
          const bi = li[other + q];
          const pr = wr[q - first];
          const pi = wi[q - first];
          const gr = mr[other + q];
          const gi = mi[other + q];
          sr -= ar * br - ai * bi;
          si -= ar * bi + ai * br;
          vr -= pr * br - pi * bi + ar * gr - ai * gi;
          vi -= pr * bi + pi * br + ar * gi + ai * gr;
        }
        ur[j - first] = sr;
        ui[j - first] = si;
        wr[j - first] = vr;
        wi[j - first] = vi;
        // l = u / d, l′ = (u′ − l d′) / d; the diagonal places hold 1/d and d′.
        const hr = lr[other + j];
        const hi = li[other + j];
        const xr = sr * hr - si * hi;
        const xi = sr * hi + si * hr;
        const tr = vr - (xr * mr[other + j] - xi * mi[other + j]);
        const ti = vi - (xr * mi[other + j] + xi * mr[other + j]);
        const yr = tr * hr - ti * hi;
        const yi = tr * hi + ti * hr;
        lr[row + j] = xr;
        li[row + j] = xi;
        mr[row + j] = yr;
        mi[row + j] = yi;
        dr -= sr * xr - si * xi;
        di -= sr * xi + si * xr;
        er -= vr * xr - vi * xi + sr * yr - si * yi;
        ei -= vr * xi + vi * xr + sr * yi + si * yr;
      }
      const square = dr * dr + di * di;
      const inverse = square > PIVOT_FLOOR ? 1 / square : 0;
      const hr = inverse === 0 ? 1e145 : dr * inverse;
      const hi = -di * inverse;
      lr[row + i] = hr;
      li[row + i] = hi;
      mr[row + i] = er;
      mi[row + i] = ei;
      sumR += er * hr - ei * hi;
      sumI += er * hi + ei * hr;
    }
    out[0] = sumR;
    out[1] = sumI;
  }

  polish(zr: number, zi: number): boolean {
    const { size: n, vectorRe: x, vectorIm: y } = this;
    // A start without zeros and without symmetry, so that no mode is missed.
    for (let i = 0; i < n; i++) x[i] = 1 + 0.5 * Math.sin(3 * i + 1);
    y.fill(0);
    let re = zr;
    let im = zi;
    let before = Number.POSITIVE_INFINITY;
    this.fill(re, im);
    factorBandLu(this.lu, this.re, this.im, true);
    if (!this.inverseStep()) return false;
    for (let step = 0; step < POLISH_CAP; step++) {
      if (!this.inverseStep()) return false;
      const [gr, gi] = this.form(re, im);
      const [dr, di] = this.derivativeForm(re, im);
      const square = dr * dr + di * di;
      const moveR = (gr * dr + gi * di) / square;
      const moveI = (gi * dr - gr * di) / square;
      const move = Math.sqrt(moveR * moveR + moveI * moveI);
      const size = Math.sqrt(re * re + im * im);
      if (!(move <= 1e-3 * size)) return false;
      const scale = size * size + size * this.dampingScale + 1;
      const stuck = move >= 0.25 * before && this.residual(re, im) <= 8 * Number.EPSILON * scale;
      if (move <= 4 * Number.EPSILON * size || stuck) {
        this.value.re = re;
        this.value.im = im;
        return zi === 0 || im > 0;
      }
      re -= moveR;
      if (zi > 0) im -= moveI;
      before = move;
      this.fill(re, im);
      factorBandLu(this.lu, this.re, this.im, true);
    }
    return false;
  }

  vectorBeside(zr: number, zi: number, clean: (x: Float64Array, y: Float64Array) => void): boolean {
    const { vectorRe: x, vectorIm: y } = this;
    for (let i = 0; i < x.length; i++) x[i] = Math.cos(5 * i + 2);
    y.fill(0);
    this.fill(zr, zi);
    factorBandLu(this.lu, this.re, this.im, true);
    for (let step = 0; step < 4; step++) {
      clean(x, y);
      if (!this.inverseStep()) return false;
    }
    clean(x, y);
    const length = toUnit(x, y);
    const size = Math.sqrt(zr * zr + zi * zi);
    const scale = size * size + size * this.dampingScale + 1;
    return length > 1e-3 && this.residual(zr, zi) <= 64 * Number.EPSILON * scale;
  }

  /** Q(z) into `re`, `im`. */
  private fill(zr: number, zi: number): void {
    const { b, c, k, re, im } = this;
    for (let p = 0; p < c.length; p++) {
      re[p] = zr * c[p] + k[p];
      im[p] = zi * c[p];
    }
    for (let p = b; p < c.length; p += b + 1) {
      re[p] += zr * zr - zi * zi;
      im[p] += 2 * zr * zi;
    }
  }

  /** ψ ← Q⁻¹ ψ, unit 2-norm; false where it is not finite. */
  private inverseStep(): boolean {
    const { vectorRe: x, vectorIm: y } = this;
    solveBandLu(this.lu, x, y, 1);
    const most = Math.max(maxAbs(x), maxAbs(y));
    if (!(most > 0) || !Number.isFinite(most)) return false;
    let sum = 0;
    for (let i = 0; i < x.length; i++) sum += (x[i] / most) ** 2 + (y[i] / most) ** 2;
    const scale = 1 / Math.sqrt(sum);
    for (let i = 0; i < x.length; i++) {
      x[i] = (x[i] / most) * scale;
      y[i] = (y[i] / most) * scale;
    }
    return Number.isFinite(sum);
  }

  /** Row i of Q ψ for the matrix now in `re`, `im`. */
  private row(i: number, out: Float64Array): void {
    const { size: n, b, re, im, vectorRe: x, vectorIm: y } = this;
    let sr = 0;
    let si = 0;
    for (let j = Math.max(0, i - b); j <= Math.min(n - 1, i + b); j++) {
      const p = i >= j ? i * (b + 1) + j - i + b : j * (b + 1) + i - j + b;
      sr += re[p] * x[j] - im[p] * y[j];
      si += re[p] * y[j] + im[p] * x[j];
    }
    out[0] = sr;
    out[1] = si;
  }

  /** ψᵀ Q(z) ψ */
  private form(zr: number, zi: number): [number, number] {
    this.fill(zr, zi);
    const out = new Float64Array(2);
    let sr = 0;
    let si = 0;
    for (let i = 0; i < this.size; i++) {
      this.row(i, out);
      sr += this.vectorRe[i] * out[0] - this.vectorIm[i] * out[1];
      si += this.vectorRe[i] * out[1] + this.vectorIm[i] * out[0];
    }
    return [sr, si];
  }

  /** ‖Q(z) ψ‖₂, ψ of unit length */
  private residual(zr: number, zi: number): number {
    this.fill(zr, zi);
    const out = new Float64Array(2);
    let sum = 0;
    for (let i = 0; i < this.size; i++) {
      this.row(i, out);
      sum += out[0] * out[0] + out[1] * out[1];
    }
    return Math.sqrt(sum);
  }

  /** ψᵀ (2z I + C) ψ */
  private derivativeForm(zr: number, zi: number): [number, number] {
    const { vectorRe: x, vectorIm: y } = this;
    let pr = 0;
    let pi = 0;
    for (let i = 0; i < x.length; i++) {
      pr += x[i] * x[i] - y[i] * y[i];
      pi += 2 * x[i] * y[i];
    }
    const real = this.damping(x, x) - this.damping(y, y);
    const imaginary = 2 * this.damping(x, y);
    return [2 * (zr * pr - zi * pi) + real, 2 * (zr * pi + zi * pr) + imaginary];
  }
}
