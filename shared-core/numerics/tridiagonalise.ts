/**
 * Householder reduction of a symmetric matrix to tridiagonal form, A = Q T Qᵀ.
 *
 * Method: reflections from the last row upwards (Wilkinson & Reinsch, Handbook for Automatic Computation II/2),
 * with the rank-two update of one step and the product with the next reflection's vector done in one pass over
 * the lower triangle, so that the matrix is read once a step. Backward error of order n·ε‖A‖; with the entries
 * steadily graded small to large downwards the small eigenvalues usually keep their relative accuracy.
 */

/** Qᵀ-bearing result: A = Q T Qᵀ with Q = H(n−1) … H(2) H(1). */
export type Tridiagonal = {
  n: number;
  diagonal: Float64Array;
  /** Entry i couples i and i+1; length max(0, n−1). */
  offDiagonal: Float64Array;
  /** Row i (first i entries) is the vector v of H(i) = I − τᵢ v vᵀ, n×n row-major. */
  reflectors: Float64Array;
  tau: Float64Array;
};

/** Reduces the lower triangle of `a` (n×n, destroyed: it becomes `reflectors`). Entries should be about one. */
export function tridiagonalise(a: Float64Array, n: number): Tridiagonal {
  const diagonal = new Float64Array(n);
  const offDiagonal = new Float64Array(Math.max(0, n - 1));
  const tau = new Float64Array(n);
  const v = new Float64Array(n);
  const w = new Float64Array(n);
  const next = new Float64Array(n);
  const p = new Float64Array(n);
  let pending = false;
  for (let i = n - 1; i >= 0; i--) {
    const row = i * n;
    if (pending) for (let j = 0; j <= i; j++) a[row + j] -= v[i] * w[j] + w[i] * v[j];
    diagonal[i] = a[row + i];
    if (i === 0) break;
    tau[i] = reflect(a, row, i, offDiagonal);
    for (let j = 0; j < i; j++) next[j] = a[row + j];
    p.fill(0, 0, i);
    // A zero reflection still lets the pending update through.
    updateAndMultiply(a, n, i, v, w, next, p, pending);
    const t = tau[i];
    let dot = 0;
    for (let j = 0; j < i; j++) dot += p[j] * next[j];
    const half = 0.5 * t * t * dot;
    for (let j = 0; j < i; j++) {
      w[j] = t * p[j] - half * next[j];
      v[j] = next[j];
    }
    pending = t !== 0;
  }
  return { n, diagonal, offDiagonal, reflectors: a, tau };
}

/**
 * Turns the first i entries of a row into the vector of a reflection that leaves only the last of them;
 * returns τ. Zero relative to nothing: an exactly vanishing remainder needs no reflection.
 */
function reflect(a: Float64Array, row: number, i: number, offDiagonal: Float64Array): number {
  const last = a[row + i - 1];
  let square = 0;
  for (let j = 0; j < i - 1; j++) square += a[row + j] * a[row + j];
  if (square === 0) {
    offDiagonal[i - 1] = last;
    a.fill(0, row, row + i);
    return 0;
  }
  const length = Math.sqrt(square + last * last);
  const beta = last >= 0 ? -length : length;
  const scale = 1 / (last - beta);
  for (let j = 0; j < i - 1; j++) a[row + j] *= scale;
  a[row + i - 1] = 1;
  offDiagonal[i - 1] = beta;
  return (beta - last) / beta;
}

/** One pass over the leading i×i lower triangle: A −= v wᵀ + w vᵀ (if pending), p = A u. */
function updateAndMultiply(
  a: Float64Array,
  n: number,
  i: number,
  v: Float64Array,
  w: Float64Array,
  u: Float64Array,
  p: Float64Array,
  pending: boolean,
): void {
  for (let r = 0; r < i; r++) {
    const row = r * n;
    const ur = u[r];
    let sum = 0;
    if (pending) {
      const vr = v[r];
      const wr = w[r];
      for (let c = 0; c < r; c++) {
        const entry = a[row + c] - vr * w[c] - wr * v[c];
        a[row + c] = entry;
        sum += entry * u[c];
        p[c] += entry * ur;
      }
      a[row + r] -= 2 * vr * wr;
    } else {
      for (let c = 0; c < r; c++) {
        const entry = a[row + c];
        sum += entry * u[c];
        p[c] += entry * ur;
      }
    }
    p[r] += sum + a[row + r] * ur;
  }
}

/** Qᵀ as n rows, for small n: what implicit QL then rotates. */
export function formTransposedQ(t: Tridiagonal): Float64Array {
  const { n, reflectors, tau } = t;
  const q = new Float64Array(n * n);
  // Q = H(n−1) … H(1) grows from the inside: H(1) touches the leading 1×1 block only, H(i) the leading i×i.
  // Stored transposed: Qᵀ ← Qᵀ Hᵢ acts on the rows of the leading block.
  if (n > 0) q[0] = 1;
  for (let i = 1; i < n; i++) {
    q[i * n + i] = 1;
    const t_ = tau[i];
    if (t_ === 0) continue;
    const v = i * n;
    for (let r = 0; r < i; r++) {
      const row = r * n;
      let dot = 0;
      for (let c = 0; c < i; c++) dot += q[row + c] * reflectors[v + c];
      dot *= t_;
      for (let c = 0; c < i; c++) q[row + c] -= dot * reflectors[v + c];
    }
  }
  return q;
}
