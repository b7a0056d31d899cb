/**
 * Householder reduction of a general matrix to upper Hessenberg form, A = Q H Qᵀ.
 *
 * Method: Golub & Van Loan, Matrix Computations, 4th ed., §7.4.3; the update of one step and the two products of
 * the next are done in one pass over the rows. Backward error of order n·ε‖A‖.
 */

export type Hessenberg = {
  n: number;
  /** n×n row-major, zero below the first subdiagonal. */
  h: Float64Array;
  /** Qᵀ, n×n row-major; empty when not asked for. */
  transposedQ: Float64Array;
};

/** Reflections of the reduction: I − τₖ v vᵀ, v (row k, entries k + 1 …) with v at k + 1 equal to one. */
export type Reflections = { vectors: Float64Array; tau: Float64Array };

/** `a` (n×n) is destroyed and becomes `h`. */
export function hessenberg(a: Float64Array, n: number, withQ: boolean): Hessenberg {
  const reflections = reduceToHessenberg(a, n);
  return { n, h: a, transposedQ: withQ ? formTransposed(reflections, n) : new Float64Array(0) };
}

/** Reduces in place and returns the reflections, first one first. */
export function reduceToHessenberg(a: Float64Array, n: number): Reflections {
  const vectors = new Float64Array(n * n);
  const tau = new Float64Array(n);
  const y = new Float64Array(n);
  const w = new Float64Array(n);
  for (let k = 0; k + 2 < n; k++) {
    const v = vectors.subarray(k * n, (k + 1) * n);
    const t = reflectColumn(a, n, k, v);
    tau[k] = t;
    if (t === 0) continue;
    w.fill(0);
    // y = A v and w = Aᵀ v (rows below k) in one pass.
    let dot = 0;
    for (let i = 0; i < n; i++) {
      const row = i * n;
      let sum = 0;
      const vi = v[i];
      if (i <= k) {
        for (let j = k + 1; j < n; j++) sum += a[row + j] * v[j];
      } else {
        for (let j = k + 1; j < n; j++) {
          const entry = a[row + j];
          sum += entry * v[j];
          w[j] += vi * entry;
        }
        dot += vi * sum;
      }
      y[i] = sum;
    }
    // (I − τvvᵀ) A (I − τvvᵀ) = A − τ y vᵀ − v (τ w − τ² (vᵀy) v)ᵀ
    for (let j = k + 1; j < n; j++) w[j] = t * w[j] - t * t * dot * v[j];
    for (let i = 0; i < n; i++) {
      const row = i * n;
      const yi = t * y[i];
      const vi = v[i];
      if (i <= k) for (let j = k + 1; j < n; j++) a[row + j] -= yi * v[j];
      else for (let j = k + 1; j < n; j++) a[row + j] -= yi * v[j] + vi * w[j];
    }
  }
  return { vectors, tau };
}

/** Chooses the reflection that empties column k below its subdiagonal; the column is set to its image. */
function reflectColumn(a: Float64Array, n: number, k: number, v: Float64Array): number {
  const first = a[(k + 1) * n + k];
  let square = 0;
  for (let i = k + 2; i < n; i++) square += a[i * n + k] * a[i * n + k];
  if (square === 0) {
    // What underflowed is zero relative to entries of size one.
    for (let i = k + 2; i < n; i++) a[i * n + k] = 0;
    return 0;
  }
  const length = Math.sqrt(first * first + square);
  const beta = first >= 0 ? -length : length;
  const scale = 1 / (first - beta);
  v[k + 1] = 1;
  for (let i = k + 2; i < n; i++) {
    v[i] = a[i * n + k] * scale;
    a[i * n + k] = 0;
  }
  a[(k + 1) * n + k] = beta;
  return (beta - first) / beta;
}

/** Qᵀ = H(last) … H(1) H(0), built from the last one so that the zeros in front are never touched. */
function formTransposed(reflections: Reflections, n: number): Float64Array {
  const { vectors, tau } = reflections;
  const q = new Float64Array(n * n);
  for (let i = 0; i < n; i++) q[i * n + i] = 1;
  for (let k = n - 3; k >= 0; k--) {
    const t = tau[k];
    if (t === 0) continue;
    const at = k * n;
    // Rows of Qᵀ from the right: q ← q H(k).
    for (let r = k + 1; r < n; r++) {
      const row = r * n;
      let dot = 0;
      for (let c = k + 1; c < n; c++) dot += q[row + c] * vectors[at + c];
      dot *= t;
      for (let c = k + 1; c < n; c++) q[row + c] -= dot * vectors[at + c];
    }
  }
  return q;
}
