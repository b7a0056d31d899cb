/**
 * Damped modes: (λ² M + λ C + K) ψ = 0 with M symmetric positive definite, C and K real.
 *
 * Method (dense): coordinates that make M the identity; with a symmetric K further those that make K diagonal,
 * where proportional damping decouples and is solved in closed form; otherwise the state matrix of these
 * coordinates, [0 S; −Λ S⁻¹ −D] with S² = |Λ|, goes to the general eigenproblem. For light damping that matrix
 * is nearly normal, so values carry errors of about n·ε times the largest |λ|, and far less for low modes.
 * Chains (no coordinate coupled to more than two others, no ring) and narrow bands go to sparse-damped.ts first,
 * which is far quicker and checks itself.
 * Linearisation: Tisseur & Meerbergen, The quadratic eigenvalue problem, SIAM Review 43, 2001, §3.4.
 */

import { factorCholesky, solveLower, solveLowerTransposed } from "./cholesky.ts";
import { type ComplexMatrix, generalEigen } from "./general-eigen.ts";
import { diagonalOf, inverseRoots } from "./generalised-eigen.ts";
import { type Kernel, kernelFor } from "./kernel.ts";
import { closedForm, type Pairs } from "./modal-pairs.ts";
import { pathThrough } from "./ordering.ts";
import { fail, type Outcome, succeed } from "./outcome.ts";
import { allFinite, maxAbs, transpose } from "./products.ts";
import { bandPairs, chainPairs } from "./sparse-damped.ts";
import { symmetricEigen } from "./symmetric-eigen.ts";

export type DampedModes = {
  /** The 2n values λ, |λ| ascending; pairs adjacent, positive imaginary part first. */
  re: Float64Array;
  im: Float64Array;
  /**
   * n×2n row-major, ψ of value j in column j: ψᴴ M ψ = 1 and the entry of largest √m-weighted size real and
   * positive. Pairs are exact conjugates.
   */
  vectors: ComplexMatrix;
};

export type QuadraticOptions = { kernel?: Kernel };

/** Relative size below which a coupling of the modal damping matrix is rounding; a few times what products leave. */
const COUPLING_FLOOR = 8 * Number.EPSILON;
/** Floor of the modal scale S against its largest entry: below it a mode counts as rigid-body. */
const RIGID_SCALE = 1e-8;

/** `m` is n diagonal entries or n×n; `c` and `k` n×n row-major, symmetric or not. All are kept. */
export function quadraticEigen(
  m: Float64Array,
  c: Float64Array,
  k: Float64Array,
  n: number,
  options: QuadraticOptions = {},
): Outcome<DampedModes> {
  if (!allFinite(m) || !allFinite(c) || !allFinite(k))
    return fail("a matrix holds a value that is not finite");
  const kernel = options.kernel ?? kernelFor(n);
  const unit = massUnits(m, n);
  if (!unit.ok) return fail(unit.reason);
  const { reduce, restore } = unit.value;
  const stiffness = reduce(k);
  const damping = reduce(c);
  if (!allFinite(stiffness) || !allFinite(damping)) return fail("a matrix divided by the mass overflows");
  const symmetric = isSymmetric(k, n);
  const both = symmetric && isSymmetric(c, n);
  const path = both ? pathThrough([damping, stiffness], n) : undefined;
  const sparse = path
    ? chainPairs(damping, stiffness, path, kernel)
    : both
      ? bandPairs(damping, stiffness, n)
      : undefined;
  if (sparse)
    return succeed(arrange(sparse, undefined, n, kernel, restore, Math.sqrt(maxAbs(stiffness)) || 1));
  const basis = symmetric ? modalBasis(stiffness, n, kernel) : plainBasis(stiffness, n);
  if (!basis.ok) return fail(basis.reason);
  const { shape, lambda, scale } = basis.value;
  const modal = shape ? inBasis(damping, shape, n, kernel) : damping;
  const pairs =
    shape && decoupled(modal, n)
      ? succeed(closedForm(lambda, (j) => modal[j * n + j]))
      : coupled(basis.value, modal, n, kernel);
  if (!pairs.ok) return fail(pairs.reason);
  return succeed(arrange(pairs.value, shape, n, kernel, restore, maxAbs(scale)));
}

/** Coordinates in which M is the identity: A ↦ M^−½ A M^−½ (or L⁻¹ A L⁻ᵀ), and vectors back, in place. */
type MassUnits = {
  reduce: (a: Float64Array) => Float64Array;
  restore: (vectors: Float64Array, columns: number) => void;
};

function massUnits(m: Float64Array, n: number): Outcome<MassUnits> {
  const diagonal = m.length === n ? m : diagonalOf(m, n);
  if (diagonal) {
    const roots = inverseRoots(diagonal);
    if (!roots.ok) return fail(roots.reason);
    const r = roots.value;
    return succeed({
      reduce: (a) => a.map((v, p) => v * r[Math.floor(p / n)] * r[p % n]),
      restore: (x, columns) => {
        for (let p = 0; p < n * columns; p++) x[p] *= r[Math.floor(p / columns)];
      },
    });
  }
  const factor = factorCholesky(m, n);
  if (!factor.ok)
    return fail(`the mass matrix is not positive definite at row ${(factor.upTo?.reached ?? 0) + 1}`);
  const l = factor.value;
  return succeed({
    reduce: (a) => {
      // (L⁻¹ (L⁻¹ A)ᵀ)ᵀ = L⁻¹ A L⁻ᵀ
      const left = Float64Array.from(a);
      solveLower(l, left, n);
      const right = transpose(left, n, n);
      solveLower(l, right, n);
      return transpose(right, n, n);
    },
    restore: (x, columns) => solveLowerTransposed(l, x, columns),
  });
}

function isSymmetric(a: Float64Array, n: number): boolean {
  const floor = n * Number.EPSILON * maxAbs(a);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) if (Math.abs(a[i * n + j] - a[j * n + i]) > floor) return false;
  }
  return true;
}

/** `shape` holds the undamped modes in columns, `lambda` their ω²; `scale` is S. Without shape, K itself is used. */
type Basis = { shape?: Float64Array; stiffness: Float64Array; lambda: Float64Array; scale: Float64Array };

function modalBasis(stiffness: Float64Array, n: number, kernel: Kernel): Outcome<Basis> {
  const modes = symmetricEigen(stiffness, n, { kernel });
  if (!modes.ok) return fail(modes.reason);
  const { values: lambda, vectors: shape } = modes.value;
  const top = Math.sqrt(maxAbs(lambda));
  const scale = lambda.map((v) => Math.max(Math.sqrt(Math.abs(v)), RIGID_SCALE * top) || 1);
  return succeed({ shape, stiffness, lambda, scale });
}

function plainBasis(stiffness: Float64Array, n: number): Outcome<Basis> {
  const scale = new Float64Array(n).fill(Math.sqrt(maxAbs(stiffness)) || 1);
  return succeed({ stiffness, lambda: new Float64Array(n), scale });
}

/** Φᵀ A Φ */
function inBasis(a: Float64Array, shape: Float64Array, n: number, kernel: Kernel): Float64Array {
  const whole = (data: Float64Array) => ({ data, at: 0, stride: n });
  const half = new Float64Array(n * n);
  const out = new Float64Array(n * n);
  kernel.product(whole(a), whole(shape), whole(half), n, n, n);
  kernel.product(whole(transpose(shape, n, n)), whole(half), whole(out), n, n, n);
  return out;
}

function decoupled(modal: Float64Array, n: number): boolean {
  const floor = COUPLING_FLOOR * n * maxAbs(modal);
  for (let p = 0; p < n * n; p++) if (p % (n + 1) !== 0 && Math.abs(modal[p]) > floor) return false;
  return true;
}

/**
 * The state matrix with the coordinates of one mode side by side, stiffest mode first: [0 s; −λ/s −d] blocks on
 * the diagonal. QR likes matrices graded that way.
 */
function coupled(basis: Basis, modal: Float64Array, n: number, kernel: Kernel): Outcome<Pairs> {
  const { shape, stiffness, lambda, scale } = basis;
  const size = 2 * n;
  const a = new Float64Array(size * size);
  for (let i = 0; i < n; i++) {
    const p = 2 * (n - 1 - i);
    a[p * size + p + 1] = scale[i];
    for (let j = 0; j < n; j++) {
      const q = 2 * (n - 1 - j);
      a[(p + 1) * size + q + 1] = -modal[i * n + j];
      if (!shape) a[(p + 1) * size + q] = -stiffness[i * n + j] / scale[j];
    }
    if (shape) a[(p + 1) * size + p] = -lambda[i] / scale[i];
  }
  const solved = generalEigen(a, size, { kernel });
  if (!solved.ok) return fail(solved.reason);
  const { re, im, right } = solved.value;
  const rowsRe = new Float64Array(size * n);
  const rowsIm = new Float64Array(size * n);
  for (let i = 0; right && i < n; i++) {
    const p = 2 * (n - 1 - i);
    for (let j = 0; j < size; j++) {
      const square = re[j] * re[j] + im[j] * im[j];
      if (square <= scale[i] * scale[i]) {
        rowsRe[j * n + i] = right.re[p * size + j] / scale[i];
        rowsIm[j * n + i] = right.im[p * size + j] / scale[i];
        continue;
      }
      // Velocity over λ: dividing by the smaller S would magnify rounding.
      const vr = right.re[(p + 1) * size + j];
      const vi = right.im[(p + 1) * size + j];
      rowsRe[j * n + i] = (vr * re[j] + vi * im[j]) / square;
      rowsIm[j * n + i] = (vi * re[j] - vr * im[j]) / square;
    }
  }
  return succeed({ re, im, rowsRe, rowsIm });
}

/** Sorts, turns basis coordinates into the caller's, and normalises. */
function arrange(
  pairs: Pairs,
  shape: Float64Array | undefined,
  n: number,
  kernel: Kernel,
  restore: MassUnits["restore"],
  scale: number,
): DampedModes {
  const size = 2 * n;
  const order = sortedPairs(pairs.re, pairs.im, scale);
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  let x: ComplexMatrix = { re: new Float64Array(n * size), im: new Float64Array(n * size) };
  for (let t = 0; t < size; t++) {
    const j = order[t];
    re[t] = pairs.re[j];
    im[t] = pairs.im[j];
    for (let i = 0; i < n; i++) {
      x.re[i * size + t] = pairs.rowsRe[j * n + i];
      x.im[i * size + t] = pairs.rowsIm[j * n + i];
    }
  }
  if (shape) x = { re: timesShape(shape, x.re, n, kernel), im: timesShape(shape, x.im, n, kernel) };
  normalise(x, n, im);
  restore(x.re, size);
  restore(x.im, size);
  return { re, im, vectors: x };
}

function timesShape(shape: Float64Array, x: Float64Array, n: number, kernel: Kernel): Float64Array {
  const out = new Float64Array(2 * n * n);
  kernel.product(
    { data: shape, at: 0, stride: n },
    { data: x, at: 0, stride: 2 * n },
    { data: out, at: 0, stride: 2 * n },
    n,
    n,
    2 * n,
  );
  return out;
}

/** Indices by ascending |λ|, a pair as one item. Ties keep the order found. */
function sortedPairs(re: Float64Array, im: Float64Array, scale: number): Int32Array {
  const heads: number[] = [];
  for (let j = 0; j < re.length; j++) {
    heads.push(j);
    if (im[j] > 0) j++;
  }
  // Scaled so that squares neither overflow nor vanish.
  const size = (j: number) => Math.hypot(re[j] / scale, im[j] / scale);
  heads.sort((a, b) => size(a) - size(b) || a - b);
  return Int32Array.from(heads.flatMap((j) => (im[j] > 0 ? [j, j + 1] : [j])));
}

/** Unit 2-norm in mass units, largest entry turned real and positive; the second of a pair is copied. */
export function normalise(x: ComplexMatrix, n: number, im: Float64Array): void {
  const size = im.length;
  for (let j = 0; j < size; j++) {
    if (im[j] < 0) {
      for (let p = j; p < n * size; p += size) {
        x.re[p] = x.re[p - 1];
        x.im[p] = -x.im[p - 1];
      }
      continue;
    }
    let most = 0;
    for (let p = j; p < n * size; p += size) most = Math.max(most, Math.abs(x.re[p]), Math.abs(x.im[p]));
    if (most === 0) continue;
    let sum = 0;
    let best = -1;
    let at = j;
    for (let p = j; p < n * size; p += size) {
      const square = (x.re[p] / most) ** 2 + (x.im[p] / most) ** 2;
      sum += square;
      // A shade of preference for the first of equals keeps the choice from hanging on rounding.
      if (square > best * (1 + 1e-6)) {
        best = square;
        at = p;
      }
    }
    const factor = 1 / (most * Math.sqrt(sum) * Math.sqrt(best));
    const cr = (x.re[at] / most) * factor;
    const ci = (-x.im[at] / most) * factor;
    for (let p = j; p < n * size; p += size) {
      const re = x.re[p];
      x.re[p] = re * cr - x.im[p] * ci;
      x.im[p] = re * ci + x.im[p] * cr;
    }
    x.im[at] = 0;
  }
}
