/**
 * Damped modes found all together on a determinant that can be evaluated cheaply, and checked.
 *
 * Method: Ehrlich-Aberth steps to a coarse accuracy, a few Rayleigh corrections for each value with its vector, then
 * checks: the sums of the values and of their squares against traces, and no value twice. Where a check fails
 * nothing is returned, and the caller takes the dense way: repeated or defective values end there.
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
  return t === at + 2 * size && allThere(form, out, at, t) && allDistinct(out, at + zeroVectors.length, t);
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

/** No two values may agree within 1e-9: they are defective, repeated, or one of two neighbours found twice. */
function allDistinct(out: Pairs, from: number, end: number): boolean {
  const order = Array.from({ length: end - from }, (_, t) => from + t);
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
