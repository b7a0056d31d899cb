/** One Newton step for a root of a root^2 + b root + c = 0 with a, b, c = psi^T (M, C, K) psi, all complex. */
import type { Root } from "./modes-roots.ts";

/** [real, imaginary]. */
export type Pair = [number, number];

/** Newton steps larger than this share of the root, or where the functional is flat, are not trusted. */
const TRUSTED_STEP = 1e-5;
const FLAT = 1e-5;

/** The root improved, or as it was where the step is not to be trusted (near critical damping); with its norm. */
export function newtonStep(given: Root, a: Pair, b: Pair, c: Pair): Root {
  const { re, im } = improvedRoot(given, a, b, c);
  const norm = [2 * (a[0] * re - a[1] * im) + b[0], 2 * (a[0] * im + a[1] * re) + b[1]] as const;
  return { re, im, shape: given.shape, norm };
}

function improvedRoot(root: Root, a: Pair, b: Pair, c: Pair): Pick<Root, "re" | "im"> {
  const { re, im } = root;
  // a root + b, then (a root + b) root + c and 2 a root + b.
  const linear = [a[0] * re - a[1] * im + b[0], a[0] * im + a[1] * re + b[1]];
  const value = [linear[0] * re - linear[1] * im + c[0], linear[0] * im + linear[1] * re + c[1]];
  const slope = [linear[0] + a[0] * re - a[1] * im, linear[1] + a[0] * im + a[1] * re];
  const square = slope[0] * slope[0] + slope[1] * slope[1];
  const scale = Math.hypot(a[0], a[1]) * Math.hypot(re, im) + Math.hypot(b[0], b[1]);
  if (!(Math.sqrt(square) > FLAT * scale)) return root;
  const stepRe = (value[0] * slope[0] + value[1] * slope[1]) / square;
  const stepIm = im === 0 ? 0 : (value[1] * slope[0] - value[0] * slope[1]) / square;
  if (!(Math.hypot(stepRe, stepIm) <= TRUSTED_STEP * Math.hypot(re, im))) return root;
  return { re: re - stepRe, im: im - stepIm };
}

/** Adds factor (x + i y)^2. */
export function addSquare(sum: Pair, factor: number, x: number, y: number): void {
  sum[0] += factor * (x * x - y * y);
  sum[1] += 2 * factor * x * y;
}
