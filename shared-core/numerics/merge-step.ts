/**
 * The middle of one divide-and-conquer merge: roots and vectors of diag(d) + ρ z zᵀ, and the vectors times the rows
 * of the two halves.
 *
 * Method: Gu & Eisenstat, SIAM J. Matrix Anal. Appl. 16, 1995 (weights recomputed from the roots).
 */
import type { Kernel } from "./kernel.ts";
import { secularRoot } from "./secular.ts";

export type MergeStep = {
  /** Order of the problem. */
  k: number;
  /** d, strictly ascending, and z. */
  poles: Float64Array;
  weights: Float64Array;
  rho: number;
  /** Component j of a vector belongs to row `column[j]` of `packed`. */
  column: Int32Array;
  /**
   * Rows of the halves, k×size: the first `upper` reach into the first `left` columns, those from `skip` on into
   * the others.
   */
  packed: Float64Array;
  size: number;
  left: number;
  upper: number;
  skip: number;
  /** Receives the k×size new rows, and the ascending roots. */
  result: Float64Array;
  values: Float64Array;
  /** k×k scratch. */
  mix: Float64Array;
};

/** Plain version; false at the cap of an iteration. */
export function plainMerge(step: MergeStep, product: Kernel["product"]): boolean {
  const { k, poles, weights, rho, column, packed, size, left, upper, skip, result, values, mix } = step;
  // `result` is large enough to hold the k×k gaps until the rows go there.
  if (!secularVectors(k, poles, weights, rho, column, values, mix, result)) return false;
  const window = (data: Float64Array, at: number, stride: number) => ({ data, at, stride });
  product(window(mix, 0, k), window(packed, 0, size), window(result, 0, size), k, upper, left);
  product(
    window(mix, skip, k),
    window(packed, skip * size + left, size),
    window(result, left, size),
    k,
    k - skip,
    size - left,
  );
  return true;
}

/** Row i of `mix` (k×k) becomes the unit vector of root i, component j at `column[j]`. `gaps` is scratch. */
function secularVectors(
  k: number,
  poles: Float64Array,
  weights: Float64Array,
  rho: number,
  column: Int32Array,
  values: Float64Array,
  mix: Float64Array,
  gaps: Float64Array,
): boolean {
  const squares = weights.map((w) => w * w);
  for (let i = 0; i < k; i++) {
    values[i] = secularRoot(i, k, poles, squares, rho, gaps, i * k);
    if (Number.isNaN(values[i])) return false;
  }
  // Weights for which the computed roots are exact (Gu & Eisenstat): ẑⱼ² ∝ ∏ᵢ (dⱼ − λᵢ) / ∏ᵢ≠ⱼ (dⱼ − dᵢ).
  const exact = new Float64Array(k).fill(1);
  for (let i = 0; i < k; i++) {
    const at = i * k;
    const pole = poles[i];
    for (let j = 0; j < i; j++) exact[j] *= gaps[at + j] / (poles[j] - pole);
    exact[i] *= gaps[at + i];
    for (let j = i + 1; j < k; j++) exact[j] *= gaps[at + j] / (poles[j] - pole);
  }
  for (let j = 0; j < k; j++) {
    const root = Math.sqrt(Math.abs(exact[j]));
    exact[j] = weights[j] < 0 ? -root : root;
  }
  for (let i = 0; i < k; i++) {
    const at = i * k;
    let square = 0;
    for (let j = 0; j < k; j++) {
      const entry = exact[j] / gaps[at + j];
      gaps[at + j] = entry;
      square += entry * entry;
    }
    const scale = 1 / Math.sqrt(square);
    for (let j = 0; j < k; j++) mix[at + column[j]] = gaps[at + j] * scale;
  }
  return true;
}
