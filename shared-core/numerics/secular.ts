/**
 * Roots of the secular equation f(λ) = 1/ρ + Σ zⱼ² / (dⱼ − λ) = 0, ρ > 0, d strictly ascending.
 *
 * Method: shift of the origin to the nearer pole; two-pole rational interpolation (Bunch, Nielsen & Sorensen,
 * Numerische Mathematik 31, 1978; R.-C. Li, LAPACK Working Note 89, 1994) inside a shrinking bracket. Each
 * distance dⱼ − λ comes out with relative accuracy of a few ε, which the vectors of divide and conquer need.
 */

/** Steps allowed for one root; three to six are usual, and bisection alone needs about a hundred. */
const STEP_CAP = 120;

/**
 * Root i (0-based, of k ≥ 1), which lies right of dᵢ. `squares` are the zⱼ². Writes dⱼ − λ to
 * `gaps[at + j]` and returns λ, or NaN at the cap.
 */
export function secularRoot(
  i: number,
  k: number,
  d: Float64Array,
  squares: Float64Array,
  rho: number,
  gaps: Float64Array,
  at: number,
): number {
  const last = i === k - 1;
  if (k === 1) {
    const shift = rho * squares[0];
    gaps[at] = -shift;
    return d[0] + shift;
  }
  let width = last ? 0 : d[i + 1] - d[i];
  if (last) for (let j = 0; j < k; j++) width += rho * squares[j];
  const middle = width / 2;
  let atMiddle = 1 / rho;
  for (let j = 0; j < k; j++) atMiddle += squares[j] / (d[j] - d[i] - middle);
  const right = !last && atMiddle < 0;
  const origin = right ? d[i + 1] : d[i];
  // The root lies strictly inside (lo, hi), measured from the origin.
  let lo = right ? -middle : atMiddle < 0 ? middle : 0;
  let hi = right ? 0 : atMiddle < 0 ? width : middle;
  const p = last ? k - 2 : i;
  const q = p + 1;
  let tau = firstGuess(p, q, last, right, d, squares, rho, middle, atMiddle, i);
  if (!(lo < tau && tau < hi)) tau = (lo + hi) / 2;
  for (let step = 0; step < STEP_CAP; step++) {
    let psi = 0;
    let dpsi = 0;
    let phi = 0;
    let dphi = 0;
    let error = 0;
    for (let j = 0; j <= p; j++) {
      const gap = d[j] - origin - tau;
      gaps[at + j] = gap;
      const inverse = 1 / gap;
      const t = squares[j] * inverse;
      psi += t;
      dpsi += t * inverse;
      error += psi;
    }
    error = Math.abs(error);
    for (let j = k - 1; j >= q; j--) {
      const gap = d[j] - origin - tau;
      gaps[at + j] = gap;
      const inverse = 1 / gap;
      const t = squares[j] * inverse;
      phi += t;
      dphi += t * inverse;
      error += Math.abs(phi);
    }
    const f = 1 / rho + psi + phi;
    // Rounding of the two sums, and of τ itself; the constant is LAPACK's.
    error += 8 * (Math.abs(psi) + Math.abs(phi)) + 3 / rho + Math.abs(tau) * (dpsi + dphi);
    if (Math.abs(f) <= Number.EPSILON * error) return origin + tau;
    if (f < 0) lo = tau;
    else hi = tau;
    const next = tau + rationalStep(f, dpsi, dphi, gaps[at + p], gaps[at + q], last);
    const before = tau;
    tau = lo < next && next < hi ? next : (lo + hi) / 2;
    if (tau === before || tau === lo || tau === hi) {
      // No number lies between: τ stays where its gaps were just written.
      return origin + before;
    }
  }
  return Number.NaN;
}

/** Solves the model c + s/(Δp − η) + t/(Δq − η) = 0 that matches f, ψ′ and φ′ at the current point. */
function rationalStep(
  f: number,
  dpsi: number,
  dphi: number,
  gapP: number,
  gapQ: number,
  last: boolean,
): number {
  const c = f - gapP * dpsi - gapQ * dphi;
  const a = (gapP + gapQ) * f - gapP * gapQ * (dpsi + dphi);
  const b = gapP * gapQ * f;
  const root = Math.sqrt(Math.abs(a * a - 4 * b * c));
  let step: number;
  if (last) step = a >= 0 ? (a + root) / (2 * c) : (2 * b) / (a - root);
  else step = a <= 0 ? (a - root) / (2 * c) : (2 * b) / (a + root);
  // A step uphill can only come from rounding; Newton's is then the honest one.
  return f * step < 0 ? step : -f / (dpsi + dphi);
}

/** Root of the two nearest poles with the rest frozen at the middle of the interval. */
function firstGuess(
  p: number,
  q: number,
  last: boolean,
  right: boolean,
  d: Float64Array,
  squares: Float64Array,
  rho: number,
  middle: number,
  atMiddle: number,
  i: number,
): number {
  const span = d[q] - d[p];
  const c = atMiddle - squares[p] / (d[p] - d[i] - middle) - squares[q] / (d[q] - d[i] - middle);
  if (last) {
    const a = -c * span + squares[p] + squares[q];
    const b = squares[q] * span;
    const root = Math.sqrt(Math.max(0, a * a + 4 * b * c));
    if (atMiddle <= 0 && c <= squares[p] / (span + rho) + squares[q] / rho) return rho;
    return a < 0 ? (2 * b) / (root - a) : (a + root) / (2 * c);
  }
  if (right) {
    const a = c * span - squares[p] - squares[q];
    const b = squares[q] * span;
    const root = Math.sqrt(Math.abs(a * a + 4 * b * c));
    return a < 0 ? (2 * b) / (a - root) : -(a + root) / (2 * c);
  }
  const a = c * span + squares[p] + squares[q];
  const b = squares[p] * span;
  const root = Math.sqrt(Math.abs(a * a - 4 * b * c));
  return a > 0 ? (2 * b) / (a + root) : (a - root) / (2 * c);
}
