/**
 * Damped modes found all together on a determinant that can be evaluated cheaply, and checked.
 *
 * Method: Ehrlich-Aberth steps to a coarse accuracy, a few Rayleigh corrections for each value with its vector, then
 * checks: the sums of the values and of their squares against traces, and no mode twice. Vectors of neighbouring
 * values are made orthogonal to one another, as the exact ones are. Where a check fails nothing is returned, and
 * the caller takes the dense way: repeated or defective values end there.
 */
import { ehrlichAberth, type RootItems } from "./ehrlich-aberth.ts";
import type { Pairs } from "./modal-pairs.ts";

/** Q(z) = z² I + z C + K of one connected part, scaled so that ‖K‖ is about one. */
export type DeterminantForm = {
  size: number;
  /** tr C, tr C² and tr K. */
  traces: { c: number; cSquared: number; k: number };
  /** f′/f of f = det Q at z, into out[0], out[1]. */
  logDerivative(re: number, im: number, out: Float64Array): void;
  /**
   * Corrects a value by Rayleigh steps until they are rounding. True leaves the value in `value` and its vector,
   * unit 2-norm, in `vectorRe` and `vectorIm`; false where the steps do not settle.
   */
  polish(re: number, im: number): boolean;
  /**
   * Inverse iteration at a value whose vectors span more than one dimension to rounding: `clean(x, y)` takes the
   * known ones out and is applied after every step. True leaves a unit vector of small residual.
   */
  vectorBeside(re: number, im: number, clean: (x: Float64Array, y: Float64Array) => void): boolean;
  /** out = C x */
  damp(x: Float64Array, out: Float64Array): void;
  readonly value: { re: number; im: number };
  readonly vectorRe: Float64Array;
  readonly vectorIm: Float64Array;
};

/** First guesses, and the real vectors of the values known to be zero (one vector a value). */
export type Starts = { items: RootItems; zeroVectors: readonly Float64Array[] };

/** Newton steps below this relative size leave the rest to the Rayleigh corrections, which square the error. */
const COARSE = 1e-7;

/**
 * Solves one part into `out`: values from `at` on, vectors (rows of n) at coordinates `first` … False where the
 * checks do not hold.
 */
export function solveTogether(
  form: DeterminantForm,
  starts: Starts,
  out: Pairs,
  n: number,
  first: number,
  at: number,
): boolean {
  const { items, zeroVectors } = starts;
  const { size, vectorRe, vectorIm } = form;
  if (!ehrlichAberth(items, zeroVectors.length, COARSE, (re, im, g) => form.logDerivative(re, im, g)))
    return false;
  let t = at;
  for (const vector of zeroVectors) out.rowsRe.set(vector, t++ * n + first);
  for (let j = 0; j < items.re.length; j++) {
    if (t + (items.im[j] > 0 ? 2 : 1) > at + 2 * size || !form.polish(items.re[j], items.im[j])) return false;
    const { re, im } = form.value;
    for (let sign = 1; sign >= (items.im[j] > 0 ? -1 : 1); sign -= 2, t++) {
      out.re[t] = re;
      out.im[t] = sign * im;
      out.rowsRe.set(vectorRe, t * n + first);
      for (let i = 0; i < size; i++) out.rowsIm[t * n + first + i] = sign * vectorIm[i];
    }
  }
  if (t !== at + 2 * size || !allThere(form, out, at, t)) return false;
  return separateNeighbours(form, out, n, first, at + zeroVectors.length, t);
}

/** Σλ = −tr C and Σλ² = tr C² − 2 tr K, to what rounding allows: a value found twice for another shows here. */
function allThere(form: DeterminantForm, out: Pairs, at: number, end: number): boolean {
  let sum = 0;
  let squares = 0;
  let scale = 0;
  for (let t = at; t < end; t++) {
    sum += out.re[t];
    squares += (out.re[t] - out.im[t]) * (out.re[t] + out.im[t]);
    scale = Math.max(scale, Math.abs(out.re[t]), Math.abs(out.im[t]));
  }
  const { c, cSquared, k } = form.traces;
  const tolerance = 1e-13 * form.size;
  return (
    Math.abs(sum + c) <= tolerance * scale &&
    Math.abs(squares - cSquared + 2 * k) <= tolerance * scale * scale
  );
}

/**
 * Values closer than this (relative) share their vectors' rounding: a gap g mixes them by about ε/g, and taking the
 * mixture out again changes their residuals by ε only.
 */
const NEIGHBOURS = 1e-6;
/** A vector that loses all but this share of its length was its neighbour's: found twice, or defective. */
const INDEPENDENT = 0.05;

/** Makes ψₐᵀ((λₐ + λ_b) I + C) ψ_b vanish between neighbours; false where two of them are one and the same. */
function separateNeighbours(
  form: DeterminantForm,
  out: Pairs,
  n: number,
  first: number,
  from: number,
  end: number,
): boolean {
  const heads: number[] = [];
  for (let t = from; t < end; t++) if (out.im[t] >= 0) heads.push(t);
  heads.sort((a, b) => out.im[a] - out.im[b] || out.re[a] - out.re[b]);
  for (let s = 1; s < heads.length; s++) {
    const b = heads[s];
    const near = NEIGHBOURS * (Math.abs(out.re[b]) + Math.abs(out.im[b]));
    const neighbours: number[] = [];
    for (let r = s - 1; r >= 0 && out.im[b] - out.im[heads[r]] <= near; r--) {
      if (Math.abs(out.re[heads[r]] - out.re[b]) <= near) neighbours.push(heads[r]);
    }
    if (neighbours.length > 0 && !standApart(form, out, n, first, b, neighbours)) return false;
  }
  return true;
}

/** Takes the neighbours out of mode b, looking for another vector where nothing would be left of it. */
function standApart(
  form: DeterminantForm,
  out: Pairs,
  n: number,
  first: number,
  b: number,
  neighbours: readonly number[],
): boolean {
  const { size, vectorRe, vectorIm } = form;
  const part = (rows: Float64Array, t: number) => rows.subarray(t * n + first, t * n + first + size);
  const cleaners = neighbours.map((a) => cleaner(form, part(out.rowsRe, a), part(out.rowsIm, a), out, a, b));
  const clean = (x: Float64Array, y: Float64Array) => {
    for (const take of cleaners) take(x, y);
  };
  vectorRe.set(part(out.rowsRe, b));
  vectorIm.set(part(out.rowsIm, b));
  clean(vectorRe, vectorIm);
  if (!(toUnit(vectorRe, vectorIm) >= INDEPENDENT) && !form.vectorBeside(out.re[b], out.im[b], clean))
    return false;
  out.rowsRe.set(vectorRe, b * n + first);
  out.rowsIm.set(vectorIm, b * n + first);
  if (out.im[b] === 0) return true;
  out.rowsRe.set(vectorRe, (b + 1) * n + first);
  for (let i = 0; i < size; i++) out.rowsIm[(b + 1) * n + first + i] = -vectorIm[i];
  return true;
}

/** A function that takes mode a (its vector given) out of a candidate for mode b. */
function cleaner(
  form: DeterminantForm,
  ar: Float64Array,
  ai: Float64Array,
  out: Pairs,
  a: number,
  b: number,
): (x: Float64Array, y: Float64Array) => void {
  const [cr, ci] = [new Float64Array(form.size), new Float64Array(form.size)];
  form.damp(ar, cr);
  form.damp(ai, ci);
  const own = bilinear(ar, ai, cr, ci, ar, ai, 2 * out.re[a], 2 * out.im[a]);
  const square = own[0] * own[0] + own[1] * own[1];
  return (x, y) => {
    // ((λₐ + λ_b) I + C) ψₐ against the candidate, and the same with 2λₐ against ψₐ itself.
    const across = bilinear(ar, ai, cr, ci, x, y, out.re[a] + out.re[b], out.im[a] + out.im[b]);
    const fr = (across[0] * own[0] + across[1] * own[1]) / square;
    const fi = (across[1] * own[0] - across[0] * own[1]) / square;
    for (let i = 0; i < x.length; i++) {
      x[i] -= fr * ar[i] - fi * ai[i];
      y[i] -= fr * ai[i] + fi * ar[i];
    }
  };
}

/** Scales a complex vector to unit 2-norm; returns the length it had (NaN and 0 are left alone). */
export function toUnit(x: Float64Array, y: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < x.length; i++) sum += x[i] * x[i] + y[i] * y[i];
  const length = Math.sqrt(sum);
  if (!(length > 0)) return length;
  for (let i = 0; i < x.length; i++) {
    x[i] /= length;
    y[i] /= length;
  }
  return length;
}

/** (s x + c)ᵀ y for complex vectors, s = sr + i si. */
function bilinear(
  xr: Float64Array,
  xi: Float64Array,
  cr: Float64Array,
  ci: Float64Array,
  yr: Float64Array,
  yi: Float64Array,
  sr: number,
  si: number,
): [number, number] {
  let re = 0;
  let im = 0;
  for (let i = 0; i < xr.length; i++) {
    const gr = sr * xr[i] - si * xi[i] + cr[i];
    const gi = sr * xi[i] + si * xr[i] + ci[i];
    re += gr * yr[i] - gi * yi[i];
    im += gr * yi[i] + gi * yr[i];
  }
  return [re, im];
}

/** Adds the roots of z² + d z + ω² (`lambda` = ω²) to the guesses: the mode as if its damping were its own. */
export function guessMode(items: RootItems, lambda: number, d: number): void {
  const inner = 0.25 * d * d - lambda;
  if (inner < 0) {
    items.re.push(-0.5 * d);
    items.im.push(Math.sqrt(-inner));
    return;
  }
  const large = -(0.5 * d + (d >= 0 ? 1 : -1) * Math.sqrt(inner));
  const small = large === 0 ? 0 : lambda / large;
  // Equal guesses would move alike for ever.
  items.re.push(large, small === large ? small * 0.999 : small);
  items.im.push(0, 0);
}

/**
 * The values at zero of a part with the given rigid-body vectors: two each where no dashpot acts on them; with a
 * single vector also one, the other being guessed. Undefined where it is neither, which the dense way sorts out.
 */
export function rigidStarts(
  vectors: readonly Float64Array[],
  damping: (a: Float64Array, b: Float64Array) => number,
  scale: number,
  items: RootItems,
): readonly Float64Array[] | undefined {
  const floor = 8 * Number.EPSILON * (vectors[0]?.length ?? 0) * scale;
  const free = vectors.every((a) => vectors.every((b) => Math.abs(damping(a, b)) <= floor));
  if (free) return vectors.flatMap((v) => [v, v]);
  if (vectors.length > 1) return undefined;
  items.re.push(-damping(vectors[0], vectors[0]));
  items.im.push(0);
  return vectors;
}
