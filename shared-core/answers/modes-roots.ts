/**
 * The complex roots of M root^2 + C root + K, with everything that damps: dampers, proportional damping, modal
 * damping and loss factors as modal damping.
 *
 * The problem is put in the modal coordinates of the undamped one, where M is one and K diagonal; relaxing
 * coordinates stand as their distance d from where springs alone would hold them, so that K has no coupling:
 *
 *   eta'' + (C_ee + modal) eta' + C_ed d' + lambda eta = 0
 *           C_de eta' + C_dd d' + K_dd d = 0
 *
 * Free motions feel nothing and leave it; a motion held by dampers only leaves its position behind, which is a
 * root of exactly zero. Where C is diagonal to rounding, roots are those of single oscillators; otherwise those
 * of a dense state matrix, each improved by one Newton step on its own symmetric functional psi^T (...) psi = 0
 * (error of second order in that of psi; Parlett, The Symmetric Eigenvalue Problem, 1998, section 1.4, carried
 * over to the complex symmetric case).
 */
import { flatForms, formValues } from "../mechanics/flat-forms.ts";
import { formValue } from "../mechanics/forms.ts";
import { sumTerms } from "../mechanics/matrices.ts";
import type { SquareTerm } from "../mechanics/star-mesh.ts";
import { factorLu, multiply, solveLu } from "../numerics/dense.ts";
import { generalEigen } from "../numerics/general-eigen.ts";
import { fail, type Outcome, succeed } from "../numerics/outcome.ts";
import { sparseToDense } from "../numerics/sparse.ts";
import { chainRoots } from "./modes-chain.ts";
import type { Matching } from "./modes-match.ts";
import { addSquare, newtonStep, type Pair } from "./modes-newton.ts";
import type { UndampedModes } from "./modes-undamped.ts";

/** A root, one of each complex pair, with its shape. 1/s. */
export interface Root {
  readonly re: number;
  /** Not negative. */
  readonly im: number;
  readonly shape: RootShape;
  /** psi^T (2 root M + C) psi for that shape, [real, imaginary]: what it answers a force with is over this. */
  readonly norm?: readonly [number, number];
}

/**
 * `modal`: count + relaxing entries, factors of the undamped modes and then distances d. `inertial`: the
 * inertial coordinates themselves, in a system without relaxing ones.
 */
export interface RootShape {
  readonly basis: "modal" | "inertial";
  readonly re: Float64Array;
  readonly im: Float64Array;
}

export interface ComplexRoots {
  readonly roots: readonly Root[];
  /** Whether dampers couple the modes; then whose roots are whose has to be found out. */
  readonly coupled: boolean;
  /** Whose roots are whose, where each mode has its own. */
  readonly matching?: Matching;
}

/** Damping in the coordinates above. */
export interface ModalSystem {
  readonly count: number;
  readonly relaxing: number;
  /** (count + relaxing)^2, row-major, modal damping included. */
  readonly damping: Float64Array;
  /** relaxing^2. */
  readonly relaxingStiffness: Float64Array;
}

/** Off-diagonal share of C below which it counts as diagonal: rounding of its own sums. */
const DIAGONAL = 64 * Number.EPSILON;
/** The same against the largest entry, for modes that no damper reaches. */
const ROUNDING = 4 * Number.EPSILON;

/**
 * All roots but those of free motions. `added` is 2 zeta omega for each undamped mode: modal damping and loss
 * factors. Real ones stand singly, both of an overdamped mode.
 */
export function complexRoots(
  undamped: UndampedModes,
  massDamping: number,
  added: Float64Array,
): Outcome<ComplexRoots> {
  if (undamped.reduction.damping.length === 0) {
    const rates = added.map((rate) => rate + massDamping);
    return succeed(singleRoots(undamped, rates));
  }
  const chain = chainRoots(undamped, massDamping, added);
  if (chain !== undefined) return succeed({ roots: chain, coupled: true });
  const system = modalSystem(undamped, massDamping, added);
  if (isDiagonal(system)) {
    const { count, damping } = system;
    const rates = added.map((_, r) => damping[r * count + r]);
    return succeed(singleRoots(undamped, rates));
  }
  const found = coupledRoots(undamped, system);
  if (!found.ok) return fail(found.reason);
  return succeed({ roots: found.value, coupled: true });
}

/** Damping matrix in modal and relaxing coordinates. */
export function modalSystem(undamped: UndampedModes, massDamping: number, added: Float64Array): ModalSystem {
  const { reduction, count } = undamped;
  const { relaxing } = reduction;
  const size = count + relaxing;
  const damping =
    reduction.damping.length <= 2 * size ? dampingByForms(undamped, size) : dampingByProduct(undamped, size);
  for (let r = 0; r < count; r++) damping[r * size + r] += massDamping + added[r];
  const inner = reduction.stiffness.filter(({ form }) => form.coordinates.some((i) => i >= count));
  const relaxingStiffness = new Float64Array(relaxing * relaxing);
  for (const { form, value } of inner) {
    form.coordinates.forEach((i, p) => {
      form.coordinates.forEach((j, q) => {
        if (i < count || j < count) return;
        relaxingStiffness[(i - count) * relaxing + j - count] += value * form.factors[p] * form.factors[q];
      });
    });
  }
  return { count, relaxing, damping, relaxingStiffness };
}

/** Each row: the basis vector over the reduced coordinates; modes with their relaxing places, then distances. */
function basisRows({ reduction, condensed, count, vectors }: UndampedModes, size: number): Float64Array {
  const basis = new Float64Array(size * size);
  for (let r = 0; r < count; r++) {
    const row = vectors.subarray(r * count, (r + 1) * count);
    basis.set(row, r * size);
    for (let i = count; i < size; i++) basis[r * size + i] = formValue(condensed.inner[i], row);
  }
  for (let k = 0; k < reduction.relaxing; k++) basis[(count + k) * size + count + k] = 1;
  return basis;
}

function dampingByForms(undamped: UndampedModes, size: number): Float64Array {
  const basis = basisRows(undamped, size);
  const dampers = flatForms(undamped.reduction.damping);
  const rates = new Float64Array(size * dampers.count);
  for (let r = 0; r < size; r++) {
    formValues(dampers, basis, r * size, rates.subarray(r * dampers.count, (r + 1) * dampers.count));
  }
  const weighted = new Float64Array(dampers.count * size);
  for (let e = 0; e < dampers.count; e++) {
    for (let r = 0; r < size; r++) weighted[e * size + r] = dampers.value[e] * rates[r * dampers.count + e];
  }
  return symmetrised(multiply(rates, weighted, size, dampers.count, size), size);
}

function dampingByProduct(undamped: UndampedModes, size: number): Float64Array {
  const basis = basisRows(undamped, size);
  const asTerm = ({ form, value }: SquareTerm) => ({ row: form, column: form, value });
  const damping = sparseToDense(sumTerms(undamped.reduction.damping.map(asTerm), size));
  const half = multiply(basis, damping, size, size, size);
  const columns = new Float64Array(size * size);
  for (let i = 0; i < size; i++) for (let j = 0; j < size; j++) columns[j * size + i] = basis[i * size + j];
  return symmetrised(multiply(half, columns, size, size, size), size);
}

function symmetrised(a: Float64Array, n: number): Float64Array {
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      const mean = (a[i * n + j] + a[j * n + i]) / 2;
      a[i * n + j] = mean;
      a[j * n + i] = mean;
    }
  }
  return a;
}

function isDiagonal({ damping, count, relaxing }: ModalSystem): boolean {
  if (relaxing > 0) return false;
  let largest = 0;
  for (let i = 0; i < count; i++) largest = Math.max(largest, Math.abs(damping[i * count + i]));
  for (let i = 0; i < count; i++) {
    for (let j = 0; j < i; j++) {
      const scale = Math.sqrt(Math.abs(damping[i * count + i] * damping[j * count + j]));
      if (Math.abs(damping[i * count + j]) > Math.max(DIAGONAL * scale, ROUNDING * largest)) return false;
    }
  }
  return true;
}

/** Roots of root^2 + c root + lambda: one complex with im > 0, or two real ones, the larger in size first. */
export function oscillatorRoots(c: number, lambda: number): readonly { re: number; im: number }[] {
  const half = c / 2;
  const square = lambda - half * half;
  if (square > 0) return [{ re: -half, im: Math.sqrt(square) }];
  // The sum that does not cancel first, the other root from the product.
  const far = -(half + (half < 0 ? -1 : 1) * Math.sqrt(-square));
  const near = far === 0 ? 0 : lambda / far;
  return [
    { re: far, im: 0 },
    { re: near, im: 0 },
  ];
}

/** Roots where mode r is damped by `rates[r]` = 2 zeta omega and coupled to no other. */
function singleRoots({ count, free, held, values }: UndampedModes, rates: Float64Array): ComplexRoots {
  const roots: Root[] = [];
  const ofMode: number[][] = [];
  const left: number[] = [];
  for (let r = 0; r < count; r++) {
    const own: number[] = [];
    ofMode.push(own);
    if (r < free) continue;
    for (const { re, im } of oscillatorRoots(rates[r], values[r])) {
      (r < free + held ? left : own).push(roots.length);
      roots.push(new SingleRoot(re + 0, im, rates[r], r, count));
    }
  }
  return { roots, coupled: false, matching: { ofMode, left } };
}

/** A root whose shape is that of one undamped mode; shapes of many modes take more room than all the rest. */
class SingleRoot implements Root {
  readonly re: number;
  readonly im: number;
  readonly #rate: number;
  readonly #mode: number;
  readonly #size: number;

  constructor(re: number, im: number, rate: number, mode: number, size: number) {
    this.re = re;
    this.im = im;
    this.#rate = rate;
    this.#mode = mode;
    this.#size = size;
  }

  get norm(): readonly [number, number] {
    // The real part of a pair cancels exactly.
    return [this.im === 0 ? 2 * this.re + this.#rate : 0, 2 * this.im];
  }

  get shape(): RootShape {
    return unitShape(this.#mode, this.#size);
  }
}

/** The shape of undamped mode r alone. */
function unitShape(r: number, size: number): RootShape {
  const re = new Float64Array(size);
  re[r] = 1;
  return { basis: "modal", re, im: new Float64Array(size) };
}

/**
 * State (s eta, eta', d) without the free motions and the positions of damper-held ones; s = sqrt |lambda| makes
 * the matrix as nearly normal as the damping lets it be.
 */
function coupledRoots(undamped: UndampedModes, system: ModalSystem): Outcome<Root[]> {
  const { free, held, count, values } = undamped;
  const { relaxing } = system;
  const elastic = count - free - held;
  const moving = count - free;
  const n = elastic + moving + relaxing;
  const built = stateMatrix(undamped, system);
  if (!built.ok) return fail(built.reason);
  const solved = generalEigen(built.value, n, { layout: "rows" });
  if (!solved.ok) return fail(solved.reason);
  const { re, im, right } = solved.value;
  if (right === undefined) return fail("the eigenvalue routine gave no shapes");
  const own = Array.from(im.keys()).filter((j) => im[j] >= 0);
  const size = count + relaxing;
  const shapes = { re: new Float64Array(own.length * size), im: new Float64Array(own.length * size) };
  const stretch = stretches(values, free + held);
  own.forEach((j, k) => {
    const to = k * size;
    for (let r = 0; r < elastic; r++) {
      shapes.re[to + free + held + r] = right.re[j * n + r] / stretch[r];
      shapes.im[to + free + held + r] = right.im[j * n + r] / stretch[r];
    }
    const square = re[j] * re[j] + im[j] * im[j];
    for (let r = 0; r < held && square > 0; r++) {
      const at = j * n + elastic + r;
      shapes.re[to + free + r] = (right.re[at] * re[j] + right.im[at] * im[j]) / square;
      shapes.im[to + free + r] = (right.im[at] * re[j] - right.re[at] * im[j]) / square;
    }
    for (let r = 0; r < relaxing; r++) {
      shapes.re[to + count + r] = right.re[j * n + elastic + moving + r];
      shapes.im[to + count + r] = right.im[j * n + elastic + moving + r];
    }
  });
  const roots = improved(
    own.map((j) => [re[j], im[j]] as const),
    shapes,
    undamped,
    system,
  );
  for (let r = 0; r < held; r++) {
    roots.push({ re: 0, im: 0, shape: unitShape(free + r, size) });
  }
  return succeed(roots);
}

/** sqrt |lambda| of the elastic modes; a root of zero takes the largest one's, so that the matrix stays scaled. */
function stretches(values: Float64Array, first: number): Float64Array {
  const largest = values.reduce((most, v) => Math.max(most, Math.abs(v)), 0);
  return values.slice(first).map((v) => Math.sqrt(Math.abs(v) || largest || 1));
}

function stateMatrix(undamped: UndampedModes, system: ModalSystem): Outcome<Float64Array> {
  const { free, held, count, values } = undamped;
  const { relaxing, damping, relaxingStiffness } = system;
  const size = count + relaxing;
  const elastic = count - free - held;
  const moving = count - free;
  const n = elastic + moving + relaxing;
  const a = new Float64Array(n * n);
  const stretch = stretches(values, free + held);
  for (let r = 0; r < elastic; r++) {
    a[r * n + elastic + held + r] = stretch[r];
    a[(elastic + held + r) * n + r] = -values[free + held + r] / stretch[r];
  }
  for (let i = 0; i < moving; i++) {
    for (let j = 0; j < moving; j++) {
      a[(elastic + i) * n + elastic + j] = -damping[(free + i) * size + free + j];
    }
  }
  if (relaxing === 0) return succeed(a);
  // d' = -C_dd^-1 (C_de eta' + K_dd d), and what it puts back into the modes.
  const width = moving + relaxing;
  const right = new Float64Array(relaxing * width);
  const inner = new Float64Array(relaxing * relaxing);
  for (let k = 0; k < relaxing; k++) {
    for (let j = 0; j < moving; j++) right[k * width + j] = -damping[(count + k) * size + free + j];
    for (let l = 0; l < relaxing; l++) {
      right[k * width + moving + l] = -relaxingStiffness[k * relaxing + l];
      inner[k * relaxing + l] = damping[(count + k) * size + count + l];
    }
  }
  const factor = factorLu(inner, relaxing);
  if (!factor.ok) return fail("dampers cancel on a place without inertia");
  const rates = solveLu(factor.value, right, width);
  for (let k = 0; k < relaxing; k++) {
    for (let j = 0; j < width; j++) {
      const rate = rates[k * width + j];
      a[(elastic + moving + k) * n + elastic + j] = rate;
      for (let i = 0; i < moving; i++) {
        a[(elastic + i) * n + elastic + j] -= damping[(free + i) * size + count + k] * rate;
      }
    }
  }
  return succeed(a);
}

/** One Newton step for each root on psi^T (M root^2 + C root + K) psi = 0; shapes one a row. */
function improved(
  found: readonly (readonly [number, number])[],
  shapes: { readonly re: Float64Array; readonly im: Float64Array },
  undamped: UndampedModes,
  system: ModalSystem,
): Root[] {
  const size = system.count + system.relaxing;
  // C psi of all shapes at once, where a product is quick.
  const damped = {
    re: multiply(shapes.re, system.damping, found.length, size, size),
    im: multiply(shapes.im, system.damping, found.length, size, size),
  };
  return found.map(([re, im], k) => {
    const row = (all: Float64Array) => all.subarray(k * size, (k + 1) * size);
    const [x, y] = [row(shapes.re), row(shapes.im)];
    const root: Root = { re, im, shape: { basis: "modal", re: x, im: y } };
    const b = crossSum(x, y, row(damped.re), row(damped.im));
    return newtonStep(root, ...inertiaAndSprings(x, y, b, undamped, system));
  });
}

/** psi^T v without conjugation. */
function crossSum(x: Float64Array, y: Float64Array, vRe: Float64Array, vIm: Float64Array): Pair {
  let re = 0;
  let im = 0;
  for (let i = 0; i < x.length; i++) {
    re += x[i] * vRe[i] - y[i] * vIm[i];
    im += x[i] * vIm[i] + y[i] * vRe[i];
  }
  return [re, im];
}

/** psi^T (M, C, K) psi, that of C given. */
function inertiaAndSprings(
  x: Float64Array,
  y: Float64Array,
  b: Pair,
  { values }: UndampedModes,
  { count, relaxing, relaxingStiffness }: ModalSystem,
): [Pair, Pair, Pair] {
  const a: Pair = [0, 0];
  const c: Pair = [0, 0];
  for (let r = 0; r < count; r++) addSquare(a, 1, x[r], y[r]);
  for (let r = 0; r < count; r++) addSquare(c, values[r], x[r], y[r]);
  for (let i = 0; i < relaxing; i++) {
    for (let j = 0; j < relaxing; j++) {
      const k = relaxingStiffness[i * relaxing + j];
      c[0] += k * (x[count + i] * x[count + j] - y[count + i] * y[count + j]);
      c[1] += k * (x[count + i] * y[count + j] + y[count + i] * x[count + j]);
    }
  }
  return [a, b, c];
}
