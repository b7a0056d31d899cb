/**
 * Undamped modes: K φ = λ M φ with K symmetric and M symmetric positive definite.
 *
 * Method: a diagonal M scales K to M^−½ K M^−½; a full M is factored M = L Lᵀ and K becomes L⁻¹ K L⁻ᵀ (Golub &
 * Van Loan, Matrix Computations, 4th ed., §8.7.2); chains go straight to the tridiagonal solver. Vectors are mass-normalised, φᵀ M φ = 1. Error of a value:
 * about n·ε times the largest one, times the condition of M when M is full.
 */
import { factorCholesky, solveLower, solveLowerTransposed } from "./cholesky.ts";
import { pathThrough } from "./ordering.ts";
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite, transpose } from "./products.ts";
import { symmetricEigen, type VectorLayout } from "./symmetric-eigen.ts";
import { tridiagonalEigen } from "./tridiagonal-eigen.ts";

/** Below this size looking for a chain costs more than it saves. */
const CHAIN_SIZE = 16;

export type Modes = {
  /** λ = ω², ascending; a free body's are zero within rounding, either sign. */
  values: Float64Array;
  /** n×n row-major, mass-normalised vector of `values[j]` in column (or row) j; empty when not asked for. */
  vectors: Float64Array;
};

type Options = { vectors?: boolean; layout?: VectorLayout };

/**
 * `k` is n×n row-major; `m` is either the n diagonal entries or an n×n row-major matrix. Both are kept.
 * Fails where a value is not finite or M is not positive definite (the reason counts rows from 1).
 */
export function generalisedEigen(
  k: Float64Array,
  m: Float64Array,
  n: number,
  options: Options = {},
): Outcome<Modes> {
  if (!allFinite(k) || !allFinite(m)) return fail("a matrix holds a value that is not finite");
  const diagonal = m.length === n ? m : diagonalOf(m, n);
  return diagonal ? withDiagonalMass(k, diagonal, n, options) : withFullMass(k, m, n, options);
}

/** The diagonal of a matrix that has nothing beside it, otherwise undefined. */
export function diagonalOf(m: Float64Array, n: number): Float64Array | undefined {
  const diagonal = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) if (i !== j && m[i * n + j] !== 0) return undefined;
    diagonal[i] = m[i * n + i];
  }
  return diagonal;
}

/** 1/√mᵢ, or the reason why not. */
export function inverseRoots(diagonal: Float64Array): Outcome<Float64Array> {
  const roots = new Float64Array(diagonal.length);
  for (let i = 0; i < diagonal.length; i++) {
    if (!(diagonal[i] > 0)) return fail(`the mass matrix is not positive definite at row ${i + 1}`);
    roots[i] = 1 / Math.sqrt(diagonal[i]);
  }
  return succeed(roots);
}

function withDiagonalMass(
  k: Float64Array,
  diagonal: Float64Array,
  n: number,
  options: Options,
): Outcome<Modes> {
  const roots = inverseRoots(diagonal);
  if (!roots.ok) return fail(roots.reason);
  const r = roots.value;
  const a = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) a[i * n + j] = k[i * n + j] * r[i] * r[j];
  }
  const path = n < CHAIN_SIZE ? undefined : pathThrough([a], n);
  const solved = path ? alongPath(a, path, n, options) : symmetricEigen(a, n, options);
  if (!solved.ok) return solved;
  const { vectors } = solved.value;
  if (vectors.length > 0) scaleEntries(vectors, r, n, options.layout);
  return solved;
}

/** Entry i of every vector times `factor[i]`. */
function scaleEntries(vectors: Float64Array, factor: Float64Array, n: number, layout?: VectorLayout): void {
  for (let i = 0; i < n; i++) {
    const at = i * n;
    if (layout === "rows") for (let j = 0; j < n; j++) vectors[at + j] *= factor[j];
    else for (let j = 0; j < n; j++) vectors[at + j] *= factor[i];
  }
}

/** A chain is tridiagonal in its own order: no reduction is needed. Only the lower triangle of `a` is filled. */
function alongPath(a: Float64Array, path: Int32Array, n: number, options: Options): Outcome<Modes> {
  const diagonal = new Float64Array(n);
  const offDiagonal = new Float64Array(n - 1);
  for (let t = 0; t < n; t++) {
    diagonal[t] = a[path[t] * n + path[t]];
    if (t === 0) continue;
    const [i, j] = [Math.max(path[t], path[t - 1]), Math.min(path[t], path[t - 1])];
    offDiagonal[t - 1] = a[i * n + j];
  }
  const solved = tridiagonalEigen(diagonal, offDiagonal, options);
  if (!solved.ok || solved.value.vectors.length === 0) return solved;
  const { values, vectors: found } = solved.value;
  const vectors = new Float64Array(n * n);
  for (let t = 0; t < n; t++) {
    if (options.layout === "rows") for (let j = 0; j < n; j++) vectors[j * n + path[t]] = found[j * n + t];
    else vectors.set(found.subarray(t * n, (t + 1) * n), path[t] * n);
  }
  return succeed({ values, vectors });
}

function withFullMass(k: Float64Array, m: Float64Array, n: number, options: Options): Outcome<Modes> {
  const factor = factorCholesky(m, n);
  if (!factor.ok) {
    const row = (factor.upTo?.reached ?? 0) + 1;
    return fail(`the mass matrix is not positive definite at row ${row}`);
  }
  // L⁻¹ K, transposed, L⁻¹ once more: (L⁻¹ K)ᵀ = K L⁻ᵀ.
  const half = Float64Array.from(k);
  solveLower(factor.value, half, n);
  const a = transpose(half, n, n);
  solveLower(factor.value, a, n);
  const solved = symmetricEigen(a, n, { vectors: options.vectors });
  if (!solved.ok || solved.value.vectors.length === 0) return solved;
  const { values, vectors } = solved.value;
  solveLowerTransposed(factor.value, vectors, n);
  return succeed({ values, vectors: options.layout === "rows" ? transpose(vectors, n, n) : vectors });
}
